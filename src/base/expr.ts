/**
 * An expression, parsed once into an immutable tree. The engine's formulas, the
 * engineer's equations and the cells of a block are all of this kind.
 */
import type { Span } from './span.ts'
import type { Unit } from './unit.ts'

export type Operator = '+' | '-' | '*' | '/' | '^'

export type Expr =
  /** A pure number; `text` is what was typed. */
  | { readonly kind: 'number'; readonly value: number; readonly text: string; readonly span: Span }
  /** A number with its unit: `count` in that unit. */
  | { readonly kind: 'quantity'; readonly count: number; readonly unit: Unit; readonly span: Span }
  | { readonly kind: 'name'; readonly name: string; readonly span: Span }
  | { readonly kind: 'negate'; readonly of: Expr; readonly span: Span }
  | {
      readonly kind: 'binary'
      readonly op: Operator
      readonly left: Expr
      readonly right: Expr
      readonly span: Span
    }
  | { readonly kind: 'call'; readonly fn: FunctionName; readonly args: readonly Expr[]; readonly span: Span }

export const functions = {
  sqrt: { least: 1, most: 1 },
  abs: { least: 1, most: 1 },
  min: { least: 1, most: Number.POSITIVE_INFINITY },
  max: { least: 1, most: Number.POSITIVE_INFINITY },
  sum: { least: 1, most: Number.POSITIVE_INFINITY },
  sin: { least: 1, most: 1 },
  cos: { least: 1, most: 1 },
  tan: { least: 1, most: 1 },
  asin: { least: 1, most: 1 },
  acos: { least: 1, most: 1 },
  atan: { least: 1, most: 1 },
  atan2: { least: 2, most: 2 },
  exp: { least: 1, most: 1 },
  ln: { least: 1, most: 1 },
} as const

export type FunctionName = keyof typeof functions

export const isFunctionName = (name: string): name is FunctionName => Object.hasOwn(functions, name)

/** The names that an expression rests on, in order of first use. */
export function namesIn(expr: Expr, found = new Map<string, Span>()): ReadonlyMap<string, Span> {
  switch (expr.kind) {
    case 'number':
    case 'quantity':
      break
    case 'name':
      if (!found.has(expr.name)) found.set(expr.name, expr.span)
      break
    case 'negate':
      namesIn(expr.of, found)
      break
    case 'binary':
      namesIn(expr.left, found)
      namesIn(expr.right, found)
      break
    case 'call':
      for (const arg of expr.args) namesIn(arg, found)
  }
  return found
}
