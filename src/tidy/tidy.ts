/**
 * Canonical source. Only blank space, the dashes under the head of a table, and bars and cells that a row leaves
 * out at its end are changed, and only within our own fences at the margin: prose, tables of the prose, front matter
 * and foreign fences keep every byte. Lines map one to one, so that every place keeps its line.
 */
import type { Code, RootContent } from 'mdast'
import { parseMarkdown } from '../read/markdown.ts'
import { piecesOf } from '../read/pieces.ts'
import { part, type Text, trimmed } from '../read/text.ts'
import { isTopic } from '../read/topics.ts'
import { tidyContent } from './fence.ts'

/** @returns the text in canonical form; the same text where there is nothing to do. Tidy text stays as it is. */
export function tidy(text: string): string {
  if (text.startsWith('\ufeff')) return `\ufeff${tidy(text.slice(1))}`
  const parts: string[] = []
  let from = 0
  for (const { start, end } of ourFences(text)) {
    parts.push(text.slice(from, start), tidyFence(text.slice(start, end), start))
    from = end
  }
  return parts.join('') + text.slice(from)
}

interface Fence {
  readonly start: number
  readonly end: number
}

const MARKS = /^(?:`{3,}|~{3,})/
/** An end of line that editors do not agree on. */
const LONE_RETURN = /\r(?!\n)/

/** Prose that cannot hold a fence at the margin is not read. */
function ourFences(text: string): readonly Fence[] {
  const pieces = piecesOf(text) ?? [{ kind: 'text', start: 0, end: text.length }]
  return pieces.flatMap((piece): readonly Fence[] => {
    if (piece.kind === 'fence') return isTopic(/^\S*/.exec(piece.info)?.[0] ?? '') ? [piece] : []
    return /^(?:```|~~~)/m.test(text.slice(piece.start, piece.end)) ? fencesRead(text, piece) : []
  })
}

function fencesRead(text: string, { start: from, end: to }: Fence): readonly Fence[] {
  // Behind an empty line dashes do not open front matter, which only a whole text has.
  const before = from === 0 ? '' : '\n'
  const { children } = parseMarkdown(before + text.slice(from, to))
  return children.filter(isOurs).flatMap(({ position }) => {
    const [start = from, end = from] = [position?.start.offset, position?.end.offset].map(
      (offset = 0) => offset - before.length + from,
    )
    const fence = text.slice(start, end)
    const atMargin = start === 0 || /[\r\n]/.test(text[start - 1] ?? '')
    return atMargin && MARKS.test(fence) && !LONE_RETURN.test(fence) ? [{ start, end }] : []
  })
}

const isOurs = (node: RootContent): node is Code => node.type === 'code' && isTopic(node.lang ?? '')

/** The marks and the words behind them, the lines within, and the marks that close it, where anything does. */
function tidyFence(fence: string, offset: number): string {
  const [opening, ...rest] = placedLines(fence, offset)
  if (!opening) return fence
  const marks = MARKS.exec(opening.text)?.[0] ?? ''
  const info = trimmed(part(opening, marks.length))
  const last = rest.at(-1)
  const closing = last && CLOSING.test(last.text) ? [last] : []
  const content = closing.length === 0 ? rest : rest.slice(0, -1)
  const lines = [
    marks + (info.text.match(/\S+/g) ?? []).join(' '),
    ...tidyContent(info, content),
    ...closing.map(({ text }) => text.trimEnd()),
  ]
  const ends = fence.match(/\r?\n/g) ?? []
  return lines.map((line, i) => line + (ends[i] ?? '')).join('')
}

/** A last line of this form is what closes the fence: within it, it would have closed it before. */
const CLOSING = /^ {0,3}(?:`{3,}|~{3,})[ \t]*$/

/** Lines without their ends. */
function placedLines(text: string, offset: number): readonly Text[] {
  let start = offset
  return text.split('\n').map(raw => {
    const line = raw.replace(/\r$/, '')
    const span = { start, end: start + line.length }
    start += raw.length + 1
    return { text: line, span }
  })
}
