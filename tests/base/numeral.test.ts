/** Numbers as they print: how many digits, how they are grouped, and that what prints reads back. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import type { Language } from '../../src/base/language.ts'
import {
  asTyped,
  columnDecimals,
  everyDigit,
  fixed,
  halfUnit,
  numeralOnPage,
  numeralPlain,
  numeralTex,
  numeralValue,
  rounded,
} from '../../src/base/numeral.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { texSource } from '../../src/base/tex.ts'

const page = (value: number, language: Language = 'en-US') => numeralOnPage(rounded(value), language)
const runs = { numRuns: 2000, seed: 12 }
const sizes = fc
  .tuple(
    fc.double({ min: 1, max: 10, maxExcluded: true, noNaN: true }),
    fc.integer({ min: -14, max: 14 }),
    fc.boolean(),
  )
  .map(([mantissa, exponent, negative]) => (negative ? -1 : 1) * mantissa * 10 ** exponent)

describe('digits of a worked number', () => {
  test.each([
    [13625.4321, '13,625'],
    [2203.71, '2,204'],
    [26.41449, '26.41'],
    [18.23456, '18.235'],
    [1.23456, '1.2346'],
    [9.87654, '9.877'],
    [0.0456789, '0.04568'],
    [0.0123456, '0.012346'],
    [12, '12'],
    [0.5, '0.5'],
    [1234567.89, '1,234,568'],
    [0.1 + 0.2, '0.3'],
    [100, '100'],
  ])('%d prints as %s: four digits, five where the first is a 1, and no zeros after its last', (value, text) => {
    expect(page(value)).toBe(text)
  })

  test.each([
    [6.54321e-5, '6.543×10⁻⁵'],
    [-1.23456e-7, '−1.2346×10⁻⁷'],
    [2.5e12, '2.5×10¹²'],
    [9.99996e-4, '1.000×10⁻³'],
    [9.99996e11, '1.000×10¹²'],
  ])('%d prints as %s, with a power of ten', (value, text) => {
    expect(page(value)).toBe(text)
  })

  test('zero has no sign and no decimals', () => {
    expect([0, -0].map(value => page(value))).toEqual(['0', '0'])
    expect(numeralOnPage(fixed(-0.0004, 2), 'en-US')).toBe('0.00')
  })

  test('the printed number is within half a unit in its last digit, and that is at most 1 part in 2,000', () => {
    fc.assert(
      fc.property(sizes, value => {
        const numeral = rounded(value)
        const off = Math.abs(numeralValue(numeral) - value)
        expect(off).toBeLessThanOrEqual(halfUnit(numeral) * (1 + 1e-9) + 1e-11 * Math.abs(value))
        expect(off).toBeLessThanOrEqual(Math.abs(value) / 2000)
      }),
      runs,
    )
  })

  test('each further digit that is asked for comes ten times nearer', () => {
    fc.assert(
      fc.property(sizes, fc.integer({ min: 0, max: 4 }), (value, extra) => {
        const off = Math.abs(numeralValue(rounded(value, extra)) - value)
        expect(off).toBeLessThanOrEqual((Math.abs(value) / 2000) * 10 ** -extra)
      }),
      runs,
    )
  })

  test('a power of ten has one digit before the point', () => {
    fc.assert(
      fc.property(sizes, value => {
        const { digits, exponent } = rounded(value)
        if (exponent !== 0) expect(digits).toMatch(/^[1-9](\.\d+)?$/)
        expect(digits).toMatch(/^(0|[1-9]\d*)(\.\d+)?$/)
      }),
      runs,
    )
  })
})

describe('digits of a typed number', () => {
  test.each([
    [1234.5678, '1,234.5678'],
    [0.123456789, '0.123456789'],
    [4732.5, '4,732.5'],
    [7.625, '7.625'],
  ])('%d keeps all that was typed: %s', (value, text) => {
    expect(numeralOnPage(asTyped(value), 'en-US')).toBe(text)
  })

  test('one without an end is rounded, and to more digits where a line asks for them', () => {
    expect(numeralPlain(asTyped(12 + 7 / 12))).toBe('12.583')
    expect(numeralPlain(asTyped(12 + 7 / 12, 2))).toBe('12.58333')
  })

  test('every digit of a constant reads back as the very same number', () => {
    fc.assert(
      fc.property(sizes, value => {
        expect(numeralValue(everyDigit(value))).toBe(value)
      }),
      runs,
    )
  })
})

describe('three spellings of one number', () => {
  test('digits are grouped by comma in American and by a thin space in British', () => {
    expect(page(1234567, 'en-US')).toBe('1,234,567')
    expect(page(1234567, 'en-GB')).toBe('1\u202f234\u202f567')
    expect(page(-4321.7, 'en-GB')).toBe('−4\u202f322')
    expect(page(999, 'en-GB')).toBe('999')
    expect(texSource(numeralTex(rounded(1234567), 'en-US'))).toBe('1{,}234{,}567')
    expect(texSource(numeralTex(rounded(1234567), 'en-GB'))).toBe('1\\,234\\,567')
    expect(texSource(numeralTex(rounded(6.5e-5), 'en-US'))).toBe('6.5\\times 10^{-5}')
  })

  test('the plain spelling has no grouping and reads back as the same number', () => {
    fc.assert(
      fc.property(sizes, value => {
        const numeral = rounded(value)
        const read = parseExpr(numeralPlain(numeral))
        expect(read.ok && evaluate(read.value, Number)).toBe(numeralValue(numeral))
        const onPage = numeralOnPage(numeral, 'en-US').replaceAll(',', '').replace('−', '-')
        expect(Number(onPage.split('×')[0])).toBe(Number(numeralPlain(numeral).split('e')[0]))
      }),
      runs,
    )
  })
})

describe('a column of numbers', () => {
  test.each([
    [[1, 2, 3], 0],
    [[0.5, 12], 1],
    [[26.4123, 3.7], 2],
    [[1234.5, 0.25], 0],
    [[0.001234, 0.0005], 6],
    [[0, 0], 0],
    [[], 0],
  ])('%j prints with %i decimals: four digits of the largest, and none that all are without', (values, decimals) => {
    expect(columnDecimals(values)).toBe(decimals)
  })
})
