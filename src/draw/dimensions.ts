/** The grid and dimensions of one edge, drawn. */
import type { AxisLayout, Bay } from './axis.ts'
import { bubbleName } from './axis.ts'
import type { Field } from './field.ts'
import { type Bounds, box, type Point } from './geometry.ts'
import { type Lettering, letteringBox, setLettering } from './label.ts'
import { priceOfCrossing } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'
import type { Stem, Stop } from './stems.ts'

/** An edge of the plan: `out` runs away from it, `along` follows it. */
export interface Edge {
  readonly at: (along: number, out: number) => Point
  /** Angle of text that follows the edge, and of text turned across it. */
  readonly follow: number
  readonly across: number
  /** Depth of the plan behind the edge. */
  readonly depth: number
  /** Which end of a dimension line has free ground beyond it: before the first stop, or past the last. */
  readonly freeEnd: 'before' | 'past'
  /** Whether text above a line, as it is read, lies farther out or nearer to the plan. */
  readonly textOut: 1 | -1
}

const quarterTurn = Math.PI / 2
const pastPlan = 14
const tick = 3.6

export function topEdge(plan: Bounds): Edge {
  const at = (along: number, out: number): Point => ({ x: along, y: plan.y0 - out })
  return { at, follow: 0, across: -quarterTurn, depth: plan.y1 - plan.y0, freeEnd: 'before', textOut: 1 }
}

export function leftEdge(plan: Bounds): Edge {
  const at = (along: number, out: number): Point => ({ x: plan.x0 - out, y: along })
  return { at, follow: -quarterTurn, across: 0, depth: plan.x1 - plan.x0, freeEnd: 'past', textOut: 1 }
}

export function bottomEdge(plan: Bounds): Edge {
  return { ...topEdge(plan), at: (along, out) => ({ x: along, y: plan.y1 + out }), textOut: -1 }
}

export function rightEdge(plan: Bounds): Edge {
  return { ...leftEdge(plan), at: (along, out) => ({ x: plan.x1 + out, y: along }), textOut: -1 }
}

/** Draws the edge and takes its place in the field. */
export function drawAxis(axis: AxisLayout, edge: Edge, field: Field): readonly SceneNode[] {
  return [
    ...axis.unnamed.map(stop =>
      gridLine([edge.at(stop.at, -edge.depth - pastPlan), edge.at(stop.at, pastPlan)], field),
    ),
    ...axis.stems.map(stem => drawStem(stem, axis, edge, field)),
    ...drawChain(axis, edge, field),
    ...drawOverall(axis, edge, field),
    ...axis.stems.flatMap(stem => drawBubble(stem, axis, edge, field)),
  ]
}

function gridLine(points: readonly Point[], field: Field): SceneNode {
  points.slice(1).forEach((b, idx) => {
    field.addLine({ a: points[idx] ?? b, b }, priceOfCrossing.gridLine)
  })
  return polyline('pm-gridline', points)
}

function polyline(className: string, points: readonly Point[]): SceneNode {
  return element('path', {
    class: className,
    d: points.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' '),
  })
}

function bubbleOut(stem: Stem, { bubble, out }: AxisLayout): number {
  return out.bubbles + stem.row * out.rowStep + bubble.out / 2
}

function drawStem(stem: Stem, axis: AxisLayout, edge: Edge, field: Field): SceneNode {
  const { stop, place } = stem
  const foot = edge.at(stop.at, -edge.depth - pastPlan)
  const end = edge.at(place, bubbleOut(stem, axis) - axis.bubble.out / 2)
  if (Math.abs(place - stop.at) < 1e-6) return gridLine([foot, end], field)
  return gridLine([foot, edge.at(stop.at, axis.out.jogFrom), edge.at(place, axis.out.jogTo), end], field)
}

function drawBubble(stem: Stem, axis: AxisLayout, edge: Edge, field: Field): readonly SceneNode[] {
  const at = edge.at(stem.place, bubbleOut(stem, axis))
  const upright = edge.follow === 0 ? axis.bubble : { along: axis.bubble.out, out: axis.bubble.along }
  const { along: width, out: height } = upright
  field.addText(box(at, width, height))
  const shape = element('rect', {
    class: 'pm-bubble',
    x: at.x - width / 2,
    y: at.y - height / 2,
    width,
    height,
    rx: height / 2,
  })
  return [shape, ...setLettering(bubbleName(stem.stop.name), at, 0, 'clear')]
}

function drawChain(axis: AxisLayout, edge: Edge, field: Field): readonly SceneNode[] {
  const { bays, out } = axis
  const first = bays[0]
  const last = bays.at(-1)
  if (first === undefined || last === undefined) return []
  const stops = [first.from, ...bays.map(({ to }) => to)]
  const witness = axis.endsOnly
    ? stops.map(({ at }) => polyline('pm-dimension', [edge.at(at, 5), edge.at(at, out.chain + 5)]))
    : []
  const texts = axis.endsOnly
    ? wholeText(first.text, axis, edge, out.chain, field)
    : bays.flatMap(bay => bayText(bay, axis, edge, field))
  return [...witness, ...dimensionLine(stops, out.chain, edge, field), ...texts]
}

function dimensionLine(stops: readonly Stop[], out: number, edge: Edge, field: Field): readonly SceneNode[] {
  const ends = [edge.at((stops[0]?.at ?? 0) - 4, out), edge.at((stops.at(-1)?.at ?? 0) + 4, out)] as const
  field.addLine({ a: ends[0], b: ends[1] }, Number.POSITIVE_INFINITY)
  const ticks = stops.map(({ at }) => {
    const { x, y } = edge.at(at, out)
    return words('M', x - tick, y + tick, 'L', x + tick, y - tick)
  })
  return [polyline('pm-dimension', ends), element('path', { class: 'pm-tick', d: ticks.join(' ') })]
}

function bayText(bay: Bay, axis: AxisLayout, edge: Edge, field: Field): readonly SceneNode[] {
  if (bay.set === 'none') return []
  if (bay.set === 'along') {
    const along = (bay.from.at + bay.to.at) / 2
    return set(bay.text, edge.at(along, axis.out.chain + bay.text.height / 2), edge.follow, field)
  }
  const places = axis.stems.flatMap(({ stop, place }) => (stop === bay.from || stop === bay.to ? [place] : []))
  const along = places.reduce((sum, place) => sum + place, 0) / Math.max(1, places.length)
  return set(bay.text, edge.at(along, axis.out.turned + bay.text.width / 2), edge.across, field)
}

function drawOverall(axis: AxisLayout, edge: Edge, field: Field): readonly SceneNode[] {
  const { bays, overall, out } = axis
  const first = bays[0]
  const last = bays.at(-1)
  if (overall === undefined || first === undefined || last === undefined) return []
  return [
    ...dimensionLine([first.from, last.to], out.overall, edge, field),
    ...wholeText(overall, axis, edge, out.overall, field),
  ]
}

/** Text of a line that grid lines cross: in the bay nearest to its middle that holds it, else beyond its free end. */
function wholeText(text: Lettering, axis: AxisLayout, edge: Edge, out: number, field: Field): readonly SceneNode[] {
  const low = axis.bays[0]?.from.at ?? 0
  const high = axis.bays.at(-1)?.to.at ?? 0
  const half = text.width / 2
  const crossings = [...axis.stems.map(({ stop }) => stop.at), ...axis.unnamed.map(({ at }) => at)].filter(
    at => at > low && at < high,
  )
  const along = nearestClear([low, ...crossings, high], (low + high) / 2, half + 2)
  const above = out + text.height / 2
  if (along !== undefined) return set(text, edge.at(along, above), edge.follow, field)
  return set(text, edge.at(edge.freeEnd === 'before' ? low - half - 6 : high + half + 6, out), edge.follow, field)
}

/** The place nearest to `wanted` that keeps `half` away from every mark on either side of it. */
function nearestClear(marks: readonly number[], wanted: number, half: number): number | undefined {
  const places = marks.slice(1).flatMap((high, idx) => {
    const low = marks[idx] ?? high
    return high - low < 2 * half ? [] : [Math.max(low + half, Math.min(high - half, wanted))]
  })
  return places.reduce<number | undefined>(
    (best, at) => (best === undefined || Math.abs(at - wanted) < Math.abs(best - wanted) ? at : best),
    undefined,
  )
}

function set(text: Lettering, at: Point, angle: number, field: Field): readonly SceneNode[] {
  field.addText(letteringBox(text, at, angle))
  return setLettering(text, at, angle, 'clear')
}
