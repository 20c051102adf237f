import { readdirSync, readFileSync } from 'node:fs'
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { expect, test } from 'vitest'
import { parseMarkdown } from '../../src/read/markdown.ts'
import { piecesOf } from '../../src/read/pieces.ts'

const inOneGo = unified().use(remarkParse).use(remarkGfm).use(remarkFrontmatter)

/** Numbers from 0 to 1, the same on every run. */
function sequence(seed: number): () => number {
  let state = seed
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 2 ** 32
  }
}

const filler = `${'A long line of plain words that fills a piece until it may be cut. '.repeat(16)}\n`

const blocks = [
  filler,
  filler,
  '# Heading\n',
  '## Heading with `code` and *stress*\n',
  '####### Not a heading\n',
  '#no heading\n',
  '    # indented\n',
  'Words\n',
  'Words\nand more words\n',
  'Setext\n======\n',
  '---\n',
  '===\n',
  '```equations\na = 1\n```\n',
  '```areas roof x=1  \n| a | b |\n|---|---|\n\n# not a heading\n```\n',
  '~~~\n# not a heading\n```\n~~~\n',
  '````js\n```\n# x\n````\n',
  '```\n```\n',
  '```\n\n```\n',
  '```\n\n\n```   \n',
  '``` a`b\n',
  '``` a&amp;b \\c\ntext\n```\n',
  '```open\n# swallowed\n',
  '  ```\n  # indented fence\n# swallowed\n  ```\n',
  '```   \ttabs\t here\n\ttab\n   ```\n',
  '- item\n- item\n',
  '- item\n\n- loose\n\n  para\n',
  '- item\n  ```\n  code\n# heading in the margin\n',
  '- ```\n  fence in an item\n\n  # x\n',
  '1. one\n2. two\n\n   ```\n   x\n   ```\n',
  '- [ ] task\n- [x] done\n',
  '> quoted\nlazy\n',
  '> ```\n> fence\n',
  '> # heading\n>\n> - list\n',
  '| a | b |\n|--:|---|\n| 1 | `|` |\n| 2 |\n',
  '| a | b |\n|---|---|\n| 1 | 2 |\n```\nfence below a table\n```\n',
  'Words\n```\nfence below words\n```\n# heading below\n',
  '<div>\nhtml\n\n# in or out\n</div>\n',
  '<!-- note -->\n',
  '<!-- open\n\n# inside\n\n```\n-->\n',
  '<script>\n\n# inside\n</script>\n',
  'See https://example.org/a or www.example.org, or write to a.b@example.org.\n',
  'An &#64; sign, a ww&#119;.example.org, x&commat;example.org\n',
  '[a link](https://example.org "title") and ![picture](x.png)\n',
  '[label] and [other][label]\n',
  'As [the notes](https://example.org/notes) say, ([here](http://a.b)) too.\n',
  '\\[no link](https://example.org/notes) and [www.x](https://a.b) and ` [c](http://d) ` and ![p](http://q)\n',
  '[out [in](https://a.b) side](https://c.d) [x](https://e.f)[y](https://g.h)(https://i.j)\n',
  '[a](https://b.c\n[a](https://b.c )d)\n',
  '[label]: https://example.org\n',
  'A note[^1] and ~~struck~~ words.\n',
  '[^1]: the note\n\n    # more of it\n',
  '**bold\n\n# cut**\n',
  '`code\n\n# cut`\n',
  'hard  \nbreak\\\nhere\n',
  '***\n',
  '\\# no heading\n',
  '{{roof.W}} quoted | here\n',
  'Ünïcödé 𝒳 text\n',
  '\t# tab\n',
  '   \n',
]

const fronts = [
  '',
  '',
  '---\ntitle: x\n\n# not a heading\n---\n',
  '---\nopen: front\n\n# heading\n',
  '\n',
  '---\n---\n',
]

test('a text read in pieces gives the tree of the whole, places and all', { timeout: 60_000 }, () => {
  const next = sequence(14)
  const pick = (items: readonly string[]): string => items[Math.floor(next() * items.length)] ?? ''
  let cut = 0
  for (let i = 0; i < 900; i++) {
    // Most texts leave out what forbids every cut, so that cuts are tried too.
    const some = next() < 0.85 ? blocks.filter(block => !/\]:|<|^ {1,3}```/m.test(block)) : blocks
    const count = 1 + Math.floor(next() * 12)
    const body = Array.from({ length: count }, () => pick(some) + (next() < 0.7 ? '\n' : '')).join('')
    const text = pick(fronts) + (next() < 0.1 ? body.trimEnd() : body)
    if ((piecesOf(text)?.length ?? 0) > 1) cut++
    expect(parseMarkdown(text), text).toEqual(inOneGo.parse(text))
  }
  expect(cut).toBeGreaterThan(150)
})

test('the samples and the manual give the tree of the whole', () => {
  const folder = new URL('../../samples/', import.meta.url)
  const names = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter(name => name.endsWith('.md'))
  expect(names.length).toBeGreaterThan(2)
  for (const name of names) {
    const text = readFileSync(new URL(name, folder), 'utf8')
    expect(parseMarkdown(text), name).toEqual(inOneGo.parse(text))
  }
})

test('text that reaches over cuts is not cut', () => {
  const cuttable = `${filler}\n# One\n\n${filler}\n# Two\n\n${filler}`
  expect(piecesOf(cuttable)?.length).toBe(3)
  for (const reach of ['[a]: b\n', '[^a]: b\n', '<!-- open\n', '<pre>\n', '<?x\n', '<!X\n', 'x\r\n', '  ```\n'])
    expect(piecesOf(`${cuttable}\n${reach}`), reach).toBeUndefined()
})
