/** Modes of a document against closed forms. */
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'

const GRAVITY = 9.80665

/** Equal storeys of 20 m by 10 m with 4 kPa, held by two walls of k kN/mm along x and two along y. */
const documentOf = (names: readonly string[], k: number, model = 'storey by storey') =>
  [
    '---\nunits: SI\n---',
    `\`\`\`levels\nwalls: ${model}\n| level | elevation |\n|---|---|\n${names.map((name, i) => `| ${name} | ${3 * (i + 1)} m |`).join('\n')}\n\`\`\``,
    ...names.flatMap(name => [
      `\`\`\`areas ${name}\n| area | from | to | load |\n|---|---|---|---|\n| F | 0 m, 0 m | 20 m, 10 m | 4 kPa |\n\`\`\``,
      [
        `\`\`\`walls ${name}\n| wall | from | to | height | k |\n|---|---|---|---|---|`,
        `| S | 6 m, 0 m | 14 m, 0 m | 3 m | ${k} kN/mm |`,
        `| N | 6 m, 10 m | 14 m, 10 m | 3 m | ${k} kN/mm |`,
        `| W | 0 m, 2 m | 0 m, 8 m | 3 m | ${2 * k} kN/mm |`,
        `| E | 20 m, 2 m | 20 m, 8 m | 3 m | ${2 * k} kN/mm |`,
        '```',
      ].join('\n'),
      `\`\`\`forces ${name}\nx: 100 kN\ny: 100 kN\n\`\`\``,
    ]),
  ].join('\n\n')

const m = (20 * 10 * 4000) / GRAVITY

describe('modes of a document', () => {
  test('one level: sway along x, along y, and turning, each alone', () => {
    const read = reading(documentOf(['roof'], 50))
    const periods = ['1', '2', '3'].map(mode => read.si(`mode.${mode}.T`))
    // 2 k along x, 4 k along y; 2 k 5² + 4 k 10² against turning, and m (20² + 10²)/12 for inertia.
    const turning = (2 * 5e7 * 25 + 4 * 5e7 * 100) / ((m * 500) / 12)
    const expected = [(2 * 5e7) / m, (4 * 5e7) / m, turning]
      .map(omega2 => (2 * Math.PI) / Math.sqrt(omega2))
      .sort((a, b) => b - a)
    periods.forEach((T, i) => {
      closeTo(T, expected[i] ?? Number.NaN, T)
    })
    expect(['1', '2', '3'].map(mode => Math.round(100 * read.si(`mode.${mode}.share.x`)))).toEqual([100, 0, 0])
    expect(Math.abs(read.si('mode.1.participation.x'))).toBeCloseTo(1, 12)
    expect(read.si('roof.mode.1.u')).toBeCloseTo(1, 12)
    expect(read.si('roof.mode.3.turn')).toBeCloseTo(1, 12)
    closeTo(read.si('mode.3.sum.y'), 1, 1)
  })

  test.each(['storey by storey', 'continuous'])('two equal levels, walls %s: the golden ratio', model => {
    const read = reading(documentOf(['floor', 'roof'], 50, model))
    const omega2 = (((3 - Math.sqrt(5)) / 2) * 2 * 5e7) / m
    closeTo(read.si('mode.1.T'), (2 * Math.PI) / Math.sqrt(omega2), 1)
    closeTo(read.si('floor.mode.1.u') / read.si('roof.mode.1.u'), 2 / (1 + Math.sqrt(5)), 1)
    // Participation for a shape of 1 at the roof: (1 + 0.618)/(1 + 0.618²).
    const low = 2 / (1 + Math.sqrt(5))
    closeTo(Math.abs(read.si('mode.1.participation.x')), (1 + low) / (1 + low * low), 1)
    closeTo(read.si('mode.1.share.x'), (1 + low) ** 2 / (1 + low * low) / 2, 1)
    for (const mode of ['1', '2', '3']) expect(read.si(`mode.${mode}.residual`)).toBeLessThan(1e-12)
  })

  test('a wall that bends through its storeys makes the period longer than storeys on their own', () => {
    const built = (model: string) =>
      reading(
        documentOf(['floor', 'roof'], 50, model)
          .replace(
            '---\n\n',
            '---\n\n```construction C\nmaterial: section\nE: 15 GPa\nnu: 0.2\nt: 200 mm\nends: cantilever\n```\n\n',
          )
          .replaceAll('| height | k |', '| height | construction |')
          .replaceAll(/\| \d+ kN\/mm \|/g, '| C |'),
      ).si('mode.1.T')
    expect(built('continuous')).toBeGreaterThan(1.1 * built('storey by storey'))
  })

  test('names that there are not are no values', () => {
    const { sheet } = reading(documentOf(['roof'], 50))
    for (const id of [
      'mode.4.T',
      'mode.1',
      'mode.1.T.x',
      'mode.1.constructor',
      'roof.mode.1',
      'roof.mode.1.w',
      'roof.mode.9.u',
      'mode.0.sum.x',
    ])
      expect(sheet.scope.lookup(id)).toBeUndefined()
  })

  test('without inertia or without displacement there are none, and the reason is told', () => {
    const faults = (text: string) => {
      const found = reading(text).sheet.vibration()
      return found.ok ? [] : found.because.map(({ rule, message }) => `${rule}: ${message}`)
    }
    const point = documentOf(['roof'], 50)
      .replace('| 4 kPa |', '| 0 kPa |')
      .concat('\n\n```point-loads roof\n| point | at | load |\n|---|---|---|\n| P | 10 m, 5 m | 800 kN |\n```\n')
    expect(faults(point)).toEqual(['mass-in-one-point: all weight of roof is in one point'])
    expect(faults(documentOf(['roof'], 50).replaceAll(/(\d+) kN\/mm/g, '$1'))[0]).toMatch(/^drift-not-worked: /)
  })
})
