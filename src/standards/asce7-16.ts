/** ASCE/SEI 7-16: site coefficients by table, and what it asks of soft ground. */
import { type Formula, formula, type Sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, settingMissing } from '../model/seismic.ts'
import { diagnose } from '../read/text.ts'
import { asceProfile } from './asce.ts'
import { type Mapped, statedMapped } from './asce-ground.ts'
import { asceSettings, Fa, Fv, S1, SM1, SMS, SS } from './asce-letters.ts'
import { asceRules } from './asce-rules.ts'
import { lazily } from './lazily.ts'
import { type Desk, step } from './profile.ts'
import { interpolated } from './tabled.ts'

const NAME = 'ASCE 7-16'

const classes = ['A', 'B', 'C', 'D', 'E', 'F', 'default'] as const
type Tabled = 'A' | 'B' | 'C' | 'D' | 'E'

const heads = { Fa: [0.25, 0.5, 0.75, 1, 1.25, 1.5], Fv: [0.1, 0.2, 0.3, 0.4, 0.5, 0.6] } as const

/** Tables 11.4-1 and 11.4-2 from memory; class E stops where 11.4.8 asks for a study. */
export const siteCoefficients: Readonly<Record<'Fa' | 'Fv', Readonly<Record<Tabled, readonly number[]>>>> = {
  Fa: {
    A: [0.8, 0.8, 0.8, 0.8, 0.8, 0.8],
    B: [0.9, 0.9, 0.9, 0.9, 0.9, 0.9],
    C: [1.3, 1.3, 1.2, 1.2, 1.2, 1.2],
    D: [1.6, 1.4, 1.2, 1.1, 1, 1],
    E: [2.4, 1.7, 1.3],
  },
  Fv: {
    A: [0.8, 0.8, 0.8, 0.8, 0.8, 0.8],
    B: [0.8, 0.8, 0.8, 0.8, 0.8, 0.8],
    C: [1.5, 1.5, 1.5, 1.5, 1.5, 1.4],
    D: [2.4, 2.2, 2, 1.9, 1.8, 1.7],
    E: [4.2, 3.3, 2.8, 2.4, 2.2, 2],
  },
}

const AMPLIFIED = `${NAME} 11.4.4 (unchecked)`
const amplified = lazily(() => ({
  SMS: formula({ gives: SMS, body: 'F_a*S_S', of: [Fa, SS], source: AMPLIFIED }),
  SM1: formula({ gives: SM1, body: 'F_v*S_1', of: [Fv, S1], source: AMPLIFIED }),
}))

const coefficient = (gives: Sym, by: Sym, which: 'Fa' | 'Fv', site: Tabled, at: number): Formula => {
  const row = siteCoefficients[which][site]
  const nodes = row.map((number, i) => [heads[which][i] ?? 0, number] as const)
  const table = which === 'Fa' ? '11.4-1' : '11.4-2'
  return interpolated(gives, by, at, nodes, `${NAME} Table ${table}, site class ${site} (unchecked)`)
}

function mapped(desk: Desk): Result<Mapped> {
  const { given } = desk
  const site = chosenWord(given, 'site class', classes)
  if (!site.ok) return site
  const stated = statedMapped(desk)
  if (!stated.ok) return stated
  if (stated.value) return good(stated.value)
  const [ss, s1] = [given.number('S_S'), given.number('S_1')]
  const faults = [
    ...(site.value
      ? []
      : [settingMissing(given, 'site class', `Write site class: D, or another of ${classes.join(', ')}.`)]),
    ...(ss ? [] : [settingMissing(given, 'S_S', 'State S_S and S_1, or S_MS and S_M1, or S_DS and S_D1.')]),
  ]
  if (faults.length > 0 || !site.value || !ss || !s1) return bad(faults)
  return fromMap(desk, site.value, ss, s1)
}

function fromMap(desk: Desk, written: string, ss: Value, s1: Value): Result<Mapped> {
  const { display, assume } = desk
  const site = tabledClass(written)
  if (!site || (site === 'E' && (ss.si >= 1 || s1.si >= 0.2))) return bad([studyNeeded(desk, written)])
  const fa = work('seismic.Fa', coefficientFa(site, ss.si, written === 'default'), { S_S: ss }, display)
  const fv = work('seismic.Fv', coefficient(Fv, S1, 'Fv', site, s1.si), { S_1: s1 }, display)
  const sms = work('seismic.SMS', amplified().SMS, { F_a: fa, S_S: ss }, display)
  const sm1 = work('seismic.SM1', amplified().SM1, { F_v: fv, S_1: s1 }, display)
  const raised = site === 'D' && s1.si >= 0.2
  if (raised)
    assume({
      text: 'No site-specific ground motion is used; the base shear beyond 1.5 T_S is raised by half instead.',
      because: `site class D and S_1 of 0.2 or more; exception of ${NAME} 11.4.8 (unchecked)`,
    })
  if (written === 'default')
    assume({
      text: 'The ground is of site class D.',
      because: `site class is stated as default; ${NAME} 11.4.3 (unchecked)`,
    })
  return good({ SMS: sms, SM1: sm1, raised, said: [ss, s1, fa, fv, sms, sm1].map(step) })
}

/** On ground that nobody explored F_a is 1.2 at least. */
function coefficientFa(site: Tabled, at: number, byDefault: boolean): Formula {
  const read = coefficient(Fa, SS, 'Fa', site, at)
  if (!byDefault) return read
  const last = heads.Fa.at(-1) ?? 0
  const nodes = siteCoefficients.Fa[site].map((number, i) => [heads.Fa[i] ?? last, Math.max(number, 1.2)] as const)
  return interpolated(Fa, SS, at, nodes, `${NAME} Table 11.4-1, site class D by default, 1.2 at least (unchecked)`)
}

const tabledClass = (written: string): Tabled | undefined => {
  switch (written) {
    case 'A':
    case 'B':
    case 'C':
    case 'D':
    case 'E':
      return written
    case 'default':
      return 'D'
    default:
      return undefined
  }
}

/** The tables of site coefficients would not do on soft ground, so what is stated must come from a study. */
function onStated({ assume, given }: Desk, s1: Value): void {
  const site = given.text('site class')?.text.toUpperCase()
  if (s1.si < 0.2 || site === 'A' || site === 'B' || site === 'C') return
  assume({
    text: 'The ground motion that is stated comes from a site-specific study.',
    because: `S_1 is 0.2 or more; ${NAME} 11.4.8 asks for one in site classes D, E and F (unchecked)`,
  })
}

/** The procedure is not for every structure in the higher categories; 7-22 has no such table. */
function procedure({ assume }: Desk, category: string): void {
  if (category < 'D') return
  assume({
    text: 'The equivalent lateral force procedure may be used for this building.',
    because: `design category ${category}; ${NAME} Table 12.6-1 limits it for structures that are irregular, high or of long period (unchecked)`,
  })
}

const studyNeeded = ({ given }: Desk, site: string) =>
  diagnose(
    'error',
    'site-study-needed',
    given.text('site class')?.span ?? given.at,
    `site class ${site} has no coefficient for this ground motion`,
    `${NAME} 11.4.8 asks for a site-specific ground motion. State S_DS and S_D1 from it.`,
  )

export const asce716 = asceProfile({
  name: NAME,
  aliases: ['ASCE/SEI 7-16'],
  numbering: { plateau: '12.8-2', cap: '12.8-3', longCap: '12.8-4', least: '12.8-5', leastNear: '12.8-6' },
  motion: { mapped, onStated },
  settings: asceSettings,
  procedure,
  rules: asceRules(NAME),
})
