/**
 * How a wall with openings comes apart: strips as high as the openings in them, and in each strip the piers
 * that the openings leave. A pier that holds openings of other heights comes apart in the same way.
 *
 *    +------------------------------+   The door takes the whole height of strip S1 and parts it into two
 *    |                              |   piers. The left one is whole. The right one holds a window, so it
 *    +-------+----+-----------------+   has a strip of its own, S2, with a pier on either side.
 *    |       |    |       +---+     |
 *    |  P1   |door|  P2   | w | P3  |   Nothing is worked here: lengths are only compared, and every edge is
 *    |       |    +-------+---+-----+   one of the edges that were given.
 *    |       |    |                 |
 *    +-------+----+-----------------+
 */
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { type Opening, SAME } from '../model/openings.ts'
import type { Wall } from '../model/walls.ts'
import { noPier, noSpandrel, staggered } from './opening-faults.ts'

/** A rectangle on the face of a wall: along it from its start, and up from its foot. */
export interface Face {
  readonly a1: Value
  readonly a2: Value
  readonly z1: Value
  readonly z2: Value
}

export interface Hole extends Face {
  readonly opening: Opening
}

/** A solid pier, or one that holds strips of openings. */
export interface Part {
  readonly face: Face
  /** From the foot up; none in a solid pier. */
  readonly strips: readonly Strip[]
}

export interface Strip {
  readonly face: Face
  /** Side by side, from the wall's start on. */
  readonly parts: readonly Part[]
}

/**
 * The parts of a wall that stand side by side: one, unless openings of full height part it.
 * @param free true where the head of the wall is free to turn, so that a strip needs a spandrel above it
 */
export function layOut(wall: Wall, face: Face, holes: readonly Hole[], free: boolean): Result<readonly Part[]> {
  const columns = columnsOf(face, holes)
  if (columns.length === 0) return bad([noPier(wall, holes)])
  return all(columns.map(column => partOf(wall, column, within(column, holes), free ? face.z2 : undefined)))
}

/** @param head the free head of the wall, where it is free */
function partOf(wall: Wall, face: Face, holes: readonly Hole[], head: Value | undefined): Result<Part> {
  const strips = all(stripsOf(holes).map(held => stripOf(wall, face, held, head)))
  return strips.ok ? good({ face, strips: strips.value }) : strips
}

function stripOf(wall: Wall, around: Face, holes: readonly Hole[], head: Value | undefined): Result<Strip> {
  const face = { ...around, z1: least(holes.map(({ z1 }) => z1)), z2: most(holes.map(({ z2 }) => z2)) }
  if (head && same(face.z2, head)) return bad([noSpandrel(wall, holes)])
  const columns = columnsOf(face, holes)
  const [only, ...more] = columns
  if (!only) return bad([noPier(wall, holes)])
  if (more.length === 0 && same(only.a1, face.a1) && same(only.a2, face.a2)) return bad([staggered(wall, holes)])
  const parts = all(columns.map(column => partOf(wall, column, within(column, holes), head)))
  return parts.ok ? good({ face, parts: parts.value }) : parts
}

const same = (p: Value, q: Value): boolean => Math.abs(p.si - q.si) <= SAME
const least = (values: readonly Value[]): Value => values.reduce((a, b) => (b.si < a.si ? b : a))
const most = (values: readonly Value[]): Value => values.reduce((a, b) => (b.si > a.si ? b : a))

/** What is left of a face, as columns, where openings one above another take its whole height. */
function columnsOf(face: Face, holes: readonly Hole[]): readonly Face[] {
  const inside = ({ si }: Value) => si > face.a1.si + SAME && si < face.a2.si - SAME
  const edges = [face.a1, ...holes.flatMap(({ a1, a2 }) => [a1, a2]).filter(inside), face.a2]
  const marks = edges
    .sort((a, b) => a.si - b.si)
    .filter((mark, i, all) => i === 0 || mark.si - (all[i - 1]?.si ?? 0) > SAME)
  const columns: Face[] = []
  let from: Value | undefined
  marks.slice(1).forEach((mark, i) => {
    const start = marks[i] ?? mark
    const open = isOpen(face, holes, (start.si + mark.si) / 2)
    if (open && from) columns.push({ ...face, a1: from, a2: start })
    from = open ? undefined : (from ?? start)
  })
  if (from) columns.push({ ...face, a1: from, a2: face.a2 })
  return columns
}

/** True where a plumb line meets nothing but openings between foot and head. */
function isOpen(face: Face, holes: readonly Hole[], at: number): boolean {
  const there = holes.filter(({ a1, a2 }) => a1.si < at && at < a2.si).sort((a, b) => a.z1.si - b.z1.si)
  let reached = face.z1.si
  for (const { z1, z2 } of there) if (z1.si <= reached + SAME) reached = Math.max(reached, z2.si)
  return reached >= face.z2.si - SAME
}

/** Openings in a column, each cut off at its edges. */
const within = ({ a1, a2 }: Face, holes: readonly Hole[]): readonly Hole[] =>
  holes
    .map(hole => ({ ...hole, a1: most([hole.a1, a1]), a2: least([hole.a2, a2]) }))
    .filter(hole => hole.a2.si - hole.a1.si > SAME)

/**
 * Openings that belong to one strip, from the foot up: they share some height, or stand one on another with
 * nothing between.
 */
function stripsOf(holes: readonly Hole[]): readonly (readonly Hole[])[] {
  const strips: Hole[][] = []
  for (const hole of holes) {
    const joined = strips.filter(strip => strip.some(other => shareHeight(hole, other) || stand(hole, other)))
    for (const strip of joined) strips.splice(strips.indexOf(strip), 1)
    strips.push([...joined.flat(), hole])
  }
  return strips.sort((a, b) => least(a.map(({ z1 }) => z1)).si - least(b.map(({ z1 }) => z1)).si)
}

const shareHeight = (a: Face, b: Face): boolean => Math.min(a.z2.si, b.z2.si) - Math.max(a.z1.si, b.z1.si) > SAME

const stand = (a: Face, b: Face): boolean =>
  (same(a.z2, b.z1) || same(b.z2, a.z1)) && Math.min(a.a2.si, b.a2.si) - Math.max(a.a1.si, b.a1.si) >= -SAME
