/**
 * Hatching that tells areas of different load apart, in black and white too: plain strokes, cut by
 * openings and broken around texts, so that what is written stands on clear ground.
 */
import { type Box, corners, cross, dot, normal, type Point, sidesOf, toward } from './geometry.ts'
import { element, type SceneElement, words } from './scene.ts'

interface Hatch {
  /** Directions of its strokes, in degrees. */
  readonly degrees: readonly number[]
  readonly spacing: number
  readonly dashed: boolean
}

const plain: readonly Hatch[] = [
  { degrees: [-45], spacing: 11, dashed: false },
  { degrees: [45], spacing: 11, dashed: false },
  { degrees: [-45, 45], spacing: 17, dashed: false },
  { degrees: [0], spacing: 10, dashed: false },
  { degrees: [90], spacing: 10, dashed: false },
  { degrees: [-45], spacing: 9, dashed: true },
  { degrees: [0, 90], spacing: 17, dashed: false },
  { degrees: [45], spacing: 9, dashed: true },
]

/** After the plain ones the same again at half the spacing; beyond those hatching tells nothing more apart. */
const hatches: readonly Hatch[] = [...plain, ...plain.map(each => ({ ...each, spacing: each.spacing / 2 }))]

export const mostHatches = hatches.length

type Interval = readonly [number, number]

/**
 * The strokes of hatch `idx` over an outline, apart from what the holes and boxes cover.
 * Strokes of one hatch lie on the same lines of the sheet whatever they fill, so that areas of one load run on.
 */
export function hatching(
  idx: number,
  outline: readonly Point[],
  holes: readonly (readonly Point[])[],
  boxes: readonly Box[],
): readonly SceneElement[] {
  const hatch = hatches[idx]
  if (hatch === undefined) return []
  const clear = [...holes, ...boxes.map(corners)]
  const strokes = hatch.degrees.flatMap(degrees => strokesAt((degrees * Math.PI) / 180, hatch.spacing, outline, clear))
  if (strokes.length === 0) return []
  return [element('path', { class: hatch.dashed ? 'pm-hatch pm-hatch-dashed' : 'pm-hatch', d: strokes.join(' ') })]
}

/** Shorter than this a stroke is a speck. */
const speck = 1.5

function strokesAt(
  angle: number,
  spacing: number,
  outline: readonly Point[],
  clear: readonly (readonly Point[])[],
): readonly string[] {
  const u = toward(angle)
  const v = normal(u)
  const shape = framed(outline, u)
  const cut = clear.map(ring => framed(ring, u)).filter(ring => ring.low < shape.high && ring.high > shape.low)
  const strokes: string[] = []
  for (let row = Math.ceil(shape.low / spacing); row * spacing < shape.high; row++) {
    const level = row * spacing
    let left = intervalsAt(shape.sides, level)
    for (const ring of cut)
      if (level > ring.low && level < ring.high) left = without(left, intervalsAt(ring.sides, level))
    for (const [from, to] of left) {
      if (to - from < speck) continue
      const point = (along: number): Point => ({ x: u.x * along + v.x * level, y: u.y * along + v.y * level })
      const [a, b] = [point(from), point(to)]
      strokes.push(words('M', tenth(a.x), tenth(a.y), 'L', tenth(b.x), tenth(b.y)))
    }
  }
  return strokes
}

/** Hatching needs no thousandths. */
const tenth = (value: number): number => Math.round(value * 10) / 10

interface Side {
  readonly along: readonly [number, number]
  readonly across: readonly [number, number]
}

/** A ring in coordinates along and across a direction. */
function framed(
  ring: readonly Point[],
  u: Point,
): { readonly sides: readonly Side[]; readonly low: number; readonly high: number } {
  const sides = sidesOf(ring).map(
    ({ a, b }): Side => ({ along: [dot(a, u), dot(b, u)], across: [cross(u, a), cross(u, b)] }),
  )
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]
  for (const { across } of sides) {
    low = Math.min(low, across[0])
    high = Math.max(high, across[0])
  }
  return { sides, low, high }
}

/** Where a line at `level` lies within a ring: every second piece between its crossings. */
function intervalsAt(sides: readonly Side[], level: number): readonly Interval[] {
  const crossings: number[] = []
  for (const { along, across } of sides) {
    if (across[0] > level === across[1] > level) continue
    crossings.push(along[0] + ((level - across[0]) / (across[1] - across[0])) * (along[1] - along[0]))
  }
  crossings.sort((a, b) => a - b)
  return crossings.flatMap((from, idx) => {
    const to = crossings[idx + 1]
    return idx % 2 === 0 && to !== undefined ? [[from, to] as const] : []
  })
}

function without(intervals: readonly Interval[], taken: readonly Interval[]): readonly Interval[] {
  return taken.reduce<readonly Interval[]>(
    (left, [from, to]) =>
      left.flatMap(([a, b]): readonly Interval[] => {
        if (to <= a || from >= b) return [[a, b]]
        return [...(from > a ? [[a, from] as const] : []), ...(to < b ? [[to, b] as const] : [])]
      }),
    intervals,
  )
}
