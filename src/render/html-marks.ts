/** Marks on the page: which value a printed number is. They change nothing that is seen. */
import type { Span } from '../base/span.ts'
import { givenWithin, type Placed, type Traced } from '../explain/traced.ts'
import { escapeHtml, pageText } from './escape.ts'

export interface Marks {
  /** True for the id of a value that the page can tell of. */
  readonly has: (id: string) => boolean
  /** The values that the engineer wrote within a stretch of the source. */
  readonly within: (at: Span) => readonly Placed[]
}

export const noMarks: Marks = { has: () => false, within: () => [] }

export function marksOf(traced: Traced): Marks {
  const ids = new Set(traced.values.map(({ value }) => value.id))
  return { has: id => ids.has(id), within: givenWithin(traced) }
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
