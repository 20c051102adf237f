/** A document as an editor holds it: one text, read and compiled when something first asks. */
import type { Code, Node, Root, Text as TextNode } from 'mdast'
import { type Source, type Span, sourceOf } from '../base/span.ts'
import type { Compiled } from '../compile.ts'
import type { Rebuilder } from '../live.ts'
import { gather } from '../model/givens.ts'
import type { Block } from '../read/block.ts'
import { type Document, type QuoteMark, readDocument } from '../read/document.ts'
import { parseMarkdown } from '../read/markdown.ts'
import { leftAlone, type Nearby } from '../read/nearby.ts'
import type { Text } from '../read/text.ts'
import { laterTopics, topics } from '../read/topics.ts'
import { type Names, namesIn } from './names.ts'

/** A fence of ours. */
export interface Fence {
  readonly block: Block
  /** From its opening marks to the end of its closing ones. */
  readonly span: Span
}

export interface PlacedQuote {
  readonly id: Text
  /** False where the source is not what the quote reads, as with a sign that stands behind a backslash. */
  readonly sure: boolean
}

export interface Opened {
  readonly source: Source
  readonly tree: () => Root
  readonly fences: () => readonly Fence[]
  readonly quotes: () => readonly PlacedQuote[]
  readonly levels: () => readonly string[]
  readonly names: () => Names
  readonly compiled: () => Compiled
}

export function opened(path: string, text: string, rebuilder: Rebuilder, nearby: Nearby): Opened {
  const source = sourceOf(path, text)
  const document = once((): Document => readDocument(parseMarkdown(text), source, leftAlone))
  const fences = once(() => [...document().blocks].map(([node, block]) => ({ block, span: spanOf(node) })))
  const blocks = once(() => fences().map(({ block }) => block))
  const levels = once(() => gather(blocks()).levels.map(({ name }) => name))
  const quotes = once(() => placedQuotes(document().quotes, source))
  return {
    source,
    tree: () => document().tree,
    fences,
    quotes,
    levels,
    names: once(() => namesIn(blocks(), levels(), quotes())),
    compiled: once(() => rebuilder.compile(text, nearby)),
  }
}

function once<T>(make: () => T): () => T {
  let made: { readonly value: T } | undefined
  return () => {
    made ??= { value: make() }
    return made.value
  }
}

export const spanOf = ({ position }: Node): Span => ({
  start: position?.start.offset ?? 0,
  end: position?.end.offset ?? 0,
})

export const isCode = (node: Node): node is Code => node.type === 'code'

/** The same pattern as the reading of quotes, and the bar as a Markdown table has it. */
const QUOTE = /\{\{([^{}|\\]*)(?:\\?\|[^{}]*)?\}\}/g

/** Quotes by their places in the source, found anew within the place of their node. */
function placedQuotes(marks: readonly QuoteMark[], { text }: Source): readonly PlacedQuote[] {
  const ofNode = new Map<TextNode, QuoteMark[]>()
  for (const mark of marks) ofNode.set(mark.node, [...(ofNode.get(mark.node) ?? []), mark])
  return [...ofNode].flatMap(([node, held]) => {
    const whole = spanOf(node)
    const found = [...text.slice(whole.start, whole.end).matchAll(QUOTE)]
    return held.map(({ id }, i): PlacedQuote => {
      const inside = found[i]?.[1] ?? ''
      const written = inside.trim()
      const at = whole.start + (found[i]?.index ?? 0)
      if (found.length !== held.length || written !== id.text)
        return { id: { text: id.text, span: whole }, sure: false }
      const start = at + 2 + inside.length - inside.trimStart().length
      return { id: { text: written, span: { start, end: start + written.length } }, sure: true }
    })
  })
}

const OURS = new RegExp(
  `^[ \\t>*+\\-\\d.)]*(?:\`{3,}|~{3,})[ \\t]*(?:${[...topics, ...laterTopics].join('|')})\\b`,
  'm',
)

/** True for a text that may hold a fence of ours; other Markdown is none of our business. */
export const mayBeOurs = (text: string): boolean => OURS.test(text)
