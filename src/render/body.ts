/** What a page is made of: the engineer's own prose, already HTML, and the pieces of the calculation between it. */
import type { Piece } from '../explain/sheet.ts'

export interface Prose {
  readonly kind: 'prose'
  /** Sanitised HTML, as written by a serialiser: text holds no bare `<`, attributes are quoted. */
  readonly html: string
}

export type BodyPart = Prose | Piece

/** Source lines in words: `line 31`, `lines 31, 44`, `lines 12–15, 20`. Empty when there are none. */
export function linesInWords(lines: readonly number[]): string {
  if (lines.length === 0) return ''
  return `${lines.length === 1 ? 'line' : 'lines'} ${runs(lines).map(runInWords).join(', ')}`
}

/** Consecutive lines gathered into runs of first and last. */
function runs(lines: readonly number[]): readonly (readonly [number, number])[] {
  const out: [number, number][] = []
  for (const line of lines) {
    const last = out.at(-1)
    if (last !== undefined && line === last[1] + 1) last[1] = line
    else out.push([line, line])
  }
  return out
}

const runInWords = ([first, last]: readonly [number, number]): string => {
  if (first === last) return String(first)
  return last === first + 1 ? `${first}, ${last}` : `${first}–${last}`
}

/** `1 fault`, `3 faults`. */
export const count = (n: number, noun: string): string => `${n} ${noun}${n === 1 ? '' : 's'}`
