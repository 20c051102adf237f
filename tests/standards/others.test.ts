/**
 * EN 1998-1, NZS 1170.5, NBCC 2020, IS 1893-1:2016 and AS 1170.4: the joints of their spectra, their limits, and base shears
 * by hand from the formulas that the standards print. Figures of tables are from memory, unchecked, where it is said.
 */
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import type { Formula } from '../../src/base/formula.ts'
import { compileText } from '../../src/compile.ts'
import { shapeFactor as australian } from '../../src/standards/as1170.ts'
import { spectra } from '../../src/standards/en1998.ts'
import { spectrum } from '../../src/standards/is1893.ts'
import { shapeFactor } from '../../src/standards/nzs1170.ts'
import { agrees, closeTo } from '../support/agrees.ts'
import { buildingUnder, type Storeys, under } from './frame.ts'

/** Weights of 1200, 1200 and 800 kN at 3, 6 and 9 m. */
const W = 3200
const kN = 1000
const rules = (standard: string, settings: string): readonly string[] =>
  compileText('t.md', buildingUnder(standard, settings)).diagnostics.map(({ rule }) => rule)
const at = (formula: Formula, period: number): number => evaluate(formula.body, () => period)

describe('EN 1998-1', () => {
  const site = (type: string, ground: string) =>
    `spectrum type: ${type}\nground type: ${ground}\nimportance class: II\na_gR: 0.16\nq: 1.5`
  const of = (more: string, storeys?: Storeys) => under('EN 1998-1', `${site('1', 'C')}\n${more}`, storeys)

  // Tables 3.2 and 3.3, from memory, unchecked.
  test.each([
    ['1', 'A', 1, 0.15, 0.4, 2],
    ['1', 'D', 1.35, 0.2, 0.8, 2],
    ['2', 'C', 1.5, 0.1, 0.25, 1.2],
    ['2', 'E', 1.6, 0.05, 0.25, 1.2],
  ])('type %s on ground %s has S %f and its three periods', (type, ground, ...row) => {
    const { si } = under('EN 1998-1', site(type, ground))
    expect(['S', 'TB', 'TC', 'TD'].map(key => si(`seismic.${key}`))).toEqual(row)
  })

  test('every type and ground has its periods in order', () => {
    for (const type of Object.values(spectra))
      for (const [, tb, tc, td] of Object.values(type))
        expect([tb, tc, td].toSorted((a, b) => a - b)).toEqual([tb, tc, td])
  })

  test('the branches of the spectrum meet at T_B, T_C and T_D', () => {
    const sd = (period: number) => of(`T_1: ${period} s\nbeta: 0.01`).si('seismic.x.Sd')
    for (const joint of [0.2, 0.6, 2]) closeTo(sd(joint * (1 - 1e-9)), sd(joint), 1, 1e-8)
    closeTo(sd(0.4), (0.16 * 1.15 * 2.5) / 1.5, 1)
    // At T = 0 the spectrum starts from two thirds of a_g S.
    closeTo(sd(1e-9), (0.16 * 1.15 * 2) / 3, 1, 1e-7)
  })

  test('the spectrum does not fall below beta a_g', () => {
    const { si } = under('EN 1998-1', `${site('1', 'C')}\nT_1: 2 s`.replace('q: 1.5', 'q: 6'))
    closeTo(si('seismic.x.Sd'), 0.2 * 0.16, 1)
  })

  test('lambda is 0.85 above two storeys for a short period, and 1 otherwise', () => {
    const low: Storeys = { loads: ['6 kPa', '4 kPa'], elevations: ['3 m', '6 m'] }
    expect(of('').si('seismic.x.lambda')).toBe(0.85)
    expect(of('', low).si('seismic.x.lambda')).toBe(1)
    expect(of('T_1: 1.21 s').si('seismic.x.lambda')).toBe(1)
  })

  test('base shear and forces by hand', () => {
    const { si } = of('')
    closeTo(si('seismic.x.T1'), 0.05 * 9 ** 0.75, 1)
    const V = ((0.16 * 1.15 * 2.5) / 1.5) * 0.85 * W * kN
    closeTo(si('seismic.x.V'), V, V)
    const sum = 1200 * 3 + 1200 * 6 + 800 * 9
    closeTo(si('L2.force.y'), (V * 1200 * 6) / sum, V)
  })

  test('walls: C_t from their effective area', () => {
    closeTo(of('A_c: 2.25 m^2').si('seismic.x.Ct'), 0.075 / 1.5, 1)
  })

  test('a period beyond 4 T_C or 2 s is told, and a high building states its own', () => {
    expect(rules('EN 1998-1', `${site('1', 'A')}\nT_1: 1.61 s`)).toContain('method-not-applicable')
    expect(rules('EN 1998-1', `${site('1', 'D')}\nT_1: 2.01 s`)).toContain('method-not-applicable')
    expect(rules('EN 1998-1', `${site('1', 'A')}\nh_n: 41 m`)).toContain('setting-missing')
  })
})

describe('NZS 1170.5', () => {
  const site = 'Z: 0.4\nR_u: 1\nT_1: 0.35 s\nmu: 1.25\nS_p: 0.9'

  // Table 3.1, as printed to two decimals; from memory, unchecked.
  test.each([
    ['C', 0.4, '2.36'],
    ['C', 0.6, '1.74'],
    ['C', 1, '1.19'],
    ['C', 2, '0.66'],
    ['D', 1, '1.93'],
    ['D', 2, '1.07'],
    ['A', 1, '0.95'],
    ['E', 1, '3.00'],
  ] as const)('soil class %s at %f s has C_h of %s', (soil, period, printed) => {
    agrees(at(shapeFactor(soil, period), period), printed)
  })

  test('neighbouring branches meet to the digits of the table', () => {
    for (const soil of ['A', 'B', 'C', 'D', 'E'] as const)
      for (const joint of [0.4, 0.56, 1, 1.5, 3]) {
        const [before, after] = [joint - 1e-9, joint].map(period => at(shapeFactor(soil, period), period))
        expect(Math.abs((before ?? 0) - (after ?? 1)), `${soil} at ${joint} s`).toBeLessThan(0.02)
      }
  })

  test('base shear by hand, with 8% of it at the top', () => {
    const { si } = under('NZS 1170.5', `soil class: C\n${site}`)
    const kmu = (0.25 * 0.4) / 0.7 + 1
    const V = ((2.36 * 0.4 * 0.9) / kmu) * W * kN
    closeTo(si('seismic.x.V'), V, V)
    const sum = 1200 * 3 + 1200 * 6 + 800 * 9
    closeTo(si('L3.force.x'), 0.08 * V + (0.92 * V * 800 * 9) / sum, V)
    closeTo(si('L1.force.x') + si('L2.force.x') + si('L3.force.x'), V, V)
    closeTo(si('L1.accidental'), 0.1, 1)
  })

  test('k_mu reaches mu at 0.7 s from both sides', () => {
    const kmu = (period: number) =>
      under('NZS 1170.5', `soil class: C\n${site.replace('0.35 s', `${period} s`)}`).si('seismic.x.kmu')
    closeTo(kmu(0.7 - 1e-9), 1.25, 1, 1e-8)
    closeTo(kmu(0.7), 1.25, 1)
  })

  test('C_d does not fall below (Z/20 + 0.02) R_u, nor below 0.03 R_u', () => {
    const cd = (z: string) =>
      under(
        'NZS 1170.5',
        `soil class: A\n${site.replace('Z: 0.4', `Z: ${z}`).replace('0.35 s', '4 s').replace('1.25', '6')}`,
      ).si('seismic.x.Cd')
    closeTo(cd('0.4'), 0.04, 1)
    closeTo(cd('0.13'), 0.03, 1)
  })

  test('on soft soil the reduction is stated', () => {
    expect(rules('NZS 1170.5', `soil class: E\n${site}`)).toContain('setting-missing')
    expect(rules('NZS 1170.5', `soil class: E\n${site}\nk_mu: 1.2`)).not.toContain('setting-missing')
  })
})

describe('NBCC 2020', () => {
  const site = 'importance: normal\nS_02: 0.9\nS_05: 0.5\nS_4: 0.06\nM_v: 1\nR_d: 2\nR_o: 1.5'
  const of = (more: string) => under('NBCC 2020', `${site}\n${more}`)

  test('period, base shear within its bounds, forces in proportion to W h', () => {
    const { si } = of('S_Ta: 0.4')
    closeTo(si('seismic.x.Ta'), 0.05 * 9 ** 0.75, 1)
    closeTo(si('seismic.x.V'), (0.4 / 3) * W * kN, W * kN)
    closeTo(si('L3.force.x'), (si('seismic.x.V') * 7200) / 18000, W * kN)
  })

  test('the larger of two thirds of S(0.2) and S(0.5) caps it where R_d is 1.5 or more', () => {
    closeTo(of('S_Ta: 0.85').si('seismic.x.C'), (2 / 3) * (0.9 / 3), 1)
    closeTo(under('NBCC 2020', `${site.replace('R_d: 2', 'R_d: 1')}\nS_Ta: 0.85`).si('seismic.x.C'), 0.85 / 1.5, 1)
  })

  test('S(4.0) is the least for walls', () => {
    closeTo(of('S_Ta: 0.05').si('seismic.x.C'), 0.06 / 3, 1)
  })

  test('above 0.7 s a part acts at the top, a quarter of the shear at most', () => {
    const tall = 'S_Ta: 0.3\nh_n: 60 m\nT: 1 s'
    const { si } = of(tall)
    closeTo(si('seismic.x.Ft'), 0.07 * si('seismic.x.V'), W * kN)
    const long = of('S_Ta: 0.3\nh_n: 400 m\nT: 6 s')
    closeTo(long.si('seismic.x.Ft'), 0.25 * long.si('seismic.x.V'), W * kN)
    closeTo(
      ['L1', 'L2', 'L3'].reduce((sum, level) => sum + si(`${level}.force.x`), 0),
      si('seismic.x.V'),
      W * kN,
    )
  })

  test('a period from analysis counts up to twice the empirical one', () => {
    const { si } = of('S_Ta: 0.3\nT: 2 s')
    closeTo(si('seismic.x.Ta'), 2 * 0.05 * 9 ** 0.75, 1)
  })
})

describe('IS 1893-1:2016', () => {
  const site = 'zone: IV\nsoil type: II\nI: 1\nR: 3'

  test('the branches of S_a/g meet', () => {
    // 6.4.2: 2.5 up to 0.40, 0.55, 0.67 s, then 1/T, 1.36/T, 1.67/T up to 4 s, then 0.25, 0.34, 0.42; from memory, unchecked.
    for (const [soil, joint] of [
      ['I', 0.4],
      ['II', 0.55],
      ['III', 0.67],
    ] as const) {
      const after = at(spectrum(soil, joint + 1e-9), joint)
      expect(Math.abs(after - 2.5)).toBeLessThan(0.03)
      const last = at(spectrum(soil, 4), 4)
      expect(Math.abs(last - at(spectrum(soil, 4.1), 4.1))).toBeLessThan(0.01)
    }
  })

  test('base shear and forces in proportion to W h² by hand', () => {
    const { si } = under('IS 1893-1:2016', `${site}\nd x: 20 m\nd y: 10 m`)
    closeTo(si('seismic.x.Ta'), (0.09 * 9) / Math.sqrt(20), 1)
    const V = (0.24 / 2) * (2.5 / 3) * W * kN
    closeTo(si('seismic.x.V'), V, V)
    const sum = 1200 * 9 + 1200 * 36 + 800 * 81
    closeTo(si('L2.force.y'), (V * 1200 * 36) / sum, V)
  })

  test('walls: the period from their effective area, not below that of other buildings', () => {
    const ta = (area: string) => under('IS 1893-1:2016', `${site}\nd: 20 m\nA_w: ${area}`).si('seismic.x.Ta')
    closeTo(ta('1 m^2'), 0.075 * 9 ** 0.75, 1)
    closeTo(ta('100 m^2'), (0.09 * 9) / Math.sqrt(20), 1)
  })

  test('the least share of the weight', () => {
    const { si } = under('IS 1893-1:2016', `${site.replace('R: 3', 'R: 5')}\nT_a: 3.9 s`)
    closeTo(si('seismic.x.Ah'), 0.016, 1)
  })

  test('what is not worked of its torsion is told', () => {
    expect(rules('IS 1893-1:2016', `${site}\nd: 20 m`)).toContain('standard-in-part')
  })
})

describe('AS 1170.4', () => {
  const site = 'sub-soil class: De\nZ: 0.1\nk_p: 1\nmu: 2\nS_p: 0.77'

  test('the branches of the shape factor meet at 1.5 s', () => {
    for (const soil of ['Ae', 'Be', 'Ce', 'De', 'Ee'])
      expect(Math.abs(at(australian(soil, 1.5), 1.5) - at(australian(soil, 1.5 + 1e-9), 1.5)), soil).toBeLessThan(1e-3)
  })

  test('base shear by hand', () => {
    const { si } = under('AS 1170.4', site)
    closeTo(si('seismic.x.T1'), 1.25 * 0.05 * 9 ** 0.75, 1)
    closeTo(si('seismic.x.V'), ((0.1 * 3.68 * 0.77) / 2) * W * kN, W * kN)
    closeTo(si('L1.accidental'), 0.1, 1)
  })
})

describe('every standard', () => {
  test('spelt in another way is the same standard', () => {
    const settings = 'risk category: II\nS_1: 0.3\nS_DS: 1\nS_D1: 0.5\nR: 5'
    for (const name of ['ASCE/SEI 7-22', 'asce 7–22', 'ASCE 7-22, IBC 2024', 'ASCE 7-22 with local amendments'])
      expect(rules(name, settings), name).toEqual([])
    for (const name of ['ASCE 7-2', 'ASCE 7-221', 'IBC 2024'])
      expect(rules(name, settings), name).toContain('standard-unknown')
  })
})
