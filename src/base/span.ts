/** A place in a source text: offsets in UTF-16 units, end exclusive. */
export interface Span {
  readonly start: number
  readonly end: number
}

/** A source text and the way from its offsets to lines and columns. */
export interface Source {
  readonly path: string
  readonly text: string
  /** Offset of the first character of each line. */
  readonly lineStarts: readonly number[]
}

export function sourceOf(path: string, text: string): Source {
  const lineStarts = [0]
  for (let i = text.indexOf('\n'); i !== -1; i = text.indexOf('\n', i + 1)) lineStarts.push(i + 1)
  return { path, text, lineStarts }
}

/** Line of an offset, from 1. */
export function lineOf({ lineStarts }: Source, offset: number): number {
  let low = 0
  let high = lineStarts.length - 1
  while (low < high) {
    const middle = (low + high + 1) >> 1
    if ((lineStarts[middle] ?? 0) <= offset) low = middle
    else high = middle - 1
  }
  return low + 1
}

/** Line and column of an offset, both from 1. */
export function positionOf(source: Source, offset: number): { readonly line: number; readonly column: number } {
  const line = lineOf(source, offset)
  return { line, column: offset - (source.lineStarts[line - 1] ?? 0) + 1 }
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
