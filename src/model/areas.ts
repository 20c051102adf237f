/** Areas and openings of a level: their outlines, and apart from them their loads. */
import { formula, type Sym, sym } from '../base/formula.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
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
  /** A load beside it that moves with the building in part: its cell, and that of its share. */
  readonly variable?: { readonly cell: Text; readonly unit?: Unit; readonly share: Text }
  readonly note: string
  readonly span: Span
}

const OPENING = 'opening'

export const areaColumns: ColumnRules = {
  needed: ['area', 'load'],
  optional: ['from', 'to', 'outline', 'variable', 'share', 'note'],
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
  const variable = readVariable(record, name.text, open)
  if (!variable.ok) return variable
  return good({
    name: name.text,
    ...shape.value,
    ...(open ? {} : { load: { cell: load.value, ...(unit ? { unit } : {}) } }),
    ...(variable.value ? { variable: variable.value } : {}),
    note: record.cell('note')?.text ?? '',
    span: record.line.span,
  })
}

/** The variable load and its share go together. */
function readVariable(record: RowOf, name: string, open: boolean): Result<Area['variable']> {
  const [cell, share, unit] = [record.cell('variable'), record.cell('share'), record.unit('variable')]
  if (!cell && !share) return good(undefined)
  const lone = open ? (cell ?? share) : cell && share ? undefined : (cell ?? share)
  if (lone)
    return bad([
      diagnose(
        'error',
        'variable-incomplete',
        lone.span,
        open
          ? `${name} is an opening and carries nothing`
          : `${name} has a ${cell ? 'variable load' : 'share'} without its ${cell ? 'share' : 'variable load'}`,
        open ? 'Leave the cell empty.' : 'Fill variable and share both, as in 40 psf and 20%, or neither.',
      ),
    ])
  return good(cell && share ? { cell, share, ...(unit ? { unit } : {}) } : undefined)
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
const dead = sym('w_D', 'w_D', 'areaLoad')
const variableLoad = sym('q', 'q', 'areaLoad')
export const shareOfLoad = sym('psi', '\\psi', 'share')

const withShare = formula({
  gives: areaLoad,
  body: 'w_D + psi*q',
  of: [dead, shareOfLoad, variableLoad],
  source: 'statics',
})

/** The share of a variable load by the word that stands for it, such as `snow`. */
export type ShareByWord = (
  word: Text,
  load: { readonly id: string; readonly area: string; readonly value: Value },
) => Result<Value> | undefined

/** The load of an area, read apart so that a load may rest on the plan's own size. */
export function readAreaLoad(area: Area, level: string, shareByWord: ShareByWord, scope: Scope): Result<Value> {
  const { name, load, variable, span } = area
  if (!load) throw new Error(`${name} is an opening and has no load`)
  const id = `${level}.areas.${name}`
  if (!variable) return readLoad({ ...load, id: `${id}.w`, of: areaLoad, what: 'load', name }, span, scope)
  const parts = together({
    w_D: readLoad({ ...load, id: `${id}.dead`, of: dead, what: 'load', name }, span, scope),
    q: readLoad({ ...variable, id: `${id}.variable`, of: variableLoad, what: 'variable', name }, span, scope),
  })
  if (!parts.ok) return parts
  const psi = readShare(variable.share, `${id}.share`, name, parts.value.q, shareByWord, scope)
  if (!psi.ok) return psi
  const value = work(`${id}.w`, withShare, { ...parts.value, psi: psi.value }, scope.display, [name])
  scope.stated(value, variable.share.span)
  return good(value)
}

interface LoadCell {
  readonly cell: Text
  readonly unit?: Unit
  readonly id: string
  readonly of: Sym
  readonly what: string
  readonly name: string
}

function readLoad({ cell, unit, id, of, what, name }: LoadCell, span: Span, scope: Scope): Result<Value> {
  const value = quantity(cell, { id, what, sym: of, tex: texAbout(of.tex, name), ...(unit ? { unit } : {}) }, scope)
  if (value.ok && value.value.si < 0)
    return bad([
      diagnose(
        'error',
        'load-below-zero',
        cell.span,
        `the ${what === 'load' ? 'load' : 'variable load'} of ${name} is below zero`,
        'Weights are positive. A part that is cut out is an opening.',
        { also: [{ span, text: '' }] },
      ),
    ])
  return value
}

function readShare(
  cell: Text,
  id: string,
  name: string,
  load: Value,
  shareByWord: ShareByWord,
  scope: Scope,
): Result<Value> {
  const byWord = shareByWord(cell, { id, area: name, value: load })
  if (byWord) {
    if (byWord.ok) scope.stated(byWord.value, cell.span)
    return byWord
  }
  const value = quantity(cell, { id, what: 'share', sym: shareOfLoad, tex: texAbout(shareOfLoad.tex, name) }, scope)
  if (!value.ok || (value.value.si >= 0 && value.value.si <= 1)) return value
  return bad([
    diagnose(
      'error',
      'share-out-of-range',
      cell.span,
      `share is ${cell.text}; it lies between 0% and 100%`,
      'Write a percentage, or the word snow, storage or live, for which the standard has a share.',
    ),
  ])
}
