/** Printed lots as one document: pages in order, links across, one tree of tags. */
import { type PDFContext, PDFDict, type PDFDocument, PDFName, PDFNumber, PDFRef } from 'pdf-lib'
import { AWAY, idAt } from './lots.ts'
import { dictEntry, entry, listEntry, moveInto, name, textOf } from './objects.ts'
import { type Joined, joinTags } from './tags.ts'

/** A lot as the browser printed it. */
export interface PrintedLot {
  readonly document: PDFDocument
  /** Its first page is blank and falls away. */
  readonly led: boolean
}

/** Where something stands: a page of its document from 0, and the height on it in points from the foot. */
export interface Place {
  readonly page: number
  readonly y: number
}

export const sheetsIn = ({ document, led }: PrintedLot): number => document.getPageCount() - (led ? 1 : 0)

/** The places of everything that is linked to, by id; pages counted without the blank one. */
export function placesIn({ document, led }: PrintedLot): ReadonlyMap<string, Place> {
  const { context, catalog } = document
  const numberOf = new Map(document.getPages().map(({ ref }, i) => [ref, led ? i - 1 : i]))
  const dests = dictEntry(context, catalog, 'Dests')
  return new Map(
    (dests?.keys() ?? []).flatMap((key): readonly (readonly [string, Place])[] => {
      const [page, , , y] = listEntry(context, dests, key.decodeText())
      const number = page instanceof PDFRef ? numberOf.get(page) : undefined
      if (number === undefined) return []
      return [[idAt(key.decodeText()), { page: number, y: y instanceof PDFNumber ? y.asNumber() : 0 }]]
    }),
  )
}

/** Joins the lots into the first of them. @returns its pages in order */
export function joinLots(lots: readonly PrintedLot[]): readonly PDFRef[] {
  const [first] = lots
  if (first === undefined) return []
  const { context } = first.document
  const parts: Joined[] = []
  const pages: PDFRef[] = []
  for (const lot of lots) {
    const { document, led } = lot
    const own = document.getPages().map(({ ref }) => ref)
    const root = rootOf(document)
    const objects = document.context.enumerateIndirectObjects()
    const shift = lot === first ? 0 : moveInto(context, document.context)
    const moved = (ref: PDFRef) => PDFRef.of(ref.objectNumber + shift, ref.generationNumber)
    const kept = own.slice(led ? 1 : 0).map(moved)
    pages.push(...kept)
    parts.push({
      catalog: context.lookup(moved(root), PDFDict),
      pages: kept.map(ref => context.lookup(ref, PDFDict)),
      objects: objects.map(([ref, object]) => [moved(ref), object]),
    })
  }
  joinDestinations(context, parts)
  joinTags(context, parts)
  for (const { pages: own } of parts) for (const page of own) turnLinks(context, page)
  keepPages(context, parts, pages)
  return pages
}

function rootOf({ context }: PDFDocument): PDFRef {
  const { Root } = context.trailerInfo
  if (!(Root instanceof PDFRef)) throw new Error('the printed document has no catalog')
  return Root
}

function joinDestinations(context: PDFContext, parts: readonly Joined[]): void {
  const all = context.obj({})
  for (const { catalog } of parts) {
    const dests = dictEntry(context, catalog, 'Dests')
    for (const [key, place] of dests?.entries() ?? []) if (!all.has(key)) all.set(key, place)
  }
  parts[0]?.catalog.set(name('Dests'), context.register(all))
}

/** An address that stood for a place in another lot becomes that place. */
function turnLinks(context: PDFContext, page: PDFDict): void {
  for (const link of listEntry(context, page, 'Annots')) {
    const annotation = link instanceof PDFRef ? context.lookup(link) : link
    if (!(annotation instanceof PDFDict)) continue
    const address = textOf(entry(context, dictEntry(context, annotation, 'A'), 'URI'))
    if (address?.startsWith(`${AWAY}#`) !== true) continue
    annotation.delete(name('A'))
    annotation.set(name('Dest'), PDFName.of(address.slice(AWAY.length + 1)))
  }
}

/** One flat list of pages in the place of each document's own tree. */
function keepPages(context: PDFContext, parts: readonly Joined[], pages: readonly PDFRef[]): void {
  const tree = context.register(context.obj({ Type: 'Pages', Kids: [...pages], Count: pages.length }))
  for (const ref of pages) context.lookup(ref, PDFDict).set(name('Parent'), tree)
  parts[0]?.catalog.set(name('Pages'), tree)
}
