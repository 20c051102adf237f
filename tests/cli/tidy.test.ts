/** `platemark tidy` as a process: what it rewrites, what it leaves, and how it ends. */
import { spawnSync } from 'node:child_process'
import {
  chmodSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeEach, describe, expect, test } from 'vitest'

const command = fileURLToPath(new URL('../../dist/platemark.cjs', import.meta.url))
const workshop = mkdtempSync(join(tmpdir(), 'platemark-tidy-'))
afterAll(() => rmSync(workshop, { recursive: true, force: true }))

let folder = ''
let count = 0
beforeEach(() => {
  folder = join(workshop, String(count++))
  mkdirSync(folder)
})

const put = (name: string, text: string) => writeFileSync(join(folder, name), text)
const read = (name: string) => readFileSync(join(folder, name), 'utf8')
function run(args: readonly string[], input?: string | Buffer) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [command, 'tidy', ...args], {
    cwd: folder,
    encoding: 'utf8',
    ...(input === undefined ? {} : { input }),
  })
  return { status, stdout, stderr }
}

const untidy = '```equations\na=1 ft\n```\n'
const tidied = '```equations\na = 1 ft\n```\n'

describe('what it rewrites', () => {
  test('files that are not tidy, in a folder and the folders in it, each named; the others keep their time', () => {
    mkdirSync(join(folder, 'deep'))
    put('a.md', untidy)
    put('b.md', tidied)
    put('deep/c.md', untidy)
    put('note.txt', untidy)
    const before = statSync(join(folder, 'b.md')).mtimeMs
    expect(run(['.'])).toEqual({ status: 0, stdout: 'a.md\ndeep/c.md\n', stderr: '' })
    expect([read('a.md'), read('b.md'), read('deep/c.md'), read('note.txt')]).toEqual([tidied, tidied, tidied, untidy])
    expect(statSync(join(folder, 'b.md')).mtimeMs).toBe(before)
    expect(readdirSync(folder).sort()).toEqual(['a.md', 'b.md', 'deep', 'note.txt'])
    expect(run(['.'])).toEqual({ status: 0, stdout: '', stderr: '' })
  })

  test('the mode of a file stays', () => {
    put('a.md', untidy)
    chmodSync(join(folder, 'a.md'), 0o640)
    run(['a.md'])
    expect(statSync(join(folder, 'a.md')).mode & 0o777).toBe(0o640)
  })

  test('a link stays one, and what it leads to is rewritten', () => {
    mkdirSync(join(folder, 'there'))
    put('there/a.md', untidy)
    symlinkSync(join('there', 'a.md'), join(folder, 'link.md'))
    expect(run(['link.md']).stdout).toBe('link.md\n')
    expect(lstatSync(join(folder, 'link.md')).isSymbolicLink()).toBe(true)
    expect(read('there/a.md')).toBe(tidied)
  })

  test('a byte order mark, ends of lines and a missing last one stay', () => {
    const windows = (text: string) => `\ufeff${text.trimEnd().replaceAll('\n', '\r\n')}`
    put('a.md', windows(untidy))
    expect(run(['a.md']).status).toBe(0)
    expect(read('a.md')).toBe(windows(tidied))
  })

  test('wide characters are counted by the command too', () => {
    put('a.md', '```areas\n|area|load|\n|-|-|\n|作業場|50 psf|\n|A|9 psf|\n```\n')
    run(['a.md'])
    expect(read('a.md')).toContain('| 作業場 | 50 psf |\n| A      | 9 psf  |\n')
  })
})

describe('--check', () => {
  test('names the files that are not tidy, writes nothing and ends with 1', () => {
    put('a.md', untidy)
    put('b.md', tidied)
    expect(run(['--check', '.'])).toEqual({ status: 1, stdout: 'a.md\n', stderr: '' })
    expect(read('a.md')).toBe(untidy)
    expect(run(['--check', 'b.md'])).toEqual({ status: 0, stdout: '', stderr: '' })
  })

  test('of a text piped in tells by how it ends', () => {
    expect(run(['--check', '-'], untidy)).toEqual({ status: 1, stdout: '-\n', stderr: '' })
    expect(run(['--check', '-'], tidied)).toEqual({ status: 0, stdout: '', stderr: '' })
  })
})

describe('a text piped in', () => {
  test('comes out tidied, with its byte order mark', () => {
    expect(run(['-'], untidy)).toEqual({ status: 0, stdout: tidied, stderr: '' })
    expect(run(['-'], tidied)).toEqual({ status: 0, stdout: tidied, stderr: '' })
    expect(run(['-'], `\ufeff${untidy}`).stdout).toBe(`\ufeff${tidied}`)
    expect(run(['-'], '')).toEqual({ status: 0, stdout: '', stderr: '' })
  })

  test('a long one comes out whole', () => {
    const long = `${untidy}\n`.repeat(20_000)
    expect(run(['-'], long).stdout).toBe(`${tidied}\n`.repeat(20_000))
  })

  test('that is not UTF-8 is not touched', () => {
    const { status, stdout, stderr } = run(['-'], Buffer.from([0x61, 0xff, 0x62]))
    expect({ status, stdout }).toEqual({ status: 1, stdout: '' })
    expect(stderr).toContain('not-utf-8')
  })
})

describe('what it refuses', () => {
  test('a file that is not UTF-8 stays as it is, and the next one is tidied', () => {
    writeFileSync(join(folder, 'a.md'), Buffer.concat([Buffer.from(untidy), Buffer.from([0xff])]))
    put('b.md', untidy)
    const { status, stdout, stderr } = run(['a.md', 'b.md'])
    expect({ status, stdout }).toEqual({ status: 1, stdout: 'b.md\n' })
    expect(stderr).toContain('not-utf-8')
    expect(readFileSync(join(folder, 'a.md')).at(-1)).toBe(0xff)
  })

  test.skipIf(process.getuid?.() === 0)('a file that may not be written, though its folder may', () => {
    put('a.md', untidy)
    chmodSync(join(folder, 'a.md'), 0o444)
    const { status, stderr } = run(['a.md'])
    expect(status).toBe(1)
    expect(stderr).toContain('permission is refused')
    expect(read('a.md')).toBe(untidy)
  })

  test('a file that is not there ends it with 1, and wrong usage with 2', () => {
    expect(run(['none.md'])).toMatchObject({ status: 1, stdout: '' })
    put('a.md', untidy)
    for (const args of [[], ['a.md', '--list'], ['-', 'a.md']])
      expect(run(args)).toMatchObject({ status: 2, stdout: '' })
    expect(read('a.md')).toBe(untidy)
  })

  test('its help says how an editor calls it', () => {
    expect(run(['--help'])).toMatchObject({ status: 0, stderr: '' })
    expect(run(['--help']).stdout).toContain('platemark tidy - <')
  })
})
