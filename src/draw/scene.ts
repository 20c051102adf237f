/** A drawing as a tree of elements, and the only place where it turns into text. */

export type Attributes = Readonly<Record<string, string | number | undefined>>

export interface SceneElement {
  readonly tag: string
  readonly attributes: Attributes
  readonly children: readonly SceneNode[]
}

/** A string is character data: it is always escaped, never markup. */
export type SceneNode = SceneElement | string

export function element(tag: string, attributes: Attributes, children: readonly SceneNode[] = []): SceneElement {
  return { tag, attributes, children }
}

/** Elements under one class, or nothing at all when there are none. */
export function layer(className: string, children: readonly SceneNode[]): readonly SceneNode[] {
  return children.length === 0 ? [] : [element('g', { class: className }, children)]
}

/** Rounded to 0.001, without a negative zero, so that the bytes do not hang on the last bit of a float. */
export function formatNumber(value: number): string {
  const rounded = Math.round(value * 1000) / 1000
  return String(rounded === 0 ? 0 : rounded)
}

/** Numbers and words of a path or transform, joined by spaces. */
export function words(...parts: readonly (string | number)[]): string {
  return parts.map(part => (typeof part === 'number' ? formatNumber(part) : part)).join(' ')
}

export function serialise(node: SceneNode): string {
  if (typeof node === 'string') return escapeText(node)
  const attributes = Object.entries(node.attributes).flatMap(([name, value]) =>
    value === undefined
      ? []
      : [` ${name}="${escapeAttribute(typeof value === 'number' ? formatNumber(value) : value)}"`],
  )
  const open = `<${node.tag}${attributes.join('')}`
  if (node.children.length === 0) return `${open}/>`
  return `${open}>${node.children.map(serialise).join('')}</${node.tag}>`
}

function escapeText(text: string): string {
  return onlyXmlCharacters(text).replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')
}

function escapeAttribute(text: string): string {
  return escapeText(text).replaceAll('"', '&quot;')
}

/** Nearly every text: looked at as a whole before it is looked at sign by sign. */
const ORDINARY = /^[\t\n\r -\ud7ff]*$/

/** XML has no place, even escaped, for most control characters and for half a surrogate pair. */
function onlyXmlCharacters(text: string): string {
  if (ORDINARY.test(text)) return text
  return Array.from(text, sign => (isXmlCharacter(sign.codePointAt(0) ?? 0) ? sign : '\ufffd')).join('')
}

function isXmlCharacter(code: number): boolean {
  if (code < 0x20) return code === 0x09 || code === 0x0a || code === 0x0d
  return code < 0xd800 || (code > 0xdfff && code !== 0xfffe && code !== 0xffff)
}
