/** Comments behind the lines of a block, those of neighbouring lines below each other. */
import { fillOf, widthOf } from './width.ts'

/** A line of a block, taken apart. */
export type Piece =
  /** It stands as it is. */
  | { readonly kind: 'whole'; readonly text: string }
  /** Something with or without a comment behind it. */
  | { readonly kind: 'line'; readonly text: string; readonly comment: string }
  /** A comment alone, typed this far from the margin. Right of the line above it goes on with that one's comment. */
  | { readonly kind: 'comment'; readonly text: string; readonly indent: number }

/** Between a line and its comment. */
const GAP = '   '

/** A longer line has its comment right behind it, and moves those of its neighbours nowhere. */
const LONG = 60

/** @returns as many lines as there are pieces */
export function joinedLines(pieces: readonly Piece[]): readonly string[] {
  const lines: string[] = []
  while (lines.length < pieces.length) lines.push(...joinedRun(runFrom(pieces, lines.length)))
  return lines
}

/** Neighbouring lines with comments, or one piece of any other kind. */
function runFrom(pieces: readonly Piece[], from: number): readonly Piece[] {
  let end = from
  let width = Number.POSITIVE_INFINITY
  for (const piece of pieces.slice(from)) {
    if (piece.kind === 'line' && piece.comment !== '') width = widthOf(piece.text)
    else if (piece.kind !== 'comment' || piece.indent < width) break
    end++
  }
  return pieces.slice(from, Math.max(end, from + 1))
}

function joinedRun(run: readonly Piece[]): readonly string[] {
  const widths = run.flatMap(piece => (piece.kind === 'line' ? [widthOf(piece.text)] : []))
  const column = Math.max(0, ...widths.filter(width => width <= LONG))
  // What goes on with a comment stands right below it.
  let indent = ''
  return run.map(piece => {
    if (piece.kind === 'whole') return piece.text
    if (piece.kind === 'comment') return indent + piece.text
    if (piece.comment === '') return piece.text
    const fill = fillOf(piece.text, column) + GAP
    indent = ' '.repeat(widthOf(piece.text)) + fill
    return piece.text + fill + piece.comment
  })
}
