/** Velocity pressure of ASCE 7, 26.10: constants of the exposure, factors, and q at any height. */
import { type Formula, formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Edition } from '../model/wind-cases.ts'
import type { DirectionalWind, Exposure } from '../model/wind-directional.ts'
import { type Strip, z1, z2 } from './wind-strips.ts'

export const q = sym('q_z', 'q_z', 'areaLoad')
export const qh = sym('q_h', 'q_h', 'areaLoad')
export const Kz = sym('K_z', 'K_z', 'number')
const Kzt = sym('K_zt', 'K_{zt}', 'number')
export const Kd = sym('K_d', 'K_d', 'number')
const Ke = sym('K_e', 'K_e', 'number')
const V = sym('V', 'V', 'speed')
const alpha = sym('alpha', '\\alpha', 'number')
const zg = sym('z_g', 'z_g', 'length')
const zMin = sym('z_min', 'z_{\\text{min}}', 'length')

// ASCE 7-16 Table 26.11-1 as a public page quotes the set of 7-05, the same in 7-16 from memory; 7-22 from memory. Both sets
// give K_z = 1.00 in exposure C at the 33 ft of the wind speed map.
const exposures: Readonly<
  Record<Edition, Readonly<Record<Exposure, { readonly alpha: number; readonly zg: number }>>>
> = {
  '7-16': { B: { alpha: 7, zg: 1200 }, C: { alpha: 9.5, zg: 900 }, D: { alpha: 11.5, zg: 700 } },
  '7-22': { B: { alpha: 7.5, zg: 3280 }, C: { alpha: 9.8, zg: 2460 }, D: { alpha: 11.5, zg: 1935 } },
}

/** The coefficient of K_z at the gradient height. */
const greatest: Readonly<Record<Edition, number>> = { '7-16': 2.01, '7-22': 2.41 }

interface Rules {
  readonly alpha: Formula
  readonly zg: Formula
  readonly zMin: Formula
  readonly Kz: Formula
  readonly q: Formula
}

const made = new Map<string, Rules>()

/**
 * Made when first asked for: most documents have no wind.
 * @param below what stands below K and q, and the letter of the height that they are at
 */
function rulesOf(
  edition: Edition,
  exposure: Exposure,
  { system }: Display,
  [below, height]: readonly [string, string] = ['z', 'z_2'],
): Rules {
  const key = `${edition} ${exposure} ${system} ${below}`
  const known = made.get(key)
  if (known) return known
  const standard = `ASCE ${edition}`
  const constants = exposures[edition][exposure]
  const ofTable = `${standard} Table 26.11-1, exposure ${exposure} (unchecked)`
  // 7-22 has K_d in the pressure instead.
  const early = edition === '7-16'
  const K = sym('K_z', `K_${below}`, 'number')
  const at = sym('z', height, 'length')
  const density = system === 'US' ? '(0.00256 psf/mph^2)' : '(0.613 Pa*s^2/m^2)'
  const rules = {
    alpha: formula({ gives: alpha, body: `${constants.alpha}`, of: [], source: ofTable }),
    zg: formula({ gives: zg, body: `${constants.zg} ft`, of: [], source: ofTable }),
    zMin: formula({ gives: zMin, body: '15 ft', of: [], source: `${standard} Table 26.10-1 (unchecked)` }),
    Kz: formula({
      gives: K,
      body: `${greatest[edition]}*(min(max(z, z_min), z_g)/z_g)^(2/alpha)`,
      of: [at, zMin, zg, alpha],
      source: `${standard} Table 26.10-1 (unchecked)`,
    }),
    q: formula({
      gives: sym('q_z', `q_${below}`, 'areaLoad'),
      body: `${density}*K_z*K_zt*${early ? 'K_d*' : ''}K_e*V^2`,
      of: [K, Kzt, ...(early ? [Kd] : []), Ke, V],
      source: `${standard} Eq. 26.10-1 (unchecked)`,
    }),
  }
  made.set(key, rules)
  return rules
}

const byGround = {
  US: formula({
    gives: Ke,
    body: 'exp(-0.0000362*z_e/(1 ft))',
    of: [sym('z_e', 'z_e', 'length')],
    source: 'ASCE 7 Table 26.9-1 (unchecked)',
  }),
  SI: formula({
    gives: Ke,
    body: 'exp(-0.000119*z_e/(1 m))',
    of: [sym('z_e', 'z_e', 'length')],
    source: 'ASCE 7 Table 26.9-1 (unchecked)',
  }),
}

export interface Pressure {
  readonly alpha: Value
  readonly zg: Value
  readonly zMin: Value
  readonly Ke: Value
  /** K and q at a height; `below` stands below their letters and in their ids, one for each height. */
  readonly at: (below: string, height: Value) => { readonly K: Value; readonly q: Value }
  /** K_z and q_z of strips, each at its top. */
  readonly along: (strips: readonly Strip[]) => Tabulation
}

export function workPressure(wind: DirectionalWind, display: Display): Pressure {
  const { edition, exposure, ground } = wind
  const rules = rulesOf(edition, exposure, display)
  const constant = (name: string, rule: Formula): Value => work(`wind.${name}`, rule, {}, display)
  const held = {
    alpha: constant('alpha', rules.alpha),
    zg: constant('z_g', rules.zg),
    zMin: constant('z_min', rules.zMin),
  }
  const factor =
    'Ke' in ground ? ground.Ke : work('wind.K_e', byGround[display.system], { z_e: ground.elevation }, display)
  const ofHeight = { z_min: held.zMin, z_g: held.zg, alpha: held.alpha }
  const ofPressure = { K_zt: wind.Kzt, K_d: wind.Kd, K_e: factor, V: wind.V }
  return {
    ...held,
    Ke: factor,
    at: (below, height) => {
      const { Kz: ruleK, q: ruleQ } = rulesOf(edition, exposure, display, [below, height.tex])
      const K = work(`wind.K_${below}`, ruleK, { ...ofHeight, z: height }, display)
      return { K, q: work(`wind.q_${below}`, ruleQ, { ...ofPressure, K_z: K }, display) }
    },
    along: strips =>
      stripTable(strips, display)
        .work(rules.Kz, { z: z2.name, ...ofHeight })
        .work(rules.q, { K_z: Kz.name, ...ofPressure }),
  }
}

/** Strips with their heights. */
export const stripTable = (strips: readonly Strip[], display: Display): Tabulation =>
  new Tabulation(
    strips.map(({ name }) => name),
    (row, key) => `wind.${row}.${key}`,
    display,
  )
    .take(
      z1,
      strips.map(strip => strip.z1),
    )
    .take(
      z2,
      strips.map(strip => strip.z2),
    )
