/** Areas and openings of a level: their outlines, and apart from them their loads. */
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, part, type Text, trimmed } from '../read/text.ts'
import { quantity } from './cell.ts'
import { type ColumnRules, filled, type RowOf, readRows } from './columns.ts'
import { crossesItself, signedArea } from './geometry.ts'
import { type Corner, type Grid, readPoint } from './grid.ts'
import type { Scope } from './scope.ts'

export interface Area {
  readonly name: string
  /** Counter-clockwise; a rectangle starts at its lower left corner. */
  readonly outline: readonly Corner[]
  readonly rectangle: boolean
  /** The cell of its load; absent for an opening. */
  readonly load?: { readonly cell: Text; readonly unit?: Unit }
  readonly note: string
  readonly span: Span
}

const OPENING = 'opening'

export const areaColumns: ColumnRules = {
  needed: ['area', 'load'],
  optional: ['from', 'to', 'outline', 'note'],
  oneOf: [['from', 'to'], ['outline']],
}

export const readAreas = (blocks: readonly Block[], level: string, grid: Grid, scope: Scope): Result<readonly Area[]> =>
  readRows(blocks, 'area', areaColumns, (record, name) => readArea(record, name, level, grid, scope))

function readArea(record: RowOf, name: Text, level: string, grid: Grid, scope: Scope): Result<Area> {
  const load = filled(record, 'load')
  if (!load.ok) return load
  const id = `${level}.areas.${name.text}`
  const shape = record.cell('outline')
    ? readPolygon(record, id, name, grid, scope)
    : readRectangle(record, id, name, grid, scope)
  if (!shape.ok) return shape
  const unit = record.unit('load')
  const open = load.value.text.toLowerCase() === OPENING
  return good({
    name: name.text,
    ...shape.value,
    ...(open ? {} : { load: { cell: load.value, ...(unit ? { unit } : {}) } }),
    note: record.cell('note')?.text ?? '',
    span: record.line.span,
  })
}

/** A part of a plan smaller than a millimetre is two spellings of one line. */
const LEAST = 1e-3

type Shape = Pick<Area, 'outline' | 'rectangle'>

function readRectangle(record: RowOf, id: string, name: Text, grid: Grid, scope: Scope): Result<Shape> {
  const [from, to] = [filled(record, 'from'), filled(record, 'to')]
  if (!from.ok) return from
  if (!to.ok) return to
  const a = readPoint(from.value, { id, mark: '1', about: [name.text] }, grid, scope)
  const b = readPoint(to.value, { id, mark: '2', about: [name.text] }, grid, scope)
  if (!a.ok || !b.ok) return bad([...(a.ok ? [] : a.because), ...(b.ok ? [] : b.because)])
  const [left, right] = inOrder(a.value.x, b.value.x)
  const [low, high] = inOrder(a.value.y, b.value.y)
  if (right.si - left.si < LEAST || high.si - low.si < LEAST)
    return bad([
      diagnose(
        'error',
        'area-empty',
        { start: from.value.span.start, end: to.value.span.end },
        `area ${name.text} has no extent in ${right.si - left.si < LEAST ? 'x' : 'y'}`,
        'Give two opposite corners.',
      ),
    ])
  const outline = [
    { x: left, y: low },
    { x: right, y: low },
    { x: right, y: high },
    { x: left, y: high },
  ]
  return good({ outline, rectangle: true })
}

const inOrder = (a: Value, b: Value): readonly [Value, Value] => (a.si <= b.si ? [a, b] : [b, a])

function readPolygon(record: RowOf, id: string, name: Text, grid: Grid, scope: Scope): Result<Shape> {
  const cell = filled(record, 'outline')
  if (!cell.ok) return cell
  const points = pointsOf(cell.value)
  if (points.length < 3)
    return bad([
      diagnose(
        'error',
        'outline-too-short',
        cell.value.span,
        `an outline has at least three points, and this has ${points.length}`,
        'Write (0 ft, 0 ft) (20 ft, 0 ft) (20 ft, 12 ft), or A1 B1 B2.',
      ),
    ])
  const corners = all(
    points.map((point, i) => readPoint(point, { id, mark: String(i + 1), about: [name.text] }, grid, scope)),
  )
  if (!corners.ok) return corners
  const plain = corners.value.map(({ x, y }) => ({ x: x.si, y: y.si }))
  const crossing = crossesItself(plain)
  if (crossing)
    return bad([
      diagnose(
        'error',
        'outline-crosses-itself',
        cell.value.span,
        `the outline of ${name.text} crosses itself between its sides ${crossing[0] + 1} and ${crossing[1] + 1}`,
        'Give the points in order around the outline.',
      ),
    ])
  const area = signedArea(plain)
  if (Math.abs(area) < LEAST * LEAST)
    return bad([
      diagnose(
        'error',
        'area-empty',
        cell.value.span,
        `the outline of ${name.text} encloses no area`,
        'Its points lie on one line.',
      ),
    ])
  return good({ outline: area > 0 ? corners.value : [...corners.value].reverse(), rectangle: false })
}

/** Points in brackets and crossings, with spaces between. */
export function pointsOf(cell: Text): readonly Text[] {
  return [...cell.text.matchAll(/\(((?:[^()]|\([^()]*\))*)\)|[^\s(]+/g)].map(found => {
    const end = found.index + found[0].length
    return found[1] === undefined ? part(cell, found.index, end) : trimmed(part(cell, found.index + 1, end - 1))
  })
}

export const areaLoad = sym('w', 'w', 'areaLoad')

/** The load of an area, read apart so that a load may rest on the plan's own size. */
export function readAreaLoad({ name, load, span }: Area, level: string, scope: Scope): Result<Value> {
  if (!load) throw new Error(`${name} is an opening and has no load`)
  const { cell, unit } = load
  const value = quantity(
    cell,
    {
      id: `${level}.areas.${name}.w`,
      what: 'load',
      sym: areaLoad,
      tex: texAbout('w', name),
      ...(unit ? { unit } : {}),
    },
    scope,
  )
  if (value.ok && value.value.si < 0)
    return bad([
      diagnose(
        'error',
        'load-below-zero',
        cell.span,
        `the load of ${name} is below zero`,
        'Weights are positive. A part that is cut out is an opening.',
        { also: [{ span, text: '' }] },
      ),
    ])
  return value
}
