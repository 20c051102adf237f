/**
 * Exponents of force, length and time, the base of a structural calculation.
 * Angles and ratios are pure numbers. Exponents may be fractions: the square
 * root of a stress is an ordinary step of concrete design.
 */
export interface Dimension {
  readonly force: number
  readonly length: number
  readonly time: number
}

export const dimension = (force: number, length: number, time = 0): Dimension => ({ force, length, time })

export const NUMBER = dimension(0, 0)

/** Exponents come from sums and products of small fractions; this bounds their rounding, nothing else. */
const EXPONENT_ROUNDING = 1e-9

export function sameDimension(a: Dimension, b: Dimension): boolean {
  return (
    Math.abs(a.force - b.force) < EXPONENT_ROUNDING &&
    Math.abs(a.length - b.length) < EXPONENT_ROUNDING &&
    Math.abs(a.time - b.time) < EXPONENT_ROUNDING
  )
}

export const isNumber = (a: Dimension): boolean => sameDimension(a, NUMBER)

export const timesDimension = (a: Dimension, b: Dimension): Dimension =>
  dimension(a.force + b.force, a.length + b.length, a.time + b.time)

export const overDimension = (a: Dimension, b: Dimension): Dimension =>
  dimension(a.force - b.force, a.length - b.length, a.time - b.time)

export const raiseDimension = (a: Dimension, power: number): Dimension =>
  dimension(a.force * power, a.length * power, a.time * power)

const words: readonly (readonly [Dimension, string])[] = [
  [NUMBER, 'a pure number'],
  [dimension(0, 1), 'a length'],
  [dimension(0, 2), 'an area'],
  [dimension(0, 3), 'a volume'],
  [dimension(0, 4), 'a second moment of area'],
  [dimension(1, 0), 'a force'],
  [dimension(1, 1), 'a force times a length'],
  [dimension(1, -1), 'a force per length'],
  [dimension(1, -2), 'a pressure'],
  [dimension(1, -3), 'a weight per volume'],
  [dimension(0, 0, 1), 'a time'],
  [dimension(0, 1, -1), 'a speed'],
  [dimension(0, 1, -2), 'an acceleration'],
  [dimension(0, 0, -1), 'a frequency'],
  [dimension(1, -1, 2), 'a mass'],
]

/** The dimension in words, with its article: `a force per length`. */
export function dimensionInWords(a: Dimension): string {
  const known = words.find(([known]) => sameDimension(known, a))
  if (known) return known[1]
  const factors = [
    ['force', a.force],
    ['length', a.length],
    ['time', a.time],
  ] as const
  return factors
    .filter(([, power]) => power !== 0)
    .map(([name, power]) => (power === 1 ? name : `${name}^${power}`))
    .join('·')
}
