/** Formulas as data: checked when they are defined, run on one row or on a column, traced to what they came from. */
import { describe, expect, test } from 'vitest'
import { formula, run, sym } from '../../src/base/formula.ts'
import { dimensionOfKind, type Kind, unitOfKind } from '../../src/base/kind.ts'
import { Tabulation } from '../../src/base/tabulation.ts'
import { unit } from '../../src/base/unit.ts'
import type { Value } from '../../src/base/value.ts'
import { printed, printedPlain, spansOf } from '../../src/base/value.ts'
import { texAbout, work } from '../../src/base/work.ts'

const F = sym('F', 'F', 'force')
const e = sym('e', 'e', 'length')
const M = sym('M', 'M', 'moment')
const moment = formula({ gives: M, body: 'F*e', of: [F, e], source: 'statics' })
const display = { system: 'US', relative: false } as const

const given = (id: string, count: number, unitText: string, start = 0): Value => ({
  id,
  tex: id,
  si: count * unit(unitText).scale,
  unit: unit(unitText),
  rounding: 1e-12,
  origin: { kind: 'given', span: { start, end: start + 1 } },
})

describe('a formula of the engine is checked when the program loads', () => {
  const define =
    (body: string, of = [F, e]) =>
    () =>
      formula({ gives: M, body, of, source: 'statics' })

  test.each([
    ['F + e', 'a length is added to a force'],
    ['F/e', 'M is a force times a length, but F/e is a force per length'],
    ['F*e*x', 'there is no value x'],
    ['F*(1 ft)', 'M does not use e'],
    ['F*e)', ') has no meaning here'],
    ['', 'a value is missing here'],
  ])('%j is refused', (body, because) => {
    expect(define(body)).toThrow(because)
  })

  test('one that holds is not', () => {
    expect(define('F*e')).not.toThrow()
  })

  test('every kind has one dimension in both systems of units, and a stiffness without a unit is a number', () => {
    const kinds: readonly Kind[] = [
      ...(['length', 'thickness', 'displacement', 'area', 'modulus', 'strength', 'areaLoad', 'lineLoad'] as const),
      ...(['unitShear', 'force', 'moment', 'stiffness', 'stiffnessMoment', 'torsionalStiffness', 'rotation'] as const),
    ]
    for (const kind of kinds)
      for (const system of ['US', 'SI'] as const)
        expect(unitOfKind(kind, { system, relative: false }).dimension, `${kind} in ${system}`).toEqual(
          dimensionOfKind(kind),
        )
    expect(unitOfKind('stiffness', { system: 'US', relative: true }).factors).toEqual([])
  })
})

describe('a formula at work', () => {
  const value = work('M.W1', moment, { F: given('F.W1', 30, 'kip', 5), e: given('e.W1', 24, 'in', 9) }, display, ['W1'])

  test('gives a value with its number, its unit and its letter', () => {
    expect(value.si).toBeCloseTo(30_000 * 4.4482216152605 * 0.6096, 6)
    expect(printed(value, 'en-US')).toBe('60 kip·ft')
    expect(printedPlain(value)).toBe('60 kip*ft')
    expect(value.tex).toBe('M_{\\text{W1}}')
  })

  test('remembers the formula and the values that were put in, and the lines that they stand on', () => {
    expect(value.origin.kind === 'worked' && value.origin.step.formula).toBe(moment)
    expect(value.origin.kind === 'worked' && [...value.origin.step.inputs.keys()]).toEqual(['F', 'e'])
    expect(spansOf(value).map(({ start }) => start)).toEqual([5, 9])
  })

  test('refuses to run short of a value', () => {
    expect(() => work('M', moment, { F: given('F', 1, 'kip') }, display)).toThrow('M has no e to work with')
  })

  test('runs on columns as it runs on rows', () => {
    const result = run(moment, { F: Float64Array.of(1, 2, 3), e: 10 })
    expect(result).toEqual(Float64Array.of(10, 20, 30))
  })

  test('a letter takes more words below it', () => {
    expect(texAbout('k', 'W1')).toBe('k_{\\text{W1}}')
    expect(texAbout('K_{xx}', 'roof')).toBe('K_{xx{,}\\text{roof}}')
    expect(texAbout('e_x', 'EX+')).toBe('e_{x{,}\\text{EX+}}')
    expect(texAbout('J')).toBe('J')
  })
})

describe('a table whose columns are formulas', () => {
  const table = new Tabulation(['A', 'B', 'C'], (row, key) => `wall.${row}.${key}`, display)
    .take(F, [given('F.A', 1, 'kip'), given('F.B', 2, 'kip'), given('F.C', 4, 'kip')])
    .work(moment, { F: 'F', e: given('e', 3, 'ft') })

  test('any cell can be asked where it came from', () => {
    const cell = table.column('M').cell(1)
    expect(cell.id).toBe('wall.B.M')
    expect(printed(cell, 'en-US')).toBe('6 kip·ft')
    expect(cell.origin.kind === 'worked' && cell.origin.step.inputs.get('F')?.id).toBe('F.B')
    expect(cell.origin.kind === 'worked' && cell.origin.step.inputs.get('e')?.id).toBe('e')
    expect(table.column('M').cell(1)).toBe(cell)
  })

  test('its sum rests on every row', () => {
    const total = table.sum('M', sym('sum_M', '\\sum M', 'moment'), 'sum.M')
    expect(printed(total, 'en-US')).toBe('21 kip·ft')
    const inputs = total.origin.kind === 'worked' ? [...total.origin.step.inputs.values()] : []
    expect(inputs.map(({ id }) => id)).toEqual(['wall.A.M', 'wall.B.M', 'wall.C.M'])
  })
})
