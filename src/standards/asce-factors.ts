/** ASCE 7, 12.2 and 12.3.4: the factors of a direction's system, and whether it may stand in the design category. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { nearNames } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Direction, settingMissing } from '../model/seismic.ts'
import { diagnose, type Text } from '../read/text.ts'
import type { Ground } from './asce-ground.ts'
import { Cd, Omega0, R, rho } from './asce-letters.ts'
import { type System, systemsOf } from './asce-systems.ts'
import type { Criteria, Desk, Said } from './profile.ts'
import { tabled } from './tabled.ts'

const limit = sym('h_max', 'h_{\\text{max}}', 'length')

/** True where the other direction has its system. */
const other = ({ text }: Desk['given'], direction: Direction): boolean => {
  const across = direction === 'x' ? 'y' : 'x'
  return (text('system', across) ?? text('R', across)) !== undefined
}

export interface Factors {
  readonly R: Value
  readonly said: readonly Said[]
}

/** R, Ω_0 and C_d as stated or from the table, ρ, and whether the system may stand in the category at this height. */
export function systemFactors(edition: string, desk: Desk, ground: Ground, direction: Direction): Result<Factors> {
  const { given, display } = desk
  const named = given.text('system', direction)
  const systems = systemsOf(edition)
  const system = named && systems.find(({ name }) => name.toLowerCase() === named.text.toLowerCase())
  if (named && !system) return bad([unknownSystem(named, systems)])
  const stated = given.number('R', direction)
  if (!system && !stated)
    return bad([
      settingMissing(
        given,
        other(given, direction) ? `system ${direction}` : 'system',
        'Name a row of Table 12.2-1, as in system: bearing wall, special reinforced masonry shear walls; or state R.',
      ),
    ])
  const about = [direction]
  const factor = (name: string, key: 'R' | 'Omega0' | 'Cd', symbol: Sym): readonly Value[] => {
    const own = given.number(name, direction)
    if (own) return [own]
    if (!system) return []
    const source = system.source(edition, key === 'R' ? 'R' : 'factors')
    return [work(`seismic.${direction}.${key}`, tabled(symbol, system[key], source), {}, display, about)]
  }
  const [r] = factor('R', 'R', R)
  if (!r) throw new Error('R was found to be stated or tabled')
  const factors = [
    r,
    ...factor('Omega_0', 'Omega0', Omega0),
    ...factor('C_d', 'Cd', Cd),
    redundancyOf(edition, desk, ground, direction),
  ]
  const permitted = system && named ? permittedIn(edition, desk, ground, direction, system, named.span) : good([])
  if (!permitted.ok) return permitted
  return good({ R: r, said: [...permitted.value, { kind: 'criteria', criteria: factorTable(direction, factors) }] })
}

const factorTable = (direction: Direction, factors: readonly Value[]): Criteria => ({
  id: `seismic.${direction}.factors`,
  caption: `Factors of the system along ${direction}.`,
  head: 'Factor',
  rows: factors.map(value => ({
    name: factorNames[value.id.split('.').at(-1) ?? ''] ?? '',
    value,
    clause: clauseOf(value),
  })),
})

const factorNames: Readonly<Record<string, string>> = { R: 'R', Omega0: 'Ω_0', Cd: 'C_d', rho: 'ρ' }

const clauseOf = ({ origin }: Value): string =>
  origin.kind === 'worked' && origin.span === undefined ? origin.step.formula.source : 'given'

function redundancyOf(edition: string, { given, display }: Desk, { category }: Ground, direction: Direction): Value {
  const stated = given.number('rho', direction)
  if (stated) return stated
  const [number, clause] = category < 'D' ? [1, '12.3.4.1'] : [1.3, '12.3.4.2']
  const source = `${edition} ${clause}, design category ${category} (clause unchecked)`
  return work(`seismic.${direction}.rho`, tabled(rho, number, source), {}, display, [direction])
}

function unknownSystem(named: Text, systems: readonly System[]) {
  const names = systems.map(({ name }) => name)
  const words = named.text
    .toLowerCase()
    .split(/[^a-z]+/)
    .filter(word => word.length > 3)
  const near = nearNames(named.text, names)
  const alike =
    near.length > 0
      ? near
      : names.filter(name => words.length > 0 && words.every(word => name.toLowerCase().includes(word)))
  const help =
    alike.length > 0
      ? `There ${alike.length === 1 ? 'is' : 'are'}: ${alike.join('; ')}.`
      : 'Write it as in bearing wall, special reinforced masonry shear walls. Chapter 3 of the manual lists them.'
  const message = `Table 12.2-1 has no system ${named.text} here`
  return diagnose('error', 'unknown-system', named.span, message, `${help}\nOr state R, Omega_0 and C_d.`)
}

/** The system's height limit as a check, or the fault that it may not stand here. */
function permittedIn(
  edition: string,
  desk: Desk,
  { category }: Ground,
  direction: Direction,
  system: System,
  at: Span,
): Result<readonly Said[]> {
  const found = system.limit(category)
  const reference = system.source(edition, 'height')
  const help = `${reference}.\nChoose another system. Where an exception of the table holds, leave system out and state R, Omega_0 and C_d.`
  if (found === 'NP')
    return bad([
      diagnose(
        'error',
        'system-not-permitted',
        at,
        `${system.words} are not permitted in design category ${category}`,
        help,
      ),
    ])
  if (found === 'NL')
    return good([
      {
        kind: 'note',
        text: `Along ${direction}: ${system.words}. It has no height limit in design category ${category} (${reference}).`,
      },
    ])
  const formulaOf = formula({ gives: limit, body: `${found} ft`, of: [], source: reference })
  const capacity = work(`seismic.${direction}.hmax`, formulaOf, {}, desk.display, [direction])
  if (desk.height.si > capacity.si)
    return bad([
      diagnose(
        'error',
        'system-not-permitted',
        at,
        `${system.words} are limited to ${found} ft in design category ${category}, and the structure is ${feet(desk.height)} ft high`,
        help,
      ),
    ])
  const what = `Height of the structure for ${system.words}, design category ${category}`
  return good([
    { kind: 'check', check: { id: `seismic.${direction}.height`, what, demand: desk.height, capacity, reference } },
  ])
}

const feet = ({ si }: Value): string => (si / 0.3048).toFixed(1)
