/** Blocks, tables, front matter and quotes, and where each piece stands in the source. */
import remarkFrontmatter from 'remark-frontmatter'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { describe, expect, test } from 'vitest'
import { lineOf, positionOf, sourceOf } from '../../src/base/span.ts'
import { type Document, readDocument } from '../../src/read/document.ts'

const processor = unified().use(remarkParse).use(remarkGfm).use(remarkFrontmatter)

const read = (text: string): Document => readDocument(processor.parse(text), sourceOf('x.md', text))
const blockOf = (text: string) => {
  const [block] = read(text).blocks.values()
  if (!block) throw new Error('no block')
  return block
}

describe('a block', () => {
  const source = `Text.

\`\`\`areas  upper roof  detail=full
# a comment
load: 5 psf   # with a comment behind it
| area (x) | load (psf) |
|:---------|-----------:|
| A \\| B   | 5          |

plain line
\`\`\`
`
  const block = blockOf(source)

  test('has its topic, what it is about and its options', () => {
    expect(block.topic).toBe('areas')
    expect(block.about?.text).toBe('upper roof')
    expect(block.options.map(({ name, value }) => [name.text, value.text])).toEqual([['detail', 'full']])
  })

  test('has its settings without their comments, its table and its other lines', () => {
    expect(block.settings.map(({ name, value, comment }) => [name.text, value.text, comment])).toEqual([
      ['load', '5 psf', 'with a comment behind it'],
    ])
    expect(block.table?.header.map(({ name, unit }) => [name.text, unit?.text])).toEqual([
      ['area', 'x'],
      ['load', 'psf'],
    ])
    expect(block.table?.rows.map(({ cells }) => cells.map(({ text }) => text))).toEqual([['A | B', '5']])
    expect(block.lines.map(({ text }) => text)).toEqual(['plain line'])
  })

  test('knows the place of every piece', () => {
    const pieces = [
      block.about,
      ...block.settings.map(({ value }) => value),
      ...(block.table?.header.flatMap(({ name, unit }) => [name, unit]) ?? []),
      ...block.lines,
    ]
    for (const piece of pieces) if (piece) expect(source.slice(piece.span.start, piece.span.end)).toBe(piece.text)
  })

  test('knows it in a list, in a quotation and with tabs and carriage returns before it', () => {
    for (const lead of ['- ', '> ', '1. ']) {
      const indent = lead === '> ' ? '> ' : ' '.repeat(lead.length)
      const text = [`${lead}\`\`\`areas`, `${indent}load: 7 psf`, `${indent}\`\`\``].join('\r\n')
      const [block] = read(text).blocks.values()
      const value = block?.settings[0]?.value
      expect(value && text.slice(value.span.start, value.span.end), lead).toBe('7 psf')
    }
  })

  test('with tildes is one too, and a fence of another word is left alone', () => {
    expect(blockOf('~~~walls roof\n~~~\n').topic).toBe('walls')
    expect(read('```ts\nconst a = 1\n```\n').blocks.size).toBe(0)
    expect(read('```\nareas\n```\n').blocks.size).toBe(0)
  })

  test('may be empty', () => {
    expect(blockOf('```grid\n```\n')).toMatchObject({ settings: [], lines: [], faults: [] })
  })
})

describe('a table', () => {
  const faultsOf = (...lines: string[]) =>
    blockOf(['```walls', ...lines, '```', ''].join('\n')).faults.map(({ rule }) => rule)

  test('needs its line of dashes', () => expect(faultsOf('| a | b |', '| 1 | 2 |')).toEqual(['table-without-rule']))
  test('refuses a cell too many', () => expect(faultsOf('| a |', '|---|', '| 1 | 2 |')).toEqual(['cell-too-many']))
  test('refuses a column twice', () =>
    expect(faultsOf('| a | a |', '|---|---|', '| 1 | 2 |')).toEqual(['column-repeated']))
  test('is one in a block', () => expect(faultsOf('| a |', '|---|', '', '| b |', '|---|')).toContain('second-table'))
  test('may leave its last cells out', () => expect(faultsOf('| a | b |', '|---|---|', '| 1 |')).toEqual([]))
})

describe('front matter', () => {
  test('keeps what was written, with its place', () => {
    const text = '---\ntitle: "A: B"\nnumber: 007\n---\n'
    const { entries } = read(text).front
    expect(entries.get('title')?.text).toBe('A: B')
    expect(entries.get('number')?.text).toBe('007')
    expect(positionOf(sourceOf('', text), entries.get('number')?.span.start ?? 0)).toEqual({ line: 3, column: 9 })
  })

  test('that is no YAML is told at its line', () => {
    const { faults } = read('---\ntitle: [a\n---\n').front
    expect(faults[0]?.rule).toBe('front-matter')
  })
})

describe('a quote', () => {
  test('is found in text, with its options, and not in code', () => {
    const text = 'A {{roof.W | 1 kip}} and {{ b }} but `{{c}}`.\n\n| t |\n|---|\n| {{d}} |\n'
    const { quotes } = read(text)
    expect(quotes.map(({ id, options }) => [id.text, options.text])).toEqual([
      ['roof.W', '1 kip'],
      ['b', ''],
      ['d', ''],
    ])
    for (const { id } of quotes) expect(text.slice(id.span.start, id.span.end)).toBe(id.text)
  })

  test('that stands twice on a line has two places', () => {
    const { quotes } = read('{{a}} {{a}}\n')
    expect(quotes.map(({ id }) => id.span.start)).toEqual([2, 8])
  })
})

test('lines are found by halving', () => {
  const source = sourceOf('', 'a\nbb\n\nccc')
  expect([0, 1, 2, 4, 5, 6, 8].map(offset => lineOf(source, offset))).toEqual([1, 1, 2, 2, 3, 4, 4])
})
