/** Numbers headings, equations, tables and figures, section by section. */
import type { Piece } from './sheet.ts'

/** A heading of the engineer's own, or the pieces of one working, in reading order. */
export type Numbered<P> =
  | { readonly kind: 'heading'; readonly depth: number; readonly text: string; readonly key: P }
  | { readonly kind: 'pieces'; readonly pieces: readonly Piece[]; readonly key: P }
  /** A picture of the engineer's own with a title, which is numbered with the figures. */
  | { readonly kind: 'picture'; readonly key: P }
  | { readonly kind: 'other'; readonly key: P }

/**
 * @returns the same items, the pieces numbered within their section, and the number of each heading; a
 *   lone first heading is the title and has none, nor has one that brings its own
 */
export function numberItems<P>(items: readonly Numbered<P>[]): {
  readonly items: readonly Numbered<P>[]
  readonly headings: ReadonlyMap<P, string>
  readonly pictures: ReadonlyMap<P, string>
} {
  const depths = items.flatMap(item => (item.kind === 'heading' ? [item.depth] : []))
  const parted = items.some(item => item.kind === 'pieces' && item.pieces.some(({ kind }) => kind === 'heading'))
  const top = Math.min(...(loneTitle(depths, parted) ? depths.slice(1) : depths), 6)
  const headings = new Map<P, string>()
  const pictures = new Map<P, string>()
  const counts: number[] = []
  const within = { equation: 0, table: 0, figure: 0 }
  /** The number of the next heading at a level below the top. */
  const next = (level: number): string => {
    counts.length = Math.min(counts.length, level + 1)
    while (counts.length <= level) counts.push(0)
    counts[level] = (counts[level] ?? 0) + 1
    if (level === 0) Object.assign(within, { equation: 0, table: 0, figure: 0 })
    return counts.join('.')
  }
  let below = 0
  const numbered = items.map((item): Numbered<P> => {
    if (item.kind === 'pieces')
      return {
        ...item,
        pieces: item.pieces.map(piece =>
          piece.kind === 'heading'
            ? { ...piece, text: `${next(below)} ${piece.text}` }
            : numberPiece(piece, counts[0] ?? 0, within),
        ),
      }
    if (item.kind === 'picture') pictures.set(item.key, numberOf('figure', counts[0] ?? 0, within))
    if (item.kind === 'heading' && item.depth >= top) {
      below = item.depth - top + 1
      if (!/^\d/.test(item.text)) headings.set(item.key, next(item.depth - top))
    }
    return item
  })
  return { items: numbered, headings, pictures }
}

/** @param parted true when workings bring headings of their own */
const loneTitle = ([first, ...rest]: readonly number[], parted: boolean): boolean =>
  first !== undefined && (rest.length > 0 || parted) && rest.every(depth => depth > first)

type Counts = { equation: number; table: number; figure: number }

function numberPiece(piece: Piece, section: number, within: Counts): Piece {
  if (piece.kind !== 'equation' && piece.kind !== 'table' && piece.kind !== 'figure') return piece
  return { ...piece, number: numberOf(piece.kind, section, within) }
}

/** The next number of a kind within its section. */
function numberOf(kind: keyof Counts, section: number, within: Counts): string {
  within[kind]++
  return section === 0 ? String(within[kind]) : `${section}.${within[kind]}`
}
