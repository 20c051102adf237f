/** PDF objects at the level of pdf-lib's own: reading them through references, and moving them between documents. */
import {
  ParseSpeeds,
  PDFArray,
  type PDFContext,
  PDFDict,
  PDFDocument,
  PDFHexString,
  PDFName,
  PDFNumber,
  type PDFObject,
  PDFRef,
  PDFStream,
  PDFString,
} from 'pdf-lib'

export const name = (text: string): PDFName => PDFName.of(text)

export const openPdf = (bytes: Uint8Array): Promise<PDFDocument> =>
  PDFDocument.load(bytes, { updateMetadata: false, parseSpeed: ParseSpeeds.Fastest })

/** The entry of a dictionary, through a reference if it is one. */
export function entry(context: PDFContext, dict: PDFDict | undefined, key: string): PDFObject | undefined {
  const found = dict?.get(name(key))
  return found instanceof PDFRef ? context.lookup(found) : found
}

export function dictEntry(context: PDFContext, dict: PDFDict | undefined, key: string): PDFDict | undefined {
  const found = entry(context, dict, key)
  return found instanceof PDFDict ? found : undefined
}

/** What an entry holds, one thing or several, as they stand there. */
export function listEntry(context: PDFContext, dict: PDFDict | undefined, key: string): readonly PDFObject[] {
  const found = entry(context, dict, key)
  if (found instanceof PDFArray) return found.asArray()
  const direct = dict?.get(name(key))
  return direct === undefined ? [] : [direct]
}

export function numberEntry(context: PDFContext, dict: PDFDict, key: string): number | undefined {
  const found = entry(context, dict, key)
  return found instanceof PDFNumber ? found.asNumber() : undefined
}

export const isNamed = (object: PDFObject | undefined, text: string): boolean => object === name(text)

export const textOf = (object: PDFObject | undefined): string | undefined =>
  object instanceof PDFString || object instanceof PDFHexString ? object.decodeText() : undefined

/** Moves every object of a document behind those of another. @returns what an object number grows by */
export function moveInto(context: PDFContext, from: PDFContext): number {
  const shift = context.largestObjectNumber
  for (const [ref, object] of from.enumerateIndirectObjects()) {
    shiftWithin(object, shift)
    context.assign(PDFRef.of(ref.objectNumber + shift, ref.generationNumber), object)
  }
  return shift
}

const shifted = (ref: PDFRef, shift: number): PDFRef => PDFRef.of(ref.objectNumber + shift, ref.generationNumber)

function shiftWithin(object: PDFObject, shift: number): void {
  if (object instanceof PDFArray) {
    for (let i = 0; i < object.size(); i++) {
      const item = object.get(i)
      if (item instanceof PDFRef) object.set(i, shifted(item, shift))
      else shiftWithin(item, shift)
    }
  } else if (object instanceof PDFDict) {
    for (const [key, value] of object.entries())
      if (value instanceof PDFRef) object.set(key, shifted(value, shift))
      else shiftWithin(value, shift)
  } else if (object instanceof PDFStream) shiftWithin(object.dict, shift)
}

/** Deletes what nothing leads to any more from the catalog and the properties. */
export function dropUnreachable(context: PDFContext): void {
  const { Root, Info } = context.trailerInfo
  const seen = new Set<PDFRef>()
  const waiting: (PDFObject | undefined)[] = [Root, Info]
  while (waiting.length > 0) {
    const object = waiting.pop()
    if (object instanceof PDFRef) {
      if (!seen.has(object)) waiting.push(context.lookup(object))
      seen.add(object)
    } else if (object instanceof PDFArray) waiting.push(...object.asArray())
    else if (object instanceof PDFDict) waiting.push(...object.values())
    else if (object instanceof PDFStream) waiting.push(...object.dict.values())
  }
  for (const [ref] of context.enumerateIndirectObjects()) if (!seen.has(ref)) context.delete(ref)
}
