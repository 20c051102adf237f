/**
 * Rigid floors on top of each other, tied by walls: the stiffness of the whole between its storeys.
 *
 * Storeys count from the foundation up. Each has three drifts (along x, along y, and a turn, counter-clockwise) of
 * its head past its foot, at one upright axis; what answers them are its shears along x and y and its torsion about
 * that axis. A wall between storeys i and j sees the drift q·δ, where q = (c, s, r).
 */
import { type Factor, factor, solve } from '../base/cholesky.ts'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { type Cantilever, momentsOf, rotationsOf, shearsOf, storeyStiffness } from './upright.ts'

/** Where a wall stands: cosine and sine of its direction, and its arm x s − y c about the axis, in m. */
export interface Line {
  readonly c: number
  readonly s: number
  readonly r: number
}

/** A wall that resists in one storey alone, k in N/m; or one that stands from the foundation through several. */
export type Tie =
  | ({ readonly kind: 'storey'; readonly storey: number; readonly k: number } & Line)
  | ({ readonly kind: 'continuous'; readonly wall: Cantilever } & Line)

/** A stack of floors that is ready to be solved for any number of load cases. */
export interface Stack {
  readonly storeys: number
  readonly ties: readonly Tie[]
  /** 3n × 3n, row by row: N/m, N and N·m. */
  readonly stiffness: Float64Array
  readonly factor: Factor
}

/** The storey that nothing holds, with all below it held. */
export interface Loose {
  readonly storey: number
}

/**
 * Assembles the stiffness of a stack and makes it ready.
 *
 * @param storeys n ≥ 1
 * @returns the stack, or the storey in which the walls leave a movement free
 * @source derived: sum over the walls of q S qᵀ
 */
export function stackOf(storeys: number, ties: readonly Tie[]): Outcome<Stack, Loose> {
  const n = 3 * storeys
  const stiffness = new Float64Array(n * n)
  for (const tie of ties) {
    switch (tie.kind) {
      case 'storey':
        addBlock(stiffness, n, tie.storey, tie.storey, tie, tie.k)
        break
      case 'continuous': {
        const own = storeyStiffness(tie.wall)
        const m = tie.wall.storeys
        for (let i = 0; i < m; i++) for (let j = 0; j <= i; j++) addBlock(stiffness, n, i, j, tie, at(own, i * m + j))
        break
      }
    }
  }
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) stiffness[j * n + i] = at(stiffness, i * n + j)
  const made = factor(stiffness, n)
  return made.ok
    ? good({ storeys, ties, stiffness, factor: made.value })
    : bad({ storey: Math.floor(made.because / 3) })
}

/** Adds S q qᵀ where storeys i and j meet, j not above i. */
function addBlock(into: Float64Array, n: number, i: number, j: number, { c, s, r }: Line, S: number): void {
  const [row, column] = [3 * i, 3 * j]
  const [x, y, turn] = [S * c, S * s, S * r]
  const [first, second, third] = [row * n + column, (row + 1) * n + column, (row + 2) * n + column]
  into[first] = at(into, first) + x * c
  into[first + 1] = at(into, first + 1) + x * s
  into[first + 2] = at(into, first + 2) + x * r
  into[second] = at(into, second) + y * c
  into[second + 1] = at(into, second + 1) + y * s
  into[second + 2] = at(into, second + 2) + y * r
  into[third] = at(into, third) + turn * c
  into[third + 1] = at(into, third + 1) + turn * s
  into[third + 2] = at(into, third + 2) + turn * r
}

/** Three numbers a storey: drifts along x and y in m and a turn in rad; or shears in N and a torsion in N·m. */
export type ByStorey = Readonly<Float64Array>

/** Shears of each storey from the forces of the levels at its head and above. @param levels force x, y and moment a level */
export function storeyShears(levels: ByStorey): Float64Array {
  const shears = Float64Array.from(levels)
  for (let i = shears.length - 4; i >= 0; i--) shears[i] = at(shears, i) + at(shears, i + 3)
  return shears
}

/** Where each level has moved to at the axis: the drifts of its storey and of all below. */
export function levelMovements(drifts: ByStorey): Float64Array {
  const moved = Float64Array.from(drifts)
  for (let i = 3; i < moved.length; i++) moved[i] = at(moved, i) + at(moved, i - 3)
  return moved
}

export const drifts = (stack: Stack, shears: ByStorey): Float64Array => solve(stack.factor, shears)

/** Storey shears V in N and moments M at the foot of each storey in N·m of one wall, from the foundation up. */
export interface WallForces {
  readonly V: Float64Array
  readonly M: Float64Array
  /** Rotation of its section at the head of each storey, rad; of a continuous wall. */
  readonly turned?: Float64Array
}

/**
 * What one wall carries when the stack has these drifts. A wall of one storey has one shear, and the moment of that
 * shear at its foot is left to the storey height: its M stays 0.
 */
export function wallForces(tie: Tie, drift: ByStorey): WallForces {
  const { c, s, r } = tie
  const along = (i: number) => c * at(drift, 3 * i) + s * at(drift, 3 * i + 1) + r * at(drift, 3 * i + 2)
  switch (tie.kind) {
    case 'storey':
      return { V: Float64Array.of(tie.k * along(tie.storey)), M: new Float64Array(1) }
    case 'continuous': {
      const { wall } = tie
      const own = Float64Array.from({ length: wall.storeys }, (_, i) => along(i))
      const [turned, V, M] = [0, 1, 2].map(() => new Float64Array(wall.storeys)) as [
        Float64Array,
        Float64Array,
        Float64Array,
      ]
      rotationsOf(wall, own, turned)
      shearsOf(wall, own, turned, V)
      momentsOf(wall, V, M)
      return { V, M, turned }
    }
  }
}

/**
 * How far the forces of the walls are from what acts: in each storey ΣV c, ΣV s and ΣV r against its shears and its
 * torsion, the largest of all as a share of the largest shear, moments over the longest arm.
 */
export function imbalance(stack: Stack, shears: ByStorey, forces: readonly WallForces[]): number {
  const rest = Float64Array.from(shears)
  let reach = 0
  stack.ties.forEach((tie, w) => {
    const V = forces[w]?.V ?? new Float64Array()
    reach = Math.max(reach, Math.abs(tie.r))
    const lowest = tie.kind === 'storey' ? tie.storey : 0
    for (let i = 0; i < V.length; i++) {
      const row = 3 * (lowest + i)
      rest[row] = at(rest, row) - at(V, i) * tie.c
      rest[row + 1] = at(rest, row + 1) - at(V, i) * tie.s
      rest[row + 2] = at(rest, row + 2) - at(V, i) * tie.r
    }
  })
  const size = (values: ByStorey) =>
    values.reduce((most, value, i) => Math.max(most, Math.abs(value) / (i % 3 === 2 ? reach || 1 : 1)), 0)
  const acting = size(shears)
  return acting === 0 ? 0 : size(rest) / acting
}

const at = (numbers: Readonly<Float64Array>, i: number): number => numbers[i] ?? Number.NaN
