/** Worked Markdown comes through readers and writers of Markdown unharmed. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import fc from 'fast-check'
import katex from 'katex'
import type { Link } from 'mdast'
import { describe, expect, test } from 'vitest'
import { all, bare, formulasIn, readers, textOf, workedFiles, workedMarkdown } from '../support/markdown.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const documentsIn = (folder: string): readonly string[] =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter(name => name.endsWith('.md') && !name.endsWith('report.md'))
    .map(name => join(folder, name))
    .sort()
const documents = [...documentsIn('samples'), ...documentsIn('tests/golden')]
const sourceOf = (path: string): string => readFileSync(join(root, path), 'utf8')

/** What must hold of any worked Markdown. */
function comesThrough(markdown: string): void {
  const tree = readers.knowing.parse(markdown)
  const again = readers.knowing.write(tree)
  expect(again).toBe(markdown)
  // A reader that knows no formulas may write other escapes, but it reads them back as the same.
  const read = readers.plain.parse(markdown)
  expect(bare(readers.plain.parse(readers.plain.write(read)))).toEqual(bare(read))
  const text = textOf(read)
  for (const { tex } of formulasIn(markdown)) expect(text).toContain(tex)
}

function linksMeet(markdown: string): void {
  const tree = readers.knowing.parse(markdown)
  const anchors = new Set(all(tree, 'html').flatMap(node => /^<a id="([^"]+)">$/.exec(textOf(node))?.[1] ?? []))
  for (const node of all(tree, 'link') as readonly Link[])
    if (node.url.startsWith('#')) expect(anchors, node.url).toContain(node.url.slice(1))
}

describe('every document of the samples and of the tests', () => {
  test('there are many', () => expect(documents.length).toBeGreaterThan(40))

  test.each(documents)('%s comes through, byte for byte', path => comesThrough(workedMarkdown(sourceOf(path))))

  test.each(documents)('%s has an anchor for each of its links', path => linksMeet(workedMarkdown(sourceOf(path))))

  test.each(documents)('%s has formulas that KaTeX takes at its strictest', path => {
    for (const { tex, display } of formulasIn(workedMarkdown(sourceOf(path))))
      expect(() => katex.renderToString(tex, { strict: 'error', displayMode: display }), tex).not.toThrow()
  })
})
