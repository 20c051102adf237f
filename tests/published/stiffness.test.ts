/**
 * Wall and pier stiffness against published worked examples.
 *
 * Taly: Narendra Taly, Design of Reinforced Masonry Structures, chapter 7 (MSJC-08). The book rounds h/d to
 * four places before it cubes it; where that shows, the height is stated as the rounded ratio times the length.
 * TI 809-04: US Army Corps of Engineers, Seismic Design for Buildings (1998), reissued as UFC 3-310-03A (2005).
 */
import { describe, test } from 'vitest'
import { agrees, disagrees } from '../support/agrees.ts'
import { publishedReading } from '../support/worked.ts'

const around = `
\`\`\`areas roof
| area | from | to | load |
|---|---|---|---|
| Floor | 0 ft, 0 ft | 60 ft, 60 ft | 50 psf |
\`\`\`
`

interface Pier {
  readonly name: string
  readonly length: string
  readonly height: string
}

/** Piers of one construction, side by side; `settings` are those of the construction, `equations` the lines of the example. */
function piers(settings: string, walls: readonly Pier[], equations: readonly string[] = []): string {
  return [
    around,
    `\`\`\`construction Pier\n${settings}\n\`\`\``,
    [
      '```walls roof',
      '| wall | from | to | height | construction |',
      '|---|---|---|---|---|',
      ...walls.map(
        ({ name, length, height }, i) => `| ${name} | 0 ft, ${i} ft | ${length}, ${i} ft | ${height} | Pier |`,
      ),
      '```',
    ].join('\n'),
    equations.length === 0 ? '' : `\`\`\`equations\n${equations.join('\n')}\n\`\`\``,
    `\`\`\`working roof\nwall stiffness\nwalls: ${walls.map(({ name }) => name).join(', ')}\n\`\`\``,
  ].join('\n\n')
}

describe('a wall fixed top and bottom (Taly, Example 7.3, pp. 7.16-7.17)', () => {
  const masonry = "material: concrete masonry\nf'm: 2.0 ksi\nt: 7.625 in\nends: fixed"
  const example = (height: string) =>
    publishedReading(
      piers(
        masonry,
        [{ name: 'P', length: '44 ft', height }],
        [
          'E_m = constructions.Pier.E -> ksi',
          'Delta = (1 kip)/roof.wall.P.k -> in',
          'R = roof.wall.P.k/(constructions.Pier.E*constructions.Pier.t)',
        ],
      ),
    )

  test('modulus, deflection and rigidity with h/d as the book rounds it', () => {
    const of = example('0.4545 * 44 ft')
    agrees(of('E_m', 'ksi'), '1800')
    agrees(of('Delta', 'in'), '1.06185e-4')
    agrees(of('roof.wall.P.k', 'kip/in'), '9418')
    agrees(of('R'), '0.686')
  })

  test('h/d = 20/44 unrounded gives 9416 kip/in where the book prints 9418', () => {
    const of = example('20 ft')
    disagrees(of('roof.wall.P.k', 'kip/in'), '9418', '9416')
    agrees(of('R'), '0.686')
  })
})

describe('relative rigidities of piers, ten times 1/(k (h/d)^3 + 3 h/d) as the book tabulates them', () => {
  // E t = 10 kip/in, so that k in kip/in is the tabulated figure.
  const rigidity = (ends: 'cantilever' | 'fixed', ratio: string) =>
    publishedReading(
      piers(`material: section\nE: 10 ksi\nt: 1 in\nends: ${ends}`, [
        { name: 'P', length: '10 ft', height: `${ratio} * 10 ft` },
      ]),
    )('roof.wall.P.k', 'kip/in')

  // Taly, Table E7.7 p. 7.35 (0.2, 0.9, 1.125, 1.25), Example 7.3 p. 7.17 (0.4545), Example 7.8 p. 7.38; the h/d
  // of 0.1 and 0.6 was not on the page seen and is inferred from the figure.
  test.each([
    ['0.1', '33.223'],
    ['0.2', '16.447'],
    ['0.4545', '6.86'],
    ['0.6', '4.96'],
    ['0.9', '2.916'],
    ['1.125', '2.084'],
    ['1.25', '1.753'],
  ])('both ends fixed, h/d = %s: %s', (ratio, printed) => {
    agrees(rigidity('fixed', ratio), printed)
  })

  test('two piers that the book prints as deflections', () => {
    agrees(1 / rigidity('cantilever', '0.25'), '0.08125')
    agrees(1 / rigidity('fixed', '0.125'), '0.0377')
  })

  test('the cantilever of h/d = 6/36 is printed from an interpolated table: 19.248', () => {
    // Table E7.7, pier 1. The closed form gives neither with h/d rounded to 0.167 nor unrounded.
    disagrees(rigidity('cantilever', '0.167'), '19.248', '19.244')
    disagrees(rigidity('cantilever', '(6/36)'), '19.248', '19.286')
  })
})

/** The engineer's equations are the same kind of thing as the engine's formulas, and meet published figures as well. */
describe('walls with openings, by the engineer’s own equations', () => {
  const equations = (...lines: readonly string[]) => publishedReading(`\`\`\`equations\n${lines.join('\n')}\n\`\`\`\n`)
  const fixed = (name: string, ratio: string, by: string) => `${name} = ((${ratio})^3 + 3*(${ratio}))/${by}`

  test('Taly, p. 7.26, Method B: gross wall less the strip plus the piers', () => {
    const of = equations(
      'Et = 1800 ksi * 7.625 in -> kip/in',
      'd_gross = (4*0.4545^3 + 3*0.4545)/Et -> in/kip',
      fixed('d_strip', '0.273', 'Et -> in/kip'),
      fixed('d_2', '(12 ft)/(24 ft)', 'Et -> in/kip'),
      fixed('d_3', '(12 ft)/(8 ft)', 'Et -> in/kip'),
      'd_piers = 1/(1/d_2 + 1/d_3)',
      'd_piersbook = 1/(1/(1.184e-4 in/kip) + 1/(5.738e-4 in/kip))',
      'd_net = d_gross - d_strip + d_piers',
      'R_wall = 1/d_net -> kip/in',
    )
    // 4 x 0.4545^3 + 3 x 0.4545 = 1.73903, over 13725: the book rounds on the way.
    disagrees(of('d_gross', 'in/kip') * 1e5, '12.6707', '12.6706')
    agrees(of('d_strip', 'in/kip') * 1e5, '6.1155')
    agrees(of('d_2', 'in/kip') * 1e4, '1.184')
    agrees(of('d_3', 'in/kip') * 1e4, '5.738')
    agrees(of('d_piersbook', 'in/kip') * 1e5, '9.8148')
    // The book puts its pier deflections together as rounded to four digits; unrounded they give 9.8145.
    disagrees(of('d_piers', 'in/kip') * 1e5, '9.8148', '9.8145')
    // First printed with two digits exchanged.
    disagrees(of('d_piers', 'in/kip') * 1e5, '9.8418', '9.8145')
    disagrees(of('d_net', 'in/kip') * 1e5, '16.3699', '16.3697')
    agrees(of('R_wall', 'kip/in'), '6109')
  })

  test('Taly, Example 7.7, Table E7.7 and p. 7.36: piers in series and parallel, and the shear of each', () => {
    const of = equations(
      'R_2 = 1.753',
      'R_3 = 2.916',
      'R_4 = 2.084',
      'R_5 = 16.447',
      'R_34 = R_3 + R_4',
      'R_345 = 1/(1/R_34 + 1/R_5)',
      'R_345book = 1/0.261',
      'R_2345 = R_2 + R_345book',
      'V_2 = 100 kip * R_2/R_2345',
      'V_345 = 100 kip * R_345book/R_2345',
      'V_3 = V_345*R_3/R_34',
      'V_4 = V_345*R_4/R_34',
    )
    agrees(of('R_34'), '5.0')
    // The book rounds 1/R34 + 1/R5 to 0.261, and all shears follow from that.
    disagrees(of('R_345'), '3.831', '3.834')
    agrees(of('R_345book'), '3.831')
    agrees(of('R_2345'), '5.584')
    agrees(of('V_2', 'kip'), '31.39')
    agrees(of('V_345', 'kip'), '68.61')
    agrees(of('V_3', 'kip'), '40.01')
    agrees(of('V_4', 'kip'), '28.60')
  })

  test('TI 809-04, Appendix H, example H1, pp. H1-18 and H1-19: an exterior wall in two panels', () => {
    const of = equations(
      'Et = 1.6e6 psi * 4.7 in -> kip/in',
      'd_solid = (4*((10 ft)/(20.5 ft))^3 + 3*(10 ft)/(20.5 ft))/Et -> in/kip',
      fixed('d_strip', '(4 ft)/(20.5 ft)', 'Et -> in/kip'),
      fixed('d_b', '(4 ft)/(9.33 ft)', 'Et -> in/kip'),
      fixed('d_c', '(4 ft)/(5.17 ft)', 'Et -> in/kip'),
      'R_b = 1/d_b',
      'R_c = 1/d_c',
      'd_piers = 1/(R_b + R_c)',
      'd_wall = d_solid - d_strip + d_piers',
      'R_wall = 1/d_wall -> kip/in',
      'R_total = 2*R_wall -> kip/in',
    )
    agrees(of('d_solid', 'in/kip'), '0.00026')
    agrees(of('d_strip', 'in/kip'), '7.8829e-5')
    agrees(of('d_solid', 'in/kip') - of('d_strip', 'in/kip'), '0.00018')
    agrees(of('d_piers', 'in/kip'), '0.00012')
    agrees(of('d_wall', 'in/kip'), '0.0003')
    // Printed to nine figures by a mathematics package; all its rigidities are 1.5 parts in a million above these,
    // and its kN/mm are 22 parts in a million below, as if by unit constants of its own.
    disagrees(of('R_b', 'kip/in'), '5509.26578', '5509.25746')
    disagrees(of('R_c', 'kip/in'), '2700.94107', '2700.93699')
    disagrees(of('R_wall', 'kip/in'), '3340.95897', '3340.95393')
    disagrees(of('R_total', 'kip/in'), '6681.91794', '6681.90785')
    disagrees(of('R_total', 'kN/mm'), '1170.15584', '1170.18138')
    agrees(of('R_b', 'kip/in'), '5509.3')
    agrees(of('R_total', 'kip/in'), '6681.9')
  })
})

/** The same examples from walls and openings as they would be given. */
describe('walls with openings, by strips and piers', () => {
  interface Given {
    readonly construction: string
    readonly length: string
    readonly height: string
    /** Each as `left | sill | width | height`. */
    readonly openings: readonly string[]
  }
  const worked = ({ construction, length, height, openings }: Given) =>
    publishedReading(
      [
        around,
        `\`\`\`construction Wall\n${construction}\n\`\`\``,
        '```walls roof\n| wall | from | to | height | construction |\n|---|---|---|---|---|',
        `| W | 0 ft, 0 ft | ${length}, 0 ft | ${height} | Wall |\n\`\`\`\n`,
        '```openings roof\n| wall | opening | left | sill | width | height |\n|---|---|---|---|---|---|',
        ...openings.map((place, i) => `| W | O${i + 1} | ${place} |`),
        '```\n\n```working roof\nwall stiffness\nwalls: W\n```\n',
      ].join('\n'),
    )

  test('TI 809-04, Appendix H, example H1, pp. H1-18 and H1-19: one panel of an exterior wall', () => {
    // The page seen gives no height of the sill; it does not enter.
    const of = worked({
      construction: 'material: section\nE: 1.6e6 psi\nt: 4.7 in\nends: cantilever',
      length: '20.5 ft',
      height: '10 ft',
      openings: ['9.33 ft | 3 ft | 20.5 ft - 9.33 ft - 5.17 ft | 4 ft'],
    })
    const deflection = (id: string) => 1 / of(id, 'kip/in')
    agrees(deflection('roof.wall.W.solid'), '0.00026')
    agrees(deflection('roof.wall.W.strip.S1.solid'), '7.8829e-5')
    agrees(deflection('roof.wall.W.solid') - deflection('roof.wall.W.strip.S1.solid'), '0.00018')
    agrees(deflection('roof.wall.W.strip.S1.K'), '0.00012')
    agrees(deflection('roof.wall.W.k'), '0.0003')
    // 1.5 parts in a million below the nine printed figures, as above.
    disagrees(of('roof.wall.W.pier.P1.k', 'kip/in'), '5509.26578', '5509.25746')
    disagrees(of('roof.wall.W.pier.P2.k', 'kip/in'), '2700.94107', '2700.93699')
    disagrees(of('roof.wall.W.k', 'kip/in'), '3340.95897', '3340.95393')
    agrees(of('roof.wall.W.pier.P1.k', 'kip/in'), '5509.3')
    agrees(2 * of('roof.wall.W.k', 'kip/in'), '6681.9')
  })

  test('Taly, p. 7.26, Method B: a wall of 44 ft by 20 ft with piers of 24 ft and 8 ft', () => {
    // Where in the height the strip stands was not on the page seen; it does not enter.
    const of = worked({
      construction: "material: concrete masonry\nf'm: 2 ksi\nt: 7.625 in\nends: cantilever",
      length: '44 ft',
      height: '20 ft',
      openings: ['24 ft | 0 ft | 12 ft | 12 ft'],
    })
    const deflection = (id: string) => 1 / of(id, 'kip/in')
    agrees(deflection('roof.wall.W.pier.P1.k') * 1e4, '1.184')
    agrees(deflection('roof.wall.W.pier.P2.k') * 1e4, '5.738')
    // The book rounds h/d to 0.4545 and 0.273, and the piers to four digits, before it goes on.
    disagrees(deflection('roof.wall.W.solid') * 1e5, '12.6707', '12.6725')
    disagrees(deflection('roof.wall.W.strip.S1.solid') * 1e5, '6.1155', '6.1091')
    disagrees(deflection('roof.wall.W.strip.S1.K') * 1e5, '9.8148', '9.8145')
    disagrees(deflection('roof.wall.W.k') * 1e5, '16.3699', '16.3779')
    disagrees(of('roof.wall.W.k', 'kip/in'), '6109', '6106')
  })

  test('Taly, Example 7.7, Table E7.7: piers 2, 3 and 4, and how 3 and 4 share', () => {
    // Tenfold rigidities are k in kip/in where E t is 10 kip/in. The book rounds h/d of pier 3 to 0.9: 6.67 ft for 6 ft.
    const of = worked({
      construction: 'material: section\nE: 10 ksi\nt: 1 in\nends: fixed',
      length: '36 ft',
      height: '16 ft',
      openings: ['8 ft | 6 ft | 8 ft | 10 ft', '16 ft + (6 ft)/0.9 | 10 ft | 20 ft - (6 ft)/0.9 - (6 ft)/1.125 | 6 ft'],
    })
    agrees(of('roof.wall.W.pier.P1.k', 'kip/in'), '1.753')
    agrees(of('roof.wall.W.pier.P2.k', 'kip/in'), '2.916')
    agrees(of('roof.wall.W.pier.P3.k', 'kip/in'), '2.084')
    agrees(of('roof.wall.W.strip.S2.K', 'kip/in'), '5.0')
    // The book shares by 2.916, 2.084 and 5.0 as rounded.
    disagrees((68.61 * of('roof.wall.W.pier.P2.k')) / of('roof.wall.W.strip.S2.K'), '40.01', '40.02')
    disagrees((68.61 * of('roof.wall.W.pier.P3.k')) / of('roof.wall.W.strip.S2.K'), '28.60', '28.59')
    // For the pier with the window the book sets the piers beside it in series with pier 5 below it, held at both ends
    // though it is 4 ft high and 20 ft long. Its own Method B, which is worked here, takes the solid outline less
    // the strip for that, and comes to a pier that is 3 % softer.
    disagrees(of('roof.wall.W.pier.G1.k', 'kip/in'), '3.831', '3.707')
    disagrees((100 * of('roof.wall.W.pier.P1.k')) / of('roof.wall.W.strip.S1.K'), '31.39', '32.11')
  })
})
