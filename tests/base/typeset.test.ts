/** Formulas as they are set, read back by the conventions of print. */
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import type { Expr } from '../../src/base/expr.ts'
import type { Language } from '../../src/base/language.ts'
import { numeralValue, rounded } from '../../src/base/numeral.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { texSource } from '../../src/base/tex.ts'
import { letter, nameTex, texWords, typeset, valueSet } from '../../src/base/typeset.ts'
import { NO_UNIT, type Unit, unit, unitSpellings } from '../../src/base/unit.ts'
import { anyMeasure, numberExpression, quantityExpression } from '../support/expressions.ts'
import { type Random, randomFrom } from '../support/random.ts'
import { readTex } from '../support/tex-reader.ts'

function parsed(text: string): Expr {
  const read = parseExpr(text)
  if (!read.ok) throw new Error(`${read.because.message}: ${text}`)
  return read.value
}

const names = ['a', 'b', 'h', 'k'] as const

const inLetters = (expr: Expr): string => texSource(typeset(expr, name => letter(name), 'en-US'))

const inValues = (expr: Expr, shown: (name: string) => number, language: Language, of: Unit = NO_UNIT): string =>
  texSource(typeset(expr, name => valueSet(rounded(shown(name)), of, language), language))

const randomValue = (random: Random): number => {
  const size = random.pick([1e-5, 0.03, 1, 20, 4000, 3e6, 5e10])
  return numeralValue(rounded((random.share() - 0.4) * size))
}

/** False where terms all but cancel, so that the last bits of the arithmetic come through to the result. */
function steady(expr: Expr, lookup: (name: string) => number): boolean {
  const nudged = evaluate(expr, name => lookup(name) * (1 + 1e-11))
  const value = evaluate(expr, lookup)
  return Number.isFinite(value) && Math.abs(nudged - value) < 1e-8 * Math.abs(value)
}

/** Constants print with at most nine digits. */
function same(read: number, value: number, what: string): void {
  const close = read === value || Math.abs(read - value) <= 1e-7 * Math.max(Math.abs(read), Math.abs(value), 1e-300)
  expect(close || (Number.isNaN(read) && Number.isNaN(value)), `${what}: read as ${read}, worked as ${value}`).toBe(
    true,
  )
}

describe('a formula reads on the page as it is worked', () => {
  test('in letters, 3,000 times', () => {
    let read = 0
    for (let seed = 1; seed <= 3000; seed++) {
      const random = randomFrom(400_000 + seed)
      const expr = parsed(numberExpression(random, 1 + (seed % 5), names))
      const values = new Map<string, number>(names.map(name => [name, (random.share() - 0.4) * 8]))
      const lookup = (name: string) => values.get(name) ?? Number.NaN
      const tex = inLetters(expr)
      if (!steady(expr, lookup)) continue
      same(readTex(tex, lookup), evaluate(expr, lookup), tex)
      read++
    }
    expect(read).toBeGreaterThan(1500)
  })

  test.each(['en-US', 'en-GB'] as const)('with values put in, in %s, 2,000 times', language => {
    let read = 0
    for (let seed = 1; seed <= 2000; seed++) {
      const random = randomFrom(500_000 + seed)
      const expr = parsed(numberExpression(random, 1 + (seed % 5), names))
      const values = new Map<string, number>(names.map(name => [name, randomValue(random)]))
      const lookup = (name: string) => values.get(name) ?? Number.NaN
      const tex = inValues(expr, lookup, language)
      if (!steady(expr, lookup)) continue
      same(readTex(tex, Number), evaluate(expr, lookup), tex)
      read++
    }
    expect(read).toBeGreaterThan(1000)
  })

  test('with units, 1,500 times', () => {
    for (let seed = 1; seed <= 1500; seed++) {
      const random = randomFrom(600_000 + seed)
      const expr = parsed(quantityExpression(random, anyMeasure(random), 1 + (seed % 4)))
      const tex = inLetters(expr)
      const [read, value] = [readTex(tex, Number), evaluate(expr, Number)]
      // A difference of nearly equal terms keeps their absolute rounding.
      if (Math.abs(value) > 1e-6) same(read, value, tex)
    }
  })

  test('letters and values are bracketed by one rule: putting values of one digit in changes only the leaves', () => {
    for (let seed = 1; seed <= 500; seed++) {
      const random = randomFrom(700_000 + seed)
      const expr = parsed(numberExpression(random, 1 + (seed % 4), names))
      const brackets = (tex: string) => tex.match(/\\left\(/g)?.length ?? 0
      const [letters, values] = [inLetters(expr), inValues(expr, () => 7, 'en-US')]
      // A number after a factor is bracketed, so that it does not run on; nothing is ever bracketed less.
      expect(brackets(values), `${letters} and ${values}`).toBeGreaterThanOrEqual(brackets(letters))
    }
  })
})

describe('brackets', () => {
  test.each([
    ['a*(b + h)', 'a\\left(b+h\\right)'],
    ['a - (b - h)', 'a-\\left(b-h\\right)'],
    ['a - b + h', 'a-b+h'],
    ['(a/b)^2', '{\\left(\\dfrac{a}{b}\\right)}^{2}'],
    ['a^b^h', '{a}^{{b}^{h}}'],
    ['(a^b)^h', '{\\left({a}^{b}\\right)}^{h}'],
    ['-(a + b)', '-\\left(a+b\\right)'],
    ['a*b*h', 'a\\,b\\,h'],
    ['(a + b)/(h - k)', '\\dfrac{a+b}{h-k}'],
    ['a + -b', 'a+\\left(-b\\right)'],
    ['sqrt(a + b)', '\\sqrt{a+b}'],
    ['sin(a)^2', '{\\left(\\sin\\left(a\\right)\\right)}^{2}'],
  ])('%s is set as %s', (text, tex) => {
    expect(inLetters(parsed(text))).toBe(tex)
  })

  test('numbers never run into one another', () => {
    const of = (name: string) => ({ a: 3, b: 12, h: -5, k: 0.5 })[name] ?? 0
    expect(inValues(parsed('a*b'), of, 'en-US')).toBe('3\\left(12\\right)')
    expect(inValues(parsed('a*h'), of, 'en-US')).toBe('3\\left(-5\\right)')
    expect(inValues(parsed('a - h'), of, 'en-US')).toBe('3-\\left(-5\\right)')
    expect(inValues(parsed('h^2'), of, 'en-US')).toBe('{\\left(-5\\right)}^{2}')
    expect(inValues(parsed('2*k'), of, 'en-GB')).toBe('2\\left(0.5\\right)')
  })

  test('a value with a unit is bracketed as a factor and bare in a sum', () => {
    const of = () => 3
    expect(inValues(parsed('a*b'), of, 'en-US', unit('ft'))).toBe(
      '\\left(3\\ \\mathrm{ft}\\right)\\left(3\\ \\mathrm{ft}\\right)',
    )
    expect(inValues(parsed('a + b'), of, 'en-US', unit('ft'))).toBe('3\\ \\mathrm{ft}+3\\ \\mathrm{ft}')
    expect(inValues(parsed('a^2'), of, 'en-US', unit('ft'))).toBe('{\\left(3\\ \\mathrm{ft}\\right)}^{2}')
  })
})

describe('names', () => {
  test.each([
    ['w_deck', 'w_{\\text{deck}}'],
    ['alpha', '\\alpha'],
    ['K_xx', 'K_{\\text{xx}}'],
    ['h1', 'h_{\\text{1}}'],
    ["f'm", "f'_{\\text{m}}"],
    ['drift', '\\text{drift}'],
  ])('%s is set as %s', (name, tex) => {
    expect(nameTex(name)).toBe(tex)
  })

  test('a word cannot become a command', () => {
    expect(texWords('50% \\input{x} $a$ #1 a_b^c ~')).toBe(
      '\\text{50\\% \\textbackslash{}input\\{x\\} \\$a\\$ \\#1 a\\_b\\textasciicircum{}c \\textasciitilde{}}',
    )
  })
})

describe('a value in any unit', () => {
  test.each([3.5, -3.5, 3.5e-9, -3.5e12])('%s sets without a fault, alone and raised', size => {
    for (const name of unitSpellings()) {
      const set = () => valueSet(rounded(size), unit(name), 'en-US')
      const cubed = parseExpr('a^3')
      if (!cubed.ok) throw new Error('a^3 does not parse')
      for (const source of [texSource(set().tex), texSource(typeset(cubed.value, set, 'en-US'))])
        expect(() => katex.renderToString(source, { throwOnError: true }), `${name}: ${source}`).not.toThrow()
    }
  })
})
