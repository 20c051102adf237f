/** A place in a source text: offsets in UTF-16 units, or addresses of such, end exclusive. */
export interface Span {
  readonly start: number
  readonly end: number
}

/**
 * A source text and the way from places in it to lines and columns. A place is an offset in the text; where the
 * text is read again and again, it is an address that stays with its stretch of text wherever that moves.
 */
export interface Source {
  readonly path: string
  readonly text: string
  /** Offset of the first character of each line. */
  readonly lineStarts: readonly number[]
  /** Stretches of the text by ascending address; where there are none, addresses are offsets. */
  readonly stretches?: Stretches
}

/** The stretches of a text that is read again and again. */
export interface Stretches {
  readonly all: readonly Stretch[]
  /** The same object for as long as every stretch begins on the line that it began on. */
  readonly onLines: object
}

/** A stretch of text that has kept its address. */
export interface Stretch {
  readonly address: number
  readonly offset: number
}

export function sourceOf(path: string, text: string, stretches?: Stretches): Source {
  const lineStarts = [0]
  for (let i = text.indexOf('\n'); i !== -1; i = text.indexOf('\n', i + 1)) lineStarts.push(i + 1)
  return { path, text, lineStarts, ...(stretches ? { stretches } : {}) }
}

/** Index of the last of some ascending numbers that is not beyond a limit, or 0. */
function lastUpTo(limit: number, count: number, numberAt: (index: number) => number): number {
  let low = 0
  let high = count - 1
  while (low < high) {
    const middle = (low + high + 1) >> 1
    if (numberAt(middle) <= limit) low = middle
    else high = middle - 1
  }
  return low
}

/** Where a place is in the text. */
export function offsetOf({ stretches, text }: Source, place: number): number {
  if (!stretches) return place
  const { all } = stretches
  const stretch = all[lastUpTo(place, all.length, i => all[i]?.address ?? 0)]
  return stretch ? Math.min(text.length, stretch.offset + place - stretch.address) : place
}

/** A place by its offsets in the text. */
export function inText(source: Source, { start, end }: Span): Span {
  const offset = offsetOf(source, start)
  return { start: offset, end: offset + end - start }
}

/** Line of a place, from 1. */
export const lineOf = (source: Source, place: number): number => positionOf(source, place).line

/** Line and column, both from 1. */
export interface Position {
  readonly line: number
  readonly column: number
}

export const positionOf = (source: Source, place: number): Position => positionAt(source, offsetOf(source, place))

/** Line and column of an offset in the text. */
export function positionAt({ lineStarts }: Source, offset: number): Position {
  const line = lastUpTo(offset, lineStarts.length, i => lineStarts[i] ?? 0) + 1
  return { line, column: offset - (lineStarts[line - 1] ?? 0) + 1 }
}

/** Lines of some places, each once, ascending. */
export function linesAt(source: Source, places: readonly number[]): readonly number[] {
  const [first, ...more] = places
  if (first === undefined) return []
  if (more.length === 0) return [lineOf(source, first)]
  return [...new Set(places.map(place => lineOf(source, place)))].sort((a, b) => a - b)
}

/** The text of a line, from 1, without its ending. */
export function lineText({ text, lineStarts }: Source, line: number): string {
  const start = lineStarts[line - 1] ?? text.length
  const next = lineStarts[line]
  return text.slice(start, next === undefined ? text.length : next - 1).replace(/\r$/, '')
}

/** Source lines in words: `line 31`, `lines 31, 44`, `lines 12–15, 20`. Empty when there are none. */
export function linesInWords(lines: readonly number[]): string {
  if (lines.length === 0) return ''
  return `${lines.length === 1 ? 'line' : 'lines'} ${runs(lines).map(runInWords).join(', ')}`
}

/** Consecutive lines gathered into runs of first and last. */
function runs(lines: readonly number[]): readonly (readonly [number, number])[] {
  const out: [number, number][] = []
  for (const line of lines) {
    const last = out.at(-1)
    if (last !== undefined && line === last[1] + 1) last[1] = line
    else out.push([line, line])
  }
  return out
}

const runInWords = ([first, last]: readonly [number, number]): string => {
  if (first === last) return String(first)
  return last === first + 1 ? `${first}, ${last}` : `${first}–${last}`
}
