/** One watched document, a fault of the program's own in it, and the printing of its PDF. */
import { createHash } from 'node:crypto'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { good } from '../../src/base/outcome.ts'
import { compileText } from '../../src/compile.ts'
import type { Host } from '../../src/publish.ts'
import { type Built, WatchedDocument } from '../../src/serve/document.ts'
import { createOutputs } from '../../src/serve/outputs.ts'
import { blockAt, positionFor } from '../../src/serve/places.ts'
import { asset } from '../render/assets.ts'
import { samplePaths, sourceOf } from '../support/pages.ts'
import { pause, room, until } from './watched.ts'

const host: Host = { version: '0.0.0', asset, sha256: text => createHash('sha256').update(text).digest('hex') }
const folder = mkdtempSync(join(tmpdir(), 'platemark-document-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

describe('a fault of our own', () => {
  test('is said, leaves no number, and ends neither the watch nor the document', () => {
    const path = join(folder, 'own.md')
    const told: Built[] = []
    let fails = false
    const document = new WatchedDocument(path, 'own.md', '', {
      host,
      watch: () => {
        if (fails) throw new Error('a wheel came off')
      },
      built: (_, built) => told.push(built),
    })
    const text = room('50 psf', '\n![The quay](quay.svg)\n')
    const save = (text: string) => {
      writeFileSync(path, text)
      document.look()
    }
    save(text)
    fails = true
    save(text.replace('50 psf', '60 psf'))
    expect(document.state.report).toMatchObject({ state: 'broken', errors: 1 })
    expect(document.state.page().blocks.join()).toContain('a wheel came off')
    expect(document.state.page().blocks.join()).not.toContain('kip')
    fails = false
    save(text.replace('50 psf', '70 psf'))
    expect(document.state.report.state).toBe('sound')
    expect(told.map(({ fault }) => fault === undefined)).toEqual([true, false, true])
    // It was 5 kip before the fault.
    expect(told.at(-1)?.moves.numbers.find(({ id }) => id === 'roof.W')).toMatchObject({ was: '5 kip', now: '7 kip' })
  })
})

describe('a PDF', () => {
  test('is printed of the newest save when saves come faster than prints', async () => {
    const printed: string[] = []
    const press = {
      print: async ({ properties }: { readonly properties: { readonly title?: string } }) => {
        await pause(400)
        printed.push(properties.title ?? '')
        return good(new TextEncoder().encode(String(properties.title)))
      },
      close: async () => undefined,
    }
    const path = join(folder, 'p.md')
    const outputs = createOutputs({ to: ['pdf'], out: undefined, draft: false }, host, press, {
      wrote: () => undefined,
      failed: because => {
        throw new Error(because)
      },
    })
    for (let i = 1; i <= 5; i++) {
      const text = room('50 psf').replace('Ferry Ticket Office', `Office ${i}`)
      outputs.write({ path, shown: 'p.md', within: '' }, compileText('p.md', text))
      await pause(180)
    }
    await until(
      () => printed.at(-1) ?? '',
      title => title.includes('Office 5'),
    )
    await outputs.finish()
    expect(printed.length).toBeLessThan(5)
    expect(readFileSync(join(folder, 'p.pdf'), 'utf8')).toContain('Office 5')
  })
})

describe('places of the source', () => {
  test.each(samplePaths)('every block of %s has its place in a list as long as the page', path => {
    const text = sourceOf(path)
    const document = new WatchedDocument(`${process.cwd()}/${path}`, path, '', {
      host,
      watch: () => undefined,
      built: () => undefined,
    })
    document.look()
    const { compiled } = document
    if (!compiled) throw new Error('the sample is not built')
    const blocks = document.state.page().blocks
    const line = text.split('\n').length
    expect(blockAt(compiled, line, blocks.length)).toBeDefined()
    // Each block is one element, which is how a browser counts them.
    for (const block of blocks) expect(block).toMatch(/^<([a-z0-9]+)[\s>][\s\S]*<\/\1>$/)
  })

  test('a number leads to the line that it was written in, one that is worked to the nearest that was', () => {
    const compiled = compileText('a.md', room('50 psf'))
    expect(positionFor(compiled, { id: 'limit' })).toEqual({ line: 21, column: 9 })
    expect(positionFor(compiled, { id: 'roof.W' })?.line).toBe(13)
    expect(positionFor(compiled, { id: 'no.such' })).toBeUndefined()
  })
})
