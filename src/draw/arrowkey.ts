/** The scale of arrows: one of a round figure, as a key shows it. */
import type { Language } from '../base/language.ts'
import { plainFigure, roundLength } from './scalebar.ts'

/** A unit that figures of a drawing are in: its size in base SI, and its name. */
export interface FigureUnit {
  readonly si: number
  readonly name: string
}

/** The longest arrow of a key. */
const room = 38

/**
 * @param greatest the largest quantity drawn, in base SI, and @param longest the length of its arrow
 * @returns an arrow of at most `room` for 1, 2 or 5 times a power of ten of the unit
 */
export function arrowKey(
  greatest: number,
  longest: number,
  unit: FigureUnit | undefined,
  language: Language,
): { readonly length: number; readonly text: string } | undefined {
  if (unit === undefined || greatest <= 0) return undefined
  const perLength = greatest / longest / unit.si
  const figure = roundLength(perLength * Math.min(room, longest))
  return { length: figure / perLength, text: `${plainFigure(figure, language)} ${unit.name}`.trim() }
}
