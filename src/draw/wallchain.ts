/**
 * Dimensions that find the ends of walls which stand off the grid: on each edge of the plan a
 * chain from grid line to wall end to grid line, for the ends that lie nearest to that edge.
 */
import type { Edge } from './dimensions.ts'
import type { Field } from './field.ts'
import { add, type Bounds, type Point, times } from './geometry.ts'
import { type Lettering, lettering, letteringBox, setLettering } from './label.ts'
import { priceOfCrossing } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'
import { spread } from './spread.ts'
import type { PlanPoint, PlanView } from './view.ts'

export type EdgeName = 'top' | 'bottom' | 'left' | 'right'

/** A place along the edge: a grid line, an end of the building, or an end of a wall and where that is. */
interface ChainStop {
  readonly metres: number
  readonly at: number
  readonly end?: Point
}

interface ChainBay {
  readonly from: ChainStop
  readonly to: ChainStop
  readonly text: Lettering
  readonly turned: boolean
  /** Where along the edge its figure stands; away from its bay it is led there. */
  readonly place: number
}

export interface WallChain {
  readonly bays: readonly ChainBay[]
  /** Turned figures stand in a band of their own, beyond those along the chain. */
  readonly led: boolean
  /** How far out of the room beside the plan it reaches. */
  readonly depth: number
}

/** `crowded` where some bay has no room for its figure. */
export type WallChains = Readonly<Partial<Record<EdgeName, WallChain>>> & { readonly crowded: boolean }

/** Nearer than this, in metres, two places are one. */
const samePlace = 2e-3
/** What a figure that is turned takes along its edge. */
const turnedRow = 16
const rowOfText = 18
/** From the chain to the band of figures that are led there. */
const bandOfLed = rowOfText + 9
/** More figures led on one edge cost the walls themselves their room. */
const mostLed = 5
/** More walls than this are not found by dimensions. */
const manyWalls = 60

interface Along {
  readonly of: (p: PlanPoint) => number
  readonly across: (p: PlanPoint) => number
  readonly toSheet: (metres: number) => number
  readonly fixed: readonly number[]
  /** The edges at the low and at the high end of the other axis. */
  readonly edges: readonly [EdgeName, EdgeName]
  readonly middle: number
}

export function wallChains(view: PlanView, building: Bounds, toSheet: (p: PlanPoint) => Point): WallChains {
  if (view.walls.length === 0) return { crowded: false }
  if (view.walls.length > manyWalls) return { crowded: true }
  const axes: readonly Along[] = [
    {
      of: p => p.x,
      across: p => p.y,
      toSheet: x => toSheet({ x, y: 0 }).x,
      fixed: fixedStops(view.gridX, building.x0, building.x1),
      edges: ['bottom', 'top'],
      middle: (building.y0 + building.y1) / 2,
    },
    {
      of: p => p.y,
      across: p => p.x,
      toSheet: y => toSheet({ x: 0, y }).y,
      fixed: fixedStops(view.gridY, building.y0, building.y1),
      edges: ['left', 'right'],
      middle: (building.x0 + building.x1) / 2,
    },
  ]
  const made = axes.flatMap(axis => axis.edges.map(edge => [edge, chainOf(view, edge, axis, toSheet)] as const))
  return {
    ...Object.fromEntries(made.flatMap(([edge, chain]) => (chain && chain !== 'crowded' ? [[edge, chain]] : []))),
    crowded: made.some(([, chain]) => chain === 'crowded'),
  }
}

/** Grid lines, or for want of two of them the ends of the building. */
function fixedStops(lines: PlanView['gridX'], low: number, high: number): readonly number[] {
  const places = lines.map(({ at }) => at)
  const spread = Math.max(...places) - Math.min(...places)
  return lines.length > 1 && spread > samePlace ? places : [low, high]
}

function chainOf(
  view: PlanView,
  edge: EdgeName,
  axis: Along,
  toSheet: (p: PlanPoint) => Point,
): WallChain | 'crowded' | undefined {
  const ends = view.walls.flatMap(wall => endsFor(wall, edge, axis))
  const loose = ends.filter(p => axis.fixed.every(at => Math.abs(at - axis.of(p)) > samePlace))
  if (loose.length === 0) return undefined
  const stops = [
    ...axis.fixed.map((metres): ChainStop => ({ metres, at: axis.toSheet(metres) })),
    ...loose.map((p): ChainStop => ({ metres: axis.of(p), at: axis.toSheet(axis.of(p)), end: toSheet(p) })),
  ].sort((a, b) => a.at - b.at)
  const merged = stops.filter((stop, idx) => {
    const before = stops[idx - 1]
    return before === undefined || Math.abs(stop.metres - before.metres) > samePlace
  })
  const bays = merged.slice(1).flatMap((to, idx): readonly ChainBay[] => {
    const from = merged[idx]
    if (from === undefined || (from.end === undefined && to.end === undefined)) return []
    const text = lettering('dimension', 120, view.dimension(Math.abs(to.metres - from.metres)))
    return [{ from, to, text, turned: text.width + 2 > to.at - from.at, place: (from.at + to.at) / 2 }]
  })
  const [low, high] = [merged[0]?.at ?? 0, merged.at(-1)?.at ?? 0]
  const widest = Math.max(0, ...bays.map(({ turned, text }) => (turned ? text.width + 5 : 0)))
  if (bays.every(({ from, to, turned }) => !turned || to.at - from.at >= turnedRow))
    return { bays, led: false, depth: Math.max(rowOfText, widest) + 3 }
  const turned = bays.filter(bay => bay.turned)
  // Above and to the left grid lines run on past the chain, and no figure stands on one.
  const stemmed = edge === 'top' || edge === 'left'
  const pastEnds = stemmed ? -turnedRow / 2 : turnedRow
  if (turned.length > mostLed || turned.length * turnedRow > high - low + 2 * pastEnds) return 'crowded'
  const places = spread(
    turned.map(({ place }) => place),
    turned.slice(1).map(() => turnedRow),
    low - pastEnds,
    high + pastEnds,
  )
  const onLine = (place: number) => axis.fixed.some(at => Math.abs(axis.toSheet(at) - place) < turnedRow / 2 - 0.01)
  if (stemmed && places.some(onLine)) return 'crowded'
  const placed = new Map(turned.map((bay, idx) => [bay, places[idx] ?? bay.place]))
  return {
    bays: bays.map(bay => ({ ...bay, place: placed.get(bay) ?? bay.place })),
    led: true,
    depth: bandOfLed + widest + 3,
  }
}

/** The ends of a wall that are dimensioned on an edge; one that runs straight out to it has a single place there. */
function endsFor(
  { from, to }: PlanView['walls'][number],
  edge: EdgeName,
  { of, across, edges, middle }: Along,
): readonly PlanPoint[] {
  const nearest = Math.abs(across(from) - middle) >= Math.abs(across(to) - middle) ? from : to
  const ends = Math.abs(of(from) - of(to)) <= samePlace ? [nearest] : [from, to]
  return ends.filter(p => edges[across(p) < middle ? 0 : 1] === edge)
}

const tick = 3.6

/** @param out how far from the plan the line of the chain runs */
export function drawWallChain({ bays, led }: WallChain, edge: Edge, out: number, field: Field): readonly SceneNode[] {
  const stops = [...new Set(bays.flatMap(({ from, to }) => [from, to]))]
  const witness = stops.flatMap(stop => (stop.end ? [witnessLine(stop.end, edge.at(stop.at, out), field)] : []))
  const lines = bays.map(({ from, to }) => {
    const [a, b] = [edge.at(from.at, out), edge.at(to.at, out)]
    field.addLine({ a, b }, Number.POSITIVE_INFINITY)
    return words('M', a.x, a.y, 'L', b.x, b.y)
  })
  const ticks = stops.map(({ at }) => {
    const { x, y } = edge.at(at, out)
    return words('M', x - tick, y + tick, 'L', x + tick, y - tick)
  })
  return [
    ...witness,
    element('path', { class: 'pm-dimension', d: lines.join(' ') }),
    element('path', { class: 'pm-tick', d: ticks.join(' ') }),
    ...bays.flatMap(bay => bayText(bay, led, edge, out, field)),
  ]
}

/** From a little off the wall's end to a little past the chain. */
function witnessLine(end: Point, foot: Point, field: Field): SceneNode {
  const away = { x: Math.sign(Math.round(foot.x - end.x)), y: Math.sign(Math.round(foot.y - end.y)) }
  const a = add(end, times(away, 7))
  const b = add(foot, times(away, 4))
  field.addLine({ a, b }, priceOfCrossing.witness)
  return element('path', { class: 'pm-witness', d: words('M', a.x, a.y, 'L', b.x, b.y) })
}

/** Above its line as it is read; a figure wider than its bay stands across, beyond the chain. */
function bayText(bay: ChainBay, led: boolean, edge: Edge, out: number, field: Field): readonly SceneNode[] {
  const { text, turned, place } = bay
  const past = led ? bandOfLed : 4
  const at = edge.at(place, turned ? out + past + text.width / 2 : out + (edge.textOut * text.height) / 2)
  const angle = turned ? edge.across : edge.follow
  field.addText(letteringBox(text, at, angle))
  return [...(turned && led ? leaderTo(bay, edge, out, field) : []), ...setLettering(text, at, angle, 'clear')]
}

/** From the middle of its bay past the figures along the chain, then aside to the figure. */
function leaderTo({ from, to, place }: ChainBay, edge: Edge, out: number, field: Field): readonly SceneNode[] {
  const middle = (from.at + to.at) / 2
  const [a, b, c] = [edge.at(middle, out + 1), edge.at(middle, out + rowOfText), edge.at(place, out + bandOfLed)]
  field.addLine({ a, b }, priceOfCrossing.leader)
  field.addLine({ a: b, b: c }, priceOfCrossing.leader)
  return [element('path', { class: 'pm-leader', d: words('M', a.x, a.y, 'L', b.x, b.y, 'L', c.x, c.y) })]
}
