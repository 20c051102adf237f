/** The PDF as a reader's program has it. */
import { readFileSync } from 'node:fs'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, describe, expect, test } from 'vitest'
import { good } from '../../src/base/outcome.ts'
import { plainText } from '../../src/render/escape.ts'
import type { Paper } from '../../src/render/paper.ts'
import { bookmarksOf, linksOf, open, paperFor, pressFor, printed, rolesOf, textsOf, whyNoBrowser } from './reading.ts'

const press = pressFor()
afterAll(() => press.close())
const missing = await whyNoBrowser(press)
const prints = missing === undefined ? describe : describe.skip
const why = missing === undefined ? '' : ` (skipped: ${missing})`

const starter = readFileSync('samples/starter.md', 'utf8')
const signed = starter
  .replace('---\n', '---\nby: R. Okafor\nrevision: B\nstandard: ASCE 7-22\n')
  .replace('One room under', 'See the [survey](https://kiosk.example/survey). One room under')

/** Every few sections a lot, so that even the starter has several. */
const inLots = { short: 0, lot: 60_000 }

const wordsOf = (html: string): string =>
  plainText(html.replace(/<[^>]*>/g, ''))
    .replace(/\s+/g, ' ')
    .trim()

/** The headings of the body, and of what stands before it. */
const headingsIn = (paper: Paper): readonly string[] =>
  Array.from(wholeOf(paper).matchAll(/<h[2-6] [^>]*>([\s\S]*?)<\/h\d>/g), ([, title = '']) => wordsOf(title))

const wholeOf = (paper: Paper): string => paper.firstPage(paper.sections.map(({ html }) => html).join('\n'))

/** What the contents list, with number and words as one. */
const entriesIn = (paper: Paper): readonly string[] =>
  Array.from(
    wholeOf(paper).matchAll(/<a [^>]*>(<span class="no">[\s\S]*?)<\/a><span class="folio"/g),
    ([, entry = '']) => wordsOf(entry),
  )

prints(
  `a document printed whole, and in lots${why}`,
  async () => {
    const paper = paperFor(signed)
    const headings = headingsIn(paper)
    const entries = entriesIn(paper)
    const ways = { whole: undefined, 'in lots': inLots } as const
    const made = missing
      ? []
      : await Promise.all(
          Object.entries(ways).map(async ([way, sizes]) => {
            const bytes = await printed(press, paper, sizes)
            return { way, sizes, bytes, document: await open(bytes) }
          }),
        )

    test.each(made)('$way: every sheet says which it is, of how many', async ({ document }) => {
      const sheets = await textsOf(document)
      expect(sheets.length).toBeGreaterThan(8)
      for (const [i, { margins }] of sheets.entries()) {
        expect(margins).toContain(`sheet ${i + 1} of ${sheets.length}`)
        expect(margins).toContain('To be reviewed by the engineer of record')
        // The first sheet has the plate and does without a head.
        expect(margins.includes('Bait and Tackle Kiosk')).toBe(i > 0)
      }
    })

    test.each(made)('$way: the contents give the sheet that each heading stands on', async ({ document }) => {
      const sheets = await textsOf(document)
      const marks = await bookmarksOf(document)
      const contents = sheets[0]?.body ?? ''
      expect(entries.length).toBeGreaterThan(6)
      for (const title of entries) {
        const sheet = Number(new RegExp(`${escaped(title)} (\\d+)(?= |$)`).exec(contents)?.[1])
        expect(sheet, title).toBe(marks.find(mark => mark.title === title)?.sheet)
        expect(sheets[sheet - 1]?.body, title).toContain(title)
      }
    })

    test.each(made)('$way: every heading is a bookmark, in order', async ({ document }) => {
      const marks = await bookmarksOf(document)
      expect(marks.map(({ title }) => title)).toEqual(headings)
      expect(marks.map(({ sheet }) => sheet)).toEqual(marks.map(({ sheet }) => sheet).toSorted((a, b) => a - b))
      expect(marks.map(({ title }) => title).slice(0, 2)).toEqual(['Checks OK, the worst first', 'Contents'])
    })

    test.each(made)(
      '$way: every link leads to a place in the document or to an address that the engineer wrote',
      async ({ document }) => {
        const links = await linksOf(document)
        for (const { to, url } of links) {
          if (to === undefined) expect(url).toBe('https://kiosk.example/survey')
          else expect(to).toBeLessThanOrEqual(document.numPages)
        }
        expect(links.some(({ url }) => url === 'https://kiosk.example/survey')).toBe(true)
        // Below the one check stand the contents, in two columns; each entry leads where its bookmark leads.
        const led = links.filter(({ sheet }) => sheet === 1).slice(1, 1 + entries.length)
        const marks = await bookmarksOf(document)
        const sheets = entries.map(title => marks.find(mark => mark.title === title)?.sheet)
        expect(led.map(({ to }) => to).toSorted()).toEqual(sheets.toSorted())
      },
    )

    test.each(made)('$way: it is tagged, in its language, and says what it is', async ({ document, bytes }) => {
      expect(await document.getMarkInfo()).toMatchObject({ Marked: true })
      const roles = await rolesOf(bytes)
      for (const role of ['H1', 'H2', 'H3', 'Table', 'TH', 'TD', 'Caption', 'Figure', 'Link', 'P'])
        expect(roles.get(role) ?? 0, role).toBeGreaterThan(0)
      const info = { ...(await document.getMetadata()).info } as Readonly<Record<string, unknown>>
      expect(info).toMatchObject({
        Title: 'Lateral calculation – Bait and Tackle Kiosk – 26-001',
        Author: 'R. Okafor',
        Subject: 'Bait and Tackle Kiosk',
        Keywords: '26-001, Rev. B, ASCE 7-22, lateral calculation, shear walls',
        CreationDate: 'D:20261120000000Z',
        ModDate: 'D:20261120000000Z',
        Language: 'en-US',
      })
      expect(info.Creator).toMatch(/^Platemark \d/)
    })

    test('both hold the same text, with the same tags', async () => {
      // Without the numbers of the contents, which differ since each lot begins a new sheet.
      const plain = {
        ...paper,
        firstPage: (body: string) => paper.firstPage(body).replaceAll('class="folio"', 'class="unnumbered"'),
      }
      const [whole, lots] = await Promise.all(
        Object.values(ways).map(async sizes => {
          const bytes = await printed(press, plain, sizes)
          const text = (await textsOf(await open(bytes))).map(({ body }) => body).join('')
          return { letters: [...text.replaceAll(' ', '')].sort().join(''), roles: await rolesOf(bytes) }
        }),
      )
      expect(lots?.letters.length).toBeGreaterThan(3000)
      expect(lots?.letters).toBe(whole?.letters)
      for (const role of ['H2', 'H3', 'Table', 'TD', 'LI', 'Link'])
        expect(lots?.roles.get(role), role).toEqual(whole?.roles.get(role))
    })

    test.each(made)(
      '$way: the same source gives the same bytes, in a browser that has printed other things',
      async ({ sizes, bytes }) => {
        await printed(press, paperFor(starter.replaceAll('20 ft', '26 ft')))
        expect(Buffer.compare(await printed(press, paper, sizes), bytes)).toBe(0)
        const other = pressFor()
        try {
          expect(Buffer.compare(await printed(other, paper, sizes), bytes)).toBe(0)
        } finally {
          await other.close()
        }
      },
      120_000,
    )
  },
  300_000,
)

const escaped = (text: string): string => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')

prints(`letters${why}`, () => {
  test.each(['starter', 'boatyard', 'observatory'])(
    'of %s are set in the faces that the page carries, not drawn as shapes or borrowed from the machine',
    async name => {
      const nearby = { read: (path: string) => good(new Uint8Array(readFileSync(`samples/${path}`))) }
      const paper = paperFor(readFileSync(`samples/${name}.md`, 'utf8'), nearby)
      const document = await open(await printed(press, paper))
      for (let number = 1; number <= document.numPages; number++) {
        const page = await document.getPage(number)
        await page.getOperatorList()
        const { items } = await page.getTextContent()
        const names = new Set(items.flatMap(item => ('fontName' in item ? [item.fontName] : [])))
        for (const name of names) {
          const face = page.commonObjs.get(name)
          expect(face.name, `sheet ${number}`).toMatch(/SourceSerif4|SourceSans3|KaTeX/)
          expect(face.isType3Font, face.name).not.toBe(true)
        }
      }
    },
    60_000,
  )
})

prints(`a long table${why}`, () => {
  test('of 2,000 rows repeats its head on every sheet, and splits no row', async () => {
    const rows = Array.from(
      { length: 2000 },
      (_, i) => `| Strip ${i + 1} | ${(i % 9) + 1} ft | first line of the note of strip ${i + 1} |`,
    )
    const text = `---\nproject: Long Loft\n---\n\n# Strips\n\n| strip | measured width | note |\n|---|---|---|\n${rows.join('\n')}\n`
    const document = await open(await printed(press, paperFor(text)))
    const sheets = await textsOf(document)
    expect(sheets.length).toBeGreaterThan(20)
    for (const { body } of sheets) expect(body).toContain('measured width')
    const all = sheets.map(({ body }) => body).join(' ')
    for (let i = 1; i <= 2000; i++) expect(all).toContain(`Strip ${i} `)
  }, 120_000)
})

prints(`a hostile page${why}`, () => {
  test('reaches no network and no file, and runs no script', async () => {
    let asked = 0
    const server = createServer((_, response) => {
      asked += 1
      response.end('x')
    })
    await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
    const { port } = server.address() as AddressInfo
    const at = `http://127.0.0.1:${port}`
    const paper = paperFor(starter)
    const hostile = `<script>document.body.textContent = 'RAN'</script><img src="${at}/a.png" onerror="document.body.textContent='RAN'">
<link rel="stylesheet" href="${at}/b.css"><iframe src="${at}/c"></iframe><iframe src="file:///etc/hostname"></iframe>
<style>@import "${at}/d.css"; p { background: url(${at}/e.png) }</style><object data="${at}/f"></object><p>Still here.</p>`
    // Without the page's own policy, so that what holds is the press and not the page.
    const bare = {
      ...paper,
      firstPage: (body: string) => paper.firstPage(hostile + body).replace(/<meta http-equiv[^>]*>/, ''),
    }
    const sheets = await textsOf(await open(await printed(press, bare)))
    server.close()
    expect(asked).toBe(0)
    const all = sheets.map(({ body }) => body).join(' ')
    expect(all).toContain('Still here.')
    expect(all).toContain('One room under')
    expect(all).not.toContain('RAN')
    expect(all).not.toContain(readFileSync('/etc/hostname', 'utf8').trim())
  })
})
