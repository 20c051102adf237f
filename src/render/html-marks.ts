/** Marks on the page: which value a printed number is. They change nothing that is seen. */
import type { Span } from '../base/span.ts'
import type { Account } from '../explain/context.ts'
import { givenWithin, MOST_VALUES, type Placed } from '../explain/traced.ts'
import { escapeHtml, pageText } from './escape.ts'

export interface Marks {
  /** True for the id of a value that the page can tell of. */
  readonly has: (id: string) => boolean
  /** The values that the engineer wrote within a stretch of the source. */
  readonly within: (at: Span) => readonly Placed[]
}

export const noMarks: Marks = { has: () => false, within: () => [] }

/** The marks of a page: what is told of while explaining can be told of by its panel. */
export function marksOf({ roots, besides, cells }: Account): Marks {
  const inOrder = [...besides.keys(), ...roots.keys()]
  const within = givenWithin(cells)
  // A page of very many values tells of the first only.
  if (inOrder.length > MOST_VALUES) {
    const told = new Set(inOrder.slice(0, MOST_VALUES))
    return { has: id => told.has(id), within }
  }
  return { has: id => roots.has(id) || besides.has(id), within }
}

/** Text that prints a value as a whole. */
export function markedText(text: string, id: string | undefined, { has }: Marks): string {
  const set = pageText(text)
  return id === undefined || text === '' || !has(id) ? set : markedHtml(set, id)
}

/** Text that repeats a stretch of the source, with each value in it marked. */
export function givenText(text: string, at: Span, { within }: Marks): string {
  // Only a text that stands in the source letter for letter can be told apart by its offsets there.
  if (text === '' || at.end - at.start !== text.length) return pageText(text)
  let out = ''
  let from = at.start
  for (const { start, end, id } of within(at)) {
    out += pageText(text.slice(from - at.start, start - at.start))
    out += markedHtml(pageText(text.slice(start - at.start, end - at.start)), id)
    from = end
  }
  return out + pageText(text.slice(from - at.start))
}

const markedHtml = (set: string, id: string): string => `<span data-v="${escapeHtml(id)}">${set}</span>`
