/** The document as stretches of prose and of pieces, ready for any format. */
import type { RootContent, Text } from 'mdast'
import type { Quoted, Quotes } from '../explain/blocks.ts'
import type { HeadingMark, Numbered } from '../explain/number.ts'
import type { Piece } from '../explain/sheet.ts'
import { withFigure } from './pictures.ts'
import { withMark, withQuotes } from './quotes.ts'
import { withoutActive } from './safe.ts'

/** A stretch of the document: the engineer's own nodes, or the pieces that a block became. */
export type Part =
  | { readonly kind: 'prose'; readonly nodes: readonly RootContent[] }
  | { readonly kind: 'pieces'; readonly pieces: readonly Piece[] }

export function partsOf(
  items: readonly Numbered<RootContent>[],
  headings: ReadonlyMap<RootContent, HeadingMark>,
  figures: ReadonlyMap<RootContent, string>,
  quotes: Quotes,
): readonly Part[] {
  const parts: ({ readonly kind: 'prose'; readonly nodes: RootContent[] } | Extract<Part, { kind: 'pieces' }>)[] = []
  for (const item of items) {
    if (item.kind === 'pieces') {
      parts.push(item)
      continue
    }
    const nodes = shownAs(item.key, quotesIn(item.key, quotes), quotes, headings.get(item.key), figures.get(item.key))
    const last = parts.at(-1)
    if (last?.kind === 'prose') last.nodes.push(...nodes)
    else parts.push({ kind: 'prose', nodes: [...nodes] })
  }
  return parts
}

/** A node of the prose as it was shown last, and what that rested on. */
interface Shown {
  readonly quoted: readonly Quoted[]
  readonly heading: HeadingMark | undefined
  readonly figure: string | undefined
  readonly nodes: readonly RootContent[]
}

const shownBefore = new WeakMap<RootContent, Shown>()

/** What stands in place of a node; the same objects as in the build before where it shows the same. */
function shownAs(
  node: RootContent,
  quoted: readonly Quoted[],
  quotes: Quotes,
  heading: HeadingMark | undefined,
  figure: string | undefined,
): readonly RootContent[] {
  const before = shownBefore.get(node)
  if (before && before.figure === figure && sameMark(before.heading, heading) && sameQuotes(before.quoted, quoted))
    return before.nodes
  const put = withQuotes(node, quotes)
  const numbered = put.type === 'heading' ? withMark(put, heading) : put
  const nodes = withoutActive(withFigure(numbered, figure))
  shownBefore.set(node, { quoted, heading, figure, nodes })
  return nodes
}

const sameMark = (a: HeadingMark | undefined, b: HeadingMark | undefined): boolean =>
  a?.id === b?.id && a?.number === b?.number

const sameQuotes = (a: readonly Quoted[], b: readonly Quoted[]): boolean =>
  a.length === b.length && a.every((quoted, i) => quoted === b[i])

const textsBefore = new WeakMap<RootContent, readonly Text[]>()

const quotesIn = (node: RootContent, quotes: Quotes): readonly Quoted[] =>
  quotes.size === 0 ? [] : textsIn(node).flatMap(text => quotes.get(text) ?? [])

function textsIn(node: RootContent): readonly Text[] {
  if (node.type === 'text') return node.value.includes('{{') ? [node] : []
  if (!('children' in node)) return []
  const texts = textsBefore.get(node) ?? (node.children as readonly RootContent[]).flatMap(textsIn)
  textsBefore.set(node, texts)
  return texts
}
