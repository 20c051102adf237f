/** Documents whose walls are continuous: the values of the page against an independent solution. */
import { inverse, Matrix } from 'ml-matrix'
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { type Reading, reading } from '../support/worked.ts'

interface GivenWall {
  readonly name: string
  readonly from: readonly [number, number]
  readonly to: readonly [number, number]
  /** The storeys through which it runs, from the lowest up. */
  readonly storeys: number
}

const E = 25e9
const nu = 0.2
const t = 0.2
/** Elevations of the levels in m, from the lowest up. */
const elevations = [3.6, 6.8, 10, 13.2]
const names = ['first', 'second', 'third', 'roof']

const plan: readonly GivenWall[] = [
  { name: 'S', from: [2, 0], to: [8, 0], storeys: 4 },
  { name: 'N', from: [6, 10], to: [9, 10], storeys: 4 },
  { name: 'W', from: [0, 2], to: [0, 7], storeys: 4 },
  { name: 'E', from: [16, 1], to: [16, 9], storeys: 2 },
  { name: 'D', from: [10, 3], to: [13, 7], storeys: 4 },
]

function documentOf(
  model: string,
  walls: readonly GivenWall[] = plan,
  extra: (level: number) => string = () => '',
): string {
  const rows = [...names.keys()].reverse()
  return [
    '---\nunits: SI\n---',
    [
      '```levels',
      `walls: ${model}`,
      '| level | elevation |',
      '|---|---|',
      ...rows.map(i => `| ${names[i]} | ${elevations[i]} m |`),
      '```',
    ].join('\n'),
    `\`\`\`construction C\nmaterial: section\nE: 25000 MPa\nnu: ${nu}\nt: 200 mm\nends: cantilever\n\`\`\``,
    ...rows.flatMap(i => [
      `\`\`\`areas ${names[i]}\n| area | from | to | load |\n|---|---|---|---|\n| F | 0 m, 0 m | 16 m, 10 m | ${5 + i} kPa |\n\`\`\``,
      [
        `\`\`\`walls ${names[i]}`,
        '| wall | from | to | height | construction |',
        '|---|---|---|---|---|',
        ...walls
          .filter(({ storeys }) => storeys > i)
          .map(({ name, from, to }) => `| ${name} | ${from[0]} m, ${from[1]} m | ${to[0]} m, ${to[1]} m | 3.2 m | C |`),
        '```',
      ].join('\n'),
      `\`\`\`forces ${names[i]}\nx: ${100 + 40 * i} kN\ny: ${80 + 30 * i} kN\naccidental: 5%\n\`\`\``,
      extra(i),
    ]),
  ].join('\n\n')
}

/** Lateral stiffness of every wall from the closed form of its flexibility, all levels in one matrix, by a general library. */
function independent(force: (level: number) => readonly [number, number, number]) {
  const n = elevations.length
  const K = Matrix.zeros(3 * n, 3 * n)
  const walls = plan.map(({ from, to, storeys, name }) => {
    const [dx, dy] = [to[0] - from[0], to[1] - from[1]]
    const L = Math.hypot(dx, dy)
    const [c, s] = [dx / L, dy / L]
    const r = ((from[0] + to[0]) / 2) * s - ((from[1] + to[1]) / 2) * c
    const [EI, GA] = [(E * t * L ** 3) / 12, ((E / (2 * (1 + nu))) * t * L) / 1.2]
    const flexibility = Matrix.zeros(storeys, storeys)
    for (let i = 0; i < storeys; i++)
      for (let j = 0; j < storeys; j++) {
        const [low, high] = [elevations[Math.min(i, j)] ?? 0, elevations[Math.max(i, j)] ?? 0]
        flexibility.set(i, j, (low * low * (3 * high - low)) / (6 * EI) + low / GA)
      }
    const lateral = inverse(flexibility)
    const q = [c, s, r]
    for (let i = 0; i < storeys; i++)
      for (let j = 0; j < storeys; j++)
        q.forEach((a, p) => {
          q.forEach((b, o) => {
            K.set(3 * i + p, 3 * j + o, K.get(3 * i + p, 3 * j + o) + a * b * lateral.get(i, j))
          })
        })
    return { name, q, lateral, storeys }
  })
  const loads = elevations.flatMap((_, i) => force(i))
  const moved = inverse(K).mmul(Matrix.columnVector(loads)).to1DArray()
  const at = (i: number) => moved[i] ?? Number.NaN
  /** Storey shears of a wall, from the lowest up. */
  const shears = new Map(
    walls.map(({ name, q, lateral, storeys }) => {
      const along = Array.from({ length: storeys }, (_, i) => q.reduce((sum, a, p) => sum + a * at(3 * i + p), 0))
      const forces = lateral.mmul(Matrix.columnVector(along)).to1DArray()
      return [name, forces.map((_, i) => forces.slice(i).reduce((sum, F) => sum + F, 0))] as const
    }),
  )
  return { moved, shears }
}

describe('a building of four levels with continuous walls', () => {
  const read: Reading = reading(documentOf('continuous'))
  // The areas are alike, so the centre of mass is at 8 m, 5 m; the mass moved toward positive y in EX+ takes the force to 5.5 m.
  const cases = {
    EX: independent(i => [1e3 * (100 + 40 * i), 0, -5 * 1e3 * (100 + 40 * i)]),
    'EX+': independent(i => [1e3 * (100 + 40 * i), 0, -5.5 * 1e3 * (100 + 40 * i)]),
    'EY-': independent(i => [0, 1e3 * (80 + 30 * i), (8 - 0.8) * 1e3 * (80 + 30 * i)]),
  }

  test.each(Object.entries(cases))(
    'in %s every wall has the shear that an independent solution gives it',
    (name, { shears }) => {
      for (const { name: wall, storeys } of plan)
        for (let i = 0; i < storeys; i++)
          closeTo(read.si(`${names[i]}.wall.${wall}.V.${name}`), shears.get(wall)?.[i] ?? Number.NaN, 1e6, 1e-8)
    },
  )

  test.each(Object.entries(cases))('in %s every centre of mass moves as there', (name, { moved }) => {
    elevations.forEach((_, i) => {
      const [u = 0, v = 0, turn = 0] = moved.slice(3 * i, 3 * i + 3)
      closeTo(read.si(`${names[i]}.moved.x.${name}`), u - 5 * turn, 0.01, 1e-8)
      closeTo(read.si(`${names[i]}.moved.y.${name}`), v + 8 * turn, 0.01, 1e-8)
      closeTo(read.si(`${names[i]}.moved.turn.${name}`), turn, 1e-3, 1e-8)
    })
  })

  test('moments add up down each wall, meet at each level, and hold the overturning of all walls along x', () => {
    for (const wall of ['S', 'N', 'D'])
      names.forEach((level, i) => {
        const [M, above] = [
          read.si(`${level}.wall.${wall}.M.EX`),
          i + 1 < names.length ? read.si(`${names[i + 1]}.wall.${wall}.M.EX`) : 0,
        ]
        const height = read.si(`${level}.height`)
        closeTo(M - above, read.si(`${level}.wall.${wall}.V.EX`) * height, 1e6)
        closeTo(read.si(`${level}.wall.${wall}.Mt.EX`), above, 1e6, 1e-8)
        expect(read.si(`${level}.meeting.EX`)).toBeLessThan(1e-9)
        expect(read.si(`${level}.residual.ratio.EX`)).toBeLessThan(1e-10)
      })
    // ΣM c at the foundation is Σ F z.
    const overturning = elevations.reduce((sum, z, i) => sum + 1e3 * (100 + 40 * i) * z, 0)
    const held = plan.reduce(
      (sum, { name }) => sum + read.si(`first.wall.${name}.M.EX`) * read.si(`first.wall.${name}.c`),
      0,
    )
    closeTo(held, overturning, overturning)
  })

  test('the design shear and the case that governs are those of the continuous walls', () => {
    const largest = Math.max(
      ...['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'].map(name => Math.abs(read.si(`third.wall.W.V.${name}`))),
    )
    closeTo(read.si('third.wall.W.V'), largest, largest)
  })

  test('each storey on its own stands beside it under names of its own', () => {
    const alone = reading(documentOf('storey by storey'))
    for (const wall of ['S', 'W', 'D'])
      for (const level of names) {
        const [own, beside] = [alone.si(`${level}.wall.${wall}.V.EY+`), read.value(`${level}.alone.wall.${wall}.V.EY+`)]
        closeTo(beside.si, own, 1e6)
        expect(beside.id).toBe(`${level}.alone.wall.${wall}.V.EY+`)
      }
    // The models differ where a wall bends through several storeys.
    expect(Math.abs(read.si('roof.wall.S.V.EX') - alone.si('roof.wall.S.V.EX'))).toBeGreaterThan(1e3)
    for (const id of [
      'roof.alone.W',
      'roof.alone',
      'roof.alone.wall.S.k',
      'roof.alone.alone.wall.S.V.EX',
      'roof.alone.height',
    ])
      expect(read.sheet.scope.lookup(id)).toBeUndefined()
    expect(alone.sheet.scope.lookup('roof.alone.wall.S.V.EX')).toBeUndefined()
    expect(alone.sheet.scope.lookup('roof.height')).toBeUndefined()
  })
})

describe('walls that are no cantilever', () => {
  test('walls of stated stiffness share as storey by storey', () => {
    const stated = (model: string) =>
      reading(
        documentOf(model)
          .replaceAll('| height | construction |', '| height | k |')
          .replaceAll(/\| 3\.2 m \| C \|/g, '| 3.2 m | 40 kN/mm |'),
      )
    const [one, other] = [stated('continuous'), stated('storey by storey')]
    for (const { name } of plan.slice(0, 3))
      for (const level of names)
        closeTo(one.si(`${level}.wall.${name}.V.EX+`), other.si(`${level}.wall.${name}.V.EX+`), 1e6)
    closeTo(one.si('third.drift.EX+'), other.si('third.drift.EX+'), 0.01)
  })

  test('openings soften the shear part, so that a storey on its own keeps its stiffness', () => {
    const opening = (i: number) =>
      i === 1
        ? '```openings second\n| wall | opening | left | sill | width | height |\n|---|---|---|---|---|---|\n| S | D | 2 m | 0 m | 1 m | 2.1 m |\n```'
        : ''
    const read = reading(documentOf('continuous', plan, opening))
    const [EI, GA, k] = ['EI', 'GA', 'k'].map(key => read.si(`second.wall.S.${key}`)) as [number, number, number]
    closeTo(1 / (3.2 ** 3 / (3 * EI) + 3.2 / GA), k, k)
    expect(GA).toBeLessThan(read.si('first.wall.S.GA'))
    expect(EI).toBe(read.si('first.wall.S.EI'))
  })
})

describe('what cannot be tied is told', () => {
  const faultsOf = (text: string) => {
    const found = reading(text).sheet.scope.lookup('first.wall.S.V.EX')
    return found && !found.ok ? found.because.map(({ rule, message }) => `${rule}: ${message}`) : []
  }
  test('a wall without one of its name below', () => {
    expect(
      faultsOf(
        documentOf('continuous').replace(
          /(walls third[\s\S]*?\| D \|[^\n]*\n)/,
          '$1| X | 3 m, 5 m | 6 m, 5 m | 3.2 m | C |\n',
        ),
      ),
    ).toEqual(['wall-without-foundation: wall X of third has no wall of its name at second to stand on'])
  })
  test('a wall that stands beside the line of the wall below', () => {
    expect(
      faultsOf(documentOf('continuous').replace('| N | 6 m, 10 m | 9 m, 10 m |', '| N | 6 m, 9.5 m | 9 m, 9.5 m |')),
    ).toEqual(['wall-out-of-line: wall N of roof is not in line with the wall of its name at third'])
  })
  test('a wall on one of stated stiffness', () => {
    const text = documentOf('continuous')
      .replace(
        '```walls first\n| wall | from | to | height | construction |\n|---|---|---|---|---|',
        '```walls first\n| wall | from | to | height | construction | k |\n|---|---|---|---|---|---|',
      )
      .replace(/(walls first[\s\S]*?\| N [^\n]*?)\| C \|/, '$1| | 50 kN/mm |')
    expect(faultsOf(text)[0]).toBe('wall-without-foundation: wall N of second stands on a wall of stated stiffness')
  })
  test('a model that there is not', () => {
    expect(faultsOf(documentOf('coupled'))).toEqual(['unknown-wall-model: walls cannot be coupled'])
  })
})
