/** Boolean operations on outlines, by the polygon clipping library. Lengths in m. */
import * as polyclip from 'polyclip-ts'
import { type Point, signedArea } from '../model/geometry.ts'

export type Ring = readonly Point[]

/** Coordinates are merged within a tenth of a micrometre: foot and metre arithmetic differs in its last bits. */
const GRAIN = 1e-7

type Shape = [number, number][][][]

const snapped = (value: number): number => Math.round(value / GRAIN) * GRAIN

const shape = (rings: readonly Ring[]): Shape =>
  rings.map(ring => [ring.map(({ x, y }): [number, number] => [snapped(x), snapped(y)])])

/** Outer rings counter-clockwise, holes clockwise. */
function rings(result: Shape): readonly Ring[] {
  return result.flatMap(polygon =>
    polygon.map((ring, i) => {
      const points = ring.slice(0, -1).map(([x, y]) => ({ x, y }))
      return signedArea(points) > 0 === (i === 0) ? points : points.reverse()
    }),
  )
}

/** What lies in `ring` and in none of `without`. */
export function common(a: Ring, b: Ring, without: readonly Ring[]): readonly Ring[] {
  const both = polyclip.intersection(shape([a]), shape([b]))
  if (both.length === 0 || without.length === 0) return rings(both)
  return rings(polyclip.difference(both, shape(without)))
}

/** The outline of several parts together. */
export function outlineOf(parts: readonly Ring[]): readonly Ring[] {
  const [first, ...rest] = parts.map(ring => shape([ring]))
  return first ? rings(polyclip.union(first, ...rest)).map(withoutStraightCorners) : []
}

/** Drops points that lie on the straight line between their neighbours. */
function withoutStraightCorners(ring: Ring): Ring {
  return ring.filter((point, i) => {
    const before = ring[(i + ring.length - 1) % ring.length] ?? point
    const after = ring[(i + 1) % ring.length] ?? point
    const [ax, ay, bx, by] = [point.x - before.x, point.y - before.y, after.x - point.x, after.y - point.y]
    return Math.abs(ax * by - ay * bx) > 1e-9 * (Math.hypot(ax, ay) * Math.hypot(bx, by))
  })
}

export const areaOf = (parts: readonly Ring[]): number => parts.reduce((total, ring) => total + signedArea(ring), 0)
