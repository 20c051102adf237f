/** Names of areas and openings: where each would like to be. */
import { contains } from '../model/geometry.ts'
import { boundsOfPoints, corners, distance, type Point, sidesOf } from './geometry.ts'
import { type Lettering, lettering, letteringBox } from './label.ts'
import { labelSpot, type Placing, type Spot } from './placement.ts'
import type { Patch } from './slab.ts'
import { textStyles } from './style.ts'
import { wrap } from './textwidth.ts'

const widestName = 150
/** Widths in which the name of an area is tried. */
const widths = [widestName, 104, 66] as const
const mostLines = 4
const samples = 9

/** Name and load of an area, level or turned, wherever in the area they find clear ground nearest to its middle. */
export function areaPlacing(area: Patch, openings: readonly Patch[]): Placing {
  const middle = centroid(area.outline)
  const settings = widths.map(width => lettering('area', width, ...nameLines(area.name, width), area.load))
  const ways = settings.flatMap((letters, idx) =>
    [0, -Math.PI / 2].map((angle): Way => ({ letters, angle, price: 2 * idx, turning: angle === 0 ? 0 : 3 })),
  )
  const inside = samplesOf(area.outline)
  const near = { [Symbol.iterator]: () => spotsNear(middle, inside, ways, area, openings) }
  const free = (at: Point): Spot => labelSpot(settings[1] ?? lettering('area', widestName, area.name), at, 0, 0)
  return { near, anchors: anchorsIn(inside, area.outline, middle), free }
}

/** One way of setting the name: in lines of some width, level or turned. */
interface Way {
  readonly letters: Lettering
  readonly angle: number
  readonly price: number
  readonly turning: number
}

/**
 * Spots in order of their price, each made only when it is asked for: a large area has two thousand,
 * of which one of the first few will nearly always do.
 */
function* spotsNear(
  middle: Point,
  inside: readonly Point[],
  ways: readonly Way[],
  area: Patch,
  openings: readonly Patch[],
): Generator<Spot> {
  const points = inside
    .map(at => ({ at, off: Math.hypot(at.x - middle.x, at.y - middle.y) * 0.05 }))
    .sort((a, b) => a.off - b.off)
  const heads = ways.map(way => ({ way, next: 0 }))
  const priceOf = ({ way, next }: (typeof heads)[number]): number =>
    way.price + (points[next]?.off ?? Number.POSITIVE_INFINITY) + way.turning
  for (;;) {
    const best = heads.reduce((a, b) => (priceOf(b) < priceOf(a) ? b : a))
    const price = priceOf(best)
    const at = points[best.next++]?.at
    if (at === undefined) return
    const { letters, angle } = best.way
    if (liesInside(letters, at, angle, area, openings)) yield labelSpot(letters, at, angle, price)
  }
}

/** A long name is set in lines; what the last of them cannot hold is cut. */
function nameLines(name: string, width: number): readonly string[] {
  const lines = wrap(name, textStyles.area, width)
  return lines.length <= mostLines ? lines : [...lines.slice(0, mostLines - 1), lines.slice(mostLines - 1).join(' ')]
}

const anchorSpacing = 12

/** A few points of the area that a leader may reach, its middle first. */
function anchorsIn(inside: readonly Point[], outline: readonly Point[], middle: Point): readonly Point[] {
  const spaced = inside.filter((_, idx) => idx % Math.ceil(inside.length / 6) === 0)
  const points = contains(outline, middle) || inside.length === 0 ? [middle, ...spaced] : spaced
  return points.filter((p, idx) => points.findIndex(q => distance(p, q) < anchorSpacing) === idx)
}

function liesInside(letters: Lettering, at: Point, angle: number, area: Patch, openings: readonly Patch[]): boolean {
  if (openings.some(({ outline }) => contains(outline, at))) return false
  return corners(letteringBox(letters, at, angle)).every(corner => contains(area.outline, corner))
}

/** Points spread over the inside of an outline. */
function samplesOf(outline: readonly Point[]): readonly Point[] {
  const bounds = boundsOfPoints(outline)
  if (bounds === undefined) return []
  const { x0, y0, x1, y1 } = bounds
  const steps = Array.from({ length: samples * 2 - 1 }, (_, idx) => (idx + 1) / (samples * 2))
  const points = steps.flatMap(u => steps.map(v => ({ x: x0 + (x1 - x0) * u, y: y0 + (y1 - y0) * v })))
  return points.filter(p => contains(outline, p))
}

/** Name of an opening: in it clear of its cross if it fits, else beside it. */
export function openingPlacing(opening: Patch): Placing {
  const letters = lettering('area', widestName, opening.name)
  const bounds = boundsOfPoints(opening.outline) ?? { x0: 0, y0: 0, x1: 0, y1: 0 }
  const at = { x: (bounds.x0 + bounds.x1) / 2, y: (bounds.y0 + bounds.y1) / 2 }
  const w = letters.width / 2
  const h = letters.height / 2
  const { x0, y0, x1, y1 } = bounds
  const within = [
    { x: at.x, y: y0 + h + 1 },
    { x: at.x, y: y1 - h - 1 },
    { x: at.x, y: y0 + (y1 - y0) / 5 },
  ].filter(() => x1 - x0 > 2 * w && y1 - y0 > 2 * h)
  const beside = [
    { x: at.x, y: y1 + h + 1 },
    { x: at.x, y: y0 - h - 1 },
    { x: x1 + w + 1, y: at.y },
    { x: x0 - w - 1, y: at.y },
    ...[-0.5, 0.5, -1, 1].flatMap(k => [
      { x: at.x + k * w, y: y1 + h + 1 },
      { x: at.x + k * w, y: y0 - h - 1 },
    ]),
  ]
  const near = [
    ...within.map(p => labelSpot(letters, p, 0, 0)),
    ...beside.map((p, idx) => labelSpot(letters, p, 0, 1 + idx * 0.5)),
  ]
  return { near, anchors: [at], free: p => labelSpot(letters, p, 0, 0) }
}

/** Middle of an outline's area; of its corners when it encloses none. */
function centroid(outline: readonly Point[]): Point {
  const origin = outline[0] ?? { x: 0, y: 0 }
  let area = 0
  let sx = 0
  let sy = 0
  for (const { a, b } of sidesOf(outline)) {
    const [ax, ay, bx, by] = [a.x - origin.x, a.y - origin.y, b.x - origin.x, b.y - origin.y]
    const turn = ax * by - bx * ay
    area += turn
    sx += (ax + bx) * turn
    sy += (ay + by) * turn
  }
  if (Math.abs(area) < 1e-6) return origin
  return { x: origin.x + sx / (3 * area), y: origin.y + sy / (3 * area) }
}
