/** The command as a language server, driven over its protocol. */
import { spawnSync } from 'node:child_process'
import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import {
  DefinitionRequest,
  DocumentFormattingRequest,
  type DocumentSymbol,
  DocumentSymbolRequest,
  FoldingRangeRequest,
  HoverRequest,
  type Location,
  PrepareRenameRequest,
  type Range,
  ReferencesRequest,
  RenameRequest,
} from 'vscode-languageserver-protocol/node'
import { TextDocument } from 'vscode-languageserver-textdocument'
import { tidy } from '../../src/tidy/tidy.ts'
import { building, command, Editor, marked } from './client.ts'

let editor: Editor
const workshop = mkdtempSync(join(tmpdir(), 'platemark-lsp-'))
beforeAll(async () => {
  editor = await Editor.start()
})
afterAll(async () => {
  const code = await editor.end()
  rmSync(workshop, { recursive: true, force: true })
  expect(code).toBe(0)
})

let names = 0
const fresh = () => `untitled:document-${names++}.md`
const textOf = (document: TextDocument, range: Range) => document.getText(range)
/** The building with a mark in front of a stretch of its text. */
const markedAt = (stretch: string, within = 0) => {
  const at = building.indexOf(stretch)
  if (at === -1) throw new Error(`${stretch} is not there`)
  return `${building.slice(0, at + within)}‸${building.slice(at + within)}`
}

describe('the connection', () => {
  test('tells its abilities and its name', () => {
    expect(editor.abilities.serverInfo?.name).toBe('platemark')
    expect(editor.abilities.capabilities).toMatchObject({ positionEncoding: 'utf-16', hoverProvider: true })
  })

  test('works without --stdio, and for an editor that can do little', async () => {
    const plain = await Editor.start({}, [])
    const uri = fresh()
    await plain.open(uri, '```grid\nx: A 0 ft\n```\n\n```grid\nx: B 0 ft\n```\n')
    const [fault] = await plain.diagnostics(uri)
    expect(fault?.message).toContain('line 1: first here')
    expect(fault?.relatedInformation).toBeUndefined()
    expect(await plain.hover(uri, 4)).toBe('The grid lines, by which points of the plan are named.')
    expect(await plain.end()).toBe(0)
  })
})

describe('the command', () => {
  const run = (...args: string[]) =>
    spawnSync(process.execPath, [command, 'lsp', ...args], { encoding: 'utf8', input: '' })

  test('tells what it is for, and what it does not take', () => {
    expect(run('--help')).toMatchObject({ status: 0, stdout: expect.stringContaining('Language Server Protocol') })
    expect(run('--port', '3')).toMatchObject({ status: 2, stderr: expect.stringContaining('takes no --port') })
  })

  test('ends by itself when the editor goes away without a word', () => {
    expect(run('--stdio')).toMatchObject({ status: 1, stdout: '', stderr: '' })
  })
})

describe('diagnostics', () => {
  test('a sound document has none', async () => {
    const uri = fresh()
    await editor.open(uri, building)
    expect(await editor.diagnostics(uri)).toEqual([])
    await editor.close(uri)
  })

  test('a fault is told at its place with its rule and what to do, and goes away when it is mended', async () => {
    const uri = fresh()
    const document = await editor.open(uri, building.replace('60 psf', '60 pfs'))
    const [fault, ...others] = await editor.diagnostics(uri)
    expect(others).toEqual([])
    expect(fault).toMatchObject({ severity: 1, code: 'unknown-unit', source: 'platemark' })
    expect(fault?.message).toMatch(/^there is no unit pfs\nDid you mean psf/)
    expect(fault && textOf(document, fault.range)).toBe('pfs')
    const at = document.getText().indexOf('pfs')
    await editor.type(uri, at, at + 3, 'psf')
    expect(await editor.diagnostics(uri)).toEqual([])
    await editor.close(uri)
  })

  test('other places come as related information, a warning as a warning', async () => {
    const uri = fresh()
    const document = await editor.open(uri, `${building}\n\`\`\`equations\nV_b = 3 kip\n\`\`\`\n\n<b>bold</b>\n`)
    const found = await editor.diagnostics(uri)
    const repeated = found.find(({ code }) => code === 'name-repeated')
    const [other] = repeated?.relatedInformation ?? []
    expect(other && [other.message, textOf(document, other.location.range)]).toEqual(['first here', 'V_b'])
    expect(found.find(({ code }) => code === 'html-left-out')?.severity).toBe(2)
    await editor.close(uri)
  })

  test('places count in UTF-16 units and hold with lines that end in CR LF', async () => {
    const uri = fresh()
    const text = '# 𝔸 and 😀\n\n```equations\nΔ_😀 = 1 ft\nß = 2 ft + 3 kip # 😀\n```\n'.replaceAll('\n', '\r\n')
    const document = await editor.open(uri, text)
    const found = await editor.diagnostics(uri)
    expect(found.map(({ range }) => textOf(document, range))).toEqual(['Δ_😀', '3 kip'])
    await editor.close(uri)
  })

  test('of many changes in a row the newest text is told of, and not each one', async () => {
    const uri = fresh()
    const document = await editor.open(uri, building)
    await editor.diagnostics(uri)
    const before = editor.timesTold(uri)
    for (let i = 0; i < 40; i++) {
      const at = document.getText().indexOf('60 psf')
      await editor.type(uri, at, at + 2, i === 39 ? '60 q' : '60')
    }
    const [fault] = await editor.diagnostics(uri)
    expect(fault?.message).toContain('there is no unit q')
    expect(editor.timesTold(uri) - before).toBeLessThan(10)
    await editor.close(uri)
  })

  test('closing a document takes its diagnostics away', async () => {
    const uri = fresh()
    await editor.open(uri, building.replace('60 psf', '60 pfs'))
    expect(await editor.diagnostics(uri)).toHaveLength(1)
    await editor.close(uri)
    expect(await editor.diagnostics(uri, 'closed')).toEqual([])
  })

  test('the text comes from the editor, and what it names from the disk', async () => {
    const uri = pathToFileURL(join(workshop, 'plan of the yard.md')).href
    const text = `${building}\n![the yard](yard.svg)\n`
    await editor.open(uri, text)
    expect((await editor.diagnostics(uri)).map(({ code }) => code)).toEqual(['picture-unreadable'])
    writeFileSync(join(workshop, 'yard.svg'), '<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"/>')
    await editor.type(uri, text.length, text.length, '\n')
    expect(await editor.diagnostics(uri)).toEqual([])
    await editor.close(uri)
  })

  test('Markdown without a block of ours is left alone, but for a misspelt topic', async () => {
    const uri = fresh()
    await editor.open(uri, '---\nlayout: post\n---\n\n<b>bold</b> {{ site.name }}\n\n```js\nx\n```\n')
    expect(await editor.diagnostics(uri)).toEqual([])
    const other = fresh()
    await editor.open(other, '<b>bold</b>\n\n```wals roof\n```\n')
    expect((await editor.diagnostics(other)).map(({ code }) => code)).toEqual(['topic-near-miss'])
    await editor.close(uri)
    await editor.close(other)
  })
})

describe('what stands there', () => {
  test('a quote tells its value with formula, values put in, source and line', async () => {
    const told = await editor.told(markedAt('{{roof.W}}', 4))
    expect(told).toMatch(/^```text\nroof\.W: W = [\d.]+ kip\n.*\n```$/s)
    expect(told.split('\n').length).toBeGreaterThan(3)
  })

  test('a name in an expression tells its own line', async () => {
    const told = await editor.told(markedAt('V_b  | V_b', 1))
    expect(told).toMatch(/V_b: V_b = [\d.]+ kip\n= 0\.2\*roof\.W\n= 0\.2\*\([\d.]+ kip\)\nstated\nline \d+/)
  })

  test('a cell tells what its column is and its value', async () => {
    const told = await editor.told(markedAt('10 ft  | CMU8', 1))
    expect(told).toContain('Clear height')
    expect(told).toContain('roof.wall.N1.h: h_N1 = 10 ft\ngiven\nline ')
  })

  test('a wall, a level, a construction and a grid line tell their main values', async () => {
    expect(await editor.told(markedAt('N1   | A2   | B2         |', 1))).toMatch(/roof\.wall\.N1\.k = [\d,.]+ kip\/in/)
    expect(await editor.told(markedAt('loft  | 11 ft', 1))).toContain('loft.elevation = 11 ft')
    expect(await editor.told(markedAt('CMU8\nmaterial', 1))).toContain('constructions.CMU8.E = 1,800 ksi')
    expect(await editor.told(markedAt('B 24 ft', 0))).toContain('grid.B: x_B = 24 ft')
  })

  test('a topic, a column and a setting tell what they are', async () => {
    expect(await editor.told(markedAt('walls roof', 2))).toContain('The walls below a level')
    expect(await editor.told(markedAt('sill | width', 2))).toContain('From the foot of the wall')
    expect(await editor.told(markedAt('ends: cantilever', 2))).toContain('How its walls are held')
  })

  test('prose and code of other kinds tell nothing', async () => {
    expect(await editor.told(markedAt('weighs', 2))).toBe('')
    expect(await editor.told(`${building}\n\`\`\`js\nroof‸.W\n\`\`\`\n`)).toBe('')
  })

  test('a value that cannot be worked tells why, never an earlier number', async () => {
    const uri = fresh()
    const document = await editor.open(uri, building)
    const at = document.getText().indexOf('{{roof.W}}') + 4
    expect(await editor.hover(uri, at)).toMatch(/= [\d.]+ kip/)
    const load = document.getText().indexOf('20 psf + 22 psf')
    await editor.type(uri, load, load + 6, '20 ft')
    expect(await editor.hover(uri, at)).toMatch(/roof\.W: not worked: /)
    await editor.close(uri)
  })
})

describe('places', () => {
  /** The line that a definition leads to. */
  async function given(text: string): Promise<string> {
    const { text: plain, offset } = marked(text)
    const uri = fresh()
    const document = await editor.open(uri, plain)
    const found = (await editor.connection.sendRequest(
      DefinitionRequest.type,
      editor.at(uri, offset),
    )) as Location | null
    await editor.close(uri)
    if (!found) return ''
    const { start } = found.range
    return document
      .getText({ start: { line: start.line, character: 0 }, end: { line: start.line + 1, character: 0 } })
      .trim()
  }

  test.each([
    ['q_roof |', 1, 'q_roof = 20 psf + 22 psf     # deck and finish'],
    ['N1   | D1', 1, '| N1   | A2   | B2         | 10 ft  | CMU8         |'],
    ['CMU8         |\n| S1', 1, '```construction CMU8'],
    ['areas loft', 7, '| loft  | 11 ft     |'],
    ['C2 | q_roof', 0, 'x: A 0 ft, B 24 ft, C 40 ft'],
    ['C2 | q_roof', 1, 'y: 1 0 ft, 2 18 ft'],
    ['C2 | q_roof', 2, 'y: 1 0 ft, 2 18 ft'],
    ['N1.h)', 1, '| N1   | A2   | B2         | 10 ft  | CMU8         |'],
    ['.h)', 1, '| N1   | A2   | B2         | 10 ft  | CMU8         |'],
    ['.V * (', 1, '| N1   | A2   | B2         | 10 ft  | CMU8         |'],
    ['.W}} and', 1, '| roof  | 21 ft     |'],
    ['N1, S1', 1, '| N1   | A2   | B2         | 10 ft  | CMU8         |'],
    ['.W \\|', 1, '| roof  | 21 ft     |'],
  ])('%s leads to where it is given', async (stretch, within, line) => {
    expect(await given(markedAt(stretch, within))).toBe(line)
  })

  test('every use of a wall is found, and of no wall of another level', async () => {
    const uri = fresh()
    const document = await editor.open(uri, building)
    const at = building.indexOf('N1   | D1')
    const params = { ...editor.at(uri, at), context: { includeDeclaration: true } }
    const found = (await editor.connection.sendRequest(ReferencesRequest.type, params)) ?? []
    expect(found).toHaveLength(5)
    expect(new Set(found.map(({ range }) => textOf(document, range)))).toEqual(new Set(['N1']))
    await editor.close(uri)
  })
})

describe('renaming', () => {
  async function renamed(stretch: string, within: number, newName: string): Promise<string> {
    const { text, offset } = marked(markedAt(stretch, within))
    const uri = fresh()
    const document = await editor.open(uri, text)
    const edit = await editor.connection.sendRequest(RenameRequest.type, { ...editor.at(uri, offset), newName })
    await editor.close(uri)
    const [change] = edit?.documentChanges ?? []
    if (!change || !('edits' in change)) throw new Error('there is no edit')
    expect(change.textDocument.version).toBe(1)
    return TextDocument.applyEdits(document, change.edits as { range: Range; newText: string }[])
  }

  test('a wall takes its new name in rows, openings, workings and expressions', async () => {
    const text = await renamed('N1   | D1', 0, 'Quay')
    expect(text).toContain('| Quay   | A2   | B2         |')
    expect(text).toContain('M_N1 = roof.wall.Quay.V * (roof.wall.Quay.h)')
    expect(text).toContain('walls: Quay, S1')
    expect(text).toContain('| N1   | A2   | B2 | 11 ft')
  })

  test('a level takes it in first lines, tables, quotes and tables of quotes', async () => {
    const text = await renamed('roof  | 21', 0, 'top')
    expect(text).not.toMatch(/\broof\b(?! weighs)/)
    expect(text).toContain('{{top.W \\| 1 kip}}')
    expect(text).toContain('| top  | V_b')
  })

  test('a place that can be renamed says so, with the name that stands there', async () => {
    const uri = fresh()
    await editor.open(uri, building)
    const at = (stretch: string) => editor.at(uri, building.indexOf(stretch))
    expect(await editor.connection.sendRequest(PrepareRenameRequest.type, at('N1   | D1'))).toMatchObject({
      placeholder: 'N1',
    })
    await expect(editor.connection.sendRequest(PrepareRenameRequest.type, at('weighs'))).rejects.toThrow('no name here')
    await expect(editor.connection.sendRequest(PrepareRenameRequest.type, at('D1      |'))).rejects.toThrow('by hand')
    await editor.close(uri)
  })

  test.each([
    ['N1   | D1', 'S1', 'There is a wall S1 already.'],
    ['N1   | D1', 'N.1', 'a name cannot hold'],
    ['N1   | D1', '', 'has no name'],
    ['N1   | D1', 'North wall', 'must be one word'],
    ['S1   | A1   | B1         |', 'S1, E1', 'in a list a name holds no comma'],
    ['V_b = ', '2b', '2b is not a name'],
    ['V_b = ', 'q_roof', 'There is an equation q_roof already.'],
    ['CMU8\nmaterial', 'CMU=8', 'on the first line of a block'],
    ['A 0 ft', 'A 1', 'the name of a grid line has no space'],
    ['roof  | 21', 'loft', 'There is a level loft already.'],
  ])('%s cannot be called %s', async (stretch, newName, because) => {
    await expect(renamed(stretch, 0, newName)).rejects.toThrow(because)
  })

  test('a grid line whose new name would make a crossing doubtful keeps its name', async () => {
    const text = building.replace('y: 1 0 ft, 2 18 ft', 'y: 1 0 ft, 2 18 ft, 12 24 ft')
    const uri = fresh()
    await editor.open(uri, text)
    const params = { ...editor.at(uri, text.indexOf('B 24 ft')), newName: 'A1' }
    // A12 would then be A with 12, or A1 with 2.
    await expect(editor.connection.sendRequest(RenameRequest.type, params)).rejects.toThrow('is not renamed')
    await editor.close(uri)
  })

  test('a name in a line that cannot be read stops it, so that no use is left behind', async () => {
    const text = building.replace('* (roof.wall.N1.h)', '* (roof.wall.N1.h')
    const uri = fresh()
    await editor.open(uri, text)
    const params = { ...editor.at(uri, text.indexOf('N1   | D1')), newName: 'Quay' }
    await expect(editor.connection.sendRequest(RenameRequest.type, params)).rejects.toThrow(/Line \d+ cannot be read/)
    await editor.close(uri)
  })
})

describe('the outline', () => {
  test('holds headings, blocks, rows and equations within each other', async () => {
    const uri = fresh()
    await editor.open(uri, building)
    const found = await editor.connection.sendRequest(DocumentSymbolRequest.type, { textDocument: { uri } })
    const paths = (entries: readonly DocumentSymbol[], before = ''): readonly string[] =>
      entries.flatMap(({ name, children = [] }) => [`${before}${name}`, ...paths(children, `${before}${name} > `)])
    const all = paths((found ?? []) as DocumentSymbol[])
    expect(all).toContain('Ferry shed > Walls > walls roof > N1')
    expect(all).toContain('Ferry shed > Walls > equations > V_b')
    expect(all).toContain('Ferry shed > levels > loft')
    const folds = await editor.connection.sendRequest(FoldingRangeRequest.type, { textDocument: { uri } })
    expect(folds?.length).toBeGreaterThan(12)
    await editor.close(uri)
  })
})

describe('formatting', () => {
  test('gives what tidy gives, in edits of the lines that change', async () => {
    const uri = fresh()
    const loose = building.replace('| loft  | 11 ft     |', '| loft  | 11 ft     |   ')
    const document = await editor.open(uri, loose)
    const edits =
      (await editor.connection.sendRequest(DocumentFormattingRequest.type, {
        textDocument: { uri },
        options: { tabSize: 2, insertSpaces: true },
      })) ?? []
    expect(edits.length).toBeGreaterThan(0)
    expect(TextDocument.applyEdits(document, edits)).toBe(tidy(loose))
    await editor.close(uri)
  })
})

describe('a server that does not die', () => {
  const strange: readonly (readonly [string, string])[] = [
    ['nothing', ''],
    ['one fence mark', '```'],
    ['broken front matter', '---\ntitle: [\n  a: b: c\n---\n\n```grid\nx: A 0 ft\n```\n'],
    ['front matter that never ends', '---\ntitle: x\n```grid\n'],
    ['half surrogates', '```equations\n\ud83d = 1 ft\n{{\udc00}}\n```\n\n{{\ud83d}}'],
    ['a byte order mark', '\ufeff```grid\nx: A 0 ft\n```\n'],
    ['old line ends', '```grid\rx: A 0 ft\r```\r'],
    ['a ring', '```equations\na = b\nb = a\n```\n{{a}}'],
    ['deep brackets', `\`\`\`equations\na = ${'('.repeat(5000)}1\n\`\`\`\n`],
    ['deep lists', `${'> '.repeat(3000)}x`],
    ['a table of bars', '```walls roof\n||||\n|-|-|-|\n||||\n|\n```\n'],
  ]

  test.each(strange)('answers all it is asked about %s', async (_, text) => {
    const uri = fresh()
    const document = await editor.open(uri, text)
    await editor.diagnostics(uri)
    const offsets = [...new Set([0, 3, Math.floor(text.length / 2), text.length])]
    for (const offset of offsets) {
      const at = editor.at(uri, Math.min(offset, document.getText().length))
      await editor.completion(uri, offset)
      await editor.connection.sendRequest(HoverRequest.type, at)
      await editor.connection.sendRequest(DefinitionRequest.type, at)
      await editor.connection.sendRequest(ReferencesRequest.type, { ...at, context: { includeDeclaration: true } })
    }
    await editor.connection.sendRequest(DocumentSymbolRequest.type, { textDocument: { uri } })
    await editor.connection.sendRequest(FoldingRangeRequest.type, { textDocument: { uri } })
    await editor.close(uri)
  })

  test('a text beyond the largest is said to be, and asked about without harm', async () => {
    const uri = fresh()
    await editor.open(uri, `\`\`\`grid\nx: A 0 ft\n\`\`\`\n${'words and words\n'.repeat(400_000)}`)
    expect((await editor.diagnostics(uri)).map(({ code }) => code)).toEqual(['file-too-large'])
    expect(await editor.hover(uri, 5)).toBe('')
    await editor.close(uri)
  })

  test('a fault of its own is logged, answered as an error, and the next question is answered', async () => {
    const uri = fresh()
    await editor.open(uri, building)
    const before = editor.logged.length
    // No client sends this; it stands for a fault in an answer.
    const broken = { textDocument: { uri }, position: null }
    await expect(editor.connection.sendRequest('textDocument/hover', broken)).rejects.toThrow('fault of its own')
    expect(editor.logged.length).toBe(before + 1)
    expect(await editor.hover(uri, building.indexOf('grid'))).toContain('grid lines')
    await editor.close(uri)
  })

  test('a document that is not open is answered with nothing', async () => {
    const params = { textDocument: { uri: 'untitled:never.md' }, position: { line: 0, character: 0 } }
    expect(await editor.connection.sendRequest(HoverRequest.type, params)).toBeNull()
  })
})

test('the samples have no diagnostics in an editor either', async () => {
  const samples = fileURLToPath(new URL('../../samples', import.meta.url))
  cpSync(samples, join(workshop, 'samples'), { recursive: true })
  for (const name of ['boatyard.md', 'observatory.md', 'starter.md', 'manual/04-workings.md']) {
    const path = join(workshop, 'samples', name)
    const uri = pathToFileURL(path).href
    await editor.open(uri, readFileSync(path, 'utf8'))
    expect(await editor.diagnostics(uri)).toEqual([])
    await editor.close(uri)
  }
})
