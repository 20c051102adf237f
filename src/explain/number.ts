/** Numbers headings, equations, tables and figures, section by section. */
import { linesAt, type Source } from '../base/span.ts'
import type { Heading, Piece } from './sheet.ts'

/** Number and anchor of a heading of the document. */
export interface HeadingMark {
  /** Empty where the heading is the title or brings its own. */
  readonly number: string
  readonly id: string
}

/** A line of the table of contents. */
export interface ContentsEntry {
  readonly id: string
  readonly number: string
  readonly text: string
  /** 0 for a section, 1 for a part of one, and so on. */
  readonly depth: number
}

/** A heading of the engineer's own, or the pieces of one working, in reading order. */
export type Numbered<P> =
  | { readonly kind: 'heading'; readonly depth: number; readonly text: string; readonly key: P }
  | { readonly kind: 'pieces'; readonly pieces: readonly Piece[]; readonly key: P }
  /** A picture of the engineer's own with a title, which is numbered with the figures. */
  | { readonly kind: 'picture'; readonly key: P }
  | { readonly kind: 'other'; readonly key: P }

export interface NumberedDocument<P> {
  readonly items: readonly Numbered<P>[]
  readonly headings: ReadonlyMap<P, HeadingMark>
  /** Numbers of the engineer's own figures. */
  readonly pictures: ReadonlyMap<P, string>
  readonly contents: readonly ContentsEntry[]
}

/**
 * The same items, their pieces numbered within their section and told by lines of the source, and the marks of
 * the headings. Every piece and heading has an anchor that nothing else on the page has. A lone first heading
 * is the title: it has no number, nor has one that brings its own.
 *
 * @param source the text that the pieces' places are in
 */
export function numberItems<P>(items: readonly Numbered<P>[], source: Source): NumberedDocument<P> {
  const anchors = new Map<string, number>()
  /** An id as an anchor; where it stands again it gets a number after it. */
  const anchor = (id: string): string => {
    const times = (anchors.get(id) ?? 0) + 1
    anchors.set(id, times)
    return times === 1 ? id : `${id}-${times}`
  }
  const top = topDepth(items) ?? 6
  const headings = new Map<P, HeadingMark>()
  const pictures = new Map<P, string>()
  const contents: ContentsEntry[] = []
  const counts: number[] = []
  const within = { equation: 0, table: 0, figure: 0 }
  /** The number of the next heading at a depth below the top. */
  const next = (depth: number): string => {
    counts.length = Math.min(counts.length, depth + 1)
    while (counts.length <= depth) counts.push(0)
    counts[depth] = (counts[depth] ?? 0) + 1
    if (depth === 0) Object.assign(within, { equation: 0, table: 0, figure: 0 })
    return counts.join('.')
  }
  let below = 0
  const numberHeading = (piece: Heading): Heading => {
    const [number, id] = [next(below), anchor(slug(piece.text))]
    contents.push({ id, number, text: piece.text, depth: below })
    return { ...piece, id, text: `${number} ${piece.text}` }
  }
  const numberPieces = (pieces: readonly Piece[]): readonly Piece[] => {
    const start: Start = { section: counts[0] ?? 0, ...within, onLines: source.stretches?.onLines }
    const before = numberedBefore.get(pieces)
    if (before && sameStart(before.start, start) && !before.ids.some(id => anchors.has(id))) {
      for (const id of before.ids) anchors.set(id, 1)
      Object.assign(within, before.end)
      return before.pieces
    }
    const made = pieces.map(piece =>
      piece.kind === 'heading' ? numberHeading(piece) : numberPiece(piece, anchor, source, counts[0] ?? 0, within),
    )
    const ids = idsOf(pieces)
    const isPlain = idsOf(made).every((id, i) => id === ids[i]) && !pieces.some(({ kind }) => kind === 'heading')
    if (isPlain) numberedBefore.set(pieces, { start, end: { ...within }, ids, pieces: made })
    return made
  }
  const numbered = items.map((item): Numbered<P> => {
    if (item.kind === 'pieces') {
      const pieces = numberPieces(item.pieces)
      return pieces === item.pieces ? item : { ...item, pieces }
    }
    if (item.kind === 'picture') pictures.set(item.key, numberOf('figure', counts[0] ?? 0, within))
    if (item.kind === 'heading') {
      const id = anchor(slug(item.text))
      const own = /^\d+(?:\.\d+)*\.?(?=\s)/.exec(item.text)?.[0] ?? ''
      const depth = item.depth - top
      if (depth >= 0) below = depth + 1
      const number = depth >= 0 && !/^\d/.test(item.text) ? next(depth) : ''
      headings.set(item.key, { number, id })
      if (depth >= 0) contents.push({ id, number: number || own, text: item.text.slice(own.length).trim(), depth })
    }
    return item
  })
  return { items: numbered, headings, pictures, contents }
}

/** Depth of the headings that begin a section, the lone title set aside; undefined where there are none. */
export function topDepth<P>(items: readonly Numbered<P>[]): number | undefined {
  const depths: number[] = []
  let parted = false
  for (const item of items) {
    if (item.kind === 'heading') depths.push(item.depth)
    else if (item.kind === 'pieces') parted ||= item.pieces.some(({ kind }) => kind === 'heading')
  }
  const sections = loneTitle(depths, parted) ? depths.slice(1) : depths
  return sections.length === 0 ? undefined : Math.min(...sections)
}

/** The address of a heading as repository views make it: `center-of-mass`. */
const slug = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[^\p{L}\p{M}\p{N}\p{Pc} -]/gu, '')
    .trim()
    .replaceAll(' ', '-') || 'section'

/** @param parted true when workings bring headings of their own */
const loneTitle = ([first, ...rest]: readonly number[], parted: boolean): boolean =>
  first !== undefined && (rest.length > 0 || parted) && rest.every(depth => depth > first)

/** All that the numbers of some pieces rest on besides the pieces and their anchors. */
interface Start extends Counts {
  readonly section: number
  readonly onLines: object | undefined
}

const sameStart = (a: Start, b: Start): boolean =>
  a.section === b.section &&
  a.equation === b.equation &&
  a.table === b.table &&
  a.figure === b.figure &&
  a.onLines !== undefined &&
  a.onLines === b.onLines

/** Pieces as they were numbered last, each under its own id. */
interface NumberedPieces {
  readonly start: Start
  readonly end: Counts
  readonly ids: readonly string[]
  readonly pieces: readonly Piece[]
}

const numberedBefore = new WeakMap<readonly Piece[], NumberedPieces>()

const idsOf = (pieces: readonly Piece[]): readonly string[] =>
  pieces.flatMap(piece => ('id' in piece ? [piece.id] : []))

type Counts = { equation: number; table: number; figure: number }

function numberPiece(
  piece: Exclude<Piece, Heading>,
  anchor: (id: string) => string,
  source: Source,
  section: number,
  within: Counts,
): Piece {
  switch (piece.kind) {
    case 'note':
    case 'fault':
      return piece
    case 'register':
      return asBefore(piece, { id: anchor(piece.id) })
    case 'check':
      return asBefore(piece, { id: anchor(piece.id), sourceLines: linesAt(source, piece.sourceLines) })
    case 'figure':
      return asBefore(piece, { id: anchor(piece.id), number: numberOf(piece.kind, section, within) })
    case 'equation':
    case 'table':
      return asBefore(piece, {
        id: anchor(piece.id),
        number: numberOf(piece.kind, section, within),
        sourceLines: linesAt(source, piece.sourceLines),
      })
  }
}

interface Marks {
  readonly id: string
  readonly number?: string
  readonly sourceLines?: readonly number[]
}

/** Each piece as it was numbered last. */
const numbered = new WeakMap<Piece, Piece & Marks>()

/** A piece with its marks; the same object as in the build before where nothing about it has changed. */
function asBefore<T extends Piece & Marks>(piece: T, marks: Marks): Piece {
  const known = numbered.get(piece)
  if (known && known.id === marks.id && known.number === marks.number && sameLines(known, marks)) return known
  const made = { ...piece, ...marks }
  numbered.set(piece, made)
  return made
}

const sameLines = ({ sourceLines: a = [] }: Marks, { sourceLines: b = [] }: Marks): boolean =>
  a.length === b.length && a.every((line, i) => line === b[i])

/** The next number of a kind within its section. */
function numberOf(kind: keyof Counts, section: number, within: Counts): string {
  within[kind]++
  return section === 0 ? String(within[kind]) : `${section}.${within[kind]}`
}
