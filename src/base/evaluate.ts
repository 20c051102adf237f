/** What an expression comes to, on numbers in base SI: once, or for a whole column. */
import type { Expr, FunctionName } from './expr.ts'

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

/** One sign between two numbers. */
export const operate = (op: keyof typeof operators, a: number, b: number): number => operators[op](a, b)

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
