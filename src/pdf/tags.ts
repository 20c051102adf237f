/** The structure trees of several documents as one: what a reader by ear walks through. */
import { PDFArray, type PDFContext, PDFDict, PDFNumber, type PDFObject, PDFRef, PDFString } from 'pdf-lib'
import { dictEntry, entry, isNamed, listEntry, name, numberEntry, textOf } from './objects.ts'

/** A document within the joined one. */
export interface Joined {
  readonly catalog: PDFDict
  readonly pages: readonly PDFDict[]
  readonly objects: readonly (readonly [PDFRef, PDFObject])[]
}

/** Makes the tree of the first document hold those of all. Keys and ids are given anew, in order. */
export function joinTags(context: PDFContext, parts: readonly Joined[]): void {
  const [root, ...others] = parts.map(({ catalog }) => dictEntry(context, catalog, 'StructTreeRoot'))
  const top = root?.get(name('K'))
  const topElement = dictEntry(context, root, 'K')
  if (root === undefined || topElement === undefined || top === undefined) return
  const kids = [...listEntry(context, topElement, 'K')]
  for (const other of others) {
    const otherTop = dictEntry(context, other, 'K')
    for (const kid of listEntry(context, otherTop, 'K')) {
      const element = kid instanceof PDFRef ? context.lookup(kid) : kid
      if (element instanceof PDFDict) element.set(name('P'), top)
      kids.push(kid)
    }
  }
  topElement.set(name('K'), context.obj(kids))
  const parents = parentTree(context, parts)
  root.set(name('ParentTree'), context.register(context.obj({ Nums: parents })))
  root.set(name('ParentTreeNextKey'), PDFNumber.of(parents.length / 2))
  root.set(name('IDTree'), context.register(context.obj({ Names: idTree(context, parts) })))
}

/** From a page or a link back to its elements: each page and link has a key in one tree. */
function parentTree(context: PDFContext, parts: readonly Joined[]): PDFObject[] {
  const all: PDFObject[] = []
  for (const { catalog, pages } of parts) {
    const structure = dictEntry(context, catalog, 'StructTreeRoot')
    const parents = new Map(numbersIn(context, dictEntry(context, structure, 'ParentTree')))
    const renew = (holder: PDFDict, key: string) => {
      const old = numberEntry(context, holder, key)
      const parent = old === undefined ? undefined : parents.get(old)
      if (parent === undefined) {
        holder.delete(name(key))
        return
      }
      const next = PDFNumber.of(all.length / 2)
      holder.set(name(key), next)
      all.push(next, parent)
    }
    for (const page of pages) {
      renew(page, 'StructParents')
      for (const link of listEntry(context, page, 'Annots')) {
        const holder = link instanceof PDFRef ? context.lookup(link) : link
        if (holder instanceof PDFDict) renew(holder, 'StructParent')
      }
    }
  }
  return all
}

function numbersIn(context: PDFContext, tree: PDFDict | undefined): readonly (readonly [number, PDFObject])[] {
  const nums = listEntry(context, tree, 'Nums')
  const own = nums.flatMap((key, i) => {
    const value = nums[i + 1]
    return i % 2 === 0 && key instanceof PDFNumber && value !== undefined ? [[key.asNumber(), value] as const] : []
  })
  const kids = listEntry(context, tree, 'Kids').map(kid => (kid instanceof PDFRef ? context.lookup(kid) : kid))
  return [...own, ...kids.flatMap(kid => (kid instanceof PDFDict ? numbersIn(context, kid) : []))]
}

/** Cells name their heads by id. The browser counts ids on from document to document; the same source must give the same. */
function idTree(context: PDFContext, parts: readonly Joined[]): PDFObject[] {
  const all: PDFObject[] = []
  for (const { objects } of parts) {
    const elements = objects.flatMap(([ref, object]) =>
      object instanceof PDFDict && isNamed(object.get(name('Type')), 'StructElem') ? [[ref, object] as const] : [],
    )
    const renamed = new Map<string, PDFString>()
    for (const [ref, element] of elements) {
      const old = textOf(element.get(name('ID')))
      if (old === undefined) continue
      const id = PDFString.of(`cell${String(all.length / 2).padStart(8, '0')}`)
      renamed.set(old, id)
      element.set(name('ID'), id)
      all.push(id, ref)
    }
    for (const [, element] of elements) renameHeads(context, element, renamed)
  }
  return all
}

function renameHeads(context: PDFContext, element: PDFDict, renamed: ReadonlyMap<string, PDFString>): void {
  for (const attributes of listEntry(context, element, 'A')) {
    const heads = attributes instanceof PDFDict ? entry(context, attributes, 'Headers') : undefined
    if (!(heads instanceof PDFArray)) continue
    for (let i = 0; i < heads.size(); i++) {
      const id = renamed.get(textOf(heads.get(i)) ?? '')
      if (id !== undefined) heads.set(i, id)
    }
  }
}
