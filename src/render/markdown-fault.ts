/** The box at a fault, as a quotation. */
import type { BlockContent, RootContent } from 'mdast'
import type { Diagnostic, Label } from '../base/diagnostic.ts'
import { lineOf, lineText, type Source } from '../base/span.ts'
import type { Fault } from '../explain/sheet.ts'
import { paragraph, strong, text } from './markdown-parts.ts'

export function faultNodes({ diagnostics }: Fault, source: Source): readonly RootContent[] {
  return diagnostics.map(diagnostic => ({ type: 'blockquote', children: diagnosticNodes(diagnostic, source) }))
}

function diagnosticNodes({ rule, severity, message, at, also, help }: Diagnostic, source: Source): BlockContent[] {
  return [
    paragraph(strong(`${severity} (${rule}): ${message}`)),
    ...[at, ...also].map(label => placeNode(label, source)),
    ...(help === '' ? [] : [paragraph(text(help))]),
  ]
}

function placeNode({ span, text: words }: Label, source: Source): BlockContent {
  const line = lineOf(source, span.start)
  const shown = lineText(source, line).trim()
  return paragraph(
    text(`line ${line}`),
    ...(words === '' ? [] : [text(`: ${words}`)]),
    ...(shown === '' ? [] : [text(' '), { type: 'inlineCode' as const, value: shown }]),
  )
}
