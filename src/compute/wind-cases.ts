/** The load cases of wind: those of ASCE 7 Fig. 27.3-8, or the plain force with an eccentricity to either side. */
import type { FigureCase } from '../model/wind-cases.ts'
import { type Axis, type Case, type CasePart, whole } from './cases.ts'

const axes = ['x', 'y'] as const
const letter = { x: 'X', y: 'Y' } as const
const signs = [
  ['+', 1],
  ['-', -1],
] as const

/** Shares of cases 2 and 3, and of case 4. */
const THREE_QUARTERS = 0.75
const BOTH_TURNED = 0.563

/**
 * Of the 24 signed cases those that are not the mirror of another: a case with every force turned round has the
 * same shears with the other sign.
 */
export const figureCases = (chosen: readonly FigureCase[], figure: string): readonly Case[] =>
  chosen.flatMap(number =>
    signedCases(number, `${figure}, case ${number} (as in ASCE 7-10 Fig. 27.4-8; this edition unchecked)`),
  )

function signedCases(number: FigureCase, source: string): readonly Case[] {
  const made = (name: string, parts: readonly CasePart[]): Case => ({ name, loading: 'wind', parts, source })
  const part = (axis: Axis, share: number, sense: CasePart['sense'], moved: CasePart['moved']): CasePart => ({
    axis,
    share,
    sense,
    moved,
  })
  switch (number) {
    case 1:
      return axes.map(axis => whole('wind', `W${letter[axis]}1`, axis, 0, source))
    case 2:
      return axes.flatMap(axis =>
        signs.map(([sign, moved]) => made(`W${letter[axis]}2${sign}`, [part(axis, THREE_QUARTERS, 1, moved)])),
      )
    case 3:
      return signs.map(([sign, sense]) =>
        made(`WXY3${sign}`, [part('x', THREE_QUARTERS, 1, 0), part('y', THREE_QUARTERS, sense, 0)]),
      )
    case 4:
      // Both forces turn the building the same way: counter-clockwise, one along x stands below the middle.
      return signs.flatMap(([sense, along]) =>
        signs.map(([turn, ccw]) =>
          made(`WXY4${sense}${turn}`, [
            part('x', BOTH_TURNED, 1, ccw === 1 ? -1 : 1),
            part('y', BOTH_TURNED, along, along === ccw ? 1 : -1),
          ]),
        ),
      )
  }
}

/** `WX WX+ WX-` and the same along y. */
export const plainCases = (along: readonly Axis[], eccentric: boolean): readonly Case[] =>
  along.flatMap(axis => {
    const name = `W${letter[axis]}`
    const moved = signs.map(([sign, side]) => whole('wind', `${name}${sign}`, axis, side, MOVED))
    return [whole('wind', name, axis, 0), ...(eccentric ? moved : [])]
  })

const MOVED = 'eccentricity as stated'

/** The least pressures act alone, in the middle of the face. */
export const leastCases = (figure: string): readonly Case[] =>
  axes.map(axis => whole('least wind', `W${letter[axis]}m`, axis, 0, `${figure} 27.1.5 (unchecked)`))
