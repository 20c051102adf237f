/** AS 1170.4:2007, the static method. */
import { type Formula, formula, sym } from '../base/formula.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, type Direction, settingMissing } from '../model/seismic.ts'
import { lazily } from './lazily.ts'
import { exponentByPeriod, k, needed } from './needed.ts'
import { type Desk, type DirectionDesign, type Profile, step } from './profile.ts'
import { tabled } from './tabled.ts'

const NAME = 'AS 1170.4'

const Z = sym('Z', 'Z', 'number')
const kp = sym('k_p', 'k_p', 'number')
const Ch = sym('C_h', 'C_h', 'number')
const T1 = sym('T_1', 'T_1', 'period')
const kt = sym('k_t', 'k_t', 'number')
const hn = sym('h_n', 'h_n', 'length')
const Sp = sym('S_p', 'S_p', 'number')
const mu = sym('mu', '\\mu', 'number')
const V = sym('V', 'V', 'force')
const W = sym('W_t', 'W_t', 'force')

/** Plateau, then over the period up to 1.5 s, then over its square: Table 6.4, from memory. */
const shapes: Readonly<Record<string, readonly [plateau: number, first: number, second: number]>> = {
  Ae: [2.35, 0.704, 1.056],
  Be: [2.94, 0.88, 1.32],
  Ce: [3.68, 1.25, 1.874],
  De: [3.68, 1.98, 2.97],
  Ee: [3.68, 3.08, 4.62],
}

/** The spectral shape factor of a sub-soil class at a period, as the formula of its branch. */
export function shapeFactor(soil: string, period: number): Formula {
  const row = shapes[soil]
  if (!row) throw new Error(`sub-soil ${soil} has no shape`)
  const [plateau, first, second] = row
  const source = (range: string) => `${NAME} Table 6.4, sub-soil ${soil}, ${range} (from memory, unchecked)`
  if (period > 1.5)
    return formula({ gives: Ch, body: `${second}*(1 s^2)/T_1^2`, of: [T1], source: source('T_1 > 1.5 s') })
  return formula({ gives: Ch, body: `min(${first}*(1 s)/T_1, ${plateau})`, of: [T1], source: source('T_1 ≤ 1.5 s') })
}

const f = lazily(() => ({
  T1: formula({
    gives: T1,
    body: '1.25*k_t*(h_n/(1 m))^0.75*(1 s)',
    of: [kt, hn],
    source: `${NAME} 6.2.3 (unchecked)`,
  }),
  V: formula({
    gives: V,
    body: 'k_p*Z*C_h*S_p/mu*W_t',
    of: [kp, Z, Ch, Sp, mu, W],
    source: `${NAME} 6.2.1 (unchecked)`,
  }),
}))

interface Ground {
  readonly soil: string
  readonly k_p: Value
  readonly Z: Value
}

function groundOf(desk: Desk): Result<Ground> {
  const { given } = desk
  const soil = chosenWord(given, 'sub-soil class', Object.keys(shapes))
  const numbers = needed(desk, {
    Z: 'The hazard factor of the place, Table 3.2.',
    k_p: 'The probability factor for the annual probability of exceedance, Table 3.1.',
  })
  if (!soil.ok || !numbers.ok || soil.value === undefined)
    return bad([
      ...(soil.ok
        ? soil.value === undefined
          ? [settingMissing(given, 'sub-soil class', 'Ae, Be, Ce, De or Ee.')]
          : []
        : soil.because),
      ...(numbers.ok ? [] : numbers.because),
    ])
  return good({ soil: soil.value, ...numbers.value })
}

function directionOf(desk: Desk, { soil, k_p, Z: z }: Ground, direction: Direction): Result<DirectionDesign> {
  const { given, display, height } = desk
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const read = needed(
    desk,
    {
      mu: 'The structural ductility factor of the system, Table 6.5.',
      S_p: 'The structural performance factor of the system, Table 6.5.',
    },
    direction,
  )
  if (!read.ok) return read
  const stated = given.number('T_1', direction)
  const factor =
    given.number('k_t', direction) ??
    work(id('kt'), tabled(kt, 0.05, `${NAME} 6.2.3, all other structures (unchecked)`), {}, display, about)
  const T_1 = stated ?? work(id('T1'), f().T1, { k_t: factor, h_n: height }, display, about)
  const ch = given.number('C_h', direction) ?? work(id('Ch'), shapeFactor(soil, T_1.si), { T_1 }, display, about)
  const { mu: ductility, S_p } = read.value
  const v = work(id('V'), f().V, { k_p, Z: z, C_h: ch, S_p, mu: ductility, W_t: desk.W }, display, about)
  const exponent = exponentByPeriod(`${NAME} 6.3 (unchecked)`, T_1, desk, direction)
  return good({
    V: v,
    vertical: { k: exponent, source: `${NAME} 6.3 (unchecked)` },
    said: [ductility, S_p, ...(stated ? [stated] : [factor, T_1]), ch, v, exponent].map(step),
  })
}

const share = (psi: number, what: string) => ({
  value: () => psi,
  clause: `${NAME} 6.2.2, ${what} (from memory, unchecked)`,
})

export const as1170: Profile = {
  name: NAME,
  aliases: ['AS 1170.4:2007', 'AS 1170.4-2007'],
  settings: [
    { name: 'sub-soil class', key: 'soil', what: 'the site sub-soil class, Ae to Ee' },
    { name: 'Z', key: 'Z', what: 'the hazard factor', sym: Z },
    { name: 'k_p', key: 'kp', what: 'the probability factor', sym: kp },
    { name: 'h_n', key: 'hn', what: 'the height of the building', sym: hn },
    { name: 'mu', key: 'mu', what: 'the structural ductility factor', sym: mu, each: true },
    { name: 'S_p', key: 'Sp', what: 'the structural performance factor', sym: Sp, each: true },
    { name: 'k_t', key: 'kt', what: 'the factor of the period', sym: kt, each: true },
    { name: 'T_1', key: 'T1', what: 'the fundamental period', sym: T1, each: true },
    { name: 'C_h', key: 'Ch', what: 'the spectral shape factor', sym: Ch, each: true },
    { name: 'k', key: 'k', what: 'the exponent of the vertical distribution', sym: k, each: true },
  ],
  design: desk => {
    const ground = groundOf(desk)
    if (!ground.ok) return ground
    const directions = together({
      x: directionOf(desk, ground.value, 'x'),
      y: directionOf(desk, ground.value, 'y'),
    })
    return directions.ok
      ? good({ ground: [ground.value.k_p, ground.value.Z].map(step), directions: directions.value })
      : directions
  },
  rules: {
    accidental: { value: 0.1, clause: `${NAME} 6.6 (unchecked)` },
    share: { live: share(0.3, 'floors other than storage'), storage: share(0.6, 'storage') },
    drift: [{ value: { of: 'ultimate limit state', limit: 0.015 }, clause: `${NAME} 5.4.4 (unchecked)` }],
  },
}
