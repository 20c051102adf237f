/** Puts quoted results, and the numbers of headings, into the tree of the prose. */
import type { Heading, PhrasingContent, RootContent, Text } from 'mdast'
import type { Quoted, Quotes } from '../explain/blocks.ts'
import type { HeadingMark } from '../explain/number.ts'
import { fragment } from './escape.ts'

declare module 'mdast' {
  interface TextData {
    /** Id of the value that the text prints. */
    prints?: string
  }
}

/** The same node with its quotes put in; nodes without quotes stay the same objects. */
export function withQuotes<T extends RootContent>(node: T, quotes: Quotes): T {
  if (quotes.size === 0 || !('children' in node)) return node
  // A parent's children are of the kinds that it held before: text is replaced by text, strong and link.
  const children = (node.children as RootContent[]).flatMap((child): readonly RootContent[] =>
    child.type === 'text' ? inline(child, quotes.get(child), node.type === 'link') : [withQuotes(child, quotes)],
  )
  return { ...node, children } as T
}

/** @param linked true within a link of the engineer's own, which leads where they said */
function inline(text: Text, quoted: readonly Quoted[] | undefined, linked: boolean): PhrasingContent[] {
  if (!quoted || quoted.length === 0) return [text]
  const out: PhrasingContent[] = []
  let from = 0
  for (const each of quoted) {
    if (each.within.start > from) out.push({ type: 'text', value: text.value.slice(from, each.within.start) })
    out.push(inPlace(each, linked))
    from = each.within.end
  }
  if (from < text.value.length) out.push({ type: 'text', value: text.value.slice(from) })
  return out
}

function inPlace(quoted: Quoted, linked: boolean): PhrasingContent {
  if ('missing' in quoted) return { type: 'strong', children: [{ type: 'text', value: `[${quoted.missing}]` }] }
  // A link of the engineer's own leads where they said, and nowhere else.
  if (linked) return { type: 'text', value: quoted.quote.printed }
  const words: Text = { type: 'text', value: quoted.quote.printed, data: { prints: quoted.quote.id } }
  if (quoted.place === undefined) return words
  return {
    type: 'link',
    url: fragment(quoted.place),
    children: [words],
    data: { hProperties: { className: ['q'] } },
  }
}

/** A heading with its number before its words, and its anchor. */
export const withMark = (heading: Heading, mark: HeadingMark | undefined): Heading =>
  mark === undefined
    ? heading
    : {
        ...heading,
        children:
          mark.number === '' ? heading.children : [{ type: 'text', value: `${mark.number} ` }, ...heading.children],
        data: { ...heading.data, hProperties: { id: mark.id } },
      }
