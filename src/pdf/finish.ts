/** What a reader's program shows beside the sheets: bookmarks, properties; and the marks that make the file this document's own. */
import { PDFDict, type PDFDocument, PDFHexString, PDFName, PDFNumber, PDFRef, PDFString } from 'pdf-lib'
import type { Properties } from '../render/paper.ts'
import type { Place } from './join.ts'
import type { Title } from './lots.ts'
import { name, textOf } from './objects.ts'

/** A heading with the page that it stands on. */
export interface PlacedTitle extends Title, Place {}

interface Branch {
  readonly title: PlacedTitle
  readonly ref: PDFRef
  readonly children: Branch[]
}

/** Bookmarks for the headings, nested by their levels. */
export function addOutline(document: PDFDocument, titles: readonly PlacedTitle[], pages: readonly PDFRef[]): void {
  if (titles.length === 0) return
  const { context, catalog } = document
  const top: Branch[] = []
  const open: Branch[] = []
  for (const title of titles) {
    while ((open.at(-1)?.title.level ?? 0) >= title.level) open.pop()
    const branch = { title, ref: context.nextRef(), children: [] }
    const siblings = open.at(-1)?.children ?? top
    siblings.push(branch)
    open.push(branch)
  }
  const root = context.nextRef()
  const assign = (branches: readonly Branch[], parent: PDFRef) => {
    for (const [i, { title, ref, children }] of branches.entries()) {
      const page = pages[title.page]
      const dict = context.obj({
        Title: PDFHexString.fromText(title.text),
        Parent: parent,
        ...(page === undefined ? {} : { Dest: [page, 'XYZ', 0, title.y, 0] }),
      })
      link(dict, 'Prev', branches[i - 1])
      link(dict, 'Next', branches[i + 1])
      link(dict, 'First', children[0])
      link(dict, 'Last', children.at(-1))
      // Below zero: the entries under this one start out folded away.
      if (children.length > 0) dict.set(name('Count'), PDFNumber.of(-children.length))
      context.assign(ref, dict)
      assign(children, ref)
    }
  }
  assign(top, root)
  const outlines = context.obj({ Type: 'Outlines', Count: top.length })
  link(outlines, 'First', top[0])
  link(outlines, 'Last', top.at(-1))
  context.assign(root, outlines)
  catalog.set(name('Outlines'), root)
  catalog.set(name('PageMode'), name('UseOutlines'))
}

function link(dict: PDFDict, key: string, branch: Branch | undefined): void {
  if (branch !== undefined) dict.set(name(key), branch.ref)
}

/** Title, author and the rest; dates from the document and never from the clock; an id from its source. */
export function setProperties(document: PDFDocument, properties: Properties): void {
  const { context, catalog } = document
  const { title, author, subject, keywords, creator, language, identity } = properties
  const { Info } = context.trailerInfo
  const old = Info instanceof PDFRef ? context.lookup(Info, PDFDict) : undefined
  const producer = textOf(old?.get(name('Producer')))
  const date = pdfDate(properties.date)
  const words = { Title: title, Author: author, Subject: subject, Keywords: keywords.join(', '), Creator: creator }
  const info = context.obj({})
  for (const [key, text] of Object.entries(words))
    if (text !== '') info.set(PDFName.of(key), PDFHexString.fromText(text))
  if (producer !== undefined) info.set(name('Producer'), PDFString.of(producer))
  if (date !== undefined) for (const key of ['CreationDate', 'ModDate']) info.set(name(key), PDFString.of(date))
  if (Info instanceof PDFRef) context.assign(Info, info)
  else context.trailerInfo.Info = context.register(info)
  const id = PDFHexString.of(identity.slice(0, 32))
  context.trailerInfo.ID = context.obj([id, id])
  catalog.set(name('Lang'), PDFString.of(language))
  catalog.set(name('ViewerPreferences'), context.obj({ DisplayDocTitle: true }))
}

/** `2026-11-20` as a PDF has it; nothing for a date in words. */
function pdfDate(date: string): string | undefined {
  const [, year, month, day] = /^(\d{4})-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/.exec(date.trim()) ?? []
  return year === undefined ? undefined : `D:${year}${month}${day}000000Z`
}
