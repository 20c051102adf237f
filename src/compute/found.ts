/** Picks values out of results by parts of their ids. */
import type { Result } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value, Word } from '../base/value.ts'

/** Undefined where there is no such value. */
export type Found = Result<Value | Word> | undefined

/** A value out of a stage's result; undefined when the stage has no such value. */
export function from<T>(result: Result<T>, pick: (value: T) => Value | Word | undefined): Found {
  if (!result.ok) return result
  const value = pick(result.value)
  return value && good(value)
}

export const axisOf = <T>(pair: { readonly x?: T; readonly y?: T }, axis: string | undefined): T | undefined =>
  axis === 'x' || axis === 'y' ? pair[axis] : undefined

export function cellOf(
  table: Tabulation | undefined,
  row: string | undefined,
  keys: readonly string[],
): Value | undefined {
  const at = table?.rows.indexOf(row ?? '') ?? -1
  const column = table?.columns.find(({ sym }) => keys.includes(sym.name))
  return at === -1 ? undefined : column?.cell(at)
}
