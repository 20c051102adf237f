/** ASCE 7, chapter 11: design ground motion, importance factor and seismic design category. */
import { type Formula, formula } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { numeralPlain, rounded } from '../base/numeral.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value, Word } from '../base/value.ts'
import { work } from '../base/work.ts'
import { chosenWord, settingMissing } from '../model/seismic.ts'
import { diagnose } from '../read/text.ts'
import { Ie, SD1, SDS, SM1, SMS, T0, TS } from './asce-letters.ts'
import { type Criteria, type Desk, type Said, step } from './profile.ts'
import { tabled } from './tabled.ts'

export interface Ground {
  readonly SDS: Value
  readonly SD1: Value
  readonly S1: Value
  readonly TS: Value
  readonly Ie: Value
  /** A to F. */
  readonly category: string
  /** True where the exception of 7-16 11.4.8 stands for a site-specific ground motion. */
  readonly raised: boolean
  readonly said: readonly Said[]
}

/** S_MS and S_M1 from what the standard starts from, with the steps that lead there. */
export interface Mapped {
  readonly SMS: Value
  readonly SM1: Value
  readonly raised: boolean
  readonly said: readonly Said[]
}

/** How an edition comes to the ground motion at the site. */
export interface Motion {
  readonly mapped: (desk: Desk) => Result<Mapped>
  /** What it takes for granted where S_DS or S_MS is stated. */
  readonly onStated?: (desk: Desk, S1: Value) => void
}

interface Clauses {
  readonly design: Readonly<Record<'SDS' | 'SD1', Formula>>
  readonly TS: Formula
  readonly T0: Formula
}

const clausesOf = (edition: string): Clauses => {
  const design = `${edition} 11.4.5 (unchecked)`
  const spectrum = `${edition} 11.4.6 (unchecked)`
  return {
    design: {
      SDS: formula({ gives: SDS, body: '2/3*S_MS', of: [SMS], source: design }),
      SD1: formula({ gives: SD1, body: '2/3*S_M1', of: [SM1], source: design }),
    },
    TS: formula({ gives: TS, body: 'S_D1/S_DS*(1 s)', of: [SD1, SDS], source: spectrum }),
    T0: formula({ gives: T0, body: '0.2*T_S', of: [TS], source: spectrum }),
  }
}

/** I_e by risk category, ASCE 7 Table 1.5-2. */
const importance: Readonly<Record<string, number>> = { I: 1, II: 1, III: 1.25, IV: 1.5 }

export function groundOf(edition: string, desk: Desk, { mapped, onStated }: Motion): Result<Ground> {
  const { given, display } = desk
  const risk = chosenWord(given, 'risk category', Object.keys(importance))
  const motion = designMotion(clausesOf(edition), desk, mapped)
  const s1 = given.number('S_1')
  const faults = [
    ...(risk.ok ? [] : risk.because),
    ...(motion.ok ? [] : motion.because),
    ...(risk.ok && !risk.value
      ? [
          settingMissing(
            given,
            'risk category',
            'Write risk category: II, or I, III or IV: it sets I_e and the design category.',
          ),
        ]
      : []),
    ...(s1 ? [] : [settingMissing(given, 'S_1', 'It decides the least base shear and design categories E and F.')]),
  ]
  if (!risk.ok || !motion.ok || !risk.value || !s1 || faults.length > 0) return bad(faults)
  const { SDS: sds, SD1: sd1, raised, said } = motion.value
  const ie = work(
    'seismic.Ie',
    tabled(Ie, importance[risk.value] ?? 1, `${edition} Table 1.5-2, risk category ${risk.value}`),
    {},
    display,
  )
  const clauses = clausesOf(edition)
  const ts = work('seismic.TS', clauses.TS, { S_D1: sd1, S_DS: sds }, display)
  const t0 = work('seismic.T0', clauses.T0, { T_S: ts }, display)
  if (!given.text('S_S')) onStated?.(desk, s1)
  if (ts.si > 1) desk.warn(inverted(desk, sds, sd1))
  const { criteria, word } = categoryOf(edition, risk.value, sds, sd1, s1)
  if (word.text === 'A') return bad([categoryA(edition, desk)])
  return good({
    SDS: sds,
    SD1: sd1,
    S1: s1,
    TS: ts,
    Ie: ie,
    category: word.text,
    raised,
    said: [...said, step(ts), step(t0), step(ie), { kind: 'criteria', criteria }, { kind: 'choice', word }],
  })
}

/** S_DS and S_D1 as stated, or two thirds of what the site has. */
function designMotion(
  { design }: Clauses,
  desk: Desk,
  mapped: (desk: Desk) => Result<Mapped>,
): Result<Pick<Ground, 'SDS' | 'SD1' | 'raised' | 'said'>> {
  const { given, display } = desk
  const [sds, sd1] = [given.number('S_DS'), given.number('S_D1')]
  const kinds = [['S_S'], ['S_MS', 'S_M1'], ['S_DS', 'S_D1']].map(names =>
    names.flatMap(name => given.text(name) ?? []),
  )
  const [first, second] = kinds.filter(kind => kind.length > 0)
  if (first?.[0] && second?.[0])
    return bad([
      diagnose(
        'error',
        'settings-both',
        first[0].span,
        'the ground motion is stated at two stages: one would be passed over',
        'Keep one of S_S, S_MS with S_M1, and S_DS with S_D1.',
        { also: [{ span: second[0].span, text: 'and stated here' }] },
      ),
    ])
  if (sds && sd1) return good({ SDS: sds, SD1: sd1, raised: false, said: [step(sds), step(sd1)] })
  if (sds || sd1) {
    const [has, lacks] = sds ? ['S_DS', 'S_D1'] : ['S_D1', 'S_DS']
    return bad([settingMissing(given, lacks, `It goes with ${has}.`)])
  }
  const found = mapped(desk)
  if (!found.ok) return found
  const { SMS: sms, SM1: sm1, raised, said } = found.value
  const SDSworked = work('seismic.SDS', design.SDS, { S_MS: sms }, display)
  const SD1worked = work('seismic.SD1', design.SD1, { S_M1: sm1 }, display)
  return good({ SDS: SDSworked, SD1: SD1worked, raised, said: [...said, step(SDSworked), step(SD1worked)] })
}

/** S_MS and S_M1 where both are stated; undefined where neither is. */
export function statedMapped({ given }: Desk): Result<Mapped | undefined> {
  const [sms, sm1] = [given.number('S_MS'), given.number('S_M1')]
  if (sms && sm1) return good({ SMS: sms, SM1: sm1, raised: false, said: [step(sms), step(sm1)] })
  if (!sms && !sm1) return good(undefined)
  const [has, lacks] = sms ? ['S_MS', 'S_M1'] : ['S_M1', 'S_MS']
  return bad([settingMissing(given, lacks, `It goes with ${has}.`)])
}

const plain = ({ si }: Value): string => numeralPlain(rounded(si))

const inverted = ({ given }: Desk, sds: Value, sd1: Value) =>
  diagnose(
    'warning',
    'spectrum-inverted',
    (given.text('S_D1') ?? given.text('S_M1') ?? given.text('S_1'))?.span ?? given.at,
    `the design acceleration at 1 s, ${plain(sd1)}, is larger than that at short periods, ${plain(sds)}`,
    'The two may have changed places. Only very soft ground has such a spectrum.',
  )

const categoryA = (edition: string, { given }: Desk) =>
  diagnose(
    'error',
    'standard-not-covered',
    given.at,
    `${edition} has no rule here for the forces of Seismic Design Category A`,
    'They are those of 11.7 and 1.4 and need none of this chapter. State them in a block forces.',
  )

// Lower bounds of B, C and D: Tables 11.6-1 and 11.6-2.
const bounds = { SDS: [0.167, 0.33, 0.5], SD1: [0.067, 0.133, 0.2] } as const

/** In risk category IV the second and third band are one category higher. */
function byTable(which: keyof typeof bounds, value: number, risk: string): string {
  const band = bounds[which].filter(bound => value >= bound).length
  return (risk === 'IV' ? ['A', 'C', 'D', 'D'] : ['A', 'B', 'C', 'D'])[band] ?? 'D'
}

/** The worse of both tables, and E or F near a great fault. */
function categoryOf(
  edition: string,
  risk: string,
  sds: Value,
  sd1: Value,
  s1: Value,
): { readonly criteria: Criteria; readonly word: Word } {
  const near = s1.si >= 0.75 ? (risk === 'IV' ? 'F' : 'E') : ''
  const rows = [
    {
      name: 'Table 11.6-1',
      value: sds,
      says: byTable('SDS', sds.si, risk),
      clause: `${edition} Table 11.6-1 (as in 7-10; this edition unchecked)`,
    },
    {
      name: 'Table 11.6-2',
      value: sd1,
      says: byTable('SD1', sd1.si, risk),
      clause: `${edition} Table 11.6-2 (as in 7-10; this edition unchecked)`,
    },
    {
      name: '11.6',
      value: s1,
      says: near || '–',
      clause: `${edition} 11.6, E or F from 0.75 (as in 7-10; this edition unchecked)`,
    },
  ]
  const worst = rows.reduce((a, b) => (b.says !== '–' && b.says > a.says ? b : a))
  const names = ['S_DS', 'S_D1', 'S_1']
  const at = rows.indexOf(worst)
  return {
    criteria: {
      id: 'seismic.criteria',
      caption: `Seismic design category by each criterion, risk category ${risk}.`,
      head: 'Criterion',
      rows: rows.map((row, i) => ({ ...row, name: names[i] ?? '' })),
      decides: { head: 'Category', row: at },
    },
    word: {
      id: 'seismic.category',
      text: worst.says,
      because: `The seismic design category is ${worst.says}: ${worst.name} asks for it in risk category ${risk}.`,
      about: worst.value.id,
    },
  }
}
