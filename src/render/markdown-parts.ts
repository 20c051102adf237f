/** Small nodes that the Markdown of every piece is built from. */
import type { BlockContent, Heading, Html, Paragraph, PhrasingContent, Strong, Text } from 'mdast'
import { escapeHtml } from './escape.ts'

/** Text on one line: a break inside it would end the paragraph it stands in. */
export const text = (value: string): Text => ({ type: 'text', value: oneLine(value) })

const oneLine = (value: string): string => value.replace(/[\t\n\r ]+/g, ' ')
export const plain = (value: string): string => oneLine(value).trim()

export const strong = (value: string): Strong => ({ type: 'strong', children: [{ type: 'text', value: plain(value) }] })

export const paragraph = (...children: PhrasingContent[]): Paragraph & BlockContent => ({ type: 'paragraph', children })

export const heading = (value: string, depth: Heading['depth']): Heading => ({
  type: 'heading',
  depth,
  children: [text(plain(value))],
})

/** Markdown has no ids of its own; this is the only HTML that is written. */
export const anchor = (id: string): readonly Html[] =>
  id === '' ? [] : [{ type: 'html', value: `<a id="${escapeHtml(oneLine(id))}"></a>` }]
