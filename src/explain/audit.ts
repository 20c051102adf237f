/**
 * Promise 1, for a whole document: every printed equation holds to the digits printed. With each
 * printed number standing for all numbers that print the same, the line can come to the printed result.
 */
import { evaluate } from '../base/evaluate.ts'
import { type Interval, intervalOf, meets } from '../base/interval.ts'
import { halfUnit, type Numeral, numeralValue } from '../base/numeral.ts'
import { parseExpr } from '../base/parse.ts'
import { printedNumeral, type Step, type Value } from '../base/value.ts'
import { extraDigits, substituted } from './equation.ts'
import { everyValue } from './trace.ts'

export interface Audit {
  readonly lines: number
  /** Lines that do not hold: a fault of the program. */
  readonly broken: readonly { readonly id: string; readonly line: string; readonly because: string }[]
}

export function auditSteps(roots: Iterable<Value>): Audit {
  const broken: { id: string; line: string; because: string }[] = []
  let lines = 0
  for (const value of everyValue(roots)) {
    if (value.origin.kind !== 'worked') continue
    lines++
    const { step } = value.origin
    const line = substituted(step, value)
    const because = holds(step, value)
      ? readsBack(step, value, line)
      : 'its printed numbers cannot come to the printed result'
    if (because !== '') broken.push({ id: value.id, line, because })
  }
  return { lines, broken }
}

function holds({ formula, inputs }: Step, value: Value): boolean {
  const extra = extraDigits({ formula, inputs }, value)
  const leaf = (name: string): Interval => {
    const input = inputs.get(name)
    return input ? spread(printedNumeral(input, extra), input.unit.scale) : { low: Number.NaN, high: Number.NaN }
  }
  const line = intervalOf(formula.body, leaf, () => undefined)
  return meets(line, spread(printedNumeral(value), value.unit.scale))
}

/** Every number that would print so, in base SI. */
function spread(numeral: Numeral, scale: number): Interval {
  const [middle, half] = [numeralValue(numeral), halfUnit(numeral)]
  return { low: (middle - half) * scale, high: (middle + half) * scale }
}

/** The line as text must be read back as the same numbers. */
function readsBack({ formula, inputs }: Step, value: Value, line: string): string {
  const extra = extraDigits({ formula, inputs }, value)
  const parsed = parseExpr(line)
  // A sum over more rows than the reader takes is longer than any formula; its terms are audited one by one.
  if (!parsed.ok)
    return parsed.because.rule === 'expression-too-long' ? '' : `its text does not read back: ${parsed.because.message}`
  const direct = evaluate(formula.body, name => {
    const input = inputs.get(name)
    return input ? numeralValue(printedNumeral(input, extra)) * input.unit.scale : Number.NaN
  })
  const back = evaluate(parsed.value, () => Number.NaN)
  // Both are the same arithmetic on the same numbers; only the last bits of unit conversion may differ.
  const rounding =
    1e-9 * Math.max(Math.abs(direct), Math.abs(value.si)) + 1e-6 * halfUnit(printedNumeral(value)) * value.unit.scale
  return Math.abs(back - direct) <= rounding ? '' : 'its text reads back as another number'
}
