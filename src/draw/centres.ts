/** The centres of mass and of rigidity, the legs of the eccentricity between them, and the storey force. */
import { broadArrow, broadArrowWidth } from './arrows.ts'
import type { Field } from './field.ts'
import { add, box, distance, type Point, strokeBox, times, toward } from './geometry.ts'
import { type Lettering, lettering } from './label.ts'
import { labelSpot, type Placing, priceOfCrossing, type Spot } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'
import { circleRadius, lozenge, lozengeReach, openLozenge, quarteredCircle } from './symbols.ts'

/** A labelled point on the sheet. */
export interface Mark {
  readonly at: Point
  readonly text: string
  /** A second line. */
  readonly more?: string
}

export interface Force {
  readonly at: Point
  /** Direction on the sheet. */
  readonly angle: number
  readonly text: string
}

export interface CentresDrawn {
  readonly nodes: readonly SceneNode[]
  readonly labels: readonly Placing[]
  /** Whether the two lie apart enough for legs between them. */
  readonly legs: boolean
}

const widestLabel = 230
/** Nearer than this the two marks touch, and are drawn one in the other. */
const touching = circleRadius + lozengeReach + 3
const longestForce = 62
const shortestForce = 30

/** What may be drawn of the three; each is absent when the plan has none, or it lies beyond the sheet. */
export interface Centres {
  readonly mass?: Mark
  readonly rigidity?: Mark
  readonly force?: Force
}

export function drawCentres(centres: Centres, field: Field): CentresDrawn {
  const { mass, rigidity, force } = centres
  const gap = mass && rigidity ? distance(mass.at, rigidity.at) : Number.POSITIVE_INFINITY
  const legs = mass && rigidity && gap > touching ? legsBetween(mass.at, rigidity.at, force) : []
  const marked = drawMarked(centres, field)
  legs.slice(1).forEach((b, idx) => {
    field.addLine({ a: legs[idx] ?? b, b }, priceOfCrossing.legs)
  })
  return { nodes: [...drawLegs(legs), ...marked.nodes], labels: marked.labels, legs: legs.length > 0 }
}

/** The marks of the centres and the arrow of the force, without the legs between them. */
export function drawMarked({ mass, rigidity, force }: Centres, field: Field): Omit<CentresDrawn, 'legs'> {
  const gap = mass && rigidity ? distance(mass.at, rigidity.at) : Number.POSITIVE_INFINITY
  for (const mark of [mass, rigidity]) if (mark) field.addInk(markBox(mark.at, gap))
  const arrow = force === undefined ? [] : drawForce(force, mass?.at, rigidity?.at, field)
  const labels = [mass, rigidity].flatMap(mark => (mark ? [markPlacing(mark, gap)] : []))
  return {
    nodes: [...arrow, ...drawMarks(mass?.at, rigidity?.at, gap)],
    labels: force === undefined ? labels : [...labels, forcePlacing(force, mass?.at, rigidity?.at)],
  }
}

/** Two legs along the axes; the one that arrives at the centre of mass keeps clear of the force there. */
function legsBetween(mass: Point, rigidity: Point, force: Force | undefined): readonly Point[] {
  const upright = force !== undefined && Math.abs(Math.sin(force.angle)) > Math.abs(Math.cos(force.angle))
  return [rigidity, upright ? { x: rigidity.x, y: mass.y } : { x: mass.x, y: rigidity.y }, mass]
}

function drawLegs(legs: readonly Point[]): readonly SceneNode[] {
  if (legs.length === 0) return []
  const d = legs.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' ')
  return [element('path', { class: 'pm-legs', d })]
}

function drawMarks(mass: Point | undefined, rigidity: Point | undefined, gap: number): readonly SceneNode[] {
  const circle = mass ? quarteredCircle(mass, gap <= touching ? circleRadius - 1 : circleRadius) : []
  if (!rigidity) return circle
  return gap <= touching
    ? [...circle, ...openLozenge(rigidity, reachAt(gap))]
    : [...circle, ...lozenge(rigidity, lozengeReach)]
}

/** A lozenge about a circle it nearly shares a centre with is large enough to hold it; farther off they overlap as outlines. */
function reachAt(gap: number): number {
  return gap <= 6 ? (gap + circleRadius + 1.5) * Math.SQRT2 : lozengeReach - 1
}

function markBox(at: Point, gap: number): ReturnType<typeof box> {
  const reach = gap <= touching ? Math.max(reachAt(gap), circleRadius + 1) : lozengeReach
  return box(at, 2 * reach, 2 * reach)
}

function markPlacing({ at, text, more = '' }: Mark, gap: number): Placing {
  return pointPlacing(lettering('centre', widestLabel, text, more), at, markBox(at, gap).halfWidth)
}

/** A label about a point, clear of what lies within `reach` of it. */
export function pointPlacing(letters: Lettering, at: Point, reach: number): Placing {
  const around = aroundPoint(at, reach + 2, letters.width / 2, letters.height / 2)
  return {
    near: around.map((p, idx) => labelSpot(towards(letters, p, at), p, 0, idx * 0.8)),
    anchors: [at],
    free: p => labelSpot(towards(letters, p, at), p, 0, 0),
    reach,
  }
}

/** The same lettering, kept to the end that faces the point it names. */
function towards(letters: Lettering, at: Point, named: Point): Lettering {
  const aside = at.x - named.x
  return Math.abs(aside) < letters.width / 2 ? letters : { ...letters, keeps: aside > 0 ? 'start' : 'end' }
}

/** Middles of a box of half sizes w, h set about a point, clear of `reach`: the sides first, then above and below, then nearby. */
function aroundPoint({ x, y }: Point, reach: number, w: number, h: number): readonly Point[] {
  const close = [
    [reach + w, 0],
    [reach + w * 0.96, -h * 0.9],
    [reach + w * 0.96, h * 0.9],
    [-reach - w, 0],
    [-reach - w * 0.96, h * 0.9],
    [-reach - w * 0.96, -h * 0.9],
    [0, -reach - h],
    [0, reach + h],
    [w * 0.8, -reach - h],
    [w * 0.8, reach + h],
    [-w * 0.8, -reach - h],
    [-w * 0.8, reach + h],
  ] as const
  return close.map(([dx, dy]) => ({ x: x + dx, y: y + dy }))
}

/** The arrow ends at its point, or at the rim of the circle there, and stops short of a lozenge that it would cover. */
function forceLine(
  force: Force,
  mass: Point | undefined,
  rigidity: Point | undefined,
): { readonly tip: Point; readonly length: number } {
  const u = toward(force.angle)
  const atMass = mass !== undefined && distance(mass, force.at) < circleRadius
  const atRigidity = rigidity !== undefined && distance(rigidity, force.at) < circleRadius
  const gap = mass && rigidity ? distance(mass, rigidity) : Number.POSITIVE_INFINITY
  const back = atRigidity ? reachAt(gap) + 1.5 : atMass ? circleRadius + 1.5 : 0
  const tip = add(force.at, times(u, -back))
  const blocking = [mass, rigidity].flatMap(p => (p === undefined ? [] : [lengthBefore(p, tip, u)]))
  return { tip, length: Math.max(shortestForce, Math.min(longestForce, ...blocking)) }
}

/** How long the arrow can be before its tail meets a mark behind its tip. */
function lengthBefore(p: Point, tip: Point, u: Point): number {
  const behind = (tip.x - p.x) * u.x + (tip.y - p.y) * u.y
  const aside = Math.abs((tip.x - p.x) * u.y - (tip.y - p.y) * u.x)
  return behind > 0 && aside < broadArrowWidth / 2 + lozengeReach ? behind - lozengeReach - 3 : longestForce
}

function drawForce(
  force: Force,
  mass: Point | undefined,
  rigidity: Point | undefined,
  field: Field,
): readonly SceneNode[] {
  const { tip, length } = forceLine(force, mass, rigidity)
  field.addInk(strokeBox(add(tip, times(toward(force.angle), -length)), tip, broadArrowWidth))
  return [broadArrow(tip, force.angle, length)]
}

function forcePlacing(force: Force, mass: Point | undefined, rigidity: Point | undefined): Placing {
  const { tip, length } = forceLine(force, mass, rigidity)
  const letters = lettering('force', widestLabel, force.text)
  const u = toward(force.angle)
  const [w, h] = [letters.width / 2, letters.height / 2]
  const pastTail = Math.abs(u.x) * w + Math.abs(u.y) * h
  const tail = add(tip, times(u, -length - 1 - pastTail))
  const middle = add(tip, times(u, -length / 2))
  const beside = aroundPoint(middle, broadArrowWidth / 2 + Math.abs(u.x) * Math.abs(u.y) * 8, w, h)
  const butt = add(tip, times(u, -length))
  const near: readonly Spot[] = [
    labelSpot(towards(letters, tail, butt), tail, 0, 0),
    ...beside.map((p, idx) => labelSpot(towards(letters, p, middle), p, 0, 1 + idx * 0.8)),
  ]
  return { near, anchors: [butt], free: p => labelSpot(towards(letters, p, butt), p, 0, 0) }
}
