/** Reads XML as far as a picture needs it: elements, attributes and text, and whether they close. */
import { bad, good, type Outcome } from '../base/outcome.ts'

export interface Element {
  readonly name: string
  readonly attributes: ReadonlyMap<string, string>
  readonly children: readonly Element[]
  /** The text that stands in the element itself. */
  readonly text: string
}

interface Open {
  readonly name: string
  readonly attributes: ReadonlyMap<string, string>
  readonly children: Element[]
  text: string
}

/** Deeper than this is no drawing; a browser gives up too. */
const DEEPEST = 200
const MOST = 100_000

const NAME = '[\\p{L}_][\\p{L}\\p{N}_.-]*(?::[\\p{L}_][\\p{L}\\p{N}_.-]*)?'
/** Made when the first picture is read, since patterns of all letters take long to make. */
const patterns = () => ({
  markup: new RegExp(
    `<!--[^]*?-->|<\\?[^]*?\\?>|<!\\[CDATA\\[([^]*?)\\]\\]>|<!DOCTYPE[^<>\\[]*>|<(/?)(${NAME})((?:\\s+${NAME}\\s*=\\s*(?:"[^"<]*"|'[^'<]*'))*)\\s*(/?)>`,
    'uy',
  ),
  attribute: new RegExp(`(${NAME})\\s*=\\s*(?:"([^"]*)"|'([^']*)')`, 'gu'),
})
let made: ReturnType<typeof patterns> | undefined

function patternsOnce(): ReturnType<typeof patterns> {
  made ??= patterns()
  return made
}

export function elementsOf(source: string): Outcome<{ readonly root: Element; readonly all: readonly Element[] }> {
  const { markup } = patternsOnce()
  const all: Element[] = []
  const open: Open[] = [{ name: '', attributes: new Map(), children: [], text: '' }]
  for (let at = 0; at < source.length; ) {
    const inner = open.at(-1)
    if (inner === undefined) return bad('an element is closed twice')
    if (source[at] !== '<') {
      const end = source.indexOf('<', at)
      const text = source.slice(at, end === -1 ? source.length : end)
      if (open.length === 1 && text.trim() !== '') return bad('text stands outside its elements')
      inner.text += withoutEntities(text)
      at += text.length
      continue
    }
    markup.lastIndex = at
    const found = markup.exec(source)
    if (found === null && source.startsWith('<!DOCTYPE', at)) return bad('its document type declares something')
    if (found === null) return bad(`no sense can be made of ${quoted(source, at)}`)
    at += found[0].length
    const [whole, data, closes, name, written = '', closed] = found
    if (/^<\?xml-stylesheet/i.test(whole)) return bad('it asks for a style sheet')
    inner.text += data ?? ''
    if (name === undefined) continue
    if (closes === '/') {
      if (inner.name !== name || open.length === 1)
        return bad(`${name} is closed and ${inner.name || 'nothing'} is open`)
      open.pop()
      finish(inner, open.at(-1), all)
      continue
    }
    const attributes = attributesOf(written)
    if (attributes === undefined) return bad(`an attribute of ${name} stands twice`)
    if (open.length > DEEPEST) return bad(`its elements stand more than ${DEEPEST} deep`)
    if (all.length + open.length > MOST) return bad(`it has more than ${MOST} elements`)
    const made: Open = { name, attributes, children: [], text: '' }
    if (closed === '/') finish(made, inner, all)
    else open.push(made)
  }
  const [outermost] = open
  const [root, second] = outermost?.children ?? []
  if (open.length > 1) return bad(`${open.at(-1)?.name ?? ''} is not closed`)
  if (root === undefined || second !== undefined) return bad('it does not hold one element')
  return good({ root, all })
}

function finish(element: Open, outer: Open | undefined, all: Element[]): void {
  outer?.children.push(element)
  all.push(element)
}

function attributesOf(written: string): ReadonlyMap<string, string> | undefined {
  const attributes = new Map<string, string>()
  for (const [, name = '', double, single] of written.matchAll(patternsOnce().attribute)) {
    if (attributes.has(name)) return undefined
    attributes.set(name, withoutEntities(double ?? single ?? ''))
  }
  return attributes
}

const named: Readonly<Record<string, string>> = { lt: '<', gt: '>', amp: '&', quot: '"', apos: "'" }

/** Signs by name or number as themselves. */
const withoutEntities = (text: string): string =>
  text.replace(/&(?:#(\d+)|#x([0-9a-f]+)|(\w+));/gi, (whole, decimal?: string, hex?: string, name?: string) => {
    if (name !== undefined) return named[name] ?? whole
    const code = decimal === undefined ? Number.parseInt(hex ?? '', 16) : Number(decimal)
    return code <= 0x10ffff ? String.fromCodePoint(code) : whole
  })

const quoted = (source: string, at: number): string => source.slice(at, at + 30).split(/[\r\n]/)[0] ?? ''
