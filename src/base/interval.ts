/**
 * Interval arithmetic: what a line with printed numbers can come to when each
 * stands for every number that would print the same.
 */
import { callFunction } from './evaluate.ts'
import type { Expr, FunctionName, Operator } from './expr.ts'

export interface Interval {
  readonly low: number
  readonly high: number
}

const point = (value: number): Interval => ({ low: value, high: value })
const EVERYTHING: Interval = { low: Number.NEGATIVE_INFINITY, high: Number.POSITIVE_INFINITY }

export const meets = (a: Interval, b: Interval): boolean => a.low <= b.high && b.low <= a.high

/** A printed number of `size` in a unit: half a unit in its last digit each way, in base SI. */
function printed(text: string, scale: number): Interval {
  const [mantissa = '', exponent = '0'] = text.split(/[eE]/)
  const decimals = mantissa.split('.')[1]?.length ?? 0
  const half = 0.5 * 10 ** (Number(exponent) - decimals)
  const value = Number(text)
  return { low: (value - half) * scale, high: (value + half) * scale }
}

/**
 * @param leaf the interval of a name
 * @param spread text of a literal that stands for a printed number; undefined for an exact constant
 */
export function intervalOf(
  expr: Expr,
  leaf: (name: string) => Interval,
  spread: (expr: Expr & { kind: 'number' | 'quantity' }) => string | undefined,
): Interval {
  switch (expr.kind) {
    case 'number': {
      const text = spread(expr)
      return text === undefined ? point(expr.value) : printed(text, 1)
    }
    case 'quantity': {
      const text = spread(expr)
      return text === undefined ? point(expr.count * expr.unit.scale) : printed(text, expr.unit.scale)
    }
    case 'name':
      return leaf(expr.name)
    case 'negate': {
      const of = intervalOf(expr.of, leaf, spread)
      return { low: -of.high, high: -of.low }
    }
    case 'binary':
      return operate(expr.op, intervalOf(expr.left, leaf, spread), intervalOf(expr.right, leaf, spread))
    case 'call':
      return call(
        expr.fn,
        expr.args.map(arg => intervalOf(arg, leaf, spread)),
      )
  }
}

function operate(op: Operator, a: Interval, b: Interval): Interval {
  switch (op) {
    case '+':
      return { low: a.low + b.low, high: a.high + b.high }
    case '-':
      return { low: a.low - b.high, high: a.high - b.low }
    case '*':
      return hull([a.low * b.low, a.low * b.high, a.high * b.low, a.high * b.high])
    case '/':
      if (b.low <= 0 && b.high >= 0) return EVERYTHING
      return hull([a.low / b.low, a.low / b.high, a.high / b.low, a.high / b.high])
    case '^':
      return power(a, b)
  }
}

function power(a: Interval, b: Interval): Interval {
  const ends = [a.low ** b.low, a.low ** b.high, a.high ** b.low, a.high ** b.high]
  const spansZero = a.low < 0 && a.high > 0
  if (spansZero && b.low < 0) return EVERYTHING
  return hull(spansZero ? [...ends, 0] : ends)
}

function hull(values: readonly number[]): Interval {
  if (values.some(Number.isNaN)) return EVERYTHING
  return { low: Math.min(...values), high: Math.max(...values) }
}

function call(fn: FunctionName, args: readonly Interval[]): Interval {
  const [a = EVERYTHING] = args
  switch (fn) {
    case 'min':
    case 'max':
    case 'sum':
      return {
        low: callFunction(
          fn,
          args.map(arg => arg.low),
        ),
        high: callFunction(
          fn,
          args.map(arg => arg.high),
        ),
      }
    case 'abs':
      if (a.low <= 0 && a.high >= 0) return { low: 0, high: Math.max(-a.low, a.high) }
      return hull([Math.abs(a.low), Math.abs(a.high)])
    case 'sqrt':
      return { low: Math.sqrt(Math.max(0, a.low)), high: Math.sqrt(Math.max(0, a.high)) }
    case 'asin':
    case 'acos':
    case 'atan':
    case 'exp':
    case 'ln':
      return hull([callFunction(fn, [a.low]), callFunction(fn, [a.high])])
    case 'sin':
    case 'cos':
      return wave(fn, a)
    case 'tan':
      return Math.floor(a.low / Math.PI - 0.5) === Math.floor(a.high / Math.PI - 0.5)
        ? hull([Math.tan(a.low), Math.tan(a.high)])
        : EVERYTHING
    case 'atan2':
      return turned(args)
  }
}

/** Sine and cosine reach ±1 at every half turn within the interval. */
function wave(fn: 'sin' | 'cos', a: Interval): Interval {
  // A whole turn reaches both; so may an end so large that its neighbours in the arithmetic are half a turn apart.
  const largest = Math.max(Math.abs(a.low), Math.abs(a.high))
  if (!(a.high - a.low < 2 * Math.PI) || largest > 1e15) return { low: -1, high: 1 }
  const crests: number[] = []
  const offset = fn === 'sin' ? Math.PI / 2 : 0
  const first = Math.ceil((a.low - offset) / Math.PI)
  for (let n = first; n <= first + 1; n++) if (n * Math.PI + offset <= a.high) crests.push(n % 2 === 0 ? 1 : -1)
  return hull([Math[fn](a.low), Math[fn](a.high), ...crests])
}

/** The angle jumps by a turn behind the origin, so a box that touches that half-line may be anything. */
function turned([y = EVERYTHING, x = EVERYTHING]: readonly Interval[]): Interval {
  if (x.low <= 0 && y.low <= 0 && y.high >= 0) return { low: -Math.PI, high: Math.PI }
  return hull([y.low, y.high].flatMap(b => [x.low, x.high].map(a => Math.atan2(b, a))))
}
