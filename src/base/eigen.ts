/** Eigenvalues and eigenvectors of a symmetric matrix. */

export interface Eigen {
  /** Ascending. */
  readonly values: Float64Array
  /** Row m is the unit vector of value m. */
  readonly vectors: Float64Array
}

/**
 * All eigenvalues and eigenvectors of a symmetric matrix, repeated and zero ones among them: the vectors of a
 * repeated value span its space and stand square to each other.
 *
 * The matrix is brought to three diagonals by reflections, and these to one by rotations (the implicit QR
 * iteration with Wilkinson's shift). The error of a value is some units in the last place of the largest one.
 *
 * @param matrix n × n, row by row; only its lower half is read
 * @source Golub and Van Loan, Matrix Computations, algorithms of the symmetric eigenvalue problem (unchecked)
 */
export function symmetricEigen(matrix: Readonly<Float64Array>, n: number): Eigen {
  const diagonals = tridiagonal(matrix, n)
  rotateToDiagonal(diagonals, n)
  const { d, rows } = diagonals
  const order = Array.from({ length: n }, (_, i) => i).sort((a, b) => at(d, a) - at(d, b))
  const vectors = new Float64Array(n * n)
  order.forEach((from, to) => {
    vectors.set(rows.subarray(from * n, (from + 1) * n), to * n)
  })
  return { values: Float64Array.from(order, i => at(d, i)), vectors }
}

const at = (numbers: Readonly<Float64Array>, i: number): number => numbers[i] ?? Number.NaN

/** Two diagonals of a symmetric matrix, and the rows of the transform that led to them. */
interface Tridiagonal {
  readonly d: Float64Array
  readonly e: Float64Array
  readonly rows: Float64Array
}

function tridiagonal(matrix: Readonly<Float64Array>, n: number): Tridiagonal {
  const a = Float64Array.from(matrix)
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) a[j * n + i] = at(a, i * n + j)
  const rows = new Float64Array(n * n)
  for (let i = 0; i < n; i++) rows[i * n + i] = 1
  const e = new Float64Array(Math.max(0, n - 1))
  // The vector of reflection k is kept for the transform: all of them, one a row.
  const mirrors = new Float64Array(n * n)
  const scales = new Float64Array(n)
  const p = new Float64Array(n)
  for (let k = 0; k + 2 < n; k++) {
    const v = mirrors.subarray(k * n, (k + 1) * n)
    let length = 0
    for (let i = k + 1; i < n; i++) length += at(a, i * n + k) ** 2
    length = Math.sqrt(length)
    const head = at(a, (k + 1) * n + k)
    if (length === Math.abs(head)) {
      e[k] = head
      continue
    }
    const end = head > 0 ? -length : length
    e[k] = end
    for (let i = k + 1; i < n; i++) v[i] = at(a, i * n + k)
    v[k + 1] = head - end
    const beta = 1 / (length * (length + Math.abs(head)))
    scales[k] = beta
    reflect(a, n, k + 1, v, beta, p)
  }
  if (n > 1) e[n - 2] = at(a, (n - 1) * n + n - 2)
  for (let k = n - 3; k >= 0; k--) transform(rows, n, k + 1, mirrors.subarray(k * n, (k + 1) * n), at(scales, k))
  return { d: Float64Array.from({ length: n }, (_, i) => at(a, i * n + i)), e, rows }
}

/** A ← H A H over the rows and columns from `first` on, where H = I − β v vᵀ. */
function reflect(a: Float64Array, n: number, first: number, v: Float64Array, beta: number, p: Float64Array): void {
  let half = 0
  for (let i = first; i < n; i++) {
    let sum = 0
    for (let j = first; j < n; j++) sum += at(a, i * n + j) * at(v, j)
    p[i] = beta * sum
    half += at(p, i) * at(v, i)
  }
  half *= beta / 2
  for (let i = first; i < n; i++) p[i] = at(p, i) - half * at(v, i)
  for (let i = first; i < n; i++) {
    const [vi, pi] = [at(v, i), at(p, i)]
    for (let j = first; j < n; j++) a[i * n + j] = at(a, i * n + j) - vi * at(p, j) - pi * at(v, j)
  }
}

/** The transposed transform after one more reflection on its far side: Qᵀ ← Qᵀ H, row by row. */
function transform(rows: Float64Array, n: number, first: number, v: Float64Array, beta: number): void {
  if (beta === 0) return
  for (let i = first; i < n; i++) {
    let sum = 0
    for (let j = first; j < n; j++) sum += at(rows, i * n + j) * at(v, j)
    sum *= beta
    for (let j = first; j < n; j++) rows[i * n + j] = at(rows, i * n + j) - sum * at(v, j)
  }
}

/** Off the diagonal, less than this share of its neighbours is their rounding: the matrix falls in two there. */
const NEGLIGIBLE = Number.EPSILON
/** Steps that one value may need; two or three are usual. */
const STEPS = 60

function rotateToDiagonal({ d, e, rows }: Tridiagonal, n: number): void {
  let norm = 0
  for (let i = 0; i < n; i++) norm = Math.max(norm, Math.abs(at(d, i)) + (i + 1 < n ? Math.abs(at(e, i)) : 0))
  const floor = norm * NEGLIGIBLE * NEGLIGIBLE
  const parted = (i: number): boolean =>
    Math.abs(at(e, i)) <= NEGLIGIBLE * (Math.abs(at(d, i)) + Math.abs(at(d, i + 1))) + floor
  let steps = 0
  for (let last = n - 1; last > 0; ) {
    if (parted(last - 1)) {
      last--
      continue
    }
    let first = last - 1
    while (first > 0 && !parted(first - 1)) first--
    chase(d, e, rows, n, first, last)
    steps++
    if (steps > STEPS * n) throw new Error('the eigenvalues of a symmetric matrix did not settle')
  }
}

/** One step of the iteration on a block that no zero parts. */
function chase(d: Float64Array, e: Float64Array, rows: Float64Array, n: number, first: number, last: number): void {
  const [half, off] = [(at(d, last - 1) - at(d, last)) / 2, at(e, last - 1)]
  const root = Math.sqrt(half * half + off * off)
  const shift = at(d, last) - (off * off) / (half + (half < 0 ? -root : root))
  let x = at(d, first) - shift
  let z = at(e, first)
  for (let k = first; k < last; k++) {
    const r = Math.sqrt(x * x + z * z)
    const [c, s] = r === 0 ? [1, 0] : [x / r, z / r]
    if (k > first) e[k - 1] = r
    const [a, b, g] = [at(d, k), at(e, k), at(d, k + 1)]
    d[k] = c * c * a + 2 * c * s * b + s * s * g
    d[k + 1] = s * s * a - 2 * c * s * b + c * c * g
    e[k] = c * s * (g - a) + (c * c - s * s) * b
    if (k + 1 < last) {
      x = at(e, k)
      z = s * at(e, k + 1)
      e[k + 1] = c * at(e, k + 1)
    }
    rotate(rows, n, k, c, s)
  }
}

function rotate(rows: Float64Array, n: number, k: number, c: number, s: number): void {
  const [one, two] = [rows.subarray(k * n, (k + 1) * n), rows.subarray((k + 1) * n, (k + 2) * n)]
  for (let i = 0; i < n; i++) {
    const [p, q] = [at(one, i), at(two, i)]
    one[i] = c * p + s * q
    two[i] = c * q - s * p
  }
}
