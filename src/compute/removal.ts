/**
 * A storey with one of its walls, or one of its lines of walls, taken away: what is left to hold it, and how it turns.
 *
 * The storey is a rigid diaphragm on springs, so each wall adds k q qᵀ to a stiffness of 3 × 3, q = (c, s, r). Taking
 * a wall away changes the inverse by one product (Sherman and Morrison); nothing is put together again.
 */
import { factor, solve } from '../base/cholesky.ts'
import { bad, good, type Outcome } from '../base/outcome.ts'
import type { Axis } from './cases.ts'
import type { Line } from './stack.ts'

/** A wall of a storey: k in N/m along its line, and its strength along it in N. */
export interface RemovableWall extends Line {
  readonly k: number
  readonly strength: number
}

/** A load of a storey: along which axis it counts, and its shears in N and torsion about the axis of the arms in N·m. */
export interface StoreyCase {
  readonly axis: Axis
  readonly Vx: number
  readonly Vy: number
  readonly T: number
}

/** Where the drift of a storey is measured: for each axis the coordinates across it of the two edges, in m. */
export interface Edges {
  /** y of the two edges along x. */
  readonly x: readonly [number, number]
  /** x of the two edges along y. */
  readonly y: readonly [number, number]
}

export interface StoreyToRemoveFrom {
  readonly walls: readonly RemovableWall[]
  readonly cases: readonly StoreyCase[]
  readonly edges: Edges
}

/** A storey without some of its walls. */
export interface Remainder {
  /** Indices of the walls that were taken away. */
  readonly without: readonly number[]
  /** Along each axis, what is left of the storey's strength, as a share of the whole. */
  readonly strength: { readonly x: number; readonly y: number }
  /** How the storey turns in the case of an axis that turns it most; absent where no case has that axis. */
  readonly turning: { readonly x?: Turning; readonly y?: Turning }
}

export interface Turning {
  /** The larger of the two edge drifts over the mean of both: 1 for a sway without turning, above 2 where they part ways. */
  readonly ratio: number
  /** Drifts of the two edges along the axis, in m. */
  readonly drifts: readonly [number, number]
  /** Index of the case. */
  readonly caseIdx: number
}

/** The walls that are left cannot hold the storey. */
export type Fallen = Pick<Remainder, 'without' | 'strength'> & { readonly unstable: true }

export const isFallen = (result: Remainder | Fallen): result is Fallen => 'unstable' in result

/** A matrix of 3 × 3, row by row. */
type Matrix3 = Readonly<Float64Array>

/** What is left of det K below this share is rounding: the walls that stay leave a movement free. */
const NOTHING_LEFT = 1e-9

/**
 * Takes away each group of walls in turn, all others standing.
 *
 * @param groups indices of the walls of each group: one, or those of a line
 * @returns one result a group, or `ok: false` where the storey does not stand even with all its walls
 * @source derived: Sherman and Morrison's formula
 */
export function removals(
  storey: StoreyToRemoveFrom,
  groups: readonly (readonly number[])[],
): Outcome<readonly (Remainder | Fallen)[], 'unstable'> {
  const whole = inverseOf(storey.walls)
  if (!whole) return bad('unstable')
  return good(groups.map(group => remainderOf(storey, group, without(whole, pick(storey.walls, group)))))
}

/** The storey with all its walls, as the first row of the same table. */
export function nothingRemoved(storey: StoreyToRemoveFrom): Remainder | Fallen {
  return remainderOf(storey, [], inverseOf(storey.walls))
}

/** The same put together and solved from the start: what the quick way is tested against. */
export function solvedAgain(storey: StoreyToRemoveFrom, group: readonly number[]): Remainder | Fallen {
  return remainderOf(storey, group, inverseOf(storey.walls.filter((_, w) => !group.includes(w))))
}

function inverseOf(walls: readonly RemovableWall[]): Matrix3 | undefined {
  const K = new Float64Array(9)
  for (const { k, ...line } of walls) addProduct(K, k, direction(line))
  const made = factor(K, 3)
  if (!made.ok) return undefined
  const inverse = new Float64Array(9)
  for (const i of [0, 1, 2]) {
    const unit = new Float64Array(3)
    unit[i] = 1
    inverse.set(solve(made.value, unit), 3 * i)
  }
  return inverse
}

/** The inverse once these walls are gone, one after the other; none where nothing of a movement's stiffness is left. */
function without(inverse: Matrix3, walls: readonly RemovableWall[]): Matrix3 | undefined {
  let now = inverse
  let left = 1
  for (const { k, ...line } of walls) {
    const q = direction(line)
    const w = times(now, q)
    // 1 − k qᵀ K⁻¹ q is also what is left of the determinant.
    const remains = 1 - k * dot(q, w)
    left *= remains
    if (!(left > NOTHING_LEFT)) return undefined
    const next = Float64Array.from(now)
    addProduct(next, k / remains, w)
    now = next
  }
  return now
}

function remainderOf(
  { walls, cases, edges }: StoreyToRemoveFrom,
  group: readonly number[],
  inverse: Matrix3 | undefined,
): Remainder | Fallen {
  const strength = strengthLeft(walls, group)
  if (!inverse) return { without: group, strength, unstable: true }
  const turning: { x?: Turning; y?: Turning } = {}
  cases.forEach(({ axis, Vx, Vy, T }, caseIdx) => {
    const found = turningOf(times(inverse, [Vx, Vy, T]), axis, edges[axis], caseIdx)
    if (found.ratio > (turning[axis]?.ratio ?? 0) * LARGER) turning[axis] = found
  })
  return { without: group, strength, turning }
}

/** Of two cases that turn the storey alike but for rounding the first counts. */
const LARGER = 1 + 1e-12

/** A wall counts along an axis with the part of its strength that acts along it. */
function strengthLeft(walls: readonly RemovableWall[], group: readonly number[]): Remainder['strength'] {
  const sum = (of: (wall: RemovableWall) => number, some: readonly RemovableWall[]) =>
    some.reduce((total, wall) => total + of(wall), 0)
  const gone = pick(walls, group)
  const left = (of: (wall: RemovableWall) => number) => {
    const whole = sum(of, walls)
    return whole === 0 ? 0 : 1 - sum(of, gone) / whole
  }
  return { x: left(({ strength, c }) => strength * Math.abs(c)), y: left(({ strength, s }) => strength * Math.abs(s)) }
}

function turningOf([u, v, turn]: Vector3, axis: Axis, [a, b]: readonly [number, number], caseIdx: number): Turning {
  const along = (across: number) => (axis === 'x' ? u - turn * across : v + turn * across)
  const drifts = [along(a), along(b)] as const
  const larger = Math.max(...drifts.map(Math.abs))
  return { ratio: larger === 0 ? 1 : larger / Math.abs((drifts[0] + drifts[1]) / 2), drifts, caseIdx }
}

type Vector3 = readonly [number, number, number]

const direction = ({ c, s, r }: Line): Vector3 => [c, s, r]
const dot = (a: Vector3, b: Vector3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
const times = (m: Matrix3, v: Vector3): Vector3 => [rowDot(m, 0, v), rowDot(m, 3, v), rowDot(m, 6, v)]
const rowDot = (m: Matrix3, at: number, v: Vector3): number =>
  (m[at] ?? Number.NaN) * v[0] + (m[at + 1] ?? Number.NaN) * v[1] + (m[at + 2] ?? Number.NaN) * v[2]

function addProduct(into: Float64Array, scale: number, q: Vector3): void {
  q.forEach((a, i) => {
    q.forEach((b, j) => {
      into[3 * i + j] = (into[3 * i + j] ?? Number.NaN) + scale * a * b
    })
  })
}

/** Two walls this near to one line stand on it, in m of their arms. */
const ON_LINE = 0.01
/** And this near in direction, as a sine. */
const PARALLEL = 1e-4

/** The indices of the walls line by line: those of one direction and one arm, in the order of their first walls. */
export function linesOf(walls: readonly Line[]): readonly (readonly number[])[] {
  const lines: { readonly first: Line; readonly walls: number[] }[] = []
  walls.forEach((wall, w) => {
    const line = lines.find(({ first }) => onLine(first, wall))
    if (line) line.walls.push(w)
    else lines.push({ first: wall, walls: [w] })
  })
  return lines.map(({ walls }) => walls)
}

/** A direction and its opposite are one line, whose arm then turns its sign as well. */
function onLine(a: Line, b: Line): boolean {
  const same = a.c * b.c + a.s * b.s > 0 ? 1 : -1
  return Math.abs(a.c * b.s - a.s * b.c) < PARALLEL && Math.abs(a.r - same * b.r) < ON_LINE
}

const pick = (walls: readonly RemovableWall[], group: readonly number[]): readonly RemovableWall[] =>
  group.flatMap(w => walls[w] ?? [])
