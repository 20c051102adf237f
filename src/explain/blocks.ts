/** Every block and quote of a document, explained: what the page puts in its place. */
import type { Code, Heading, Nodes, RootContent, Text as TextNode } from 'mdast'
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Cell, Result, Work } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { Source } from '../base/span.ts'
import { printsAlike, type Value } from '../base/value.ts'
import type { StatedCell, Worksheet } from '../compute/worksheet.ts'
import { levelNameOf } from '../model/givens.ts'
import { isLimit } from '../model/limits.ts'
import { isWord } from '../model/scope.ts'
import type { Block } from '../read/block.ts'
import type { Document, QuoteMark } from '../read/document.ts'
import { diagnose, type Text } from '../read/text.ts'
import { explainBuilding } from './building.ts'
import type { Account, Context } from './context.ts'
import { explainValue, tellValue } from './equation.ts'
import { explainGiven } from './given.ts'
import { limitPiece } from './limit.ts'
import { type Numbered, topDepth } from './number.ts'
import { explainQuote } from './quote.ts'
import { explainRegister } from './registers.ts'
import { type DocumentWant, isBuildingWant, isDocumentWant, type Request, readRequest } from './request.ts'
import type { Equation, Piece, Quote, Register } from './sheet.ts'
import { explainWant } from './workings.ts'

export interface Explained {
  /** The pieces of every block. */
  readonly worked: ReadonlyMap<Code, readonly Piece[]>
  /** The lists of the whole document that some working asks for. */
  readonly asked: ReadonlySet<DocumentWant>
  /** Ids of all that the pieces show. */
  readonly shown: ReadonlySet<string>
}

/**
 * Explains the blocks of a document and keeps each explanation for as long as what it rests on stays the same.
 * One serves all builds of a worksheet.
 */
export interface Explainer {
  /** @param source the text of this build */
  readonly explain: (document: Document, source: Source) => Explained
}

export function explainer(sheet: Worksheet, context: Context): Explainer {
  const { ledger } = context
  const known = new WeakMap<Block, Work<readonly Piece[]>>()
  const stated = new WeakMap<Block, Cell<readonly StatedCell[]>>()
  const kept = (block: Block, explain: () => readonly Piece[]): readonly Piece[] => {
    const work = known.get(block) ?? ledger.once(block.topic, block.info, () => good(explain()))
    known.set(block, work)
    const made = work()
    return made.ok ? made.value : [{ kind: 'fault', diagnostics: made.because }]
  }
  /** The cells of a block that work a value from others, as something that its explanation rests on. */
  const statedIn = (block: Block, now: readonly StatedCell[]): Cell<readonly StatedCell[]> => {
    const cell = stated.get(block) ?? ledger.cell(now, sameCells)
    cell.set(now)
    stated.set(block, cell)
    return cell
  }
  return { explain: (document, source) => explainBlocks(document, sheet, context, source, kept, statedIn) }
}

const sameCells = (a: readonly StatedCell[], b: readonly StatedCell[]): boolean =>
  a.length === b.length && a.every(({ value, at }, i) => value === b[i]?.value && at === b[i]?.at)

/** The pieces of every working and equation block; lists of the whole document come last, since they tell of the rest. */
function explainBlocks(
  { blocks }: Document,
  sheet: Worksheet,
  context: Context,
  source: Source,
  kept: (block: Block, explain: () => readonly Piece[]) => readonly Piece[],
  statedIn: (block: Block, now: readonly StatedCell[]) => Cell<readonly StatedCell[]>,
): Explained {
  const worked = new Map<Code, readonly Piece[]>()
  const requests = [...blocks]
    .filter(([, { topic }]) => topic === 'working')
    .map(([node, block]) => [node, block, requestOf(block)] as const)
  const cells = sheet.statedCells()
  for (const [node, block] of blocks) {
    if (block.topic === 'equations')
      worked.set(
        node,
        kept(block, () => equationPieces(block, sheet, context)),
      )
    else if (block.topic !== 'working') {
      const stated = statedIn(block, cellsWithin(node, cells))
      worked.set(
        node,
        kept(block, () => givenPieces(block, stated.get(), context)),
      )
    }
  }
  for (const [node, block, request] of requests) {
    if (!request.ok) worked.set(node, [{ kind: 'fault', diagnostics: request.because }])
    else if (!request.value.wants.some(isDocumentWant))
      worked.set(
        node,
        kept(block, () => workingPieces(block, request.value, sheet, context)),
      )
  }
  const account = context.account(source, () => [])
  for (const [node, block, request] of requests)
    if (request.ok && request.value.wants.some(isDocumentWant))
      worked.set(node, workingPieces(block, request.value, sheet, context, account))
  const wants = requests.flatMap(([, , request]) => (request.ok ? request.value.wants : []))
  const shown = new Set<string>()
  for (const pieces of worked.values()) for (const piece of pieces) if ('id' in piece) shown.add(piece.id)
  return { worked, asked: new Set(wants.filter(isDocumentWant)), shown }
}

/** A block is read once, however many builds it stands in. */
const requests = new WeakMap<Block, Result<Request>>()

function requestOf(block: Block): Result<Request> {
  const known = requests.get(block) ?? readRequest(block)
  requests.set(block, known)
  return known
}

/** @param account what the document comes to apart from its lists; without it lists are left out */
function workingPieces(
  block: Block,
  request: Request,
  sheet: Worksheet,
  context: Context,
  account?: Account,
): readonly Piece[] {
  const names = sheet.levels.map(({ name }) => name)
  const level = sheet.levels.find(({ name }) => name === levelNameOf(block, names))
  return request.wants.flatMap((want): readonly Piece[] => {
    if (isDocumentWant(want)) return account ? explainRegister(want, sheet, context, account) : []
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
    const equation = equationAsBefore(line, value.value, context)
    // What the engineer says of a line tells more than that they wrote it.
    if (line.comment === '') return equation
    context.cite(value.value.id)
    return { ...equation, reference: line.comment }
  })
}

/** Each line as it was explained last. */
const explainedBefore = new WeakMap<Text, { readonly value: Value; readonly equation: Equation }>()

/** A line explained; the same object as in the build before where every number in it prints the same. */
function equationAsBefore(line: Text, value: Value, context: Context): Equation {
  const before = explainedBefore.get(line)
  if (before && printsAlike(before.value, value)) {
    tellValue(value, context)
    return before.equation
  }
  const equation = explainValue(value, context)
  explainedBefore.set(line, { value, equation })
  return equation
}

/** A quote with the place it leads to, or the words that stand where it would be. */
export type Quoted = FoundQuote | MissingQuote

interface FoundQuote {
  readonly within: QuoteMark['within']
  readonly quote: Quote
  readonly place: string | undefined
}

interface MissingQuote {
  readonly within: QuoteMark['within']
  readonly missing: string
  readonly faults: readonly Diagnostic[]
}

/** The quotes of each text of the prose, in order. */
export type Quotes = ReadonlyMap<TextNode, readonly Quoted[]>

/** @param placeOf where the page shows a value, for a quote to lead there */
export function explainQuotes(
  { quotes }: Document,
  sheet: Worksheet,
  context: Context,
  placeOf: (id: string) => string | undefined,
): Quotes {
  const found = new Map<TextNode, Quoted[]>()
  for (const mark of quotes) {
    const { within, node, id } = mark
    const quote = quoteAsBefore(mark, sheet, context)
    const quoted: Quoted = quote.ok
      ? quotedAsBefore(mark, { within, quote: quote.value, place: placeOf(quote.value.id) })
      : { within, missing: `${id.text}: not worked`, faults: quote.because }
    found.set(node, [...(found.get(node) ?? []), quoted])
  }
  return found
}

/** What each quote told of last. */
const toldBefore = new WeakMap<QuoteMark, { readonly value: Value; readonly quote: Result<Quote> }>()

/** A quote of a value that is the same as in the build before says the same. */
function quoteAsBefore(mark: QuoteMark, { scope }: Worksheet, context: Context): Result<Quote> {
  const found = scope.lookup(mark.id.text)
  const value = found?.ok && !isWord(found.value) ? found.value : undefined
  const before = toldBefore.get(mark)
  if (value && before?.value === value) {
    context.root(value)
    return before.quote
  }
  const quote = explainQuote(mark, scope, context)
  if (value) toldBefore.set(mark, { value, quote })
  return quote
}

/** What each quote said last. */
const saidBefore = new WeakMap<QuoteMark, FoundQuote>()

/** A quote as it is found; the same object as in the build before where it says the same. */
function quotedAsBefore(mark: QuoteMark, found: FoundQuote): FoundQuote {
  const before = saidBefore.get(mark)
  const { quote, place } = found
  if (before?.quote.printed === quote.printed && before.quote.id === quote.id && before.place === place) return before
  saidBefore.set(mark, found)
  return found
}

export const quoteFaults = (quotes: Quotes): readonly Diagnostic[] =>
  [...quotes.values()].flat().flatMap(quoted => ('missing' in quoted ? quoted.faults : []))

export function faultsIn(pieces: readonly Piece[]): readonly Diagnostic[] {
  const faults = pieces.filter(piece => piece.kind === 'fault')
  return faults.flatMap(({ diagnostics }) => diagnostics)
}

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
function givenPieces(block: Block, stated: readonly StatedCell[], context: Context): readonly Piece[] {
  const inOrder = [...stated].sort((a, b) => a.at.start - b.at.start)
  return [...explainGiven(block, context), ...inOrder.map(({ value }) => explainValue(value, context))]
}

function cellsWithin(node: Code, cells: readonly StatedCell[]): readonly StatedCell[] {
  const { start, end } = rangeOf(node)
  return cells.filter(({ at }) => at.start >= start && at.start < end)
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
  const items: Numbered<RootContent>[] = []
  for (const node of document.tree.children) {
    const pieces = node.type === 'code' ? worked.get(node) : undefined
    const box = boxFor(node, pieces, diagnostics)
    if (pieces) {
      items.push({ kind: 'pieces', pieces: box.length === 0 ? pieces : [...pieces, ...box], key: node })
      continue
    }
    if (node.type === 'heading') items.push({ kind: 'heading', depth: node.depth, text: headingText(node), key: node })
    else items.push({ kind: isFigure(node, document) ? 'picture' : 'other', key: node })
    if (box.length > 0) items.push({ kind: 'pieces', pieces: box, key: node })
  }
  return items
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
  if (pictures.size === 0) return false
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
  if (diagnostics.length === 0) return []
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
