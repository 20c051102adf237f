/** Slab areas and openings. */
import { contains } from '../model/geometry.ts'
import type { Field } from './field.ts'
import {
  add,
  type Bounds,
  boundsOfPoints,
  cut,
  direction,
  normal,
  type Point,
  type Segment,
  sidesOf,
  times,
} from './geometry.ts'
import { priceOfCrossing } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'

/** An outline on the sheet, with what is said of it. */
export interface Patch {
  readonly name: string
  readonly load: string
  readonly outline: readonly Point[]
}

export function groundOf(areas: readonly Patch[], openings: readonly Patch[]): (p: Point) => 'paper' | 'wash' {
  return p => {
    if (openings.some(({ outline }) => contains(outline, p))) return 'paper'
    return areas.some(({ outline }) => contains(outline, p)) ? 'wash' : 'paper'
  }
}

/** A firm edge about the whole, thin seams where areas meet. */
export function drawEdges(areas: readonly Patch[], field: Field): readonly SceneNode[] {
  const sides = areas.flatMap(({ outline }) => sidesOf(outline))
  const pieces = sides.flatMap(side =>
    cut(
      side,
      sides.filter(other => other !== side),
    ),
  )
  const seams = pieces.filter(piece => isSeam(piece, areas))
  const edges = pieces.filter(piece => !isSeam(piece, areas))
  for (const seam of seams) field.addLine(seam, priceOfCrossing.seam)
  for (const edge of edges) field.addLine(edge, priceOfCrossing.edge)
  return [...lines('pm-seam', seams), ...lines('pm-edge', edges)]
}

/** One wash for all areas. */
export const washOf = (areas: readonly Patch[]): readonly SceneNode[] =>
  areas.map(({ outline }) => element('path', { class: 'pm-wash', d: closed(outline) }))

/** Slab on both sides of it. */
function isSeam({ a, b }: Segment, areas: readonly Patch[]): boolean {
  const middle = { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 }
  const aside = times(normal(direction(a, b)), 0.05)
  return [add(middle, aside), add(middle, times(aside, -1))].every(p =>
    areas.some(({ outline }) => contains(outline, p)),
  )
}

export function drawOpenings(openings: readonly Patch[], field: Field): readonly SceneNode[] {
  return openings.flatMap(({ outline }) => {
    const diagonals = diagonalsOf(outline)
    for (const line of [...sidesOf(outline), ...diagonals]) field.addLine(line, priceOfCrossing.opening)
    return [element('path', { class: 'pm-opening', d: closed(outline) }), ...lines('pm-crossed', diagonals)]
  })
}

/** From corner to corner of a four-sided opening; else of the rectangle about it, as far as they lie within. */
function diagonalsOf(outline: readonly Point[]): readonly Segment[] {
  const [p, q, r, s] = outline.length === 4 ? outline : cornersOf(boundsOfPoints(outline))
  if (p === undefined || q === undefined || r === undefined || s === undefined) return []
  const sides = sidesOf(outline)
  const pieces = [
    { a: p, b: r },
    { a: q, b: s },
  ].flatMap(line => cut(line, sides))
  return pieces.filter(({ a, b }) => contains(outline, { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 }))
}

function cornersOf(bounds: Bounds | undefined): readonly Point[] {
  if (bounds === undefined) return []
  const { x0, y0, x1, y1 } = bounds
  return [
    { x: x0, y: y0 },
    { x: x1, y: y0 },
    { x: x1, y: y1 },
    { x: x0, y: y1 },
  ]
}

/** A closed path. */
export function closed(outline: readonly Point[]): string {
  return outline.length === 0 ? '' : `${outline.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' ')} Z`
}

function lines(className: string, segments: readonly Segment[]): readonly SceneNode[] {
  if (segments.length === 0) return []
  return [
    element('path', { class: className, d: segments.map(({ a, b }) => words('M', a.x, a.y, 'L', b.x, b.y)).join(' ') }),
  ]
}
