/** Load cases: the direction of the force, and the side to which the mass is moved. */

export type Axis = 'x' | 'y'

export interface Case {
  readonly name: string
  readonly axis: Axis
  /** −1, 0 or 1: the mass stands as it is, or is moved toward negative or positive. */
  readonly moved: -1 | 0 | 1
}

const sides = [
  ['', 0],
  ['+', 1],
  ['-', -1],
] as const

/** A case as the page prints it, with a true minus. */
export const caseOnPage = (name: string): string => name.replace('-', '−')

/** `EX EX+ EX- EY EY+ EY-`, those whose force is stated. */
export function casesOf(axes: readonly Axis[]): readonly Case[] {
  return axes.flatMap(axis => sides.map(([sign, moved]) => ({ name: `E${axis.toUpperCase()}${sign}`, axis, moved })))
}
