/** Walls in plan: in their own thickness where it is known and shows, framed where they govern. */
import type { Field } from './field.ts'
import { add, cross, direction, distance, normal, type Point, strokeBox, subtract, times } from './geometry.ts'
import { element, layer, type SceneNode, words } from './scene.ts'
import type { PlanWall } from './view.ts'

/** A wall on the sheet. */
export interface WallLine {
  readonly wall: PlanWall
  readonly from: Point
  readonly to: Point
  /** Its thickness on the sheet. */
  readonly stroke: number
  /** Half of what it takes across, with the frame about it if it governs. */
  readonly half: number
}

/** What all the walls of a plan share. */
export interface WallLook {
  /** Of walls whose thickness is not known. */
  readonly stroke: number
  readonly longestArrow: number
  /** The greatest shear, in newtons; 0 when no wall has any. */
  readonly greatest: number
}

const frameGap = 2.6
/** A wall thinner than this on the sheet is drawn this thick, to be seen. */
const thinnest = 3
/** From this thickness on a wall is drawn as an outline with a tint: solid it would be a bar of black. */
const outlined = 9
const outlineWidth = 1.2

/** Arrows grow shorter, and walls of unknown thickness thinner, where the plan is crowded with short ones. */
export function lookOf(walls: readonly PlanWall[], scale: number): WallLook {
  const lengths = walls.map(({ from, to }) => distance(from, to) * scale).sort((a, b) => a - b)
  const typical = lengths[Math.floor(lengths.length / 2)] ?? 0
  const limit = (value: number, low: number, high: number): number => Math.max(low, Math.min(high, value))
  return {
    stroke: limit(typical * 0.09, thinnest, 6.5),
    longestArrow: limit(typical * 0.8, 26, 56),
    greatest: walls.reduce((most, { shear }) => Math.max(most, Math.abs(shear?.value ?? 0)), 0),
  }
}

/** @param scale sheet units to the metre */
export function wallLines(
  walls: readonly PlanWall[],
  toSheet: (p: Point) => Point,
  scale: number,
  look: WallLook,
): readonly WallLine[] {
  return walls.map(wall => {
    const stroke = wall.thickness === undefined ? look.stroke : Math.max(thinnest, wall.thickness * scale)
    return {
      wall,
      from: toSheet(wall.from),
      to: toSheet(wall.to),
      stroke,
      half: stroke / 2 + (wall.governs ? frameGap : 0),
    }
  })
}

/** Strokes of all walls, over the frames of those that govern. */
export function drawWalls(lines: readonly WallLine[], field: Field): readonly SceneNode[] {
  const strokes = strokesOf(lines)
  for (const { line, a, b } of strokes) {
    const u = times(direction(a, b), line.half - line.stroke / 2)
    field.addInk(strokeBox(subtract(a, u), add(b, u), 2 * line.half))
  }
  const frames = strokes.flatMap(({ line, a, b }) => (line.wall.governs ? [wallFrame(a, b, line.stroke)] : []))
  const bars = strokes.flatMap(({ line, a, b, joints }) => [
    bar('pm-wall', a, b, line.stroke),
    ...joints.map(at => element('circle', { class: 'pm-mark-full', cx: at.x, cy: at.y, r: line.stroke / 2 })),
  ])
  const cores = strokes.filter(({ line }) => line.stroke >= outlined).map(coreOf)
  const tints = cores.map(({ a, b, width }) => bar('pm-wall', a, b, width))
  return [
    ...frames,
    ...bars,
    ...cores.map(({ a, b, width }) => bar('pm-wall-core', a, b, width)),
    ...layer('pm-wall-tint', tints),
  ]
}

const bar = (className: string, a: Point, b: Point, width: number): SceneNode =>
  element('path', { class: className, 'stroke-width': width, d: words('M', a.x, a.y, 'L', b.x, b.y) })

/** What lies within the outline of a thick wall. */
function coreOf({ line, a, b }: Stroke): { readonly a: Point; readonly b: Point; readonly width: number } {
  const u = times(direction(a, b), Math.min(outlineWidth, distance(a, b) / 3))
  return { a: add(a, u), b: subtract(b, u), width: line.stroke - 2 * outlineWidth }
}

interface Stroke {
  readonly line: WallLine
  readonly a: Point
  readonly b: Point
  /** Ends where it meets another at an angle: rounded, so that the two close without a spike. */
  readonly joints: readonly Point[]
}

/** Within these two a corner is neither one line nor square. */
const sameLine = 0.1
const square = 0.97

/** At a square corner a stroke runs on by half of the other's thickness, and fills it. */
function strokesOf(lines: readonly WallLine[]): readonly Stroke[] {
  const ends = new Map<string, WallLine[]>()
  for (const line of lines)
    for (const p of [line.from, line.to]) {
      const key = spotKey(p)
      const known = ends.get(key)
      if (known === undefined) ends.set(key, [line])
      else known.push(line)
    }
  return lines.map(line => {
    const u = direction(line.from, line.to)
    const meeting = (p: Point) =>
      (ends.get(spotKey(p)) ?? []).flatMap(other =>
        other === line ? [] : [{ other, turn: Math.abs(cross(u, direction(other.from, other.to))) }],
      )
    const runOn = (p: Point): number =>
      Math.max(0, ...meeting(p).map(({ other, turn }) => (turn >= square ? other.stroke / 2 : 0)))
    const joints = [line.from, line.to].filter(
      p => line.stroke < outlined && meeting(p).some(({ turn }) => turn > sameLine && turn < square),
    )
    const [a, b] = visible(subtract(line.from, times(u, runOn(line.from))), add(line.to, times(u, runOn(line.to))))
    return { line, a, b, joints }
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
