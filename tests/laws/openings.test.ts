/** Laws of walls with openings, by strips and piers. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { auditSteps } from '../../src/explain/audit.ts'
import { closeTo } from '../support/agrees.ts'
import { type Reading, reading } from '../support/worked.ts'

const runs = { numRuns: 60, seed: 4181 }

interface Hole {
  readonly left: number
  readonly sill: number
  readonly width: number
  readonly height: number
}

interface Wall {
  readonly length: number
  readonly height: number
  readonly ends: 'cantilever' | 'fixed'
  readonly shear: string
  readonly holes: readonly Hole[]
}

/** Lengths are given in millimetres, so that they read back as they were made. */
const mm = (metres: number): string => `${Math.round(metres * 1000)} mm`

function documentOf({ length, height, ends, shear, holes }: Wall, extraWalls: readonly string[] = []): string {
  return `
\`\`\`areas roof
| area | from | to | load |
|---|---|---|---|
| F | 0 m, 0 m | ${mm(length)}, 12 m | 4 kPa |
\`\`\`

\`\`\`construction B
material: section
E: 9000 MPa
t: 200 mm
ends: ${ends}
${shear}
\`\`\`

\`\`\`walls roof
| wall | from | to | height | construction |
|---|---|---|---|---|
| W | 0 m, 0 m | ${mm(length)}, 0 m | ${mm(height)} | B |
| N | 0 m, 12 m | ${mm(length)}, 12 m | ${mm(height)} | B |
| E | 0 m, 0 m | 0 m, 12 m | ${mm(height)} | B |
${extraWalls.join('\n')}
\`\`\`
${holes.length === 0 ? '' : openingsOf(holes)}
\`\`\`forces roof
x: 100 kN
y: 100 kN
\`\`\`
`
}

const openingsOf = (holes: readonly Hole[]): string =>
  [
    '',
    '```openings roof',
    '| wall | opening | left | sill | width | height |',
    '|---|---|---|---|---|---|',
    ...holes.map(
      ({ left, sill, width, height }, i) =>
        `| W | O${i + 1} | ${mm(left)} | ${mm(sill)} | ${mm(width)} | ${mm(height)} |`,
    ),
    '```',
    '',
  ].join('\n')

const stiffness = (wall: Wall): number => reading(documentOf(wall)).si('roof.wall.W.k')
const solid = (wall: Wall): number => stiffness({ ...wall, holes: [] })
const apart = (a: number, b: number): number => Math.abs(a - b) / Math.abs(a)

/** k, or undefined where the arrangement cannot be cut into strips. */
function stiffnessIfAny(wall: Wall): number | undefined {
  const found = reading(documentOf(wall)).sheet.scope.lookup('roof.wall.W.k')
  return found?.ok && 'si' in found.value ? found.value.si : undefined
}

const share = fc.double({ min: 0, max: 1, noNaN: true })
const round = (metres: number): number => Math.round(metres * 1000) / 1000

/**
 * A wall with openings in bays of its own, each with a pier on either side: doors and windows whose heads are in line, and
 * windows of lesser height below that line.
 */
const walls: fc.Arbitrary<Wall> = fc
  .record({
    length: fc.integer({ min: 6, max: 40 }),
    height: fc.integer({ min: 3, max: 6 }),
    ends: fc.constantFrom('cantilever' as const, 'fixed' as const),
    shear: fc.constantFrom('', 'nu: 0.2', 'G: 2500 MPa'),
    head: fc.double({ min: 0.5, max: 0.9, noNaN: true }),
    bays: fc.array(fc.record({ from: share, wide: share, sill: share, below: share, door: fc.boolean() }), {
      minLength: 1,
      maxLength: 5,
    }),
  })
  .map(({ length, height, ends, shear, head, bays }) => {
    const bay = length / bays.length
    const top = round(height * head)
    const holes = bays.map(({ from, wide, sill, below, door }, i): Hole => {
      const width = round(bay * (0.1 + 0.6 * wide))
      const left = round(i * bay + 0.1 * bay + from * (0.8 * bay - width))
      if (i === 0 || door) return { left, sill: 0, width, height: top }
      const low = round(top * (0.1 + 0.4 * sill))
      const high = round((top - low) * (0.3 + 0.7 * below))
      return { left, sill: low, width, height: high }
    })
    return { length, height, ends, shear, holes }
  })

describe('a wall with openings', () => {
  test('is never as stiff as the solid wall', () => {
    fc.assert(
      fc.property(walls, wall => {
        expect(stiffness(wall)).toBeLessThan(solid(wall))
      }),
      runs,
    )
  })

  test('is never stiffened by an opening that grows, to either side or in height', () => {
    const grown = fc.record({ wall: walls, which: share, left: share, right: share, up: share, down: share })
    let compared = 0
    fc.assert(
      fc.property(grown, ({ wall, which, left, right, up, down }) => {
        const at = Math.floor(which * wall.holes.length * 0.999)
        const hole = wall.holes[at]
        if (!hole) throw new Error('a wall has an opening')
        const bay = wall.length / wall.holes.length
        const [low, high] = [hole.sill, hole.sill + hole.height]
        const a = round(hole.left - left * (hole.left - at * bay) * 0.9)
        const b = round(hole.left + hole.width + right * ((at + 1) * bay - hole.left - hole.width) * 0.9)
        const z1 = round(low * (1 - down))
        const z2 = round(high + up * 0.5 * (wall.height - high))
        const larger = { left: a, sill: z1, width: round(b - a), height: round(z2 - z1) }
        const after = stiffnessIfAny({ ...wall, holes: wall.holes.map(each => (each === hole ? larger : each)) })
        if (after === undefined) return
        compared++
        expect(after).toBeLessThanOrEqual(stiffness(wall) * (1 + 1e-12))
      }),
      { ...runs, numRuns: 150 },
    )
    expect(compared).toBeGreaterThan(40)
  })

  test('and its mirror image are equally stiff', () => {
    fc.assert(
      fc.property(walls, wall => {
        const holes = wall.holes.map(hole => ({ ...hole, left: round(wall.length - hole.left - hole.width) }))
        closeTo(stiffness({ ...wall, holes }), stiffness(wall), stiffness(wall))
      }),
      runs,
    )
  })

  test('does not mind the order in which they are stated', () => {
    fc.assert(
      fc.property(walls, wall => {
        expect(stiffness({ ...wall, holes: [...wall.holes].reverse() })).toBe(stiffness(wall))
      }),
      runs,
    )
  })

  test('is the solid wall where the height of its openings goes to nothing', () => {
    fc.assert(
      fc.property(walls, wall => {
        const holes = wall.holes.map((hole, i) => ({ ...hole, sill: 0.5 + 0.002 * i, height: 0.001 }))
        expect(apart(stiffness({ ...wall, holes }), solid(wall))).toBeLessThan(0.02)
      }),
      runs,
    )
  })

  test('is softer than the solid wall even where the width of an opening goes to nothing, since piers are worked apart', () => {
    // One slot of a millimetre, half the height of a wall of 8 m by 4 m, at 3 m: Et/k by hand.
    const wall: Wall = {
      length: 8,
      height: 4,
      ends: 'cantilever',
      shear: '',
      holes: [{ left: 3, sill: 1, width: 0.001, height: 2 }],
    }
    const f = (ratio: number) => ratio ** 3 + 3 * ratio
    const pier = 1 / (1 / f(2 / 3) + 1 / f(2 / 4.999))
    const by = 4 * (4 / 8) ** 3 + 3 * (4 / 8) - f(2 / 8) + pier
    closeTo((9000e6 * 0.2) / stiffness(wall), by, by)
    expect(stiffness(wall)).toBeLessThan(0.98 * solid(wall))
  })

  test('parted by openings of full height is as stiff as its pieces as walls of their own', () => {
    const pieces = fc.record({
      wall: walls,
      gap: fc.double({ min: 0.2, max: 0.5, noNaN: true }),
    })
    fc.assert(
      fc.property(pieces, ({ wall, gap }) => {
        const { length, height } = wall
        const [a, b] = [round(length * gap), round(length * gap + 1)]
        const parted = reading(
          documentOf({ ...wall, holes: [{ left: a, sill: 0, width: 1, height }] }, [
            `| A | 0 m, 6 m | ${mm(a)}, 6 m | ${mm(height)} | B |`,
            `| Z | ${mm(b)}, 6 m | ${mm(length)}, 6 m | ${mm(height)} | B |`,
          ]),
        )
        const k = parted.si('roof.wall.W.k')
        closeTo(k, parted.si('roof.wall.A.k') + parted.si('roof.wall.Z.k'), k)
      }),
      runs,
    )
  })

  test('by hand: a door, and a window in the pier beside it', () => {
    const wall: Wall = {
      length: 10,
      height: 3.5,
      ends: 'cantilever',
      shear: '',
      holes: [
        { left: 2, sill: 0, width: 1, height: 2.4 },
        { left: 5, sill: 0.9, width: 2, height: 1.5 },
      ],
    }
    const f = (ratio: number) => ratio ** 3 + 3 * ratio
    const window = 1 / (1 / f(1.5 / 2) + 1 / f(1.5 / 3))
    const right = f(2.4 / 7) - f(1.5 / 7) + window
    const piers = 1 / (1 / f(2.4 / 2) + 1 / right)
    const by = 4 * 0.35 ** 3 + 3 * 0.35 - f(0.24) + piers
    closeTo((9000e6 * 0.2) / stiffness(wall), by, by)
  })
})

describe('the shear of a wall with openings', () => {
  const sumsOf = ({ sheet, si }: Reading): readonly (readonly [number, number])[] => {
    const cut = sheet.levels[0]?.pierced('W')
    if (!cut?.ok || !cut.value) throw new Error('the wall has openings')
    return cut.value.strips.map(({ of, parts }) => [
      si(of === undefined ? 'roof.wall.W.V' : `roof.wall.W.pier.${of}.V`),
      parts.rows.reduce((sum, row) => sum + si(`roof.wall.W.pier.${row}.V`), 0),
    ])
  }

  test('is shared out whole in every strip, and every line of the work holds', () => {
    fc.assert(
      fc.property(walls, wall => {
        const read = reading(documentOf(wall))
        const sums = sumsOf(read)
        expect(sums.length).toBeGreaterThan(0)
        for (const [carried, sum] of sums) closeTo(sum, carried, carried)
        const { broken } = auditSteps([read.value('roof.wall.W.k'), read.value('roof.wall.W.pier.P1.V')])
        expect(broken).toEqual([])
      }),
      runs,
    )
  })
})
