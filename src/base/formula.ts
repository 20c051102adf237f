/**
 * A formula is data: one expression, its symbols with their kinds, its source.
 * It is evaluated, checked for dimension, typeset and substituted from here and
 * nowhere else.
 */
import { dimensionInWords, sameDimension } from './dimension.ts'
import { type Numbers, prepare, type Run } from './evaluate.ts'
import { type Expr, namesIn } from './expr.ts'
import { dimensionOfKind, type Kind } from './kind.ts'
import { dimensionOf } from './measure.ts'
import { parseExpr } from './parse.ts'

/** A letter of the trade: how it is spelled in plain text and in TeX, and what it measures. */
export interface Sym {
  readonly name: string
  readonly tex: string
  readonly kind: Kind
}

export const sym = (name: string, tex: string, kind: Kind): Sym => ({ name, tex, kind })

export interface Formula {
  readonly gives: Sym
  readonly body: Expr
  /** The symbols of the body, by their plain names. */
  readonly symbols: ReadonlyMap<string, Sym>
  /** Clause, publication or derivation, with `unchecked` where it was not in hand. */
  readonly source: string
  readonly assumes: readonly string[]
  /** The right side in TeX where the expression is too long to set: Σ of a column that stands in a table. */
  readonly inShort?: string
}

/**
 * Defines a formula of the engine, parsed and checked here, when the program loads.
 * @throws when the text does not parse, uses a symbol that is not declared, or
 *   comes to another dimension than the symbol it gives: a bug of ours
 */
export function formula(definition: {
  readonly gives: Sym
  readonly body: string
  readonly of: readonly Sym[]
  readonly source: string
  readonly assumes?: readonly string[]
}): Formula {
  const { gives, of, source, assumes = [] } = definition
  const parsed = parseExpr(definition.body)
  if (!parsed.ok) throw new Error(`${gives.name}: ${parsed.because.message} in ${definition.body}`)
  const body = parsed.value
  const symbols = new Map(of.map(symbol => [symbol.name, symbol]))
  const found = dimensionOf(body, name => {
    const symbol = symbols.get(name)
    return symbol && dimensionOfKind(symbol.kind)
  })
  if (!found.ok) throw new Error(`${gives.name}: ${found.because.message} in ${definition.body}`)
  const wanted = dimensionOfKind(gives.kind)
  if (!sameDimension(found.value, wanted))
    throw new Error(
      `${gives.name} is ${dimensionInWords(wanted)}, but ${definition.body} is ${dimensionInWords(found.value)}`,
    )
  const used = namesIn(body)
  for (const { name } of of) if (!used.has(name)) throw new Error(`${gives.name} does not use ${name}`)
  return { gives, body, symbols, source, assumes }
}

const prepared = new WeakMap<Formula, Run>()

/**
 * Runs a formula on numbers in base SI, row by row where any is a column.
 * @param inputs by the plain names of its symbols
 */
export function run(formula: Formula, inputs: Readonly<Record<string, Numbers>>): Numbers {
  const names = [...formula.symbols.keys()]
  let ready = prepared.get(formula)
  if (!ready) {
    ready = prepare(formula.body, names)
    prepared.set(formula, ready)
  }
  return ready(names.map(name => inputs[name] ?? Number.NaN))
}
