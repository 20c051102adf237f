/** The pictures that the prose of a document names. */
import type { Definition, Image, ImageReference } from 'mdast'
import type { Diagnostic } from '../base/diagnostic.ts'
import { bad, type Outcome } from '../base/outcome.ts'
import { leftAlone, type Nearby } from './nearby.ts'
import { megabytes, type Picture, pictureOf } from './picture.ts'
import { diagnose } from './text.ts'

export type PictureNode = Image | ImageReference

export interface PlacedPicture {
  readonly picture: Picture
  /** The file as the document writes it, without escapes. */
  readonly path: string
  readonly alt: string
  readonly title: string
}

/** Each picture that was found, by its node in the tree. */
export type Pictures = ReadonlyMap<PictureNode, PlacedPicture>

export interface ReadPictures {
  readonly pictures: Pictures
  readonly faults: readonly Diagnostic[]
}

/** All pictures of a document together: beyond this its page does not go by mail. */
const MOST_TOGETHER = 10 * 1024 * 1024

export function readPictures(
  nodes: readonly PictureNode[],
  definitions: readonly Definition[],
  nearby: Nearby,
): ReadPictures {
  const pictures = new Map<PictureNode, PlacedPicture>()
  const faults: Diagnostic[] = []
  if (nearby === leftAlone) return { pictures, faults }
  const read = onceEach(path => (path.includes('\0') ? bad('it is no name of a file') : nearby.read(path)))
  const recognised = onceEach(path => {
    const bytes = read(path)
    return bytes.ok ? pictureOf(bytes.value) : bytes
  })
  let together = 0
  for (const node of nodes) {
    const alt = (node.alt ?? '').trim()
    const tell = (told: Told) => faults.push(warning(node, told))
    if (alt === '')
      tell({
        rule: 'picture-undescribed',
        what: 'this picture has no description',
        help: 'Say between the brackets what it shows, for a reader who does not see it: ![plan of the site](site.png).',
      })
    const { url, title } = node.type === 'image' ? node : definitionOf(node, definitions)
    const elsewhere = elsewhereIn(url)
    if (elsewhere !== undefined) {
      const help = 'Put the file beside the document and name it from there: pictures/site.png.'
      tell({ rule: 'picture-elsewhere', what: elsewhere, help })
      continue
    }
    const path = decoded(url)
    const bytes = read(path)
    if (!bytes.ok) {
      tell({ rule: 'picture-unreadable', what: `${path}: ${bytes.because}`, help: IN_ITS_PLACE })
      continue
    }
    const found = recognised(path)
    if (!found.ok) {
      tell({ rule: 'picture-refused', what: `${path}: ${found.because}`, help: IN_ITS_PLACE })
      continue
    }
    if (together + found.value.bytes.length > MOST_TOGETHER) {
      const what = `${path}: with it the pictures of this document have more than ${megabytes(MOST_TOGETHER)} MB`
      tell({ rule: 'picture-refused', what, help: 'Save pictures smaller: a page is no more than 2000 pixels wide.' })
      continue
    }
    together += found.value.bytes.length
    pictures.set(node, { picture: found.value, path, alt, title: (title ?? '').trim() })
  }
  return { pictures, faults }
}

interface Told {
  readonly rule: 'picture-undescribed' | 'picture-elsewhere' | 'picture-unreadable' | 'picture-refused'
  readonly what: string
  readonly help: string
}

const IN_ITS_PLACE = 'The page shows its description in place of it.'

const warning = (node: PictureNode, { rule, what, help }: Told): Diagnostic => {
  const start = node.position?.start.offset ?? 0
  return diagnose('warning', rule, { start, end: node.position?.end.offset ?? start }, what, help)
}

/** The first definition of a name is the one that holds. */
const definitionOf = (
  { identifier }: ImageReference,
  definitions: readonly Definition[],
): Pick<Image, 'url' | 'title'> => definitions.find(definition => definition.identifier === identifier) ?? { url: '' }

/** Why an address does not lead to a file by its way from the document, or undefined. */
function elsewhereIn(url: string): string | undefined {
  const shown = url.length > 60 ? `${url.slice(0, 60)}…` : url
  if (url === '') return 'this picture names no file'
  if (/^data:/i.test(url)) return 'this picture is written into the document itself, and is not read from there'
  if (/^(?:[\\/]|file:|[a-z]:)/i.test(url) && !/^[\\/]{2}/.test(url))
    return `this picture is at ${shown}, a place on one machine only`
  if (/^(?:[a-z][a-z0-9+.-]*:|[\\/]{2})/i.test(url)) return `this picture is at ${shown}, and a page fetches nothing`
  return undefined
}

/** An address writes a space as `%20`; a file does not. */
function decoded(url: string): string {
  try {
    return decodeURIComponent(url)
  } catch {
    return url
  }
}

/** The same answer for the same path, worked once. */
function onceEach<T>(work: (path: string) => Outcome<T>): (path: string) => Outcome<T> {
  const known = new Map<string, Outcome<T>>()
  return path => {
    const answer = known.get(path) ?? work(path)
    known.set(path, answer)
    return answer
  }
}
