/** Takes out of the prose what could act on a page; the reader of the source was told. Pictures: see `pictures.ts`. */
import type { PhrasingContent, RootContent } from 'mdast'
import { isSafeLink } from '../read/links.ts'

/** The nodes that may stand in place of one: itself, what it holds, its words, or nothing. */
export function withoutActive(node: RootContent): readonly RootContent[] {
  if (node.type === 'html') return []
  if (node.type === 'definition' && !isSafeLink(node.url)) return []
  if (!('children' in node)) return [node]
  const children = (node.children as RootContent[]).flatMap(withoutActive)
  // A link holds phrasing, and what stands in place of phrasing is phrasing.
  if (node.type === 'link' && !isSafeLink(node.url)) return children as PhrasingContent[]
  // Children are replaced by nodes of the kinds that their parent held before.
  return [{ ...node, children } as RootContent]
}
