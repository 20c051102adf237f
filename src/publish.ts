/** A compiled document as files: the page, the expanded Markdown with its figures, the results. */
import type { Root, RootContent } from 'mdast'
import { gfmAutolinkLiteralFromMarkdown } from 'mdast-util-gfm-autolink-literal'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkStringify from 'remark-stringify'
import { unified } from 'unified'
import { type Compiled, sheetOf } from './compile.ts'
import type { Figure } from './explain/sheet.ts'
import { traced } from './explain/traced.ts'
import type { Pictures, PlacedPicture } from './read/pictures.ts'
import { besideNames } from './render/beside.ts'
import type { BodyPart } from './render/body.ts'
import { type LivePage, livePage, type Page, renderHtml } from './render/html.ts'
import { marksOf } from './render/html-marks.ts'
import { renderJson } from './render/json.ts'
import { documentNodes } from './render/markdown.ts'
import { bodyNodes, liftOf } from './render/markdown-body.ts'
import { markdownSettings } from './render/math-nodes.ts'
import { type Paper, renderPaper } from './render/paper.ts'
import type { Part } from './render/parts.ts'
import { holdsPicture, onlyPictured, picturesBeside, picturesInPage } from './render/pictures.ts'
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
  /** Empty where the file has `bytes`. */
  readonly text: string
  readonly bytes?: Uint8Array
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

/** The page for a browser that is told of each change. */
export const livePageOf = (compiled: Compiled, draft: boolean, host: Host): LivePage =>
  livePage(pageOf(compiled, draft, host, 'being edited'))

function pageOf(compiled: Compiled, draft: boolean, host: Host, mark = sourceMarkOf(compiled, host)): Page {
  const { source, context } = compiled
  return {
    sheet: sheetOf(compiled, host.version, mark, draft),
    body: bodyOf(compiled),
    source,
    asset: host.asset,
    shapes: shapesOf(host),
    trace: { marks: marksOf(context), traced: () => traced(context) },
  }
}

/** First eight hex digits of the source's SHA-256, grouped in fours. */
function sourceMarkOf({ source }: Compiled, host: Host): string {
  const hash = host.sha256(source.text)
  return `${hash.slice(0, 4)} ${hash.slice(4, 8)}`
}

function bodyOf({ parts, pictures }: Compiled): readonly BodyPart[] {
  const definitions = definitionsIn(parts)
  const body: BodyPart[] = []
  for (const [i, part] of parts.entries()) {
    if (part.kind === 'pieces') body.push(...part.pieces)
    // What leads elsewhere, or holds a picture, tells more than its own nodes do.
    else if (definitions.length > 0 || (pictures.size > 0 && part.nodes.some(holdsPicture)))
      body.push({ kind: 'prose', html: proseHtml(picturesInPage(part.nodes, pictures), definitions, `note-${i}`) })
    else body.push(proseAsBefore(part.nodes, pictures))
  }
  return body
}

/** Each stretch of prose as it was set last, by its first node. */
const setBefore = new WeakMap<RootContent, { readonly nodes: readonly RootContent[]; readonly prose: BodyPart }>()

function proseAsBefore(nodes: readonly RootContent[], pictures: Pictures): BodyPart {
  const [first] = nodes
  const before = first && setBefore.get(first)
  if (before?.nodes.length === nodes.length && nodes.every((node, i) => node === before.nodes[i])) return before.prose
  const prose: BodyPart = { kind: 'prose', html: proseHtml(picturesInPage(nodes, pictures), [], '') }
  if (first) setBefore.set(first, { nodes, prose })
  return prose
}

const definitionsIn = (parts: readonly Part[]): readonly RootContent[] =>
  parts.flatMap(part => (part.kind === 'prose' ? part.nodes.filter(isDefinition) : []))

const writer = unified()
  .use(remarkStringify, { ...markdownSettings, rule: '-' })
  .use(remarkGfm)
  .use(remarkFrontmatter)

function markdown(compiled: Compiled, stem: string, draft: boolean, host: Host): readonly OutputFile[] {
  const { parts, source } = compiled
  const beside: OutputFile[] = []
  const nameOf = besideNames(stem)
  const figureFile = ({ id, svg }: Figure): string => {
    const name = nameOf(id, 'svg')
    beside.push({ name, text: `${svg}\n` })
    return encodeURIComponent(name)
  }
  const copies = new Map<string, string>()
  const pictureFile = ({ path, picture }: PlacedPicture): string => {
    const known = copies.get(path)
    const name = known ?? nameOf(stemOf(path), picture.kind === 'jpeg' ? 'jpg' : picture.kind)
    if (known === undefined) beside.push({ name, text: '', bytes: picture.bytes })
    copies.set(path, name)
    return encodeURIComponent(name)
  }
  const gone = onlyPictured(parts.flatMap(part => (part.kind === 'prose' ? part.nodes : [])))
  const isBody = (node: RootContent) =>
    node.type !== 'yaml' && !(node.type === 'definition' && gone.has(node.identifier))
  const shown = parts.map(
    (part): Part =>
      part.kind === 'prose'
        ? { ...part, nodes: picturesBeside(part.nodes.filter(isBody), compiled.pictures, pictureFile) }
        : part,
  )
  const body = bodyNodes(shown, liftOf(shown), { source, figureFile })
  const sheet = sheetOf(compiled, host.version, sourceMarkOf(compiled, host), draft)
  const root: Root = { type: 'root', children: [...documentNodes(sheet, body)] }
  linkAddresses(root)
  return [{ name: `${stem}.md`, text: writer.stringify(root) }, ...beside]
}

/** An address in our own text is a link to every reader of Markdown, escaped or not; written as one it stays as it is. */
const linkAddresses = (root: Root): void => {
  for (const transform of gfmAutolinkLiteralFromMarkdown().transforms ?? []) transform(root)
}

/** Name of a file without its folders and its ending. */
const stemOf = (path: string): string => path.replace(/^.*[\\/]/s, '').replace(/\.[^.]*$/, '') || 'picture'

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
