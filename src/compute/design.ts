/** The design shear of each wall: the largest over the cases, with the case that governs. */
import { type Formula, formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Word } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import { type Case, caseOnPage } from './cases.ts'
import type { CaseResult } from './distribution.ts'
import type { Rigidity } from './rigidity.ts'
import { L, V } from './symbols.ts'

const unitShear = sym('v', 'v', 'unitShear')
const shearPerLength = formula({
  gives: unitShear,
  body: 'V/L',
  of: [V, L],
  source: 'shear over the length of the wall',
})

/** A case in a name that the formula reader takes: EX+ is EXp. */
const plainCase = (name: string): string => name.replaceAll('+', 'p').replaceAll('-', 'm')

/** More cases than this stand in several tables, and their largest is told in short. */
export const MOST_CASES = 8

/** The name of the column with the shears of a case. */
export const shearColumn = (caseName: string): string => `V_${plainCase(caseName)}`

const envelopes = new Map<string, Formula>()

/** The largest absolute shear over the cases. */
function envelope(cases: readonly Case[]): Formula {
  const key = cases.map(({ name }) => name).join()
  const known = envelopes.get(key)
  if (known) return known
  const symbols = cases.map(({ name }) => sym(shearColumn(name), texAbout('V', caseOnPage(name)), 'force'))
  const whole = formula({
    gives: V,
    body: `max(${symbols.map(({ name }) => `abs(${name})`).join(', ')})`,
    of: symbols,
    source: 'largest over the cases, each with its sign',
  })
  const made = cases.length > MOST_CASES ? { ...whole, inShort: '\\max\\left\\vert V\\right\\vert' } : whole
  envelopes.set(key, made)
  return made
}

export function designTable({ level, springs }: Rigidity, cases: readonly CaseResult[], display: Display): Tabulation {
  const table = new Tabulation(
    springs.map(({ name }) => name),
    (row, key) => `${level}.wall.${row}.${key}`,
    display,
  ).take(
    L,
    springs.map(({ L }) => L),
  )
  const inputs: Record<string, string> = {}
  for (const { case: each, walls } of cases) {
    const symbol = sym(shearColumn(each.name), texAbout('V', caseOnPage(each.name)), 'force')
    table.takeColumn(walls.column('V'), symbol)
    inputs[symbol.name] = symbol.name
  }
  return table.work(envelope(cases.map(({ case: each }) => each)), inputs).work(shearPerLength, { V: 'V', L: 'L' })
}

export function governingCase(level: string, cases: readonly CaseResult[], design: Tabulation, wallIdx: number): Word {
  const size = (walls: Tabulation) => Math.abs(walls.column('V').numbers[wallIdx] ?? 0)
  let best = cases[0]
  for (const each of cases) if (best && size(each.walls) > size(best.walls) * (1 + 1e-12)) best = each
  return {
    id: `${level}.wall.${design.rows[wallIdx] ?? ''}.case`,
    text: best?.case.name ?? '',
    because: 'the case of its largest shear',
    about: `${level}.wall.${design.rows[wallIdx] ?? ''}.V`,
  }
}
