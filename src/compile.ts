/** The whole pipeline: Markdown in, a calculation out, ready to be set in any format. */
import type { Code, Heading, Nodes, Root, RootContent } from 'mdast'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import type { Diagnostic } from './base/diagnostic.ts'
import { together } from './base/ledger.ts'
import { good } from './base/outcome.ts'
import { sorted } from './base/report.ts'
import { type Source, sourceOf } from './base/span.ts'
import type { LevelWork } from './compute/level.ts'
import { type Worksheet, worksheet } from './compute/worksheet.ts'
import { planView } from './draw/level-plan.ts'
import { drawPlan } from './draw/plan.ts'
import { Context, type Sketch } from './explain/context.ts'
import { explainValue } from './explain/equation.ts'
import { explainGiven } from './explain/given.ts'
import { type Numbered, numberItems } from './explain/number.ts'
import { explainQuote } from './explain/quote.ts'
import { explainRegister } from './explain/registers.ts'
import { isDocumentWant, readRequest } from './explain/request.ts'
import type { Check, Piece, Sheet } from './explain/sheet.ts'
import { explainWant } from './explain/workings.ts'
import { type Choices, readChoices } from './model/front.ts'
import { gather, levelNameOf } from './model/givens.ts'
import type { Block } from './read/block.ts'
import { type Document, readDocument } from './read/document.ts'
import { diagnose } from './read/text.ts'
import type { Quoted, Quotes } from './render/quotes.ts'
import { withNumber, withQuotes } from './render/quotes.ts'

/** A stretch of the document: the engineer's own nodes, or the pieces that a block became. */
export type Part =
  | { readonly kind: 'prose'; readonly nodes: readonly RootContent[] }
  | { readonly kind: 'pieces'; readonly pieces: readonly Piece[] }

export interface Compiled {
  readonly source: Source
  readonly choices: Choices
  readonly parts: readonly Part[]
  readonly context: Context
  readonly checks: readonly Check[]
  /** In the order of the source, each once. */
  readonly diagnostics: readonly Diagnostic[]
}

const processor = unified().use(remarkParse).use(remarkGfm).use(remarkFrontmatter)

export function compileText(path: string, text: string): Compiled {
  return compileTree(processor.parse(text), sourceOf(path, text))
}

export function compileTree(tree: Root, source: Source): Compiled {
  const document = readDocument(tree, source)
  const blocks = [...document.blocks.values()]
  const choices = readChoices(document.front)
  const sheet = worksheet(gather(blocks), choices)
  const context = new Context(choices.language, source, sketchOf(sheet, choices))
  const faults = new Set<Diagnostic>([...document.faults, ...choices.faults, ...sheet.readAll()])
  const worked = workBlocks(document, sheet, context)
  const quotes = workQuotes(document, sheet, context, faults)
  for (const pieces of worked.values()) for (const fault of faultsIn(pieces)) faults.add(fault)
  for (const fault of [...sheet.warnings(), ...nested(document)]) faults.add(fault)
  const diagnostics = sorted(faults)
  const items = tree.children.map(node => itemOf(node, document, worked, context, diagnostics))
  const numbered = numberItems(items)
  return {
    source,
    choices,
    parts: partsOf(numbered.items, numbered.headings, quotes),
    context,
    checks: context.checks,
    diagnostics,
  }
}

/** The pieces of every working and equation block; lists of the whole document come last, since they tell of the rest. */
function workBlocks({ blocks }: Document, sheet: Worksheet, context: Context): ReadonlyMap<Code, readonly Piece[]> {
  const worked = new Map<Code, readonly Piece[]>()
  const requests = [...blocks]
    .filter(([, { topic }]) => topic === 'working')
    .map(([node, block]) => [node, block, readRequest(block)] as const)
  for (const [node, block] of blocks)
    if (block.topic === 'equations') worked.set(node, equationPieces(block, sheet, context))
  for (const [node, block, request] of requests) {
    if (!request.ok) worked.set(node, [{ kind: 'fault', diagnostics: request.because }])
    else if (!request.value.wants.some(isDocumentWant))
      worked.set(node, workingPieces(block, request.value, sheet, context))
  }
  for (const [node, block, request] of requests)
    if (request.ok && request.value.wants.some(isDocumentWant))
      worked.set(node, workingPieces(block, request.value, sheet, context))
  return worked
}

function workingPieces(
  block: Block,
  request: Extract<ReturnType<typeof readRequest>, { ok: true }>['value'],
  sheet: Worksheet,
  context: Context,
): readonly Piece[] {
  const names = sheet.levels.map(({ name }) => name)
  const level = sheet.levels.find(({ name }) => name === levelNameOf(block, names))
  return request.wants.flatMap((want): readonly Piece[] => {
    if (isDocumentWant(want)) return explainRegister(want, sheet.assumptions(), context)
    return level
      ? explainWant(want, level, request, context)
      : [{ kind: 'fault', diagnostics: [noLevel(block, names)] }]
  })
}

const noLevel = (block: Block, names: readonly string[]): Diagnostic =>
  diagnose(
    'error',
    'level-missing',
    block.info,
    'this working does not say which level it is about',
    `Name one of: ${names.join(', ')}.`,
  )

function equationPieces(block: Block, sheet: Worksheet, context: Context): readonly Piece[] {
  return block.lines.map((line): Piece => {
    const value = sheet.equation(line)
    return value.ok ? explainValue(value.value, context) : { kind: 'fault', diagnostics: value.because }
  })
}

function workQuotes({ quotes }: Document, sheet: Worksheet, context: Context, faults: Set<Diagnostic>): Quotes {
  const found = new Map<Quotes extends ReadonlyMap<infer K, unknown> ? K : never, Quoted[]>()
  for (const mark of quotes) {
    const quote = explainQuote(mark, sheet.scope, context)
    if (!quote.ok) for (const fault of quote.because) faults.add(fault)
    const { within, node } = mark
    const quoted: Quoted = quote.ok
      ? { within, quote: quote.value, place: context.placeOf(quote.value.id) }
      : { within, missing: `${mark.id.text}: not worked` }
    found.set(node, [...(found.get(node) ?? []), quoted])
  }
  return found
}

const faultsIn = (pieces: readonly Piece[]): readonly Diagnostic[] =>
  pieces.flatMap(piece => (piece.kind === 'fault' ? piece.diagnostics : []))

/** Blocks stand at the margin: one inside a list or a quotation has no place of its own on the page. */
function nested({ tree, blocks }: Document): readonly Diagnostic[] {
  const atMargin = new Set<Nodes>(tree.children)
  return [...blocks].flatMap(([node, { info, topic }]) =>
    atMargin.has(node)
      ? []
      : [
          diagnose(
            'error',
            'block-nested',
            info,
            `this block ${topic} stands inside a list or a quotation`,
            'Put it at the margin.',
          ),
        ],
  )
}

function itemOf(
  node: RootContent,
  { blocks }: Document,
  worked: ReadonlyMap<Code, readonly Piece[]>,
  context: Context,
  diagnostics: readonly Diagnostic[],
): Numbered<RootContent> {
  if (node.type === 'heading') return { kind: 'heading', depth: node.depth, text: headingText(node), key: node }
  const block = node.type === 'code' ? blocks.get(node) : undefined
  if (node.type !== 'code' || !block) return { kind: 'other', key: node }
  return { kind: 'pieces', pieces: worked.get(node) ?? givenPieces(node, block, context, diagnostics), key: node }
}

/** What was given, and a box where something is wrong with it. */
function givenPieces(node: Code, block: Block, context: Context, diagnostics: readonly Diagnostic[]): readonly Piece[] {
  const [start, end] = [node.position?.start.offset ?? 0, node.position?.end.offset ?? 0]
  const own = diagnostics.filter(({ at }) => at.span.start >= start && at.span.start < end)
  return [...explainGiven(block, context), ...(own.length > 0 ? [{ kind: 'fault', diagnostics: own } as const] : [])]
}

const headingText = (node: Heading): string =>
  node.children.map(child => ('value' in child ? child.value : '')).join('')

function partsOf(
  items: readonly Numbered<RootContent>[],
  headings: ReadonlyMap<RootContent, string>,
  quotes: Quotes,
): readonly Part[] {
  const parts: ({ readonly kind: 'prose'; readonly nodes: RootContent[] } | Extract<Part, { kind: 'pieces' }>)[] = []
  for (const item of items) {
    if (item.kind === 'pieces') {
      parts.push(item)
      continue
    }
    const quoted = withQuotes(item.key, quotes)
    const node = quoted.type === 'heading' ? withNumber(quoted, headings.get(item.key)) : quoted
    const last = parts.at(-1)
    if (last?.kind === 'prose') last.nodes.push(node)
    else parts.push({ kind: 'prose', nodes: [node] })
  }
  return parts
}

/** Draws a level's plan with what of its results can be worked. */
function sketchOf(sheet: Worksheet, { language, system }: Choices): Sketch {
  return (level: LevelWork, caseName) => {
    const parts = together({
      grid: sheet.grid(),
      plan: level.plan(),
      walls: level.givens.walls.length > 0 ? level.walls() : good([]),
    })
    if (!parts.ok) return parts
    const [mass, rigidity] = [level.mass(), level.givens.walls.length > 0 ? level.rigidity() : undefined]
    const forces = level.forces()
    const distribution = forces.ok && forces.value ? level.distribution() : undefined
    const view = planView({
      level: level.name,
      language,
      system,
      ...parts.value,
      ...(mass.ok ? { mass: mass.value } : {}),
      ...(rigidity?.ok ? { rigidity: rigidity.value } : {}),
      ...(distribution?.ok ? { distribution: distribution.value } : {}),
      ...(caseName ? { caseName } : {}),
    })
    return good({ svg: drawPlan(view), alternative: view.description })
  }
}

/** What every page carries around its body. */
export function sheetOf({ choices, diagnostics }: Compiled, version: string, sha256: string, draft: boolean): Sheet {
  const { title, project, number, revision, date, by, checked, standard, language } = choices
  return {
    titleBlock: { title, project, number, revision, date, by, checked, standard },
    language,
    sourceMark: `${sha256.slice(0, 4)} ${sha256.slice(4, 8)}`,
    version,
    faults: diagnostics.filter(({ severity }) => severity === 'error'),
    draft,
  }
}
