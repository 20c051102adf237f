/** What a page is made of: the engineer's own prose, already HTML, and the pieces of the calculation between it. */
import type { Piece } from '../explain/sheet.ts'

export interface Prose {
  readonly kind: 'prose'
  /** Sanitised HTML, as written by a serialiser: text holds no bare `<`, attributes are quoted. */
  readonly html: string
}

export type BodyPart = Prose | Piece

/** `1 fault`, `3 faults`. */
export const count = (n: number, noun: string): string => `${n} ${noun}${n === 1 ? '' : 's'}`
