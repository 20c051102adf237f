/**
 * Markdown to a tree, piece by piece: the reader's time grows faster than its text, and a fence needs
 * no reader at all. The tree is the one that the whole text gives in one go, places and all; a text
 * in which a cut could change it is read whole.
 */
import type { Code, Node, Root, RootContent } from 'mdast'
import type { Extension } from 'micromark-util-types'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { type Processor, unified } from 'unified'
import { type Piece, piecesOf } from './pieces.ts'

export function parseMarkdown(text: string): Root {
  const pieces = piecesOf(text)
  if (pieces === undefined) return whole().parse(text)
  const children: RootContent[] = []
  for (const piece of pieces) for (const child of nodesOf(piece, text, piece.start)) children.push(child)
  const lines = text.split('\n')
  const end = { line: lines.length, column: (lines.at(-1)?.length ?? 0) + 1, offset: text.length }
  return { type: 'root', children, position: { start: { line: 1, column: 1, offset: 0 }, end } }
}

/** @param address place of the piece's beginning, where its nodes are to say that they stand */
export function nodesOf(piece: Piece, text: string, address: number): readonly RootContent[] {
  return piece.kind === 'fence' ? [codeOf(piece, text, address)] : parsePiece(piece, text, address).children
}

// Readers are made when first wanted: few documents want all of them.
const whole = once(() => unified().use(remarkParse).use(remarkGfm).use(remarkFrontmatter).freeze())
const first = once(() =>
  unified().use(remarkParse).use(remarkGfm).use(withoutBareLinks).use(remarkFrontmatter).freeze(),
)
/** Only the start of a document has front matter. */
const later = {
  bareLinks: once(() => unified().use(remarkParse).use(remarkGfm).freeze()),
  plain: once(() => unified().use(remarkParse).use(remarkGfm).use(withoutBareLinks).freeze()),
}

function once<T extends object>(make: () => T): () => T {
  let made: T | undefined
  return () => {
    made ??= make()
    return made
  }
}

/** What an address that is a link without brackets cannot do without, in letters or behind an entity. */
const BARE_LINK = /www|http|@|&/i
/** A link whose address stands in brackets, so plain that it cannot be anything else. */
const PLAIN_LINK = /(?<=^|[\s(])\[([\w ,.'-]+)\]\(https?:\/\/[\w./-]+\)/gm

const mayHoldBareLink = (piece: string): boolean =>
  BARE_LINK.test(piece) &&
  BARE_LINK.test(piece.replace(PLAIN_LINK, (link, label: string) => (BARE_LINK.test(label) ? link : '')))

function parsePiece({ start, end, line }: Piece, text: string, address: number): Root {
  const piece = text.slice(start, end)
  const bareLinks = mayHoldBareLink(piece)
  if (start === 0) return (bareLinks ? whole : first)().parse(piece)
  const tree = (bareLinks ? later.bareLinks : later.plain)().parse(piece)
  shift(tree, line - 1, address)
  return tree
}

/** Leaves out the search for addresses, which stops at every letter of the text. */
function withoutBareLinks(this: Processor): void {
  const data: { micromarkExtensions?: Extension[]; fromMarkdownExtensions?: unknown[] } = this.data()
  const { micromarkExtensions = [], fromMarkdownExtensions = [] } = data
  data.micromarkExtensions = micromarkExtensions.map(({ text = {}, ...rest }) => ({
    ...rest,
    text: Object.fromEntries(
      Object.entries(text).flatMap(([sign, held]) => {
        const kept = [held ?? []].flat().filter(({ name = '' }) => !name.endsWith('Autolink'))
        return kept.length > 0 ? [[sign, kept]] : []
      }),
    ),
  }))
  data.fromMarkdownExtensions = fromMarkdownExtensions.map(extension =>
    [extension].flat(2).filter(each => !handlesBareLinks(each)),
  )
}

function handlesBareLinks(extension: unknown): boolean {
  return typeof extension === 'object' && extension !== null && 'transforms' in extension
}

/** Moves the places of a tree from those of a piece to those of the whole text. */
function shift(tree: Root, lines: number, offset: number): void {
  const waiting: Node[] = [tree]
  for (let node = waiting.pop(); node; node = waiting.pop()) {
    if (node.position)
      for (const point of [node.position.start, node.position.end]) {
        point.line += lines
        if (point.offset !== undefined) point.offset += offset
      }
    // Every parent of an mdast tree holds its children under this name.
    if ('children' in node) for (const child of node.children as readonly Node[]) waiting.push(child)
  }
}

/** A fence at the margin, whose text is taken as it stands. */
function codeOf(
  { start, end, line, lastLine, info, content }: Extract<Piece, { kind: 'fence' }>,
  text: string,
  address: number,
): Code {
  const [, lang = null, meta = null] = /^(\S+)(?:\s+(.*))?$/s.exec(info) ?? []
  const column = end - text.lastIndexOf('\n', end - 1)
  return {
    type: 'code',
    lang,
    meta,
    value: content,
    position: {
      start: { line, column: 1, offset: address },
      end: { line: lastLine, column, offset: address + end - start },
    },
  }
}
