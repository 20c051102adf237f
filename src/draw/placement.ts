/**
 * Placing of labels: each takes the cheapest of its own spots, or a leader out to
 * the nearest free ground, so that no two labels ever overlap.
 */
import type { Field } from './field.ts'
import {
  add,
  type Box,
  boxesMeet,
  direction,
  distance,
  nearestOf,
  type Point,
  type Segment,
  times,
  toward,
} from './geometry.ts'
import { type Ground, type Lettering, letteringBox, setLettering } from './label.ts'
import { element, type SceneNode, words } from './scene.ts'

/** One way to set a label. */
export interface Spot {
  /** How much less welcome it is than the best, before looking at what lies there. */
  readonly price: number
  readonly texts: readonly Box[]
  readonly ink: readonly Box[]
  readonly draw: (ground: Ground) => readonly SceneNode[]
}

export interface Placing {
  /** Spots beside the thing named, most welcome first. */
  readonly near: Iterable<Spot>
  /** Where a leader may end, and the label at the other end of it. */
  readonly anchors: readonly Point[]
  readonly free: (at: Point, anchor: Point) => Spot
  /** A leader ends this far from its anchor: at the rim of the mark that it names. */
  readonly reach?: number
  /** What the legend has to explain once it is set. */
  readonly shows?: 'shear'
}

export interface Sheet {
  readonly field: Field
  /** Whether slab lies under a point. */
  readonly groundAt: (at: Point) => 'paper' | 'wash'
  /** How far leaders reach before a label is left out. */
  readonly farthest: number
}

interface Leader extends Segment {
  readonly dot: boolean
}

interface Choice {
  readonly spot: Spot
  readonly price: number
  /** From the label to the thing it names. */
  readonly leader?: Leader
}

/** What a label pays for lying across a thin line of each sort. */
export const priceOfCrossing = {
  gridLine: 9,
  edge: 26,
  seam: 8,
  opening: 40,
  leader: Number.POSITIVE_INFINITY,
  witness: 4,
  legs: 60,
} as const

/** A spot beside the thing at no more than this is taken without looking for a leader. */
const goodEnough = 15
/** Two labels beside their thing at less than this in sum are taken together. */
const goodEnoughPair = 45
const priceOfLeader = 26
const ringStep = 8
const directionsOfRing = 24
/** A leader across other text is the last resort on a sheet where nothing may be left out. */
const leaderOverText = 300

/** Sets one label and marks its place as taken; `undefined` when no free place is within reach. */
export function place(sheet: Sheet, placing: Placing): readonly SceneNode[] | undefined {
  const beside = cheapest(sheet.field, placing.near)
  const choice =
    beside !== undefined && beside.price <= goodEnough
      ? beside
      : cheaper(beside, outward(sheet, placing, beside?.price))
  return choice === undefined ? undefined : settle(sheet, choice)
}

/**
 * Sets two labels of one thing, such as a wall's name and its shear: both beside it in the
 * way that costs least together if there is a good one, else one after the other.
 */
export function placePair(sheet: Sheet, a: Placing, b: Placing): readonly (readonly SceneNode[] | undefined)[] {
  const pair = bestPair(sheet.field, Array.from(a.near), Array.from(b.near))
  return pair === undefined ? [place(sheet, a), place(sheet, b)] : pair.map(choice => settle(sheet, choice))
}

/** Spots come in the order of their own price, which what lies there only raises: most need never be looked at. */
function bestPair(field: Field, as: readonly Spot[], bs: readonly Spot[]): readonly Choice[] | undefined {
  const prices: number[] = []
  const priceOfB = (spot: Spot, at: number) => {
    prices[at] ??= priceOf(field, spot)
    return prices[at] ?? Number.POSITIVE_INFINITY
  }
  const cheapestB = bs[0]?.price ?? Number.POSITIVE_INFINITY
  let best: readonly Choice[] | undefined
  let least: number = goodEnoughPair
  for (const a of as) {
    if (a.price + cheapestB >= least) break
    const price = priceOf(field, a)
    if (price + cheapestB >= least) continue
    for (const [at, b] of bs.entries()) {
      if (price + b.price >= least) break
      const sum = price + priceOfB(b, at)
      if (sum >= least || spotsMeet(a, b)) continue
      best = [
        { spot: a, price },
        { spot: b, price: sum - price },
      ]
      least = sum
    }
  }
  return best
}

function spotsMeet(a: Spot, b: Spot): boolean {
  const others = [...b.texts, ...b.ink]
  return [...a.texts, ...a.ink].some(each => others.some(other => boxesMeet(each, other)))
}

function settle(sheet: Sheet, { spot, leader }: Choice): readonly SceneNode[] {
  const crossed = spot.texts.some(text => sheet.field.price(text) > 0)
  for (const text of spot.texts) sheet.field.addText(text)
  for (const ink of spot.ink) sheet.field.addInk(ink)
  const at = spot.texts[0]?.at ?? spot.ink[0]?.at ?? { x: 0, y: 0 }
  const line = leader === undefined ? [] : drawLeader(sheet.field, leader)
  return [...line, ...spot.draw(crossed ? sheet.groundAt(at) : 'clear')]
}

function cheapest(field: Field, spots: Iterable<Spot>): Choice | undefined {
  let best: Choice | undefined
  for (const spot of spots) {
    if (best !== undefined && spot.price >= best.price) break
    best = cheaper(best, { spot, price: priceOf(field, spot) })
  }
  return best
}

function cheaper(a: Choice | undefined, b: Choice | undefined): Choice | undefined {
  if (b === undefined || b.price === Number.POSITIVE_INFINITY) return a
  return a === undefined || b.price < a.price ? b : a
}

function priceOf(field: Field, spot: Spot): number {
  let price = spot.price
  for (const each of [...spot.texts, ...spot.ink]) {
    if (price === Number.POSITIVE_INFINITY) break
    price += field.price(each)
  }
  return price
}

/** Looks in widening rings for a spot cheaper than the one already in hand. */
function outward(sheet: Sheet, placing: Placing, inHand = Number.POSITIVE_INFINITY): Choice | undefined {
  let best: Choice | undefined
  for (let radius = 18; radius <= sheet.farthest; radius += ringStep) {
    const atLeast = priceOfLeader + radius * 0.35
    if (atLeast >= Math.min(best?.price ?? inHand, inHand)) break
    for (let turn = 0; turn < directionsOfRing; turn++) {
      const away = times(toward((turn * 2 * Math.PI) / directionsOfRing), radius)
      for (const anchor of placing.anchors) {
        const spot = placing.free(add(anchor, away), anchor)
        const own = atLeast + priceOf(sheet.field, spot)
        if (own < Math.min(best?.price ?? inHand, inHand))
          best = cheaper(best, led(sheet.field, spot, anchor, placing.reach ?? 0, own))
      }
    }
  }
  return best
}

function led(field: Field, spot: Spot, named: Point, reach: number, price: number): Choice {
  const start = leaderStart(spot, named)
  const anchor = add(named, times(direction(named, start), Math.min(reach, distance(named, start))))
  // The last of it lies on the thing itself, which is no crossing.
  const short = { a: start, b: add(anchor, times(direction(anchor, start), Math.min(6, distance(anchor, start)))) }
  const total = price + Math.min(field.leaderPrice(short), leaderOverText)
  return { spot, price: total, leader: { a: start, b: anchor, dot: reach === 0 } }
}

/** It ends in a dot on what has extent, and plainly at the rim of a mark. */
function drawLeader(field: Field, { a, b, dot }: Leader): readonly SceneNode[] {
  if (distance(a, b) < 4) return []
  field.addLine({ a, b }, priceOfCrossing.leader)
  const line = element('path', { class: 'pm-leader', d: words('M', a.x, a.y, 'L', b.x, b.y) })
  return dot ? [line, element('circle', { class: 'pm-leader-end', cx: b.x, cy: b.y, r: 1.5 })] : [line]
}

function leaderStart(spot: Spot, anchor: Point): Point {
  const ends = [...spot.texts, ...spot.ink].map(each => nearestOf(each, anchor))
  return ends.reduce((best, end) => (distance(end, anchor) < distance(best, anchor) ? end : best), ends[0] ?? anchor)
}

/** A lettering alone, as a spot for it. */
export function labelSpot(letters: Lettering, at: Point, angle: number, price: number): Spot {
  return {
    price,
    texts: [letteringBox(letters, at, angle)],
    ink: [],
    draw: ground => setLettering(letters, at, angle, ground),
  }
}
