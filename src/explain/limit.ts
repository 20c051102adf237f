/** A check of the engineer's own, as one line of the page. */
import { type Numeral, numeralOnPage, numeralValue } from '../base/numeral.ts'
import { unitText } from '../base/unit.ts'
import { printed, printedNumeral, type Value } from '../base/value.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Block } from '../read/block.ts'
import type { Context } from './context.ts'
import { shownCheck } from './residual.ts'
import type { Check, Piece } from './sheet.ts'

/** The comment says what is checked and, after a semicolon, where the limit is from. */
export function limitPiece(line: Block['lines'][number], sheet: Worksheet, context: Context): Piece {
  const limit = sheet.limit(line)
  if (!limit.ok) return { kind: 'fault', diagnostics: limit.because }
  const { id, demand, capacity, ratio } = limit.value
  for (const value of [demand, capacity, ratio]) context.roots.set(value.id, value)
  const [what = '', ...reference] = line.comment.split(';')
  const inUnit = (value: Value) => value.si / demand.unit.scale
  const ok = ratio.si <= 1
  const check: Check = {
    kind: 'check',
    id: `${id}.check`,
    what: what.trim() === '' ? line.text : what.trim(),
    demand: printed(demand, context.language),
    // Sizes are compared in one unit.
    capacity: printed({ ...capacity, unit: demand.unit }, context.language),
    numbers: { demand: inUnit(demand), capacity: inUnit(capacity), unit: unitText(demand.unit) },
    ratio: ratio.si,
    ratioPrinted: numeralOnPage(ratioNumeral(ratio), context.language),
    ok,
    reference: reference.join(';').trim(),
    sourceLines: context.lines([line.span]),
  }
  context.check(check)
  return shownCheck(check, context)
}

/** More digits than this tell a reader nothing. */
const MOST_EXTRA = 6

/** A ratio beyond its limit never prints as 1. */
function ratioNumeral(ratio: Value): Numeral {
  for (let extra = 0; extra < MOST_EXTRA; extra++) {
    const numeral = printedNumeral(ratio, extra)
    if (ratio.si <= 1 || numeralValue(numeral) > 1) return numeral
  }
  return printedNumeral(ratio, MOST_EXTRA)
}
