/** The difference between two texts as few edits of whole lines, so that marks and cursors elsewhere stay where they are. */
import type { Span } from '../base/span.ts'

export interface Edit {
  readonly span: Span
  readonly text: string
}

/** Edits in the order of the text, none touching another. */
export function lineEdits(before: string, after: string): readonly Edit[] {
  const [old, made] = [linesOf(before), linesOf(after)]
  let head = 0
  while (head < old.length && head < made.length && old[head] === made[head]) head++
  let tail = 0
  while (tail < old.length - head && tail < made.length - head && old.at(-1 - tail) === made.at(-1 - tail)) tail++
  const [from, to] = [old.slice(head, old.length - tail), made.slice(head, made.length - tail)]
  const start = old.slice(0, head).join('').length
  // Where no line came or went, lines that are the same within the stretch are left alone too.
  return from.length === to.length ? lineByLine(from, to, start) : stretch(from, to, start)
}

function lineByLine(from: readonly string[], to: readonly string[], start: number): readonly Edit[] {
  let at = start
  return from.flatMap((line, i) => {
    const span = { start: at, end: at + line.length }
    at = span.end
    return line === to[i] ? [] : [{ span, text: to[i] ?? '' }]
  })
}

const stretch = (from: readonly string[], to: readonly string[], start: number): readonly Edit[] =>
  from.length + to.length === 0 ? [] : [{ span: { start, end: start + from.join('').length }, text: to.join('') }]

/** Lines with their ends. */
const linesOf = (text: string): readonly string[] => text.match(/[^\n]*\n|[^\n]+$/g) ?? []
