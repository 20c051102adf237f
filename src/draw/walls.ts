import type { Field } from './field.ts'
import { add, direction, distance, normal, type Point, strokeBox, subtract, times } from './geometry.ts'
import { element, type SceneNode, words } from './scene.ts'
import type { PlanWall } from './view.ts'

/** A wall on the sheet. */
export interface WallLine {
  readonly wall: PlanWall
  readonly from: Point
  readonly to: Point
  /** Half of what it takes across, with the frame about it if it governs. */
  readonly half: number
}

/** What all the walls of a plan share. */
export interface WallLook {
  readonly stroke: number
  readonly longestArrow: number
  /** The greatest shear, in newtons; 0 when no wall has any. */
  readonly greatest: number
}

const frameGap = 2.6

/** Walls grow thinner, and arrows shorter, where the plan is crowded with short ones. */
export function lookOf(walls: readonly PlanWall[], scale: number): WallLook {
  const lengths = walls.map(({ from, to }) => distance(from, to) * scale).sort((a, b) => a - b)
  const typical = lengths[Math.floor(lengths.length / 2)] ?? 0
  const limit = (value: number, low: number, high: number): number => Math.max(low, Math.min(high, value))
  return {
    stroke: limit(typical * 0.09, 3, 6.5),
    longestArrow: limit(typical * 0.8, 26, 56),
    greatest: walls.reduce((most, { shear }) => Math.max(most, Math.abs(shear?.value ?? 0)), 0),
  }
}

export function wallLines(
  walls: readonly PlanWall[],
  toSheet: (p: Point) => Point,
  look: WallLook,
): readonly WallLine[] {
  return walls.map(wall => ({
    wall,
    from: toSheet(wall.from),
    to: toSheet(wall.to),
    half: look.stroke / 2 + (wall.governs ? frameGap : 0),
  }))
}

/** Strokes of all walls, over the frames of those that govern. */
export function drawWalls(lines: readonly WallLine[], look: WallLook, field: Field): readonly SceneNode[] {
  const strokes = strokesOf(lines, look)
  for (const { line, a, b } of strokes) {
    const u = times(direction(a, b), line.half - look.stroke / 2)
    field.addInk(strokeBox(subtract(a, u), add(b, u), 2 * line.half))
  }
  const frames = strokes.flatMap(({ line, a, b }) => (line.wall.governs ? [wallFrame(a, b, look.stroke)] : []))
  const bars = strokes.map(({ a, b }) =>
    element('path', { class: 'pm-wall', 'stroke-width': look.stroke, d: words('M', a.x, a.y, 'L', b.x, b.y) }),
  )
  return [...frames, ...bars]
}

interface Stroke {
  readonly line: WallLine
  readonly a: Point
  readonly b: Point
}

/** At a corner shared with another wall a stroke runs on by half its width, and fills it. */
function strokesOf(lines: readonly WallLine[], { stroke }: WallLook): readonly Stroke[] {
  const ends = new Map<string, number>()
  for (const p of lines.flatMap(({ from, to }) => [from, to])) ends.set(spotKey(p), (ends.get(spotKey(p)) ?? 0) + 1)
  const runOn = (p: Point, by: Point): Point => ((ends.get(spotKey(p)) ?? 0) > 1 ? add(p, by) : p)
  return lines.map(line => {
    const past = times(direction(line.from, line.to), stroke / 2)
    const [a, b] = visible(runOn(line.from, times(past, -1)), runOn(line.to, past))
    return { line, a, b }
  })
}

const spotKey = ({ x, y }: Point): string => `${Math.round(x * 2)},${Math.round(y * 2)}`

/** A wall too short to print is drawn as a dot as long as it is wide. */
function visible(a: Point, b: Point): readonly [Point, Point] {
  if (distance(a, b) >= 1.5) return [a, b]
  const u = times(direction(a, b), 1.5)
  return [add(a, times(u, -1)), add(b, u)]
}

/** The fine frame about the wall that governs: it reads without colour. */
export function wallFrame(a: Point, b: Point, stroke: number): SceneNode {
  const u = times(direction(a, b), frameGap)
  const v = times(normal(direction(a, b)), stroke / 2 + frameGap)
  const at = (p: Point, along: number, aside: number): Point => add(p, add(times(u, along), times(v, aside)))
  const [p, q, r, s] = [at(a, -1, 1), at(b, 1, 1), at(b, 1, -1), at(a, -1, -1)]
  return element('path', {
    class: 'pm-governs',
    d: words('M', p.x, p.y, 'L', q.x, q.y, 'L', r.x, r.y, 'L', s.x, s.y, 'Z'),
  })
}
