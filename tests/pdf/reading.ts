/** PDFs for tests: printed by whatever browser this machine has or the embedded one, and read back by pdf.js. */
import { fileURLToPath } from 'node:url'
import { PDFDict, PDFDocument, PDFName } from 'pdf-lib'
import { getDocument, type PDFDocumentProxy } from 'pdfjs-dist/legacy/build/pdf.mjs'
import type { TextItem } from 'pdfjs-dist/types/src/display/api.js'
import { compileText } from '../../src/compile.ts'
import { openPress, PATIENCE, type Press } from '../../src/pdf/press.ts'
import { paperOf } from '../../src/publish.ts'
import type { Nearby } from '../../src/read/nearby.ts'
import type { Paper } from '../../src/render/paper.ts'
import { asset } from '../render/assets.ts'
import { host } from '../support/worked.ts'

const near = fileURLToPath(new URL('../..', import.meta.url))

export const pressFor = (program?: string): Press =>
  openPress({ named: program === undefined ? undefined : { program, namedBy: 'test' }, near, patience: PATIENCE })

export const paperFor = (text: string, nearby?: Nearby): Paper =>
  paperOf(compileText('calc.md', text, nearby), false, { ...host, asset })

/** Why no PDF can be printed here, such as on a machine without a browser that the embedded one does not serve. */
export async function whyNoBrowser(press: Press): Promise<string | undefined> {
  const blank: Paper = {
    firstPage: body => `<!doctype html><title>blank</title><body>${body}</body>`,
    laterPage: body => body,
    sections: [{ html: '<p>blank</p>', level: 0 }],
    properties: {
      title: '',
      author: '',
      subject: '',
      keywords: [],
      creator: '',
      date: '',
      language: 'en',
      identity: '0'.repeat(64),
    },
  }
  const tried = await press.print(blank)
  if (tried.ok) return undefined
  if (tried.because.startsWith('There is no browser')) return tried.because
  throw new Error(tried.because)
}

export async function printed(press: Press, paper: Paper, sizes?: Parameters<Press['print']>[1]): Promise<Uint8Array> {
  const made = await press.print(paper, sizes)
  if (!made.ok) throw new Error(made.because)
  return made.value
}

export const open = (bytes: Uint8Array): Promise<PDFDocumentProxy> =>
  getDocument({ data: bytes.slice(), verbosity: 0 }).promise

export interface SheetText {
  /** What stands in the margins. */
  readonly margins: string
  readonly body: string
}

/** Margins of the page's style: 21 mm at the head and 19 mm at the foot, in points. */
const HEAD = (21 / 25.4) * 72
const FOOT = (19 / 25.4) * 72

export async function textsOf(document: PDFDocumentProxy): Promise<readonly SheetText[]> {
  const sheets: SheetText[] = []
  for (let number = 1; number <= document.numPages; number++) {
    const page = await document.getPage(number)
    const [, , , top = 0] = page.view
    const { items } = await page.getTextContent()
    const texts = items.filter((item): item is TextItem => 'str' in item)
    const inMargin = ({ transform }: TextItem) => transform[5] > top - HEAD || transform[5] < FOOT
    sheets.push({ margins: joined(texts.filter(inMargin)), body: joined(texts.filter(item => !inMargin(item))) })
  }
  return sheets
}

const joined = (items: readonly TextItem[]): string =>
  items
    .map(({ str, hasEOL }) => (hasEOL ? `${str} ` : str))
    .join('')
    .replace(/\s+/g, ' ')
    .trim()

/** The sheet, from 1, that a destination leads to. */
export async function sheetOfDestination(document: PDFDocumentProxy, dest: unknown): Promise<number> {
  const explicit = typeof dest === 'string' ? await document.getDestination(dest) : dest
  if (!Array.isArray(explicit)) throw new Error(`no such destination: ${String(dest)}`)
  return (await document.getPageIndex(explicit[0])) + 1
}

export interface Link {
  readonly sheet: number
  /** The sheet that it leads to, for a link within the document. */
  readonly to: number | undefined
  /** The address that it leads to outside. */
  readonly url: string | undefined
}

/** Links in the order of the sheets, and on each from its head to its foot. */
export async function linksOf(document: PDFDocumentProxy): Promise<readonly Link[]> {
  const links: Link[] = []
  for (let sheet = 1; sheet <= document.numPages; sheet++) {
    const annotations = await (await document.getPage(sheet)).getAnnotations()
    for (const { subtype, dest, url, unsafeUrl } of annotations.toSorted((a, b) => b.rect[3] - a.rect[3])) {
      if (subtype !== 'Link') continue
      const to = dest ? await sheetOfDestination(document, dest) : undefined
      links.push({ sheet, to, url: url ?? unsafeUrl })
    }
  }
  return links
}

export interface Bookmark {
  readonly title: string
  readonly sheet: number
  readonly depth: number
}

export async function bookmarksOf(document: PDFDocumentProxy): Promise<readonly Bookmark[]> {
  const found: Bookmark[] = []
  const walk = async (items: Awaited<ReturnType<PDFDocumentProxy['getOutline']>>, depth: number): Promise<void> => {
    for (const { title, dest, items: inner } of items ?? []) {
      found.push({ title, sheet: await sheetOfDestination(document, dest), depth })
      await walk(inner, depth + 1)
    }
  }
  await walk(await document.getOutline(), 0)
  return found
}

/** Roles of the structure elements with how often each stands in the document. */
export async function rolesOf(bytes: Uint8Array): Promise<ReadonlyMap<string, number>> {
  const document = await PDFDocument.load(bytes, { updateMetadata: false })
  const counts = new Map<string, number>()
  for (const [, object] of document.context.enumerateIndirectObjects()) {
    if (!(object instanceof PDFDict) || object.get(PDFName.of('Type')) !== PDFName.of('StructElem')) continue
    const role = object.lookup(PDFName.of('S'), PDFName).decodeText()
    counts.set(role, (counts.get(role) ?? 0) + 1)
  }
  return counts
}
