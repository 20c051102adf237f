/** Finding and starting a browser, and what is said when there is none. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { startBrowser } from '../../src/pdf/browser.ts'
import { installedBrowsers, type Machine, programNamed, thisMachine } from '../../src/pdf/places.ts'
import { filesInTar } from '../../src/pdf/tar.ts'

const folder = mkdtempSync(join(tmpdir(), 'platemark-browser-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

function program(name: string, script: string): string {
  const path = join(folder, name)
  writeFileSync(path, `#!/bin/sh\n${script}\n`, { mode: 0o755 })
  return path
}

const named = (path: string) => ({ named: { program: path, namedBy: '--browser' }, near: folder, patience: 1500 })

const machineWith = (platform: string, environment: Machine['environment'], programs: readonly string[]): Machine => ({
  platform,
  arch: 'x64',
  environment,
  isProgram: path => programs.includes(path),
})

async function whyNot(...args: Parameters<typeof startBrowser>): Promise<string> {
  const started = await startBrowser(...args)
  if (!started.ok) return started.because
  await started.value.close()
  throw new Error('a browser started')
}

describe('where a browser is looked for', () => {
  test('on the PATH, then in the usual places of the system', () => {
    const linux = machineWith('linux', { PATH: '/home/a/bin' }, ['/usr/bin/chromium', '/home/a/bin/google-chrome'])
    expect(installedBrowsers(linux)).toEqual(['/home/a/bin/google-chrome', '/usr/bin/chromium'])
    const chrome = '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome'
    expect(installedBrowsers(machineWith('darwin', { PATH: '' }, [chrome]))).toEqual([chrome])
    const edge = join('C:\\Program Files (x86)', 'Microsoft', 'Edge', 'Application', 'msedge.exe')
    const windows = machineWith('win32', { 'PROGRAMFILES(X86)': 'C:\\Program Files (x86)' }, [edge])
    expect(installedBrowsers(windows)).toEqual([edge])
  })

  test('a name without a folder is looked for on the PATH', () => {
    const machine = machineWith('linux', { PATH: '/opt/a:/opt/b' }, ['/opt/b/chrome'])
    expect(programNamed('chrome', machine)).toBe('/opt/b/chrome')
    expect(programNamed('./chrome', machine)).toBeUndefined()
  })
})

describe('what is said when no browser can be had', () => {
  test('a named program that is not there', async () => {
    expect(await whyNot(named('/nowhere/chrome'))).toMatch(/^--browser: there is no program \/nowhere\/chrome\.\n/)
  })

  test('a named program that is no browser, with what it says', async () => {
    const path = program('refuses', 'echo "no display here" >&2; exit 3')
    expect(await whyNot(named(path))).toContain(`${path} does not start as a browser (it says: no display here)`)
  })

  test('a named program that hangs', async () => {
    const path = program('hangs', 'exec sleep 30')
    expect(await whyNot(named(path))).toContain(`${path} gave no sign of a browser within 1.5 s`)
  })

  test('no browser at all: what was looked for, and what to do', async () => {
    const bare = { named: undefined, near: folder, patience: 1500 }
    const said = await whyNot(bare, machineWith('linux', { PATH: '' }, []))
    expect(said).toContain('no Chrome, Chromium or Edge is on the PATH')
    expect(said).toContain('is not installed')
    expect(said).toContain('--browser PATH or in PLATEMARK_BROWSER')
    expect(await whyNot(bare, machineWith('freebsd', { PATH: '' }, []))).toContain('and this is freebsd on x64')
  })
})

const { platform, arch } = thisMachine
test.skipIf(platform !== 'linux' || arch !== 'x64')(
  'the embedded browser is unpacked and starts where no other is installed (skipped: it serves Linux on x86-64 alone)',
  async () => {
    const cache = join(folder, 'cache')
    const bare = machineWith('linux', { PATH: '', XDG_CACHE_HOME: cache }, [])
    for (const turn of ['unpacked', 'found unpacked']) {
      const started = await startBrowser({ named: undefined, near: process.cwd(), patience: 60_000 }, bare)
      if (!started.ok) throw new Error(`${turn}: ${started.because}`)
      expect(await started.value.version()).toContain('HeadlessChrome/143')
      await started.value.close()
    }
  },
  120_000,
)

test('a tape archive gives its files with their names and rights', () => {
  const header = new Uint8Array(512)
  const put = (text: string, at: number) => header.set(new TextEncoder().encode(text), at)
  put('lib/a.so', 0)
  put('0000755\0', 100)
  put('00000000003\0', 124)
  put('0', 156)
  const body = new Uint8Array(512)
  body.set([1, 2, 3])
  const [file, ...others] = filesInTar(new Uint8Array([...header, ...body, ...new Uint8Array(1024)]))
  expect(others).toEqual([])
  expect(file).toMatchObject({ name: 'lib/a.so', mode: 0o755 })
  expect([...(file?.bytes ?? [])]).toEqual([1, 2, 3])
})
