/** Modes of vibration against closed forms and a general library; their combination against closed forms. */
import { EigenvalueDecomposition, Matrix } from 'ml-matrix'
import { describe, expect, test } from 'vitest'
import { type FloorMass, type Mode, modesFor, modesOf } from '../../src/compute/modal.ts'
import { combine, correlation, quadratic, responseOf, sumOfSquares } from '../../src/compute/response.ts'
import { stackOf, storeyShears, type Tie, wallForces } from '../../src/compute/stack.ts'
import { cantilever } from '../../src/compute/upright.ts'
import { closeTo, halfUnitOf } from '../support/agrees.ts'
import { randomFrom } from '../support/random.ts'

const of = (values: Readonly<Float64Array>, i: number): number => values[i] ?? Number.NaN

function modes(ties: readonly Tie[], floors: readonly FloorMass[]): readonly Mode[] {
  const made = stackOf(floors.length, ties)
  if (!made.ok) throw new Error(`storey ${made.because.storey} is loose`)
  return modesOf(made.value, floors)
}

/** A floor of 100 t whose turning is far from its sway. */
const floor = (mass = 1e5): FloorMass => ({ mass, polar: 50 * mass, x: 0, y: 0 })

/** Storeys of stiffness k along x, ten times that along y, and stiff against turning: nothing couples. */
const shearBuilding = (k: readonly number[]): readonly Tie[] =>
  k.flatMap((each, storey): readonly Tie[] => [
    { kind: 'storey', storey, k: each, c: 1, s: 0, r: 0 },
    { kind: 'storey', storey, k: 5 * each, c: 0, s: 1, r: 30 },
    { kind: 'storey', storey, k: 5 * each, c: 0, s: 1, r: -30 },
  ])

const alongX = (all: readonly Mode[]): readonly Mode[] => all.filter(({ mass }) => mass.x > 1e-6 * 1e5)
const ratio = (found: number, expected: number, share: number) => {
  closeTo(found, expected, Math.abs(expected), share)
}

describe('shear buildings', () => {
  test('two equal storeys: ω² = (3 ∓ √5)/2 k/m, shapes 1 : 1.618 and 1 : −0.618', () => {
    const [first, second] = alongX(modes(shearBuilding([4e8, 4e8]), [floor(), floor()]))
    if (!first || !second) throw new Error('two modes were expected')
    ratio(first.omega2, ((3 - Math.sqrt(5)) / 2) * 4000, 1e-12)
    ratio(second.omega2, ((3 + Math.sqrt(5)) / 2) * 4000, 1e-12)
    ratio(of(first.shape, 3) / of(first.shape, 0), (1 + Math.sqrt(5)) / 2, 1e-10)
    ratio(of(second.shape, 3) / of(second.shape, 0), (1 - Math.sqrt(5)) / 2, 1e-10)
    // (1 + φ)²/(1 + φ²) of 2 m for the shape 1 : φ.
    const golden = (1 + Math.sqrt(5)) / 2
    ratio(first.mass.x / 1e5, (1 + golden) ** 2 / (1 + golden ** 2), 1e-10)
  })

  test.each([1, 5, 12, 60])('%i equal storeys: ω = 2 √(k/m) sin((2j − 1)π / (4n + 2))', n => {
    const found = alongX(
      modes(
        shearBuilding(Array.from({ length: n }, () => 4e8)),
        Array.from({ length: n }, () => floor()),
      ),
    )
    found.forEach(({ omega2 }, j) => {
      ratio(Math.sqrt(omega2), 2 * Math.sqrt(4000) * Math.sin(((2 * j + 1) * Math.PI) / (4 * n + 2)), 1e-9)
    })
    expect(found[0]?.residual).toBeLessThan(1e-12)
  })

  test('many storeys near a shear cantilever: periods 4H/c, a third and a fifth of it, masses 8/π², and a ninth of that', () => {
    const n = 60
    const floors = Array.from({ length: n }, (_, i) => floor(i === n - 1 ? 5e4 : 1e5))
    const found = alongX(modes(shearBuilding(Array.from({ length: n }, () => 4e8)), floors))
    // Waves run n storeys at √(k/m) storeys a second.
    const longest = (4 * n) / Math.sqrt(4000)
    ;[1, 3, 5].forEach((odd, j) => {
      ratio(found[j]?.period ?? Number.NaN, longest / odd, 1e-3 * odd)
      ratio((found[j]?.mass.x ?? Number.NaN) / (1e5 * (n - 0.5)), 8 / (Math.PI * odd) ** 2, 0.01 * odd)
    })
  })
})

describe('flexural walls', () => {
  test('sixty lumped masses near the beam of Euler and Bernoulli: βL = 1.87510, 4.69409, 7.85476; masses 61.3, 18.8, 6.5 %', () => {
    // Roots of cos x cosh x = −1, and 4 tan²…/… of the shapes: any text on the vibration of beams.
    const [n, h, EI, m] = [60, 3, 5e11, 1e5]
    const wall = cantilever(Array.from({ length: n }, () => ({ h, EI, GA: Number.POSITIVE_INFINITY })))
    const ties: readonly Tie[] = [
      { kind: 'continuous', wall, c: 1, s: 0, r: 0 },
      ...Array.from({ length: n }, (_, storey): readonly Tie[] => [
        { kind: 'storey', storey, k: 1e13, c: 0, s: 1, r: 30 },
        { kind: 'storey', storey, k: 1e13, c: 0, s: 1, r: -30 },
      ]).flat(),
    ]
    const floors = Array.from({ length: n }, (_, i) => floor(i === n - 1 ? m / 2 : m))
    const found = alongX(modes(ties, floors))
    ;[
      [1.8751041, 0.613],
      [4.6940911, 0.188],
      [7.8547574, 0.065],
    ].forEach(([root = 0, share = 0], j) => {
      const omega = (root ** 2 * Math.sqrt(EI / (m / h))) / (n * h) ** 2
      ratio(Math.sqrt(found[j]?.omega2 ?? Number.NaN), omega, 2e-3)
      closeTo((found[j]?.mass.x ?? Number.NaN) / (m * (n - 0.5)), share, 1, 0.006)
    })
    expect(found[0]?.residual).toBeLessThan(1e-10)
  })
})

describe('one floor that sways and turns', () => {
  test('an eccentric one has the two coupled frequencies of its quadratic', () => {
    // k along y at the distance e from the mass, torsional stiffness from two walls along x.
    const [k, e, m, radius] = [2e8, 3, 2e5, 7]
    const ties: readonly Tie[] = [
      { kind: 'storey', storey: 0, k, c: 0, s: 1, r: -e },
      { kind: 'storey', storey: 0, k: 1.5e8, c: 1, s: 0, r: 8 },
      { kind: 'storey', storey: 0, k: 1.5e8, c: 1, s: 0, r: -8 },
    ]
    const found = modes(ties, [{ mass: m, polar: m * radius ** 2, x: 0, y: 0 }])
    const turning = k * e * e + 2 * 1.5e8 * 64
    const [half, product] = [
      (k / m + turning / (m * radius ** 2)) / 2,
      (k * turning - (k * e) ** 2) / (m * m * radius ** 2),
    ]
    const coupled = found.filter(({ mass }) => mass.y > 1)
    ratio(coupled[0]?.omega2 ?? 0, half - Math.sqrt(half * half - product), 1e-10)
    ratio(coupled[1]?.omega2 ?? 0, half + Math.sqrt(half * half - product), 1e-10)
    closeTo(
      coupled.reduce((sum, { mass }) => sum + mass.y, 0),
      m,
      m,
    )
  })

  test('equal periods along x, along y and in turning are found three times', () => {
    const ties: readonly Tie[] = [-7, 7].flatMap((r): readonly Tie[] => [
      { kind: 'storey', storey: 0, k: 1e8, c: 1, s: 0, r },
      { kind: 'storey', storey: 0, k: 1e8, c: 0, s: 1, r },
    ])
    // 2 k along each axis and 4 k 7² against turning, so a radius of gyration of 7 √2 makes all alike.
    const found = modes(ties, [{ mass: 1e5, polar: 1e5 * 98, x: 0, y: 0 }])
    for (const { omega2 } of found) ratio(omega2, 2000, 1e-12)
    closeTo(
      found.reduce((sum, { mass }) => sum + mass.x, 0),
      1e5,
      1e5,
    )
    closeTo(
      found.reduce((sum, { mass }) => sum + mass.y, 0),
      1e5,
      1e5,
    )
  })
})

interface Tower {
  readonly ties: readonly Tie[]
  readonly floors: readonly FloorMass[]
}

/** A building without any symmetry: walls in all directions, some of one storey, some that stop, centres that wander. */
function tower(storeys: number, seed: number): Tower {
  const random = randomFrom(seed)
  const around = (half: number) => half * (2 * random.share() - 1)
  const line = () => {
    const angle = Math.PI * random.share()
    return { c: Math.cos(angle), s: Math.sin(angle), r: around(12) }
  }
  const ties = Array.from({ length: 14 }, (_, w): readonly Tie[] => {
    if (w % 4 === 3)
      return Array.from({ length: storeys }, (_, storey) => ({
        kind: 'storey',
        storey,
        k: 1e8 * (1 + random.share()),
        ...line(),
      }))
    const sections = Array.from({ length: w % 5 === 0 ? Math.ceil(storeys / 2) : storeys }, () => ({
      h: 3 + random.share(),
      EI: 1e10 * (1 + 9 * random.share()),
      GA: 1e9 * (1 + random.share()),
    }))
    return [{ kind: 'continuous', wall: cantilever(sections), ...line() }]
  }).flat()
  const floors = Array.from({ length: storeys }, () => {
    const mass = 1e5 * (1 + 4 * random.share())
    return { mass, polar: mass * (30 + 60 * random.share()), x: around(4), y: around(4) }
  })
  return { ties, floors }
}

describe('a tower without symmetry', () => {
  const { ties, floors } = tower(10, 3)
  const found = modes(ties, floors)
  const whole = floors.reduce((sum, { mass }) => sum + mass, 0)

  test('has the modes of M⁻¹ K as a general library finds them', () => {
    const n = 3 * floors.length
    const made = stackOf(floors.length, ties)
    if (!made.ok) throw new Error('loose')
    // Levels at their centres of mass → drifts of the storeys at the axis, as a matrix of its own.
    const B = Matrix.zeros(n, n)
    floors.forEach(({ x, y }, i) => {
      const R = [
        [1, 0, y],
        [0, 1, -x],
        [0, 0, 1],
      ]
      R.forEach((row, p) => {
        row.forEach((value, q) => {
          B.set(3 * i + p, 3 * i + q, value)
          if (i + 1 < floors.length) B.set(3 * i + 3 + p, 3 * i + q, -value)
        })
      })
    })
    const S = new Matrix(Array.from({ length: n }, (_, i) => [...made.value.stiffness.subarray(i * n, (i + 1) * n)]))
    const K = B.transpose().mmul(S).mmul(B)
    const roots = floors.flatMap(({ mass, polar }) => [mass, mass, polar]).map(Math.sqrt)
    const A = Matrix.zeros(n, n)
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) A.set(i, j, K.get(i, j) / ((roots[i] ?? 0) * (roots[j] ?? 0)))
    const theirs = new EigenvalueDecomposition(A, { assumeSymmetric: true }).realEigenvalues.sort((a, b) => a - b)
    found.forEach(({ omega2 }, m) => {
      closeTo(omega2, theirs[m] ?? Number.NaN, Math.max(theirs[m] ?? 0, 1e-6 * Math.max(...theirs)), 1e-7)
    })
  })

  test('takes all its mass along in its modes, along x and along y', () => {
    closeTo(
      found.reduce((sum, { mass }) => sum + mass.x, 0),
      whole,
      whole,
    )
    closeTo(
      found.reduce((sum, { mass }) => sum + mass.y, 0),
      whole,
      whole,
    )
    expect(modesFor(1, found)).toBe(found.length)
    const enough = modesFor(0.9, found)
    expect(enough).toBeGreaterThan(2)
    expect(enough).toBeLessThan(found.length)
  })

  test('has shapes square to each other by mass, and every mode answers its own inertia', () => {
    const inertia = floors.flatMap(({ mass, polar }) => [mass, mass, polar])
    found.forEach((a, m) => {
      found.slice(0, m + 1).forEach((b, other) => {
        const dot = inertia.reduce((sum, mass, i) => sum + mass * of(a.shape, i) * of(b.shape, i), 0)
        closeTo(dot, m === other ? 1 : 0, 1, 1e-11)
      })
    })
    for (const { residual } of found) expect(residual).toBeLessThan(1e-9)
  })

  test('vibrates alike about another axis, and turned in plan', () => {
    const [dx, dy, angle] = [17, -9, 0.4]
    const moved = modes(
      ties.map(tie => ({ ...tie, r: tie.r - (dx * tie.s - dy * tie.c) })),
      floors.map(each => ({ ...each, x: each.x - dx, y: each.y - dy })),
    )
    const turned = modes(
      ties.map(tie => ({
        ...tie,
        c: tie.c * Math.cos(angle) - tie.s * Math.sin(angle),
        s: tie.c * Math.sin(angle) + tie.s * Math.cos(angle),
      })),
      floors.map(each => ({
        ...each,
        x: each.x * Math.cos(angle) - each.y * Math.sin(angle),
        y: each.x * Math.sin(angle) + each.y * Math.cos(angle),
      })),
    )
    found.slice(0, 12).forEach(({ period, mass }, m) => {
      ratio(moved[m]?.period ?? 0, period, 1e-9)
      ratio(turned[m]?.period ?? 0, period, 1e-9)
      closeTo((turned[m]?.mass.x ?? 0) + (turned[m]?.mass.y ?? 0), mass.x + mass.y, whole)
    })
  })

  test('gives in each mode wall shears that balance the storey shears of its forces', () => {
    for (const mode of found.slice(0, 6)) {
      const response = responseOf(mode, floors, 'x', () => 3)
      const sums = new Float64Array(response.shears.length)
      for (const tie of ties) {
        const lowest = tie.kind === 'storey' ? tie.storey : 0
        wallForces(tie, response.drifts).V.forEach((V, i) => {
          const row = 3 * (lowest + i)
          ;[tie.c, tie.s, tie.r].forEach((q, p) => {
            sums[row + p] = of(sums, row + p) + V * q
          })
        })
      }
      const size = response.shears.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
      sums.forEach((sum, i) => {
        closeTo(sum, of(response.shears, i), size, 1e-8)
      })
    }
  })

  test('under one acceleration in all modes the forces of the modes add up to the whole mass times it', () => {
    const responses = found.map(mode => responseOf(mode, floors, 'y', () => 2.5))
    const base = responses.reduce((sum, { shears }) => sum + of(shears, 1), 0)
    closeTo(base, 2.5 * whole, 2.5 * whole)
    const across = responses.reduce((sum, { shears }) => sum + of(shears, 0), 0)
    closeTo(across, 0, 2.5 * whole)
  })
})

describe('putting modes together', () => {
  test('equal periods belong together whole, periods far apart not at all', () => {
    for (const zeta of [0.02, 0.05, 0.1]) closeTo(correlation(12, 12, zeta), 1, 1, 1e-15)
    expect(correlation(1, 1, 0)).toBe(1)
    expect(correlation(1, 2, 0)).toBe(0)
    expect(correlation(1, 20, 0.05)).toBeLessThan(3e-4)
    expect(correlation(1, Number.POSITIVE_INFINITY, 0.05)).toBe(0)
    expect(correlation(5, 7, 0.05)).toBe(correlation(7, 5, 0.05))
  })

  // Wilson, Three-Dimensional Static and Dynamic Analysis of Structures, four-storey building with its mass off centre,
  // damping 5 %: frequencies and coefficients (quoted from memory, unchecked).
  test.each([
    ['13.87', '13.93', '0.998'],
    ['13.87', '43.99', '0.006'],
    ['13.87', '54.42', '0.004'],
    ['43.99', '44.19', '0.998'],
    ['43.99', '54.42', '0.180'],
    ['44.19', '54.42', '0.186'],
  ])('%s and %s rad/s correlate by %s', (low, high, printed) => {
    // The frequencies are good to their last digit too: the coefficient lies between those of their two extremes.
    const of = (sign: number) =>
      correlation(Number(low) + sign * halfUnitOf(low), Number(high) - sign * halfUnitOf(high), 0.05)
    expect(of(1)).toBeGreaterThanOrEqual(Number(printed) - halfUnitOf(printed))
    expect(of(-1)).toBeLessThanOrEqual(Number(printed) + halfUnitOf(printed))
  })

  test('for periods far apart the complete combination is the root of the sum of squares', () => {
    const far = [1, 40, 1600].map((omega): Mode => ({ ...blank, omega2: omega ** 2 }))
    const responses = [3, 4, 12].map(r => Float64Array.of(r, -r))
    const [srss, cqc] = [combine(responses, sumOfSquares(far)), combine(responses, quadratic(far, 0.05))]
    for (const one of srss) closeTo(one, 13, 13)
    for (const one of cqc) closeTo(one, 13, 13, 1e-3)
  })

  test('for equal periods it is the sum with its signs, whichever way the shapes of the pair are taken', () => {
    const pair = [9, 9].map((omega): Mode => ({ ...blank, omega2: omega ** 2 }))
    closeTo(of(combine([Float64Array.of(3), Float64Array.of(-5)], quadratic(pair, 0.05)), 0), 2, 1)
    // A square plan: each direction of a pair of equal periods may stand for the two.
    const plan: readonly Tie[] = [-7, 7].flatMap((r): readonly Tie[] => [
      { kind: 'storey', storey: 0, k: 1e8, c: 1, s: 0, r },
      { kind: 'storey', storey: 0, k: 1e8, c: 0, s: 1, r },
    ])
    const floors = [floor()]
    const sway = modes(plan, floors).filter(({ mass }) => mass.x + mass.y > 1)
    expect(sway).toHaveLength(2)
    const turnedBy = (angle: number): readonly Mode[] =>
      [[Math.cos(angle), Math.sin(angle)] as const, [-Math.sin(angle), Math.cos(angle)] as const].map(
        ([c, s]): Mode => {
          const root = Math.sqrt(1e5)
          return {
            ...blank,
            omega2: 2000,
            shape: Float64Array.of(c / root, s / root, 0),
            participation: { x: c * root, y: s * root },
          }
        },
      )
    for (const angle of [0, 0.3, 1.1]) {
      const mine = turnedBy(angle)
      const shears = mine.map(mode => responseOf(mode, floors, 'x', () => 2).shears)
      closeTo(of(combine(shears, quadratic(mine, 0.05)), 0), 2e5, 2e5)
      closeTo(of(combine(shears, quadratic(mine, 0.05)), 1), 0, 2e5, 1e-7)
    }
  })

  test('a storey shear is combined from the storey shears of the modes, not from combined forces', () => {
    const floors = [floor(), floor(), floor()]
    const all = alongX(modes(shearBuilding([4e8, 4e8, 4e8]), floors))
    const responses = all.map(mode => responseOf(mode, floors, 'x', () => 3))
    const shears = combine(
      responses.map(({ shears }) => shears),
      sumOfSquares(all),
    )
    const forces = storeyShears(
      combine(
        responses.map(({ forces }) => forces),
        sumOfSquares(all),
      ),
    )
    expect(of(shears, 0)).toBeLessThan(0.95 * of(forces, 0))
    const root = Math.sqrt(responses.reduce((sum, { shears: own }) => sum + of(own, 0) ** 2, 0))
    closeTo(of(shears, 0), root, root)
  })
})

const blank: Mode = {
  period: 1,
  omega2: 1,
  shape: Float64Array.of(0, 0, 0),
  drifts: Float64Array.of(0, 0, 0),
  participation: { x: 0, y: 0 },
  mass: { x: 0, y: 0 },
  residual: 0,
}
