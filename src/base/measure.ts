/** What an expression measures: its dimension, and the unit that its operands carry. */
import {
  type Dimension,
  dimensionInWords,
  isNumber,
  NUMBER,
  overDimension,
  raiseDimension,
  sameDimension,
  timesDimension,
} from './dimension.ts'
import { operate } from './evaluate.ts'
import type { Expr, FunctionName } from './expr.ts'
import { bad, good, type Outcome } from './outcome.ts'
import type { ExprFault } from './parse.ts'
import { isPercent, multiplyUnits, NO_UNIT, type Unit } from './unit.ts'

/** What is known of a name: its number in base SI and the unit that it prints in. */
export interface Known {
  readonly si: number
  readonly unit: Unit
}

export type Lookup = (name: string) => Known | undefined

type Checked = Outcome<Dimension, ExprFault>

/**
 * The dimension of an expression, or the place where it goes wrong: feet added
 * to kips, the sine of a length.
 * @param dimensionOf the dimension of each name; undefined for a name that is not known
 */
export function dimensionOf(expr: Expr, dimensionOfName: (name: string) => Dimension | undefined): Checked {
  switch (expr.kind) {
    case 'number':
      return good(NUMBER)
    case 'quantity':
      return good(expr.unit.dimension)
    case 'name': {
      const known = dimensionOfName(expr.name)
      return known ? good(known) : fault('unknown-name', expr, `there is no value ${expr.name}`, '')
    }
    case 'negate':
      return dimensionOf(expr.of, dimensionOfName)
    case 'binary':
      return binaryDimension(expr, dimensionOfName)
    case 'call':
      return callDimension(expr.fn, expr.args, dimensionOfName)
  }
}

const fault = (rule: string, { span }: Expr, message: string, help: string) => bad({ rule, message, span, help })

function binaryDimension(
  { op, left, right }: Expr & { kind: 'binary' },
  dimensionOfName: (name: string) => Dimension | undefined,
): Checked {
  const a = dimensionOf(left, dimensionOfName)
  if (!a.ok) return a
  const b = dimensionOf(right, dimensionOfName)
  if (!b.ok) return b
  switch (op) {
    case '+':
    case '-':
      return sameDimension(a.value, b.value) ? a : mismatch(op, a.value, b.value, right)
    case '*':
      return good(timesDimension(a.value, b.value))
    case '/':
      return good(overDimension(a.value, b.value))
    case '^':
      return powerDimension(a.value, b.value, left, right)
  }
}

function mismatch(op: '+' | '-', a: Dimension, b: Dimension, at: Expr): Checked {
  const [first, second] = [dimensionInWords(a), dimensionInWords(b)]
  const what = op === '+' ? `${second} is added to ${first}` : `${second} is taken from ${first}`
  return fault('unlike-quantities', at, what, `Both sides of ${op} must be ${first}.`)
}

function powerDimension(base: Dimension, power: Dimension, left: Expr, right: Expr): Checked {
  if (!isNumber(power))
    return fault(
      'power-with-unit',
      right,
      `a power is a pure number, and this is ${dimensionInWords(power)}`,
      'Divide by a unit to make it a number.',
    )
  if (isNumber(base)) return good(NUMBER)
  const exponent = constantOf(right)
  if (exponent === undefined)
    return fault(
      'power-not-constant',
      right,
      `${dimensionInWords(base)} can only be raised to a stated number`,
      'Write the power as a number, such as ^2.',
    )
  if (Math.abs(exponent) > 12)
    return fault(
      'power-too-large',
      left,
      `${dimensionInWords(base)} raised to ${exponent} has no use here`,
      'Check the power.',
    )
  return good(raiseDimension(base, exponent))
}

function constantOf(expr: Expr): number | undefined {
  switch (expr.kind) {
    case 'number':
      return expr.value
    case 'negate': {
      const value = constantOf(expr.of)
      return value === undefined ? undefined : -value
    }
    case 'binary': {
      const [a, b] = [constantOf(expr.left), constantOf(expr.right)]
      return a === undefined || b === undefined ? undefined : operate(expr.op, a, b)
    }
    case 'quantity':
    case 'name':
    case 'call':
      return undefined
  }
}

function callDimension(
  fn: FunctionName,
  args: readonly Expr[],
  dimensionOfName: (name: string) => Dimension | undefined,
): Checked {
  const found: Dimension[] = []
  for (const arg of args) {
    const one = dimensionOf(arg, dimensionOfName)
    if (!one.ok) return one
    found.push(one.value)
  }
  const [first = NUMBER] = found
  switch (fn) {
    case 'sqrt':
      return good(raiseDimension(first, 0.5))
    case 'abs':
      return good(first)
    case 'min':
    case 'max':
    case 'sum':
    case 'atan2': {
      const odd = found.findIndex(other => !sameDimension(other, first))
      const at = args[odd]
      if (at !== undefined)
        return fault(
          'unlike-quantities',
          at,
          `${dimensionInWords(found[odd] ?? NUMBER)} stands beside ${dimensionInWords(first)}`,
          `All values of ${fn} must be alike.`,
        )
      return good(fn === 'atan2' ? NUMBER : first)
    }
    case 'sin':
    case 'cos':
    case 'tan':
    case 'asin':
    case 'acos':
    case 'atan':
    case 'exp':
    case 'ln': {
      const [at] = args
      if (at && !isNumber(first))
        return fault(
          'function-with-unit',
          at,
          `${fn} takes an angle or a pure number, and this is ${dimensionInWords(first)}`,
          'Divide by a unit to make it a number.',
        )
      return good(NUMBER)
    }
  }
}

/**
 * The unit that the operands carry through the expression, never one guessed
 * from the dimension of the result: a moment in kip·ft stays in kip·ft.
 */
export function unitCarried(expr: Expr, lookup: Lookup): Unit {
  switch (expr.kind) {
    case 'number':
      return NO_UNIT
    case 'quantity':
      return isPercent(expr.unit) ? NO_UNIT : expr.unit
    case 'name':
      return lookup(expr.name)?.unit ?? NO_UNIT
    case 'negate':
      return unitCarried(expr.of, lookup)
    case 'binary': {
      const left = unitCarried(expr.left, lookup)
      switch (expr.op) {
        case '+':
        case '-':
          return left.factors.length > 0 ? left : unitCarried(expr.right, lookup)
        case '*':
          return multiplyUnits(left, unitCarried(expr.right, lookup), 1)
        case '/':
          return multiplyUnits(left, unitCarried(expr.right, lookup), -1)
        case '^':
          return multiplyUnits(NO_UNIT, left, constantOf(expr.right) ?? 1)
      }
      break
    }
    case 'call': {
      const [first] = expr.args
      const carried = first ? unitCarried(first, lookup) : NO_UNIT
      switch (expr.fn) {
        case 'sqrt':
          return multiplyUnits(NO_UNIT, carried, 0.5)
        case 'abs':
        case 'min':
        case 'max':
        case 'sum':
          return carried
        case 'sin':
        case 'cos':
        case 'tan':
        case 'asin':
        case 'acos':
        case 'atan':
        case 'atan2':
        case 'exp':
        case 'ln':
          return NO_UNIT
      }
    }
  }
}
