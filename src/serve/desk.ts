/** The documents that are watched, and the pages that listen to them. */
import type { ServerResponse } from 'node:http'
import type { State, WatchedDocument } from './document.ts'
import { openStream, type Stream } from './events.ts'
import type { Hello, Update } from './message.ts'
import { movesBetween } from './moved.ts'
import { changesBetween } from './patch.ts'

export interface Desk {
  /** By their keys, in the order in which they are listed. */
  readonly documents: ReadonlyMap<string, WatchedDocument>
  readonly add: (key: string, document: WatchedDocument) => void
  /** The present state, which a page is about to be given. */
  readonly taken: (document: WatchedDocument) => State
  /** To be called after each build. */
  readonly stir: (document: WatchedDocument) => void
  /** @param has what the page says that it has, as `run.version` */
  readonly listen: (document: WatchedDocument, has: string, response: ServerResponse) => void
  /** A stream of the list of documents. */
  readonly listenAll: (response: ServerResponse, list: () => string) => void
  readonly close: () => void
}

/** States that a page may come back to; a page that slept for longer is told everything. */
const KEPT = 8

/** @param run tells this run of the server from others @param token see `Hello` */
export function createDesk(run: string, token: string): Desk {
  const documents = new Map<string, WatchedDocument>()
  const kept = new Map<WatchedDocument, State[]>()
  const streams = new Map<WatchedDocument | 'all', Set<Stream>>()
  const between = remembered()
  const hear = (of: WatchedDocument | 'all', open: (gone: () => void) => Stream): void => {
    const all = streams.get(of) ?? new Set<Stream>()
    streams.set(of, all)
    let stream: Stream | undefined
    stream = open(() => {
      if (stream) all.delete(stream)
    })
    all.add(stream)
  }
  const taken = (document: WatchedDocument): State => {
    const { state } = document
    const states = kept.get(document) ?? []
    kept.set(document, states)
    if (!states.includes(state)) states.push(state)
    if (states.length > KEPT) states.shift()
    return state
  }
  return {
    documents,
    add: (key, document) => {
      documents.set(key, document)
    },
    taken,
    stir: document => {
      for (const of of [document, 'all'] as const) for (const stream of streams.get(of) ?? []) stream.stir()
    },
    listen: (document, has, response) => {
      let held = kept.get(document)?.find(({ version }) => `${run}.${version}` === has)
      const { version, report } = document.state
      const hello: Hello = { run, token, version, report }
      const next = () => {
        if (held === document.state) return undefined
        const state = taken(document)
        const data = between(held, state)
        held = state
        return { id: `${run}.${state.version}`, data }
      }
      hear(document, gone => openStream(response, JSON.stringify(hello), next, gone))
    },
    listenAll: (response, list) => {
      let sent = ''
      const next = () => {
        const html = list()
        if (html === sent) return undefined
        sent = html
        return { id: run, data: JSON.stringify(html) }
      }
      hear('all', gone => openStream(response, JSON.stringify({ run, token, version: 0 }), next, gone))
    },
    close: () => {
      for (const all of streams.values()) for (const stream of all) stream.end()
    },
  }
}

/** Pages that have the same state are told the same text, which is made once. */
function remembered(): (from: State | undefined, to: State) => string {
  let last: { readonly from: State | undefined; readonly to: State; readonly text: string } | undefined
  return (from, to) => {
    if (last?.from !== from || last?.to !== to) last = { from, to, text: JSON.stringify(updateBetween(from, to)) }
    return last.text
  }
}

/** @param from what the page has; undefined to tell it everything */
export function updateBetween(from: State | undefined, to: State): Update {
  const { version, report } = to
  const after = to.page()
  const { title, style, paper, around, blocks } = after
  if (!from) return { version, report, title, style, paper, around, whole: blocks }
  const before = from.page()
  const edited = to.edited()
  return {
    version,
    report,
    ...(before.title === title ? {} : { title }),
    ...(before.style === style ? {} : { style }),
    ...(before.paper === paper ? {} : { paper }),
    ...(before.around === around ? {} : { around }),
    changes: changesBetween(before.blocks, blocks),
    moves: movesBetween(from.figures, to.figures),
    ...(edited === undefined ? {} : { edited }),
  }
}
