/** Small parts that several pieces share, and what they are set with. */
import type { Source } from '../base/span.ts'
import { linesInWords } from '../base/span.ts'
import type { Tex } from '../base/tex.ts'
import { escapeHtml } from './escape.ts'
import type { Marks } from './html-marks.ts'
import type { Medium } from './medium.ts'
import { spoken } from './spoken.ts'
import { type Typesetter, withoutDigitGroups } from './typeset.ts'

export interface Setting {
  readonly typesetter: Typesetter
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Level of a heading inside a working, from the heading above it. */
  readonly level: number
  /** The values that the page can tell of. */
  readonly marks: Marks
  readonly medium: Medium
}

/** How a formula reaches readers by ear, from whom KaTeX's HTML is hidden. */
interface Heard {
  /** Stands before what is seen. */
  readonly before: string
  /** Of the element that holds what is seen. */
  readonly attributes: string
}

/** MathML on the screen; on paper, where nothing unseen is left, a text in its place. */
export function heardMath(tex: Tex, { typesetter, medium }: Setting): Heard {
  const mathml = typesetter.mathml(withoutDigitGroups(tex))
  return medium === 'screen'
    ? { before: `<span class="unseen">${mathml}</span>`, attributes: ' aria-hidden="true"' }
    : { before: '', attributes: ` role="img" aria-label="${escapeHtml(spoken(mathml))}"` }
}

/** A formula in running text. */
export function inlineMath(tex: Tex, setting: Setting): string {
  const { before, attributes } = heardMath(tex, setting)
  const seen = setting.typesetter.html(tex, 'inline')
  return setting.medium === 'screen' ? `${before}${seen}` : `<span${attributes}>${seen}</span>`
}

/** The source lines of a piece, in copper; nothing where there are none. */
export function sourceHtml(lines: readonly number[]): string {
  return lines.length === 0 ? '' : `<span class="src">${linesInWords(lines)}</span>`
}

/** An id, where there is one: an empty attribute would be wrong HTML. */
export const idAttribute = (id: string): string => (id === '' ? '' : ` id="${escapeHtml(id)}"`)

/** `Table 4.2` in bold; the word goes when the number is still missing. */
export const titleHtml = (word: string, number: string): string =>
  number === '' ? '' : `<b>${word} ${escapeHtml(number)}</b> `
