/** Prints documents as PDF through one browser that stays warm between them. */
import type { PDFDocument } from 'pdf-lib'
import { good, type Outcome } from '../base/outcome.ts'
import type { Paper } from '../render/paper.ts'
import { type BrowserChoice, startBrowser } from './browser.ts'

export { PATIENCE } from './browser.ts'

import { createDesk, type Desk } from './desk.ts'
import { addOutline, setProperties } from './finish.ts'
import { layOver } from './folio.ts'
import { joinLots, type Place, type PrintedLot, placesIn, sheetsIn } from './join.ts'
import { folioPage, hasFolios, type Lots, lotsOf, type Sizes, withFolios } from './lots.ts'
import { dropUnreachable, openPdf } from './objects.ts'

export interface Press {
  /**
   * @param sizes only a test says other than what is usual
   * @returns the bytes of a PDF, the same for the same paper and browser; or why there are none, in words
   */
  readonly print: (paper: Paper, sizes?: Sizes) => Promise<Outcome<Uint8Array>>
  /** Ends the browser. To be called whatever happened. */
  readonly close: () => Promise<void>
}

/** Starts the browser at once, so that it warms up while the first document is worked; that there is none is told when something is to be printed. */
export function openPress(choice: BrowserChoice): Press {
  const desk = startBrowser(choice).then(
    (browser): Outcome<Desk> => (browser.ok ? good(createDesk(browser.value)) : browser),
  )
  return {
    print: async (paper, sizes) => {
      const ready = await desk
      return ready.ok ? printed(paper, lotsOf(paper, sizes), ready.value) : ready
    },
    close: async () => {
      const ready = await desk
      if (ready.ok) await ready.value.close()
    },
  }
}

async function printed(paper: Paper, { lots, titles }: Lots, desk: Desk): Promise<Outcome<Uint8Array>> {
  const bytes = await desk.print(lots.map(({ html }) => html))
  if (!bytes.ok) return bytes
  const opened = await Promise.all(
    bytes.value.map(
      async (each, i): Promise<PrintedLot> => ({ document: await openPdf(each), led: lots[i]?.led === true }),
    ),
  )
  const numbered = await withNumbers(paper, lots[0]?.html ?? '', opened, desk)
  if (!numbered.ok) return numbered
  const { parts, folios } = numbered.value
  const [document] = parts.map(each => each.document)
  if (document === undefined) throw new Error('nothing was printed')
  const places = placesOf(parts)
  const pages = joinLots(parts)
  if (folios !== undefined) layOver(document.context, pages, folios)
  const placed = titles.flatMap(title => {
    const place = places.get(title.id)
    return place === undefined ? [] : [{ ...title, ...place }]
  })
  addOutline(document, placed, pages)
  setProperties(document, paper.properties)
  dropUnreachable(document.context)
  return good(await document.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity }))
}

interface Numbered {
  readonly parts: readonly PrintedLot[]
  /** "Sheet n of m" for every sheet, where the lots do not carry it themselves. */
  readonly folios: PDFDocument | undefined
}

/** More turns than this, and the contents push their own headings to and fro. */
const TURNS = 4

/**
 * Prints the contents again with the number of each heading's sheet, until the numbers put in are those that come out;
 * and the numbers of the sheets, which no lot knows by itself.
 */
async function withNumbers(
  paper: Paper,
  contents: string,
  parts: readonly PrintedLot[],
  desk: Desk,
): Promise<Outcome<Numbered>> {
  const [, ...later] = parts
  const needsFolios = later.length > 0
  const needsNumbers = hasFolios(contents)
  if (!needsFolios && !needsNumbers) return good({ parts, folios: undefined })
  let now = parts
  for (let turn = 0; turn < TURNS; turn++) {
    const places = placesOf(now)
    const sheets = now.reduce((sum, part) => sum + sheetsIn(part), 0)
    const pages = [
      ...(needsNumbers ? [withFolios(contents, sheetNumbers(places))] : []),
      ...(needsFolios ? [folioPage(paper, sheets)] : []),
    ]
    const bytes = await desk.print(pages)
    if (!bytes.ok) return bytes
    const documents = await Promise.all(bytes.value.map(openPdf))
    const folios = needsFolios ? documents.at(-1) : undefined
    const [first] = documents
    if (!needsNumbers || first === undefined) return good({ parts: now, folios })
    now = [{ document: first, led: false }, ...later]
    if (sameSheets(places, placesOf(now))) return good({ parts: now, folios })
  }
  throw new Error('the numbers of the contents do not come to rest')
}

/** Where everything stands in the whole document. */
function placesOf(parts: readonly PrintedLot[]): ReadonlyMap<string, Place> {
  const all = new Map<string, Place>()
  let before = 0
  for (const part of parts) {
    for (const [id, { page, y }] of placesIn(part)) if (!all.has(id)) all.set(id, { page: page + before, y })
    before += sheetsIn(part)
  }
  return all
}

const sheetNumbers = (places: ReadonlyMap<string, Place>): ReadonlyMap<string, number> =>
  new Map([...places].map(([id, { page }]) => [id, page + 1]))

const sameSheets = (before: ReadonlyMap<string, Place>, after: ReadonlyMap<string, Place>): boolean =>
  before.size === after.size && [...before].every(([id, { page }]) => after.get(id)?.page === page)
