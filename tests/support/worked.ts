/** A document at work, for tests: the values of its worksheet, and the values of its published results. */
import { createHash } from 'node:crypto'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { sourceOf } from '../../src/base/span.ts'
import { unit } from '../../src/base/unit.ts'
import type { Value } from '../../src/base/value.ts'
import { compileText } from '../../src/compile.ts'
import { type Worksheet, worksheet } from '../../src/compute/worksheet.ts'
import { readChoices } from '../../src/model/front.ts'
import { gather } from '../../src/model/givens.ts'
import { isWord } from '../../src/model/scope.ts'
import { type Host, publish } from '../../src/publish.ts'
import { readDocument } from '../../src/read/document.ts'

const processor = unified().use(remarkParse).use(remarkGfm).use(remarkFrontmatter)

/** The worksheet of a document, without its pages. */
export function worksheetOf(text: string): Worksheet {
  const document = readDocument(processor.parse(text), sourceOf('test.md', text))
  return worksheet(gather([...document.blocks.values()]), readChoices(document.front))
}

/** What has been read of a document: a value by its id, in base SI or in a unit. */
export interface Reading {
  readonly sheet: Worksheet
  readonly value: (id: string) => Value
  readonly si: (id: string) => number
  readonly in: (id: string, unitText: string) => number
}

export function reading(text: string): Reading {
  const sheet = worksheetOf(text)
  const value = (id: string): Value => {
    const found = sheet.scope.lookup(id)
    if (!found) throw new Error(`there is no ${id}`)
    if (!found.ok) throw new Error(`${id}: ${found.because.map(({ message }) => message).join('; ')}\n${text}`)
    if (isWord(found.value)) throw new Error(`${id} is a word`)
    return found.value
  }
  return { sheet, value, si: id => value(id).si, in: (id, text) => value(id).si / unit(text).scale }
}

/** One step of the results contract. */
export interface PublishedStep {
  readonly id: string
  readonly formula: string
  readonly substituted: string
  readonly inputs: Readonly<Record<string, string>>
  readonly result: PublishedQuantity
}

export interface PublishedQuantity {
  readonly value: number
  readonly unit: string
  readonly printed: string
}

export interface PublishedResults {
  readonly values: Readonly<Record<string, PublishedQuantity>>
  readonly steps: readonly PublishedStep[]
  readonly diagnostics: readonly { readonly rule: string; readonly severity: string; readonly message: string }[]
}

export const host: Host = {
  version: '0.0.0',
  asset: () => '',
  sha256: text => createHash('sha256').update(text).digest('hex'),
}

/** The results that a document is published with, through the whole pipeline. */
export function resultsOf(text: string): PublishedResults {
  const [file] = publish(compileText('test.md', text), 'test', 'json', false, host)
  // The schema of this text is tested where it is rendered; here its fields are only read.
  return JSON.parse(file?.text ?? '') as PublishedResults
}

/** Published values by id, each in a unit of the test's choice. */
export function publishedReading(text: string): (id: string, unitText?: string) => number {
  const { values, diagnostics } = resultsOf(text)
  const errors = diagnostics.filter(({ severity }) => severity === 'error')
  if (errors.length > 0) throw new Error(errors.map(({ message }) => message).join('\n'))
  return (id, unitText) => {
    const found = values[id]
    if (!found) throw new Error(`${id} is not among ${Object.keys(values).join(', ')}`)
    return unitText === undefined ? found.value : (found.value * unit(found.unit).scale) / unit(unitText).scale
  }
}
