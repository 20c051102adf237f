/** Where the thing that stands at a place is given. */
import { inText, type Span } from '../base/span.ts'
import { ownSpans } from '../explain/traced.ts'
import { isWord } from '../model/scope.ts'
import { within } from './cells.ts'
import type { Mention } from './names.ts'
import type { Opened } from './opened.ts'
import { mentionAt, usesOf } from './rename.ts'

export function definitionAt(document: Opened, offset: number): Span | undefined {
  const names = document.names()
  const mention = mentionAt(names, offset)
  if (mention) return givenAt(document, mention)
  const place = names.ids.find(({ span }) => within(span, offset))
  if (!place) return undefined
  const { scope, source } = document.compiled()
  const found = scope.lookup(place.id)
  const [own] = found?.ok && !isWord(found.value) ? ownSpans(found.value.origin) : []
  if (own) return inText(source, own)
  // A result has no line of its own: it belongs to the last thing that its id names.
  const parts = names.mentions.filter(({ span }) => span.start >= place.span.start && span.end <= place.span.end)
  const last = parts.at(-1)
  return last && givenAt(document, last)
}

const givenAt = (document: Opened, mention: Mention): Span | undefined =>
  usesOf(document.names(), mention).find(({ given }) => given)?.span

/** Every use of what stands at a place, in the order of the source. */
export function usesAt(document: Opened, offset: number, withGiven: boolean): readonly Span[] {
  const names = document.names()
  const mention = mentionAt(names, offset)
  if (!mention) return []
  return usesOf(names, mention)
    .filter(({ given }) => withGiven || !given)
    .map(({ span }) => span)
    .toSorted((a, b) => a.start - b.start)
}
