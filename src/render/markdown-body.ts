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
  const anchors = new Set(parts.flatMap(idsOf))
  let level: Depth = 2
  const ownNode = (node: RootContent): RootContent => {
    const led = ledTo(node, anchors)
    if (led.type !== 'heading') return led
    const depth = depthOf(led.depth + lift)
    level = depthOf(depth + 1)
    return { ...led, depth, children: [...anchor(headingId(led)), ...led.children] }
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

/** Every place of a part that a link may lead to. */
const idsOf = (part: Part): readonly string[] =>
  (part.kind === 'pieces' ? part.pieces.map(idOf) : part.nodes.map(headingId)).filter(id => id !== '')

const idOf = (piece: Piece): string => ('id' in piece ? piece.id : '')

/** The anchor that the numbering gave a heading. */
function headingId(node: RootContent): string {
  const id: unknown = node.type === 'heading' ? node.data?.hProperties?.id : undefined
  return typeof id === 'string' ? id : ''
}

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

/** The node with its links to pieces written as the anchors are. */
function ledTo<T extends RootContent>(node: T, anchors: ReadonlySet<string>): T {
  const place = isLeading(node) ? placeOf(node) : undefined
  const led = place !== undefined && anchors.has(place) ? { ...node, url: `#${anchorId(place)}` } : node
  if (!('children' in led)) return led
  // Each child keeps its type.
  return { ...led, children: led.children.map(child => ledTo(child, anchors)) } as T
}
