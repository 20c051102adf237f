/** A result quoted in prose. */
import { sameDimension } from '../base/dimension.ts'
import type { Result } from '../base/ledger.ts'
import { fixed } from '../base/numeral.ts'
import { bad, good } from '../base/outcome.ts'
import { parseExpr } from '../base/parse.ts'
import { onPage, printed, type Value } from '../base/value.ts'
import { caseOnPage } from '../compute/cases.ts'
import { exprDiagnostic, unknownName } from '../model/cell.ts'
import { isWord, type Scope } from '../model/scope.ts'
import type { QuoteMark } from '../read/document.ts'
import { diagnose, type Text } from '../read/text.ts'
import type { Context } from './context.ts'
import type { Quote } from './sheet.ts'

export function explainQuote({ id, options }: QuoteMark, scope: Scope, context: Context): Result<Quote> {
  const found = scope.lookup(id.text)
  if (found === undefined) return bad([unknownName(id.text, id.span, scope)])
  if (!found.ok) return found
  if (isWord(found.value)) {
    // A word is told by the value that it is about.
    const about = scope.lookup(found.value.about)
    if (about?.ok && !isWord(about.value)) context.beside(about.value)
    return good({
      id: found.value.about,
      printed: found.value.id.endsWith('.case') ? caseOnPage(found.value.text) : found.value.text,
    })
  }
  context.root(found.value)
  if (options.text === '') return good({ id: found.value.id, printed: printed(found.value, context.language) })
  const asked = asAsked(found.value, options, context)
  return asked.ok ? good({ id: found.value.id, printed: asked.value }) : asked
}

/** `1 kip` asks for kips to the nearest one; `0.01 ft` for feet with two decimals. */
function asAsked(value: Value, options: Text, { language }: Context): Result<string> {
  const parsed = parseExpr(options.text, options.span.start)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  const { value: expr } = parsed
  if (expr.kind !== 'quantity' || expr.count <= 0 || !Number.isInteger(Math.log10(expr.count)))
    return bad([
      diagnose(
        'error',
        'quote-option',
        options.span,
        `${options.text} does not say how to print a value`,
        'Write a step and a unit, such as 1 kip or 0.01 ft.',
      ),
    ])
  if (!sameDimension(expr.unit.dimension, value.unit.dimension))
    return bad([
      diagnose(
        'error',
        'wrong-dimension',
        options.span,
        `${value.id} does not measure in ${options.text}`,
        `It is ${printed(value, language)}.`,
      ),
    ])
  const decimals = Math.max(0, -Math.log10(expr.count))
  const rounded = Math.round(value.si / expr.unit.scale / expr.count) * expr.count
  return good(onPage(fixed(rounded, decimals), expr.unit, language))
}
