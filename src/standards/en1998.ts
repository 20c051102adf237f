/** EN 1998-1:2004 with its recommended values; a national annex may set others, which are then stated. */
import { type Formula, formula, sym } from '../base/formula.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, type Direction, settingMissing } from '../model/seismic.ts'
import { diagnose } from '../read/text.ts'
import { lazily } from './lazily.ts'
import { fixedExponent, needed } from './needed.ts'
import { type Desk, type DirectionDesign, type Profile, type Said, step } from './profile.ts'
import { tabled } from './tabled.ts'

const NAME = 'EN 1998-1'

const agR = sym('a_gR', 'a_{gR}', 'number')
const gammaI = sym('gamma_I', '\\gamma_I', 'number')
const ag = sym('a_g', 'a_g', 'number')
const S = sym('S', 'S', 'number')
const TB = sym('T_B', 'T_B', 'period')
const TC = sym('T_C', 'T_C', 'period')
const TD = sym('T_D', 'T_D', 'period')
const beta = sym('beta', '\\beta', 'number')
const q = sym('q', 'q', 'number')
const Ac = sym('A_c', 'A_c', 'area')
const Ct = sym('C_t', 'C_t', 'number')
const H = sym('H', 'H', 'length')
const T1 = sym('T_1', 'T_1', 'period')
const Sd = sym('S_d', 'S_d', 'number')
const lambda = sym('lambda', '\\lambda', 'number')
const Fb = sym('F_b', 'F_b', 'force')
const W = sym('W', 'W', 'force')

/** S, T_B, T_C and T_D by spectrum type and ground type, Tables 3.2 and 3.3. */
export const spectra: Readonly<Record<'1' | '2', Readonly<Record<string, readonly [number, number, number, number]>>>> =
  {
    1: {
      A: [1, 0.15, 0.4, 2],
      B: [1.2, 0.15, 0.5, 2],
      C: [1.15, 0.2, 0.6, 2],
      D: [1.35, 0.2, 0.8, 2],
      E: [1.4, 0.15, 0.5, 2],
    },
    2: {
      A: [1, 0.05, 0.25, 1.2],
      B: [1.35, 0.05, 0.25, 1.2],
      C: [1.5, 0.1, 0.25, 1.2],
      D: [1.8, 0.1, 0.3, 1.2],
      E: [1.6, 0.05, 0.25, 1.2],
    },
  }

const importance: Readonly<Record<string, number>> = { I: 0.8, II: 1, III: 1.2, IV: 1.4 }

const SPECTRUM = `${NAME} 3.2.2.5 (unchecked), in g`
const METHOD = `${NAME} 4.3.3.2.2 (unchecked)`

const f = lazily(() => ({
  ag: formula({ gives: ag, body: 'gamma_I*a_gR', of: [gammaI, agR], source: `${NAME} 3.2.1 (unchecked)` }),
  Ct: formula({ gives: Ct, body: '0.075/sqrt(A_c/(1 m^2))', of: [Ac], source: `${METHOD}, walls` }),
  T1: formula({ gives: T1, body: 'C_t*(H/(1 m))^0.75*(1 s)', of: [Ct, H], source: `${METHOD}, H up to 40 m` }),
  rising: formula({
    gives: Sd,
    body: 'a_g*S*(2/3 + T_1/T_B*(2.5/q - 2/3))',
    of: [ag, S, T1, TB, q],
    source: `${SPECTRUM}, T_1 ≤ T_B`,
  }),
  flat: formula({ gives: Sd, body: 'a_g*S*(2.5/q)', of: [ag, S, q], source: `${SPECTRUM}, T_B ≤ T_1 ≤ T_C` }),
  falling: formula({
    gives: Sd,
    body: 'max(a_g*S*(2.5/q)*(T_C/T_1), beta*a_g)',
    of: [ag, S, q, TC, T1, beta],
    source: `${SPECTRUM}, T_C ≤ T_1 ≤ T_D`,
  }),
  far: formula({
    gives: Sd,
    body: 'max(a_g*S*(2.5/q)*(T_C*T_D/T_1^2), beta*a_g)',
    of: [ag, S, q, TC, TD, T1, beta],
    source: `${SPECTRUM}, T_1 ≥ T_D`,
  }),
  Fb: formula({
    gives: Fb,
    body: 'S_d*lambda*W',
    of: [Sd, lambda, W],
    source: `${METHOD}, S_d in g, so that m g is W`,
  }),
}))

interface Ground {
  readonly values: Readonly<Record<'a_g' | 'S' | 'T_B' | 'T_C' | 'T_D' | 'beta', Value>>
  readonly said: readonly Said[]
}

function groundOf(desk: Desk): Result<Ground> {
  const { given, display } = desk
  const read = together({
    type: required(desk, 'spectrum type', ['1', '2'], '1 for high seismicity, 2 for low.'),
    ground: required(desk, 'ground type', Object.keys(spectra[1]), 'A, B, C, D or E.'),
    gamma: importanceOf(desk),
    reference: needed(desk, { a_gR: 'The reference peak ground acceleration, as a multiple of g: a_gR: 0.16.' }),
  })
  if (!read.ok) return read
  const { type, ground, gamma, reference } = read.value
  const row = spectra[type === '2' ? '2' : '1'][ground]
  if (!row) throw new Error(`ground type ${ground} has no row`)
  const table = `${NAME} Table ${type === '1' ? '3.2' : '3.3'}, type ${type}, ground ${ground} (unchecked)`
  const [s, tb, tc, td] = [
    work('seismic.S', tabled(S, row[0], table), {}, display),
    ...([TB, TC, TD] as const).map((symbol, i) =>
      work(`seismic.${symbol.name.replace('_', '')}`, seconds(symbol, row[i + 1] ?? 0, table), {}, display),
    ),
  ]
  if (!s || !tb || !tc || !td) throw new Error('a row of the table has four numbers')
  const a = work('seismic.ag', f().ag, { gamma_I: gamma, a_gR: reference.a_gR }, display)
  const low =
    given.number('beta') ??
    work('seismic.beta', tabled(beta, 0.2, `${NAME} 3.2.2.5, recommended (unchecked)`), {}, display)
  return good({
    values: { a_g: a, S: s, T_B: tb, T_C: tc, T_D: td, beta: low },
    said: [reference.a_gR, gamma, a, s, tb, tc, td, low].map(step),
  })
}

const seconds = (gives: typeof TB, number: number, source: string): Formula =>
  formula({ gives, body: `${number} s`, of: [], source })

function required({ given }: Desk, name: string, words: readonly string[], why: string): Result<string> {
  const found = chosenWord(given, name, words)
  if (!found.ok) return found
  return found.value === undefined ? bad([settingMissing(given, name, why)]) : good(found.value)
}

function importanceOf(desk: Desk): Result<Value> {
  const stated = desk.given.number('gamma_I')
  if (stated) return good(stated)
  const word = required(desk, 'importance class', Object.keys(importance), 'I, II, III or IV; or state gamma_I.')
  if (!word.ok) return word
  const source = `${NAME} 4.2.5, importance class ${word.value}, recommended (unchecked)`
  return good(work('seismic.gammaI', tabled(gammaI, importance[word.value] ?? 1, source), {}, desk.display))
}

function directionOf(desk: Desk, ground: Ground, direction: Direction): Result<DirectionDesign> {
  const { given, display } = desk
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const read = together({
    behaviour: needed(desk, { q: 'The behaviour factor of the system, as in q: 1.5.' }, direction),
    period: periodOf(desk, ground, direction),
  })
  if (!read.ok) return read
  const { T_1, said } = read.value.period
  const inputs = { ...ground.values, q: read.value.behaviour.q, T_1 }
  const sd = work(id('Sd'), branchOf(ground, T_1), inputs, display, about)
  const tall = desk.storeys > 2 && T_1.si <= 2 * ground.values.T_C.si
  const lambdaSource = `${METHOD}, ${tall ? 'more than two storeys and T_1 ≤ 2 T_C' : 'two storeys or fewer, or T_1 > 2 T_C'}`
  const factor =
    given.number('lambda', direction) ??
    work(id('lambda'), tabled(lambda, tall ? 0.85 : 1, lambdaSource), {}, display, about)
  const v = work(id('V'), f().Fb, { S_d: sd, lambda: factor, W: desk.W }, display, about)
  const exponent = fixedExponent(
    1,
    `${NAME} 4.3.3.2.3, masses displaced in proportion to height (unchecked)`,
    desk,
    direction,
  )
  desk.assume({
    text: 'The building is regular in elevation.',
    because: `the lateral force method is used; ${NAME} 4.3.3.2.1 (unchecked)`,
  })
  return good({
    V: v,
    vertical: { k: exponent, source: `${NAME} 4.3.3.2.3 (unchecked)` },
    said: [step(read.value.behaviour.q), ...said, step(sd), step(factor), step(v)],
  })
}

function branchOf({ values: { T_B, T_C, T_D } }: Ground, period: Value): Formula {
  if (period.si < T_B.si) return f().rising
  if (period.si <= T_C.si) return f().flat
  return period.si <= T_D.si ? f().falling : f().far
}

/** T_1 as stated, or from the height; the method holds for short periods only. */
function periodOf(
  desk: Desk,
  { values: { T_C } }: Ground,
  direction: Direction,
): Result<{ readonly T_1: Value; readonly said: readonly Said[] }> {
  const { given, display, height } = desk
  const stated = given.number('T_1', direction)
  const factor = given.number('C_t', direction) ?? factorOf(desk, direction)
  if (!stated && height.si > 40)
    return bad([settingMissing(given, 'T_1', `The formula of ${METHOD} holds for heights up to 40 m.`)])
  const T_1 = stated ?? work(`seismic.${direction}.T1`, f().T1, { C_t: factor, H: height }, display, [direction])
  if (T_1.si > Math.min(4 * T_C.si, 2))
    return bad([
      diagnose(
        'error',
        'method-not-applicable',
        given.text('T_1', direction)?.span ?? given.at,
        'the period is too long for the lateral force method',
        `${NAME} 4.3.3.2.1 (unchecked) limits T_1 to 4 T_C and to 2 s. Use a modal analysis, and state its forces.`,
      ),
    ])
  const area = given.number('A_c', direction)
  return good({ T_1, said: (stated ? [stated] : [...(area ? [area] : []), factor, T_1]).map(step) })
}

function factorOf({ given, display }: Desk, direction: Direction): Value {
  const id = `seismic.${direction}.Ct`
  const area = given.number('A_c', direction)
  if (area) return work(id, f().Ct, { A_c: area }, display, [direction])
  return work(id, tabled(Ct, 0.05, `${METHOD}, all other structures`), {}, display, [direction])
}

const drift = (of: string, limit: number) => ({ value: { of, limit }, clause: `${NAME} 4.4.3.2 (unchecked)` })

export const en1998: Profile = {
  name: NAME,
  aliases: ['EN 1998-1:2004', 'Eurocode 8'],
  settings: [
    { name: 'spectrum type', key: 'type', what: 'the type of the spectrum, 1 or 2' },
    { name: 'ground type', key: 'ground', what: 'the ground type, A to E' },
    { name: 'importance class', key: 'class', what: 'the importance class, I to IV' },
    { name: 'a_gR', key: 'agR', what: 'the reference peak ground acceleration in g', sym: agR },
    { name: 'gamma_I', key: 'gammaI', what: 'the importance factor', sym: gammaI },
    { name: 'beta', key: 'beta', what: 'the lower bound factor of the spectrum', sym: beta },
    { name: 'h_n', key: 'hn', what: 'the height of the building', sym: H },
    { name: 'q', key: 'q', what: 'the behaviour factor', sym: q, each: true },
    { name: 'C_t', key: 'Ct', what: 'the factor of the approximate period', sym: Ct, each: true },
    { name: 'A_c', key: 'Ac', what: 'the effective area of the walls of the first storey', sym: Ac, each: true },
    { name: 'T_1', key: 'T1', what: 'the fundamental period', sym: T1, each: true },
    { name: 'lambda', key: 'lambda', what: 'the correction factor', sym: lambda, each: true },
  ],
  design: desk => {
    const ground = groundOf(desk)
    if (!ground.ok) return ground
    const directions = together({
      x: directionOf(desk, ground.value, 'x'),
      y: directionOf(desk, ground.value, 'y'),
    })
    return directions.ok ? good({ ground: ground.value.said, directions: directions.value }) : directions
  },
  rules: {
    accidental: { value: 0.05, clause: `${NAME} 4.3.2` },
    drift: [
      drift('times the reduction ν: brittle non-structural elements', 0.005),
      drift('times ν: ductile non-structural elements', 0.0075),
      drift('times ν: elements that do not interfere, or none', 0.01),
    ],
  },
}
