/** Answers an editor: what it asks over the protocol, and diagnostics as the text changes. */
import {
  type ClientCapabilities,
  type Connection,
  ErrorCodes,
  type InitializeResult,
  type Location,
  MarkupKind,
  type Position,
  PositionEncodingKind,
  ResponseError,
  TextDocumentSyncKind,
  TextDocuments,
} from 'vscode-languageserver/node'
import { TextDocument } from 'vscode-languageserver-textdocument'
import type { Span } from '../base/span.ts'
import type { Host } from '../publish.ts'
import { tidy } from '../tidy/tidy.ts'
import { completionItems, documentSymbols, foldingRanges, hoverOf, workspaceEdit } from './answers.ts'
import { offersAt } from './completion.ts'
import { definitionAt, usesAt } from './definition.ts'
import { createDesk } from './desk.ts'
import { lineEdits } from './edits.ts'
import { faultsOf, ownFault } from './faults.ts'
import { toldAt } from './hover.ts'
import type { Opened } from './opened.ts'
import { foldsOf, outlineOf } from './outline.ts'
import { rangeOf } from './ranges.ts'
import { rename, renameable } from './rename.ts'

/** What of the client's abilities changes our answers. */
interface Client {
  readonly markdown: boolean
  readonly related: boolean
  readonly versioned: boolean
}

const plainClient: Client = { markdown: false, related: false, versioned: false }

const clientOf = ({ textDocument, workspace }: ClientCapabilities): Client => ({
  markdown: textDocument?.hover?.contentFormat?.includes(MarkupKind.Markdown) ?? false,
  related: textDocument?.publishDiagnostics?.relatedInformation ?? false,
  versioned: workspace?.workspaceEdit?.documentChanges ?? false,
})

/** Wires a connection up. It is not listening yet. */
export function serve(connection: Connection, host: Host): void {
  const documents = new TextDocuments(TextDocument)
  const desk = createDesk(host)
  let client = plainClient

  connection.onInitialize(({ capabilities }) => {
    client = clientOf(capabilities)
    return abilities(host)
  })

  const log = (error: unknown) => connection.console.error(error instanceof Error ? (error.stack ?? '') : String(error))

  /** An answer about a place of an open document; a fault of ours is logged and answered as an error. */
  function about<P extends { readonly textDocument: { readonly uri: string } }, T>(
    answer: (opened: Opened, document: TextDocument, params: P) => T,
  ): (params: P) => T | null {
    return params => {
      const document = documents.get(params.textDocument.uri)
      try {
        const opened = document && desk.read(document)
        return document && opened ? answer(opened, document, params) : null
      } catch (error) {
        if (error instanceof ResponseError) throw error
        log(error)
        throw new ResponseError(ErrorCodes.InternalError, `Platemark has a fault of its own here: ${messageOf(error)}`)
      }
    }
  }

  const places = (document: TextDocument, spans: readonly Span[]): Location[] =>
    spans.map(span => ({ uri: document.uri, range: rangeOf(document, span) }))

  connection.onHover(
    about((opened, document, { position }: At) => {
      const told = toldAt(opened, document.offsetAt(position))
      return told ? hoverOf(told, document, client.markdown) : null
    }),
  )
  connection.onCompletion(
    about((opened, document, { position }: At) =>
      completionItems(offersAt(opened, document.offsetAt(position)), document),
    ),
  )
  connection.onDefinition(
    about((opened, document, { position }: At) => {
      const span = definitionAt(opened, document.offsetAt(position))
      return span ? (places(document, [span])[0] ?? null) : null
    }),
  )
  connection.onReferences(
    about(
      (opened, document, { position, context }: At & { readonly context: { readonly includeDeclaration: boolean } }) =>
        places(document, usesAt(opened, document.offsetAt(position), context.includeDeclaration)),
    ),
  )
  connection.onPrepareRename(
    about((opened, document, { position }: At) => {
      const found = renameable(opened, document.offsetAt(position))
      if (!found.ok) throw new ResponseError(ErrorCodes.InvalidRequest, found.because)
      return { range: rangeOf(document, found.value.span), placeholder: found.value.name }
    }),
  )
  connection.onRenameRequest(
    about((opened, document, { position, newName }: At & { readonly newName: string }) => {
      const spans = rename(opened, document.offsetAt(position), newName, text => desk.tryOut(document, text))
      if (!spans.ok) throw new ResponseError(ErrorCodes.InvalidRequest, spans.because)
      const edits = spans.value.map(span => ({ range: rangeOf(document, span), newText: newName }))
      return workspaceEdit(document, edits, client.versioned)
    }),
  )
  connection.onDocumentSymbol(about((opened, document) => documentSymbols(outlineOf(opened), document)))
  connection.onFoldingRanges(about((opened, document) => foldingRanges(foldsOf(opened), document)))
  connection.onDocumentFormatting(
    about((opened, document) =>
      lineEdits(opened.source.text, tidy(opened.source.text)).map(({ span, text }) => ({
        range: rangeOf(document, span),
        newText: text,
      })),
    ),
  )

  const waiting = new Map<string, NodeJS.Timeout>()
  /** How long the last build took, in ms. */
  let lastBuild = 0

  documents.onDidChangeContent(({ document: { uri } }) => {
    clearTimeout(waiting.get(uri))
    // A build blocks what else is asked, so a text that takes long waits for a longer pause.
    const pause = Math.min(LONGEST_PAUSE, Math.max(SHORTEST_PAUSE, lastBuild))
    waiting.set(
      uri,
      setTimeout(() => publish(uri), pause),
    )
  })

  function publish(uri: string): void {
    waiting.delete(uri)
    const document = documents.get(uri)
    if (!document) return
    const { version } = document
    const from = performance.now()
    const send = (diagnostics: ReturnType<typeof faultsOf>) =>
      connection.sendDiagnostics({ uri, version, diagnostics }).catch(log)
    try {
      send(faultsOf(document, desk.read(document), client.related))
    } catch (error) {
      log(error)
      send([ownFault(document, messageOf(error))])
    }
    lastBuild = performance.now() - from
  }

  documents.onDidClose(({ document }) => {
    clearTimeout(waiting.get(document.uri))
    waiting.delete(document.uri)
    desk.close(document)
    connection.sendDiagnostics({ uri: document.uri, diagnostics: [] }).catch(log)
  })

  documents.listen(connection)
}

interface At {
  readonly textDocument: { readonly uri: string }
  readonly position: Position
}

/** Pauses after the last change before a text is built, in ms. */
const SHORTEST_PAUSE = 60
const LONGEST_PAUSE = 600

const messageOf = (error: unknown): string => (error instanceof Error ? error.message : String(error))

const abilities = ({ version }: Host): InitializeResult => ({
  capabilities: {
    positionEncoding: PositionEncodingKind.UTF16,
    textDocumentSync: TextDocumentSyncKind.Incremental,
    completionProvider: { triggerCharacters: ['`', '{', '|', ':', ' ', '.', ',', '/', '(', '='] },
    hoverProvider: true,
    definitionProvider: true,
    referencesProvider: true,
    renameProvider: { prepareProvider: true },
    documentSymbolProvider: true,
    foldingRangeProvider: true,
    documentFormattingProvider: true,
  },
  serverInfo: { name: 'platemark', version },
})
