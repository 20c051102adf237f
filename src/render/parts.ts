/** The document as stretches of prose and of pieces, ready for any format. */
import type { RootContent } from 'mdast'
import type { Quotes } from '../explain/blocks.ts'
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
    const quoted = withQuotes(item.key, quotes)
    const numbered = quoted.type === 'heading' ? withMark(quoted, headings.get(item.key)) : quoted
    const nodes = withoutActive(withFigure(numbered, figures.get(item.key)))
    const last = parts.at(-1)
    if (last?.kind === 'prose') last.nodes.push(...nodes)
    else parts.push({ kind: 'prose', nodes: [...nodes] })
  }
  return parts
}
