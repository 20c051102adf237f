/** How faults are told: near names, the long form for a reader and the one line for a list. */
import { describe, expect, test } from 'vitest'
import type { Diagnostic } from '../../src/base/diagnostic.ts'
import { inWords, nearNames, suggestion } from '../../src/base/near.ts'
import { longForm, oneLine, sorted } from '../../src/base/report.ts'
import { lineText, positionOf, sourceOf } from '../../src/base/span.ts'

describe('near names', () => {
  test.each([
    ['W11', ['W1', 'W2', 'W12'], ['W1', 'W12']],
    ['hieght', ['height', 'weight', 'length'], ['height', 'weight']],
    ['Centre', ['centre', 'center'], ['centre', 'center']],
    ['kipp', ['kip', 'kips', 'ksi', 'psi'], ['kip', 'kips']],
    ['construction', ['walls', 'areas'], []],
    ['x', ['y', 'z'], []],
    ['ab', ['abcd'], []],
  ])('%s among %j: %j', (written, known, near) => {
    expect(nearNames(written, known)).toEqual(near)
  })

  test('three at most, the nearest first', () => {
    expect(nearNames('wall', ['wally', 'walls', 'wall1', 'ball', 'wa11', 'call'])).toHaveLength(3)
    expect(nearNames('walls', ['wallxy', 'wall'])[0]).toBe('wall')
  })

  test('what there is, when nothing is near; a long list is cut', () => {
    expect(suggestion('W11', ['W1'], 'wall')).toBe('Did you mean W1?')
    expect(suggestion('porch', ['roof'], 'level')).toBe('There is: roof.')
    expect(suggestion('porch', ['roof', 'floor2'], 'level')).toBe('There are: roof, floor2.')
    expect(suggestion('porch', [], 'level')).toBe('There is no level yet.')
    const many = Array.from({ length: 40 }, (_, i) => `LINE${i}`)
    expect(suggestion('porch', many, 'wall')).toMatch(/LINE11, and 28 more\.$/)
    expect(inWords(['a'], 'or')).toBe('a')
    expect(inWords(['a', 'b', 'c'], 'and')).toBe('a, b and c')
  })
})

const text = [
  '# Workshop',
  '',
  '| area | from | to |',
  '|---|---|---|',
  '| Shop | A1 | C2 |',
  '',
  '| wall | from | to |',
  '|---|---|---|',
  '| W7 | 62 ft, 4 ft | 62 ft, 16 ft |',
].join('\n')
const source = sourceOf('workshop.md', text)
const spanOf = (words: string) => ({ start: text.indexOf(words), end: text.indexOf(words) + words.length })

const outside: Diagnostic = {
  rule: 'wall-outside-level',
  severity: 'error',
  message: 'wall W7 stands 2.00 ft outside level roof',
  at: { span: spanOf('62 ft, 4 ft'), text: 'x = 62.00 ft' },
  also: [{ span: spanOf('C2'), text: 'roof ends at grid C, x = 60.00 ft' }],
  help: 'A diaphragm can only push on walls that it meets.\nMove W7 to x ≤ 60.00 ft, or extend an area of roof.',
}

describe('a fault as text', () => {
  test('the long form shows the place, both lines in the order of the page, and what to do', () => {
    expect(longForm(source, outside)).toBe(
      [
        'error[wall-outside-level]: wall W7 stands 2.00 ft outside level roof',
        '  workshop.md:9:8',
        '   5 | | Shop | A1 | C2 |',
        '     |               -- roof ends at grid C, x = 60.00 ft',
        '   9 | | W7 | 62 ft, 4 ft | 62 ft, 16 ft |',
        '     |        ^^^^^^^^^^^ x = 62.00 ft',
        '  A diaphragm can only push on walls that it meets.',
        '  Move W7 to x ≤ 60.00 ft, or extend an area of roof.',
      ].join('\n'),
    )
  })

  test('the short form is one line', () => {
    expect(oneLine(source, outside)).toBe(
      'workshop.md:9:8 error[wall-outside-level] wall W7 stands 2.00 ft outside level roof',
    )
  })

  test('faults stand in the order of the page, each once', () => {
    const first = { ...outside, at: { span: spanOf('Shop'), text: '' } }
    expect(sorted(source, [outside, first, outside])).toEqual([first, outside])
  })

  test('the marks stand under their words when the line holds tabs or is very long', () => {
    const tabbed = sourceOf('t.md', 'a\tb\tfault here')
    expect(
      longForm(tabbed, { ...outside, at: { span: { start: 4, end: 9 }, text: '' }, also: [] })
        .split('\n')
        .slice(2, 4),
    ).toEqual(['   1 | a b fault here', '     |     ^^^^^'])
    const long = sourceOf('l.md', `${'x'.repeat(500)}fault${'y'.repeat(500)}`)
    const [line = '', marks = ''] = longForm(long, {
      ...outside,
      at: { span: { start: 500, end: 505 }, text: '' },
      also: [],
    })
      .split('\n')
      .slice(2, 4)
    expect(line.length).toBeLessThan(120)
    expect(line.slice(marks.indexOf('^'), marks.lastIndexOf('^') + 1)).toBe('fault')
  })

  test('a mark never leaves its line: a span over several lines is marked on its first', () => {
    const three = sourceOf('m.md', 'one\ntwo\nthree')
    expect(
      longForm(three, { ...outside, at: { span: { start: 4, end: 13 }, text: '' }, also: [] })
        .split('\n')
        .slice(2, 4),
    ).toEqual(['   2 | two', '     | ^^^'])
  })

  test('the end of the text, and text without lines, have a place too', () => {
    expect(positionOf(source, text.length)).toEqual({ line: 9, column: 36 })
    expect(positionOf(sourceOf('e.md', ''), 0)).toEqual({ line: 1, column: 1 })
    expect(lineText(sourceOf('c.md', 'a\r\nb\r\n'), 1)).toBe('a')
    const nowhere = { ...outside, at: { span: { start: 0, end: 0 }, text: '' }, also: [] }
    expect(longForm(sourceOf('e.md', ''), nowhere).split('\n')[1]).toBe('  e.md:1:1')
  })

  test('a fault that touches hundreds of places shows its cause and the first of the others', () => {
    const lines = sourceOf('r.md', Array.from({ length: 300 }, (_, i) => `line ${i}`).join('\n'))
    const places = lines.lineStarts.map(start => ({ span: { start, end: start + 4 }, text: '' }))
    const [last = outside.at, ...others] = [...places].reverse()
    const shown = longForm(lines, { ...outside, at: { ...last, text: 'here' }, also: others.reverse() })
    expect(shown).toContain('^^^^ here')
    expect(shown.split('\n').length).toBeLessThan(40)
  })
})
