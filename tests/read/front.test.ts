import { expect, test } from 'vitest'
import { readFront } from '../../src/read/front.ts'

const at = (text: string) => ({ text, span: { start: 4, end: 4 + text.length } })

test('front matter of plain lines is read as YAML reads it, places and all', () => {
  const lines = [
    ...['title: Lateral calculation', 'number: 26-001', 'date: 2026-11-20', 'units: US', 'rev: 0', 'a: b  ', 'b:   c'],
    ...['', '  ', 'n: null', 't: true', 'i: 007', 'f: 1e3', 'h: 0x1F', 'q: it\'s "so"', 'list: a, b [c] {d}', 'é: f'],
    ...['g: h: i', 'j: k # no', 'l: m#n', 'o: &p q', 'r: s & t', 'u: *v', "w: 'x'", 'y: "z"', 'aa:', 'bb: ', 'cc:dd'],
    ...[
      'ee: - ff',
      '- gg',
      '# hh',
      'ii: |',
      '  jj',
      'kk: >',
      'll: mm\tnn',
      'oo:\tpp',
      'title: again',
      'true: 1',
      '~: 2',
    ],
    ...['qq: rr ss  tt', 'uu: é 𝒳 –', 'vv: !ww', 'xx: x!y %z @', '...', '%YAML 1.2', 'yy: 12:30', 'zz: a\\b'],
  ]
  let plain = 0
  for (const first of lines)
    for (const second of ['', ...lines]) {
      const text = `${first}\n${second}`
      // A comment is left to the YAML reader, and says nothing.
      const comment = '# left to the reader\n'
      const expected = readFront({ text: comment + text, span: { start: 4 - comment.length, end: 4 + text.length } })
      const { entries, faults } = readFront(at(text))
      expect([...entries], text).toEqual([...expected.entries])
      expect(
        faults.map(({ message }) => message),
        text,
      ).toEqual(expected.faults.map(({ message }) => message))
      if (faults.length === 0 && entries.size > 0) plain++
    }
  expect(plain).toBeGreaterThan(500)
})
