/** Canonical source: what says the same is written the same. */
import { parseMarkdown } from '../read/markdown.ts'
import { isTopic } from '../read/topics.ts'

/** @returns the text without space at the ends of the lines of our fences; tidy text stays as it is */
export function tidy(text: string): string {
  const parts: string[] = []
  let from = 0
  for (const node of parseMarkdown(text).children) {
    if (node.type !== 'code' || !isTopic(node.lang ?? '')) continue
    const [start, end] = [node.position?.start.offset ?? 0, node.position?.end.offset ?? 0]
    parts.push(text.slice(from, start), text.slice(start, end).replace(/[ \t]+(?=\r?\n|$)/g, ''))
    from = end
  }
  return parts.join('') + text.slice(from)
}
