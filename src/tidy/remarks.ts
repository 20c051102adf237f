/** Comments behind the lines of a block, those of neighbouring lines below each other. */
import { fillOf, widthOf } from './width.ts'

/** A line of a block, taken apart. */
export type Piece =
  /** It stands as it is. */
  | { readonly kind: 'whole'; readonly text: string }
  /** Something with or without a comment behind it. */
  | { readonly kind: 'line'; readonly text: string; readonly comment: string }
  /** A comment alone; one that is set in goes on with the comment of the line above. */
  | { readonly kind: 'comment'; readonly text: string; readonly setIn: boolean }

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
  let end = from + 1
  const [first] = pieces.slice(from, end)
  if (first && isRemarked(first)) while (end < pieces.length && belongs(pieces[end])) end++
  return pieces.slice(from, end)
}

const isRemarked = (piece: Piece): boolean => piece.kind === 'line' && piece.comment !== ''
const belongs = (piece: Piece | undefined): boolean =>
  piece !== undefined && (isRemarked(piece) || (piece.kind === 'comment' && piece.setIn))

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
