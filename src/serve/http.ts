/** The server: what it has built, and nothing else, to pages of its own on this machine. */
import { spawn } from 'node:child_process'
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import { bad, good, type Outcome } from '../base/outcome.ts'
import type { Host } from '../publish.ts'
import { guards, refusal } from './access.ts'
import type { Desk } from './desk.ts'
import type { WatchedDocument } from './document.ts'
import { addressOf, argumentsOf, type Editor } from './editor.ts'
import { tableOf } from './figures.ts'
import type { Opened, Place } from './message.ts'
import { positionFor } from './places.ts'
import { documentPage, listOf, listPage } from './shell.ts'

export interface Serving {
  readonly desk: Desk
  readonly host: Host
  readonly run: string
  readonly token: string
  readonly editor: Editor | undefined
  /** True where several documents may be watched, so that `/` is a list of them. */
  readonly several: boolean
  /** The whole path of a document. */
  readonly pathOf: (document: WatchedDocument) => string
}

export interface Listening {
  readonly port: number
  readonly close: () => Promise<void>
}

/** Listens on this machine only. @param port 0 for any that is free */
export function listen(serving: Serving, port: number): Promise<Outcome<Listening>> {
  let taken = port
  const server = createServer((request, response) => {
    try {
      answer(request, response, serving, taken)
    } catch (error) {
      fail(response, 500, `a fault of its own: ${error instanceof Error ? error.message : String(error)}`)
    }
  })
  return new Promise(done => {
    server.once('error', error => {
      const code = 'code' in error ? error.code : ''
      done(bad(code === 'EADDRINUSE' ? `port ${port} is taken by another program` : `port ${port}: ${error.message}`))
    })
    server.listen(port, '127.0.0.1', () => {
      const address = server.address()
      taken = typeof address === 'object' && address ? address.port : port
      done(good({ port: taken, close: () => closed(server, serving.desk) }))
    })
  })
}

function closed(server: Server, desk: Desk): Promise<void> {
  desk.close()
  return new Promise(done => {
    server.close(() => done())
    server.closeAllConnections()
  })
}

function answer(request: IncomingMessage, response: ServerResponse, serving: Serving, port: number): void {
  for (const [name, value] of Object.entries(guards)) response.setHeader(name, value)
  const refused = refusal(request.method, request.headers, port)
  if (refused) {
    request.resume()
    if (refused.status === 405) response.setHeader('allow', 'GET')
    fail(response, refused.status, refused.because)
    return
  }
  const [path = '', query = ''] = (request.url ?? '').split('?')
  if (request.method === 'POST') take(request, response, path, serving)
  else give(path, new URLSearchParams(query), request, response, serving)
}

function give(
  path: string,
  query: URLSearchParams,
  request: IncomingMessage,
  response: ServerResponse,
  { desk, host, run, several }: Serving,
): void {
  const list = () => listOf(desk.documents)
  const [[key, only] = []] = [...desk.documents]
  switch (path) {
    case '/live.js':
      send(response, 'text/javascript', host.asset('live.js'))
      return
    case '/live.css':
      send(response, 'text/css', host.asset('live.css'))
      return
    case '/events':
      desk.listenAll(response, list)
      return
    case '/':
      if (!several && only) send(response, 'text/html', documentPage(desk.taken(only), run, host, `/d/${key}/`, false))
      else send(response, 'text/html', listPage(list(), only?.state.page().style ?? '', run, host))
      return
  }
  const [document, what] = found(path, desk)
  if (!document) {
    fail(response, 404, 'there is no such page')
    return
  }
  switch (what) {
    case '':
      send(response, 'text/html', documentPage(desk.taken(document), run, host, path, several))
      return
    case 'events': {
      // A browser that connects again says what it was told last; at first the page says what it was built from.
      const last = request.headers['last-event-id']
      desk.listen(document, (typeof last === 'string' ? last : undefined) ?? query.get('at') ?? '', response)
      return
    }
    case 'island':
      send(response, 'application/json', JSON.stringify(document.state.page().island()))
      return
    case 'numbers':
      send(response, 'application/json', JSON.stringify(tableOf(document.state.version, document.state.figures)))
      return
    default:
      fail(response, 404, 'there is no such page')
  }
}

/** The document that an address names, and what of it. The address is compared with known keys and goes no further. */
function found(path: string, { documents }: Desk): readonly [WatchedDocument | undefined, string] {
  const [, key = '', what = ''] = /^\/d\/(\w+)\/(\w*)$/.exec(path) ?? []
  return [documents.get(key), what]
}

/** A request to open a source line is a few words; more than this is something else. */
const LONGEST = 2000

function take(request: IncomingMessage, response: ServerResponse, path: string, serving: Serving): void {
  const [document, what] = found(path, serving.desk)
  if (!document || what !== 'open' || request.headers['x-platemark'] !== serving.token) {
    request.resume()
    fail(response, 403, 'only a page of this server may ask that')
    return
  }
  let text = ''
  request.setEncoding('utf8')
  request.on('data', (part: string) => {
    text += part
    if (text.length > LONGEST) request.destroy()
  })
  request.on('end', () => {
    const place = readPlace(text)
    if (place) open(document, place, response, serving)
    else fail(response, 403, 'this is no place in a document')
  })
}

function readPlace(text: string): Place | undefined {
  try {
    const given: unknown = JSON.parse(text)
    if (typeof given !== 'object' || given === null) return undefined
    const { id, line, block, part } = given as Readonly<Record<string, unknown>>
    const count = (each: unknown) =>
      typeof each === 'number' && Number.isInteger(each) && each >= 0 ? each : undefined
    const [l, b, p] = [count(line), count(block), count(part)]
    return {
      ...(typeof id === 'string' ? { id } : {}),
      ...(l === undefined ? {} : { line: l }),
      ...(b === undefined ? {} : { block: b }),
      ...(p === undefined ? {} : { part: p }),
    }
  } catch {
    return undefined
  }
}

function open(document: WatchedDocument, place: Place, response: ServerResponse, { editor, pathOf }: Serving): void {
  const { compiled } = document
  const position = compiled
    ? positionFor(compiled, place)
    : place.line !== undefined && place.line >= 1
      ? { line: place.line, column: 1 }
      : undefined
  if (!position) {
    fail(response, 404, 'the source of this place is not known')
    return
  }
  const path = pathOf(document)
  const spot = { path, ...position }
  const told = (more: Pick<Opened, 'started' | 'address' | 'because'>): void =>
    send(response, 'application/json', JSON.stringify({ ...spot, path: document.shown, ...more } satisfies Opened))
  if (!editor) told({ started: false })
  else if (editor.kind === 'address') told({ started: false, address: addressOf(editor.template, spot) })
  else start(argumentsOf(editor.words, spot), told)
}

/** Starts a program with its arguments; no shell reads them. */
function start([program = '', ...args]: readonly string[], told: (more: Pick<Opened, 'started' | 'because'>) => void) {
  const child = spawn(program, args, { stdio: 'ignore', detached: true, shell: false })
  child.once('spawn', () => {
    child.unref()
    told({ started: true })
  })
  child.once('error', () => told({ started: false, because: `${program} could not be started` }))
}

function send(response: ServerResponse, type: string, text: string): void {
  response.writeHead(200, { 'content-type': `${type}; charset=utf-8`, 'content-length': Buffer.byteLength(text) })
  response.end(text)
}

function fail(response: ServerResponse, status: number, because: string): void {
  if (response.headersSent) {
    response.destroy()
    return
  }
  response.writeHead(status, { 'content-type': 'text/plain; charset=utf-8' })
  response.end(`${because}\n`)
}
