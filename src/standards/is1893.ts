/** IS 1893 (Part 1):2016, the equivalent static method. */
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

const NAME = 'IS 1893-1:2016'

const Z = sym('Z', 'Z', 'number')
const I = sym('I', 'I', 'number')
const R = sym('R', 'R', 'number')
const T = sym('T_a', 'T_a', 'period')
const h = sym('h', 'h', 'length')
const d = sym('d', 'd', 'length')
const Aw = sym('A_w', 'A_w', 'area')
const Sa = sym('S_a', 'S_a', 'number')
const Ah = sym('A_h', 'A_h', 'number')
const least = sym('A_least', 'A_{h,\\text{min}}', 'number')
const V = sym('V_B', 'V_B', 'force')
const W = sym('W', 'W', 'force')

/** Zone factor, Table 3, and least horizontal force as a share of the weight, Table 7. */
const zones: Readonly<Record<string, readonly [Z: number, least: number]>> = {
  II: [0.1, 0.007],
  III: [0.16, 0.011],
  IV: [0.24, 0.016],
  V: [0.36, 0.024],
}

/** Plateau up to `until` s, then over the period up to 4 s, then level: 6.4.2, equivalent static method. */
const soils: Readonly<Record<string, { readonly until: number; readonly over: number; readonly last: number }>> = {
  I: { until: 0.4, over: 1, last: 0.25 },
  II: { until: 0.55, over: 1.36, last: 0.34 },
  III: { until: 0.67, over: 1.67, last: 0.42 },
}

/** S_a/g of a soil at a period, as the formula of its branch. */
export function spectrum(soil: string, period: number): Formula {
  const known = soils[soil]
  if (!known) throw new Error(`soil ${soil} has no spectrum`)
  const source = (range: string) => `${NAME} 6.4.2, S_a in g, soil type ${soil}, ${range} (from memory, unchecked)`
  if (period <= known.until) return tabled(Sa, 2.5, source(`T_a ≤ ${known.until} s`))
  if (period > 4) return tabled(Sa, known.last, source('T_a > 4 s'))
  return formula({
    gives: Sa,
    body: `${known.over}*(1 s)/T_a`,
    of: [T],
    source: source(`T_a from ${known.until} s to 4 s`),
  })
}

const PERIOD = `${NAME} 7.6.2 (unchecked)`
const f = lazily(() => ({
  plain: formula({
    gives: T,
    body: '0.09*(h/(1 m))/sqrt(d/(1 m))*(1 s)',
    of: [h, d],
    source: `${PERIOD}, all other buildings`,
  }),
  walls: formula({
    gives: T,
    body: 'max(0.075*(h/(1 m))^0.75/sqrt(A_w/(1 m^2)), 0.09*(h/(1 m))/sqrt(d/(1 m)))*(1 s)',
    of: [h, Aw, d],
    source: `${PERIOD}, structural walls`,
  }),
  Ah: formula({
    gives: Ah,
    body: 'max(Z/2*S_a/(R/I), A_least)',
    of: [Z, Sa, R, I, least],
    source: `${NAME} 6.4.2 and 7.2.2 (unchecked)`,
  }),
  V: formula({ gives: V, body: 'A_h*W', of: [Ah, W], source: `${NAME} 7.2.1 (unchecked)` }),
}))

interface Ground {
  readonly soil: string
  readonly Z: Value
  readonly I: Value
  readonly least: Value
}

function groundOf(desk: Desk): Result<Ground> {
  const { given, display } = desk
  const read = together({
    zone: word(desk, 'zone', Object.keys(zones), 'II, III, IV or V.'),
    soil: word(desk, 'soil type', Object.keys(soils), 'I for rock or hard soil, II for medium, III for soft.'),
    numbers: needed(desk, { I: 'The importance factor, Table 8.' }),
  })
  if (!read.ok) return read
  const { zone, soil, numbers } = read.value
  const [factor, share] = zones[zone] ?? [0, 0]
  const table = (number: string) => `${NAME} Table ${number}, zone ${zone} (from memory, unchecked)`
  return good({
    soil,
    I: numbers.I,
    Z: given.number('Z') ?? work('seismic.Z', tabled(Z, factor, table('3')), {}, display),
    least: work('seismic.Ahmin', tabled(least, share, table('7')), {}, display),
  })
}

function word({ given }: Desk, name: string, words: readonly string[], why: string): Result<string> {
  const found = chosenWord(given, name, words)
  if (!found.ok) return found
  return found.value === undefined ? bad([settingMissing(given, name, why)]) : good(found.value)
}

function directionOf(desk: Desk, ground: Ground, direction: Direction): Result<DirectionDesign> {
  const { display } = desk
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const read = together({
    system: needed(desk, { R: 'The response reduction factor of the system, Table 9.' }, direction),
    period: periodOf(desk, direction),
  })
  if (!read.ok) return read
  const { R: r } = read.value.system
  const { T_a, said } = read.value.period
  const sa = work(id('Sa'), spectrum(ground.soil, T_a.si), { T_a }, display, about)
  const ah = work(id('Ah'), f().Ah, { Z: ground.Z, S_a: sa, R: r, I: ground.I, A_least: ground.least }, display, about)
  const v = work(id('V'), f().V, { A_h: ah, W: desk.W }, display, about)
  const clause = `${NAME} 7.6.3 (unchecked)`
  return good({
    V: v,
    vertical: { k: fixedExponent(2, clause, desk, direction), source: clause },
    said: [r, ...said, sa, ah, v].map(step),
  })
}

function periodOf(desk: Desk, direction: Direction): Result<{ readonly T_a: Value; readonly said: readonly Value[] }> {
  const { given, display, height } = desk
  const stated = given.number('T_a', direction)
  if (stated) return good({ T_a: stated, said: [stated] })
  const read = needed(desk, { d: 'The size of the plan at the base along the direction; or state T_a.' }, direction)
  if (!read.ok) return read
  const area = given.number('A_w', direction)
  const inputs = { h: height, d: read.value.d, ...(area ? { A_w: area } : {}) }
  const T_a = work(`seismic.${direction}.Ta`, area ? f().walls : f().plain, inputs, display, [direction])
  return good({ T_a, said: [read.value.d, ...(area ? [area] : []), T_a] })
}

/** 3 kPa: live load above it counts for half. */
const HEAVY = 3000 * (1 + 1e-12)

export const is1893: Profile = {
  name: NAME,
  aliases: ['IS 1893 (Part 1):2016', 'IS 1893-1'],
  cautions: [
    `The design eccentricity of ${NAME} 7.8.2 takes the static eccentricity 1.5 times where that is worse; here it is taken once.`,
  ],
  settings: [
    { name: 'zone', key: 'zone', what: 'the seismic zone, II to V' },
    { name: 'soil type', key: 'soil', what: 'the type of soil, I to III' },
    { name: 'Z', key: 'Z', what: 'the zone factor', sym: Z },
    { name: 'I', key: 'I', what: 'the importance factor', sym: I },
    { name: 'h_n', key: 'hn', what: 'the height of the building', sym: h },
    { name: 'R', key: 'R', what: 'the response reduction factor', sym: R, each: true },
    { name: 'd', key: 'd', what: 'the size of the plan at the base along the direction', sym: d, each: true },
    { name: 'A_w', key: 'Aw', what: 'the effective area of the walls of the first storey', sym: Aw, each: true },
    { name: 'T_a', key: 'Ta', what: 'the fundamental period', sym: T, each: true },
  ],
  design: desk => {
    const ground = groundOf(desk)
    if (!ground.ok) return ground
    const { Z: z, I: i, least: low } = ground.value
    const directions = together({
      x: directionOf(desk, ground.value, 'x'),
      y: directionOf(desk, ground.value, 'y'),
    })
    return directions.ok ? good({ ground: [z, i, low].map(step), directions: directions.value }) : directions
  },
  rules: {
    accidental: { value: 0.05, clause: `${NAME} 7.8.2` },
    share: {
      live: {
        value: load => (load > HEAVY ? 0.5 : 0.25),
        clause: `${NAME} Table 10: 25% up to 3 kPa, 50% above (unchecked)`,
      },
    },
    drift: [{ value: { of: 'all buildings', limit: 0.004 }, clause: `${NAME} 7.11.1 (unchecked)` }],
  },
}
