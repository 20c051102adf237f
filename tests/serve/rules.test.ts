/** Who may ask the server, what an editor is started with, and where results may be written. */
import { mkdirSync, mkdtempSync, rmSync, symlinkSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { refusal } from '../../src/serve/access.ts'
import { readWatch } from '../../src/serve/command.ts'
import { addressOf, argumentsOf, readEditor } from '../../src/serve/editor.ts'
import { insideOf } from '../../src/serve/outputs.ts'
import { isHidden } from '../../src/serve/watching.ts'

const folder = mkdtempSync(join(tmpdir(), 'platemark-rules-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

describe('who may ask', () => {
  const status = (method: string, headers: Readonly<Record<string, string>>) => refusal(method, headers, 4000)?.status
  test.each(['127.0.0.1:4000', 'localhost:4000', 'LOCALHOST:4000', '[::1]:4000'])('a page at %s', host => {
    expect(status('GET', { host })).toBeUndefined()
    expect(status('POST', { host, origin: `http://${host}` })).toBeUndefined()
  })
  test.each([
    'evil.example',
    'evil.example:4000',
    '127.0.0.1',
    '127.0.0.1:4001',
    'localhost:4000.evil.example',
    '0.0.0.0:4000',
    '',
  ])('nobody at %s', host => expect(status('GET', { host })).toBe(421))
  test.each([
    'http://evil.example',
    'null',
    'http://127.0.0.1:4001',
    'https://127.0.0.1:4000',
    'http://127.0.0.1:4000.evil.example',
  ])('no page of %s', origin => {
    expect(status('GET', { host: '127.0.0.1:4000', origin })).toBe(403)
    expect(status('POST', { host: '127.0.0.1:4000', origin })).toBe(403)
  })
  test('a link from elsewhere may lead here; a script or a picture from elsewhere may not', () => {
    const host = '127.0.0.1:4000'
    expect(status('GET', { host, 'sec-fetch-site': 'cross-site', 'sec-fetch-mode': 'navigate' })).toBeUndefined()
    for (const site of ['cross-site', 'same-site'])
      expect(status('GET', { host, 'sec-fetch-site': site, 'sec-fetch-mode': 'no-cors' })).toBe(403)
  })
  test('a request that changes something must say where it is from', () => {
    expect(status('POST', { host: '127.0.0.1:4000' })).toBe(403)
  })
  test.each(['PUT', 'DELETE', 'PATCH', 'OPTIONS', 'HEAD', 'TRACE'])('nothing by %s', method =>
    expect(status(method, { host: '127.0.0.1:4000' })).toBe(405),
  )
})

describe('an editor', () => {
  const spot = { path: '/jobs/Ann\'s "shed"/$(a) & b.md', line: 31, column: 4 }
  test('is a program with its arguments, each whole whatever the path holds', () => {
    const read = readEditor(`"my editor" --at {line}:{column} '{path}'`)
    expect(read.ok && read.value.kind === 'program' && argumentsOf(read.value.words, spot)).toEqual([
      'my editor',
      '--at',
      '31:4',
      spot.path,
    ])
  })
  test('or an address, in which the path is spelt as addresses are', () => {
    const read = readEditor('myeditor://open{path}:{line}')
    expect(
      read.ok && read.value.kind === 'address' && addressOf(read.value.template, { ...spot, path: '/a b/c?#.md' }),
    ).toBe('myeditor://open/a%20b/c%3F%23.md:31')
  })
  test.each([
    'myeditor {line}',
    'javascript:alert({path})',
    'http://evil.example/{path}',
    'data:text/html,{path}',
    '{path}',
    '',
  ])('is not %s', template => expect(readEditor(template).ok).toBe(false))
})

describe('the arguments of watch', () => {
  test('name documents, folders and what is written', () => {
    const read = readWatch([folder, 'later.md', '--to', 'html, json', '--out', 'o', '--port', '4000'], {})
    expect(read.ok && read.value).toMatchObject({
      files: ['later.md'],
      folders: [folder],
      to: ['html', 'json'],
      port: 4000,
    })
  })
  test.each([
    [[]],
    [['a.md', '--to', 'docx']],
    [['a.md', '--out', 'o']],
    [['a.md', '--port', '70000']],
    [['a.md', '--port', 'x']],
    [['nowhere']],
    [['a.md', '--editor', 'myeditor']],
    [['a.md', '--browser', 'x']],
    [['a.md', '--strange']],
  ])('are refused: %j', args => expect(readWatch(args, {}).ok).toBe(false))
  test('an editor may be named by the environment', () => {
    const read = readWatch(['a.md'], { PLATEMARK_EDITOR: 'myeditor {path}' })
    expect(read.ok && read.value.editor).toEqual({ kind: 'program', words: ['myeditor', '{path}'] })
  })
})

describe('files that never count', () => {
  test.each(['.a.md.swp', '4913~', 'a.md~', '#a.md#', '.#a.md', '.git'])('%s', name =>
    expect(isHidden(join('/jobs', name))).toBe(true),
  )
  test.each(['a.md', 'north #2.md', 'a~b.md'])('but %s does', name => expect(isHidden(join('/jobs', name))).toBe(false))
})

describe('the output folder', () => {
  test('is not left by a link', () => {
    const [out, elsewhere] = [join(folder, 'out'), join(folder, 'elsewhere')]
    mkdirSync(out)
    mkdirSync(elsewhere)
    symlinkSync(elsewhere, join(out, 'linked'))
    expect(insideOf(out, join(out, 'deep', 'er')).ok).toBe(true)
    expect(insideOf(out, out).ok).toBe(true)
    expect(insideOf(out, join(out, 'linked')).ok).toBe(false)
    expect(insideOf(out, join(out, 'linked', 'deeper')).ok).toBe(false)
    expect(insideOf(out, join(out, '..', 'elsewhere')).ok).toBe(false)
    expect(insideOf(out, join(folder, 'out-beside')).ok).toBe(false)
  })
})
