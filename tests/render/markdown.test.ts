import type { Node, Parents, Root, RootContent } from 'mdast'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import remarkStringify from 'remark-stringify'
import { unified } from 'unified'
import { describe, expect, test } from 'vitest'
import { tex } from '../../src/base/tex.ts'
import type { Piece } from '../../src/explain/sheet.ts'
import { documentNodes, type MarkdownSetting, pieceNodes, piecesNodes } from '../../src/render/markdown.ts'
import { markdownSettings } from '../../src/render/math-nodes.ts'
import { body, sheet, source } from './fixture.ts'

const setting: MarkdownSetting = { source, level: 3, figureFile: ({ id }) => `${id}.svg` }
const pieces = body.filter((part): part is Piece => part.kind !== 'prose')

function written(nodes: readonly RootContent[]): string {
  const root: Root = { type: 'root', children: [...nodes] }
  return unified().use(remarkGfm).use(remarkStringify, markdownSettings).stringify(root)
}

const parsed = (markdown: string): Root => unified().use(remarkParse).use(remarkGfm).parse(markdown)
const ofPiece = (piece: Piece) => written(pieceNodes(piece, setting))

/** All nodes of a type, in order. */
function all(node: Node, type: string): readonly Node[] {
  const inner = 'children' in node ? (node as Parents).children.flatMap(child => all(child, type)) : []
  return node.type === type ? [node, ...inner] : inner
}

const textOf = (node: Node): string =>
  'value' in node && typeof node.value === 'string'
    ? node.value
    : 'children' in node
      ? (node as Parents).children.map(textOf).join('')
      : ''

const whole = written(documentNodes(sheet, piecesNodes(pieces, setting)))

describe('the Markdown of a sheet', () => {
  test('reads back with as many tables, formulas, pictures and quotations as the sheet has', () => {
    const count = (kind: Piece['kind']) => pieces.filter(piece => piece.kind === kind).length
    const tree = parsed(whole)
    // The checks follow one another, and share a table.
    expect(all(tree, 'table')).toHaveLength(count('table') + 1)
    expect(all(tree, 'image')).toHaveLength(count('figure'))
    expect(all(tree, 'blockquote')).toHaveLength(1 + 2)
    expect(whole.match(/^\$\$$/gm)).toHaveLength(2 * count('equation'))
    expect(whole.match(/\\begin\{aligned\}/g)).toHaveLength(count('equation'))
  })

  test('keeps the columns and rows of a table, sums in bold, the governing row named', () => {
    const [, table] = all(parsed(whole), 'table') as readonly Parents[]
    expect(table?.children).toHaveLength(6)
    for (const row of table?.children ?? []) expect((row as Parents).children).toHaveLength(12)
    expect(whole).toContain('| $k$ (kip/in)')
    expect(whole).toContain('**W1** (governs)')
    expect(whole).toMatch(/\| \*\*Sum\*\* +\|/)
    expect(whole).toContain('**Table 2.1.** Walls along y and their shares of 62 kip, case EY. · lines 31–34')
    expect(whole).toContain('$V_{\\text{d}}=F\\ \\frac{k}{\\sum k}$ — rigid diaphragm')
  })

  test('aligns an equation at its equals signs, with its origin above', () => {
    const equation = pieces.find(piece => piece.kind === 'equation' && piece.id === 'roof.e.x')
    expect(equation === undefined ? '' : ofPiece(equation)).toBe(
      [
        '<a id="roof.e.x"></a>**Equation 2.4.** ASCE 7-22 §12.8.4.1',
        '',
        '$$',
        '\\begin{aligned}',
        'e_{x} &= x_{\\text{m}}-x_{\\text{r}} \\\\',
        '&= 34.20\\ \\mathrm{ft}-19.92\\ \\mathrm{ft} \\\\',
        '&= \\mathbf{14.28}\\ \\mathrm{ft}',
        '\\end{aligned}',
        '$$',
        '',
      ].join('\n'),
    )
  })

  test('says demand, capacity, ratio and verdict of a check in words', () => {
    expect(whole).toMatch(/^\| Check +\| +Demand \| +Capacity \| Ratio \| Verdict \| From +\|$/m)
    expect(whole).toMatch(
      /^\| <a id="[^"]+"><\/a>Story drift at grid D, along y +\| +0\.61 in \| +> 0\.58 in \| +1\.05 \| \*\*NG\*\* +\| ASCE 7-22 §12\.12\.1 · line 52 +\|$/m,
    )
  })

  test('shows a fault with its place and its help', () => {
    expect(whole).toContain('> **error (wall-outside-level): wall W7 stands 10.00 ft outside level roof**')
    expect(whole).toContain('> line 31: x = 82.00 ft `| W7 | 82 ft, 4 ft | 82 ft, 16 ft | 12 ft | CMU8 |`')
    expect(whole).toContain('> A diaphragm can only push on walls that it meets.')
  })

  test('has no HTML but anchors', () => {
    for (const node of all(parsed(whole), 'html'))
      expect(textOf(node)).toMatch(/^<a id="[^"<>]*">$|^<\/a>$|^<a id="[^"<>]*"><\/a>$/)
  })
})

describe('text from the document', () => {
  const hostile = [
    '# a',
    '1. a',
    '- a',
    '> a',
    '*a* _b_ `c`',
    '<script>alert(1)</script>',
    '[a](b)',
    'a | b',
    'costs $5 and $6',
    '$$ a $$',
    'a\n\n# b',
    '\\alpha &amp; b',
    '| a |\n|---|',
    '~~a~~',
    '![a](b)',
    '+ a',
  ]

  test.each(hostile)('is only text: %j', value => {
    const tree = parsed(ofPiece({ kind: 'note', text: value }))
    expect(tree.children).toHaveLength(1)
    expect(tree.children[0]?.type).toBe('paragraph')
    expect(all(tree, 'text').map(textOf).join('')).toBe(value.replace(/\s+/g, ' '))
  })

  test.each(hostile)('stays in its cell: %j', value => {
    const row = { cells: [value, value], governs: true }
    const table: Piece = {
      kind: 'table',
      id: '',
      number: '',
      caption: value,
      columns: [
        { head: value, unit: 'ft^2', align: 'left' },
        { head: tex('\\left|M\\right|'), unit: '', align: 'right' },
      ],
      rows: [row],
      foot: row,
      formulas: [],
      sourceLines: [],
    }
    const tree = parsed(ofPiece(table))
    const [read] = all(tree, 'table') as readonly Parents[]
    expect(read?.children.map(line => (line as Parents).children.length)).toEqual([2, 2, 2])
    expect(all(tree, 'html')).toEqual([])
  })

  test('keeps a dollar sign from opening a formula', () => {
    expect(ofPiece({ kind: 'note', text: 'costs $5 and $6' })).toBe('costs \\$5 and \\$6\n')
  })
})
