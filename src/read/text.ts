import type { Diagnostic, Label, Severity } from '../base/diagnostic.ts'
import type { Span } from '../base/span.ts'

/** A piece of the source and where it stands. */
export interface Text {
  readonly text: string
  readonly span: Span
}

/** A piece without the space around it. */
export function trimmed({ text, span }: Text): Text {
  const lead = text.length - text.trimStart().length
  const inner = text.trim()
  const start = span.start + lead
  return { text: inner, span: { start, end: start + inner.length } }
}

/** Part of a piece, by offsets within it. */
export function part({ text, span }: Text, start: number, end = text.length): Text {
  return { text: text.slice(start, end), span: { start: span.start + start, end: span.start + end } }
}

/** Splits a piece at a mark that stands outside brackets. */
export function splitAt(piece: Text, mark: RegExp): readonly Text[] {
  const parts: Text[] = []
  let depth = 0
  let from = 0
  for (let i = 0; i < piece.text.length; i++) {
    const sign = piece.text[i] ?? ''
    if (sign === '(') depth++
    else if (sign === ')') depth--
    else if (depth === 0 && mark.test(sign)) {
      parts.push(part(piece, from, i))
      from = i + 1
    }
  }
  return [...parts, part(piece, from)].map(trimmed)
}

/** A diagnostic about one piece of the source. */
export function diagnose(
  severity: Severity,
  rule: string,
  at: Span,
  message: string,
  help: string,
  more: { readonly label?: string; readonly also?: readonly Label[] } = {},
): Diagnostic {
  return { rule, severity, message, help, at: { span: at, text: more.label ?? '' }, also: more.also ?? [] }
}
