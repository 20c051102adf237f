/** Diagnostics as text: the long form for a reader, the one-line form for lists and editors. */
import type { Diagnostic, Label } from './diagnostic.ts'
import { lineText, offsetOf, positionOf, type Source } from './span.ts'

/** `workshop.md:31:8 error[wall-outside-level] wall W7 …` */
export function oneLine(source: Source, { rule, severity, message, at }: Diagnostic): string {
  const { line, column } = positionOf(source, at.span.start)
  return `${source.path}:${line}:${column} ${severity}[${rule}] ${message}`
}

/** The place, the lines with marks under the cause and the other places, and what to do. */
export function longForm(source: Source, diagnostic: Diagnostic): string {
  const { rule, severity, message, at, also, help } = diagnostic
  const { line, column } = positionOf(source, at.span.start)
  // A long ring has hundreds of other places; the cause is among those shown.
  const marks = [{ ...at, sign: '^' }, ...also.slice(0, 11).map(label => ({ ...label, sign: '-' }))].sort(
    (a, b) => offsetOf(source, a.span.start) - offsetOf(source, b.span.start),
  )
  const marked = source.text === '' ? [] : marks
  const width = Math.max(...marks.map(({ span }) => String(positionOf(source, span.start).line).length)) + 1
  return [
    `${severity}[${rule}]: ${message}`,
    `  ${source.path}:${line}:${column}`,
    ...marked.flatMap(mark => markedLine(source, mark, width)),
    ...help
      .split('\n')
      .filter(sentence => sentence !== '')
      .map(sentence => `  ${sentence}`),
  ].join('\n')
}

const WIDEST = 100

function markedLine(
  source: Source,
  { span, text, sign }: Label & { readonly sign: string },
  width: number,
): readonly string[] {
  const { line, column } = positionOf(source, span.start)
  const whole = lineText(source, line).replaceAll('\t', ' ')
  const from = whole.length > WIDEST ? Math.max(0, column - 1 - WIDEST / 2) : 0
  const shown = whole.slice(from, from + WIDEST)
  const start = column - 1 - from
  const length = Math.max(1, Math.min(span.end - span.start, shown.length - start))
  return [
    `  ${String(line).padStart(width)} | ${shown}`,
    `  ${' '.repeat(width)} | ${' '.repeat(start)}${sign.repeat(length)}${text === '' ? '' : ` ${text}`}`,
  ]
}

/** In the order of the page, each once. */
export function sorted(source: Source, diagnostics: Iterable<Diagnostic>): readonly Diagnostic[] {
  const offset = ({ at }: Diagnostic) => offsetOf(source, at.span.start)
  return [...new Set(diagnostics)].sort(
    (a, b) => offset(a) - offset(b) || (a.rule < b.rule ? -1 : a.rule > b.rule ? 1 : 0),
  )
}
