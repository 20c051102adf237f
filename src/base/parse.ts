/**
 * Reads an expression.
 *
 *   sum     = term  (("+" | "-") term)*
 *   term    = sign  (("*" | "/") sign)*
 *   sign    = ("-" | "+") sign | power
 *   power   = atom ("^" sign)?            right to left
 *   atom    = number unit? | name | function "(" sum ("," sum)* ")" | "(" sum ")"
 *
 * A unit stands right after a number and nowhere else, so a symbol may be
 * spelled like a unit: `2*h` is a symbol, `2 h` is a unit. Within a unit `*` and `/`
 * have no space around them: `30 kip*ft`, but `30 kip * d`.
 */
import { type Expr, type FunctionName, functions, isFunctionName, type Operator } from './expr.ts'
import { suggestion } from './near.ts'
import { bad, good, type Outcome } from './outcome.ts'
import type { Span } from './span.ts'
import { type Spelling, spellingOf } from './spelling.ts'
import { isUnitName, type UnitFactor, unit, unitFactor, unitOf, unitSpellings } from './unit.ts'

export interface ExprFault {
  readonly rule: string
  readonly message: string
  readonly span: Span
  readonly help: string
}

/** Brackets and powers may nest this deep; a longer chain of one operator does not nest. */
const DEEPEST = 100
/** A chain of one sign is a tree as deep as the chain is long, and is walked from the top. */
const MOST_SIGNS = 1000
/** Longer text is data, not a formula that anyone can follow. */
const LONGEST = 8000

/**
 * @param text the expression alone
 * @param offset where it starts in its source, added to every span
 */
export function parseExpr(text: string, offset = 0): Outcome<Expr, ExprFault> {
  if (text.length > LONGEST)
    return bad({
      rule: 'expression-too-long',
      message: `this expression has ${text.length} characters; ${LONGEST} are read`,
      span: { start: offset, end: offset + 1 },
      help: 'Break it into named equations.',
    })
  const reader = new Reader(text, offset)
  try {
    return good(reader.whole())
  } catch (stop) {
    if (stop instanceof Stop) return bad(stop.fault)
    throw stop
  }
}

/** Ends a reading at its first fault; never leaves this file. */
class Stop extends Error {
  readonly fault: ExprFault
  constructor(fault: ExprFault) {
    super(fault.message)
    this.fault = fault
  }
}

const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/y
/** The inches of feet and inches, after the foot mark or `ft`. */
const INCHES = /(?:-|\s+)?(\d+(?:\.\d+)?)(?:\s+(\d+)\/(\d+))?\s*(?:"|″|'')/y
const INCHES_IN_WORDS = /\s+(\d+(?:\.\d+)?)(?:\s+(\d+)\/(\d+))?\s+in\b(?![*/^])/y
/** `12 ft-6 in`, which no rule of arithmetic reads as it is meant. */
const HYPHENED_INCHES = /-\d+(?:\.\d+)?\s*(?:"|″|in\b)/y
/** A fraction of an inch: `3/8 in`, `6 1/2 in`, `1/2"`. */
const FRACTION = /(?:(\d+)\s+)?(\d+)\/(\d+)\s*(?:in\b(?![*/^])|"|″)/y

class Reader {
  private at = 0
  private depth = 0
  private operators = 0
  private readonly text: string
  private readonly offset: number
  private readonly spelling: Spelling

  constructor(text: string, offset: number) {
    this.text = text
    this.spelling = spellingOf(text)
    this.offset = offset
  }

  whole(): Expr {
    this.space()
    if (this.at >= this.text.length)
      this.stop('expression-missing', 'a value is missing here', 'Write a number with its unit, such as 9 ft.')
    const expr = this.sum()
    this.space()
    if (this.at < this.text.length) this.unexpected()
    return expr
  }

  private sum(): Expr {
    let left = this.term()
    for (;;) {
      this.space()
      const op = this.peek()
      if (op !== '+' && op !== '-' && op !== '−') return left
      this.at++
      left = this.binary(op === '+' ? '+' : '-', left, this.term())
    }
  }

  private term(): Expr {
    let left = this.sign()
    for (;;) {
      this.space()
      const op = this.peek()
      if (op !== '*' && op !== '/' && op !== '·' && op !== '×') return left
      this.at++
      left = this.binary(op === '/' ? '/' : '*', left, this.sign())
    }
  }

  private sign(): Expr {
    this.space()
    const start = this.at
    const mark = this.peek()
    if (mark !== '-' && mark !== '+' && mark !== '−') return this.power()
    this.at++
    const of = this.nested(() => this.sign())
    return mark === '+' ? of : { kind: 'negate', of, span: this.span(start) }
  }

  private power(): Expr {
    const base = this.atom()
    this.space()
    if (this.peek() !== '^') return base
    this.at++
    return this.binary(
      '^',
      base,
      this.nested(() => this.sign()),
    )
  }

  private atom(): Expr {
    this.space()
    const start = this.at
    if (this.peek() === '(') {
      this.at++
      const inner = this.nested(() => this.sum())
      this.close(start)
      return { ...inner, span: this.span(start) }
    }
    // Most atoms are names: a number is only looked for where one can start.
    const numeric = /[\d.]/.test(this.peek())
    const number = numeric ? (this.fraction(start) ?? this.number(start)) : undefined
    return number ?? this.nameOrCall(start) ?? this.unexpected()
  }

  private number(start: number): Expr | undefined {
    const digits = this.take(NUMBER)
    if (!digits) return undefined
    const value = Number(digits[0])
    if (!Number.isFinite(value))
      this.stop('number-too-large', `${digits[0]} is too large a number`, 'Check its exponent.', start)
    const feet = this.feetAndInches(value, start)
    if (feet) return feet
    const factors = this.unit()
    if (!factors) return { kind: 'number', value, text: digits[0], span: this.span(start) }
    const made = unitOf(factors)
    if (made.factors.length === 1 && made.factors[0]?.atom.name === 'ft') {
      const inches = this.take(INCHES_IN_WORDS)
      if (inches) return this.length(value + inchesOf(inches) / 12, 'ft', start)
      if (this.take(HYPHENED_INCHES))
        this.stop(
          'feet-and-inches',
          'this may be read as a length in feet and inches or as a difference',
          'Write 12 ft 6 in or 12\'-6" for the length; put a space on each side of a minus.',
          start,
        )
    }
    return { kind: 'quantity', count: value, unit: made, span: this.span(start) }
  }

  private fraction(start: number): Expr | undefined {
    const found = this.take(FRACTION)
    if (!found) return undefined
    const [, whole, top, bottom] = found
    if (Number(bottom) === 0)
      this.stop('division-by-zero', 'this fraction divides by zero', 'Check its lower number.', start)
    return this.length(Number(whole ?? 0) + Number(top) / Number(bottom), 'in', start)
  }

  /** `12'`, `12'-6"`, `6"`: the mark right after the number. */
  private feetAndInches(value: number, start: number): Expr | undefined {
    const mark = this.peek()
    if (mark === '"' || mark === '″' || this.text.startsWith("''", this.at)) {
      this.at += mark === "'" ? 2 : 1
      return this.length(value, 'in', start)
    }
    if (mark !== "'" && mark !== '′') return undefined
    this.at++
    const inches = this.take(INCHES)
    return this.length(value + (inches ? inchesOf(inches) / 12 : 0), 'ft', start)
  }

  private length(count: number, name: 'ft' | 'in', start: number): Expr {
    return { kind: 'quantity', count, unit: unit(name), span: this.span(start) }
  }

  /** A unit after a number: at most one space before it, none inside. */
  private unit(): readonly UnitFactor[] | undefined {
    const before = this.at
    this.space()
    const first = this.unitFactor(1)
    if (!first) {
      this.at = before
      return undefined
    }
    if (first.atom.name === '%') return [first]
    const factors = [first]
    for (;;) {
      const op = this.peek()
      const next = this.text[this.at + 1] ?? ''
      if ((op !== '*' && op !== '/' && op !== '·') || !this.spelling.unitStart.test(next)) return factors
      this.at++
      factors.push(this.unitFactor(op === '/' ? -1 : 1) ?? this.unexpected())
    }
  }

  private unitFactor(sign: number): UnitFactor | undefined {
    const start = this.at
    const name = this.take(this.spelling.unit)?.[0]
    if (name === undefined) return undefined
    const next = this.text[this.at] ?? ''
    if (!isUnitName(name) || next === '.' || next === '_' || /\d/.test(next)) return this.unknownUnit(start)
    return unitFactor(name, sign * this.unitPower())
  }

  private unitPower(): number {
    const raised = this.take(/\^(\d+(?:\.\d+)?)|[²³⁴]/y)
    if (!raised) return 1
    return raised[1] === undefined ? ({ '²': 2, '³': 3, '⁴': 4 }[raised[0]] ?? 1) : Number(raised[1])
  }

  private unknownUnit(start: number): never {
    this.at = start
    const written = this.take(/[\p{L}\p{N}_°.]+/uy)?.[0] ?? ''
    const after = start > 0 && /[*/·]/.test(this.text[start - 1] ?? '')
    const spaces = after
      ? ` To multiply or divide by a value named ${written}, put a space on each side of the sign.`
      : ''
    this.stop(
      'unknown-unit',
      `there is no unit ${written}`,
      `${suggestion(written, unitSpellings(), 'unit').replace(/^There are:.*/, 'A unit follows its number: 68 psf, 12 kN/m, 30 kip*ft.')}${spaces}`,
      start,
    )
  }

  private nameOrCall(start: number): Expr | undefined {
    const name = this.take(this.spelling.name)?.[0]
    if (name === undefined) return undefined
    this.space()
    if (this.peek() !== '(')
      return { kind: 'name', name, span: { start: start + this.offset, end: start + name.length + this.offset } }
    if (!isFunctionName(name))
      return this.stop(
        'unknown-function',
        `there is no function ${name}`,
        suggestion(name, Object.keys(functions), 'function'),
        start,
      )
    return this.call(name, start)
  }

  private call(fn: FunctionName, start: number): Expr {
    const open = this.at++
    const args = this.nested(() => {
      const list = [this.sum()]
      for (this.space(); this.peek() === ','; this.space()) {
        this.at++
        list.push(this.sum())
      }
      return list
    })
    this.close(open)
    const { least, most } = functions[fn]
    if (args.length < least || args.length > most)
      this.stop(
        'argument-count',
        `${fn} takes ${least} value${least === 1 ? '' : 's'}, and here are ${args.length}`,
        `Write ${fn}(${least === 1 ? 'x' : 'y, x'}).`,
        start,
      )
    return { kind: 'call', fn, args, span: this.span(start) }
  }

  private close(open: number): void {
    this.space()
    if (this.peek() === ')') {
      this.at++
      return
    }
    if (this.at < this.text.length) this.unexpected()
    this.at = open
    this.stop('bracket-open', 'this bracket is not closed', 'Add the missing ).')
  }

  private binary(op: Operator, left: Expr, right: Expr): Expr {
    if (++this.operators > MOST_SIGNS)
      this.stop(
        'expression-too-long',
        `this expression has more than ${MOST_SIGNS} signs`,
        'Break it into named equations.',
      )
    return { kind: 'binary', op, left, right, span: { start: left.span.start, end: right.span.end } }
  }

  private nested<T>(read: () => T): T {
    if (++this.depth > DEEPEST)
      this.stop(
        'expression-too-deep',
        `this expression nests deeper than ${DEEPEST} brackets`,
        'Break it into named equations.',
      )
    const result = read()
    this.depth--
    return result
  }

  private unexpected(): never {
    // A whole character, which may be two halves in the text.
    const [sign = ''] = this.text.slice(this.at, this.at + 2)
    if (sign === '')
      this.stop(
        'expression-ends',
        'the expression ends too soon',
        'A value is missing after the last sign.',
        Math.max(0, this.text.trimEnd().length - 1),
      )
    if (/[\p{L}\p{N}(]/u.test(sign))
      this.stop(
        'operator-missing',
        `a sign such as * or + is missing before ${this.word()}`,
        'Numbers have no grouping: write 13625, not 13 625. A unit follows a number directly; a product needs *.',
      )
    this.stop(
      'unexpected-sign',
      `${sign} has no meaning here`,
      'An expression is made of numbers with units, names, + - * / ^ and brackets.',
    )
  }

  private word(): string {
    const start = this.at
    const word = this.take(/[\p{L}\p{N}_.]+|\(/uy)?.[0] ?? ''
    this.at = start
    return word
  }

  private stop(rule: string, message: string, help: string, start = this.at): never {
    const end = Math.max(start + 1, this.at)
    throw new Stop({ rule, message, help, span: { start: start + this.offset, end: end + this.offset } })
  }

  private span(start: number): Span {
    return { start: start + this.offset, end: this.at + this.offset }
  }

  private peek(): string {
    return this.text[this.at] ?? ''
  }

  private space(): void {
    while (this.at < this.text.length && /\s/.test(this.peek())) this.at++
  }

  private take(pattern: RegExp): RegExpExecArray | undefined {
    pattern.lastIndex = this.at
    const found = pattern.exec(this.text)
    if (!found) return undefined
    this.at = pattern.lastIndex
    return found
  }
}

function inchesOf([, whole, top, bottom]: RegExpExecArray): number {
  return Number(whole) + (top === undefined ? 0 : Number(top) / Number(bottom))
}
