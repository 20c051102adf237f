/** Reads a sketch back from its bytes, without help from the code that drew it, except for the estimate of text widths. */
import { type Box, boundsOfBox, box, boxesMeet } from '../../src/draw/geometry.ts'
import { type TextRole, textStyles } from '../../src/draw/style.ts'
import { textWidth } from '../../src/draw/textwidth.ts'

export interface ReadElement {
  readonly tag: string
  readonly attributes: Readonly<Record<string, string>>
  readonly children: readonly (ReadElement | string)[]
}

interface Open {
  readonly tag: string
  readonly attributes: Readonly<Record<string, string>>
  readonly children: (ReadElement | string)[]
}

const token = /<(\/?)([a-zA-Z]+)((?: [a-zA-Z:-]+="[^"<]*")*)(\/?)>|([^<]+)/y
const entities: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"' }

/** A strict reader of the little XML that a sketch uses; throws on anything else. */
export function readXml(text: string): ReadElement {
  const stack: Open[] = [{ tag: '', attributes: {}, children: [] }]
  token.lastIndex = 0
  while (token.lastIndex < text.length) {
    const match = token.exec(text)
    if (match === null) throw new Error('not well-formed')
    take(stack, match)
  }
  const only = stack[0]?.children[0]
  if (stack.length !== 1 || stack[0]?.children.length !== 1 || only === undefined || typeof only === 'string') {
    throw new Error('not one element')
  }
  return only
}

function take(stack: Open[], [, close, tag = '', attributes = '', empty, text]: RegExpExecArray): void {
  const top = stack.at(-1)
  if (top === undefined) throw new Error('closed twice')
  if (text !== undefined) top.children.push(plain(text))
  else if (close === '/') {
    if (top.tag !== tag) throw new Error(`</${tag}> closes <${top.tag}>`)
    stack.pop()
    stack.at(-1)?.children.push(top)
  } else {
    const opened: Open = { tag, attributes: readAttributes(attributes), children: [] }
    if (empty === '/') top.children.push(opened)
    else stack.push(opened)
  }
}

function readAttributes(text: string): Readonly<Record<string, string>> {
  return Object.fromEntries(
    [...text.matchAll(/ ([a-zA-Z:-]+)="([^"]*)"/g)].map(([, name, value]) => [name, plain(value ?? '')]),
  )
}

function plain(text: string): string {
  if (/&(?!(amp|lt|gt|quot);)/.test(text) || text.includes('>')) throw new Error('not escaped')
  return text.replace(/&(\w+);/g, (_, name: string) => entities[name] ?? '')
}

export function all(root: ReadElement, wanted: (e: ReadElement) => boolean): readonly ReadElement[] {
  const below = root.children.flatMap(child => (typeof child === 'string' ? [] : all(child, wanted)))
  return wanted(root) ? [root, ...below] : below
}

export function withClass(root: ReadElement, name: string): readonly ReadElement[] {
  return all(root, e => (e.attributes.class ?? '').split(' ').includes(name))
}

/** The characters of an element itself, not of those in it. */
export function ownText(e: ReadElement): string {
  return e.children.filter(child => typeof child === 'string').join('')
}

export interface ReadText {
  readonly text: string
  readonly role: TextRole
  readonly box: Box
  /** Radians, as set. */
  readonly angle: number
  readonly full?: string
}

/** Every text of a sketch with the box that its letters fill. */
export function textsOf(root: ReadElement): readonly ReadText[] {
  return all(root, ({ tag }) => tag === 'text').map(e => {
    const names = (e.attributes.class ?? '').split(' ')
    const role = names.find(name => name.startsWith('pm-t-'))?.slice(5) as TextRole | undefined
    if (role === undefined || textStyles[role] === undefined) throw new Error(`text without a role: ${ownText(e)}`)
    const style = textStyles[role]
    const width = textWidth(ownText(e), style)
    const { x, y, angle } = placeOf(e)
    const aside = names.includes('pm-start') ? width / 2 : names.includes('pm-end') ? -width / 2 : 0
    const rise = style.size * 0.34
    const at = {
      x: x + aside * Math.cos(angle) + rise * Math.sin(angle),
      y: y + aside * Math.sin(angle) - rise * Math.cos(angle),
    }
    const title = e.children.find(child => typeof child !== 'string' && child.tag === 'title')
    const full = title === undefined || typeof title === 'string' ? {} : { full: ownText(title) }
    return { text: ownText(e), role, angle, box: box(at, width, style.size * 1.15, angle), ...full }
  })
}

function placeOf({ attributes }: ReadElement): { readonly x: number; readonly y: number; readonly angle: number } {
  const turned = /^translate\( (\S+) (\S+) \) rotate\( (\S+) \)$/.exec(attributes.transform ?? '')
  if (turned === null) return { x: Number(attributes.x), y: Number(attributes.y), angle: 0 }
  return { x: Number(turned[1]), y: Number(turned[2]), angle: (Number(turned[3]) * Math.PI) / 180 }
}

/** Ends of a path that is one straight stroke, or the first stroke of an arrow. */
export function firstStroke(e: ReadElement): readonly [number, number, number, number] {
  const [x0 = Number.NaN, y0 = Number.NaN, x1 = Number.NaN, y1 = Number.NaN] = (e.attributes.d ?? '')
    .split(' ')
    .filter(word => !/[A-Z]/.test(word))
    .map(Number)
  return [x0, y0, x1, y1]
}

export interface ReadPoint {
  readonly x: number
  readonly y: number
}

/** The corners of a path of straight strokes. */
export function pathPoints(e: ReadElement | undefined): readonly ReadPoint[] {
  const numbers = (e?.attributes.d ?? '')
    .split(' ')
    .filter(word => !/[A-Z]/.test(word))
    .map(Number)
  return numbers.flatMap((x, idx) => (idx % 2 === 0 ? [{ x, y: numbers[idx + 1] ?? Number.NaN }] : []))
}

export const apart = (a: ReadPoint | undefined, b: ReadPoint | undefined): number =>
  a && b ? Math.hypot(a.x - b.x, a.y - b.y) : Number.NaN

/** Pairs of texts that overlap. */
export function overlapsOf(root: ReadElement): readonly string[] {
  const texts = textsOf(root).filter(({ text }) => text.trim() !== '')
  return texts.flatMap((a, idx) =>
    texts.slice(idx + 1).flatMap(b => (boxesMeet(a.box, b.box) ? [`${a.text} / ${b.text}`] : [])),
  )
}

export const viewBox = (root: ReadElement): readonly number[] => (root.attributes.viewBox ?? '').split(' ').map(Number)

/** Texts that leave the sheet. */
export function offSheet(root: ReadElement): readonly string[] {
  const [x = 0, y = 0, width = 0, height = 0] = viewBox(root)
  return textsOf(root).flatMap(({ text, box }) => {
    const { x0, y0, x1, y1 } = boundsOfBox(box)
    return x0 >= x - 1 && y0 >= y - 1 && x1 <= x + width + 1 && y1 <= y + height + 1 ? [] : [text]
  })
}
