/** Walls that run through several storeys, against closed forms of beam theory and against a general library. */
import { inverse, Matrix } from 'ml-matrix'
import { describe, expect, test } from 'vitest'
import {
  type ByStorey,
  drifts,
  imbalance,
  levelMovements,
  type Stack,
  stackOf,
  storeyShears,
  type Tie,
  wallForces,
} from '../../src/compute/stack.ts'
import { cantilever, type Section, storeyStiffness } from '../../src/compute/upright.ts'
import { closeTo } from '../support/agrees.ts'
import { randomFrom } from '../support/random.ts'

const of = (values: Readonly<Float64Array>, i: number): number => values[i] ?? Number.NaN

function ready(storeys: number, ties: readonly Tie[]): Stack {
  const made = stackOf(storeys, ties)
  if (!made.ok) throw new Error(`storey ${made.because.storey} is loose`)
  return made.value
}

/** Walls along y, far apart, that hold what a wall along x leaves loose and take nothing of a force along x through the axis. */
const holding = (storeys: number): readonly Tie[] =>
  [-10, 10].flatMap(r =>
    Array.from({ length: storeys }, (_, storey): Tie => ({ kind: 'storey', storey, k: 1e9, c: 0, s: 1, r })),
  )

const alike = (storeys: number, section: Section): readonly Section[] => Array.from({ length: storeys }, () => section)

/** Levels' movements along x under forces along x. */
function pushed(stack: Stack, forces: readonly number[]): { readonly u: readonly number[]; readonly drift: ByStorey } {
  const levels = Float64Array.from({ length: 3 * stack.storeys }, (_, i) => (i % 3 === 0 ? (forces[i / 3] ?? 0) : 0))
  const drift = drifts(stack, storeyShears(levels))
  const moved = levelMovements(drift)
  return { u: forces.map((_, i) => of(moved, 3 * i)), drift }
}

describe('one cantilever', () => {
  // Beam theory: under a load P at height a the beam at z ≤ a has moved P z² (3a − z)/6EI, and by shear P z/GA; above a
  // it is straight.
  const flexural = (P: number, a: number, z: number, EI: number) =>
    z <= a ? (P * z * z * (3 * a - z)) / (6 * EI) : (P * a * a * (3 * z - a)) / (6 * EI)

  test.each([
    ['slender', 1, { h: 3, EI: 2e9, GA: 5e9 }],
    ['slender', 6, { h: 3, EI: 2e9, GA: 5e9 }],
    ['squat', 4, { h: 4, EI: 8e11, GA: 3e9 }],
    ['in flexure alone', 8, { h: 3.2, EI: 6e9, GA: Number.POSITIVE_INFINITY }],
  ])('%s, of %i storeys, moves as beam theory says under a load at any level', (_, storeys, section) => {
    const stack = ready(storeys, [
      { kind: 'continuous', wall: cantilever(alike(storeys, section)), c: 1, s: 0, r: 0 },
      ...holding(storeys),
    ])
    for (let loaded = 0; loaded < storeys; loaded++) {
      const forces = Array.from({ length: storeys }, (_, i) => (i === loaded ? 1000 : 0))
      const a = (loaded + 1) * section.h
      const { u } = pushed(stack, forces)
      u.forEach((moved, i) => {
        const z = (i + 1) * section.h
        const expected = flexural(1000, a, z, section.EI) + (1000 * Math.min(a, z)) / section.GA
        closeTo(moved, expected, expected, 1e-10)
      })
    }
  })

  test('its moment at the foot of each storey is that of the loads above, and its shear their sum', () => {
    const section = { h: 3, EI: 2e9, GA: 5e9 }
    const tie: Tie = { kind: 'continuous', wall: cantilever(alike(5, section)), c: 1, s: 0, r: 0 }
    const stack = ready(5, [tie, ...holding(5)])
    const forces = [10, -20, 30, 5, 40]
    const { V, M } = wallForces(tie, pushed(stack, forces).drift)
    forces.forEach((_, i) => {
      const above = forces.slice(i)
      const shear = above.reduce((sum, F) => sum + F, 0)
      const moment = above.reduce((sum, F, j) => sum + F * 3 * (j + 1), 0)
      closeTo(of(V, i), shear, 65)
      closeTo(of(M, i), moment, 500)
    })
  })

  test('of storeys that differ it has the inverse of the flexibility that the unit-load integrals give', () => {
    const random = randomFrom(11)
    const sections = Array.from({ length: 9 }, () => ({
      h: 2.5 + 3 * random.share(),
      EI: 1e9 * (1 + 20 * random.share()),
      GA: 1e9 * (0.2 + 5 * random.share()),
    }))
    const n = sections.length
    const foot = sections.map((_, i) => sections.slice(0, i).reduce((sum, { h }) => sum + h, 0))
    const head = sections.map(({ h }, i) => (foot[i] ?? 0) + h)
    // Moment at z of a unit load at the head of storey i; Simpson's rule is exact for the product of two straight lines.
    const unit = (i: number, z: number) => Math.max(0, (head[i] ?? 0) - z)
    const flexibility = Matrix.zeros(n, n)
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++)
        sections.forEach(({ h, EI, GA }, at) => {
          if (at > Math.min(i, j)) return
          const [z0, z2] = [foot[at] ?? 0, head[at] ?? 0]
          const product = (z: number) => unit(i, z) * unit(j, z)
          const simpson = (h / 6) * (product(z0) + 4 * product((z0 + z2) / 2) + product(z2))
          flexibility.set(i, j, flexibility.get(i, j) + simpson / EI + h / GA)
        })
    const lateral = inverse(flexibility)
    // From drifts to movements of the levels: K = Bᵀ S B with B = 1 on the diagonal and −1 below it.
    const B = Matrix.eye(n)
    for (let i = 1; i < n; i++) B.set(i, i - 1, -1)
    const own = storeyStiffness(cantilever(sections))
    const S = new Matrix(Array.from({ length: n }, (_, i) => [...own.subarray(i * n, (i + 1) * n)]))
    const K = B.transpose().mmul(S).mmul(B)
    const size = Math.max(...K.to1DArray().map(Math.abs))
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) closeTo(K.get(i, j), lateral.get(i, j), size)
  })
})

/** A plan of walls in several directions that no force meets in its centre. */
const plan = [
  { c: 1, s: 0, r: 6, share: 1 },
  { c: 1, s: 0, r: -4, share: 2.5 },
  { c: 0, s: 1, r: 9, share: 1.7 },
  { c: 0, s: 1, r: -7, share: 0.8 },
  { c: 0.6, s: 0.8, r: 3, share: 1.2 },
]
const loadsOf = (storeys: number, F: readonly [number, number, number]): Float64Array =>
  Float64Array.from({ length: 3 * storeys }, (_, i) => (F[i % 3] ?? 0) * (1 + Math.floor(i / 3)))

describe('walls tied by rigid floors', () => {
  const storeys = 7
  const section = { h: 3.3, EI: 4e10, GA: 6e9 }
  const thick = (share: number): Section => ({ ...section, EI: share * section.EI, GA: share * section.GA })

  test('in pure shear share as storeys that are worked one by one', () => {
    const GA = (share: number, storey: number) => (share * 5e9) / (1 + 0.3 * storey)
    const continuous = ready(
      storeys,
      plan.map(({ share, ...line }): Tie => {
        // Flexure a billion times stiffer than shear.
        const wall = cantilever(
          Array.from({ length: storeys }, (_, i) => ({ h: 3, EI: 1e9 * GA(share, i), GA: GA(share, i) })),
        )
        return { kind: 'continuous', wall, ...line }
      }),
    )
    const single = ready(
      storeys,
      plan.flatMap(({ share, ...line }) =>
        Array.from(
          { length: storeys },
          (_, storey): Tie => ({ kind: 'storey', storey, k: GA(share, storey) / 3, ...line }),
        ),
      ),
    )
    const shears = storeyShears(loadsOf(storeys, [1e5, 4e4, 3e5]))
    const [a, b] = [drifts(continuous, shears), drifts(single, shears)]
    const apart = single.ties.map(tie => ({ tie, V: of(wallForces(tie, b).V, 0) }))
    continuous.ties.forEach(tie => {
      const { V } = wallForces(tie, a)
      V.forEach((shear, i) => {
        const same = apart.find(({ tie: other }) => other.kind === 'storey' && other.storey === i && other.r === tie.r)
        closeTo(shear, same?.V ?? Number.NaN, of(shears, 3 * i), 1e-6)
      })
    })
  })

  test('all alike take equal shares at every storey, whatever the heights and sections', () => {
    const sections = Array.from({ length: storeys }, (_, i) => ({ ...section, h: 3 + i / 4, EI: section.EI / (1 + i) }))
    const lines = [-6, -2, 2, 6].map(r => ({ c: 1, s: 0, r }))
    const ties = lines.map((line): Tie => ({ kind: 'continuous', wall: cantilever(sections), ...line }))
    const stack = ready(storeys, [...ties, ...holding(storeys)])
    const { drift } = pushed(stack, [1, 2, 3, 4, 5, 6, 7])
    for (const tie of ties)
      wallForces(tie, drift).V.forEach((V, i) => {
        const storey = [1, 2, 3, 4, 5, 6, 7].slice(i).reduce((sum, F) => sum + F, 0)
        closeTo(V, storey / 4, storey)
      })
  })

  test('in the same proportion of flexure to shear share by stiffness, at every storey alike', () => {
    const ties = [
      { c: 1, s: 0, r: 0, share: 1 },
      { c: 1, s: 0, r: 0, share: 3 },
    ].map(
      ({ share, ...line }): Tie => ({ kind: 'continuous', wall: cantilever(alike(storeys, thick(share))), ...line }),
    )
    const stack = ready(storeys, [...ties, ...holding(storeys)])
    const { drift } = pushed(
      stack,
      Array.from({ length: storeys }, () => 100),
    )
    const [one, three] = ties.map(tie => wallForces(tie, drift).V) as [Float64Array, Float64Array]
    one.forEach((V, i) => {
      closeTo(3 * V, of(three, i), 100 * storeys)
    })
  })

  test('balance every storey shear and torsion, to the last digits', () => {
    const stack = ready(
      storeys,
      plan.map(({ share, ...line }, w): Tie => {
        const wall = cantilever(alike(w === 3 ? 4 : storeys, { ...thick(share), EI: section.EI * share * (1 + w) }))
        return { kind: 'continuous', wall, ...line }
      }),
    )
    for (const F of [
      [1e5, 0, 0],
      [0, 1e5, 4e5],
      [3e4, -2e4, 1e6],
    ] as const) {
      const shears = storeyShears(loadsOf(storeys, F))
      const drift = drifts(stack, shears)
      expect(
        imbalance(
          stack,
          shears,
          stack.ties.map(tie => wallForces(tie, drift)),
        ),
      ).toBeLessThan(1e-12)
    }
  })

  test('agree with the same building put together as one frame by a general library', () => {
    const walls = plan.map(({ share, ...line }, w) => ({ line, height: w === 1 ? 5 : storeys, section: thick(share) }))
    const stack = ready(
      storeys,
      walls.map(
        ({ line, height, section: own }): Tie => ({
          kind: 'continuous',
          wall: cantilever(alike(height, own)),
          ...line,
        }),
      ),
    )
    const levels = loadsOf(storeys, [1e5, 4e4, 3e5])
    const moved = levelMovements(drifts(stack, storeyShears(levels)))
    // Lateral stiffness of each wall at the levels, as the inverse of its closed-form flexibility.
    const K = Matrix.zeros(3 * storeys, 3 * storeys)
    for (const {
      line,
      height,
      section: { h, EI, GA },
    } of walls) {
      const flexibility = Matrix.zeros(height, height)
      for (let i = 0; i < height; i++)
        for (let j = 0; j < height; j++) {
          const [low, high] = [h * (Math.min(i, j) + 1), h * (Math.max(i, j) + 1)]
          flexibility.set(i, j, (low * low * (3 * high - low)) / (6 * EI) + low / GA)
        }
      const lateral = inverse(flexibility)
      const q = [line.c, line.s, line.r]
      for (let i = 0; i < height; i++)
        for (let j = 0; j < height; j++)
          q.forEach((a, p) => {
            q.forEach((b, o) => {
              const [row, column] = [3 * i + p, 3 * j + o]
              K.set(row, column, K.get(row, column) + a * b * lateral.get(i, j))
            })
          })
    }
    const theirs = inverse(K)
      .mmul(Matrix.columnVector([...levels]))
      .to1DArray()
    const size = Math.max(...theirs.map(Math.abs))
    moved.forEach((value, i) => {
      closeTo(value, theirs[i] ?? Number.NaN, size, 1e-8)
    })
  })
})

describe('a wall that stops below the top', () => {
  const section = { h: 3, EI: 3e10, GA: 4e9 }
  const tall: Tie = { kind: 'continuous', wall: cantilever(alike(6, section)), c: 1, s: 0, r: 0 }
  const low: Tie = { kind: 'continuous', wall: cantilever(alike(2, { ...section, EI: 3e12 })), c: 1, s: 0, r: 0 }
  const { drift } = pushed(ready(6, [tall, low, ...holding(6)]), [100, 100, 100, 100, 100, 100])

  test('hands its share to the other at its head, and adds up with it below', () => {
    const [V, below] = [wallForces(tall, drift).V, wallForces(low, drift).V]
    for (let i = 0; i < 6; i++) closeTo(of(V, i) + (i < 2 ? of(below, i) : 0), 100 * (6 - i), 600)
  })

  test('holds the tall one back: under its head the tall wall takes less than above, or turns its shear round', () => {
    const { V, M } = wallForces(tall, drift)
    expect(of(V, 1)).toBeLessThan(of(V, 2) / 2)
    expect(of(M, 0)).toBeLessThan(of(M, 2))
    // The low wall then takes more than the whole storey shear less its share by stiffness.
    expect(of(wallForces(low, drift).V, 1)).toBeGreaterThan(300)
  })
})

describe('what nothing holds', () => {
  const wall = cantilever(alike(3, { h: 3, EI: 1e10, GA: 1e9 }))
  test('is found in its storey', () => {
    expect(stackOf(3, [{ kind: 'continuous', wall, c: 1, s: 0, r: 0 }])).toEqual({ ok: false, because: { storey: 0 } })
    const two = holding(2)
    expect(stackOf(3, [{ kind: 'continuous', wall, c: 1, s: 0, r: 0 }, ...two])).toEqual({
      ok: false,
      because: { storey: 2 },
    })
  })
})
