/** Worked Markdown, read back by readers of Markdown that are not ours. */
import { createHash } from 'node:crypto'
import type { Node, Parents, Root } from 'mdast'
import remarkGfm from 'remark-gfm'
import remarkMath from 'remark-math'
import remarkParse from 'remark-parse'
import remarkStringify from 'remark-stringify'
import { unified } from 'unified'
import { compileText } from '../../src/compile.ts'
import { type OutputFile, publish } from '../../src/publish.ts'
import { asset } from '../render/assets.ts'

const host = { version: '0.0.0', asset, sha256: (text: string) => createHash('sha256').update(text).digest('hex') }

/** The files of a document's worked Markdown, as a draft where it has errors; the Markdown is the first. */
export function workedFiles(text: string, stem = 'calc'): readonly OutputFile[] {
  const compiled = compileText(`${stem}.md`, text)
  const faulty = compiled.diagnostics.some(({ severity }) => severity === 'error')
  return publish(compiled, stem, 'md', faulty, host)
}

export const workedMarkdown = (text: string): string => workedFiles(text)[0]?.text ?? ''

const style = { bullet: '-', rule: '-' } as const
const knowing = unified().use(remarkParse).use(remarkGfm).use(remarkMath).use(remarkStringify, style).freeze()
const plain = unified().use(remarkParse).use(remarkGfm).use(remarkStringify, style).freeze()

/** A reader that knows formulas, and one that does not. */
export const readers = {
  knowing: {
    parse: (text: string): Root => knowing.parse(text),
    write: (tree: Root): string => knowing.stringify(tree),
  },
  plain: { parse: (text: string): Root => plain.parse(text), write: (tree: Root): string => plain.stringify(tree) },
} as const

/** All nodes of some types, in order. */
export function all(node: Node, ...types: readonly string[]): readonly Node[] {
  const inner = 'children' in node ? (node as Parents).children.flatMap(child => all(child, ...types)) : []
  return types.includes(node.type) ? [node, ...inner] : inner
}

export const textOf = (node: Node): string =>
  'value' in node && typeof node.value === 'string'
    ? node.value
    : 'children' in node
      ? (node as Parents).children.map(textOf).join('')
      : ''

/** The tree without places, as something to compare. */
export function bare(node: Node): unknown {
  const { position: _, data: __, ...rest } = node
  return 'children' in node ? { ...rest, children: (node as Parents).children.map(bare) } : rest
}

/** Every formula of a text, as a reader that knows formulas finds them. */
export const formulasIn = (text: string): readonly { readonly tex: string; readonly display: boolean }[] =>
  all(knowing.parse(text), 'math', 'inlineMath').map(node => ({ tex: textOf(node), display: node.type === 'math' }))
