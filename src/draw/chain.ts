/** A chain of dimensions along one side of an elevation, without grid lines. */
import type { Edge } from './dimensions.ts'
import type { Field } from './field.ts'
import type { Point } from './geometry.ts'
import { type Ground, type Lettering, lettering, letteringBox, setLettering } from './label.ts'
import { element, type SceneNode, words } from './scene.ts'
import { spread } from './spread.ts'

/** A place on the sheet along the side, and the length that it stands for. */
export interface Mark {
  readonly at: number
  readonly metres: number
}

interface Bay {
  readonly from: Mark
  readonly to: Mark
  readonly text: Lettering
  /** Where the text stands when it is turned across the chain; absent where it follows the chain. */
  readonly place?: number
}

export interface Chain {
  readonly marks: readonly Mark[]
  readonly bays: readonly Bay[]
  readonly overall?: Lettering
  /** Dimensions that found no room. */
  readonly leftOut: number
  readonly out: { readonly chain: number; readonly turned: number; readonly overall: number; readonly end: number }
}

const fromWall = 20
const row = 18
const turnedHeight = 17
const jog = 8
const tick = 3.6
/** Nearer than this on the sheet, two marks are one. */
const apart = 0.05

/** @param low @param high how far turned texts may stray along the side */
export function layoutChain(
  given: readonly Mark[],
  dimension: (metres: number) => string,
  low: number,
  high: number,
): Chain {
  const sorted = [...given].sort((a, b) => a.at - b.at)
  const marks = sorted.filter((mark, idx) => idx === 0 || mark.at - (sorted[idx - 1]?.at ?? 0) > apart)
  const bays = marks.slice(1).map((to, idx): Bay => {
    const from = marks[idx] ?? to
    return { from, to, text: lettering('dimension', 120, dimension(Math.abs(to.metres - from.metres))) }
  })
  const short = bays.filter(({ from, to, text }) => text.width + 3 > to.at - from.at)
  const most = Math.max(1, Math.floor((high - low) / turnedHeight) + 1)
  // The longest of the short bays keep their figures, in order along the side.
  const kept = [...short].sort((a, b) => b.to.at - b.from.at - (a.to.at - a.from.at)).slice(0, most)
  const turned = short.filter(bay => kept.includes(bay))
  const places = spread(turned.map(middle), Array<number>(Math.max(0, turned.length - 1)).fill(turnedHeight), low, high)
  const set = bays.flatMap((bay): readonly Bay[] => {
    if (!short.includes(bay)) return [bay]
    const place = places[turned.indexOf(bay)]
    return place === undefined ? [] : [{ ...bay, place }]
  })
  const [first, last] = [marks[0], marks.at(-1)]
  const whole = first && last && bays.length > 1 ? dimension(Math.abs(last.metres - first.metres)) : undefined
  const widest = Math.max(0, ...set.map(({ text, place }) => (place === undefined ? 0 : text.width)))
  const turnedOut = fromWall + row + jog
  const afterTexts = widest > 0 ? turnedOut + widest + 2 : fromWall + row
  const overall = afterTexts + 4
  return {
    marks,
    bays: set,
    ...(whole === undefined ? {} : { overall: lettering('dimension', 120, whole) }),
    leftOut: short.length - turned.length,
    out: { chain: fromWall, turned: turnedOut, overall, end: whole === undefined ? afterTexts : overall + row },
  }
}

const middle = ({ from, to }: Pick<Bay, 'from' | 'to'>): number => (from.at + to.at) / 2

/** Draws the chain and takes its place in the field. */
export function drawChain(chain: Chain, edge: Edge, field: Field): readonly SceneNode[] {
  const { marks, bays, overall, out } = chain
  const [first, last] = [marks[0], marks.at(-1)]
  if (!first || !last || bays.length + chain.leftOut === 0) return []
  const reach = overall ? out.overall : out.chain
  const witness = marks.map(mark => {
    const far = mark === first || mark === last ? reach : out.chain
    return line([edge.at(mark.at, 4), edge.at(mark.at, far + 5)])
  })
  return [
    ...witness,
    ...dimensionLine(marks, out.chain, edge, field),
    ...bays.flatMap(bay => bayText(bay, out, edge, field)),
    ...(overall ? wholeLine([first, last], overall, out.overall, edge, field) : []),
  ]
}

const line = (points: readonly Point[]): SceneNode =>
  element('path', {
    class: 'pm-dimension',
    d: points.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' '),
  })

function dimensionLine(marks: readonly Mark[], out: number, edge: Edge, field: Field): readonly SceneNode[] {
  const ends = [edge.at((marks[0]?.at ?? 0) - 4, out), edge.at((marks.at(-1)?.at ?? 0) + 4, out)] as const
  field.addLine({ a: ends[0], b: ends[1] }, Number.POSITIVE_INFINITY)
  const ticks = marks.map(({ at }) => {
    const { x, y } = edge.at(at, out)
    return words('M', x - tick, y + tick, 'L', x + tick, y - tick)
  })
  return [line(ends), element('path', { class: 'pm-tick', d: ticks.join(' ') })]
}

function bayText(bay: Bay, out: Chain['out'], edge: Edge, field: Field): readonly SceneNode[] {
  const { text, place } = bay
  const at = middle(bay)
  if (place === undefined) return set(text, edge.at(at, out.chain + text.height / 2), edge.follow, field)
  const leader =
    Math.abs(place - at) < 0.5
      ? [edge.at(at, out.chain + 5), edge.at(at, out.turned)]
      : [edge.at(at, out.chain + 5), edge.at(at, out.turned - jog), edge.at(place, out.turned)]
  return [line(leader), ...set(text, edge.at(place, out.turned + text.width / 2), edge.across, field, 'paper')]
}

/** The whole length: along its line where there is room, else past its end. */
function wholeLine(
  marks: readonly Mark[],
  text: Lettering,
  out: number,
  edge: Edge,
  field: Field,
): readonly SceneNode[] {
  const [low, high] = [marks[0]?.at ?? 0, marks.at(-1)?.at ?? 0]
  const fits = text.width + 3 <= high - low
  const along = fits
    ? (low + high) / 2
    : edge.freeEnd === 'before'
      ? low - text.width / 2 - 6
      : high + text.width / 2 + 6
  const at = edge.at(along, fits ? out + text.height / 2 : out)
  return [...dimensionLine(marks, out, edge, field), ...set(text, at, edge.follow, field)]
}

/** @param ground paper where the line of an end of the wall may pass below the text */
function set(text: Lettering, at: Point, angle: number, field: Field, ground: Ground = 'clear'): readonly SceneNode[] {
  field.addText(letteringBox(text, at, angle))
  return setLettering(text, at, angle, ground)
}
