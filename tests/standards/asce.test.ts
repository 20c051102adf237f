/**
 * ASCE 7 against its own tables and limits. Tables 11.4-1 and 11.4-2 are of 7-16 from memory, unchecked; 11.6-1 and
 * 11.6-2 as on the design maps reports of 7-10; R of masonry walls as in ASCE 7-05 (Taly, p. 484).
 */
import { describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { systemsOf } from '../../src/standards/asce-systems.ts'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'
import { buildingUnder, under } from './frame.ts'

const SYSTEM = 'system: bearing wall, special reinforced masonry shear walls'
const late = (settings: string) => under('ASCE 7-22', `risk category: II\nS_1: 0.3\n${SYSTEM}\n${settings}`)
const early = (site: string, ss: number, s1: number) =>
  under('ASCE 7-16', `risk category: II\nsite class: ${site}\nS_S: ${ss}\nS_1: ${s1}\n${SYSTEM}`)

const fault = (standard: string, settings: string): readonly string[] =>
  compileText('t.md', buildingUnder(standard, settings)).diagnostics.map(({ rule }) => rule)

describe('site coefficients of 7-16', () => {
  test.each([
    ['A', 0.8, 0.8],
    ['B', 0.9, 0.8],
    ['C', 1.2, 1.5],
    ['D', 1.1, 1.9],
  ] as const)('class %s at the heads S_S = 1.0 and S_1 = 0.4 has those of the table', (site, fa, fv) => {
    const { si } = early(site, 1, 0.4)
    expect([si('seismic.Fa'), si('seismic.Fv')]).toEqual([fa, fv])
  })

  test('between two heads they lie on a straight line', () => {
    const { si } = early('D', 0.625, 0.15)
    closeTo(si('seismic.Fa'), 1.3, 1)
    closeTo(si('seismic.Fv'), 2.3, 1)
  })

  test('beyond the last head the last number holds, before the first the first', () => {
    const { si } = early('C', 2.4, 0.9)
    expect([si('seismic.Fa'), si('seismic.Fv')]).toEqual([1.2, 1.4])
    expect(early('C', 0.1, 0.08).si('seismic.Fa')).toBe(1.3)
  })

  test('on ground that nobody explored F_a is 1.2 at least', () => {
    expect(early('default', 1.5, 0.4).si('seismic.Fa')).toBe(1.2)
    expect(early('D', 1.5, 0.4).si('seismic.Fa')).toBe(1)
  })

  test('soft ground with no coefficient asks for a study', () => {
    const of = (site: string, ss: number, s1: number) =>
      fault('ASCE 7-16', `risk category: II\nsite class: ${site}\nS_S: ${ss}\nS_1: ${s1}\n${SYSTEM}`)
    expect(of('E', 1, 0.1)).toContain('site-study-needed')
    expect(of('E', 0.5, 0.2)).toContain('site-study-needed')
    expect(of('F', 0.2, 0.05)).toContain('site-study-needed')
    expect(of('E', 0.5, 0.1)).not.toContain('site-study-needed')
  })

  test('on stiff soil with S_1 of 0.2 or more the plateau holds up to 1.5 T_S, and the branch beyond is half as high again', () => {
    const at = (period: string) =>
      under('ASCE 7-16', `risk category: II\nsite class: D\nS_S: 1.0\nS_1: 0.4\nh_n: 30 m\nT: ${period}\n${SYSTEM}`)
    const { si } = at('0.8 s')
    expect(si('seismic.x.T')).toBeGreaterThan(si('seismic.TS'))
    expect(si('seismic.x.Cs')).toBe(si('seismic.x.Cs.flat'))
    closeTo(si('seismic.x.Cs.most'), (1.5 * si('seismic.SD1')) / (0.8 * 5), 1)
  })
})

describe('design category', () => {
  const category = (sds: number, sd1: number, s1: number, risk: string) => {
    const { sheet } = under('ASCE 7-22', `risk category: ${risk}\nS_1: ${s1}\nS_DS: ${sds}\nS_D1: ${sd1}\nR: 5`)
    const found = sheet.scope.lookup('seismic.category')
    return found?.ok && 'text' in found.value ? found.value.text : 'none'
  }

  test.each([
    [0.167, 0.05, 'B', 'C'],
    [0.329, 0.05, 'B', 'C'],
    [0.33, 0.05, 'C', 'D'],
    [0.5, 0.05, 'D', 'D'],
    [0.2, 0.067, 'B', 'C'],
    [0.2, 0.133, 'C', 'D'],
    [0.3, 0.2, 'D', 'D'],
  ])('S_DS %f with S_D1 %f is %s, and %s in risk category IV', (sds, sd1, two, four) => {
    expect(category(sds, sd1, 0.1, 'II')).toBe(two)
    expect(category(sds, sd1, 0.1, 'IV')).toBe(four)
  })

  test('near a great fault it is E, or F', () => {
    expect([category(1, 0.6, 0.75, 'III'), category(1, 0.6, 0.75, 'IV')]).toEqual(['E', 'F'])
    expect(category(1, 0.6, 0.749, 'III')).toBe('D')
  })

  test('A has rules of its own, which are not worked', () => {
    expect(fault('ASCE 7-22', 'risk category: II\nS_1: 0.03\nS_DS: 0.1\nS_D1: 0.05\nR: 5')).toContain(
      'standard-not-covered',
    )
  })
})

describe('base shear', () => {
  test('at T_S plateau and upper bound are one', () => {
    const { si } = late('S_DS: 0.8\nS_D1: 0.2\nT: 0.25 s\nh_n: 30 m')
    closeTo(si('seismic.x.Cs.flat'), si('seismic.x.Cs.most'), 1)
    closeTo(si('seismic.x.Cs'), 0.8 / 5, 1)
  })

  test('the period counts up to C_u T_a only', () => {
    const { si } = late('S_DS: 0.8\nS_D1: 0.5\nT: 4 s')
    closeTo(si('seismic.x.Ta'), 0.0488 * 9 ** 0.75, 1)
    closeTo(si('seismic.x.T'), 1.4 * si('seismic.x.Ta'), 1)
  })

  test('C_u lies on a straight line between the heads of its table', () => {
    const cu = (sd1: number) => late(`S_DS: 0.8\nS_D1: ${sd1}`).si('seismic.x.Cu')
    expect([0.05, 0.1, 0.15, 0.2, 0.3, 0.4, 0.7].map(cu)).toEqual([1.7, 1.7, 1.6, 1.5, 1.4, 1.4, 1.4])
    closeTo(cu(0.125), 1.65, 1)
    closeTo(cu(0.25), 1.45, 1)
  })

  test('the lower bounds: 0.044 S_DS I_e, 0.01, and half of S_1 where it is 0.6 or more', () => {
    const R = 'R: 40\nT: 5 s\nT_L: 8 s\nh_n: 120 m'
    const of = (settings: string) => under('ASCE 7-22', `risk category: IV\n${R}\n${settings}`)
    const low = of('S_1: 0.5\nS_DS: 0.8\nS_D1: 0.4')
    expect(low.si('seismic.x.Cs')).toBe(0.044 * 0.8 * 1.5)
    expect(of('S_1: 0.08\nS_DS: 0.2\nS_D1: 0.1').si('seismic.x.Cs.least')).toBe(0.044 * 0.2 * 1.5)
    expect(of('S_1: 0.08\nS_DS: 0.12\nS_D1: 0.1').si('seismic.x.Cs')).toBe(0.01)
    const near = under(
      'ASCE 7-22',
      'risk category: II\nS_1: 0.7\nS_DS: 1\nS_D1: 0.4\nT: 5 s\nT_L: 8 s\nh_n: 150 m\nR: 4',
    )
    closeTo(near.si('seismic.x.Cs'), (0.5 * 0.7) / 4, 1)
  })

  test('beyond T_L the bound falls with the square of the period', () => {
    const far = 'risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.6\nT: 2 s\nT_L: 1 s\nh_n: 90 m\nR: 5'
    const { si } = under('ASCE 7-22', far)
    closeTo(si('seismic.x.Cs.most'), 0.6 / (si('seismic.x.T') ** 2 * 5), 1)
  })

  test('the part of each level sums to the base shear, with k of 1, of 2 and between', () => {
    for (const [more, k] of [
      ['', 1],
      ['T: 1.5 s\nh_n: 62 m', 1.5],
      ['k: 2', 2],
      ['T: 3 s\nT_L: 8 s\nh_n: 150 m', 2],
    ] as const) {
      const { si } = under('ASCE 7-22', `risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nR: 5\n${more}`)
      closeTo(si('seismic.x.k'), k, 1)
      const V = si('seismic.x.V')
      closeTo(
        ['L1', 'L2', 'L3'].reduce((sum, level) => sum + si(`${level}.force.x`), 0),
        V,
        V,
      )
      const product = (W: number, h: number) => W * h ** k
      const all = product(1200, 3) + product(1200, 6) + product(800, 9)
      closeTo(si('L3.Cv.x'), product(800, 9) / all, 1)
    }
  })

  test('each direction has its own system', () => {
    const { si } = under(
      'ASCE 7-22',
      'risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nR x: 5\nsystem y: building frame, special reinforced masonry shear walls',
    )
    closeTo(si('seismic.x.V') / si('seismic.y.V'), 5.5 / 5, 1)
  })

  test('feet and metres tell the same building', () => {
    const text = buildingUnder('ASCE 7-22', `risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nh_n: 9 m\n${SYSTEM}`)
    const [us, si] = [text.replace('units: SI', 'units: US'), text].map(
      one => compileText('t.md', one).context.roots.get('seismic.x.Ta')?.si ?? 0,
    )
    // 0.0488 in m is 0.02 in ft, rounded: 0.02*3.2808^0.75 = 0.04875.
    closeTo(us ?? 0, si ?? 1, si ?? 1, 2e-3)
  })
})

describe('systems', () => {
  test('masonry bearing walls have the factors of the printed table', () => {
    // Taly, Design of Reinforced Masonry Structures, p. 484, Table 7.5: R, Omega_0, C_d; limits in C, D, E, F in ft.
    const rows = systemsOf('ASCE 7-22').filter(
      ({ name, part }) => part === 'A' && / masonry shear walls$/.test(name) && !/AAC/.test(name),
    )
    expect(
      rows.map(({ name, R, Omega0, Cd, limit }) => [
        name.split(', ')[1],
        R,
        Omega0,
        Cd,
        ...['C', 'D', 'E', 'F'].map(limit),
      ]),
    ).toEqual([
      ['special reinforced masonry shear walls', 5, 2.5, 3.5, 'NL', 160, 160, 100],
      ['intermediate reinforced masonry shear walls', 3.5, 2.5, 2.25, 'NL', 'NP', 'NP', 'NP'],
      ['ordinary reinforced masonry shear walls', 2, 2.5, 1.75, 160, 'NP', 'NP', 'NP'],
      ['detailed plain masonry shear walls', 2, 2.5, 1.75, 'NP', 'NP', 'NP', 'NP'],
      ['ordinary plain masonry shear walls', 1.5, 2.5, 1.25, 'NP', 'NP', 'NP', 'NP'],
      ['prestressed masonry shear walls', 1.5, 2.5, 1.75, 'NP', 'NP', 'NP', 'NP'],
    ])
  })

  test('what an edition does not have is not offered', () => {
    const names = (edition: string) => systemsOf(edition).map(({ name }) => name)
    expect(names('ASCE 7-22')).toContain('bearing wall, cross-laminated timber shear walls')
    expect(names('ASCE 7-16')).not.toContain('bearing wall, cross-laminated timber shear walls')
  })

  test('a structure higher than its system may be is told', () => {
    const of = (top: string) =>
      fault(
        'ASCE 7-22',
        `risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nh_n: ${top}\nsystem: bearing wall, light-frame wood walls with wood structural panels`,
      )
    expect(of('65 ft')).not.toContain('system-not-permitted')
    expect(of('65.1 ft')).toContain('system-not-permitted')
  })
})

describe('variable loads', () => {
  const weight = (standard: string, variable: string, share: string): number => {
    const head = '| area | from | to | load |\n|---|---|---|---|\n| All | 0 m, 0 m | 20 m, 10 m | 4 kPa |'
    const more = `| area | from | to | load | variable | share |\n|---|---|---|---|---|---|\n| All | 0 m, 0 m | 20 m, 10 m | 4 kPa | ${variable} | ${share} |`
    const text = buildingUnder(standard, 'risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nR: 5').replace(head, more)
    return reading(text).si('L3.areas.All.w')
  }

  test.each([
    ['ASCE 7-22', '46 psf', 'snow', 0.15],
    ['ASCE 7-22', '45 psf', 'snow', 0],
    ['ASCE 7-16', '31 psf', 'snow', 0.2],
    ['ASCE 7-16', '30 psf', 'snow', 0],
    ['ASCE 7-16', '125 psf', 'storage', 0.25],
    ['ASCE 7-16', '40 psf', 'live', 0],
    ['ASCE 7-16', '40 psf', '30%', 0.3],
  ])('%s: %s of %s counts by %f', (standard, load, share, part) => {
    const psf = 47.88025898033584
    closeTo(weight(standard, load, share), 4000 + part * Number.parseFloat(load) * psf, 4000)
  })
})
