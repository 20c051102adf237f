/**
 * Free vibration of rigid floors tied by walls: three movements a level, at its centre of mass.
 *
 * The modes are those of the flexibility, M^½ F M^½ v = v/ω², in which the longest periods are the largest values
 * and come out with all their digits, however stiff the rest of the building is.
 */
import { symmetricEigen } from '../base/eigen.ts'
import { type ByStorey, drifts, levelMovements, type Stack, storeyShears } from './stack.ts'

/** A level: mass in kg, polar moment of the mass about its centre in kg·m², and that centre in m from the axis of the stack. */
export interface FloorMass {
  readonly mass: number
  readonly polar: number
  readonly x: number
  readonly y: number
}

export interface Mode {
  /** s. */
  readonly period: number
  /** ω² in 1/s²; infinite where the mode is rigid beside the others to all digits. */
  readonly omega2: number
  /** u, v and turn of each level at its centre of mass, from the lowest up, scaled to a modal mass of one: φᵀ M φ = 1. */
  readonly shape: ByStorey
  /** The drifts of each storey at the axis that go with the shape. */
  readonly drifts: ByStorey
  /** L = φᵀ M ι for the ground moving along x and along y: with a modal mass of one also the participation factor. */
  readonly participation: { readonly x: number; readonly y: number }
  /** L², the mass in kg that takes part along x and along y. */
  readonly mass: { readonly x: number; readonly y: number }
  /**
   * The mode put back: the storey shears and torsions that the walls return to its drifts, against those of the forces
   * of inertia ω² M φ; the largest difference as a share of the largest.
   */
  readonly residual: number
}

/**
 * All modes, the longest period first.
 *
 * @param floors from the lowest up, one a storey of the stack; mass and polar moment above zero
 * @returns 3n modes; their masses add up to the whole mass along x and along y
 * @source derived: symmetric eigenproblem of the flexibility weighed by the masses
 */
export function modesOf(stack: Stack, floors: readonly FloorMass[]): readonly Mode[] {
  const n = 3 * stack.storeys
  const roots = Float64Array.from({ length: n }, (_, i) => Math.sqrt(inertia(floors, i)))
  const weighed = new Float64Array(n * n)
  const forces = new Float64Array(n)
  for (let j = 0; j < n; j++) {
    forces[j] = at(roots, j)
    const moved = atCentres(levelMovements(driftsUnder(stack, floors, forces)), floors)
    forces[j] = 0
    for (let i = 0; i < n; i++) weighed[i * n + j] = at(roots, i) * at(moved, i)
  }
  const { values, vectors } = symmetricEigen(weighed, n)
  const softest = at(values, n - 1)
  return Array.from({ length: n }, (_, m) => {
    const row = n - 1 - m
    const vector = upright(vectors.subarray(row * n, (row + 1) * n))
    const shape = vector.map((v, i) => v / at(roots, i))
    // Below its rounding a value has no sign: the mode is rigid beside the others.
    if (at(values, row) <= softest * Number.EPSILON) return rigid(floors, shape)
    return settled(stack, floors, 1 / at(values, row), shape)
  })
}

/**
 * A mode with the drifts that its own forces of inertia bring about. That rids a soft mode of its last traces of stiff
 * ones, which hardly show in the shape but would in the wall forces; a stiff mode is better left as it was found.
 */
function settled(stack: Stack, floors: readonly FloorMass[], omega2: number, found: Float64Array): Mode {
  const drift = driftsUnder(stack, floors, inertiaForces(floors, omega2, found))
  const shape = atCentres(levelMovements(drift), floors)
  const scale = 1 / Math.sqrt(sumOf([...shape], (v, i) => inertia(floors, i) * v * v))
  const again = withDrifts(
    stack,
    floors,
    omega2,
    shape.map(v => v * scale),
    drift.map(v => v * scale),
  )
  const asFound = withDrifts(stack, floors, omega2, found, storeyDrifts(found, floors))
  return again.residual < asFound.residual ? again : asFound
}

const withDrifts = (
  stack: Stack,
  floors: readonly FloorMass[],
  omega2: number,
  shape: ByStorey,
  drift: ByStorey,
): Mode => ({
  period: (2 * Math.PI) / Math.sqrt(omega2),
  omega2,
  shape,
  drifts: drift,
  ...takingPart(floors, shape),
  residual: putBack(stack, floors, inertiaForces(floors, omega2, shape), drift),
})

const rigid = (floors: readonly FloorMass[], shape: ByStorey): Mode => ({
  period: 0,
  omega2: Number.POSITIVE_INFINITY,
  shape,
  drifts: storeyDrifts(shape, floors),
  ...takingPart(floors, shape),
  residual: 0,
})

function takingPart(floors: readonly FloorMass[], shape: ByStorey): Pick<Mode, 'participation' | 'mass'> {
  const x = sumOf(floors, ({ mass }, i) => mass * at(shape, 3 * i))
  const y = sumOf(floors, ({ mass }, i) => mass * at(shape, 3 * i + 1))
  return { participation: { x, y }, mass: { x: x ** 2, y: y ** 2 } }
}

/** The sense of a vector is free: its largest part, the highest of equals, is positive. */
function upright(vector: Float64Array): Float64Array {
  const largest = vector.reduce((most, v) => Math.max(most, Math.abs(v)), 0)
  let lead = 0
  for (const v of vector) if (Math.abs(v) > largest * (1 - 1e-6)) lead = v
  return lead < 0 ? vector.map(v => -v) : vector
}

const inertiaForces = (floors: readonly FloorMass[], omega2: number, shape: ByStorey): Float64Array =>
  Float64Array.from(shape, (v, i) => omega2 * inertia(floors, i) * v)

const driftsUnder = (stack: Stack, floors: readonly FloorMass[], centres: ByStorey): Float64Array =>
  drifts(stack, storeyShears(aboutAxis(centres, floors)))

function putBack(stack: Stack, floors: readonly FloorMass[], centres: ByStorey, drift: ByStorey): number {
  const n = drift.length
  const acting = storeyShears(aboutAxis(centres, floors))
  // Torsions are compared over the radius of gyration of the levels, which makes forces of them.
  const radius = Math.sqrt(sumOf(floors, ({ polar }) => polar) / sumOf(floors, ({ mass }) => mass))
  let [apart, size] = [0, 0]
  for (let i = 0; i < n; i++) {
    let elastic = 0
    for (let j = 0; j < n; j++) elastic += at(stack.stiffness, i * n + j) * at(drift, j)
    const arm = i % 3 === 2 ? radius : 1
    apart = Math.max(apart, Math.abs(elastic - at(acting, i)) / arm)
    size = Math.max(size, Math.abs(at(acting, i)) / arm)
  }
  return apart / size
}

/** Drifts of the storeys at the axis when the levels move so at their centres of mass. */
export function storeyDrifts(levels: ByStorey, floors: readonly FloorMass[]): Float64Array {
  const moved = Float64Array.from(levels)
  floors.forEach(({ x, y }, i) => {
    const turn = at(levels, 3 * i + 2)
    moved[3 * i] = at(levels, 3 * i) + turn * y
    moved[3 * i + 1] = at(levels, 3 * i + 1) - turn * x
  })
  for (let i = moved.length - 1; i >= 3; i--) moved[i] = at(moved, i) - at(moved, i - 3)
  return moved
}

/** Movements of the levels at their centres of mass, from those at the axis. */
export function atCentres(axis: ByStorey, floors: readonly FloorMass[]): Float64Array {
  const moved = Float64Array.from(axis)
  floors.forEach(({ x, y }, i) => {
    const turn = at(axis, 3 * i + 2)
    moved[3 * i] = at(axis, 3 * i) - turn * y
    moved[3 * i + 1] = at(axis, 3 * i + 1) + turn * x
  })
  return moved
}

/** Forces at the centres of mass, with their moments taken about the axis. */
export function aboutAxis(centres: ByStorey, floors: readonly FloorMass[]): Float64Array {
  const forces = Float64Array.from(centres)
  floors.forEach(({ x, y }, i) => {
    forces[3 * i + 2] = at(centres, 3 * i + 2) + x * at(centres, 3 * i + 1) - y * at(centres, 3 * i)
  })
  return forces
}

/** Of a level's three movements two carry its mass and the third its polar moment. */
function inertia(floors: readonly FloorMass[], i: number): number {
  const floor = floors[Math.floor(i / 3)]
  return (i % 3 === 2 ? floor?.polar : floor?.mass) ?? Number.NaN
}

const sumOf = <T>(all: readonly T[], of: (one: T, i: number) => number): number =>
  all.reduce((sum, one, i) => sum + of(one, i), 0)

/** The number of modes, from the longest period on, whose masses reach a share of the whole along both axes. */
export function modesFor(share: number, modes: readonly Mode[]): number {
  const whole = { x: sumOf(modes, ({ mass }) => mass.x), y: sumOf(modes, ({ mass }) => mass.y) }
  let [x, y, count] = [0, 0, 0]
  for (const { mass } of modes) {
    count++
    x += mass.x
    y += mass.y
    if (x >= share * whole.x * ROUNDING && y >= share * whole.y * ROUNDING) break
  }
  return count
}

/** A sum of all modes is the whole but for its rounding. */
const ROUNDING = 1 - 1e-9

const at = (numbers: Readonly<Float64Array>, i: number): number => numbers[i] ?? Number.NaN
