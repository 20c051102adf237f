/** Grid lines, and points named by them. */
import type { Expr } from '../base/expr.ts'
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import { parseExpr } from '../base/parse.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, part, splitAt, type Text, trimmed } from '../read/text.ts'
import { exprDiagnostic, quantity, quantityOf } from './cell.ts'
import { checkedName, duplicates, settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'

export type Axis = 'x' | 'y'

export interface GridLine {
  readonly name: string
  readonly at: Value
}

export interface Grid {
  readonly x: readonly GridLine[]
  readonly y: readonly GridLine[]
  /** Direction of north, counter-clockwise from +x, where it is stated. */
  readonly north?: Value
}

export const noGrid: Grid = { x: [], y: [] }

/** A point of the plan. */
export interface Corner {
  readonly x: Value
  readonly y: Value
}

export const gridSettings: readonly string[] = ['x', 'y', 'north']

const position = { x: sym('x', 'x', 'length'), y: sym('y', 'y', 'length') }
const north = sym('north', '\\theta_{\\text{north}}', 'angle')

export function readGrid(blocks: readonly Block[], scope: Scope): Result<Grid> {
  const [block, second] = blocks
  if (!block) return good(noGrid)
  if (second)
    return bad([
      diagnose('error', 'grid-repeated', second.info, 'the grid is given twice', 'Put all its lines in one block.', {
        also: [{ span: block.info, text: 'first here' }],
      }),
    ])
  const faults = [...block.faults, ...strangeSettings(block, gridSettings), ...strangeLines(block)]
  if (faults.length > 0) return bad(faults)
  const x = readLines(settingOf(block, 'x'), 'x', scope)
  const y = readLines(settingOf(block, 'y'), 'y', scope)
  const up = settingOf(block, 'north')
  const direction = up ? quantity(up, { id: 'grid.north', what: 'north', sym: north }, scope) : undefined
  const failed = all<unknown>([x, y, ...(direction ? [direction] : [])])
  if (!failed.ok) return failed
  const lines = { x: x.ok ? x.value : [], y: y.ok ? y.value : [] }
  return good(direction?.ok ? { ...lines, north: direction.value } : lines)
}

/** The lines of one axis as written: a name and where it lies; only a name where the position is left out. */
export function namedLines(setting: Text): readonly { readonly name: Text; readonly at?: Text }[] {
  return splitAt(setting, /,/)
    .filter(({ text }) => text !== '')
    .map(piece => {
      const word = /^(\S+)\s+/.exec(piece.text)
      return word ? { name: part(piece, 0, (word[1] ?? '').length), at: part(piece, word[0].length) } : { name: piece }
    })
}

function readLines(setting: Text | undefined, axis: Axis, scope: Scope): Result<readonly GridLine[]> {
  if (!setting) return good([])
  const named = namedLines(setting)
  const names: Text[] = []
  const lines = named.map((piece): Result<GridLine> => {
    if (!piece.at)
      return bad([
        diagnose(
          'error',
          'grid-line',
          piece.name.span,
          'a grid line is a name and a position',
          'Write A 0 ft, B 24 ft.',
        ),
      ])
    const name = checkedName(piece.name, 'grid line')
    if (!name.ok) return name
    names.push(name.value)
    const at = quantity(
      piece.at,
      { id: `grid.${name.value.text}`, what: 'position', sym: position[axis], tex: texAbout(axis, name.value.text) },
      scope,
    )
    return at.ok ? good({ name: name.value.text, at: at.value }) : at
  })
  const repeated = duplicates(names, 'grid line')
  return repeated.length > 0 ? bad(repeated) : all(lines)
}

/** Where a point is read from, and how its coordinates are called. */
export interface PointWant {
  /** Prefix of the ids of its coordinates, such as `roof.wall.W1`. */
  readonly id: string
  /** Added after x and y in the id: `1` gives `roof.wall.W1.x1`. */
  readonly mark: string
  /** Words below its letters, such as the wall's name. */
  readonly about: readonly string[]
}

/** A crossing (`A1`), an offset from one (`A+6 ft / 2`), or `x, y`. */
export function readPoint(cell: Text, want: PointWant, grid: Grid, scope: Scope): Result<Corner> {
  const form = formOfPoint(cell)
  if (form.kind === 'strange') return bad([notAPoint(cell, grid)])
  if (form.kind === 'pair')
    return corner(coordinate(form.x, 'x', want, grid, scope), coordinate(form.y, 'y', want, grid, scope))
  const crossings = grid.x.flatMap(a =>
    grid.y.filter(b => a.name + b.name === cell.text).map(b => ({ x: a.at, y: b.at })),
  )
  const [crossing, another] = crossings
  if (!crossing) return bad([notAPoint(cell, grid)])
  if (another)
    return bad([
      diagnose(
        'error',
        'crossing-ambiguous',
        cell.span,
        `${cell.text} names ${crossings.length} crossings of the grid`,
        'Write it with a slash, such as A / 11.',
      ),
    ])
  return good(crossing)
}

/** How a point is written: two coordinates, or what may be a crossing. */
export type PointForm =
  | { readonly kind: 'pair'; readonly x: Text; readonly y: Text }
  | { readonly kind: 'crossing' }
  | { readonly kind: 'strange' }

export function formOfPoint(cell: Text): PointForm {
  const [first, second, ...more] = splitAt(cell, /,/)
  if (first && second && more.length === 0) return { kind: 'pair', x: first, y: second }
  if (more.length > 0) return { kind: 'strange' }
  const slash = splitAt(cell, /\//)
  const [left, right] = slash
  return left && right && slash.length === 2 ? { kind: 'pair', x: left, y: right } : { kind: 'crossing' }
}

function corner(x: Result<Value>, y: Result<Value>): Result<Corner> {
  const both = all([x, y])
  return x.ok && y.ok ? good({ x: x.value, y: y.value }) : both.ok ? bad([]) : both
}

/** One coordinate: a grid line, an offset from one, or a length. */
function coordinate(cell: Text, axis: Axis, { id, mark, about }: PointWant, grid: Grid, scope: Scope): Result<Value> {
  const wanted = {
    id: `${id}.${axis}${mark}`,
    what: axis,
    sym: position[axis],
    tex: texAbout(`${axis}_{${mark}}`, ...about),
    place: true,
  }
  const line = lineOfCoordinate(cell, grid[axis])
  if (!line) return quantity(cell, wanted, scope)
  const rest = trimmed(part(cell, line.name.length))
  if (rest.text === '') return good(line.at)
  // The line's name may be a number, so the rest is read with a stand-in before it.
  const parsed = parseExpr(`_${rest.text}`, rest.span.start - 1)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  return quantityOf(named(parsed.value, line.at.id), cell.span, wanted, scope)
}

/** The grid line that a coordinate starts from, the longest name first. */
export const lineOfCoordinate = <T extends { readonly name: string }>(
  { text }: Text,
  lines: readonly T[],
): T | undefined =>
  [...lines].sort((a, b) => b.name.length - a.name.length).find(({ name }) => startsAtLine(text, name))

const startsAtLine = (text: string, name: string): boolean =>
  text.startsWith(name) && /^\s*([+-]|$)/.test(text.slice(name.length))

function named(expr: Expr, id: string): Expr {
  switch (expr.kind) {
    case 'name':
      return expr.name === '_' ? { ...expr, name: id } : expr
    case 'binary':
      return { ...expr, left: named(expr.left, id) }
    case 'number':
    case 'quantity':
    case 'negate':
    case 'call':
      return expr
  }
}

function notAPoint(cell: Text, grid: Grid) {
  const crossings = grid.x.flatMap(a => grid.y.map(b => a.name + b.name))
  const hint =
    crossings.length === 0
      ? 'There is no grid; write x, y.'
      : suggestion(cell.text, crossings, 'crossing').replace(
          /^There (is|are): .*/,
          `The grid has ${grid.x.map(({ name }) => name).join(' ')} across ${grid.y.map(({ name }) => name).join(' ')}.`,
        )
  return diagnose(
    'error',
    'not-a-point',
    cell.span,
    `${cell.text} is not a point of the plan`,
    `${hint} A point is a crossing (A1), an offset from one (A+6 ft / 2), or x, y (6 ft, 4 ft).`,
  )
}
