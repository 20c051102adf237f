/** A compiled document as files: the page, the expanded Markdown with its figures, the results. */
import type { Root, RootContent } from 'mdast'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkStringify from 'remark-stringify'
import { unified } from 'unified'
import { type Compiled, sheetOf } from './compile.ts'
import type { Figure } from './explain/sheet.ts'
import type { BodyPart } from './render/body.ts'
import { type Page, renderHtml } from './render/html.ts'
import { renderJson } from './render/json.ts'
import { documentNodes, pieceNodes } from './render/markdown.ts'
import { markdownSettings } from './render/math-nodes.ts'
import { type Paper, renderPaper } from './render/paper.ts'
import type { Part } from './render/parts.ts'
import { isDefinition, proseHtml } from './render/prose.ts'
import { unpackShapes } from './render/shape-pack.ts'
import { createShapeCache, type ShapeCache } from './render/typeset.ts'

/** What a document cannot have from its own text. */
export interface Host {
  readonly version: string
  /** A text that was prepared when the program was built, such as a style or a face. */
  readonly asset: (name: string) => string
  /** Hex digits. */
  readonly sha256: (text: string) => string
  /** Shapes of formulas that the build packed; without them each is set when it is first met. */
  readonly shapes?: () => string
}

/** What is written as text, with nothing but the document needed. */
export type TextFormat = 'html' | 'md' | 'json'
export type Format = TextFormat | 'pdf'

export interface OutputFile {
  readonly name: string
  readonly text: string
}

export interface BytesFile {
  readonly name: string
  readonly bytes: Uint8Array
}

/** @param stem name of the document without its ending */
export function publish(
  compiled: Compiled,
  stem: string,
  format: TextFormat,
  draft: boolean,
  host: Host,
): readonly OutputFile[] {
  switch (format) {
    case 'html':
      return [{ name: `${stem}.html`, text: renderHtml(pageOf(compiled, draft, host)) }]
    case 'md':
      return markdown(compiled, stem, draft, host)
    case 'json':
      return [{ name: `${stem}.json`, text: results(compiled, host) }]
  }
}

const caches = new WeakMap<Host, ShapeCache>()

/** Shapes of formulas are the same in every document. */
export function shapesOf(host: Host): ShapeCache {
  const known = caches.get(host) ?? createShapeCache(host.shapes && unpackShapes(host.shapes()))
  caches.set(host, known)
  return known
}

/** The page for paper; a browser is needed to print it. */
export function paperOf(compiled: Compiled, draft: boolean, host: Host): Paper {
  const identity = host.sha256(`${host.version}\n${draft ? 'draft' : 'issue'}\n${compiled.source.text}`)
  return renderPaper(pageOf(compiled, draft, host), identity)
}

function pageOf(compiled: Compiled, draft: boolean, host: Host): Page {
  const { source } = compiled
  const sheet = sheetOf(compiled, host.version, host.sha256(source.text), draft)
  return { sheet, body: bodyOf(compiled), source, asset: host.asset, shapes: shapesOf(host) }
}

function bodyOf({ parts }: Compiled): readonly BodyPart[] {
  const definitions = definitionsIn(parts)
  return parts.flatMap((part, i): readonly BodyPart[] =>
    part.kind === 'pieces' ? part.pieces : [{ kind: 'prose', html: proseHtml(part.nodes, definitions, `note-${i}`) }],
  )
}

const definitionsIn = (parts: readonly Part[]): readonly RootContent[] =>
  parts.flatMap(part => (part.kind === 'prose' ? part.nodes.filter(isDefinition) : []))

const writer = unified()
  .use(remarkStringify, { ...markdownSettings, rule: '-' })
  .use(remarkGfm)
  .use(remarkFrontmatter)

function markdown(compiled: Compiled, stem: string, draft: boolean, host: Host): readonly OutputFile[] {
  const { parts, source } = compiled
  const figures: OutputFile[] = []
  const figureFile = ({ id, svg }: Figure): string => {
    const name = `${stem}.${id.replace(/[^\p{L}\p{N}.-]+/gu, '-')}.svg`
    figures.push({ name, text: `${svg}\n` })
    return encodeURI(name)
  }
  const lift = liftOf(parts)
  const setting = { source, level: 3, figureFile } as const
  const nodes = parts.flatMap((part): readonly RootContent[] =>
    part.kind === 'pieces'
      ? part.pieces.flatMap(piece => pieceNodes(piece, setting))
      : part.nodes.filter(({ type }) => type !== 'yaml').map(node => lowered(node, lift)),
  )
  const sheet = sheetOf(compiled, host.version, host.sha256(source.text), draft)
  const root: Root = { type: 'root', children: [...documentNodes(sheet, nodes)] }
  return [{ name: `${stem}.md`, text: writer.stringify(root) }, ...figures]
}

/** The title is the only heading of the first level; those of the document stand below it. */
function liftOf(parts: readonly Part[]): number {
  const depths = parts.flatMap(part => (part.kind === 'prose' ? part.nodes.flatMap(depthOf) : []))
  return depths.length === 0 ? 0 : 2 - Math.min(...depths)
}

const depthOf = (node: RootContent): readonly number[] => (node.type === 'heading' ? [node.depth] : [])

const depths = [1, 2, 3, 4, 5, 6] as const

const lowered = (node: RootContent, lift: number): RootContent =>
  node.type === 'heading' ? { ...node, depth: depths[Math.min(6, node.depth + lift) - 1] ?? 6 } : node

function results({ source, choices, context, checks, diagnostics }: Compiled, host: Host): string {
  return renderJson({
    version: host.version,
    source,
    sha256: host.sha256(source.text),
    language: choices.language,
    roots: context.roots.values(),
    checks,
    diagnostics,
  })
}
