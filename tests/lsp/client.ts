/** An editor, as far as the protocol goes: the command as a process, driven by a client library. */
import { type ChildProcess, spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import {
  type ClientCapabilities,
  type CompletionItem,
  CompletionRequest,
  createProtocolConnection,
  type Diagnostic,
  DidChangeTextDocumentNotification,
  DidCloseTextDocumentNotification,
  DidOpenTextDocumentNotification,
  ExitNotification,
  type Hover,
  HoverRequest,
  InitializedNotification,
  InitializeRequest,
  type InitializeResult,
  LogMessageNotification,
  type Position,
  type ProtocolConnection,
  PublishDiagnosticsNotification,
  type PublishDiagnosticsParams,
  ShutdownRequest,
  StreamMessageReader,
  StreamMessageWriter,
} from 'vscode-languageserver-protocol/node'
import { TextDocument } from 'vscode-languageserver-textdocument'

export const command = fileURLToPath(new URL('../../dist/platemark.cjs', import.meta.url))

const full: ClientCapabilities = {
  textDocument: {
    hover: { contentFormat: ['markdown', 'plaintext'] },
    publishDiagnostics: { relatedInformation: true },
  },
  workspace: { workspaceEdit: { documentChanges: true } },
}

/** Where the mark ‸ stands in a text, and the text without it. */
export function marked(text: string): { readonly text: string; readonly offset: number } {
  const offset = text.indexOf('‸')
  if (offset === -1) throw new Error('the text has no mark')
  return { text: text.replace('‸', ''), offset }
}

export class Editor {
  readonly connection: ProtocolConnection
  readonly logged: string[] = []
  readonly abilities: InitializeResult
  private readonly process: ChildProcess
  private readonly published: PublishDiagnosticsParams[] = []
  private readonly documents = new Map<string, TextDocument>()
  private waiting: (() => void)[] = []

  private constructor(process: ChildProcess, connection: ProtocolConnection, abilities: InitializeResult) {
    this.process = process
    this.connection = connection
    this.abilities = abilities
    connection.onNotification(PublishDiagnosticsNotification.type, told => {
      this.published.push(told)
      for (const wake of this.waiting.splice(0)) wake()
    })
    connection.onNotification(LogMessageNotification.type, ({ message }) => {
      this.logged.push(message)
    })
  }

  static async start(capabilities: ClientCapabilities = full, args: readonly string[] = ['--stdio']): Promise<Editor> {
    const child = spawn(process.execPath, [command, 'lsp', ...args], { stdio: ['pipe', 'pipe', 'inherit'] })
    const connection = createProtocolConnection(
      new StreamMessageReader(child.stdout),
      new StreamMessageWriter(child.stdin),
    )
    connection.listen()
    const abilities = await connection.sendRequest(InitializeRequest.type, {
      processId: process.pid,
      rootUri: null,
      capabilities,
    })
    const editor = new Editor(child, connection, abilities)
    await connection.sendNotification(InitializedNotification.type, {})
    return editor
  }

  /** @returns the exit code */
  async end(): Promise<number | null> {
    const ended = new Promise<number | null>(done => this.process.once('exit', done))
    await this.connection.sendRequest(ShutdownRequest.type)
    await this.connection.sendNotification(ExitNotification.type)
    const code = await ended
    this.connection.dispose()
    return code
  }

  async open(uri: string, text: string): Promise<TextDocument> {
    const document = TextDocument.create(uri, 'markdown', 1, text)
    this.documents.set(uri, document)
    await this.connection.sendNotification(DidOpenTextDocumentNotification.type, {
      textDocument: { uri, languageId: 'markdown', version: 1, text },
    })
    return document
  }

  /** Types a text in the place of another stretch of the document, as one change. */
  async type(uri: string, start: number, end: number, text: string): Promise<TextDocument> {
    const document = this.text(uri)
    const range = { start: document.positionAt(start), end: document.positionAt(end) }
    const version = document.version + 1
    TextDocument.update(document, [{ range, text }], version)
    await this.connection.sendNotification(DidChangeTextDocumentNotification.type, {
      textDocument: { uri, version },
      contentChanges: [{ range, text }],
    })
    return document
  }

  async close(uri: string): Promise<void> {
    await this.connection.sendNotification(DidCloseTextDocumentNotification.type, { textDocument: { uri } })
  }

  text(uri: string): TextDocument {
    const document = this.documents.get(uri)
    if (!document) throw new Error(`${uri} is not open`)
    return document
  }

  /** The diagnostics of the newest text of a document, or those it has once it is closed, as soon as they have come. */
  async diagnostics(uri: string, of: 'newest' | 'closed' = 'newest'): Promise<Diagnostic[]> {
    const version = of === 'closed' ? undefined : this.text(uri).version
    for (;;) {
      const found = this.published.findLast(told => told.uri === uri && told.version === version)
      if (found) return found.diagnostics
      await new Promise<void>(wake => this.waiting.push(wake))
    }
  }

  /** How often diagnostics of a document came. */
  timesTold(uri: string): number {
    return this.published.filter(told => told.uri === uri).length
  }

  at(uri: string, offset: number): { readonly textDocument: { readonly uri: string }; readonly position: Position } {
    return { textDocument: { uri }, position: this.text(uri).positionAt(offset) }
  }

  async completion(uri: string, offset: number): Promise<CompletionItem[]> {
    const found = await this.connection.sendRequest(CompletionRequest.type, this.at(uri, offset))
    return Array.isArray(found) ? found : (found?.items ?? [])
  }

  async hover(uri: string, offset: number): Promise<string> {
    const found: Hover | null = await this.connection.sendRequest(HoverRequest.type, this.at(uri, offset))
    if (!found) return ''
    return typeof found.contents === 'object' && 'value' in found.contents
      ? found.contents.value
      : String(found.contents)
  }

  /** Opens a text with a mark, asks for completion there, and closes it. */
  async offered(text: string): Promise<CompletionItem[]> {
    const { text: plain, offset } = marked(text)
    const uri = `untitled:${count++}.md`
    await this.open(uri, plain)
    const items = await this.completion(uri, offset)
    await this.close(uri)
    return items
  }

  /** The same for what is told of the place. */
  async told(text: string): Promise<string> {
    const { text: plain, offset } = marked(text)
    const uri = `untitled:${count++}.md`
    await this.open(uri, plain)
    const value = await this.hover(uri, offset)
    await this.close(uri)
    return value
  }
}

let count = 0

/** A small building of two levels, with every block that names others. */
export const building = `---
title: Ferry shed
units: US
---

# Ferry shed

The roof weighs {{roof.W}} and wall {{roof.governing.wall}} governs.

\`\`\`grid
x: A 0 ft, B 24 ft, C 40 ft
y: 1 0 ft, 2 18 ft
\`\`\`

\`\`\`levels
| level | elevation |
|-------|-----------|
| loft  | 11 ft     |
| roof  | 21 ft     |
\`\`\`

\`\`\`areas roof
| area | from | to | load   |
|------|------|----|--------|
| Main | A1   | C2 | q_roof |
\`\`\`

\`\`\`areas loft
| area | from | to | load   |
|------|------|----|--------|
| Loft | A1   | B2 | 60 psf |
\`\`\`

## Walls

\`\`\`construction CMU8
material: concrete masonry
f'm: 2000 psi
t: 7.63 in
ends: cantilever
\`\`\`

\`\`\`walls roof
| wall | from | to         | height | construction |
|------|------|------------|--------|--------------|
| N1   | A2   | B2         | 10 ft  | CMU8         |
| S1   | A1   | B1         | 10 ft  | CMU8         |
| W1   | A1   | A2         | 10 ft  | CMU8         |
| E1   | C1   | C / 14 ft  | 10 ft  | CMU8         |
\`\`\`

\`\`\`walls loft
| wall | from | to | height | construction |
|------|------|----|--------|--------------|
| N1   | A2   | B2 | 11 ft  | CMU8         |
| S1   | A1   | B1 | 11 ft  | CMU8         |
| W1   | A1   | A2 | 11 ft  | CMU8         |
\`\`\`

\`\`\`openings roof
| wall | opening | left | sill | width | height |
|------|---------|------|------|-------|--------|
| N1   | D1      | 3 ft | 0 ft | 3 ft  | 7 ft   |
\`\`\`

\`\`\`forces
| level | x    | y    |
|-------|------|------|
| roof  | V_b  | V_b  |
| loft  | 4 kip | 4 kip |
\`\`\`

\`\`\`equations
q_roof = 20 psf + 22 psf     # deck and finish
V_b = 0.2 * roof.W -> kip
M_N1 = roof.wall.N1.V * (roof.wall.N1.h)
roof.drift.EX <= 1 in        # Drift; house standard 4
\`\`\`

\`\`\`working roof
wall stiffness
walls: N1, S1
\`\`\`

| what   | value              |
|--------|--------------------|
| weight | {{roof.W \\| 1 kip}} |
`
