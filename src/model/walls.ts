/** Walls of a level: where they stand, how high they are, and what gives them their stiffness. */
import { isNumber } from '../base/dimension.ts'
import { sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { parseExpr } from '../base/parse.ts'
import type { Span } from '../base/span.ts'
import { NO_UNIT, type Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, exprDiagnostic, quantity, stated, workExpr } from './cell.ts'
import { type ColumnRules, filled, type RowOf, readRows } from './columns.ts'
import { type Corner, type Grid, readPoint } from './grid.ts'
import type { Scope } from './scope.ts'

interface Placed {
  readonly name: string
  readonly from: Corner
  readonly to: Corner
  /** Strength along the wall, where it is stated. */
  readonly strength?: Value
  /** True where the end written first, its start, is `to`. */
  readonly reversed: boolean
  /** Its row, and within it the cells of its two ends. */
  readonly span: Span
  readonly place: Span
}

/** A wall whose stiffness follows from its construction and height. */
export interface BuiltWall extends Placed {
  readonly kind: 'built'
  readonly construction: Text
  readonly height: Value
}

/** A wall of stated stiffness; the number may be relative to the other walls. */
export interface StatedWall extends Placed {
  readonly kind: 'stated'
  readonly k: { readonly cell: Text; readonly unit?: Unit }
  readonly height?: Value
}

export type Wall = BuiltWall | StatedWall

const height = sym('h', 'h', 'length')
export const stiffness = sym('k', 'k', 'stiffness')
/** In-plane strength, nominal. */
export const strength = sym('V_n', 'V_n', 'force')

export const wallColumns: ColumnRules = {
  needed: ['wall', 'from', 'to'],
  optional: ['height', 'construction', 'k', 'strength', 'note'],
  oneOf: [['height', 'construction'], ['k']],
}

export const readWalls = (blocks: readonly Block[], level: string, grid: Grid, scope: Scope): Result<readonly Wall[]> =>
  readRows(blocks, 'wall', wallColumns, (record, name) => readWall(record, name.text, level, grid, scope))

function readWall(record: RowOf, name: string, level: string, grid: Grid, scope: Scope): Result<Wall> {
  const placed = readPlace(record, name, level, grid, scope)
  if (!placed.ok) return placed
  const [k, construction] = [record.cell('k'), record.cell('construction')]
  if (k && construction)
    return bad([
      diagnose(
        'error',
        'stiffness-twice',
        k.span,
        `wall ${name} has both a stated k and a construction`,
        'Keep one of them.',
        { also: [{ span: construction.span, text: 'construction' }] },
      ),
    ])
  const unit = record.unit('k')
  if (k) {
    const high = record.cell('height') ? readHeight(record, name, level, scope) : undefined
    if (high && !high.ok) return high
    return good({
      ...placed.value,
      kind: 'stated',
      k: { cell: k, ...(unit ? { unit } : {}) },
      ...(high ? { height: high.value } : {}),
    })
  }
  if (!construction)
    return bad([
      diagnose(
        'error',
        'stiffness-missing',
        record.line.span,
        `wall ${name} has neither a construction nor a stated k`,
        'Name its construction, or state k in a column of its own.',
      ),
    ])
  const high = readHeight(record, name, level, scope)
  return high.ok ? good({ ...placed.value, kind: 'built', construction, height: high.value }) : high
}

function readPlace(record: RowOf, name: string, level: string, grid: Grid, scope: Scope): Result<Placed> {
  const [from, to] = [filled(record, 'from'), filled(record, 'to')]
  if (!from.ok) return from
  if (!to.ok) return to
  const want = { id: `${level}.wall.${name}`, about: [name] }
  const a = readPoint(from.value, { ...want, mark: '1' }, grid, scope)
  const b = readPoint(to.value, { ...want, mark: '2' }, grid, scope)
  if (!a.ok || !b.ok) return bad([...(a.ok ? [] : a.because), ...(b.ok ? [] : b.because)])
  const place = {
    start: Math.min(from.value.span.start, to.value.span.start),
    end: Math.max(from.value.span.end, to.value.span.end),
  }
  const strong = readStrength(record, name, level, scope)
  if (strong && !strong.ok) return strong
  const length = Math.hypot(b.value.x.si - a.value.x.si, b.value.y.si - a.value.y.si)
  // A wall shorter than a tenth of a millimetre is two spellings of one point.
  if (length < 1e-4)
    return bad([
      diagnose('error', 'wall-without-length', place, `wall ${name} has no length`, 'Its two ends are the same point.'),
    ])
  const strength = strong ? { strength: strong.value } : {}
  return good({ name, ...directed(a.value, b.value), ...strength, span: record.line.span, place })
}

function readStrength(record: RowOf, name: string, level: string, scope: Scope): Result<Value> | undefined {
  const cell = record.cell('strength')
  if (!cell) return undefined
  const unit = record.unit('strength')
  const id = `${level}.wall.${name}.strength`
  const value = quantity(
    cell,
    { id, what: 'strength', sym: strength, tex: texAbout('V_n', name), ...(unit ? { unit } : {}) },
    scope,
  )
  return aboveZero(value, cell.span, `the strength of wall ${name}`)
}

/** A wall whose ends lie this near above each other, as a share of its length, is parallel to y. */
const UPRIGHT = 1e-9

/**
 * A wall's own direction has a positive x part, or points up when it is parallel
 * to y, whichever end was written first: the sign of its shear follows from it.
 */
function directed(a: Corner, b: Corner): Pick<Placed, 'from' | 'to' | 'reversed'> {
  const [dx, dy] = [b.x.si - a.x.si, b.y.si - a.y.si]
  const upright = Math.abs(dx) <= UPRIGHT * Math.abs(dy)
  return (upright ? dy > 0 : dx > 0) ? { from: a, to: b, reversed: false } : { from: b, to: a, reversed: true }
}

function readHeight(record: RowOf, name: string, level: string, scope: Scope): Result<Value> {
  const cell = filled(record, 'height')
  if (!cell.ok) return cell
  const unit = record.unit('height')
  const value = quantity(
    cell.value,
    { id: `${level}.wall.${name}.h`, what: 'height', sym: height, tex: texAbout('h', name), ...(unit ? { unit } : {}) },
    scope,
  )
  return aboveZero(value, cell.value.span, `the height of wall ${name}`)
}

/** The stated stiffness: with a unit, or a pure number that is relative to the other walls. */
export function readStiffness({ name, k }: StatedWall, level: string, scope: Scope): Result<Value> {
  const parsed = parseExpr(k.cell.text, k.cell.span.start)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  const id = `${level}.wall.${name}.k`
  const worked = workExpr(parsed.value, k.cell.span, scope)
  if (!worked.ok) return worked
  const tex = texAbout('k', name)
  if (!isNumber(worked.value.dimension) || k.unit) {
    const value = quantity(k.cell, { id, what: 'k', sym: stiffness, tex, ...(k.unit ? { unit: k.unit } : {}) }, scope)
    return aboveZero(value, k.cell.span, `the stiffness of wall ${name}`)
  }
  const origin =
    worked.value.inputs.size === 0
      ? ({ kind: 'given', span: k.cell.span } as const)
      : stated(parsed.value, k.cell.span, stiffness, worked.value.inputs)
  return aboveZero(
    good({ id, tex, si: worked.value.si, unit: NO_UNIT, rounding: 1e-12, origin }),
    k.cell.span,
    `the stiffness of wall ${name}`,
  )
}
