/** Promise 1: every printed equation holds to the digits printed, checked from the published results alone. */
import { evaluate } from '../../src/base/evaluate.ts'
import type { Expr } from '../../src/base/expr.ts'
import { type Interval, intervalOf, meets } from '../../src/base/interval.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { unit } from '../../src/base/unit.ts'
import type { PublishedStep } from './worked.ts'

function parsed(text: string): Expr {
  const read = parseExpr(text)
  if (!read.ok) throw new Error(`${read.because.message} in ${text}`)
  return read.value
}

/** The nodes of the substituted line that stand where the formula has a name: printed values, not constants. */
function printedValues(formula: Expr, put: Expr, found: Set<Expr> = new Set()): ReadonlySet<Expr> {
  if (formula.kind === 'name') {
    for (let node = put; ; ) {
      if (node.kind === 'negate') node = node.of
      // A value in a unit such as 1/ft is written as a number over that unit.
      else if (node.kind === 'binary' && node.op === '/') node = node.left
      else {
        found.add(node)
        return found
      }
    }
  }
  if (formula.kind === 'negate' && put.kind === 'negate') return printedValues(formula.of, put.of, found)
  if (formula.kind === 'binary' && put.kind === 'binary' && formula.op === put.op) {
    printedValues(formula.left, put.left, found)
    return printedValues(formula.right, put.right, found)
  }
  if (
    formula.kind === 'call' &&
    put.kind === 'call' &&
    formula.fn === put.fn &&
    formula.args.length === put.args.length
  ) {
    formula.args.forEach((arg, i) => {
      const other = put.args[i]
      if (other) printedValues(arg, other, found)
    })
    return found
  }
  const constant = (expr: Expr) => expr.kind === 'number' || expr.kind === 'quantity'
  if (constant(formula) && constant(put) && evaluate(formula, Number) === evaluate(put, Number)) return found
  throw new Error(`the substituted line is not the formula: ${formula.kind} and ${put.kind}`)
}

const digitsOf = (text: string): string => /\d+(?:\.\d*)?(?:[eE][+-]?\d+)?/.exec(text)?.[0] ?? ''

export interface PrintedNumber {
  readonly value: number
  /** Half a unit in its last digit. */
  readonly half: number
}

/** A number as a page prints it: `−13,625.2 kip`, `6.54×10⁻⁵`, `5%`. */
export function printedNumber(onPage: string): PrintedNumber {
  const found = /^([−-]?)([\d,\u202f]+)(?:\.(\d+))?(?:×10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+))?/.exec(onPage)
  if (!found) throw new Error(`${onPage} is not a printed number`)
  const [, sign, whole = '', decimals = '', raised = ''] = found
  const power =
    raised === '' ? 0 : Number([...raised].map(mark => (mark === '⁻' ? '-' : '⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(mark))).join(''))
  const size = Number(`${whole.replace(/[,\u202f]/g, '')}.${decimals}e${power}`)
  return { value: sign === '' ? size : -size, half: 0.5 * 10 ** (power - decimals.length) }
}

/** The printed result as an interval of half a unit in its last digit, in base SI. */
function resultInterval({ printed, unit: text }: PublishedStep['result']): Interval {
  const { value, half } = printedNumber(printed)
  const scale = text.startsWith('1/') ? 1 / unit(text.slice(2).replaceAll('/', '*')).scale : unit(text).scale
  return { low: (value - half) * scale, high: (value + half) * scale }
}

/** What is wrong with a step, or nothing. */
export function broken({ id, formula, substituted, result }: PublishedStep): string | undefined {
  const put = parsed(substituted)
  const values = printedValues(parsed(formula), put)
  const reached = intervalOf(
    put,
    name => {
      throw new Error(`${name} was not put in`)
    },
    literal =>
      values.has(literal)
        ? digitsOf(literal.kind === 'number' ? literal.text : substituted.slice(literal.span.start, literal.span.end))
        : undefined,
  )
  return meets(reached, resultInterval(result)) ? undefined : `${id}: ${substituted} does not give ${result.printed}`
}

/** Units in its last printed digit by which a calculator fed the printed line misses the printed result. */
export function missedBy({ substituted, result }: PublishedStep): number {
  const { low, high } = resultInterval(result)
  return Math.abs(evaluate(parsed(substituted), Number) - (low + high) / 2) / (high - low)
}
