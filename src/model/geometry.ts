/** Plane geometry of outlines: areas, crossings, distances. Lengths in m. */

export interface Point {
  readonly x: number
  readonly y: number
}

/** Positive for an outline that runs counter-clockwise. */
export function signedArea(outline: readonly Point[]): number {
  let twice = 0
  outline.forEach((a, i) => {
    const b = next(outline, i)
    twice += a.x * b.y - b.x * a.y
  })
  return twice / 2
}

const next = (outline: readonly Point[], i: number): Point => outline[(i + 1) % outline.length] ?? { x: 0, y: 0 }

/** Sides, by index, that cross or touch though they are not neighbours. */
export function crossesItself(outline: readonly Point[]): readonly [number, number] | undefined {
  const n = outline.length
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++) {
      const neighbours = j === i + 1 || (i === 0 && j === n - 1)
      const [a, b, c, d] = [outline[i], next(outline, i), outline[j], next(outline, j)]
      if (a && c && !neighbours && segmentsMeet(a, b, c, d)) return [i, j]
    }
  return undefined
}

const turn = (a: Point, b: Point, c: Point): number => Math.sign((b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x))

function segmentsMeet(a: Point, b: Point, c: Point, d: Point): boolean {
  const [t1, t2, t3, t4] = [turn(a, b, c), turn(a, b, d), turn(c, d, a), turn(c, d, b)]
  if (t1 !== t2 && t3 !== t4) return true
  return (
    (t1 === 0 && within(a, b, c)) ||
    (t2 === 0 && within(a, b, d)) ||
    (t3 === 0 && within(c, d, a)) ||
    (t4 === 0 && within(c, d, b))
  )
}

const within = (a: Point, b: Point, p: Point): boolean =>
  p.x >= Math.min(a.x, b.x) && p.x <= Math.max(a.x, b.x) && p.y >= Math.min(a.y, b.y) && p.y <= Math.max(a.y, b.y)

/** True for a point inside the outline or on it. */
export function contains(outline: readonly Point[], p: Point): boolean {
  let inside = false
  for (let i = 0; i < outline.length; i++) {
    const [a, b] = [outline[i], next(outline, i)]
    if (!a) continue
    if (turn(a, b, p) === 0 && within(a, b, p)) return true
    if (a.y > p.y !== b.y > p.y && p.x < ((b.x - a.x) * (p.y - a.y)) / (b.y - a.y) + a.x) inside = !inside
  }
  return inside
}

/** How far a segment stands from an outline; 0 where they meet. */
export function distanceFrom(outline: readonly Point[], from: Point, to: Point): number {
  if (contains(outline, from) || contains(outline, to)) return 0
  let least = Number.POSITIVE_INFINITY
  outline.forEach((a, i) => {
    const b = next(outline, i)
    if (segmentsMeet(a, b, from, to)) least = 0
    least = Math.min(least, toSegment(from, a, b), toSegment(to, a, b), toSegment(a, from, to))
  })
  return least
}

function toSegment(p: Point, a: Point, b: Point): number {
  const [dx, dy] = [b.x - a.x, b.y - a.y]
  const squared = dx * dx + dy * dy
  const t = squared === 0 ? 0 : Math.max(0, Math.min(1, ((p.x - a.x) * dx + (p.y - a.y) * dy) / squared))
  return Math.hypot(p.x - a.x - t * dx, p.y - a.y - t * dy)
}
