/** Load cases: what acts, along which axes, how much of it, and to which side it is moved. */

export type Axis = 'x' | 'y'

export const across = (axis: Axis): Axis => (axis === 'x' ? 'y' : 'x')

/** Whose forces a case takes: those stated or of an earthquake, those of wind, or the least that wind is designed for. */
export type Loading = 'seismic' | 'wind' | 'least wind'

/** The force along one axis in a case. */
export interface CasePart {
  readonly axis: Axis
  /** Share of the whole force. */
  readonly share: number
  /** −1 where the force acts toward negative. */
  readonly sense: -1 | 1
  /** −1, 0 or 1: the force stands as it is, or is moved across its line toward negative or positive. */
  readonly moved: -1 | 0 | 1
}

export interface Case {
  readonly name: string
  readonly loading: Loading
  /** One along an axis, or one along each, x before y. */
  readonly parts: readonly CasePart[]
  /** Clause that the case is from, where it is not the plain rule of statics. */
  readonly source?: string
}

const sides = [
  ['', 0],
  ['+', 1],
  ['-', -1],
] as const

/** A case as the page prints it, with a true minus. */
export const caseOnPage = (name: string): string => name.replaceAll('-', '−')

/** `EX EX+ EX- EY EY+ EY-`, those whose force is stated. */
export const casesOf = (axes: readonly Axis[]): readonly Case[] =>
  axes.flatMap(axis => sides.map(([sign, moved]) => whole('seismic', `E${axis.toUpperCase()}${sign}`, axis, moved)))

/** The whole force along one axis. */
export const whole = (loading: Loading, name: string, axis: Axis, moved: CasePart['moved'], source?: string): Case => ({
  name,
  loading,
  parts: [{ axis, share: 1, sense: 1, moved }],
  ...(source ? { source } : {}),
})

/** The part of a case along an axis. */
export const partAlong = ({ parts }: Case, axis: Axis): CasePart | undefined => parts.find(part => part.axis === axis)
