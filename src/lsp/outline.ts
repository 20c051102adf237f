/** The document as a tree of headings, blocks and what blocks state, and the parts of it that fold. */
import type { Heading, Node } from 'mdast'
import type { Span } from '../base/span.ts'
import { readEquation } from '../model/equations.ts'
import { isLimit } from '../model/limits.ts'
import { within } from './cells.ts'
import type { Fence, Opened } from './opened.ts'
import { spanOf } from './opened.ts'

export interface Entry {
  readonly kind: 'heading' | 'block' | 'equation' | 'row'
  readonly name: string
  readonly detail: string
  readonly span: Span
  /** The part of it to be shown when it is chosen. */
  readonly mark: Span
  readonly children: readonly Entry[]
}

export function outlineOf(document: Opened): readonly Entry[] {
  const headings = document.tree().children.filter(isHeading)
  const given = new Set(document.names().mentions.flatMap(each => (each.given ? [each.span] : [])))
  const blocks = document.fences().map(fence => blockEntry(fence, given))
  const end = document.source.text.length
  const sections = headings.map((heading, i): Section => {
    const next = headings.slice(i + 1).find(({ depth }) => depth <= heading.depth)
    return { heading, span: { start: spanOf(heading).start, end: next ? spanOf(next).start : end } }
  })
  return nested(sections, blocks, document.source.text)
}

interface Section {
  readonly heading: Heading
  readonly span: Span
}

const isHeading = (node: Node): node is Heading => node.type === 'heading'

/** Sections within sections, each with the blocks that stand in it and in none below it. */
function nested(sections: readonly Section[], blocks: readonly Entry[], text: string): readonly Entry[] {
  const out: Entry[] = []
  let i = 0
  const loose = blocks.filter(({ span }) => !sections.some(section => within(section.span, span.start)))
  while (i < sections.length) {
    const section = sections[i]
    if (!section) break
    const inner = sections.slice(i + 1).filter(({ span }) => span.start < section.span.end)
    const mine = blocks.filter(({ span }) => span.start >= section.span.start && span.start < section.span.end)
    const mark = spanOf(section.heading)
    const name = text.slice(mark.start, mark.end).replace(/^#+\s*|\s*#*\s*$|\n[=-]+\s*$/g, '')
    out.push({
      kind: 'heading',
      name: name || '–',
      detail: '',
      span: section.span,
      mark,
      children: nested(inner, mine, text),
    })
    i += 1 + inner.length
  }
  return [...loose, ...out].sort((a, b) => a.span.start - b.span.start)
}

/** @param given places of the names that are given, by which a row is called */
function blockEntry({ block, span }: Fence, given: ReadonlySet<Span>): Entry {
  const { topic, about, info, table } = block
  const rows = (topic === 'working' ? [] : (table?.rows ?? [])).flatMap(({ cells, line }): readonly Entry[] => {
    const own = cells.find(({ span }) => given.has(span))
    return own ? [{ kind: 'row', name: own.text, detail: topic, span: line.span, mark: own.span, children: [] }] : []
  })
  const equations = topic === 'equations' ? block.lines : []
  const lines = equations.flatMap((line): readonly Entry[] => {
    if (isLimit(line))
      return [{ kind: 'equation', name: line.text, detail: 'check', span: line.span, mark: line.span, children: [] }]
    const read = readEquation(line)
    if (!read.ok) return []
    const { name } = read.value
    return [{ kind: 'equation', name: name.text, detail: '', span: line.span, mark: name.span, children: [] }]
  })
  const asked = topic === 'working' ? block.lines.map(({ text }) => text).join(', ') : ''
  return {
    kind: 'block',
    name: about ? `${topic} ${about.text}` : topic,
    detail: asked,
    span,
    mark: info,
    children: [...rows, ...lines],
  }
}

/** What an editor may fold: sections, our blocks, and the front matter. */
export function foldsOf(document: Opened): readonly Span[] {
  const front = document.tree().children.filter(({ type }) => type === 'yaml' || type === 'code')
  const sections = (entries: readonly Entry[]): readonly Span[] =>
    entries.filter(({ kind }) => kind === 'heading').flatMap(({ span, children }) => [span, ...sections(children)])
  return [...front.map(spanOf), ...sections(outlineOf(document))]
}
