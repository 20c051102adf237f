/** What the language server offers where someone writes, asked over its protocol. */
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { CompletionItem } from 'vscode-languageserver-protocol/node'
import { TextDocument } from 'vscode-languageserver-textdocument'
import { topics } from '../../src/read/topics.ts'
import { building, Editor, marked } from './client.ts'

let editor: Editor
beforeAll(async () => {
  editor = await Editor.start()
})
afterAll(async () => {
  await editor.end()
})

const labels = (items: readonly CompletionItem[]) => items.map(({ label }) => label)
const detailOf = (items: readonly CompletionItem[], label: string) => items.find(item => item.label === label)?.detail

/** The building with some of its text replaced; the new text holds the mark. */
const written = (before: string, after: string) => {
  if (!building.includes(before)) throw new Error(`${before} is not there`)
  return building.replace(before, () => after)
}
const added = (text: string) => `${building}\n${text}`

/** The text that choosing an item leaves. */
function chosen(text: string, items: readonly CompletionItem[], label: string): string {
  const edit = items.find(item => item.label === label)?.textEdit
  if (!edit || !('range' in edit)) throw new Error(`${label} is not offered`)
  return TextDocument.applyEdits(TextDocument.create('x', 'markdown', 1, marked(text).text), [edit])
}

describe('on the first line of a fence', () => {
  test('every topic is offered after the marks, with what it is', async () => {
    const items = await editor.offered(added('```‸'))
    expect(labels(items)).toEqual([...topics])
    expect(items.every(({ detail }) => (detail ?? '').length > 10)).toBe(true)
    expect(chosen(added('```wa‸'), await editor.offered(added('```wa‸')), 'walls')).toMatch(/```walls$/)
  })

  test('the levels after a topic that is about one, and its settings as options', async () => {
    const items = await editor.offered(added('```forces ‸\n```'))
    expect(labels(items)).toEqual(['loft', 'roof', 'x=', 'y=', 'accidental='])
    expect(detailOf(items, 'roof')).toMatch(/^W = [\d.]+ kip$/)
    expect(labels(await editor.offered(added('```equations ‸\n```')))).toEqual([])
    expect(labels(await editor.offered(added('```working roof detail=‸\n```')))).toEqual(['full', 'table', 'result'])
  })
})

describe('in a table', () => {
  const head = '| wall | from | to         | height | construction |'

  test('columns that its head does not have yet', async () => {
    const items = await editor.offered(
      written(`${head}\n|------|------|------------|`, `${head} ‸\n|------|------|------------|`),
    )
    expect(labels(items)).toEqual(['k', 'strength', 'note'])
    expect(detailOf(items, 'k')).toContain('stated stiffness')
  })

  test('units between the brackets of a column', async () => {
    const items = await editor.offered(written('| level | elevation |', '| level | elevation (‸) |'))
    expect(labels(items)).toContain('ft')
  })

  test('constructions, and grid crossings with their places', async () => {
    const items = await editor.offered(written('10 ft  | CMU8         |\n| S1', '10 ft  | ‸         |\n| S1'))
    expect(labels(items)).toEqual(['CMU8'])
    expect(detailOf(items, 'CMU8')).toMatch(/^E = 1,800 ksi/)
    const points = await editor.offered(written('| N1   | A2   | B2         |', '| N1   | A2   | ‸         |'))
    expect(labels(points)).toEqual(['A1', 'A2', 'B1', 'B2', 'C1', 'C2'])
    expect(detailOf(points, 'B2')).toBe('24 ft, 18 ft')
    expect(labels(await editor.offered(written('C / 14 ft', 'C / ‸')))).toEqual(['1', '2'])
  })

  test('the walls of the level in openings', async () => {
    const items = await editor.offered(written('| N1   | D1      | 3 ft |', '| ‸   | D1      | 3 ft |'))
    expect(labels(items)).toEqual(['N1', 'S1', 'W1', 'E1'])
    expect(detailOf(items, 'S1')).toBe('L = 24 ft')
  })

  test('units after a number, those of the kind that is wanted first', async () => {
    const text = written('| 60 psf |', '| 60 ‸ |')
    const items = await editor.offered(text)
    expect(labels(items).slice(0, 4)).toEqual(['psf', 'ksf', 'psi', 'ksi'])
    expect(chosen(text, items, 'psf')).toContain('| 60 psf |')
    const height = await editor.offered(written('10 ft  | CMU8         |\n| S1', '10 f‸  | CMU8         |\n| S1'))
    expect(labels(height)[0]).toBe('ft')
  })

  test('values and the word opening for a load', async () => {
    const items = await editor.offered(written('| q_roof |', '| ‸ |'))
    expect(labels(items)).toEqual(expect.arrayContaining(['opening', 'q_roof', 'loft.area']))
    expect(detailOf(items, 'q_roof')).toBe('42 psf')
  })

  test('nothing for a name or a note, and nothing in the line of dashes', async () => {
    expect(await editor.offered(written('| W1   | A1   | A2         |', '| ‸   | A1   | A2         |'))).toEqual([])
    expect(await editor.offered(written('|-------|-----------|', '|-------|‸-----------|'))).toEqual([])
  })
})

describe('in settings', () => {
  test('those of the material that are not set yet', async () => {
    const items = await editor.offered(written('ends: cantilever\n', '‸\n'))
    expect(labels(items)).toEqual(['ends:', 'E:', 'G:', 'nu:'])
    expect(detailOf(items, 'nu:')).toContain("Poisson's ratio")
    const concrete = await editor.offered(written("concrete masonry\nf'm: 2000 psi\n", 'concrete\n‸\n'))
    expect(labels(concrete)).toContain("f'c:")
    expect(labels(concrete)).not.toContain("f'm:")
  })

  test('words where only some are allowed, units where a number is', async () => {
    expect(labels(await editor.offered(written('ends: cantilever', 'ends: ‸')))).toEqual(['cantilever', 'fixed'])
    expect(labels(await editor.offered(written('t: 7.63 in', 't: 7.63 ‸')))[0]).toBe('in')
    expect(labels(await editor.offered(written('x: A 0 ft, B 24 ft', 'x: A 0 ft, B 24 ‸')))[0]).toBe('ft')
  })

  test('nothing in a comment', async () => {
    expect(await editor.offered(written('ends: cantilever', 'ends: cantilever # ‸'))).toEqual([])
  })
})

describe('in equations', () => {
  test('values with their numbers, without the line itself, and no word among them', async () => {
    const text = written('V_b = 0.2 * roof.W', 'V_b = 0.2 * ‸')
    const items = await editor.offered(text)
    expect(labels(items)).toEqual(
      expect.arrayContaining(['q_roof', 'roof.area', 'roof.wall.N1.h', 'grid.B', 'constructions.CMU8.t']),
    )
    expect(labels(items)).not.toContain('V_b')
    expect(labels(items)).not.toContain('roof.governing.wall')
    expect(detailOf(items, 'roof.wall.N1.h')).toBe('10 ft')
  })

  test('a name begun is replaced whole, dots and all', async () => {
    const text = written('V_b = 0.2 * roof.W', 'V_b = 0.2 * roof.ar‸')
    expect(chosen(text, await editor.offered(text), 'roof.area')).toContain('V_b = 0.2 * roof.area -> kip')
  })

  test('units after the arrow, and after a number with part of a unit', async () => {
    expect(labels(await editor.offered(written('-> kip', '-> ‸')))).toEqual(expect.arrayContaining(['kip', 'kN', '%']))
    const text = written('20 psf + 22 psf', '20 kN/‸')
    expect(chosen(text, await editor.offered(text), 'm')).toContain('q_roof = 20 kN/m ')
  })
})

describe('in a working', () => {
  test('what may be asked for, in the spelling of the document, and its settings', async () => {
    const items = await editor.offered(written('wall stiffness\nwalls: N1, S1', '‸\nwalls: N1, S1'))
    expect(labels(items)).toEqual(expect.arrayContaining(['whole calculation', 'center of mass', 'detail:', 'case:']))
    expect(labels(items)).not.toContain('walls:')
    const british = written('wall stiffness\nwalls: N1, S1', '‸').replace('units: US', 'units: US\nlanguage: en-GB')
    expect(labels(await editor.offered(british))).toContain('centre of mass')
  })

  test('the walls that its list does not have yet', async () => {
    expect(labels(await editor.offered(written('walls: N1, S1', 'walls: N1, ‸')))).toEqual(['S1', 'W1', 'E1'])
  })
})

describe('in quotes', () => {
  test('every value with what it prints, names of walls among them', async () => {
    const text = written('{{roof.W}} and', '{{ro‸}} and')
    const items = await editor.offered(text)
    expect(detailOf(items, 'roof.W')).toMatch(/^[\d.]+ kip$/)
    expect(detailOf(items, 'roof.governing.wall')).toMatch(/^[NSEW]1$/)
    expect(chosen(text, items, 'roof.area')).toContain('{{roof.area}} and')
  })

  test('while the closing braces are still missing', async () => {
    expect(labels(await editor.offered(added('The loft weighs {{loft.‸')))).toContain('loft.W')
  })

  test('steps to round to after the bar, in units of the value’s kind', async () => {
    const items = await editor.offered(written('{{roof.W}} and', '{{roof.W | ‸}} and'))
    expect(labels(items).slice(0, 3)).toEqual(['1 kip', '0.1 kip', '0.01 kip'])
    expect(labels(items)).toContain('1 kN')
    expect(labels(items)).not.toContain('1 ft')
  })
})

describe('elsewhere', () => {
  test.each([
    ['prose', 'The roof wei‸ghs'],
    ['a fence of another kind', '```js\nroof.‸\n```'],
    ['a fence of another kind with a fence of ours shown in it', '````markdown\n```walls roof\n| ‸\n```\n````'],
    ['code in a line', 'so `{{roof.‸}}` prints'],
    ['the line that closes a fence', '```grid\nx: A 0 ft\n```‸'],
    ['the line that closes an empty fence', '```working roof\n```‸'],
    ['a Markdown table', '| wall | ‸ |\n|---|---|\n| a | b |'],
  ])('nothing is offered in %s', async (_, text) => {
    // A second grid would be a fault of its own, and is none of this.
    expect(await editor.offered(added(text))).toEqual([])
  })

  test('nothing in the front matter, and nothing in Markdown that has no block of ours', async () => {
    expect(await editor.offered(building.replace('units: US', 'units: ‸'))).toEqual([])
    expect(await editor.offered('The site is {{ site.‸ }}')).toEqual([])
  })
})
