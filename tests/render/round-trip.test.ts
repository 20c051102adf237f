/** Worked Markdown comes through readers and writers of Markdown unharmed. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import fc from 'fast-check'
import katex from 'katex'
import type { Link } from 'mdast'
import { describe, expect, test } from 'vitest'
import { all, bare, formulasIn, readers, textOf, workedMarkdown } from '../support/markdown.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const documentsIn = (folder: string): readonly string[] =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter(name => name.endsWith('.md') && !name.endsWith('report.md'))
    .map(name => join(folder, name))
    .sort()
const documents = [...documentsIn('samples'), ...documentsIn('tests/golden')]
const worked = new Map(documents.map(path => [path, workedMarkdown(readFileSync(join(root, path), 'utf8'))]))

/** What must hold of any worked Markdown. */
function comesThrough(markdown: string): void {
  const tree = readers.knowing.parse(markdown)
  const again = readers.knowing.write(tree)
  expect(again).toBe(markdown)
  // A reader that knows no formulas may write other escapes, but it reads them back as the same.
  const read = readers.plain.parse(markdown)
  expect(bare(readers.plain.parse(readers.plain.write(read)))).toEqual(bare(read))
  const text = textOf(read)
  for (const { tex } of formulasIn(markdown)) expect(text).toContain(tex.replaceAll('\\\\\n', '\\\n'))
}

function linksMeet(markdown: string): void {
  const tree = readers.knowing.parse(markdown)
  const anchors = new Set(all(tree, 'html').flatMap(node => /^<a id="([^"]+)">$/.exec(textOf(node))?.[1] ?? []))
  for (const node of all(tree, 'link') as readonly Link[])
    if (node.url.startsWith('#')) expect(anchors, node.url).toContain(node.url.slice(1))
}

describe('every document of the samples and of the tests', () => {
  test('there are many', () => expect(documents.length).toBeGreaterThan(40))

  test.each(documents)('%s comes through, byte for byte', path => comesThrough(worked.get(path) ?? ''))

  test.each(documents)('%s has an anchor for each of its links', path => linksMeet(worked.get(path) ?? ''))

  test.each(documents)('%s has formulas that KaTeX takes at its strictest', path => {
    for (const { tex, display } of formulasIn(worked.get(path) ?? ''))
      expect(() => katex.renderToString(tex, { strict: 'error', displayMode: display }), tex).not.toThrow()
  })
})

const signs = [
  ...'|*_$`[]()<>{}#&~\\^!-+=:;\'",./@%\u00b2\u2212\t ',
  '\n',
  'a',
  'B',
  '7',
  '\u05e9\u05dc\u05d5\u05dd',
  '\u0645\u0628\u0646\u0649',
  '\u5357',
  '\ud83d\ude00',
  '\u00a0',
  '\u200f',
  'https://a.example/b_c',
  'www.a.example',
  'x@a.example',
  '&lt;',
  '<b>',
  '</b>',
  '<!--',
  '-->',
  '**',
  '~~',
  '$$',
  '![',
  '](',
  '[^1]',
  '\\',
  '1. ',
  '- ',
  '> ',
]
const mess = (longest: number) =>
  fc.array(fc.constantFrom(...signs), { maxLength: longest }).map(parts => parts.join(''))
const cell = (longest: number) =>
  fc
    .oneof({ weight: 1, arbitrary: fc.constant('W'.repeat(400)) }, { weight: 12, arbitrary: mess(longest) })
    .map(text => text.replace(/\n/g, ' ').replaceAll('|', '\\|'))

const prose = fc.oneof(
  mess(30),
  fc.constantFrom(
    'A footnote[^1] and {{roof.W}} again[^1].\n\n[^1]: The *note*, {{roof.CM.x | 0.1 ft}}.\n\n    With a second paragraph.',
    '1. one\n   - two\n     > three\n\n     ```js\n     a $b$ c\n     ```\n2. `code | $x$` and {{ roof.W }}',
    '| a | b |\n|:--|--:|\n| {{roof.W \\| 1 kip}} | `x\\|y` |',
    '## Costs $5 and $6, a_b_c {{roof.W}}',
    '<div>raw</div>\n\n***\n\n- [x] done\n- [ ] not {{nothing.here}}',
    '[ref][r] and [roof](#roof.W) and [gone](#nowhere)\n\n[r]: #roof.W "t"',
    'Setext {{roof.W}}\n====\n\nline  \nbreak\\\nbreak',
    '# {{roof.W}} _a_',
    '{{roof.W}}{{roof.W}} *{{roof.W}}*a **{{roof.W}}**b',
  ),
)

const building = (area: string, wall: string, note: string): string =>
  [
    `\`\`\`areas roof\n| area | from | to | load | note |\n|---|---|---|---|---|\n| ${area} | 0 ft, 0 ft | 20 ft, 14 ft | 55 psf | ${note} |\n\`\`\``,
    "```construction CMU8\nmaterial: concrete masonry\nf'm: 2000 psi\nt: 7.63 in\nends: cantilever\n```",
    `\`\`\`walls roof\n| wall | from | to | height | construction |\n|---|---|---|---|---|\n| S${wall} | 0 ft, 0 ft | 20 ft, 0 ft | 9 ft | CMU8 |\n| ${wall} | 4 ft, 14 ft | 16 ft, 14 ft | 9 ft | CMU8 |\n| W | 0 ft, 0 ft | 0 ft, 14 ft | 9 ft | CMU8 |\n\`\`\``,
    '```forces roof\nx: 3 kip\ny: 3 kip\n```',
    '```working roof\nwhole calculation\n```',
  ].join('\n\n')

describe('any document', () => {
  test('comes through, whatever its names and its prose hold', () => {
    fc.assert(
      fc.property(cell(12), cell(8), cell(12), fc.array(prose, { maxLength: 4 }), (area, wall, note, texts) => {
        comesThrough(workedMarkdown(`${texts.join('\n\n')}\n\n${building(area, wall, note)}\n`))
      }),
      { numRuns: Number(process.env.RUNS ?? 25), seed: Number(process.env.SEED ?? 7) },
    )
  }, 600_000)
})
