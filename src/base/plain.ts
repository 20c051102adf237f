/** Expressions as plain text that the reader takes back and that comes to the same number. */
import type { Expr } from './expr.ts'
import { asTyped, everyDigit, type Numeral, numeralPlain, numeralValue } from './numeral.ts'
import { type Unit, unitText } from './unit.ts'

const precedence = { '+': 1, '-': 1, '*': 2, '/': 2, '^': 4 } as const
const NEGATED = 3
const WHOLE = 5

/** A number with its unit, such as `-26.41 ft`. */
export function valuePlain(numeral: Numeral, unit: Unit): string {
  const units = unitText(unit)
  const number = numeralPlain(numeral)
  if (units === '') return number
  if (units === '%') return `${number}%`
  return units.startsWith('1/') ? `${number}/(1 ${units.slice(2).replaceAll('/', '*')})` : `${number} ${units}`
}

/**
 * @param leaf the plain text of a name: itself, or its printed value
 */
export function plain(expr: Expr, leaf: (name: string) => string): string {
  return write(expr, leaf).text
}

interface Written {
  readonly text: string
  readonly binding: number
}

/** A printed value is bracketed as a factor when it has a unit, and after a sign when it is below zero. */
function written(text: string): Written {
  if (text.startsWith('-')) return { text, binding: 1 }
  return { text, binding: /[\s%]/.test(text) ? 1.5 : WHOLE }
}

/** A constant of the formula itself is not a printed value: it keeps every digit. */
function constant(count: number): Numeral {
  const typed = asTyped(count)
  return numeralValue(typed) === count ? typed : everyDigit(count)
}

function write(expr: Expr, leaf: (name: string) => string): Written {
  switch (expr.kind) {
    case 'number':
      return { text: expr.text, binding: WHOLE }
    case 'quantity':
      return written(valuePlain(constant(expr.count), expr.unit))
    case 'name':
      return written(leaf(expr.name))
    case 'negate':
      return { text: `-${within(write(expr.of, leaf), NEGATED)}`, binding: NEGATED - 0.5 }
    case 'binary':
      return writeBinary(expr, leaf)
    case 'call':
      return { text: `${expr.fn}(${expr.args.map(arg => write(arg, leaf).text).join(', ')})`, binding: WHOLE }
  }
}

function writeBinary({ op, left, right }: Expr & { kind: 'binary' }, leaf: (name: string) => string): Written {
  const own = precedence[op]
  const a = within(write(left, leaf), op === '^' ? WHOLE : own)
  const b = within(write(right, leaf), op === '^' ? own : own + 0.25)
  const space = own === 1 ? ' ' : ''
  return { text: `${a}${space}${op}${space}${b}`, binding: own }
}

const within = ({ text, binding }: Written, least: number): string => (binding < least ? `(${text})` : text)
