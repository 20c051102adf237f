/** Points, turned boxes and segments on the sheet: x to the right, y down, angles clockwise in radians. */

import type { Point } from '../model/geometry.ts'

export type { Point }

export interface Segment {
  readonly a: Point
  readonly b: Point
}

/** A rectangle about its centre, turned by `angle`. */
export interface Box {
  readonly at: Point
  readonly halfWidth: number
  readonly halfHeight: number
  readonly angle: number
}

/** An upright rectangle. */
export interface Bounds {
  readonly x0: number
  readonly y0: number
  readonly x1: number
  readonly y1: number
}

export const add = (p: Point, q: Point): Point => ({ x: p.x + q.x, y: p.y + q.y })
export const subtract = (p: Point, q: Point): Point => ({ x: p.x - q.x, y: p.y - q.y })
export const times = (p: Point, k: number): Point => ({ x: p.x * k, y: p.y * k })
export const dot = (p: Point, q: Point): number => p.x * q.x + p.y * q.y
export const cross = (p: Point, q: Point): number => p.x * q.y - p.y * q.x
export const distance = (p: Point, q: Point): number => Math.hypot(p.x - q.x, p.y - q.y)
export const between = (p: Point, q: Point, t: number): Point => ({
  x: p.x + (q.x - p.x) * t,
  y: p.y + (q.y - p.y) * t,
})
export const toward = (angle: number): Point => ({ x: Math.cos(angle), y: Math.sin(angle) })
export const normal = (u: Point): Point => ({ x: -u.y, y: u.x })

export function direction(p: Point, q: Point): Point {
  const length = distance(p, q)
  return length === 0 ? { x: 1, y: 0 } : times(subtract(q, p), 1 / length)
}

export function box(at: Point, width: number, height: number, angle = 0): Box {
  return { at, halfWidth: width / 2, halfHeight: height / 2, angle }
}

/** The box that covers a stroke of the given width. */
export function strokeBox(a: Point, b: Point, width: number): Box {
  return box(between(a, b, 0.5), distance(a, b), width, Math.atan2(b.y - a.y, b.x - a.x))
}

export function boundsOfBox({ at, halfWidth, halfHeight, angle }: Box): Bounds {
  const c = Math.abs(Math.cos(angle))
  const s = Math.abs(Math.sin(angle))
  const w = halfWidth * c + halfHeight * s
  const h = halfWidth * s + halfHeight * c
  return { x0: at.x - w, y0: at.y - h, x1: at.x + w, y1: at.y + h }
}

export function boundsOfPoints(points: readonly Point[]): Bounds | undefined {
  const first = points[0]
  if (first === undefined) return undefined
  return points.reduce<Bounds>((b, p) => union(b, { x0: p.x, y0: p.y, x1: p.x, y1: p.y }), {
    x0: first.x,
    y0: first.y,
    x1: first.x,
    y1: first.y,
  })
}

export function union(a: Bounds, b: Bounds): Bounds {
  return { x0: Math.min(a.x0, b.x0), y0: Math.min(a.y0, b.y0), x1: Math.max(a.x1, b.x1), y1: Math.max(a.y1, b.y1) }
}

export function corners({ at, halfWidth, halfHeight, angle }: Box): readonly Point[] {
  const u = times(toward(angle), halfWidth)
  const v = times(normal(toward(angle)), halfHeight)
  return [add(add(at, u), v), add(subtract(at, u), v), subtract(subtract(at, u), v), add(subtract(at, v), u)]
}

/** Two convex shapes are apart when some side of either has them on different sides. */
export function boxesMeet(a: Box, b: Box): boolean {
  const gap = subtract(b.at, a.at)
  const ua = toward(a.angle)
  const ub = toward(b.angle)
  for (const axis of [ua, normal(ua), ub, normal(ub)]) {
    if (Math.abs(dot(gap, axis)) >= reach(a, axis) + reach(b, axis) - 1e-6) return false
  }
  return true
}

function reach(b: Box, axis: Point): number {
  const u = toward(b.angle)
  return b.halfWidth * Math.abs(dot(u, axis)) + b.halfHeight * Math.abs(cross(u, axis))
}

/** The point of a box that lies nearest to `p`. */
export function nearestOf(b: Box, p: Point): Point {
  const u = toward(b.angle)
  const v = normal(u)
  const gap = subtract(p, b.at)
  const along = Math.max(-b.halfWidth, Math.min(b.halfWidth, dot(gap, u)))
  const across = Math.max(-b.halfHeight, Math.min(b.halfHeight, dot(gap, v)))
  return add(b.at, add(times(u, along), times(v, across)))
}

export function sidesOf(polygon: readonly Point[]): readonly Segment[] {
  return polygon.map((a, idx) => ({ a, b: polygon[(idx + 1) % polygon.length] ?? a }))
}

/** Where along `s` (0 at its start, 1 at its end) it meets `t`; two ends when they run in one line. */
export function meetings(s: Segment, t: Segment): readonly number[] {
  const d = subtract(s.b, s.a)
  const e = subtract(t.b, t.a)
  const turn = cross(d, e)
  const length = Math.hypot(d.x, d.y)
  const scale = length * Math.hypot(e.x, e.y)
  if (scale === 0) return []
  if (Math.abs(turn) > 1e-9 * scale) {
    const along = cross(subtract(t.a, s.a), e) / turn
    const there = cross(subtract(t.a, s.a), d) / turn
    return along > 0 && along < 1 && there >= -1e-9 && there <= 1 + 1e-9 ? [along] : []
  }
  // Parallel sides a fiftieth of a unit apart print as one line.
  if (Math.abs(cross(d, subtract(t.a, s.a))) > 0.02 * length) return []
  return [t.a, t.b].map(p => dot(subtract(p, s.a), d) / (length * length)).filter(at => at > 0 && at < 1)
}

/** The pieces into which the others cut a segment, in order. */
export function cut(s: Segment, others: readonly Segment[]): readonly Segment[] {
  const marks = [0, ...others.flatMap(other => meetings(s, other)), 1].sort((a, b) => a - b)
  return marks.slice(1).flatMap((to, idx) => {
    const from = marks[idx] ?? 0
    return to - from < 1e-6 ? [] : [{ a: between(s.a, s.b, from), b: between(s.a, s.b, to) }]
  })
}
