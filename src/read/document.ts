/**
 * Markdown to prose and blocks with their places. The tree stays as remark made it; blocks and quotes
 * are found in it.
 */
import type { Code, Definition, Html, Link, Node, Root, RootContent, Text as TextNode, Yaml } from 'mdast'
import type { Diagnostic } from '../base/diagnostic.ts'
import { nearNames } from '../base/near.ts'
import { lineOf, lineText, offsetOf, type Source } from '../base/span.ts'
import { type Block, readBlock } from './block.ts'
import { type FrontMatter, noFrontMatter, readFront } from './front.ts'
import { isSafeLink } from './links.ts'
import { type Nearby, nothingNearby } from './nearby.ts'
import { type PictureNode, type Pictures, readPictures } from './pictures.ts'
import { diagnose, type Text } from './text.ts'
import { isTopic, laterTopics, topics } from './topics.ts'

/** A `{{id}}` in prose, or `{{id | unit}}`. */
export interface QuoteMark {
  readonly node: TextNode
  readonly id: Text
  readonly options: Text
  /** Offsets of the whole mark within the text of its node. */
  readonly within: { readonly start: number; readonly end: number }
}

export interface Document {
  readonly source: Source
  readonly tree: Root
  readonly front: FrontMatter
  readonly blocks: ReadonlyMap<Code, Block>
  readonly quotes: readonly QuoteMark[]
  readonly pictures: Pictures
  readonly faults: readonly Diagnostic[]
}

export function readDocument(tree: Root, source: Source, nearby: Nearby = nothingNearby): Document {
  const seen = tree.children.map(node => seenIn(node, source)).filter(each => each !== nothingSeen)
  const links = seen.flatMap(({ links }) => links)
  const shown = seen.flatMap(({ shown }) => shown)
  // What defines nothing but a picture is no link, and the picture tells of it.
  const pictured = new Set(shown.flatMap(node => (node.type === 'imageReference' ? [node.identifier] : [])))
  const isLeftOut = (node: Link | Definition) =>
    !isSafeLink(node.url) && !(node.type === 'definition' && pictured.has(node.identifier))
  const definitions = links.filter(node => node.type === 'definition')
  const { pictures, faults: pictureFaults } = readPictures(shown, definitions, nearby)
  return {
    source,
    tree,
    front: seen.find(({ front }) => front)?.front ?? noFrontMatter,
    blocks: new Map(seen.flatMap(({ blocks }) => blocks)),
    quotes: seen.flatMap(({ quotes }) => quotes),
    pictures,
    faults: [...seen.flatMap(({ faults }) => faults), ...links.filter(isLeftOut).map(linkLeftOut), ...pictureFaults],
  }
}

/** What is found in a part of the document, in reading order. */
interface Seen {
  readonly front: FrontMatter | undefined
  readonly blocks: readonly (readonly [Code, Block])[]
  readonly quotes: readonly QuoteMark[]
  readonly links: readonly (Link | Definition)[]
  readonly shown: readonly PictureNode[]
  readonly faults: readonly Diagnostic[]
}

/** Of a part of plain words, as most are. */
const nothingSeen: Seen = { front: undefined, blocks: [], quotes: [], links: [], shown: [], faults: [] }

/** A part is looked through once, however many builds it stands in. */
const known = new WeakMap<RootContent, Seen>()

function seenIn(node: RootContent, source: Source): Seen {
  const seen = known.get(node) ?? lookThrough(node, source)
  known.set(node, seen)
  return seen
}

function lookThrough(part: RootContent, source: Source): Seen {
  const faults: Diagnostic[] = []
  const blocks: (readonly [Code, Block])[] = []
  const quotes: QuoteMark[] = []
  const links: (Link | Definition)[] = []
  const shown: PictureNode[] = []
  let front: FrontMatter | undefined
  const cut = visit(part, node => {
    if (isYaml(node)) front ??= readFront(yamlText(node))
    else if (isCode(node)) {
      const block = blockOf(node, source, faults)
      if (block) blocks.push([node, block])
    } else if (isHtml(node)) faults.push(...htmlLeftOut(node))
    else if (isLink(node)) links.push(node)
    else if (isPicture(node)) shown.push(node)
    else if (isText(node)) quotes.push(...quotesIn(node, source))
  })
  const isNothing =
    front === undefined && [faults, blocks, quotes, links, shown, cut].every(found => found.length === 0)
  if (isNothing) return nothingSeen
  return { front, blocks, quotes, links, shown, faults: [...faults, ...cut.map(nestedTooDeep)] }
}

const isYaml = (node: Node): node is Yaml => node.type === 'yaml'
const isCode = (node: Node): node is Code => node.type === 'code'
const isHtml = (node: Node): node is Html => node.type === 'html'
const isLink = (node: Node): node is Link | Definition => node.type === 'link' || node.type === 'definition'
const isPicture = (node: Node): node is PictureNode => node.type === 'image' || node.type === 'imageReference'
const isText = (node: Node): node is TextNode => node.type === 'text'

/** Lists and quotations within each other beyond this are no document; the tree is cut there. */
const DEEPEST = 60

/** Sees every node in reading order. @returns the nodes whose contents were cut off */
function visit(part: Node, see: (node: Node) => void): readonly Node[] {
  const waiting: { readonly node: Node; readonly depth: number }[] = [{ node: part, depth: 1 }]
  const cut: Node[] = []
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { node, depth } = next
    see(node)
    if (!('children' in node)) continue
    // Every parent of an mdast tree holds its children under this name.
    const children = node.children as Node[]
    if (depth >= DEEPEST && children.length > 0) {
      cut.push(node)
      children.length = 0
    }
    for (let i = children.length - 1; i >= 0; i--) {
      const child = children[i]
      if (child) waiting.push({ node: child, depth: depth + 1 })
    }
  }
  return cut
}

const nestedTooDeep = (node: Node): Diagnostic =>
  diagnose(
    'error',
    'nested-too-deep',
    { start: startOf(node), end: startOf(node) + 1 },
    `lists and quotations nest deeper than ${DEEPEST}`,
    'What lies deeper is not read. Take it out to the margin.',
  )

const startOf = (node: Node): number => node.position?.start.offset ?? 0
const endOf = (node: Node): number => node.position?.end.offset ?? 0

function yamlText(node: Yaml): Text {
  const start = startOf(node) + 4
  return { text: node.value, span: { start, end: start + node.value.length } }
}

function blockOf(node: Code, source: Source, faults: Diagnostic[]): Block | undefined {
  const word = node.lang ?? ''
  if (!isTopic(word)) {
    const fault = strangeTopic(node, word)
    if (fault) faults.push(fault)
    return undefined
  }
  return readBlock(infoText(node, source), contentLines(node, source))
}

function strangeTopic(node: Code, word: string): Diagnostic | undefined {
  const start = startOf(node)
  const span = { start, end: Math.min(endOf(node), start + 3 + word.length) }
  if (laterTopics.includes(word))
    return diagnose(
      'error',
      'topic-not-worked',
      span,
      `${word} is not worked by this version`,
      'State what follows from it, such as the forces, or leave the block out.',
    )
  const near =
    word.length >= 4 && !/^[A-Z]/.test(word)
      ? nearNames(word, topics).filter(name => Math.abs(name.length - word.length) < 2)
      : []
  if (near.length === 0) return undefined
  return diagnose(
    'warning',
    'topic-near-miss',
    span,
    `a block ${word} is not read`,
    `Did you mean ${near.join(' or ')}?`,
  )
}

/** The fence's first line after its marks, wherever the fence stands. */
function infoText(node: Code, source: Source): Text {
  const start = startOf(node)
  const offset = offsetOf(source, start)
  const line = source.text.slice(offset, lineEnd(source, offset))
  const marks = /^[`~]+\s*/.exec(line)?.[0].length ?? 0
  const text = line.slice(marks).trimEnd()
  return { text, span: { start: start + marks, end: start + marks + text.length } }
}

function lineEnd({ text }: Source, from: number): number {
  const end = text.indexOf('\n', from)
  return end === -1 ? text.length : end
}

/** Each line of the fence with its place, found from the right so that lists and quotations may indent it. */
function contentLines(node: Code, source: Source): readonly Text[] {
  if (node.value === '') return []
  const first = lineOf(source, startOf(node)) + 1
  /** From an offset in the text to the address that it has in this fence. */
  const shift = startOf(node) - offsetOf(source, startOf(node))
  return node.value.split('\n').map((raw, i) => {
    const text = raw.replace(/\r$/, '')
    const line = first + i
    const lineStart = source.lineStarts[line - 1] ?? source.text.length
    const start = shift + lineStart + Math.max(0, lineText(source, line).length - text.length)
    return { text, span: { start, end: start + text.length } }
  })
}

function htmlLeftOut(node: Html): readonly Diagnostic[] {
  if (/^<!--[\s\S]*-->$/.test(node.value.trim())) return []
  const start = startOf(node)
  return [
    diagnose(
      'warning',
      'html-left-out',
      { start, end: Math.min(endOf(node), start + 40) },
      'raw HTML is left out of the page',
      'Write it in Markdown.',
    ),
  ]
}

const linkLeftOut = (node: Link | Definition): Diagnostic =>
  diagnose(
    'warning',
    'link-left-out',
    { start: startOf(node), end: endOf(node) },
    `this link leads to ${node.url.slice(0, 40)}, which a page does not open`,
    'A link leads to http, https, mailto or a place in the document.',
  )

const QUOTE = /\{\{\s*([^{}|]*?)\s*(?:\|\s*([^{}]*?)\s*)?\}\}/g

function quotesIn(node: TextNode, source: Source): readonly QuoteMark[] {
  if (!node.value.includes('{{')) return []
  const shift = startOf(node) - offsetOf(source, startOf(node))
  let from = startOf(node) - shift
  return [...node.value.matchAll(QUOTE)].map(found => {
    const [whole, id = '', options = ''] = found
    const exact = source.text.indexOf(whole, from)
    // In a table a bar is written with a backslash, so that the quote does not read as its source.
    const isExact = exact !== -1 && exact < endOf(node) - shift
    const at = isExact ? exact : Math.max(from, source.text.indexOf('{{', from))
    from = at + 2
    return {
      node,
      id: placed(id, shift + at + whole.indexOf(id)),
      options: placed(options, shift + at + whole.lastIndexOf(options)),
      within: { start: found.index, end: found.index + whole.length },
    }
  })
}

const placed = (text: string, start: number): Text => ({ text, span: { start, end: start + text.length } })
