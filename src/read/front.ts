/** Reads the YAML front matter with the safe core schema: plain data, no tags, few aliases. */
import { isMap, isScalar, isSeq, parseDocument } from 'yaml'
import type { Diagnostic } from '../base/diagnostic.ts'
import { diagnose, type Text } from './text.ts'

export interface FrontMatter {
  /** Scalars by their key, as they were written. */
  readonly entries: ReadonlyMap<string, Text>
  readonly faults: readonly Diagnostic[]
}

export const noFrontMatter: FrontMatter = { entries: new Map(), faults: [] }

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
  return { entries, faults: [] }
}

/** @param yaml the text between the marks, with its place */
export function readFront(yaml: Text): FrontMatter {
  return plainEntries(yaml) ?? readYaml(yaml)
}

function readYaml({ text, span }: Text): FrontMatter {
  const document = parseDocument(text, { schema: 'core', uniqueKeys: true, prettyErrors: false })
  const faults = [...document.errors, ...document.warnings].map(({ pos, message }) =>
    diagnose(
      'error',
      'front-matter',
      { start: span.start + pos[0], end: span.start + Math.max(pos[1], pos[0] + 1) },
      `the front matter cannot be read: ${message}`,
      'It is YAML: one name: value a line, with quotes around a value that holds a colon.',
    ),
  )
  if ((text.match(/[&*][\p{L}\p{N}_]/gu)?.length ?? 0) > ALIASES)
    return {
      entries: new Map(),
      faults: [
        diagnose(
          'error',
          'front-matter',
          span,
          `the front matter has more than ${ALIASES} anchors and aliases`,
          'Write each value out.',
        ),
      ],
    }
  const { contents } = document
  if (faults.length > 0 || contents === null) return { entries: new Map(), faults }
  if (!isMap(contents))
    return {
      entries: new Map(),
      faults: [
        diagnose(
          'error',
          'front-matter',
          span,
          'the front matter is not a list of names and values',
          'Write one name: value a line.',
        ),
      ],
    }
  const entries = new Map<string, Text>()
  for (const { key, value } of contents.items) {
    const name = isScalar(key) ? String(key.value) : ''
    const range = isScalar(value) || isSeq(value) || isMap(value) ? value.range : undefined
    const place = range ? { start: span.start + range[0], end: span.start + range[1] } : span
    if (isScalar(value)) entries.set(name, { text: value.source ?? String(value.value ?? ''), span: place })
    else if (value !== null)
      faults.push(
        diagnose(
          'warning',
          'front-matter-nested',
          place,
          `${name} holds a list or a table, which is not read`,
          'Give it one value.',
        ),
      )
  }
  return { entries, faults }
}
