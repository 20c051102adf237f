/** Watching with a real file system: saves of every kind, folders that come and go, and what is written. */
import {
  existsSync,
  mkdirSync,
  readdirSync,
  renameSync,
  rmSync,
  symlinkSync,
  truncateSync,
  unlinkSync,
  writeFileSync,
} from 'node:fs'
import { join } from 'node:path'
import { afterEach, describe, expect, test } from 'vitest'
import { newFolder, pause, room, until, type Watched, watched } from './watched.ts'

let watch: Watched | undefined
afterEach(async () => {
  await watch?.end()
  watch = undefined
})

const start = async (...args: Parameters<typeof watched>): Promise<Watched> => {
  watch = await watched(...args)
  return watch
}

/** What the page shows; waits for it. */
const shows = async ({ get }: Watched, text: string | RegExp, path = '/'): Promise<string> =>
  until(
    async () => (await get(path)).text,
    page => (typeof text === 'string' ? page.includes(text) : text.test(page)),
  )

const weighs = (kip: string) => new RegExp(`The roof weighs .{0,200}>${kip} kip<`)

describe('a document', () => {
  test('is built anew when it is saved in place', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    await shows(watch, weighs('5'))
    watch.put('a.md', room('70 psf'))
    await shows(watch, weighs('7'))
    expect(watch.said()).toMatch(
      /a\.md: sound; \d+ numbers moved, most roof\.\S+ \+40\.0.%; .*is now NG; 1 check, 1 NG; \d+ ms/,
    )
  })

  test('and when another file is put in its place, time after time', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    for (const load of [20, 30, 40]) {
      watch.put('a.md.new', room(`${load} psf`))
      renameSync(join(watch.folder, 'a.md.new'), join(watch.folder, 'a.md'))
      await shows(watch, weighs(String(load / 10)))
    }
  })

  test('is not shown empty while it is emptied and filled', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    await shows(watch, weighs('5'))
    truncateSync(join(watch.folder, 'a.md'))
    await pause(60)
    watch.put('a.md', room('20 psf'))
    await shows(watch, weighs('2'))
    // An empty document would have been one build more.
    expect(watch.said().match(/ms\n/g)).toHaveLength(2)
  })

  test('ends in its newest state after a hundred saves in a second', async () => {
    const watch = await start(['@/a.md', '--to', 'html'], { 'a.md': room('50 psf') })
    await shows(watch, weighs('5'))
    for (let i = 1; i <= 100; i++) {
      watch.put('a.md', room(`${i * 10} psf`))
      await pause(10)
    }
    await shows(watch, weighs('100'))
    await until(
      () => watch.read('a.html'),
      text => weighs('100').test(text),
    )
    // A burst is written once in a while, not at every save.
    expect(watch.said().match(/a\.html\n/g)?.length).toBeLessThan(8)
  }, 20_000)

  test('that is deleted is said, shown without any number, and waited for', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    await shows(watch, weighs('5'))
    unlinkSync(join(watch.folder, 'a.md'))
    const page = await shows(watch, 'this file cannot be read: there is no such file')
    expect(page).not.toMatch(/data-v="|\d kip/)
    expect(watch.said()).toContain('waiting for the next save')
    watch.put('a.md', room('60 psf'))
    await shows(watch, weighs('6'))
    // It was 5 kip when it was last seen.
    expect(watch.said()).toMatch(/most roof\.\S+ \+20\.0/)
  })

  test('may come after the watch has started', async () => {
    const watch = await start(['@/later.md'], {})
    await shows(watch, 'there is no such file')
    watch.put('later.md', room('50 psf'))
    await shows(watch, weighs('5'))
  })

  test('that is not UTF-8, or too large, is said and waited for', async () => {
    const watch = await start(['@/a.md'], { 'a.md': Uint8Array.of(35, 32, 0xff, 0xfe, 10) })
    await shows(watch, 'this file is not UTF-8 text')
    watch.put('a.md', 'x'.repeat(5 * 1024 * 1024 + 1))
    await shows(watch, '5 MB are read')
    watch.put('a.md', room('50 psf'))
    await shows(watch, weighs('5'))
  })

  test('with a fault has its box in place and no number of the last save', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    await shows(watch, weighs('5'))
    watch.put('a.md', room('50 pfs'))
    const page = await shows(watch, 'there is no unit pfs')
    expect(page).toContain('class="fault"')
    expect(page).not.toMatch(weighs('5'))
    expect(watch.said()).toContain('error[unknown-unit]')
    watch.put('a.md', room('50 psf'))
    await shows(watch, weighs('5'))
    expect(watch.said()).toMatch(/sound; no number moved; 1 check, none NG; \d+ ms\n$/)
  })

  test('is not built for what an editor leaves beside it', async () => {
    const watch = await start(['@'], { 'a.md': room('50 psf') })
    await until(watch.said, said => said.includes('a.md: sound'))
    for (const name of ['.a.md.swp', '4913', 'a.md~', '#a.md#', '.#a.md', '.b.md']) watch.put(name, room('90 psf'))
    await pause(700)
    expect(watch.said().match(/ ms\n/g)).toHaveLength(1)
    expect((await watch.get()).text.match(/href="\/d\//g)).toHaveLength(1)
  })
})

describe('what a document names', () => {
  const withPicture = room('50 psf', '\n![The quay](quay.svg)\n')
  const drawing = (width: number) =>
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="10" viewBox="0 0 ${width} 10"><path d="M0 0h9"/></svg>`

  test('a picture that is missing, then comes, then changes', async () => {
    const watch = await start(['@/a.md'], { 'a.md': withPicture })
    await until(watch.said, said => said.includes('quay.svg: there is no such file'))
    watch.put('quay.svg', drawing(20))
    await shows(watch, Buffer.from(drawing(20)).toString('base64').slice(0, 90))
    watch.put('quay.svg', drawing(33))
    await shows(watch, Buffer.from(drawing(33)).toString('base64').slice(0, 90))
  })

  test('a template', async () => {
    const text = room('50 psf').replace('units: US', 'units: US\ntemplate: office')
    const watch = await start(['@/a.md'], { 'a.md': text, 'office/sheet.css': '.sheet { --mark: 1; }' })
    await shows(watch, '--mark: 1')
    watch.put('office/sheet.css', '.sheet { --mark: 2; }')
    await shows(watch, '--mark: 2')
  })
})

describe('a folder', () => {
  test('shows documents that come, and waits for those that go', async () => {
    const watch = await start(['@'], { 'a.md': room('50 psf') })
    await shows(watch, /a\.md/)
    watch.put('deep/er/b.md', room('20 psf'))
    await shows(watch, /deep\/er\/b\.md/)
    unlinkSync(join(watch.folder, 'a.md'))
    await shows(watch, /waiting for the file/)
  })

  test('may be deleted and restored', async () => {
    const parent = newFolder()
    const folder = join(parent, 'calcs')
    mkdirSync(folder)
    const watch = await start(['@'], { 'a.md': room('50 psf') }, folder)
    await shows(watch, '1 OK')
    rmSync(folder, { recursive: true })
    await shows(watch, 'waiting for the file')
    await pause(500)
    mkdirSync(folder)
    watch.put('a.md', room('70 psf'))
    await shows(watch, '1 of 1 NG')
    watch.put('b.md', room('20 psf'))
    await shows(watch, /b\.md/)
    rmSync(parent, { recursive: true, force: true })
  })
})

describe('what is written', () => {
  test('is nothing without --to', async () => {
    const watch = await start(['@/a.md'], { 'a.md': room('50 psf') })
    watch.put('a.md', room('70 psf'))
    await shows(watch, weighs('7'))
    await pause(300)
    expect(readdirSync(watch.folder)).toEqual(['a.md'])
  })

  test('is what build would write: pages of sound documents, results always', async () => {
    const watch = await start(['@/a.md', '--to', 'html,md,json'], { 'a.md': room('50 psf') })
    await until(() => existsSync(join(watch.folder, 'a.json')), Boolean)
    const [html, md] = [watch.read('a.html'), watch.read('a.worked.md')]
    expect(html).toMatch(weighs('5'))
    expect(html).not.toMatch(/live|data-was|moved/)
    watch.put('a.md', room('50 pfs'))
    await until(
      () => watch.read('a.json'),
      text => text.includes('unknown-unit'),
    )
    expect([watch.read('a.html'), watch.read('a.worked.md')]).toEqual([html, md])
  })

  test('lies in the output folder, which is no document though it is watched', async () => {
    const watch = await start(['@', '--to', 'md', '--out', '@/out'], { 'deep/a.md': room('50 psf') })
    await until(() => existsSync(join(watch.folder, 'out/deep/a.md')), Boolean)
    watch.put('deep/a.md', room('70 psf'))
    await until(
      () => watch.read('out/deep/a.md'),
      text => text.includes('7 kip'),
    )
    await pause(300)
    expect((await watch.get()).text.match(/href="\/d\//g)).toHaveLength(1)
    expect(existsSync(join(watch.folder, 'out/out'))).toBe(false)
  })

  test('never leaves the output folder through a link in it', async () => {
    const folder = newFolder()
    mkdirSync(join(folder, 'calcs/deep'), { recursive: true })
    mkdirSync(join(folder, 'out'))
    mkdirSync(join(folder, 'elsewhere'))
    symlinkSync(join(folder, 'elsewhere'), join(folder, 'out/deep'))
    const watch = await start(
      ['@/calcs', '--to', 'html,json', '--out', '@/out'],
      { 'calcs/deep/a.md': room('50 psf') },
      folder,
    )
    await until(watch.said, said => said.includes('leads out of'))
    expect(readdirSync(join(folder, 'elsewhere'))).toEqual([])
  })

  test('never takes the place of the document', async () => {
    const text = room('50 psf')
    const watch = await start(['@/a.md', '--to', 'md', '--out', '@'], { 'a.md': text })
    await until(watch.said, said => said.includes('would take the place of the document'))
    expect(watch.read('a.md')).toBe(text)
  })

  test('that cannot be written is said, and tried again at the next save', async () => {
    const watch = await start(['@/a.md', '--to', 'html', '--out', '@/out'], {
      'a.md': room('50 psf'),
      out: 'in the way',
    })
    await until(watch.said, said => said.includes('a file stands where a folder is needed'))
    expect(watch.said()).toContain('tried again at the next save')
    unlinkSync(join(watch.folder, 'out'))
    writeFileSync(join(watch.folder, 'a.md'), room('70 psf'))
    await until(() => existsSync(join(watch.folder, 'out/a.html')), Boolean)
    expect(watch.read('out/a.html')).toMatch(weighs('7'))
  })
})
