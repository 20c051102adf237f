/** The engineer's own prose as HTML: quotes put in, headings numbered, and nothing let through that could act. */
import type { Element, Root as HastRoot, Text as HastText, Properties } from 'hast'
import { defaultSchema, type Schema, sanitize } from 'hast-util-sanitize'
import { toHtml } from 'hast-util-to-html'
import type { Code, Nodes, Root, RootContent, Text } from 'mdast'
import { defaultHandlers, type State, toHast } from 'mdast-util-to-hast'
import { digitRuns } from '../base/raised.ts'

/** Letters of a listing that stand in a line on the narrowest phone. */
export const LETTERS_PHONE = 26

/** Links may lead out of the page; nothing is fetched from anywhere, and a picture holds itself. */
const schema: Schema = {
  ...defaultSchema,
  clobber: [],
  tagNames: [...(defaultSchema.tagNames ?? []), 'figure', 'figcaption'],
  protocols: { ...defaultSchema.protocols, src: ['data'] },
  attributes: {
    ...defaultSchema.attributes,
    figure: [['className', 'picture']],
    a: [
      'href',
      'ariaDescribedBy',
      'ariaLabel',
      'dataFootnoteBackref',
      'dataFootnoteRef',
      'id',
      ['className', 'q', 'data-footnote-backref'],
    ],
    span: ['dataV'],
    pre: ['tabIndex'],
  },
}

/**
 * @param nodes prose that stands together
 * @param definitions link and footnote definitions of the whole document
 * @param mark tells the footnotes of this stretch from those of others
 */
export function proseHtml(nodes: readonly RootContent[], definitions: readonly RootContent[], mark: string): string {
  const own = nodes.filter(node => !definitions.includes(node))
  const root: Root = { type: 'root', children: [...own, ...definitions] }
  const tree = toHast(root, {
    clobberPrefix: `${mark}-`,
    footnoteLabelTagName: 'p',
    handlers: { text: quotedText, code: reachedCode },
  })
  const safe = sanitize(tree, schema)
  return toHtml(safe as HastRoot).trim()
}

/** Text as usual; a quoted result with the id of its value on it. */
function quotedText(state: State, node: Text): (Element | HastText)[] {
  const text = defaultHandlers.text(state, node)
  const set = text.type === 'text' ? withShiftedDigits(text) : [text]
  const id = node.data?.prints
  return id === undefined ? set : [elementOf('span', set, { dataV: id })]
}

/** A listing; one that a phone must scroll sideways can be reached and scrolled with the keys. */
function reachedCode(state: State, node: Code): Element {
  const listing = defaultHandlers.code(state, node)
  const widest = Math.max(...node.value.split('\n').map(line => line.length))
  return widest > LETTERS_PHONE ? { ...listing, properties: { ...listing.properties, tabIndex: 0 } } : listing
}

/** Raised and lowered digits in faces that the page carries. */
function withShiftedDigits(text: HastText): (Element | HastText)[] {
  const runs = digitRuns(text.value)
  if (runs.length === 1 && runs[0]?.set === 'level') return [text]
  return runs.map(run => {
    const words: HastText = { type: 'text', value: run.text }
    return run.set === 'level' ? words : elementOf(run.set === 'raised' ? 'sup' : 'sub', [words])
  })
}

const elementOf = (tagName: string, children: (Element | HastText)[], properties: Properties = {}): Element => ({
  type: 'element',
  tagName,
  properties,
  children,
})

export const isDefinition = (node: Nodes): boolean => node.type === 'definition' || node.type === 'footnoteDefinition'
