/**
 * An SVG that a page may show: well formed, whole in itself, and with nothing in it that acts. A browser runs
 * no script of a picture and fetches nothing for one; the file is refused all the same, since it may be
 * opened alone.
 */
import { bad, good, type Outcome } from '../base/outcome.ts'
import type { Pixels } from './raster.ts'
import { type Element, elementsOf } from './xml.ts'

const NAMESPACE = 'http://www.w3.org/2000/svg'

/** @returns its size where it states one; undefined for a file that is no SVG at all */
export function svgOf(bytes: Uint8Array): Outcome<Pixels | undefined> | undefined {
  const text = decoded(bytes)
  if (text === undefined || !/^\s*</.test(text) || !/<(?:[\w-]+:)?svg[\s>/]/i.test(text)) return undefined
  const read = elementsOf(text)
  if (!read.ok) return bad(`it is an SVG that cannot be read: ${read.because}`)
  const { root, all } = read.value
  if (localName(root.name) !== 'svg' || namespaceOf(root) !== NAMESPACE)
    return bad(`it is an SVG that a browser does not show: its first element is not svg of ${NAMESPACE}`)
  const refused = all.map(refusal).find(reason => reason !== undefined)
  if (refused !== undefined) return bad(`it is an SVG with ${refused}`)
  if (drawnBy(root, all) > MOST_DRAWN) return bad('it is an SVG whose parts repeat one another without end, or nearly')
  return good(sizeOf(root))
}

function decoded(bytes: Uint8Array): string | undefined {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return undefined
  }
}

const localName = (name: string): string => name.slice(name.indexOf(':') + 1)

const namespaceOf = ({ name, attributes }: Element): string | undefined =>
  attributes.get(name.includes(':') ? `xmlns:${name.slice(0, name.indexOf(':'))}` : 'xmlns')

/** Elements that act, or that bring something else in. */
const acting: readonly string[] = [
  'script',
  'foreignobject',
  'handler',
  'listener',
  'iframe',
  'object',
  'embed',
  'audio',
  'video',
  'canvas',
]

/** What an element holds that a picture may not, or undefined. */
function refusal({ name, attributes, text }: Element): string | undefined {
  const local = localName(name).toLowerCase()
  if (acting.includes(local)) return `an element ${localName(name)}`
  for (const [key, value] of attributes) {
    const attribute = localName(key).toLowerCase()
    if (/^on/.test(attribute)) return `an event handler ${key}`
    if (key.toLowerCase() === 'xml:base') return 'a base address'
    if ((attribute === 'href' || attribute === 'src') && !isInside(value)) return `a reference to ${shown(value)}`
    if (/^\s*(?:java|vb)script:/i.test(value)) return `a script in ${key}`
    const reason = attribute === 'style' ? styleRefusal(value) : referenceIn(value)
    if (reason !== undefined) return reason
  }
  return local === 'style' ? styleRefusal(text) : undefined
}

/** A part of the picture, or a picture within it. */
const isInside = (address: string): boolean =>
  /^\s*(?:$|#)/.test(address) || /^\s*data:image\/(?:png|jpeg|gif|webp)[;,]/i.test(address)

function styleRefusal(style: string): string | undefined {
  if (/@import/i.test(style)) return 'a style sheet from elsewhere'
  // CSS may write any letter by its number, and so hide what it names.
  if (/\\[0-9a-f]/i.test(style)) return 'letters by number in a style'
  return referenceIn(style)
}

/** Fonts may be in the file as pictures may. */
function referenceIn(style: string): string | undefined {
  for (const [, , address = ''] of style.matchAll(/\b(?:url|image|src)\(\s*(["']?)(.*?)\1\s*\)/gis))
    if (!isInside(address) && !/^\s*data:(?:font\/|application\/(?:x-)?font)/i.test(address))
      return `a reference to ${shown(address)}`
  return undefined
}

const shown = (address: string): string => {
  const plain = address.trim().replace(/\s+/g, ' ')
  return plain.length > 60 ? `${plain.slice(0, 60)}…` : plain
}

/** Elements that a browser comes to draw. A few that show one another ten times over would hang it. */
const MOST_DRAWN = 200_000

function drawnBy(root: Element, all: readonly Element[]): number {
  const byId = new Map(
    all.flatMap(element => (element.attributes.has('id') ? [[element.attributes.get('id'), element]] : [])),
  )
  const known = new Map<Element, number>()
  const open = new Set<Element>()
  const drawn = (element: Element): number => {
    const counted = known.get(element)
    if (counted !== undefined) return counted
    if (open.has(element)) return Number.POSITIVE_INFINITY
    open.add(element)
    const shows = localName(element.name) === 'use' ? byId.get(hrefOf(element)) : undefined
    const total = [...element.children, ...(shows ? [shows] : [])].reduce((sum, each) => sum + drawn(each), 1)
    open.delete(element)
    known.set(element, total)
    return total
  }
  return drawn(root)
}

const hrefOf = ({ attributes }: Element): string =>
  (attributes.get('href') ?? attributes.get('xlink:href') ?? '').trim().slice(1)

/** CSS pixels of a length in each unit. Source: CSS Values and Units, section 6.2. */
const units: Readonly<Record<string, number>> = {
  '': 1,
  px: 1,
  in: 96,
  cm: 96 / 2.54,
  mm: 96 / 25.4,
  pt: 96 / 72,
  pc: 16,
}

/** Width and height as stated, or as the view box has them; where one is missing, in its proportion. */
function sizeOf({ attributes }: Element): Pixels | undefined {
  const box = (attributes.get('viewBox') ?? '')
    .trim()
    .split(/[\s,]+/)
    .map(Number)
  const [, , across = Number.NaN, down = Number.NaN] = box
  const [width, height] = [pixels(attributes.get('width')), pixels(attributes.get('height'))]
  if (width && height) return { width, height }
  if (!(across > 0 && down > 0)) return undefined
  if (width) return { width, height: (width * down) / across }
  if (height) return { width: (height * across) / down, height }
  return { width: across, height: down }
}

function pixels(length: string | undefined): number | undefined {
  const [, size = '', unit = ''] = /^\s*\+?(\d*\.?\d+(?:e[+-]?\d+)?)\s*([a-z]*)\s*$/i.exec(length ?? '') ?? []
  const scale = units[unit.toLowerCase()]
  const value = Number(size) * (scale ?? Number.NaN)
  return size !== '' && value > 0 && Number.isFinite(value) ? value : undefined
}
