/** Names and shears of walls: where each would like to be. */
import { scaledArrow, shortestArrow } from './arrows.ts'
import { add, between, box, direction, distance, normal, type Point, times, toward } from './geometry.ts'
import { type Lettering, lettering, letteringBox, readableAngle, setLettering } from './label.ts'
import { labelSpot, type Placing, type Sheet, type Spot } from './placement.ts'
import type { WallLine, WallLook } from './walls.ts'

/** A name may be as long as its wall within these limits. */
const shortestName = 110
const longestName = 220

/** A place along a wall, from 0 at its start to 1 at its end, and how much less welcome it is than the middle. */
interface Station {
  readonly t: number
  readonly price: number
}

const stations: readonly Station[] = [0.5, 0.4, 0.6, 0.28, 0.72, 0.16, 0.84, 0.05, 0.95].map(t => ({
  t,
  price: Math.abs(t - 0.5) * 8,
}))

/** A shear may also stand just past either end, at a price: what lies far from its wall is taken for another's. */
function stationsOfShear({ from, to }: WallLine, arrow: number): readonly Station[] {
  const beyond = arrow * 0.3 + 4
  const t = beyond / Math.max(1, distance(from, to))
  return [...stations, ...[-t, 1 + t].map(each => ({ t: each, price: 12 + beyond * 0.3 }))]
}

/** The side with less slab: a wall on the edge has its name outside and its shear inside. */
function outerSide({ from, to, half }: WallLine, sheet: Sheet): 1 | -1 {
  const across = normal(toward(readableAngle(Math.atan2(to.y - from.y, to.x - from.x))))
  const slabOn = (sign: number): number =>
    [0.25, 0.5, 0.75].filter(
      t => sheet.groundAt(add(between(from, to, t), times(across, sign * (half + 4)))) === 'wash',
    ).length
  return slabOn(1) < slabOn(-1) ? 1 : -1
}

interface Beside {
  readonly at: Point
  readonly price: number
  readonly aside: Point
}

/** Places at a distance from the wall's axis, on either side, with a price for those less welcome. */
function besideWall(line: WallLine, away: number, first: 1 | -1, places: readonly Station[]): readonly Beside[] {
  const across = normal(toward(readableAngle(Math.atan2(line.to.y - line.from.y, line.to.x - line.from.x))))
  return [first, -first].flatMap((side, rank) =>
    places.map(({ t, price }) => {
      const aside = times(across, side)
      return {
        at: add(between(line.from, line.to, t), times(aside, away)),
        aside,
        price: rank * 5 + price,
      }
    }),
  )
}

const byPrice = (a: { readonly price: number }, b: { readonly price: number }): number => a.price - b.price

export function namePlacing(line: WallLine, sheet: Sheet): Placing {
  const room = Math.max(shortestName, Math.min(longestName, distance(line.from, line.to) * 0.8))
  const letters = lettering('wall', room, line.wall.name)
  const angle = readableAngle(Math.atan2(line.to.y - line.from.y, line.to.x - line.from.x))
  const away = line.half + 0.5 + letters.height / 2
  const beside = besideWall(line, away, outerSide(line, sheet), stations).map(({ at, price }) =>
    labelSpot(letters, at, angle, price),
  )
  const u = direction(line.from, line.to)
  const past = letters.width / 2 + line.half + 1
  const ends = [add(line.to, times(u, past)), add(line.from, times(u, -past))].map(at =>
    labelSpot(letters, at, angle, 9),
  )
  return {
    near: [...beside, ...ends].sort(byPrice),
    anchors: anchorsOf(line),
    free: at => labelSpot(letters, at, 0, 0),
  }
}

/** Where leaders may meet the wall. */
const anchorsOf = ({ from, to }: WallLine): readonly Point[] =>
  (distance(from, to) < 24 ? [0.5] : [0.5, 0.25, 0.75]).map(t => between(from, to, t))

/** A shear to be drawn: its figure and its arrow, in the direction in which it acts on the wall line. */
interface Shear {
  readonly letters: Lettering
  readonly angle: number
  /** 0 for no arrow. */
  readonly length: number
}

export function shearPlacing(line: WallLine, look: WallLook, sheet: Sheet): Placing | undefined {
  const { shear, governs } = line.wall
  if (shear === undefined) return undefined
  const letters = lettering(governs ? 'governing' : 'figure', longestName, shear.printed)
  const angle = Math.atan2(line.to.y - line.from.y, line.to.x - line.from.x) + (shear.value < 0 ? Math.PI : 0)
  const drawn: Shear = { letters, angle, length: arrowLength(shear.value, look) }
  const inner = outerSide(line, sheet) === 1 ? -1 : 1
  const near = [...stacked(line, drawn, inner), ...inLine(line, drawn, inner)].sort(byPrice)
  return { near, anchors: anchorsOf(line), free: at => freeShear(drawn, at), shows: 'shear' }
}

/** In proportion to the greatest; a shear too small to print has no arrow. */
export function arrowLength(value: number, { greatest, longestArrow }: WallLook): number {
  if (Math.abs(value) <= 1e-9 * greatest) return 0
  return (Math.abs(value) / greatest) * longestArrow
}

const arrowRoom = 9

/** The arrow next to the wall, the figure beyond it. */
function stacked(line: WallLine, { letters, angle, length }: Shear, first: 1 | -1): readonly Spot[] {
  const turned = readableAngle(angle)
  const half = letters.height / 2
  const away = line.half + 1 + (length > 0 ? arrowRoom / 2 : half)
  return besideWall(line, away, first, stationsOfShear(line, length)).map(({ at, aside, price }) => {
    const figureAt = length > 0 ? add(at, times(aside, arrowRoom / 2 + half - 2)) : at
    return shearSpot(letters, figureAt, turned, length > 0 ? { at, angle, length } : undefined, price)
  })
}

/** The figure behind the arrow's tail or before its tip, both next to the wall. */
function inLine(line: WallLine, { letters, angle, length }: Shear, first: 1 | -1): readonly Spot[] {
  if (length === 0) return []
  const width = letters.width
  const u = toward(angle)
  const places = besideWall(line, line.half + 0.5 + letters.height / 2, first, stations)
  const long = Math.max(length, shortestArrow)
  return places.flatMap(({ at, price }) =>
    [1, -1].map(order => {
      const arrow = { at: add(at, times(u, (order * width) / 2)), angle, length }
      const figureAt = add(at, times(u, (-order * long) / 2))
      return shearSpot(letters, figureAt, readableAngle(angle), arrow, price + 3.5 - order / 2)
    }),
  )
}

function freeShear({ letters, angle, length }: Shear, at: Point): Spot {
  if (length === 0) return labelSpot(letters, at, 0, 0)
  const rise = Math.abs(Math.sin(angle)) * (length / 2) + arrowRoom / 2 + letters.height / 2
  return shearSpot(letters, { x: at.x, y: at.y + rise }, 0, { at, angle, length }, 0)
}

function shearSpot(
  letters: Lettering,
  at: Point,
  turned: number,
  arrow: { readonly at: Point; readonly angle: number; readonly length: number } | undefined,
  price: number,
): Spot {
  return {
    price,
    texts: [letteringBox(letters, at, turned)],
    ink: arrow === undefined ? [] : [box(arrow.at, Math.max(arrow.length, shortestArrow), arrowRoom - 2, arrow.angle)],
    draw: ground => [
      ...(arrow === undefined ? [] : [scaledArrow(arrow.at, arrow.angle, arrow.length)]),
      ...setLettering(letters, at, turned, ground),
    ],
  }
}
