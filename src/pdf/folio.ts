/** "Sheet n of m" on the sheets of a document that was printed in lots. */
import { type PDFContext, PDFDict, type PDFDocument, PDFRef, PDFStream } from 'pdf-lib'
import { dictEntry, listEntry, moveInto, name } from './objects.ts'

/** Lays each page of `folios` over the page of the same place, marked as no part of the text. */
export function layOver(context: PDFContext, pages: readonly PDFRef[], folios: PDFDocument): void {
  const overlays = folios.getPages().map(({ node }) => node)
  if (overlays.length !== pages.length) throw new Error('there are not as many numbers as sheets')
  moveInto(context, folios.context)
  const before = context.register(context.stream('q\n'))
  const after = context.register(context.stream('\nQ\n/Artifact <</Type /Pagination>> BDC\nq /Folio Do Q\nEMC\n'))
  for (const [i, ref] of pages.entries()) {
    const page = context.lookup(ref, PDFDict)
    const overlay = overlays[i]
    const contents = overlay?.get(name('Contents'))
    const stream = contents instanceof PDFRef ? context.lookup(contents) : undefined
    const resources = dictEntry(context, page, 'Resources')
    if (!(stream instanceof PDFStream) || !(contents instanceof PDFRef) || overlay === undefined || !resources) continue
    stream.dict.set(name('Type'), name('XObject'))
    stream.dict.set(name('Subtype'), name('Form'))
    for (const [key, from] of [
      ['BBox', 'MediaBox'],
      ['Resources', 'Resources'],
    ] as const) {
      const value = overlay.get(name(from))
      if (value !== undefined) stream.dict.set(name(key), value)
    }
    const objects = dictEntry(context, resources, 'XObject') ?? context.obj({})
    objects.set(name('Folio'), contents)
    resources.set(name('XObject'), objects)
    page.set(name('Contents'), context.obj([before, ...listEntry(context, page, 'Contents'), after]))
  }
}
