/** Streams of events to pages. A page that is slow to take them gets the newest state next, not a queue. */
import type { ServerResponse } from 'node:http'

export interface Stream {
  /** Has the newest sent as soon as the page can take it. */
  readonly stir: () => void
  readonly end: () => void
}

/** Proxies and sleeping machines drop a line on which nothing is heard. */
const HEARTBEAT = 20_000

/**
 * @param newest the next event for this page, or undefined where it has everything; asked for when the page can take it
 * @param gone told when the page has closed the stream
 */
export function openStream(
  response: ServerResponse,
  hello: string,
  newest: () => { readonly id: string; readonly data: string } | undefined,
  gone: () => void,
): Stream {
  response.writeHead(200, { 'content-type': 'text/event-stream; charset=utf-8' })
  response.socket?.setNoDelay(true)
  let full = !response.write(`retry: 500\nevent: hello\ndata: ${hello}\n\n`)
  const stir = (): void => {
    if (full || response.destroyed) return
    const next = newest()
    // JSON holds no bare line break, so that one line carries it.
    if (next) full = !response.write(`id: ${next.id}\ndata: ${next.data}\n\n`)
  }
  const beat = setInterval(() => {
    if (!full) full = !response.write(':\n\n')
  }, HEARTBEAT)
  response.on('drain', () => {
    full = false
    stir()
  })
  response.on('close', () => {
    clearInterval(beat)
    gone()
  })
  stir()
  return { stir, end: () => response.end() }
}
