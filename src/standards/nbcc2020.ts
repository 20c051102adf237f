/** NBCC 2020, Article 4.1.8.11, the equivalent static force procedure. */
import { formula, sym } from '../base/formula.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, type Direction, settingMissing } from '../model/seismic.ts'
import { lazily } from './lazily.ts'
import { fixedExponent, needed } from './needed.ts'
import { type Desk, type DirectionDesign, type Profile, type Said, step } from './profile.ts'
import { tabled } from './tabled.ts'

const NAME = 'NBCC 2020'
const STATIC = `${NAME} 4.1.8.11`

const S02 = sym('S_02', 'S_{0.2}', 'number')
const S05 = sym('S_05', 'S_{0.5}', 'number')
const S4 = sym('S_4', 'S_{4.0}', 'number')
const STa = sym('S_Ta', 'S_{T_a}', 'number')
const IE = sym('I_E', 'I_E', 'number')
const hn = sym('h_n', 'h_n', 'length')
const T = sym('T', 'T_{\\text{calc}}', 'period')
const Tempirical = sym('T_emp', 'T_{\\text{emp}}', 'period')
const Ta = sym('T_a', 'T_a', 'period')
const Mv = sym('M_v', 'M_v', 'number')
const Rd = sym('R_d', 'R_d', 'number')
const Ro = sym('R_o', 'R_o', 'number')
const atTa = sym('C_Ta', 'C_{T_a}', 'number')
const least = sym('C_least', 'C_{\\text{min}}', 'number')
const most = sym('C_most', 'C_{\\text{max}}', 'number')
const C = sym('C', 'C', 'number')
const V = sym('V', 'V', 'force')
const W = sym('W', 'W', 'force')
const Ft = sym('F_t', 'F_t', 'force')

const f = lazily(() => ({
  wall: formula({
    gives: Tempirical,
    body: '0.05*(h_n/(1 m))^0.75*(1 s)',
    of: [hn],
    source: `${STATIC}(3), shear walls and other structures`,
  }),
  own: formula({ gives: Ta, body: 'T_emp', of: [Tempirical], source: `${STATIC}(3)` }),
  calc: formula({
    gives: Ta,
    body: 'min(T, 2*T_emp)',
    of: [T, Tempirical],
    source: `${STATIC}(3), shear walls: not more than twice`,
  }),
  atTa: formula({ gives: atTa, body: 'S_Ta*M_v*I_E/(R_d*R_o)', of: [STa, Mv, IE, Rd, Ro], source: `${STATIC}(2)` }),
  least: formula({
    gives: least,
    body: 'S_4*M_v*I_E/(R_d*R_o)',
    of: [S4, Mv, IE, Rd, Ro],
    source: `${STATIC}(2), walls`,
  }),
  most: formula({
    gives: most,
    body: 'max(2/3*S_02*I_E/(R_d*R_o), S_05*I_E/(R_d*R_o))',
    of: [S02, IE, Rd, Ro, S05],
    source: `${STATIC}(2), R_d ≥ 1.5`,
  }),
  capped: formula({
    gives: C,
    body: 'min(max(C_Ta, C_least), C_most)',
    of: [atTa, least, most],
    source: `${STATIC}(2)`,
  }),
  bare: formula({ gives: C, body: 'max(C_Ta, C_least)', of: [atTa, least], source: `${STATIC}(2), R_d < 1.5` }),
  V: formula({ gives: V, body: 'C*W', of: [C, W], source: `${STATIC}(2)` }),
  Ft: formula({
    gives: Ft,
    body: 'min(0.07*T_a/(1 s)*V, 0.25*V)',
    of: [Ta, V],
    source: `${STATIC}(7), T_a > 0.7 s (unchecked)`,
  }),
}))

const importance: Readonly<Record<string, number>> = { low: 0.8, normal: 1, high: 1.3, 'post-disaster': 1.5 }

function importanceOf({ given, display }: Desk): Result<Value> {
  const stated = given.number('I_E')
  if (stated) return good(stated)
  const word = chosenWord(given, 'importance', Object.keys(importance))
  if (!word.ok) return word
  if (word.value === undefined)
    return bad([settingMissing(given, 'importance', 'low, normal, high or post-disaster; or state I_E.')])
  const source = `${NAME} Table 4.1.8.5, importance ${word.value} (unchecked)`
  return good(work('seismic.IE', tabled(IE, importance[word.value] ?? 1, source), {}, display))
}

type Spectrum = Readonly<Record<'S_02' | 'S_05' | 'S_4', Value>>

function directionOf(desk: Desk, spectrum: Spectrum, I_E: Value, direction: Direction): Result<DirectionDesign> {
  const { given, display, height } = desk
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const read = needed(
    desk,
    {
      S_Ta: 'The design spectral acceleration at T_a for the site, in g: read it from the spectrum of the site at the period that the formula gives.',
      M_v: 'The factor for higher modes, Table 4.1.8.11; 1 for a short period.',
      R_d: 'The force modification factor for ductility, Table 4.1.8.9.',
      R_o: 'The force modification factor for overstrength, Table 4.1.8.9.',
    },
    direction,
  )
  if (!read.ok) return read
  const { S_Ta, M_v, R_d, R_o } = read.value
  const empirical = work(id('Temp'), f().wall, { h_n: height }, display, about)
  const calculated = given.number('T', direction)
  const ta = calculated
    ? work(id('Ta'), f().calc, { T: calculated, T_emp: empirical }, display, about)
    : work(id('Ta'), f().own, { T_emp: empirical }, display, about)
  const factors = { M_v, I_E, R_d, R_o }
  const c1 = work(id('C.at'), f().atTa, { S_Ta, ...factors }, display, about)
  const c2 = work(id('C.least'), f().least, { S_4: spectrum.S_4, ...factors }, display, about)
  const ductile = R_d.si >= 1.5
  const c3 = work(id('C.most'), f().most, { S_02: spectrum.S_02, S_05: spectrum.S_05, I_E, R_d, R_o }, display, about)
  const bounds = { C_Ta: c1, C_least: c2, C_most: c3 }
  const c = work(id('C'), ductile ? f().capped : f().bare, bounds, display, about)
  const v = work(id('V'), f().V, { C: c, W: desk.W }, display, about)
  const top = ta.si > 0.7 ? work(id('Ft'), f().Ft, { T_a: ta, V: v }, display, about) : undefined
  const clause = `${STATIC}(7) (unchecked)`
  const said: readonly Said[] = [
    ...[R_d, R_o, M_v, empirical, ...(calculated ? [calculated] : []), ta, S_Ta, c1, c2].map(step),
    ...(ductile ? [step(c3)] : []),
    step(c),
    step(v),
    ...(top
      ? [step(top)]
      : [
          {
            kind: 'note' as const,
            text: `T_a is not above 0.7 s, so no part of the base shear is set apart for the top (${clause}).`,
          },
        ]),
  ]
  return good({
    V: v,
    vertical: { k: fixedExponent(1, clause, desk, direction), ...(top ? { top } : {}), source: clause },
    said,
  })
}

const drift = (of: string, limit: number) => ({ value: { of, limit }, clause: `${NAME} 4.1.8.13 (unchecked)` })
const share = (part: number, what: string) => ({
  value: () => part,
  clause: `${NAME} 4.1.8.2, ${what} (from memory, unchecked)`,
})

export const nbcc2020: Profile = {
  name: NAME,
  aliases: ['NBC 2020', 'NBCC-2020'],
  settings: [
    { name: 'importance', key: 'importance', what: 'the importance category' },
    { name: 'I_E', key: 'IE', what: 'the importance factor', sym: IE },
    { name: 'S_02', key: 'S02', what: 'the design spectral acceleration at 0.2 s in g', sym: S02 },
    { name: 'S_05', key: 'S05', what: 'the same at 0.5 s', sym: S05 },
    { name: 'S_4', key: 'S4', what: 'the same at 4 s', sym: S4 },
    { name: 'S_Ta', key: 'STa', what: 'the same at T_a', sym: STa, each: true },
    { name: 'h_n', key: 'hn', what: 'the height of the building', sym: hn },
    { name: 'T', key: 'T', what: 'the period from an established method of mechanics', sym: T, each: true },
    { name: 'M_v', key: 'Mv', what: 'the factor for higher modes', sym: Mv, each: true },
    { name: 'R_d', key: 'Rd', what: 'the factor for ductility', sym: Rd, each: true },
    { name: 'R_o', key: 'Ro', what: 'the factor for overstrength', sym: Ro, each: true },
  ],
  design: desk => {
    const read = together({
      factor: importanceOf(desk),
      spectrum: needed(desk, {
        S_02: 'The design spectral acceleration at 0.2 s, in g.',
        S_05: 'The design spectral acceleration at 0.5 s, in g.',
        S_4: 'The design spectral acceleration at 4 s, in g, for the least base shear of walls.',
      }),
    })
    if (!read.ok) return read
    const { factor, spectrum } = read.value
    const directions = together({
      x: directionOf(desk, spectrum, factor, 'x'),
      y: directionOf(desk, spectrum, factor, 'y'),
    })
    const ground = [spectrum.S_02, spectrum.S_05, spectrum.S_4, factor].map(step)
    return directions.ok ? good({ ground, directions: directions.value }) : directions
  },
  rules: {
    accidental: { value: 0.1, clause: `${NAME} 4.1.8.11 (unchecked)` },
    share: { snow: share(0.25, 'a quarter of the snow'), storage: share(0.6, 'storage') },
    torsion: { value: { irregular: 1.7 }, clause: `${NAME} 4.1.8.11 (unchecked)` },
    drift: [drift('post-disaster', 0.01), drift('high importance', 0.02), drift('all other', 0.025)],
  },
}
