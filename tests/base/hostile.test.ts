/** Expressions that nobody should write: each ends in a plain fault, soon, and none in an exception. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import { namesIn } from '../../src/base/expr.ts'
import { dimensionOf, unitCarried } from '../../src/base/measure.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { plain } from '../../src/base/plain.ts'
import { letter, typeset } from '../../src/base/typeset.ts'
import { reading, resultsOf } from '../support/worked.ts'

/** True for text with half a character in it. */
const halved = (text: string): boolean => /\p{Surrogate}/u.test(text)

/** The rule of an expression's fault, and that it took no longer than a reader would wait. */
function ruleOf(text: string): string {
  const start = performance.now()
  const read = parseExpr(text)
  expect(performance.now() - start).toBeLessThan(500)
  if (read.ok) return 'none'
  const { span, message, help } = read.because
  expect(message).not.toMatch(/\.$|!|undefined|NaN|\[object/)
  expect(help.length).toBeGreaterThan(0)
  expect(span.start).toBeGreaterThanOrEqual(0)
  expect(span.end).toBeGreaterThan(span.start)
  return read.because.rule
}

describe('depth and length', () => {
  test.each([
    ['20,000 brackets', `${'('.repeat(20_000)}1${')'.repeat(20_000)}`, 'expression-too-long'],
    ['3,000 brackets', `${'('.repeat(3000)}1${')'.repeat(3000)}`, 'expression-too-deep'],
    ['3,000 brackets that are never closed', '('.repeat(3000), 'expression-too-deep'],
    ['3,000 minus signs', `${'-'.repeat(3000)}1`, 'expression-too-deep'],
    ['3,000 plus signs', `${'+'.repeat(3000)}1`, 'expression-too-deep'],
    ['a power tower of 3,000', `2${'^2'.repeat(3000)}`, 'expression-too-deep'],
    ['1,500 nested functions', `${'abs('.repeat(1500)}1${')'.repeat(1500)}`, 'expression-too-deep'],
    ['100,000 characters', '1+'.repeat(50_000), 'expression-too-long'],
    ['ten million characters', ' '.repeat(10_000_000), 'expression-too-long'],
  ])('%s', (_, text, rule) => {
    expect(ruleOf(text)).toBe(rule)
  })

  test('a chain of 1,000 sums or products is no nesting, and is worked, checked, printed and set', () => {
    for (const sign of ['+', '*']) {
      const text = Array(1001).fill('1').join(sign)
      const read = parseExpr(text)
      if (!read.ok) throw new Error(read.because.message)
      expect(evaluate(read.value, Number)).toBe(sign === '+' ? 1001 : 1)
      expect(dimensionOf(read.value, () => undefined).ok).toBe(true)
      expect(unitCarried(read.value, () => undefined).factors).toEqual([])
      expect(namesIn(read.value).size).toBe(0)
      expect(plain(read.value, name => name).replaceAll(' ', '')).toBe(text)
      expect(typeset(read.value, letter, 'en-US').slots.length).toBe(1001)
      expect(ruleOf(`${text}${sign}1`)).toBe('expression-too-long')
    }
  })

  test('a tower whose value has no end has no finite value, and says so', () => {
    const { sheet } = reading('```equations\na = 9^9^9^9\nb = 1/0\nc = sqrt(0 - 1)\nd = 2\n```\n')
    for (const name of ['a', 'b', 'c']) {
      const found = sheet.scope.lookup(name)
      expect(found && !found.ok && found.because.map(({ rule }) => rule)).toEqual(['no-finite-value'])
    }
    expect(sheet.scope.lookup('d')?.ok).toBe(true)
  })

  test.each([
    ['dots', `${'a.'.repeat(3900)}`],
    ['letters', 'x'.repeat(7900)],
    ['primes', "a'".repeat(3900)],
    ['unit products', `2 ${'ft*'.repeat(2600)}`],
    ['spaces between', `1${' '.repeat(7000)}+ `],
    ['load cases', `a${'.EX+'.repeat(1900)}`],
    ['digits', `${'9'.repeat(7900)}`],
    ['fractions', '1 '.repeat(3900)],
  ])('long runs of %s are read in no time', (_, text) => {
    expect(ruleOf(text)).toBeTruthy()
  })
})

describe('what has no meaning', () => {
  test.each([
    ['', 'expression-missing'],
    ['   ', 'expression-missing'],
    ['2 +', 'expression-ends'],
    ['2 * (3 + 4', 'bracket-open'],
    ['2 + 3)', 'unexpected-sign'],
    ['2 3', 'operator-missing'],
    ['13 625', 'operator-missing'],
    ['a b', 'operator-missing'],
    ['foo(2)', 'unknown-function'],
    ['sqrt()', 'unexpected-sign'],
    ['sqrt(1, 2)', 'argument-count'],
    ['atan2(1)', 'argument-count'],
    ['2 $ 3', 'unexpected-sign'],
    ['2 ** 3', 'unexpected-sign'],
    ['3/0 in', 'division-by-zero'],
    ['1e999', 'number-too-large'],
    ['12 parsecs', 'unknown-unit'],
    ['12 kips/foo', 'unknown-unit'],
    ['constructor(1)', 'unknown-function'],
    ['__proto__(1)', 'unknown-function'],
    ['1;2', 'unexpected-sign'],
    ['a = 3', 'unexpected-sign'],
    ['"text"', 'unexpected-sign'],
    ['2 😀', 'unexpected-sign'],
    ['\u0000', 'unexpected-sign'],
  ])('%j', (text, rule) => {
    expect(ruleOf(text)).toBe(rule)
  })

  test('a near name is offered for a function and for a unit', () => {
    const help = (text: string) => {
      const read = parseExpr(text)
      return read.ok ? '' : read.because.help
    }
    expect(help('sqr(4)')).toBe('Did you mean sqrt?')
    expect(help('12 kipp')).toContain('Did you mean kip')
    expect(help('3*4*b/x')).toBe('')
    expect(help('12 kip*depth')).toContain('put a space on each side')
  })

  test('no text makes the reader throw, and every fault lies within its text', () => {
    const pieces = fc.constantFrom(
      ...['(', ')', '+', '-', '*', '/', '^', ',', '.', "'", '"', '%', '2', '3.5', '1e3', 'ft', 'in', 'kip', 'a', 'h_1'],
      ...['sqrt', 'max(', 'roof.W', 'EX+', ' ', '½', '²', '√', '′', '″', '−', '×', '·', '😀', '\ud800', '\u202e', '\t'],
    )
    const texts = fc.oneof(
      fc.array(pieces, { maxLength: 30 }).map(list => list.join('')),
      fc.string({ unit: 'binary', maxLength: 60 }),
    )
    fc.assert(
      fc.property(texts, text => {
        const read = parseExpr(text, 1000)
        if (read.ok) {
          const again = parseExpr(plain(read.value, name => name))
          expect(again.ok && evaluate(again.value, () => 1)).toEqual(evaluate(read.value, () => 1))
          expect(read.value.span.start).toBeGreaterThanOrEqual(1000)
          expect(read.value.span.end).toBeLessThanOrEqual(1000 + text.length)
          return
        }
        const { span, message } = read.because
        expect(span.start).toBeGreaterThanOrEqual(1000)
        expect(span.start).toBeLessThanOrEqual(1000 + text.length)
        // A character of two halves is named whole, or the message could not be written to a file.
        if (!halved(text)) expect(halved(message), JSON.stringify(message)).toBe(false)
      }),
      { numRuns: 5000, seed: 31 },
    )
  })
})

test('a document full of such expressions says where each stands, and works the rest', () => {
  const lines = [
    'a = 9 ft + 3 kip',
    `b = ${'('.repeat(20_000)}1${')'.repeat(20_000)}`,
    'c = 2 ft * 3',
    'd = e_missing + 1',
    `f = 2${'^2'.repeat(3000)}`,
    'g = c + 1 ft',
  ]
  const { values, diagnostics } = resultsOf(`\`\`\`equations\n${lines.join('\n')}\n\`\`\`\n`)
  expect(diagnostics.map(({ rule }) => rule)).toEqual([
    'unlike-quantities',
    'expression-too-long',
    'unknown-name',
    'expression-too-deep',
  ])
  expect(values.g?.printed).toBe('7 ft')
})
