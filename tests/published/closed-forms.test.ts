/** Closed forms of mechanics and geometry, worked here by other means than the formulas under test. */
import { describe, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'

const KSI = 6_894_757.293168361
const FOOT = 0.3048

/** Deflection of a wall under a unit force by beam theory: flexure with I = t L³/12, shear with A = t L and factor 1.2. */
function deflection(ends: 'cantilever' | 'fixed', h: number, L: number, t: number, E: number, G: number): number {
  const inertia = (t * L ** 3) / 12
  return h ** 3 / ((ends === 'cantilever' ? 3 : 12) * E * inertia) + (1.2 * h) / (G * t * L)
}

function wallStiffness(settings: string, h: number, L: number): number {
  const text = [
    '```areas roof\n| area | from | to | load |\n|---|---|---|---|\n| F | 0 ft, 0 ft | 60 ft, 60 ft | 50 psf |\n```',
    `\`\`\`construction S\nmaterial: section\nE: 1000 ksi\nt: 8 in\n${settings}\n\`\`\``,
    `\`\`\`walls roof\n| wall | from | to | height | construction |\n|---|---|---|---|---|\n| P | 0 ft, 0 ft | ${L} ft, 0 ft | ${h} ft | S |\n\`\`\``,
  ].join('\n\n')
  return reading(text).si('roof.wall.P.k')
}

const E = 1000 * KSI
const t = (8 / 12) * FOOT

describe('a rectangular wall by beam theory', () => {
  const ratios = [0.1, 0.25, 0.5, 0.8, 1, 1.5, 2, 3, 5, 10]

  test.each(['cantilever', 'fixed'] as const)('a pier table, %s, with G = 0.4 E', ends => {
    for (const ratio of ratios) {
      const k = 1 / deflection(ends, ratio * 10 * FOOT, 10 * FOOT, t, E, 0.4 * E)
      closeTo(wallStiffness(`ends: ${ends}`, ratio * 10, 10), k, k)
    }
  })

  test.each(['cantilever', 'fixed'] as const)('the same, %s, with a stated G and with Poisson’s ratio', ends => {
    for (const ratio of ratios) {
      const [h, L] = [ratio * 10 * FOOT, 10 * FOOT]
      const stated = 1 / deflection(ends, h, L, t, E, 420 * KSI)
      closeTo(wallStiffness(`ends: ${ends}\nG: 420 ksi`, ratio * 10, 10), stated, stated)
      const poisson = 1 / deflection(ends, h, L, t, E, E / (2 * (1 + 0.2)))
      closeTo(wallStiffness(`ends: ${ends}\nnu: 0.2`, ratio * 10, 10), poisson, poisson)
    }
  })

  test('a squat wall is all shear, G A / (1.2 h), whatever its ends', () => {
    for (const ends of ['cantilever', 'fixed']) {
      const shear = (0.4 * E * t * 50 * FOOT) / (1.2 * 0.05 * FOOT)
      closeTo(wallStiffness(`ends: ${ends}`, 0.05, 50), shear, shear, 1e-5)
    }
  })

  test('a slender wall is all flexure: 3 E I / h³, and four times that with both ends held', () => {
    const [h, L] = [50, 0.1]
    const flexure = (3 * E * t * (L * FOOT) ** 3) / 12 / (h * FOOT) ** 3
    closeTo(wallStiffness('ends: cantilever', h, L), flexure, flexure, 1e-5)
    closeTo(wallStiffness('ends: fixed', h, L), 4 * flexure, 4 * flexure, 2e-5)
  })

  test('stiffness goes with the thickness and, the shape kept, not with the size', () => {
    const k = wallStiffness('ends: cantilever', 9, 12)
    closeTo(wallStiffness('ends: cantilever', 18, 24), k, k)
  })
})

describe('a square held by four equal walls on its sides', () => {
  const side = 40
  const square = (k: string, force: string) =>
    reading(
      [
        `\`\`\`areas roof\n| area | from | to | load |\n|---|---|---|---|\n| F | 0 ft, 0 ft | ${side} ft, ${side} ft | 50 psf |\n\`\`\``,
        '```walls roof',
        '| wall | from | to | k |',
        '|---|---|---|---|',
        ...[
          ['S', '10 ft, 0 ft', '30 ft, 0 ft'],
          ['N', '10 ft, 40 ft', '30 ft, 40 ft'],
          ['W', '0 ft, 10 ft', '0 ft, 30 ft'],
          ['E', '40 ft, 10 ft', '40 ft, 30 ft'],
        ].map(([name, from, to]) => `| ${name} | ${from} | ${to} | ${k} |`),
        '```',
        `\`\`\`forces roof\n${force}\naccidental: 5%\n\`\`\``,
      ].join('\n'),
    )

  test('J is k a², and the centre of rigidity is the middle', () => {
    const { in: of } = square('100 kip/in', 'y: 80 kip')
    closeTo(of('roof.J', 'kip*ft^2/in'), 100 * side ** 2, 100 * side ** 2)
    closeTo(of('roof.CR.x', 'ft'), side / 2, side)
    closeTo(of('roof.CR.y', 'ft'), side / 2, side)
  })

  test('an arm of 5% of the side adds V/2 x 5%/2 x 2 = 2.5% of the storey shear to a side wall', () => {
    // T = V (a/20); each of four walls takes T k (a/2) / (k a²) = V/40.
    const { in: of } = square('100 kip/in', 'y: 80 kip')
    closeTo(of('roof.wall.E.V.EY+', 'kip'), 42, 80)
    closeTo(of('roof.wall.W.V.EY+', 'kip'), 38, 80)
    closeTo(of('roof.wall.S.V.EY+', 'kip'), 2, 80)
    closeTo(of('roof.wall.N.V.EY+', 'kip'), -2, 80)
  })

  test('the floor moves by V / 2k and turns by T / k a²', () => {
    const { in: of } = square('100 kip/in', 'y: 80 kip')
    closeTo(of('roof.v.EY', 'in'), 0.4, 0.4)
    // T = 80 kip x 2 ft, over 100 kip/in x (40 ft)²: 0.001 in/ft, 1/12000.
    closeTo(of('roof.phi.EY+', 'rad'), 1 / 12000, 1 / 12000)
    closeTo(of('roof.drift.EY+', 'in'), 0.42, 0.42)
  })
})
