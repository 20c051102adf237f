/** A value as a worked equation: letters, values put in, result, and where it came from. */
import { evaluate } from '../base/evaluate.ts'

import { namesIn } from '../base/expr.ts'
import { halfUnit, type Numeral, numeralTex, numeralValue } from '../base/numeral.ts'
import { plain } from '../base/plain.ts'
import { joinTex, marked, type Tex, tex } from '../base/tex.ts'
import { letter, typeset, valueSet } from '../base/typeset.ts'
import { unitTex } from '../base/unit.ts'
import { printedNumeral, printedPlain, type Step, spansOf, type Value } from '../base/value.ts'
import type { Context } from './context.ts'
import type { Equation } from './sheet.ts'

/** Tells of a value that is printed with its formula. */
export function tellValue(value: Value, context: Context): void {
  context.root(value)
  if (value.origin.kind === 'worked') context.uses(value.origin.step.formula)
}

export function explainValue(value: Value, context: Context): Equation {
  tellValue(value, context)
  const { origin } = value
  const step = origin.kind === 'worked' ? origin.step : undefined
  return {
    kind: 'equation',
    id: value.id,
    number: '',
    symbol: tex(value.tex),
    lines: step ? linesOf(step, value, context) : [],
    result: resultTex(value, context),
    reference: context.words(referenceOf(value)),
    assumes: step?.formula.assumes.map(text => context.words(text)) ?? [],
    sourceLines: context.places(spansOf(value)),
  }
}

function referenceOf({ origin }: Value): string {
  switch (origin.kind) {
    case 'given':
      return 'given'
    case 'default':
      return `assumed: ${origin.assumption}`
    case 'measured':
      return origin.what
    case 'worked':
      return origin.step.formula.source
  }
}

function linesOf(step: Step, value: Value, { language }: Context): readonly Tex[] {
  const { body, symbols, inShort } = step.formula
  if (inShort !== undefined) return [tex(inShort)]
  const size = body.kind === 'negate' ? body.of : body
  if (size.kind === 'quantity' || size.kind === 'number') return []
  const names = namesIn(body)
  const letters = typeset(body, name => letter(symbols.get(name)?.tex ?? name), language)
  if (names.size === 0) return [letters]
  const extra = extraDigits(step, value)
  const values = typeset(
    body,
    name => {
      const input = inputOf(step, name)
      const piece = valueSet(printedNumeral(input, extra), input.unit, language)
      return { ...piece, tex: marked(input.id, piece.tex) }
    },
    language,
  )
  return body.kind === 'name' ? [letters] : [letters, values]
}

/** The formula with printed values put in, as text that reads back. */
export function substituted(step: Step, value: Value): string {
  const extra = extraDigits(step, value)
  return plain(step.formula.body, name => printedPlain(inputOf(step, name), extra))
}

function inputOf({ inputs }: Step, name: string): Value {
  const found = inputs.get(name)
  if (!found) throw new Error(`${name} was not put in`)
  return found
}

/** More digits than this in a line tell nobody anything. */
const MOST_EXTRA = 4

/**
 * Digits beyond the usual that the values need for a reader with a calculator to
 * meet the printed result within one unit of its last digit.
 */
export function extraDigits(step: Step, value: Value): number {
  const target = printedNumeral(value)
  const wanted = numeralValue(target) * value.unit.scale
  const allowed = 2 * halfUnit(target) * value.unit.scale
  for (let extra = 0; extra < MOST_EXTRA; extra++) {
    const met = evaluate(step.formula.body, name => {
      const input = inputOf(step, name)
      return numeralValue(printedNumeral(input, extra)) * input.unit.scale
    })
    if (Math.abs(met - wanted) <= allowed) return extra
  }
  return MOST_EXTRA
}

/** The result in bold with its unit. */
function resultTex(value: Value, { language }: Context): Tex {
  const numeral = printedNumeral(value)
  const unit = unitTex(value.unit)
  const spaced = unit === '' || unit === '\\mathrm{\\%}' ? unit : `\\ ${unit}`
  return marked(value.id, joinTex(bold(numeral, language), unit === '\\mathrm{deg}' ? '^{\\circ}' : spaced))
}

function bold(numeral: Numeral, language: Context['language']): Tex {
  return joinTex(numeral.negative ? '-' : '', '\\mathbf{', numeralTex(numeral, language), '}')
}
