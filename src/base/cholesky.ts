/** Linear equations whose matrix is symmetric and holds against every movement, such as a stiffness. */
import { bad, good, type Outcome } from './outcome.ts'

/** A factor of a matrix, ready to solve for many right-hand sides. */
export interface Factor {
  readonly n: number
  /** Lower triangle L of A = L Lᵀ, row by row. */
  readonly lower: Float64Array
}

/** Below this share of its own diagonal a pivot is the rounding of the arithmetic: nothing resists that movement. */
const NO_PIVOT = 1e-12

/**
 * Factor A = L Lᵀ of a symmetric positive definite matrix.
 *
 * @param matrix n × n, row by row; only its lower half is read
 * @returns the factor, or the index of the first unknown that nothing resists once those before it are held
 * @source Cholesky
 */
export function factor(matrix: Readonly<Float64Array>, n: number): Outcome<Factor, number> {
  const lower = new Float64Array(n * n)
  for (let i = 0; i < n; i++) {
    const row = lower.subarray(i * n, (i + 1) * n)
    for (let j = 0; j <= i; j++) {
      const other = lower.subarray(j * n, (j + 1) * n)
      const whole = at(matrix, i * n + j)
      let rest = whole
      for (let k = 0; k < j; k++) rest -= at(row, k) * at(other, k)
      if (j < i) row[j] = rest / at(other, j)
      else if (rest > NO_PIVOT * whole) row[i] = Math.sqrt(rest)
      else return bad(i)
    }
  }
  return good({ n, lower })
}

/** Solves A x = b. @returns x, in an array of its own */
export function solve({ n, lower }: Factor, b: Readonly<Float64Array>): Float64Array {
  const x = Float64Array.from(b)
  for (let i = 0; i < n; i++) {
    let rest = at(x, i)
    for (let k = 0; k < i; k++) rest -= at(lower, i * n + k) * at(x, k)
    x[i] = rest / at(lower, i * n + i)
  }
  for (let i = n - 1; i >= 0; i--) {
    const known = at(x, i) / at(lower, i * n + i)
    x[i] = known
    for (let k = 0; k < i; k++) x[k] = at(x, k) - at(lower, i * n + k) * known
  }
  return x
}

const at = (numbers: Readonly<Float64Array>, i: number): number => numbers[i] ?? Number.NaN
