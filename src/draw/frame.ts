/** Where the plan lies on the sheet, and at what scale. */
import { type Bounds, boundsOfPoints, type Point } from './geometry.ts'
import type { PlanView } from './view.ts'

export const sheetWidth = 740
/** Clear margin about everything drawn. */
export const besideSheet = 8
const tallest = 520
/** Narrower sheets have no room for the scale bar and the legend. */
const narrowest = 400

/** Less than a millimetre is no length of a building. */
const least = 1e-3

export interface Margins {
  readonly left: number
  readonly right: number
}

export interface Frame {
  /** Width of the sheet; its height follows from what is drawn. */
  readonly width: number
  /** The rectangle about everything on the plan, on the sheet. */
  readonly plan: Bounds
  /** Sheet units to the metre. */
  readonly scale: number
  readonly toSheet: (p: Point) => Point
}

export interface Extents {
  readonly drawn: Bounds
  /** Areas, openings and walls alone. */
  readonly building: Bounds
}

/** What the drawing must hold, in metres: the building and its grid; its centres only when they are not far off. */
export function extentsOf(view: PlanView): Extents {
  const outlines = [...view.areas, ...view.openings].flatMap(({ outline }) => outline)
  const walls = view.walls.flatMap(({ from, to }) => [from, to])
  const marks = [view.centreOfMass, view.centreOfRigidity, view.force].flatMap(mark => (mark ? [mark.at] : []))
  const building = boundsOfPoints([...outlines, ...walls]) ?? boundsOfPoints(marks) ?? { x0: 0, y0: 0, x1: 0, y1: 0 }
  const xs = [building.x0, building.x1, ...view.gridX.map(({ at }) => at)]
  const ys = [building.y0, building.y1, ...view.gridY.map(({ at }) => at)]
  const held = { x0: Math.min(...xs), y0: Math.min(...ys), x1: Math.max(...xs), y1: Math.max(...ys) }
  const slack = 0.35 * Math.max(held.x1 - held.x0, held.y1 - held.y0)
  const close = marks.filter(p => isWithin(p, held, slack))
  const drawn = boundsOfPoints([...close, { x: held.x0, y: held.y0 }, { x: held.x1, y: held.y1 }]) ?? held
  return { drawn, building }
}

export function isWithin({ x, y }: Point, { x0, y0, x1, y1 }: Bounds, slack: number): boolean {
  return x >= x0 - slack && x <= x1 + slack && y >= y0 - slack && y <= y1 + slack
}

export function frameOf(extents: Bounds, { left, right }: Margins): Frame {
  const long = extents.x1 - extents.x0
  const high = extents.y1 - extents.y0
  const scale = scaleFor(long, high, sheetWidth - left - right)
  const width = Math.min(sheetWidth, Math.max(narrowest, left + right + long * scale))
  const x0 = left + (width - left - right - long * scale) / 2
  return {
    width,
    scale,
    plan: { x0, y0: 0, x1: x0 + long * scale, y1: high * scale },
    // The corner is taken away first, so that a plan far from its origin keeps its precision.
    toSheet: p => ({ x: x0 + (p.x - extents.x0) * scale, y: (extents.y1 - p.y) * scale }),
  }
}

/** A plan without length, or without depth, is scaled by the other; a point by nothing. */
function scaleFor(long: number, high: number, room: number): number {
  const across = long > least ? room / long : Number.POSITIVE_INFINITY
  const scale = Math.min(across, high > least ? tallest / high : Number.POSITIVE_INFINITY)
  return Number.isFinite(scale) ? scale : 40
}
