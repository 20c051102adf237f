/**
 * Numbers as they are printed: how many digits, and in which of the three
 * spellings (plain text that reads back, the page, TeX).
 */
import { digitGroup, type Language } from './language.ts'
import { joinTex, numeral as slot, type Tex } from './tex.ts'

/** A number rounded for print: sign, decimal digits without grouping, and a power of ten. */
export interface Numeral {
  readonly negative: boolean
  /** Such as `13625` or `26.41`. */
  readonly digits: string
  /** Power of ten that multiplies it; 0 for almost all numbers. */
  readonly exponent: number
}

/** Digits that survive the arithmetic: a value this close to fewer digits is taken to have just those. */
const EXACT = 1e-11

/** Numbers outside these bounds print with a power of ten. */
const LARGE = 1e7
const SMALL = 1e-3

/**
 * Rounds to four significant digits, five where the first digit is 1, so that
 * the step is never coarser than one part in two thousand, with every digit before the point
 * kept. Trailing zeros go when the value has no more digits: 12, not 12.00.
 *
 * @param extra digits beyond that, for a line that must meet its result more closely
 */
export function rounded(value: number, extra = 0): Numeral {
  return rounding(value, 4 + extra, 4 + extra)
}

/**
 * A number that was typed: every digit that it has, up to nine. One without an end, such as 12'-7" in
 * feet, is rounded as a worked one is.
 */
export function asTyped(value: number, extra = 0): Numeral {
  return rounding(value, 9, 4 + extra)
}

/** Every digit that tells a number from its neighbours, so that its text reads back as the number itself. */
export function everyDigit(value: number): Numeral {
  const [digits = '', exponent = '0'] = String(Math.abs(value)).split('e')
  return finish(value < 0, digits, Number(exponent))
}

function rounding(value: number, mostExact: number, significant: number): Numeral {
  const size = Math.abs(value)
  if (size === 0) return { negative: false, digits: '0', exponent: 0 }
  const power = size >= LARGE || size < SMALL ? Math.floor(Math.log10(size)) : 0
  const mantissa = power === 0 ? size : scaled(size, power)
  const whole = mantissa < 1 ? -leadingZeros(mantissa) : Math.floor(Math.log10(mantissa)) + 1
  const exact = exactDecimals(mantissa, Math.max(0, mostExact - whole))
  const first = Number(mantissa.toExponential()[0])
  const decimals = exact ?? Math.max(0, significant + (first === 1 ? 1 : 0) - whole)
  const digits = mantissa.toFixed(decimals)
  // 9.9996 rounds up to 10.000, which with a power of ten is 1.000 of the next.
  if (power !== 0 && digits.startsWith('10')) return finish(value < 0, (mantissa / 10).toFixed(decimals), power + 1)
  return finish(value < 0, digits, power)
}

const scaled = (size: number, power: number): number => Number(`${size}e${-power}`) || size / 10 ** power

/** 0.00x has two zeros after the point. */
const leadingZeros = (mantissa: number): number => Math.max(0, -Math.floor(Math.log10(mantissa)) - 1)

function exactDecimals(size: number, most: number): number | undefined {
  for (let decimals = 0; decimals <= most; decimals++) {
    const step = 10 ** decimals
    if (Math.abs(size * step - Math.round(size * step)) <= EXACT * size * step) return decimals
  }
  return undefined
}

const finish = (negative: boolean, digits: string, exponent: number): Numeral => ({
  negative: negative && /[1-9]/.test(digits),
  digits,
  exponent,
})

/** A number with a fixed count of decimals, as in a column of a table. */
export const fixed = (value: number, decimals: number): Numeral =>
  finish(value < 0, Math.abs(value).toFixed(decimals), 0)

/** Decimals that give the largest number of a column four digits, and fewer where none has more. */
export function columnDecimals(values: Iterable<number>): number {
  let largest = 0
  let exact = 0
  for (const value of values) {
    const size = Math.abs(value)
    largest = Math.max(largest, size)
    exact = Math.max(exact, exactDecimals(size, 4) ?? 9)
  }
  if (largest === 0) return 0
  const decimals = 3 - Math.floor(Math.log10(largest))
  return Math.min(Math.max(0, decimals), exact, 12)
}

/** Text that the expression reader takes back: `-13625.2`, `6.54e-5`. */
export function numeralPlain({ negative, digits, exponent }: Numeral): string {
  return `${negative ? '-' : ''}${digits}${exponent === 0 ? '' : `e${exponent}`}`
}

/** The number as the page prints it: `−13,625.2`, `6.54×10⁻⁵`. */
export function numeralOnPage({ negative, digits, exponent }: Numeral, language: Language): string {
  const power = exponent === 0 ? '' : `×10${superscript(exponent)}`
  return `${negative ? '−' : ''}${grouped(digits).join(digitGroup(language))}${power}`
}

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'
const superscript = (exponent: number): string =>
  String(exponent).replace(/./g, digit => (digit === '-' ? '⁻' : (superscripts[Number(digit)] ?? '')))

/** The number in TeX without its sign; each run of digits is a slot. */
export function numeralTex({ digits, exponent }: Numeral, language: Language): Tex {
  const mark = language === 'en-US' ? '{,}' : '\\,'
  const groups = grouped(digits).map((group, at) => (at === 0 ? slot(group) : joinTex(mark, slot(group))))
  return joinTex(...groups, exponent === 0 ? '' : `\\times 10^{${exponent}}`)
}

/** Groups of three before the point, from four digits on: 2,203. The last group keeps the decimals. */
function grouped(digits: string): readonly string[] {
  const point = digits.indexOf('.')
  const whole = point === -1 ? digits : digits.slice(0, point)
  const rest = point === -1 ? '' : digits.slice(point)
  if (whole.length < 4) return [digits]
  const groups: string[] = []
  for (let end = whole.length; end > 0; end -= 3) groups.unshift(whole.slice(Math.max(0, end - 3), end))
  groups[groups.length - 1] += rest
  return groups
}

/** Half a unit in the last printed digit. */
export function halfUnit({ digits, exponent }: Numeral): number {
  const point = digits.indexOf('.')
  const decimals = point === -1 ? 0 : digits.length - point - 1
  return 0.5 * 10 ** (exponent - decimals)
}

export const numeralValue = (numeral: Numeral): number => Number(numeralPlain(numeral))
