/** Settings that a standard cannot do without, and the exponent that several of them share. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { formula, sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Direction, settingMissing } from '../model/seismic.ts'
import type { Desk } from './profile.ts'
import { tabled } from './tabled.ts'

/**
 * The values of some settings, or one message for each that is missing.
 * @param wanted each name with why it is needed
 */
export function needed<N extends string>(
  { given }: Desk,
  wanted: Readonly<Record<N, string>>,
  direction?: Direction,
): Result<Readonly<Record<N, Value>>> {
  const faults: Diagnostic[] = []
  const found: Partial<Record<N, Value>> = {}
  for (const name of Object.keys(wanted) as N[]) {
    const value = given.number(name, direction)
    if (value) found[name] = value
    else {
      const lone = direction && given.text(name, direction === 'x' ? 'y' : 'x')
      faults.push(settingMissing(given, lone ? `${name} ${direction}` : name, wanted[name]))
    }
  }
  // Without faults every name has its value.
  return faults.length > 0 ? bad(faults) : good(found as Readonly<Record<N, Value>>)
}

export const k = sym('k', 'k', 'number')
const T = sym('T_1', 'T_1', 'period')

/** k of W h^k: 1 up to 0.5 s, 2 from 2.5 s on, and on a straight line between. */
export function exponentByPeriod(clause: string, period: Value, { given, display }: Desk, direction: Direction): Value {
  const stated = given.number('k', direction)
  if (stated) return stated
  const id = `seismic.${direction}.k`
  const about = [direction]
  if (period.si <= 0.5) return work(id, tabled(k, 1, `${clause}, T ≤ 0.5 s`), {}, display, about)
  if (period.si >= 2.5) return work(id, tabled(k, 2, `${clause}, T ≥ 2.5 s (unchecked)`), {}, display, about)
  const source = `${clause}, between T = 0.5 s and 2.5 s (2.5 s unchecked)`
  return work(
    id,
    formula({ gives: k, body: '1 + (T_1 - (0.5 s))/(2 s)', of: [T], source }),
    { T_1: period },
    display,
    about,
  )
}

/** k of W h^k where the standard fixes it. */
export const fixedExponent = (power: 1 | 2, clause: string, { display }: Desk, direction: Direction): Value =>
  work(`seismic.${direction}.k`, tabled(k, power, clause), {}, display, [direction])
