/** Small parts that several pieces share, and what they are set with. */
import type { Source } from '../base/span.ts'
import { linesInWords } from '../base/span.ts'
import type { Tex } from '../base/tex.ts'
import { escapeHtml } from './escape.ts'
import type { Marks } from './html-marks.ts'
import { type Typesetter, withoutDigitGroups } from './typeset.ts'

export interface Setting {
  readonly typesetter: Typesetter
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Level of a heading inside a working, from the heading above it. */
  readonly level: number
  /** The values that the page can tell of. */
  readonly marks: Marks
}

/** A formula in running text: KaTeX hides its HTML from readers by ear, who get MathML instead. */
export function inlineMath(tex: Tex, { typesetter }: Setting): string {
  return `${unseenMath(tex, typesetter)}${typesetter.html(tex, 'inline')}`
}

export const unseenMath = (tex: Tex, typesetter: Typesetter): string =>
  `<span class="unseen">${typesetter.mathml(withoutDigitGroups(tex))}</span>`

/** The source lines of a piece, in copper; nothing where there are none. */
export function sourceHtml(lines: readonly number[]): string {
  return lines.length === 0 ? '' : `<span class="src">${linesInWords(lines)}</span>`
}

/** An id, where there is one: an empty attribute would be wrong HTML. */
export const idAttribute = (id: string): string => (id === '' ? '' : ` id="${escapeHtml(id)}"`)

/** `Table 4.2` in bold; the word goes when the number is still missing. */
export const titleHtml = (word: string, number: string): string =>
  number === '' ? '' : `<b>${word} ${escapeHtml(number)}</b> `
