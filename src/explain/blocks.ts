/** Every block and quote of a document, explained: what the page puts in its place. */
import type { Code, Heading, Nodes, RootContent, Text as TextNode } from 'mdast'
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { levelNameOf } from '../model/givens.ts'
import { isLimit } from '../model/limits.ts'
import type { Block } from '../read/block.ts'
import type { Document, QuoteMark } from '../read/document.ts'
import { diagnose } from '../read/text.ts'
import { explainBuilding } from './building.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import { explainGiven } from './given.ts'
import { limitPiece } from './limit.ts'
import { type Numbered, topDepth } from './number.ts'
import { explainQuote } from './quote.ts'
import { explainRegister } from './registers.ts'
import { type DocumentWant, isBuildingWant, isDocumentWant, type Request, readRequest } from './request.ts'
import type { Piece, Quote, Register } from './sheet.ts'
import { explainWant } from './workings.ts'

export interface Explained {
  /** The pieces of every block. */
  readonly worked: ReadonlyMap<Code, readonly Piece[]>
  /** The lists of the whole document that some working asks for. */
  readonly asked: ReadonlySet<DocumentWant>
  /** Ids of all that the pieces show. */
  readonly shown: ReadonlySet<string>
}

/** The pieces of every working and equation block; lists of the whole document come last, since they tell of the rest. */
export function explainBlocks({ blocks }: Document, sheet: Worksheet, context: Context): Explained {
  const worked = new Map<Code, readonly Piece[]>()
  const requests = [...blocks]
    .filter(([, { topic }]) => topic === 'working')
    .map(([node, block]) => [node, block, readRequest(block)] as const)
  for (const [node, block] of blocks) {
    if (block.topic === 'equations') worked.set(node, equationPieces(block, sheet, context))
    else if (block.topic !== 'working') worked.set(node, givenPieces(node, block, sheet, context))
  }
  for (const [node, block, request] of requests) {
    if (!request.ok) worked.set(node, [{ kind: 'fault', diagnostics: request.because }])
    else if (!request.value.wants.some(isDocumentWant))
      worked.set(node, workingPieces(block, request.value, sheet, context))
  }
  for (const [node, block, request] of requests)
    if (request.ok && request.value.wants.some(isDocumentWant))
      worked.set(node, workingPieces(block, request.value, sheet, context))
  const wants = requests.flatMap(([, , request]) => (request.ok ? request.value.wants : []))
  const ids = [...worked.values()].flat().flatMap(piece => ('id' in piece ? [piece.id] : []))
  return { worked, asked: new Set(wants.filter(isDocumentWant)), shown: new Set(ids) }
}

function workingPieces(block: Block, request: Request, sheet: Worksheet, context: Context): readonly Piece[] {
  const names = sheet.levels.map(({ name }) => name)
  const level = sheet.levels.find(({ name }) => name === levelNameOf(block, names))
  return request.wants.flatMap((want): readonly Piece[] => {
    if (isDocumentWant(want)) return explainRegister(want, sheet, context)
    if (isBuildingWant(want) && (level || !block.about))
      return explainBuilding(want, sheet, block.about && level, request, context)
    return level && !isBuildingWant(want)
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
    if (isLimit(line)) return limitPiece(line, sheet, context)
    const value = sheet.equation(line)
    if (!value.ok) return { kind: 'fault', diagnostics: value.because }
    const equation = explainValue(value.value, context)
    // What the engineer says of a line tells more than that they wrote it.
    if (line.comment === '') return equation
    context.cited.add(value.value.id)
    return { ...equation, reference: line.comment }
  })
}

/** A quote with the place it leads to, or the words that stand where it would be. */
export type Quoted = { readonly within: QuoteMark['within'] } & (
  | { readonly quote: Quote; readonly place: string | undefined }
  | { readonly missing: string; readonly faults: readonly Diagnostic[] }
)

/** The quotes of each text of the prose, in order. */
export type Quotes = ReadonlyMap<TextNode, readonly Quoted[]>

/** @param worked what the page shows, where a quote may lead */
export function explainQuotes(
  { quotes }: Document,
  sheet: Worksheet,
  context: Context,
  shown: ReadonlySet<string>,
): Quotes {
  const found = new Map<TextNode, Quoted[]>()
  for (const mark of quotes) {
    const quote = explainQuote(mark, sheet.scope, context)
    const { within, node, id } = mark
    const quoted: Quoted = quote.ok
      ? { within, quote: quote.value, place: context.placeOf(quote.value.id, shown) }
      : { within, missing: `${id.text}: not worked`, faults: quote.because }
    found.set(node, [...(found.get(node) ?? []), quoted])
  }
  return found
}

export const quoteFaults = (quotes: Quotes): readonly Diagnostic[] =>
  [...quotes.values()].flat().flatMap(quoted => ('missing' in quoted ? quoted.faults : []))

export const faultsIn = (pieces: readonly Piece[]): readonly Diagnostic[] =>
  pieces.flatMap(piece => (piece.kind === 'fault' ? piece.diagnostics : []))

/** Blocks stand at the margin: one inside a list or a quotation has no place of its own on the page. */
export function nestedBlocks({ tree, blocks }: Document): readonly Diagnostic[] {
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

/** What was given, and the steps of its cells that work a value from others. */
function givenPieces(node: Code, block: Block, sheet: Worksheet, context: Context): readonly Piece[] {
  const { start, end } = rangeOf(node)
  const steps = sheet.statedCells().filter(({ at }) => at.start >= start && at.start < end)
  const inOrder = [...steps].sort((a, b) => a.at.start - b.at.start)
  return [...explainGiven(block, context), ...inOrder.map(({ value }) => explainValue(value, context))]
}

const rangeOf = (node: RootContent) => ({
  start: node.position?.start.offset ?? 0,
  end: node.position?.end.offset ?? 0,
})

/** Every node of the document as an item to be numbered, each followed by a box where something in it is wrong. */
export function itemsOf(
  document: Document,
  worked: ReadonlyMap<Code, readonly Piece[]>,
  diagnostics: readonly Diagnostic[],
): readonly Numbered<RootContent>[] {
  return document.tree.children.flatMap((node): readonly Numbered<RootContent>[] => {
    const pieces = node.type === 'code' ? worked.get(node) : undefined
    const box = boxFor(node, pieces, diagnostics)
    if (pieces) return [{ kind: 'pieces', pieces: [...pieces, ...box], key: node }]
    const item: Numbered<RootContent> =
      node.type === 'heading'
        ? { kind: 'heading', depth: node.depth, text: headingText(node), key: node }
        : { kind: isFigure(node, document) ? 'picture' : 'other', key: node }
    return box.length === 0 ? [item] : [item, { kind: 'pieces', pieces: box, key: node }]
  })
}

/** What is put at the end: sections like those of the document, or lists alone where it has none. */
export function closingItems(
  closing: readonly Register[],
  items: readonly Numbered<RootContent>[],
): readonly Numbered<RootContent>[] {
  const top = topDepth(items)
  return closing.flatMap((register): readonly Numbered<RootContent>[] => {
    const words = { type: 'text' as const, value: register.title }
    const heading: Heading = { type: 'heading', depth: depths[(top ?? 2) - 1] ?? 2, children: [words] }
    if (top === undefined) return [{ kind: 'pieces', pieces: [register], key: heading }]
    return [
      { kind: 'heading', depth: heading.depth, text: register.title, key: heading },
      { kind: 'pieces', pieces: [{ ...register, title: '' }], key: heading },
    ]
  })
}

const depths = [1, 2, 3, 4, 5, 6] as const

/** A paragraph of one picture that has a title. */
function isFigure(node: RootContent, { pictures }: Document): boolean {
  const [only, ...more] = node.type === 'paragraph' ? node.children : []
  if (only === undefined || more.length > 0) return false
  return (only.type === 'image' || only.type === 'imageReference') && (pictures.get(only)?.title ?? '') !== ''
}

/** A box with the faults of a node that its pieces do not show; warnings stand only beside what was given. */
function boxFor(
  node: RootContent,
  pieces: readonly Piece[] | undefined,
  diagnostics: readonly Diagnostic[],
): readonly Piece[] {
  const { start, end } = rangeOf(node)
  const shown = new Set(faultsIn(pieces ?? []))
  const own = diagnostics.filter(
    fault =>
      fault.at.span.start >= start &&
      fault.at.span.start < end &&
      (pieces !== undefined || fault.severity === 'error') &&
      !shown.has(fault),
  )
  return own.length > 0 ? [{ kind: 'fault', diagnostics: own }] : []
}

const headingText = (node: Heading): string =>
  node.children.map(child => ('value' in child ? child.value : '')).join('')
