/** The reader and the evaluator against mathjs, an independent library, on the same text. */
import { all, create } from 'mathjs'
import { describe, expect, test } from 'vitest'
import { evaluate, prepare } from '../../src/base/evaluate.ts'
import type { Expr } from '../../src/base/expr.ts'
import { dimensionOf } from '../../src/base/measure.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { plain } from '../../src/base/plain.ts'
import { anyMeasure, numberExpression, quantityExpression } from '../support/expressions.ts'
import { randomFrom } from '../support/random.ts'

// With `predictable`, what has no real value is NaN rather than a complex number.
const math = create(all ?? {}, { predictable: true })
// Its own kip and psi are rounded to eight digits; these rest on its pound-force, which is exact.
math.createUnit(
  {
    plf: '1 lbf/ft',
    klf: '1000 lbf/ft',
    psf: '1 lbf/ft^2',
    psi: '1 lbf/inch^2',
    ksi: '1000 lbf/inch^2',
    pcf: '1 lbf/ft^3',
    kip: '1000 lbf',
  },
  { override: true },
)

const names: Readonly<Record<string, number>> = { a: 2.5, b: -0.75, h: 12, rho: 1e-3 }

/** Our spelling in theirs: a pound of force is lbf, and `in` and `ln` mean other things there. */
const theirs = (text: string) =>
  text
    .replace(/\blb\b/g, 'lbf')
    .replace(/\bin\b/g, 'inch')
    .replace(/\bln\(/g, 'log(')

/** In base SI. */
function byMathjs(text: string): number {
  const value: unknown = math.evaluate(theirs(text), { ...names })
  if (typeof value === 'number') return value
  if (math.isUnit(value)) return value.toSI().toJSON().value
  throw new Error(`${text} came to ${String(value)}`)
}

function parsed(text: string): Expr {
  const read = parseExpr(text)
  if (!read.ok) throw new Error(`${read.because.message}: ${text}`)
  return read.value
}

const lookup = (name: string) => names[name] ?? Number.NaN

/** Both work in doubles, by other orders of operation in units. */
function same(ours: number, theirs: number, text: string, share = 1e-12): void {
  const close = ours === theirs || Math.abs(ours - theirs) <= share * Math.max(Math.abs(ours), Math.abs(theirs))
  expect(close, `${text}: ${ours} here, ${theirs} there`).toBe(true)
}

describe('the same text comes to the same number here and in mathjs', () => {
  test('4,000 expressions of numbers and names', () => {
    let worked = 0
    for (let seed = 1; seed <= 4000; seed++) {
      const text = numberExpression(randomFrom(seed), 1 + (seed % 5), Object.keys(names))
      const ours = evaluate(parsed(text), lookup)
      // mathjs takes odd roots of negative numbers, and we take none.
      if (!Number.isFinite(ours)) continue
      worked++
      same(ours, byMathjs(text), text)
    }
    expect(worked).toBeGreaterThan(3000)
  })

  test('2,500 expressions of quantities in feet, inches, metres, pounds, kips, newtons and their compounds', () => {
    for (let seed = 1; seed <= 2500; seed++) {
      const random = randomFrom(90_000 + seed)
      const measure = anyMeasure(random)
      const text = quantityExpression(random, measure, 1 + (seed % 4))
      const expr = parsed(text)
      const found = dimensionOf(expr, () => undefined)
      expect(found.ok && found.value, text).toMatchObject({ force: measure.force, length: measure.length })
      // A difference of nearly equal terms keeps their absolute rounding.
      same(evaluate(expr, lookup), byMathjs(text), text, 1e-9)
    }
  })

  test.each([
    '-2^2',
    '2^3^2',
    '2^-2',
    '2^-2^2',
    '7 - 4 - 2',
    '7 - (4 - 2)',
    '64/4/2',
    '64/(4/2)',
    '64/4*2',
    '2*3^2',
    '(2*3)^2',
    '-3 - -3',
    '--5',
    '+5 - +3',
    '6/-3',
    '2 - 3*4 + 5',
    '1 - 2 + 3 - 4',
    'sqrt(16)^0.5',
    'max(1, -2, 3) - min(4, 5)',
    'atan2(-1, -1)',
    'ln(exp(2))',
    'sum(1, 2, 3)*2',
    '1.5e3 + 2E-2 + .5 + 3.',
  ])('%s', text => {
    same(evaluate(parsed(text), lookup), byMathjs(text), text)
  })
})

describe('an expression as plain text', () => {
  const asPlain = (expr: Expr) => plain(expr, name => name)

  test('re-evaluates to the same number here and in mathjs, 3,000 times', () => {
    for (let seed = 1; seed <= 3000; seed++) {
      const text = numberExpression(randomFrom(50_000 + seed), 1 + (seed % 5), Object.keys(names))
      const expr = parsed(text)
      const value = evaluate(expr, lookup)
      const printed = asPlain(expr)
      const again = evaluate(parsed(printed), lookup)
      expect(Object.is(again, value) || again === value, `${text} as ${printed}: ${again}, not ${value}`).toBe(true)
      if (Number.isFinite(value)) same(value, byMathjs(printed), printed)
    }
  })

  test('with units re-evaluates to the same number, 1,500 times', () => {
    for (let seed = 1; seed <= 1500; seed++) {
      const random = randomFrom(70_000 + seed)
      const text = quantityExpression(random, anyMeasure(random), 1 + (seed % 4))
      const expr = parsed(text)
      const printed = asPlain(expr)
      expect(evaluate(parsed(printed), lookup), `${text} as ${printed}`).toBe(evaluate(expr, lookup))
      same(evaluate(expr, lookup), byMathjs(printed), printed, 1e-9)
    }
  })

  test.each(['12\'-7"', '1/3 in', '6 1/7 in', '1234.56789012345 ft', '0.000123456789 kip', '12 ft 6 5/16 in'])(
    'keeps every digit of %s',
    text => {
      const expr = parsed(`2*(${text})`)
      expect(evaluate(parsed(asPlain(expr)), lookup)).toBe(evaluate(expr, lookup))
    },
  )

  test('prints the same text again when it is read back', () => {
    for (let seed = 1; seed <= 1000; seed++) {
      const random = randomFrom(30_000 + seed)
      const text = asPlain(parsed(numberExpression(random, 1 + (seed % 5), Object.keys(names))))
      expect(asPlain(parsed(text))).toBe(text)
    }
  })
})

test('a formula prepared for columns comes to the same as one evaluated row by row', () => {
  const columns = Object.keys(names)
  for (let seed = 1; seed <= 500; seed++) {
    const random = randomFrom(20_000 + seed)
    const text = numberExpression(random, 1 + (seed % 5), columns)
    const expr = parsed(text)
    const rows = Array.from({ length: 5 }, () => columns.map(() => random.share() * 20 - 5))
    const inputs = columns.map((_, i) => Float64Array.from(rows, row => row[i] ?? 0))
    const result = prepare(expr, columns)(inputs)
    rows.forEach((row, r) => {
      const one = evaluate(expr, name => row[columns.indexOf(name)] ?? 0)
      const cell = typeof result === 'number' ? result : (result[r] ?? Number.NaN)
      expect(cell === one || (Number.isNaN(cell) && Number.isNaN(one)), `${text}: ${cell}, ${one}`).toBe(true)
    })
  }
})
