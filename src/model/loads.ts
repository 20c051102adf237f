/** Line and point loads of a level. */
import { sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { quantity } from './cell.ts'
import { type ColumnRules, filled, type RowOf, readRows } from './columns.ts'
import { type Corner, type Grid, readPoint } from './grid.ts'
import type { Scope } from './scope.ts'

interface Loaded {
  readonly name: string
  readonly load: { readonly cell: Text; readonly unit?: Unit }
  readonly span: Span
}

export interface LineLoad extends Loaded {
  readonly from: Corner
  readonly to: Corner
}

export interface PointLoad extends Loaded {
  readonly at: Corner
}

export const lineLoad = sym('w', 'w', 'lineLoad')
export const pointLoad = sym('W', 'W', 'force')

export const lineColumns: ColumnRules = { needed: ['line', 'from', 'to', 'load'], optional: ['note'] }
export const pointColumns: ColumnRules = { needed: ['point', 'at', 'load'], optional: ['note'] }

export function readLineLoads(
  blocks: readonly Block[],
  level: string,
  grid: Grid,
  scope: Scope,
): Result<readonly LineLoad[]> {
  return readEach(blocks, 'line', lineColumns, (record, name, loaded) => {
    const [from, to] = [filled(record, 'from'), filled(record, 'to')]
    if (!from.ok) return from
    if (!to.ok) return to
    const want = { id: `${level}.lines.${name}`, about: [name] }
    const a = readPoint(from.value, { ...want, mark: '1' }, grid, scope)
    const b = readPoint(to.value, { ...want, mark: '2' }, grid, scope)
    if (!a.ok || !b.ok) return bad([...(a.ok ? [] : a.because), ...(b.ok ? [] : b.because)])
    if (a.value.x.si === b.value.x.si && a.value.y.si === b.value.y.si)
      return bad([
        diagnose(
          'error',
          'line-without-length',
          loaded.span,
          `line ${name} has no length`,
          'Its two ends are the same point.',
        ),
      ])
    return good({ ...loaded, from: a.value, to: b.value })
  })
}

export function readPointLoads(
  blocks: readonly Block[],
  level: string,
  grid: Grid,
  scope: Scope,
): Result<readonly PointLoad[]> {
  return readEach(blocks, 'point', pointColumns, (record, name, loaded) => {
    const cell = filled(record, 'at')
    if (!cell.ok) return cell
    const at = readPoint(cell.value, { id: `${level}.points.${name}`, mark: '', about: [name] }, grid, scope)
    return at.ok ? good({ ...loaded, at: at.value }) : at
  })
}

/** The rows of a topic, each with the cell of its load. */
const readEach = <T>(
  blocks: readonly Block[],
  column: string,
  rules: ColumnRules,
  read: (record: RowOf, name: string, loaded: Loaded) => Result<T>,
): Result<readonly T[]> =>
  readRows(blocks, column, rules, (record, { text }) => {
    const cell = filled(record, 'load')
    if (!cell.ok) return cell
    const unit = record.unit('load')
    return read(record, text, {
      name: text,
      load: { cell: cell.value, ...(unit ? { unit } : {}) },
      span: record.line.span,
    })
  })

/** The load itself, read when the mass is worked. */
export function readLoad(loaded: LineLoad | PointLoad, level: string, scope: Scope): Result<Value> {
  const { name, load } = loaded
  const line = 'from' in loaded
  const symbol = line ? lineLoad : pointLoad
  const id = line ? `${level}.lines.${name}.w` : `${level}.points.${name}.W`
  const value = quantity(
    load.cell,
    { id, what: 'load', sym: symbol, tex: texAbout(symbol.tex, name), ...(load.unit ? { unit: load.unit } : {}) },
    scope,
  )
  if (value.ok && value.value.si < 0)
    return bad([
      diagnose(
        'error',
        'load-below-zero',
        load.cell.span,
        `the load of ${name} is below zero`,
        'Weights are positive.',
      ),
    ])
  return value
}
