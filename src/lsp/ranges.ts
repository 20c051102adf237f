/** Offsets to the lines and columns of the protocol. Both count in UTF-16 units. */
import type { Range } from 'vscode-languageserver/node'
import type { TextDocument } from 'vscode-languageserver-textdocument'
import type { Span } from '../base/span.ts'

export const rangeOf = (document: TextDocument, { start, end }: Span): Range => ({
  start: document.positionAt(start),
  end: document.positionAt(end),
})
