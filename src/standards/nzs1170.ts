/** NZS 1170.5:2004, the equivalent static method. */
import { type Formula, formula, sym } from '../base/formula.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, type Direction, settingMissing } from '../model/seismic.ts'
import { lazily } from './lazily.ts'
import { fixedExponent, needed } from './needed.ts'
import { type Desk, type DirectionDesign, type Profile, step } from './profile.ts'
import { tabled } from './tabled.ts'

const NAME = 'NZS 1170.5'

const Z = sym('Z', 'Z', 'number')
const Ru = sym('R_u', 'R_u', 'number')
const N = sym('N', 'N', 'number')
const Ch = sym('C_h', 'C_h', 'number')
const T1 = sym('T_1', 'T_1', 'period')
const C = sym('C', 'C', 'number')
const mu = sym('mu', '\\mu', 'number')
const kmu = sym('k_mu', 'k_{\\mu}', 'number')
const Sp = sym('S_p', 'S_p', 'number')
const Cd = sym('C_d', 'C_d', 'number')
const V = sym('V', 'V', 'force')
const W = sym('W_t', 'W_t', 'force')
const Ft = sym('F_t', 'F_t', 'force')

type Soil = 'A' | 'B' | 'C' | 'D' | 'E'

interface Branch {
  /** In s. */
  readonly from: number
  readonly body: string
}

// Table 3.1 for the equivalent static method, from memory as the equations of the commentary. Neighbouring branches
// meet within one in the last digit of the table.
const shapes: Readonly<Record<Soil, readonly Branch[]>> = {
  A: rock(),
  B: rock(),
  C: [
    { from: 0, body: '2.36' },
    { from: 0.4, body: '2.0*((0.5 s)/T_1)^0.75' },
    { from: 1.5, body: '1.32*(1 s)/T_1' },
    { from: 3, body: '3.96*(1 s^2)/T_1^2' },
  ],
  D: [
    { from: 0, body: '3.00' },
    { from: 0.56, body: '2.4*((0.75 s)/T_1)^0.75' },
    { from: 1.5, body: '2.14*(1 s)/T_1' },
    { from: 3, body: '6.42*(1 s^2)/T_1^2' },
  ],
  E: [
    { from: 0, body: '3.00' },
    { from: 1, body: '3.0*((1 s)/T_1)^0.75' },
    { from: 1.5, body: '3.32*(1 s)/T_1' },
    { from: 3, body: '9.96*(1 s^2)/T_1^2' },
  ],
}

function rock(): readonly Branch[] {
  return [
    { from: 0, body: '1.89' },
    { from: 0.4, body: '1.6*((0.5 s)/T_1)^0.75' },
    { from: 1.5, body: '1.05*(1 s)/T_1' },
    { from: 3, body: '3.15*(1 s^2)/T_1^2' },
  ]
}

/** The spectral shape factor of a soil at a period, as the formula of its branch. */
export function shapeFactor(soil: Soil, period: number): Formula {
  const at = shapes[soil].findLastIndex(({ from }) => period >= from)
  const [branch, next] = shapes[soil].slice(at, at + 2)
  if (!branch) throw new Error('a period is above zero')
  const range = branch.from === 0 ? `T_1 < ${next?.from} s` : `T_1 ≥ ${branch.from} s`
  const source = `${NAME} Table 3.1, soil class ${soil}, ${range} (from memory, unchecked)`
  return formula({ gives: Ch, body: branch.body, of: branch.from === 0 ? [] : [T1], source })
}

const STATIC = `${NAME} 5.2.1.1 (unchecked)`
const f = lazily(() => ({
  C: formula({ gives: C, body: 'C_h*Z*R_u*N', of: [Ch, Z, Ru, N], source: `${NAME} 3.1.1 (unchecked)` }),
  stiff: formula({
    gives: kmu,
    body: '(mu - 1)*max(T_1, 0.4 s)/(0.7 s) + 1',
    of: [mu, T1],
    source: `${STATIC}, soil class A to D, T_1 < 0.7 s and not taken below 0.4 s`,
  }),
  soft: formula({ gives: kmu, body: 'mu', of: [mu], source: `${STATIC}, soil class A to D, T_1 ≥ 0.7 s` }),
  Cd: formula({
    gives: Cd,
    body: 'max(C*S_p/k_mu, (Z/20 + 0.02)*R_u, 0.03*R_u)',
    of: [C, Sp, kmu, Z, Ru],
    source: STATIC,
  }),
  V: formula({ gives: V, body: 'C_d*W_t', of: [Cd, W], source: STATIC }),
  Ft: formula({ gives: Ft, body: '0.08*V', of: [V], source: `${NAME} 6.2.1.3 (unchecked)` }),
}))

interface Ground {
  readonly soil: Soil
  readonly Z: Value
  readonly R_u: Value
  readonly N: Value
}

const soils: readonly Soil[] = ['A', 'B', 'C', 'D', 'E']

function groundOf(desk: Desk): Result<Ground> {
  const { given, display } = desk
  const word = chosenWord(given, 'soil class', soils)
  const numbers = needed(desk, {
    Z: 'The hazard factor of the place, Table 3.3.',
    R_u: 'The return period factor for the ultimate limit state, Table 3.5.',
  })
  const soil = word.ok ? soils.find(one => one === word.value) : undefined
  if (!word.ok || !numbers.ok || !soil)
    return bad([
      ...(word.ok ? (soil ? [] : [settingMissing(given, 'soil class', 'A, B, C, D or E, 3.1.3.')]) : word.because),
      ...(numbers.ok ? [] : numbers.because),
    ])
  const near = given.number('N')
  if (!near)
    desk.assume({ text: 'No major fault lies within 20 km.', because: `N is not stated; ${NAME} 3.1.6 (unchecked)` })
  const n = near ?? work('seismic.N', tabled(N, 1, `${NAME} 3.1.6, far from major faults (unchecked)`), {}, display)
  return good({ soil, ...numbers.value, N: n })
}

function directionOf(desk: Desk, ground: Ground, direction: Direction): Result<DirectionDesign> {
  const { given, display } = desk
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const read = needed(
    desk,
    {
      T_1: 'The standard has no formula for it here: take it from Rayleigh’s method, as in T_1: 0.3 s.',
      mu: 'The ductility factor of the system, as in mu: 1.25.',
      S_p: 'The structural performance factor, as in S_p: 0.9.',
    },
    direction,
  )
  if (!read.ok) return read
  const { T_1, mu: ductility, S_p } = read.value
  const reduction = reductionOf(desk, ground, T_1, ductility, direction)
  if (!reduction.ok) return reduction
  const ch = given.number('C_h', direction) ?? work(id('Ch'), shapeFactor(ground.soil, T_1.si), { T_1 }, display, about)
  const c = work(id('C'), f().C, { C_h: ch, Z: ground.Z, R_u: ground.R_u, N: ground.N }, display, about)
  const cd = work(id('Cd'), f().Cd, { C: c, S_p, k_mu: reduction.value, Z: ground.Z, R_u: ground.R_u }, display, about)
  const v = work(id('V'), f().V, { C_d: cd, W_t: desk.W }, display, about)
  const top = work(id('Ft'), f().Ft, { V: v }, display, about)
  const clause = `${NAME} 6.2.1.3 (unchecked)`
  return good({
    V: v,
    vertical: { k: fixedExponent(1, clause, desk, direction), top, source: clause },
    said: [T_1, ductility, S_p, ch, c, reduction.value, cd, v, top].map(step),
  })
}

function reductionOf(
  { given, display }: Desk,
  { soil }: Ground,
  T_1: Value,
  ductility: Value,
  direction: Direction,
): Result<Value> {
  const stated = given.number('k_mu', direction)
  if (stated) return good(stated)
  if (soil === 'E')
    return bad([settingMissing(given, 'k_mu', `This version has no rule of ${NAME} for soil class E: state k_mu.`)])
  const made = T_1.si < 0.7 ? f().stiff : f().soft
  const inputs = T_1.si < 0.7 ? { mu: ductility, T_1 } : { mu: ductility }
  return good(work(`seismic.${direction}.kmu`, made, inputs, display, [direction]))
}

const share = (psi: number, what: string) => ({
  value: () => psi,
  clause: `${NAME} 4.2, ${what} (from memory, unchecked)`,
})

export const nzs1170: Profile = {
  name: NAME,
  aliases: ['NZS 1170.5:2004'],
  settings: [
    { name: 'soil class', key: 'soil', what: 'the site subsoil class, A to E' },
    { name: 'Z', key: 'Z', what: 'the hazard factor', sym: Z },
    { name: 'R_u', key: 'Ru', what: 'the return period factor', sym: Ru },
    { name: 'N', key: 'N', what: 'the near-fault factor', sym: N },
    { name: 'h_n', key: 'hn', what: 'the height of the building', sym: sym('h_n', 'h_n', 'length') },
    { name: 'T_1', key: 'T1', what: 'the fundamental period', sym: T1, each: true },
    { name: 'mu', key: 'mu', what: 'the ductility factor', sym: mu, each: true },
    { name: 'S_p', key: 'Sp', what: 'the structural performance factor', sym: Sp, each: true },
    { name: 'k_mu', key: 'kmu', what: 'the reduction for ductility', sym: kmu, each: true },
    { name: 'C_h', key: 'Ch', what: 'the spectral shape factor', sym: Ch, each: true },
  ],
  design: desk => {
    const ground = groundOf(desk)
    if (!ground.ok) return ground
    const { Z: z, R_u, N: n } = ground.value
    const directions = together({
      x: directionOf(desk, ground.value, 'x'),
      y: directionOf(desk, ground.value, 'y'),
    })
    return directions.ok ? good({ ground: [z, R_u, n].map(step), directions: directions.value }) : directions
  },
  rules: {
    accidental: { value: 0.1, clause: `${NAME} 5.3.2` },
    share: {
      storage: share(0.6, 'storage'),
      live: share(0.3, 'floors other than storage'),
      snow: share(0, 'roofs'),
    },
    torsion: { value: { irregular: 1.4 }, clause: `${NAME} 4.5.2.3 (unchecked)` },
    drift: [{ value: { of: 'ultimate limit state', limit: 0.025 }, clause: `${NAME} 7.5.1 (unchecked)` }],
  },
}
