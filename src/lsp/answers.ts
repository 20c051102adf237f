/** What was found, in the forms of the protocol. */
import {
  type CompletionItem,
  CompletionItemKind,
  type DocumentSymbol,
  type FoldingRange,
  type Hover,
  MarkupKind,
  SymbolKind,
  type TextEdit,
  type WorkspaceEdit,
} from 'vscode-languageserver/node'
import type { TextDocument } from 'vscode-languageserver-textdocument'
import type { Span } from '../base/span.ts'
import type { Offer, OfferKind } from './completion.ts'
import type { Told } from './hover.ts'
import type { Entry } from './outline.ts'
import { rangeOf } from './ranges.ts'

export function hoverOf({ span, says, lines }: Told, document: TextDocument, markdown: boolean): Hover {
  const block = lines.join('\n')
  // Longer than any run of grave accents within, so that the text stays as it is.
  const marks = '`'.repeat(Math.max(3, ...[...block.matchAll(/`+/g)].map(([run]) => run.length + 1)))
  const set = markdown && block !== '' ? `${marks}text\n${block}\n${marks}` : block
  return {
    contents: {
      kind: markdown ? MarkupKind.Markdown : MarkupKind.PlainText,
      value: [says, set].filter(text => text !== '').join('\n\n'),
    },
    range: rangeOf(document, span),
  }
}

const itemKinds: Readonly<Record<OfferKind, CompletionItemKind>> = {
  topic: CompletionItemKind.Module,
  field: CompletionItemKind.Property,
  name: CompletionItemKind.Reference,
  value: CompletionItemKind.Value,
  unit: CompletionItemKind.Unit,
  word: CompletionItemKind.EnumMember,
}

export function completionItems(offers: readonly Offer[], document: TextDocument): CompletionItem[] {
  const width = String(offers.length).length
  return offers.map(({ kind, text, detail, replaces }, i) => ({
    label: text.trimEnd(),
    kind: itemKinds[kind],
    detail,
    // The order is ours: what is wanted first stands first.
    sortText: String(i).padStart(width, '0'),
    filterText: text,
    textEdit: { range: rangeOf(document, replaces), newText: text },
  }))
}

/** Edits of one document; for an editor that understands it, of this version of the document and no other. */
export function workspaceEdit({ uri, version }: TextDocument, edits: TextEdit[], versioned: boolean): WorkspaceEdit {
  return versioned ? { documentChanges: [{ textDocument: { uri, version }, edits }] } : { changes: { [uri]: edits } }
}

const symbolKinds: Readonly<Record<Entry['kind'], SymbolKind>> = {
  heading: SymbolKind.String,
  block: SymbolKind.Namespace,
  equation: SymbolKind.Variable,
  row: SymbolKind.Field,
}

export function documentSymbols(entries: readonly Entry[], document: TextDocument): DocumentSymbol[] {
  return entries.map(({ kind, name, detail, span, mark, children }) => ({
    name,
    detail,
    kind: symbolKinds[kind],
    range: rangeOf(document, span),
    selectionRange: rangeOf(document, mark),
    children: documentSymbols(children, document),
  }))
}

export function foldingRanges(spans: readonly Span[], document: TextDocument): FoldingRange[] {
  return spans
    .map(span => {
      const { start, end } = rangeOf(document, span)
      // What ends at the start of a line does not reach into it.
      return { startLine: start.line, endLine: end.character === 0 ? end.line - 1 : end.line }
    })
    .filter(({ startLine, endLine }) => endLine > startLine)
}
