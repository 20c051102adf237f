/** Units: how lengths are written, what each is worth, and which unit a result carries. */
import { describe, expect, test } from 'vitest'
import { evaluate } from '../../src/base/evaluate.ts'
import type { Expr } from '../../src/base/expr.ts'
import { dimensionOf, unitCarried } from '../../src/base/measure.ts'
import { type ExprFault, parseExpr } from '../../src/base/parse.ts'
import { isUnitName, unit, unitOnPage, unitSpellings, unitTex, unitText } from '../../src/base/unit.ts'
import { agrees } from '../support/agrees.ts'
import { reading, resultsOf } from '../support/worked.ts'

function parsed(text: string): Expr {
  const read = parseExpr(text)
  if (!read.ok) throw new Error(`${read.because.message}: ${text}`)
  return read.value
}

const si = (text: string) => evaluate(parsed(text), Number)
const inUnit = (text: string, of: string) => si(text) / unit(of).scale

/** The first fault of an expression, from the reader or from its dimensions. */
function faultOf(text: string): ExprFault {
  const read = parseExpr(text)
  if (!read.ok) return read.because
  const found = dimensionOf(read.value, () => undefined)
  if (found.ok) throw new Error(`${text} has no fault`)
  return found.because
}

describe('feet and inches', () => {
  test.each([
    ['12\'-6"', 12.5],
    ['12\' 6"', 12.5],
    ['12\'6"', 12.5],
    ["12'", 12],
    ['12\' - 6"', 11.5],
    ['12 ft 6 in', 12.5],
    ['12\'-6 1/2"', 12 + 6.5 / 12],
    ['12 ft 6 1/2 in', 12 + 6.5 / 12],
    ['6"', 0.5],
    ['6 1/2 in', 6.5 / 12],
    ['3/8 in', 3 / 96],
    ['1/2"', 1 / 24],
    ['0\'-9"', 0.75],
    ['12 feet', 12],
    ['12.25 ft', 12.25],
    ['2*(14 ft) + 6 in', 28.5],
    ['-(12\'-6")', -12.5],
    ['12\'-6" + 3\'-3"', 15.75],
    ['12′-6″', 12.5],
  ])('%s is %d ft', (text, feet) => {
    expect(inUnit(text, 'ft')).toBeCloseTo(feet, 12)
  })

  test('a share is written in percent', () => {
    expect(si('5%')).toBe(0.05)
    expect(si('5% * 60')).toBeCloseTo(3, 12)
    expect(inUnit('5% * 60 ft', 'ft')).toBeCloseTo(3, 12)
  })
})

describe('what a unit is worth (NIST SP 811, appendix B.8)', () => {
  test.each([
    ['1 ft', '3.048e-1'],
    ['1 in', '2.54e-2'],
    ['1 yd', '9.144e-1'],
    ['1 mi', '1.609344e3'],
    ['1 lb', '4.448222'],
    ['1 kip', '4.448222e3'],
    ['1 plf', '1.459390e1'],
    ['1 lb/in', '1.751268e2'],
    ['1 psf', '4.788026e1'],
    ['1 psi', '6.894757e3'],
    ['1 ksi', '6.894757e6'],
    ['1 lb*ft', '1.355818'],
    ['1 lb*in', '1.129848e-1'],
    ['1 mph', '4.4704e-1'],
    ['1 deg', '1.745329e-2'],
  ])('%s is %s in SI', (text, printed) => {
    agrees(si(text), printed)
  })

  test('compounds are worth what their names say', () => {
    const same: readonly (readonly [string, string])[] = [
      ['1 plf', '1 lb/ft'],
      ['1 klf', '1000 plf'],
      ['1 ksf', '1 kip/ft^2'],
      ['1 psi', '144 psf'],
      ['1 ksi', '1 kip/in^2'],
      ['1 pcf', '1 lb/ft^3'],
      ['1 MPa', '1 N/mm^2'],
      ['1 kPa', '1000 Pa'],
      ['1 GPa', '1000 MPa'],
      ['1 kN/mm', '1 MN/m'],
      ['1 kN*m', '1000 N*m'],
      ['1 kip/in', '12 klf'],
    ]
    for (const [a, b] of same) expect(si(a) / si(b), `${a} and ${b}`).toBeCloseTo(1, 14)
  })

  test('each spelling of a unit reads as that unit', () => {
    for (const name of unitSpellings().filter(name => name !== '%')) {
      const expr = parsed(`2 ${name}`)
      expect(expr.kind === 'quantity' && expr.unit.scale, name).toBe(unit(name).scale)
    }
    expect(isUnitName('constructor')).toBe(false)
    expect(isUnitName('toString')).toBe(false)
  })
})

describe('the unit of a result is the one that its operands carry', () => {
  const carried = (text: string) => unitText(unitCarried(parsed(text), () => undefined))

  test.each([
    ['30 plf * 120 ft', 'lb'],
    ['30 kip * 2 ft', 'kip*ft'],
    ['30 kN * 2 m', 'kN*m'],
    ['3 N * 2 m', 'N*m'],
    ['20 psf * 30 ft', 'plf'],
    ['20 psf * 30 ft * 10 ft', 'lb'],
    ['12 ft + 6 in', 'ft'],
    ['6 in + 12 ft', 'in'],
    ['10 kip / (5 ft)', 'klf'],
    ['10 kip / (5 in)', 'kip/in'],
    ['10 kN / (5 m)', 'kN/m'],
    ['sqrt(9 ft^2)', 'ft'],
    ['(3 ft)^2', 'ft^2'],
    ['2 ksi * 7.63 in', 'kip/in'],
    ['10 kip / (2 kip)', ''],
    ['max(3 in, 1 ft)', 'in'],
    ['5% * 12 ft', 'ft'],
    ['12 ft / (3 in)', ''],
    ['atan2(1 ft, 1 ft)', ''],
    ['1 kip / (12 ft * 6 in)', 'ksf'],
  ])('%s prints in %s', (text, expected) => {
    expect(carried(text)).toBe(expected)
  })

  test('a document prints 3,600 lb, and 60 kip·ft that never becomes an energy', () => {
    const { values } = resultsOf('```equations\nP = 30 plf * 120 ft\nM = 30 kip * 2 ft\nQ = 5 N * 2 m\n```\n')
    expect(values.P).toMatchObject({ unit: 'lb', printed: '3,600 lb' })
    agrees(values.P?.value ?? Number.NaN, '3600.000000')
    expect(values.M).toMatchObject({ unit: 'kip*ft', printed: '60 kip·ft' })
    expect(values.Q).toMatchObject({ unit: 'N*m', printed: '10 N·m' })
  })

  test('after an arrow it is the unit that was asked for', () => {
    const { values } = resultsOf('```equations\nM = 30 kip * 2 ft -> kN*m\na = 6 in + 1 ft -> mm\n```\n')
    expect(values.M?.unit).toBe('kN*m')
    agrees(values.M?.value ?? Number.NaN, '81.35')
    expect(values.a).toMatchObject({ unit: 'mm', printed: '457.2 mm' })
  })

  test('a symbol may be spelled like a unit: they share no namespace', () => {
    const { si } = reading('```equations\nm = 3 ft\nft = 2\nkip = m * ft\nk = 4 m * ft\n```\n')
    expect(si('kip') / 0.3048).toBeCloseTo(6, 12)
    expect(si('k')).toBeCloseTo(8, 12)
  })

  test('a unit is written in three ways', () => {
    const J = unit('kip*ft^2/in')
    expect(unitText(J)).toBe('kip*ft^2/in')
    expect(unitOnPage(unitText(J))).toBe('kip·ft²/in')
    expect(unitTex(J)).toBe('\\mathrm{kip{\\cdot}ft^{2}/in}')
    expect(unitText(unitCarried(parsed('1/(2 ft)'), () => undefined))).toBe('1/ft')
  })
})

describe('a fault of dimension is told at the character where it stands', () => {
  test.each([
    ['9 ft + 3 kip', 7, 12, 'unlike-quantities', 'a force is added to a length'],
    ['9 ft - 3 psf*(2 m)', 7, 18, 'unlike-quantities', 'a force per length is taken from a length'],
    ['2*(9 ft + 3)', 10, 11, 'unlike-quantities', 'a pure number is added to a length'],
    ['max(1 ft, 2 in, 3 kip)', 16, 21, 'unlike-quantities', 'a force stands beside a length'],
    ['sin(3 ft)', 4, 8, 'function-with-unit', 'sin takes an angle or a pure number, and this is a length'],
    ['2^(3 ft)', 2, 8, 'power-with-unit', 'a power is a pure number, and this is a length'],
    ['(2 ft)^sqrt(2)', 7, 14, 'power-not-constant', 'a length can only be raised to a stated number'],
    ['12 fz', 3, 5, 'unknown-unit', 'there is no unit fz'],
    ['12 kip*fx', 7, 9, 'unknown-unit', 'there is no unit fx'],
  ])('%s', (text, start, end, rule, message) => {
    expect(faultOf(text)).toMatchObject({ rule, message, span: { start, end } })
  })

  test('the place is that of the document when the expression stands in one', () => {
    const text = '```equations\na = 9 ft\nb = a + 3 kip\n```\n'
    const { sheet } = reading(text)
    const found = sheet.scope.lookup('b')
    const span = found && !found.ok ? found.because[0]?.at.span : undefined
    expect(span && text.slice(span.start, span.end)).toBe('3 kip')
  })
})
