/** A watch at work in a folder of its own, for tests: what it says, and what it gives. */
import { createHash } from 'node:crypto'
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { type IncomingHttpHeaders, request } from 'node:http'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import type { Host } from '../../src/publish.ts'
import { readWatch, startWatch, type Watch } from '../../src/serve/command.ts'
import { asset } from '../render/assets.ts'

const host: Host = {
  version: '0.0.0',
  asset,
  sha256: text => createHash('sha256').update(text).digest('hex'),
}

/** A document of one room; its weight is its load times 100 ft². */
export const room = (load: string, more = ''): string => `---
title: Ferry Ticket Office
units: US
---

# Ferry Ticket Office

The roof weighs {{roof.W}}.

\`\`\`areas roof
| area | from       | to           | load    |
|------|------------|--------------|---------|
| Room | 0 ft, 0 ft | 10 ft, 10 ft | ${load} |
\`\`\`

\`\`\`working roof
centre of mass
\`\`\`

\`\`\`equations
limit = 6 kip
roof.W <= limit     # Weight of the roof; house standard
\`\`\`
${more}`

export interface Watched {
  readonly folder: string
  readonly address: string
  readonly port: number
  /** All that has been said so far. */
  readonly said: () => string
  readonly put: (name: string, text: string | Uint8Array) => void
  readonly read: (name: string) => string
  /** The page of the first document, or another address. */
  readonly get: (
    path?: string,
    headers?: Readonly<Record<string, string>>,
    method?: string,
    body?: string,
  ) => Promise<Answer>
  readonly end: () => Promise<void>
}

export interface Answer {
  readonly status: number
  readonly headers: IncomingHttpHeaders
  readonly text: string
}

export const newFolder = (): string => mkdtempSync(join(tmpdir(), 'platemark-watch-'))

/** @param args as on the command line, with `@` for the folder @param files written before it starts */
export async function watched(
  args: readonly string[],
  files: Readonly<Record<string, string | Uint8Array>>,
  folder = newFolder(),
): Promise<Watched> {
  const put = (name: string, text: string | Uint8Array): void => {
    mkdirSync(dirname(join(folder, name)), { recursive: true })
    writeFileSync(join(folder, name), text)
  }
  for (const [name, text] of Object.entries(files)) put(name, text)
  const settings = readWatch(
    args.map(word => word.replace('@', folder)),
    {},
  )
  if (!settings.ok) throw new Error(settings.because)
  let said = ''
  const hear = (text: string) => {
    said += text.replaceAll(folder, '@')
  }
  const started = await startWatch(settings.value, host, folder, { output: hear, errors: hear })
  if (!started.ok) throw new Error(started.because)
  const watch: Watch = started.value
  const port = Number(new URL(watch.address).port)
  return {
    folder,
    address: watch.address,
    port,
    said: () => said,
    put,
    read: name => readFileSync(join(folder, name), 'utf8'),
    get: (path = '/', headers = {}, method = 'GET', body = '') => ask(port, path, headers, method, body),
    end: async () => {
      await watch.end()
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

/** Asks with just these headers, the path as it stands. */
const ask = (
  port: number,
  path: string,
  headers: Readonly<Record<string, string>>,
  method: string,
  body: string,
): Promise<Answer> =>
  new Promise((done, failed) => {
    const sent = request({ host: '127.0.0.1', port, path, headers, method, agent: false }, response => {
      let text = ''
      response.setEncoding('utf8')
      response.on('data', part => {
        text += part
      })
      response.on('end', () => done({ status: response.statusCode ?? 0, headers: response.headers, text }))
    })
    sent.on('error', failed)
    sent.end(body)
  })

/** Waits until something is so; what cannot be got yet is not so yet. @throws with what was there instead when it has not come about in time */
export async function until<T>(get: () => T | Promise<T>, is: (value: T) => boolean, ms = 5000): Promise<T> {
  const ends = performance.now() + ms
  for (;;) {
    let last: unknown
    try {
      const value = await get()
      if (is(value)) return value
      last = value
    } catch (error) {
      last = error
    }
    if (performance.now() > ends)
      throw new Error(`it did not come about; at last there was: ${String(last).slice(-1500)}`)
    await pause(15)
  }
}
export const pause = (ms: number): Promise<void> => new Promise(done => setTimeout(done, ms))
