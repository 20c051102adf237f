/** The server over a real socket: whom it answers, and with what. */
import { request } from 'node:http'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { room, until, type Watched, watched } from './watched.ts'

let watch: Watched
let key = ''
beforeAll(async () => {
  watch = await watched(['@/a.md', '@/b.md', '--editor', 'true {path} {line}'], {
    'a.md': room('50 psf'),
    'b.md': room('70 psf'),
    'secret.txt': 'not to be had',
  })
  const { text } = await until(
    () => watch.get(),
    ({ text }) => text.includes('1 of 1 NG'),
  )
  key = /href="\/d\/(\w+)\/"/.exec(text)?.[1] ?? ''
})
afterAll(async () => watch?.end())

const own = () => `127.0.0.1:${watch.port}`

describe('every answer', () => {
  test.each(['/', '/d/KEY/', '/d/KEY/island', '/d/KEY/numbers', '/live.js', '/live.css', '/nothing'])(
    'to %s is guarded',
    async path => {
      const { status, headers } = await watch.get(path.replace('KEY', key))
      expect(status).toBe(path === '/nothing' ? 404 : 200)
      expect(headers).toMatchObject({
        'x-content-type-options': 'nosniff',
        'cross-origin-resource-policy': 'same-origin',
        'referrer-policy': 'no-referrer',
        'cache-control': 'no-store',
      })
      const policy = String(headers['content-security-policy'])
      for (const rule of ["default-src 'none'", "script-src 'self'", "connect-src 'self'", "frame-ancestors 'none'"])
        expect(policy).toContain(rule)
      expect(headers['access-control-allow-origin']).toBeUndefined()
    },
  )

  test('holds no script but the one that it names', async () => {
    const { text } = await watch.get(`/d/${key}/`)
    expect(text.match(/<script[^>]*>/g)).toEqual(['<script src="/live.js" defer>'])
    expect(text).not.toMatch(/ on\w+=/)
  })
})

describe('who is refused', () => {
  test('a foreign host, by which a name could be bent to this machine', async () => {
    for (const path of ['/', `/d/${key}/`, '/live.js', `/d/${key}/events`]) {
      const { status, text } = await watch.get(path, { host: 'evil.example' })
      expect([status, text.includes('kip')]).toEqual([421, false])
    }
  })

  test('a page from elsewhere', async () => {
    for (const origin of ['http://evil.example', 'null', `http://127.0.0.1:${watch.port + 1}`])
      expect((await watch.get('/', { host: own(), origin })).status).toBe(403)
  })

  test.each(['PUT', 'DELETE', 'PATCH', 'OPTIONS', 'HEAD'])('%s, with nothing written', async method => {
    const { status } = await watch.get(`/d/${key}/`, { host: own() }, method, method === 'HEAD' ? '' : 'x')
    expect(status).toBe(405)
    expect(watch.read('a.md')).toBe(room('50 psf'))
  })

  test.each([
    '/../secret.txt',
    '/d/../secret.txt',
    '/d/KEY/../../secret.txt',
    '/d/KEY/secret.txt',
    '/d/KEY/%2e%2e/secret.txt',
    '/%2e%2e%2fsecret.txt',
    '/secret.txt',
    '//secret.txt',
    '/d/KEY/..\\secret.txt',
    '/d/__proto__/',
    '/d/constructor/',
    'http://127.0.0.1/secret.txt',
  ])('a path to another file: %s', async path => {
    const { status, text } = await watch.get(path.replace('KEY', key), { host: own() })
    expect([status, text.includes('not to be had')]).toEqual([404, false])
  })
})

describe('the editor', () => {
  const ask = (headers: Readonly<Record<string, string>>, place: unknown = { line: 3 }, path = `/d/${key}/open`) =>
    watch.get(path, { host: own(), origin: `http://${own()}`, ...headers }, 'POST', JSON.stringify(place))

  test('is started for a page that has the word of this server, at the line of a value', async () => {
    const { token } = await hello()
    const answer = await ask({ 'x-platemark': token }, { id: 'roof.W' })
    expect(answer.status).toBe(200)
    expect(JSON.parse(answer.text)).toMatchObject({ started: true, line: 13, column: expect.any(Number) })
    const prose = await ask({ 'x-platemark': token }, { block: 0, part: 1 })
    expect(JSON.parse(prose.text)).toMatchObject({ line: 8 })
  })

  test('is not started for one that has not, or from elsewhere', async () => {
    const { token } = await hello()
    expect((await ask({})).status).toBe(403)
    expect((await ask({ 'x-platemark': 'a guess' })).status).toBe(403)
    expect((await ask({ 'x-platemark': token, origin: 'http://evil.example' })).status).toBe(403)
    expect((await ask({ 'x-platemark': token }, { line: 3 }, '/d/nothing/open')).status).toBe(403)
    expect((await ask({ 'x-platemark': token }, { line: 3 }, `/d/${key}/numbers`)).status).toBe(403)
  })

  test('is given no place that is none', async () => {
    const { token } = await hello()
    for (const place of [{ line: -1 }, { line: '1; rm' }, { line: 1e9 }, { id: '../../etc' }, 7, null])
      expect((await ask({ 'x-platemark': token }, place)).status).toBeGreaterThanOrEqual(403)
  })
})

describe('the stream of a document', () => {
  test('says nothing to a page that has everything, and everything to one that has not', async () => {
    const { version, run } = await hello()
    const [same] = await events(`/d/${key}/events?at=${run}.${version}`, 300)
    expect(same).toBeUndefined()
    const [whole] = await events(`/d/${key}/events?at=other.1`, 300)
    expect(whole).toMatchObject({ version, report: { state: 'sound', checks: 1, failed: 0 } })
    expect(whole).toHaveProperty('whole')
  })

  test('sends changed blocks alone, and what moved', async () => {
    const { version, run } = await hello()
    const heard = events(`/d/${key}/events?at=${run}.${version}`, 1500)
    await new Promise(done => setTimeout(done, 100))
    watch.put('a.md', room('70 psf'))
    const [update] = await heard
    expect(update).toMatchObject({ version: version + 1, report: { failed: 1 } })
    expect(update).not.toHaveProperty('whole')
    expect(update).not.toHaveProperty('style')
    expect(JSON.stringify(update)).toMatch(/"turn"/)
    expect(JSON.stringify(update)).toMatch(/"id":"roof\.W"[^}]*"was":"5 kip","now":"7 kip"/)
  })
})

/** What the stream says first. */
async function hello(): Promise<{ readonly token: string; readonly run: string; readonly version: number }> {
  const text = await until(
    () => listen(`/d/${key}/events?at=`, 200),
    text => text.includes('event: hello'),
  )
  return JSON.parse(/event: hello\ndata: (.*)/.exec(text)?.[1] ?? '{}')
}

const events = async (path: string, ms: number): Promise<readonly Readonly<Record<string, unknown>>[]> =>
  [...(await listen(path, ms)).matchAll(/^id: .*\ndata: (.*)$/gm)].map(([, data = '{}']) => JSON.parse(data))

/** All that a stream says in a while. */
const listen = (path: string, ms: number): Promise<string> =>
  new Promise((done, failed) => {
    let text = ''
    const sent = request({ host: '127.0.0.1', port: watch.port, path, agent: false }, response => {
      response.setEncoding('utf8')
      response.on('data', part => {
        text += part
      })
    })
    sent.on('error', failed)
    sent.end()
    setTimeout(() => {
      sent.removeAllListeners('error')
      sent.on('error', () => undefined)
      sent.destroy()
      done(text)
    }, ms)
  })
