import { expect, test } from 'vitest'
import { joinTex, numeral, tex } from '../../src/base/tex.ts'
import type { Table } from '../../src/explain/sheet.ts'
import { fitFactor, tableWidth, unbreakableWidth } from '../../src/render/measure.ts'
import { body } from './fixture.ts'

test('a chain of terms may break at its operators, a fraction may not', () => {
  const term = joinTex('\\left(', numeral('8581'), '\\ \\mathrm{kip/in}\\right)')
  const chain = joinTex(term, '+', term, '+', term)
  expect(unbreakableWidth(chain)).toBeLessThan(1.5 * unbreakableWidth(term))
  expect(unbreakableWidth(joinTex('\\frac{', chain, '}{2}'))).toBeGreaterThan(3 * unbreakableWidth(term))
})

test('estimates come within a fifth of what a browser measures', () => {
  // Widths in em of the formula's type, measured in Chromium 156 with KaTeX's faces.
  const measured: readonly (readonly [string, number])[] = [
    ['roof.wall.W1.k', 8.55],
    ['roof.CR.x', 38.97],
    ['roof.J', 12.57],
    ['roof.e.x', 4.44],
  ]
  for (const [id, width] of measured) {
    const equation = body.find(part => part.kind === 'equation' && part.id === id)
    const line = equation?.kind === 'equation' ? (equation.lines[1] ?? tex('')) : tex('')
    expect(Math.abs(unbreakableWidth(line) / width - 1), id).toBeLessThan(0.2)
  }
})

test('a table is as wide as the longest of head, unit and cell in each column, and the space between', () => {
  const table: Table = {
    kind: 'table',
    id: '',
    number: '',
    caption: '',
    columns: [{ head: 'Wall', unit: '', align: 'left' }],
    rows: [{ cells: ['0123456789'], governs: false }],
    formulas: [],
    sourceLines: [],
  }
  expect(tableWidth(table)).toBeCloseTo(10 * 0.5 + 1.3)
  expect(tableWidth({ ...table, foot: { cells: ['01234567890123456789'], governs: false } })).toBeCloseTo(
    20 * 0.5 + 1.3,
  )
})

test('what fits is not set smaller, and nothing is set smaller than can be read', () => {
  expect([fitFactor(20, 30, 0.5), fitFactor(40, 30, 0.5), fitFactor(400, 30, 0.5)]).toEqual([1, 0.75, 0.5])
})
