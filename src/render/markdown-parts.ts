/** Small nodes that the Markdown of every piece is built from. */
import type {
  BlockContent,
  Heading,
  Html,
  Link,
  Paragraph,
  PhrasingContent,
  Strong,
  TableCell,
  TableRow,
  Text,
} from 'mdast'

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

/**
 * The id of a piece in Markdown. Repository views put a prefix before an id and look it up again, which
 * holds for plain signs only: any other goes in by its code, `:5b:`, so that no two ids become one.
 */
export const anchorId = (id: string): string =>
  id.replace(/[^A-Za-z0-9._+-]/gu, sign => `:${(sign.codePointAt(0) ?? 0).toString(16)}:`)

/** Markdown has no ids of its own; this is the only HTML that is written. It stands in a line with other text. */
export const anchor = (id: string): readonly Html[] =>
  id === ''
    ? []
    : [
        { type: 'html', value: `<a id="${anchorId(id)}">` },
        { type: 'html', value: '</a>' },
      ]

export const linkTo = (id: string, words: string): Link => ({
  type: 'link',
  url: `#${anchorId(id)}`,
  children: [text(words)],
})

export const rowOf = (cells: readonly (readonly PhrasingContent[])[]): TableRow => ({
  type: 'tableRow',
  children: cells.map((children): TableCell => ({ type: 'tableCell', children: [...children] })),
})
