/**
 * Response to a spectrum, mode by mode, and how the modes are put together.
 *
 * What is wanted is worked in each mode and then combined: never a combined force put into an equation, since a
 * combination has lost its signs.
 */
import type { Axis } from './cases.ts'
import { aboutAxis, type FloorMass, type Mode } from './modal.ts'
import { type ByStorey, storeyShears } from './stack.ts'

/** Acceleration in m/s² of an oscillator of a period in s. */
export type Spectrum = (period: number) => number

/** What one mode brings when the ground moves along an axis. */
export interface ModalResponse {
  readonly mode: Mode
  /** Spectral acceleration in m/s². */
  readonly acceleration: number
  /** Force along x and y in N and moment about the axis of the stack in N·m of each level. */
  readonly forces: ByStorey
  /** Shears and torsion about the axis of each storey. */
  readonly shears: ByStorey
  /** Drifts of each storey at the axis, m and rad. */
  readonly drifts: ByStorey
}

/**
 * Peak response of a mode: forces M φ Γ S_a at the centres of mass, movements φ Γ S_a/ω².
 * @source response spectrum analysis; any text on the dynamics of structures
 */
export function responseOf(mode: Mode, floors: readonly FloorMass[], axis: Axis, spectrum: Spectrum): ModalResponse {
  const acceleration = spectrum(mode.period)
  const scale = mode.participation[axis] * acceleration
  const centres = Float64Array.from(mode.shape, (v, i) => {
    const floor = floors[Math.floor(i / 3)]
    return v * scale * ((i % 3 === 2 ? floor?.polar : floor?.mass) ?? Number.NaN)
  })
  const forces = aboutAxis(centres, floors)
  const drifts = mode.drifts.map(v => (v * scale) / mode.omega2)
  return { mode, acceleration, forces, shears: storeyShears(forces), drifts }
}

/**
 * Correlation of two modes in the complete quadratic combination.
 *
 * 1 for equal periods and equal damping; near 0 for periods far apart, where the combination becomes the root of
 * the sum of squares.
 *
 * @param a,b ω of the modes, 1/s @param zeta damping, a share of critical, alike in both
 * @source Der Kiureghian 1981, Wilson, Der Kiureghian and Bayo 1981 (unchecked); equal damping
 */
export function correlation(a: number, b: number, zeta: number): number {
  const r = Math.min(a, b) / Math.max(a, b)
  // Two rigid modes move as one; a rigid mode and another one have nothing in common.
  if (Number.isNaN(r)) return 1
  const [sum, apart] = [1 + r, (1 - r * r) ** 2]
  const top = 8 * zeta * zeta * sum * r ** 1.5
  // Equal modes without damping: the limit of equal modes with some.
  return top === 0 && apart === 0 ? 1 : top / (apart + 4 * zeta * zeta * r * sum * sum)
}

/** Correlations of all pairs of modes. */
export interface Correlations {
  readonly modes: number
  /** Row by row. */
  readonly rho: Float64Array
}

/** Complete quadratic combination. */
export function quadratic(modes: readonly Mode[], zeta: number): Correlations {
  const omega = modes.map(({ omega2 }) => Math.sqrt(omega2))
  return { modes: modes.length, rho: Float64Array.from(omega.flatMap(a => omega.map(b => correlation(a, b, zeta)))) }
}

/** Square root of the sum of squares: no mode has anything in common with another. */
export function sumOfSquares({ length }: readonly Mode[]): Correlations {
  const rho = new Float64Array(length * length)
  for (let i = 0; i < length; i++) rho[i * length + i] = 1
  return { modes: length, rho }
}

/**
 * √ΣΣ ρ_ij r_i r_j of each of several quantities.
 * @param responses one array a mode, all of the same quantities in the same order
 */
export function combine(responses: readonly Readonly<Float64Array>[], { modes, rho }: Correlations): Float64Array {
  const combined = new Float64Array(responses[0]?.length ?? 0)
  for (let i = 0; i < modes; i++)
    for (let j = 0; j <= i; j++) {
      const weight = (i === j ? 1 : 2) * at(rho, i * modes + j)
      const [one, two] = [responses[i], responses[j]]
      if (weight === 0 || !one || !two) continue
      for (let q = 0; q < combined.length; q++) combined[q] = at(combined, q) + weight * at(one, q) * at(two, q)
    }
  // The matrix of correlations has no negative value, so less than zero is rounding.
  return combined.map(square => Math.sqrt(Math.max(0, square)))
}

const at = (numbers: Readonly<Float64Array>, i: number): number => numbers[i] ?? Number.NaN
