/** Every printed equation holds to the digits printed. */
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import { intervalOf, meets } from '../../src/base/interval.ts'
import { parseExpr } from '../../src/base/parse.ts'
import { broken, missedBy, printedNumber } from '../support/audit.ts'
import { american, buildings, documentOf, metric, relative } from '../support/building.ts'
import { anyMeasure, numberExpression, quantityExpression } from '../support/expressions.ts'
import { randomFrom } from '../support/random.ts'
import { type PublishedStep, resultsOf } from '../support/worked.ts'

function holds(steps: readonly PublishedStep[]): void {
  expect(steps.flatMap(step => broken(step) ?? [])).toEqual([])
}

describe('intervals', () => {
  test('hold every value that the expression takes within them, 3,000 times', () => {
    const names = ['a', 'b', 'h']
    for (let seed = 1; seed <= 3000; seed++) {
      const random = randomFrom(800_000 + seed)
      const read = parseExpr(numberExpression(random, 1 + (seed % 4), names))
      if (!read.ok) throw new Error(read.because.message)
      const centres = new Map(names.map(name => [name, (random.share() - 0.4) * random.pick([1, 10, 300])]))
      const width = random.pick([1e-6, 0.01, 1, 20])
      const leaf = (name: string) => {
        const centre = centres.get(name) ?? 0
        return { low: centre - width, high: centre + width }
      }
      const { low, high } = intervalOf(read.value, leaf, () => undefined)
      const slack = 1e-9 * Math.max(1, Math.abs(low), Math.abs(high))
      for (let n = 0; n < 8; n++) {
        const inside = new Map(names.map(name => [name, (centres.get(name) ?? 0) + width * (2 * random.share() - 1)]))
        const value = evaluate(read.value, name => inside.get(name) ?? 0)
        if (!Number.isFinite(value)) continue
        const within = value >= low - slack && value <= high + slack
        expect(within || low === Number.NEGATIVE_INFINITY, `${value} is outside ${low} to ${high}, seed ${seed}`).toBe(
          true,
        )
      }
    }
  })

  test('are as wide as half a unit in the last digit each way', () => {
    const read = parseExpr('12.50 - 3')
    if (!read.ok) throw new Error(read.because.message)
    const found = intervalOf(
      read.value,
      () => ({ low: 0, high: 0 }),
      ({ kind, ...rest }) => (kind === 'number' && 'text' in rest && rest.text === '12.50' ? rest.text : undefined),
    )
    expect(found.low).toBeCloseTo(9.495, 12)
    expect(found.high).toBeCloseTo(9.505, 12)
    expect(meets(found, { low: 9.505, high: 10 })).toBe(true)
    expect(meets(found, { low: 9.51, high: 10 })).toBe(false)
  })
})

describe('the check itself', () => {
  const step = {
    id: 'x',
    formula: 'a*b + 1 ft',
    substituted: '2.5*(3.1 ft) + 1 ft',
    inputs: { a: 'a', b: 'b' },
    result: { value: 8.75, unit: 'ft', printed: '8.75 ft' },
  }

  test('takes an equation that holds and refuses one that does not', () => {
    expect(broken(step)).toBeUndefined()
    expect(broken({ ...step, result: { ...step.result, printed: '8.95 ft' } })).toBeUndefined()
    expect(broken({ ...step, result: { ...step.result, printed: '9.15 ft' } })).toContain('does not give 9.15 ft')
    // A constant of the formula is exact and does not stretch.
    expect(
      broken({ ...step, substituted: '2.50*(3.100 ft) + 1 ft', result: { ...step.result, printed: '8.78 ft' } }),
    ).toContain('8.78')
    expect(() => broken({ ...step, substituted: '2.5*(3.1 ft) - 1 ft' })).toThrow('not the formula')
    expect(() => broken({ ...step, substituted: '2.5*(3.1 ft) + 2 ft' })).toThrow('not the formula')
  })

  test.each([
    ['13,625 kip/in', 13625, 0.5],
    ['−26.41 ft', -26.41, 0.005],
    ['6.543×10⁻⁵', 6.543e-5, 5e-9],
    ['13\u202f625.5 kN', 13625.5, 0.05],
    ['5%', 5, 0.5],
  ])('reads %s from the page', (text, value, half) => {
    const read = printedNumber(text)
    expect(read.value).toBeCloseTo(value, 12)
    expect(read.half).toBeCloseTo(half, 12)
  })
})

/** Equations over values of any digits: each quantity of a random expression becomes a named line of its own. */
function equations(seed: number): string {
  const random = randomFrom(seed)
  const lines: string[] = []
  for (let n = 0; n < 12; n++) {
    const text = quantityExpression(random, anyMeasure(random), 1 + (n % 3)).replace(
      /\((\d[\d.]*) ([a-z][a-z*/^\d]*)\)/gi,
      (_, number, unitText) => {
        const name = `g${lines.length}`
        const third = random.share() < 0.5 ? ` / ${random.pick(['3', '7', '0.0117', '190.3'])}` : ''
        lines.push(`${name} = ${number} ${unitText}${third}`)
        return name
      },
    )
    lines.push(`r${lines.length} = ${text}`)
  }
  return `\`\`\`equations\n${lines.join('\n')}\n\`\`\`\n`
}

describe('every printed equation holds', () => {
  test('of 200 documents of equations', () => {
    let steps = 0
    for (let seed = 1; seed <= 200; seed++) {
      const results = resultsOf(equations(910_000 + seed))
      steps += results.steps.length
      holds(results.steps)
    }
    expect(steps).toBeGreaterThan(2000)
  })

  test.each([
    ['American', american],
    ['metric', metric],
    ['relative', relative],
  ])('of the whole calculation of random buildings, %s', (_, spelling) => {
    fc.assert(
      fc.property(buildings, building => {
        const { steps } = resultsOf(documentOf(building, spelling, 'whole calculation\ncase: all'))
        expect(steps.length).toBeGreaterThan(200)
        holds(steps)
      }),
      { numRuns: 6, seed: 77 },
    )
  })

  const samples = ['samples', 'samples/manual']
    .filter(folder => existsSync(folder))
    .flatMap(folder =>
      readdirSync(folder)
        .filter(name => name.endsWith('.md'))
        .map(name => `${folder}/${name}`),
    )

  test.each(samples)('of %s', path => {
    holds(resultsOf(readFileSync(path, 'utf8')).steps)
  })
})

describe('a reader with a calculator', () => {
  test('meets nearly every printed result within one unit of its last digit', () => {
    const [building] = fc.sample(buildings, { numRuns: 1, seed: 78 })
    if (!building) throw new Error('a building was asked for')
    const { steps } = resultsOf(documentOf(building, american, 'whole calculation'))
    // What is left after cancelling, such as a residual, is met by its interval only.
    const far = steps.filter(step => !step.id.includes('.residual.') && missedBy(step) > 1.001)
    expect(far.map(({ id, substituted, result }) => `${id}: ${substituted} = ${result.printed}`)).toEqual([])
  })

  test('meets a difference of nearly equal lengths, one of them without an end in feet', () => {
    const { steps } = resultsOf('```equations\na = 12\'-7"\nb = a - 12.5 ft\n```\n')
    const step = steps.find(({ id }) => id === 'b')
    expect(step?.result.printed).toBe('0.08333 ft')
    expect(step?.substituted).toBe('12.58333 ft - 12.5 ft')
    expect(step && missedBy(step)).toBeLessThanOrEqual(1)
  })
})
