/** Numbers of a standard's tables as formulas, so that a page prints them with their table like any other step. */
import { type Formula, formula, type Sym } from '../base/formula.ts'

/** A number as the table has it. */
export const tabled = (gives: Sym, number: number, source: string): Formula =>
  formula({ gives, body: String(number), of: [], source })

/**
 * A number read between the columns of a table, on a straight line; outside of the table the nearest column holds.
 * @param by the number that the columns are headed with, and where it stands
 * @param nodes heads and numbers, the heads ascending
 */
export function interpolated(
  gives: Sym,
  by: Sym,
  at: number,
  nodes: readonly (readonly [number, number])[],
  source: string,
): Formula {
  const upper = nodes.findIndex(([head]) => at <= head)
  const [first] = nodes
  const last = nodes.at(-1)
  if (!first || !last) throw new Error(`${gives.name} is read from an empty table`)
  if (upper === -1) return tabled(gives, last[1], `${source}, ${by.name} ≥ ${last[0]}`)
  const [b, right] = nodes[upper] ?? last
  if (upper === 0) return tabled(gives, right, `${source}, ${by.name} ≤ ${first[0]}`)
  const [a, left] = nodes[upper - 1] ?? first
  if (at === b || left === right)
    return tabled(gives, right, `${source}, ${by.name} ${at === b ? `= ${b}` : `from ${a} to ${b}`}`)
  return formula({
    gives,
    body: `${left} + (${right} - ${left})*(${by.name} - ${a})/(${b} - ${a})`,
    of: [by],
    source: `${source}, ${by.name} between ${a} and ${b}`,
  })
}
