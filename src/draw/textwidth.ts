/** How much room a text takes: an estimate on the safe side, since the drawing is set before any font is loaded. */

export interface TextStyle {
  readonly size: number
  readonly weight: 'plain' | 'bold'
}

export interface Fitted {
  readonly text: string
  /** The whole text, when `text` is only its beginning. */
  readonly full?: string
}

/**
 * Advance widths, in hundredths of an em, of the characters from space to tilde.
 *
 * They are the widths of the broad sans that a machine without our label font falls
 * back on; the label font is about a tenth narrower, so either fits its box.
 */
const plainWidths =
  '28 28 36 56 56 89 67 20 34 34 39 59 28 34 28 28 56 56 56 56 56 56 56 56 56 56 28 28 59 59 59 56 ' +
  '102 67 67 73 73 67 62 78 73 28 50 67 56 84 73 78 67 78 73 67 62 73 67 95 67 67 62 28 28 28 48 56 ' +
  '34 56 56 50 56 56 28 56 56 23 23 50 23 84 56 56 56 56 34 50 28 56 50 73 50 50 50 34 27 34 59'
const boldWidths =
  '28 34 48 56 56 89 73 25 34 34 39 59 28 34 28 28 56 56 56 56 56 56 56 56 56 56 34 34 59 59 59 62 ' +
  '98 73 73 73 73 67 62 78 73 28 56 73 62 84 73 78 67 78 73 67 62 73 67 95 67 67 62 34 28 34 59 56 ' +
  '34 56 62 56 62 56 34 62 62 29 29 56 29 89 62 62 62 62 39 56 34 62 56 78 56 56 50 39 28 39 59'

const tables = { plain: widthTable(plainWidths), bold: widthTable(boldWidths) } as const

function widthTable(widths: string): readonly number[] {
  return widths.split(' ').map(width => Number(width) / 100)
}

/** Marks that sit on the letter before them, joiners, and signs of direction: none takes room of its own. */
const weightless = /^[\p{M}\p{Cf}]$/u
/** Ideographs, kana, hangul and pictures fill a whole em or a little more. */
const wholeEm = /^[\u1100-\u115f\u2e80-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\u{1f000}-\u{3ffff}]$/u

export const lineHeight = 1.46

export function textWidth(text: string, style: TextStyle): number {
  return Array.from(text).reduce((sum, sign) => sum + characterWidth(sign, style), 0) * style.size
}

function characterWidth(sign: string, style: TextStyle): number {
  const known = tables[style.weight][(sign.codePointAt(0) ?? 0) - 32]
  if (known !== undefined) return known
  if (weightless.test(sign)) return 0
  if (wholeEm.test(sign)) return 1.15
  if (sign === '\u202f' || sign === '\u2009') return 0.25
  return sign === '…' ? 1 : 0.76
}

/** White space, apart from what holds the groups of a number together. */
const space = /[^\S\u00a0\u2009\u202f]+/gu

/** The text as long as it may be, or as much of its beginning as fits before an ellipsis. */
export function shorten(text: string, style: TextStyle, room: number): Fitted {
  const plain = text.replace(space, ' ').trim()
  if (textWidth(plain, style) <= room) return plain === text ? { text } : { text: plain, full: text }
  const signs = Array.from(plain)
  let width = textWidth('…', style)
  let count = 0
  for (const sign of signs) {
    width += textWidth(sign, style)
    if (width > room && count > 0) break
    count += 1
  }
  // A letter keeps its marks, and a joined picture is not cut at its joiner.
  while (count > 1 && weightless.test(signs[count] ?? '')) count -= 1
  return { text: `${signs.slice(0, count).join('').trimEnd()}…`, full: text }
}

/** Breaks a sentence into lines no wider than `room`, at spaces. */
export function wrap(text: string, style: TextStyle, room: number): readonly string[] {
  const lines: string[] = []
  let line = ''
  for (const word of text.split(space)) {
    const longer = line === '' ? word : `${line} ${word}`
    if (line !== '' && textWidth(longer, style) > room) {
      lines.push(line)
      line = word
    } else line = longer
  }
  return [...lines, line].map(each => shorten(each, style, room).text)
}
