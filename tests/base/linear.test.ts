/** Eigenvalues and linear equations against a general library of linear algebra (ml-matrix), and closed forms. */
import { EigenvalueDecomposition, Matrix, solve as solveDense } from 'ml-matrix'
import { describe, expect, test } from 'vitest'
import { factor, solve } from '../../src/base/cholesky.ts'
import { symmetricEigen } from '../../src/base/eigen.ts'
import { closeTo } from '../support/agrees.ts'
import { type Random, randomFrom } from '../support/random.ts'

/** Symmetric, with entries of −1 to 1. */
function randomSymmetric(random: Random, n: number): Float64Array {
  const a = new Float64Array(n * n)
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const value = 2 * random.share() - 1
      a[i * n + j] = value
      a[j * n + i] = value
    }
  return a
}

const rowsOf = (a: Float64Array, n: number): number[][] =>
  Array.from({ length: n }, (_, i) => [...a.subarray(i * n, (i + 1) * n)])

/** Vectors of unit length, square to each other, and A v = λ v. */
function expectVectors(a: Float64Array, n: number): void {
  const { values, vectors } = symmetricEigen(a, n)
  const size = Math.max(1e-300, ...a.map(Math.abs)) * n
  const v = (m: number, i: number) => vectors[m * n + i] ?? Number.NaN
  for (let m = 0; m < n; m++)
    for (let other = 0; other <= m; other++) {
      let dot = 0
      for (let i = 0; i < n; i++) dot += v(m, i) * v(other, i)
      closeTo(dot, m === other ? 1 : 0, 1, 1e-12)
    }
  for (let m = 0; m < n; m++)
    for (let i = 0; i < n; i++) {
      let product = 0
      for (let j = 0; j < n; j++) product += (a[i * n + j] ?? Number.NaN) * v(m, j)
      closeTo(product, (values[m] ?? Number.NaN) * v(m, i), size, 1e-13)
    }
}

describe('eigenvalues of a symmetric matrix', () => {
  test.each([1, 2, 3, 4, 7, 18, 60, 180])('of random entries, a side of %i, are those of the library', n => {
    const a = randomSymmetric(randomFrom(n), n)
    const ours = symmetricEigen(a, n).values
    const theirs = new EigenvalueDecomposition(new Matrix(rowsOf(a, n)), { assumeSymmetric: true }).realEigenvalues
    theirs.sort((x, y) => x - y)
    ours.forEach((value, i) => {
      closeTo(value, theirs[i] ?? Number.NaN, n, 1e-13)
    })
    expectVectors(a, n)
  })

  test('of a chain of equal springs are 2 − 2 cos(kπ/(n+1))', () => {
    const n = 40
    const a = new Float64Array(n * n)
    for (let i = 0; i < n; i++) {
      a[i * n + i] = 2
      if (i > 0) a[i * n + i - 1] = -1
      if (i + 1 < n) a[i * n + i + 1] = -1
    }
    symmetricEigen(a, n).values.forEach((value, i) => {
      closeTo(value, 2 - 2 * Math.cos(((i + 1) * Math.PI) / (n + 1)), 4, 1e-14)
    })
    expectVectors(a, n)
  })

  test('repeated ones have vectors square to each other: all ones but on the diagonal', () => {
    const n = 25
    const a = new Float64Array(n * n).fill(1)
    for (let i = 0; i < n; i++) a[i * n + i] = 3
    const { values } = symmetricEigen(a, n)
    for (const value of values.subarray(0, n - 1)) closeTo(value, 2, 1, 1e-12)
    closeTo(values[n - 1] ?? 0, n + 2, n)
    expectVectors(a, n)
  })

  test('zero ones are zero: a rank of two, nothing at all, and a diagonal', () => {
    const n = 12
    const random = randomFrom(5)
    const [p, q] = [0, 1].map(() => Float64Array.from({ length: n }, () => random.share())) as [
      Float64Array,
      Float64Array,
    ]
    const a = Float64Array.from({ length: n * n }, (_, at) => {
      const [i, j] = [Math.floor(at / n), at % n]
      return (p[i] ?? 0) * (p[j] ?? 0) + (q[i] ?? 0) * (q[j] ?? 0)
    })
    const { values } = symmetricEigen(a, n)
    for (const value of values.subarray(0, n - 2)) closeTo(value, 0, n, 1e-15)
    expectVectors(a, n)
    expect([...symmetricEigen(new Float64Array(9), 3).values]).toEqual([0, 0, 0])
    expect([...symmetricEigen(Float64Array.of(3, 0, 0, 0, -1, 0, 0, 0, 2), 3).values]).toEqual([-1, 2, 3])
  })
})

describe('equations with a positive definite matrix', () => {
  test.each([1, 3, 20, 120])('%i unknowns have the answer of the library', n => {
    const random = randomFrom(n + 1)
    const half = randomSymmetric(random, n)
    const a = new Float64Array(n * n)
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        let sum = i === j ? 1 : 0
        for (let k = 0; k < n; k++) sum += (half[i * n + k] ?? 0) * (half[j * n + k] ?? 0)
        a[i * n + j] = sum
      }
    const b = Float64Array.from({ length: n }, () => 2 * random.share() - 1)
    const made = factor(a, n)
    if (!made.ok) throw new Error(`pivot ${made.because}`)
    const theirs = solveDense(new Matrix(rowsOf(a, n)), Matrix.columnVector([...b])).to1DArray()
    solve(made.value, b).forEach((value, i) => {
      closeTo(value, theirs[i] ?? Number.NaN, 1, 1e-10)
    })
  })

  test('an unknown that nothing resists is named', () => {
    expect(factor(Float64Array.of(4, 2, 2, 1), 2)).toEqual({ ok: false, because: 1 })
    expect(factor(Float64Array.of(1, 0, 0, 0, 0, 0, 0, 0, 1), 3)).toEqual({ ok: false, because: 1 })
    expect(factor(Float64Array.of(1, 2, 2, 1), 2)).toEqual({ ok: false, because: 1 })
  })
})
