/** What the arithmetic of a solution leaves over, as a check. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { numeralOnPage, rounded } from '../base/numeral.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
import type { Context } from './context.ts'
import type { Check } from './sheet.ts'

/** The residual that the arithmetic may leave, of the storey shear. */
const ALLOWED = 1e-9

const share = {
  of: sym('R', 'R', 'residual'),
  limit: sym('R_lim', 'R_{\\text{lim}}', 'residual'),
}
const residualRatio = formula({
  gives: sym('r', 'r', 'number'),
  body: 'R/R_lim',
  of: [share.of, share.limit],
  source: 'demand over limit',
})

/** Two digits tell what a residual has to tell: how small it is. */
export const residualOnPage = ({ si }: Value, { language }: Context): string => numeralOnPage(rounded(si, -2), language)

const LIMIT = 'limit of the arithmetic'

/** The largest of some residuals against what the arithmetic may leave. @param residuals at least one */
export function residualCheck(
  id: string,
  what: string,
  residuals: readonly Value[],
  about: string,
  context: Context,
): Check {
  const worst = residuals.reduce((a, b) => (b.si > a.si ? b : a))
  const limit: Value = {
    id: `${id}.limit`,
    tex: texAbout(share.limit.tex, about),
    si: ALLOWED,
    unit: worst.unit,
    rounding: 0,
    origin: { kind: 'default', assumption: LIMIT },
  }
  // A pure number prints alike in every system.
  const display: Display = { system: 'US', relative: false }
  const worked = work(`${id}.ratio`, residualRatio, { R: worst, R_lim: limit }, display, [about])
  const ratio = worked.si
  for (const value of [worst, limit, worked]) context.beside(value)
  return {
    kind: 'check',
    id: `${id}.check`,
    what: context.words(what),
    demand: residualOnPage(worst, context),
    capacity: numeralOnPage(rounded(ALLOWED), context.language),
    numbers: { demand: worst.si, capacity: ALLOWED, unit: '' },
    ratio,
    ratioPrinted: numeralOnPage(rounded(ratio, -2), context.language),
    ids: { demand: worst.id, capacity: limit.id, ratio: worked.id },
    ok: ratio <= 1,
    reference: LIMIT,
    sourceLines: [],
  }
}
