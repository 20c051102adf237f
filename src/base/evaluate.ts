/** What an expression comes to: its dimension, the unit its operands carry, and its number. */
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

/** Either a number or, element by element, a column of them. */
export type Numbers = number | Float64Array

/** An expression turned into one function of the numbers of its names, for one row or for a whole column. */
export type Run = (inputs: readonly Numbers[]) => Numbers

/**
 * Prepares an expression to be run many times, on numbers in base SI.
 * @param names the order in which `inputs` will come
 */
export function prepare(expr: Expr, names: readonly string[]): Run {
  switch (expr.kind) {
    case 'number':
    case 'quantity': {
      const value = expr.kind === 'number' ? expr.value : expr.count * expr.unit.scale
      return () => value
    }
    case 'name': {
      const at = names.indexOf(expr.name)
      if (at === -1) throw new Error(`${expr.name} is not among ${names.join(', ')}`)
      return inputs => inputs[at] ?? Number.NaN
    }
    case 'negate': {
      const of = prepare(expr.of, names)
      return inputs => pairwise('-', 0, of(inputs))
    }
    case 'binary': {
      const [left, right] = [prepare(expr.left, names), prepare(expr.right, names)]
      const { op } = expr
      return inputs => pairwise(op, left(inputs), right(inputs))
    }
    case 'call': {
      const args = expr.args.map(arg => prepare(arg, names))
      return inputs =>
        apply(
          expr.fn,
          args.map(arg => arg(inputs)),
        )
    }
  }
}

/** The number an expression comes to, in base SI; not finite where it divides by zero and the like. */
export function evaluate(expr: Expr, lookup: (name: string) => number): number {
  switch (expr.kind) {
    case 'number':
      return expr.value
    case 'quantity':
      return expr.count * expr.unit.scale
    case 'name':
      return lookup(expr.name)
    case 'negate':
      return -evaluate(expr.of, lookup)
    case 'binary':
      return operate(expr.op, evaluate(expr.left, lookup), evaluate(expr.right, lookup))
    case 'call':
      return callFunction(
        expr.fn,
        expr.args.map(arg => evaluate(arg, lookup)),
      )
  }
}

const operators = {
  '+': (a: number, b: number) => a + b,
  '-': (a: number, b: number) => a - b,
  '*': (a: number, b: number) => a * b,
  '/': (a: number, b: number) => a / b,
  '^': (a: number, b: number) => a ** b,
} as const

const operate = (op: keyof typeof operators, a: number, b: number): number => operators[op](a, b)

function pairwise(op: keyof typeof operators, a: Numbers, b: Numbers): Numbers {
  if (typeof a === 'number' && typeof b === 'number') return operate(op, a, b)
  const length = typeof a === 'number' ? lengthOf(b) : a.length
  const out = new Float64Array(length)
  loops[op](asColumn(a, length), asColumn(b, length), out)
  return out
}

const lengthOf = (column: Numbers): number => (typeof column === 'number' ? 1 : column.length)

const asColumn = (numbers: Numbers, length: number): Float64Array =>
  typeof numbers === 'number' ? new Float64Array(length).fill(numbers) : numbers

type Column = Readonly<Float64Array>

// One loop for each operator: a thousand walls in many cases go through here, and a loop that is handed
// its operator calls it for every number.
const loops: Readonly<Record<keyof typeof operators, (a: Column, b: Column, out: Float64Array) => void>> = {
  '+': (a, b, out) => {
    for (let i = 0; i < out.length; i++) out[i] = (a[i] ?? Number.NaN) + (b[i] ?? Number.NaN)
  },
  '-': (a, b, out) => {
    for (let i = 0; i < out.length; i++) out[i] = (a[i] ?? Number.NaN) - (b[i] ?? Number.NaN)
  },
  '*': (a, b, out) => {
    for (let i = 0; i < out.length; i++) out[i] = (a[i] ?? Number.NaN) * (b[i] ?? Number.NaN)
  },
  '/': (a, b, out) => {
    for (let i = 0; i < out.length; i++) out[i] = (a[i] ?? Number.NaN) / (b[i] ?? Number.NaN)
  },
  '^': (a, b, out) => {
    for (let i = 0; i < out.length; i++) out[i] = (a[i] ?? Number.NaN) ** (b[i] ?? Number.NaN)
  },
}

/** A function of columns, row by row. */
function apply(fn: FunctionName, args: readonly Numbers[]): Numbers {
  const first = args.find(arg => typeof arg !== 'number')
  if (first === undefined) return callFunction(fn, args.map(Number))
  const length = lengthOf(first)
  const columns = args.map(arg => asColumn(arg, length))
  const row = new Array<number>(columns.length)
  return new Float64Array(length).map((_, i) => {
    for (let at = 0; at < row.length; at++) row[at] = columns[at]?.[i] ?? Number.NaN
    return callFunction(fn, row)
  })
}

export function callFunction(fn: FunctionName, args: readonly number[]): number {
  const [a = Number.NaN, b = Number.NaN] = args
  switch (fn) {
    case 'min':
      return Math.min(...args)
    case 'max':
      return Math.max(...args)
    case 'sum':
      return args.reduce((total, one) => total + one, 0)
    case 'atan2':
      return Math.atan2(a, b)
    case 'ln':
      return Math.log(a)
    case 'sqrt':
    case 'abs':
    case 'sin':
    case 'cos':
    case 'tan':
    case 'asin':
    case 'acos':
    case 'atan':
    case 'exp':
      return Math[fn](a)
  }
}
