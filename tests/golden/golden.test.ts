/**
 * Whole documents and their faults, as produced. UPDATE=1 rewrites them on purpose;
 * a missing file fails.
 */
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { longForm } from '../../src/base/report.ts'
import { type Compiled, compileText } from '../../src/compile.ts'
import { nearbyOf } from '../../src/files.ts'
import { publish } from '../../src/publish.ts'
import { asset } from '../render/assets.ts'

const here = fileURLToPath(new URL('.', import.meta.url))
const host = { version: '0.0.0', asset, sha256: (text: string) => createHash('sha256').update(text).digest('hex') }
const folders = (parent: string) =>
  readdirSync(join(here, parent), { withFileTypes: true })
    .filter(entry => entry.isDirectory())
    .map(({ name }) => join(parent, name))

function compiled(folder: string): Compiled {
  const path = join(here, folder, 'input.md')
  return compileText('input.md', readFileSync(path, 'utf8'), nearbyOf(path))
}

const messages = ({ source, diagnostics }: Compiled): string =>
  diagnostics.map(each => `${longForm(source, each)}\n`).join('\n')

/** Each step as one paragraph: id, formula, values put in, result. */
function steps(results: string): string {
  const {
    steps,
  }: {
    readonly steps: readonly Readonly<
      Record<'id' | 'formula' | 'substituted' | 'reference', string> & { readonly result: { readonly printed: string } }
    >[]
  } = JSON.parse(results)
  return steps
    .map(
      ({ id, formula, substituted, result, reference }) =>
        `${id} = ${formula}\n  = ${substituted}\n  = ${result.printed}   [${reference}]\n`,
    )
    .join('\n')
}

function agrees(folder: string, name: string, produced: string): void {
  const path = join(here, folder, name)
  if (process.env.UPDATE === '1') {
    mkdirSync(dirname(path), { recursive: true })
    writeFileSync(path, produced)
  }
  expect(existsSync(path), `${path} is missing; UPDATE=1 writes it`).toBe(true)
  expect(produced).toBe(readFileSync(path, 'utf8'))
}

describe('faults are told where they are, in these words', () => {
  test.each(folders('faults'))('%s', folder => {
    const document = compiled(folder)
    expect(document.diagnostics.length).toBeGreaterThan(0)
    agrees(folder, 'messages.txt', messages(document))
  })
})

describe('whole calculations come out as before', () => {
  test.each(folders('.').filter(name => name !== 'faults'))('%s', folder => {
    const document = compiled(folder)
    agrees(folder, 'messages.txt', messages(document))
    const [report, ...figures] = publish(document, 'report', 'md', false, host)
    agrees(folder, 'report.md', report?.text ?? '')
    for (const { name, text } of figures) agrees(folder, name.replace('report.', ''), text)
    agrees(folder, 'steps.txt', steps(publish(document, 'report', 'json', false, host)[0]?.text ?? ''))
  })
})
