/** The body of a document as Markdown: the engineer's own nodes and the pieces between them, with links that meet. */
import type { Definition, Heading, Link, RootContent } from 'mdast'
import type { Piece } from '../explain/sheet.ts'
import { type MarkdownSetting, piecesNodes } from './markdown.ts'
import { anchor, anchorId } from './markdown-parts.ts'
import type { Part } from './parts.ts'

const depths = [1, 2, 3, 4, 5, 6] as const
type Depth = Heading['depth']
const depthOf = (depth: number): Depth => depths[Math.max(1, Math.min(6, depth)) - 1] ?? 6

/** @param lift is added to the depth of the document's own headings */
export function bodyNodes(
  parts: readonly Part[],
  lift: number,
  setting: Omit<MarkdownSetting, 'level'>,
): readonly RootContent[] {
  const anchors = new Set(parts.flatMap(part => (part.kind === 'pieces' ? part.pieces.flatMap(idOf) : [])))
  const wanted = new Set(parts.flatMap(part => (part.kind === 'prose' ? part.nodes.flatMap(placesIn) : [])))
  const named = new Set<string>()
  let level: Depth = 2
  const ownNode = (node: RootContent): RootContent => {
    const led = ledTo(node, anchors)
    if (led.type !== 'heading') return led
    const depth = depthOf(led.depth + lift)
    level = depthOf(depth + 1)
    const slug = slugOf(led)
    const isNew = wanted.has(slug) && !anchors.has(slug) && !named.has(slug)
    if (isNew) named.add(slug)
    return { ...led, depth, children: isNew ? [...anchor(slug), ...led.children] : led.children }
  }
  return parts.flatMap((part): readonly RootContent[] =>
    part.kind === 'prose' ? part.nodes.map(ownNode) : piecesNodes(part.pieces, { ...setting, level }),
  )
}

/** The title is the only heading of the first level; those of the document stand below it. */
export function liftOf(parts: readonly Part[]): number {
  const own = parts.flatMap(part => (part.kind === 'prose' ? part.nodes : []))
  const found = own.flatMap(node => (node.type === 'heading' ? [node.depth] : []))
  return found.length === 0 ? 0 : 2 - Math.min(...found)
}

const idOf = (piece: Piece): readonly string[] => ('id' in piece && piece.id !== '' ? [piece.id] : [])

type Leading = Link | Definition
const isLeading = (node: RootContent): node is Leading => node.type === 'link' || node.type === 'definition'

/** The place in the document that a link leads to, by the id that it has there. */
const placeOf = ({ url }: Leading): string | undefined => (url.startsWith('#') ? decoded(url.slice(1)) : undefined)

function decoded(fragment: string): string {
  try {
    return decodeURIComponent(fragment)
  } catch {
    return fragment
  }
}

/** Every place in the document that a node has a link to. */
function placesIn(node: RootContent): readonly string[] {
  const place = isLeading(node) ? placeOf(node) : undefined
  const inner = 'children' in node ? node.children.flatMap(placesIn) : []
  return place === undefined ? inner : [place, ...inner]
}

/** The node with its links to pieces written as the anchors are. */
function ledTo<T extends RootContent>(node: T, anchors: ReadonlySet<string>): T {
  const place = isLeading(node) ? placeOf(node) : undefined
  const led = place !== undefined && anchors.has(place) ? { ...node, url: `#${anchorId(place)}` } : node
  if (!('children' in led)) return led
  // Each child keeps its type.
  return { ...led, children: led.children.map(child => ledTo(child, anchors)) } as T
}

/** What repository views make of a heading for its address, without the number that we put before it. */
const slugOf = (heading: Heading): string =>
  wordsOf(heading)
    .replace(/^\d+(?:\.\d+)* /, '')
    .toLowerCase()
    .replace(/[^\p{L}\p{M}\p{N}\p{Pc} -]/gu, '')
    .replaceAll(' ', '-')

const wordsOf = (node: RootContent): string =>
  'children' in node ? node.children.map(wordsOf).join('') : 'value' in node ? node.value : ''
