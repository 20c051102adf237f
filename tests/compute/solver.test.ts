/** Large and tall buildings against an independent solution. */
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { directionOf, middleOf, type PlanWall } from '../support/building.ts'
import { type Random, randomFrom } from '../support/random.ts'
import { type Reading, reading } from '../support/worked.ts'
import { type DenseWall, denseForces, type Load } from './dense.ts'

/** Lengths in m, stiffness in kN/mm, forces in kN, as the documents state them. */
const LARGE = 1e6

function randomWalls(random: Random, count: number, width: number, depth: number): readonly PlanWall[] {
  return Array.from({ length: count }, (_, i) => {
    const [x, y] = [width * random.share(), depth * random.share()]
    const angle = random.share() < 0.4 ? random.pick([0, Math.PI / 2]) : Math.PI * random.share()
    const half = 1 + 2 * random.share()
    const [dx, dy] = [half * Math.cos(angle), half * Math.sin(angle)]
    const inside = (value: number, most: number) => Math.min(most, Math.max(0, value))
    return {
      name: `N${i}`,
      from: { x: inside(x - dx, width), y: inside(y - dy, depth) },
      to: { x: inside(x + dx, width), y: inside(y + dy, depth) },
      k: 1 + 200 * random.share() ** 3,
    }
  })
}

const denseOf = (walls: readonly PlanWall[]): readonly DenseWall[] =>
  walls.map(wall => {
    const [{ x, y }, along] = [middleOf(wall), directionOf(wall)]
    return { x, y, c: along.x, s: along.y, k: wall.k * LARGE }
  })

const wallBlock = (level: string, walls: readonly PlanWall[]) =>
  [
    `\`\`\`walls ${level}`,
    '| wall | from | to | k |',
    '|---|---|---|---|',
    ...walls.map(
      ({ name, from, to, k }) => `| ${name} | ${from.x} m, ${from.y} m | ${to.x} m, ${to.y} m | ${k} kN/mm |`,
    ),
    '```',
  ].join('\n')

const areaBlock = (level: string, x1: number, x2: number, depth: number, load: number) =>
  [
    `\`\`\`areas ${level}`,
    '| area | from | to | load |',
    '|---|---|---|---|',
    `| F | ${x1} m, 0 m | ${x2} m, ${depth} m | ${load} kPa |`,
    '```',
  ].join('\n')

/** Wall forces in kN against the independent ones. */
function compare(read: Reading, level: string, caseName: string, walls: readonly PlanWall[], load: Load): void {
  const expected = denseForces(denseOf(walls), load)
  const scale = Math.hypot(load.Fx, load.Fy)
  walls.forEach(({ name }, i) => {
    closeTo(read.in(`${level}.wall.${name}.V.${caseName}`, 'kN') * 1000, expected[i] ?? Number.NaN, scale)
  })
}

describe('a floor of 1,000 walls', () => {
  const walls = randomWalls(randomFrom(2024), 1000, 120, 80)
  const text = [
    areaBlock('roof', 0, 120, 80, 6),
    wallBlock('roof', walls),
    '```forces roof\nx: 4000 kN\ny: 5000 kN\naccidental: 5%\n```',
  ].join('\n\n')
  const read = reading(text)
  // e = 5% of 120 m and of 80 m, about a centre of mass at (60, 40).
  const loads: Readonly<Record<string, Load>> = {
    EX: { Fx: 4e6, Fy: 0, M: -4e6 * 40 },
    'EX+': { Fx: 4e6, Fy: 0, M: -4e6 * 44 },
    'EX-': { Fx: 4e6, Fy: 0, M: -4e6 * 36 },
    EY: { Fx: 0, Fy: 5e6, M: 5e6 * 60 },
    'EY+': { Fx: 0, Fy: 5e6, M: 5e6 * 66 },
    'EY-': { Fx: 0, Fy: 5e6, M: 5e6 * 54 },
  }

  test.each(Object.entries(loads))('shears of case %s are those of an independent solution', (name, load) => {
    compare(read, 'roof', name, walls, load)
  })

  test('is in equilibrium to 1e-9 in every case, by the residual that it prints', () => {
    for (const name of Object.keys(loads)) expect(read.si(`roof.residual.ratio.${name}`)).toBeLessThan(1e-9)
  })
})

describe('a building of four levels, worked storey by storey', () => {
  interface Storey {
    readonly level: string
    readonly elevation: number
    /** Extent of its floor along x; all are 24 m deep. */
    readonly from: number
    readonly to: number
    readonly force: { readonly x: number; readonly y: number }
    readonly walls: readonly PlanWall[]
  }
  const random = randomFrom(77)
  // Each floor steps back from the one below, so that every centre of mass has a place of its own.
  const storeys: readonly Storey[] = ['roof', 'fourth', 'third', 'second'].map((level, i) => ({
    level,
    elevation: 15 - 3.6 * i,
    from: 6 - 2 * i,
    to: 30 + i,
    force: { x: 300 + 40 * i, y: 260 - 30 * i },
    walls: randomWalls(random, 9 + i, 24, 24).map(wall => ({
      ...wall,
      from: { x: wall.from.x + 6, y: wall.from.y },
      to: { x: wall.to.x + 6, y: wall.to.y },
    })),
  }))
  const share = 0.05
  const text = [
    // Levels may be listed in any order.
    '```levels',
    '| level | elevation |',
    '|---|---|',
    ...[...storeys]
      .sort((a, b) => (a.level < b.level ? -1 : 1))
      .map(({ level, elevation }) => `| ${level} | ${elevation} m |`),
    '```',
    '',
    ...storeys.flatMap(({ level, from, to, walls }) => [
      areaBlock(level, from, to, 24, 5),
      '',
      wallBlock(level, walls),
      '',
    ]),
    '```forces',
    'accidental: 5%',
    '| level | x | y |',
    '|---|---|---|',
    ...storeys.map(({ level, force }) => `| ${level} | ${force.x} kN | ${force.y} kN |`),
    '```',
  ].join('\n')
  const read = reading(text)

  /** What acts on a storey: the forces of its level and all above, each at its own centre of mass. */
  const loadOn = (at: number, axis: 'x' | 'y', side: number): Load => {
    const load = { Fx: 0, Fy: 0, M: 0 }
    for (const { from, to, force } of storeys.slice(0, at + 1)) {
      const [x, y] = [(from + to) / 2 + side * share * (to - from), 12 + side * share * 24]
      const F = force[axis] * 1000
      load[axis === 'x' ? 'Fx' : 'Fy'] += F
      load.M += axis === 'x' ? -F * y : F * x
    }
    return load
  }

  test.each(storeys.map(({ level }, i) => [level, i] as const))(
    'the shears of storey %s are those of an independent solution, in every case',
    (level, i) => {
      for (const [axis, letter] of [
        ['x', 'X'],
        ['y', 'Y'],
      ] as const)
        for (const [mark, side] of [
          ['', 0],
          ['+', 1],
          ['-', -1],
        ] as const)
          compare(read, level, `E${letter}${mark}`, storeys[i]?.walls ?? [], loadOn(i, axis, side))
    },
  )

  test('a storey carries the forces of its level and of all above', () => {
    storeys.forEach(({ level }, i) => {
      for (const axis of ['x', 'y'] as const) {
        const total = storeys.slice(0, i + 1).reduce((sum, { force }) => sum + force[axis], 0)
        closeTo(read.in(`${level}.storey.${axis}`, 'kN'), total, total)
        closeTo(read.in(`${level}.force.${axis}`, 'kN'), storeys[i]?.force[axis] ?? 0, total)
      }
    })
  })

  test('the torsion of a storey is the moment of those forces about its own centre of rigidity', () => {
    storeys.forEach(({ level }, i) => {
      const [x, y] = [read.in(`${level}.CR.x`, 'm'), read.in(`${level}.CR.y`, 'm')]
      for (const [name, axis, side] of [
        ['EX+', 'x', 1],
        ['EY-', 'y', -1],
        ['EY', 'y', 0],
      ] as const) {
        const { Fx, Fy, M } = loadOn(i, axis, side)
        const about = M - x * Fy + y * Fx
        closeTo(read.in(`${level}.T.${name}`, 'kN*m') * 1000, about, Math.abs(M))
      }
    })
  })

  test('wall forces of every storey add up to its shear and to that moment', () => {
    storeys.forEach(({ level, walls }, i) => {
      const { Fx, Fy, M } = loadOn(i, 'y', 1)
      const sums = { x: 0, y: 0, M: 0 }
      for (const { x, y, c, s, k: _, name } of denseOf(walls).map((wall, n) => ({
        ...wall,
        name: walls[n]?.name ?? '',
      }))) {
        const V = read.in(`${level}.wall.${name}.V.EY+`, 'kN') * 1000
        sums.x += V * c
        sums.y += V * s
        sums.M += V * (x * s - y * c)
      }
      closeTo(sums.x, Fx, Fy)
      closeTo(sums.y, Fy, Fy)
      closeTo(sums.M, M, Math.abs(M))
      for (const name of ['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'])
        expect(read.si(`${level}.residual.ratio.${name}`)).toBeLessThan(1e-9)
    })
  })
})
