/** Reads the YAML front matter with the safe core schema: plain data, no tags, few aliases. */
import { isMap, isScalar, isSeq, parseDocument, type Scalar, type YAMLSeq } from 'yaml'
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Span } from '../base/span.ts'

import { diagnose, type Text } from './text.ts'

export interface FrontMatter {
  /** Scalars by their key, as they were written. */
  readonly entries: ReadonlyMap<string, Text>
  /** Lists by their key. */
  readonly lists: ReadonlyMap<string, FrontList>
  /** The whole of it; at the start of the document where there is none. */
  readonly span: Span
  readonly faults: readonly Diagnostic[]
}

export interface FrontList {
  readonly span: Span
  readonly items: readonly FrontItem[]
}

/** An item of a list: names and values, or one text. */
export interface FrontItem {
  readonly span: Span
  readonly entries: ReadonlyMap<string, Text>
  readonly text?: Text
}

const nowhere: Span = { start: 0, end: 0 }

export const noFrontMatter: FrontMatter = { entries: new Map(), lists: new Map(), span: nowhere, faults: [] }

/** Aliases beyond this many serve nobody but a bomb. */
const ALIASES = 50

/** A name and a value that YAML takes as it stands, whatever the lines around it. */
const PLAIN = /^([A-Za-z][\w-]*):( +)([A-Za-z0-9](?:[^:#&*\p{Cc}]*[^\s:#&*\p{Cc}])?) *$/u

/** The front matter where every line is plain, as nearly always: a YAML reader is a fifth of the program. */
function plainEntries({ text, span }: Text): FrontMatter | undefined {
  const entries = new Map<string, Text>()
  let at = span.start
  for (const line of text.split('\n')) {
    const [whole, name = '', space = '', value = ''] = PLAIN.exec(line) ?? []
    if (line !== '' && (whole === undefined || entries.has(name))) return undefined
    const start = at + name.length + 1 + space.length
    if (whole !== undefined) entries.set(name, { text: value, span: { start, end: start + value.length } })
    at += line.length + 1
  }
  return { ...noFrontMatter, entries, span }
}

/** @param yaml the text between the marks, with its place */
export function readFront(yaml: Text): FrontMatter {
  return plainEntries(yaml) ?? readYaml(yaml)
}

function readYaml({ text, span }: Text): FrontMatter {
  const unread = (...faults: Diagnostic[]): FrontMatter => ({ ...noFrontMatter, span, faults })
  const fault = (message: string, help: string, at: Span = span) => diagnose('error', 'front-matter', at, message, help)
  const document = parseDocument(text, { schema: 'core', uniqueKeys: true, prettyErrors: false })
  const faults = [...document.errors, ...document.warnings].map(({ pos, message }) =>
    fault(
      `the front matter cannot be read: ${message}`,
      'It is YAML: one name: value a line, with quotes around a value that holds a colon.',
      { start: span.start + pos[0], end: span.start + Math.max(pos[1], pos[0] + 1) },
    ),
  )
  if ((text.match(/[&*][\p{L}\p{N}_]/gu)?.length ?? 0) > ALIASES)
    return unread(fault(`the front matter has more than ${ALIASES} anchors and aliases`, 'Write each value out.'))
  const { contents } = document
  if (faults.length > 0 || contents === null) return unread(...faults)
  if (!isMap(contents))
    return unread(fault('the front matter is not a list of names and values', 'Write one name: value a line.'))
  const entries = new Map<string, Text>()
  const lists = new Map<string, FrontList>()
  for (const { key, value } of contents.items) {
    const name = nameOf(key)
    if (isScalar(value)) entries.set(name, scalarText(value, span))
    else if (isSeq(value)) lists.set(name, { span: placeOf(value, span), items: itemsOf(value, span, faults) })
    else if (value !== null) faults.push(nested(name, placeOf(value, span)))
  }
  return { entries, lists, span, faults }
}

const nameOf = (key: unknown): string => (isScalar(key) ? String(key.value) : '')

const scalarText = (value: Scalar, whole: Span): Text => ({
  text: value.source ?? String(value.value ?? ''),
  span: placeOf(value, whole),
})

function placeOf(value: unknown, whole: Span): Span {
  const range = isScalar(value) || isSeq(value) || isMap(value) ? value.range : undefined
  return range ? { start: whole.start + range[0], end: whole.start + range[1] } : whole
}

const nested = (name: string, at: Span): Diagnostic =>
  diagnose(
    'warning',
    'front-matter-nested',
    at,
    `${name} holds a list or a table where one value is read`,
    'Give it one value.',
  )

function itemsOf(list: YAMLSeq, whole: Span, faults: Diagnostic[]): readonly FrontItem[] {
  return list.items.map((item): FrontItem => {
    const span = placeOf(item, whole)
    if (isScalar(item)) return { span, entries: new Map(), text: scalarText(item, whole) }
    const entries = new Map<string, Text>()
    for (const { key, value } of isMap(item) ? item.items : []) {
      if (isScalar(value)) entries.set(nameOf(key), scalarText(value, whole))
      else if (value !== null) faults.push(nested(nameOf(key), placeOf(value, whole)))
    }
    return { span, entries }
  })
}
