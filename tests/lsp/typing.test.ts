/** Whatever half of a document stands there, every question has an answer. */
import { expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { offersAt } from '../../src/lsp/completion.ts'
import { definitionAt, usesAt } from '../../src/lsp/definition.ts'
import { lineEdits } from '../../src/lsp/edits.ts'
import { toldAt } from '../../src/lsp/hover.ts'
import { opened } from '../../src/lsp/opened.ts'
import { foldsOf, outlineOf } from '../../src/lsp/outline.ts'
import { renameable } from '../../src/lsp/rename.ts'
import { nothingNearby } from '../../src/read/nearby.ts'
import { randomFrom } from '../support/random.ts'
import { building } from './client.ts'

const rebuilder = { compile: (text: string) => compileText('x.md', text), page: () => ({}) as never }

/** Asks all that an editor may ask about a place. @returns how much was offered */
function askAll(text: string, offsets: readonly number[]): number {
  const document = opened('x.md', text, rebuilder, nothingNearby)
  outlineOf(document)
  foldsOf(document)
  let offered = 0
  for (const offset of offsets) {
    const offers = offersAt(document, offset)
    offered += offers.length
    // What an offer takes the place of ends where one writes, within its line.
    for (const { replaces } of offers) {
      expect(replaces.end).toBe(offset)
      expect(text.slice(replaces.start, replaces.end)).not.toContain('\n')
    }
    toldAt(document, offset)
    definitionAt(document, offset)
    usesAt(document, offset, true)
    renameable(document, offset)
  }
  return offered
}

test('a document typed from nothing is answered about at every stage', () => {
  let offered = 0
  for (let end = 0; end <= building.length; end += 17) offered += askAll(building.slice(0, end), [end])
  expect(offered).toBeGreaterThan(500)
})

test('a document with a stretch cut out is answered about around the cut', () => {
  const random = randomFrom(20261201)
  for (let i = 0; i < 150; i++) {
    const at = random.whole(0, building.length)
    const length = random.whole(0, 60)
    const text = building.slice(0, at) + building.slice(at + length)
    askAll(text, [Math.max(0, at - 3), Math.min(text.length, at), Math.min(text.length, at + 5)])
  }
})

test('edits of lines turn one text into the other, and touch no line that is in both at its place', () => {
  const random = randomFrom(7)
  const lines = ['a\n', 'b\n', 'c\r\n', '\n', 'd']
  const some = () => Array.from({ length: random.whole(0, 7) }, () => random.pick(lines)).join('')
  for (let i = 0; i < 400; i++) {
    const [before, after] = [some(), some()]
    const edits = lineEdits(before, after)
    const made = edits
      .toReversed()
      .reduce((text, { span, text: put }) => text.slice(0, span.start) + put + text.slice(span.end), before)
    expect(made).toBe(after)
    if (before === after) expect(edits).toEqual([])
  }
})
