/** What the cells of a document mean, read through the whole pipeline. */
import { describe, expect, test } from 'vitest'
import { type Compiled, compileText } from '../../src/compile.ts'

const compiled = (text: string): Compiled => compileText('x.md', text)
const rules = (text: string): readonly string[] => compiled(text).diagnostics.map(({ rule }) => rule)

/** Values of a document by their ids, in base SI. */
function quoted(text: string, ...ids: string[]): readonly number[] {
  const names = ids.map((id, i) => `asked${i} = ${id}`).join('\n')
  const document = compiled(`${text}\n\`\`\`equations\n${names}\n\`\`\`\n`)
  expect(document.diagnostics).toEqual([])
  return ids.map((_, i) => document.context.roots.get(`asked${i}`)?.si ?? Number.NaN)
}

const FOOT = 0.3048
const grid = '```grid\nx: A 0 ft, B 24 ft, 11 40 ft\ny: 1 0 ft, 2 18 ft\n```\n\n'
const point = (at: string) =>
  `${grid}\`\`\`areas\n| area | from | to | load |\n|---|---|---|---|\n| S | 0 ft, 0 ft | 40 ft, 18 ft | 9 psf |\n\`\`\`\n\n\`\`\`point-loads\n| point | at | load |\n|---|---|---|\n| P | ${at} | 1 kip |\n\`\`\`\n`

describe('a point', () => {
  test.each([
    ['A1', 0, 0],
    ['B2', 24, 18],
    ['A+6 ft / 2', 6, 18],
    ['B - 2 ft/1+3 ft', 22, 3],
    ['11 / 2', 40, 18],
    ['A, 4 ft', 0, 4],
    ['6\'-3", 2*(2 ft)', 6.25, 4],
    ['B-2 ft+1 ft, 1', 23, 0],
  ])('%s is where it says', (at, x, y) => {
    const [px, py] = quoted(point(at), 'level.points.P.x', 'level.points.P.y')
    expect(px).toBeCloseTo(x * FOOT, 12)
    expect(py).toBeCloseTo(y * FOOT, 12)
  })

  test.each(['C1', '4 ft', 'A', '1, 2, 3'])('%s is none', at => {
    expect(rules(point(at))).toContain('not-a-point')
  })

  test('that two crossings share is refused', () => {
    const shared = point('A11')
      .replace('y: 1 0 ft, 2 18 ft', 'y: 1 0 ft, 2 18 ft, 11 9 ft')
      .replace('x: A', 'x: A1 3 ft, A')
    expect(rules(shared)).toContain('crossing-ambiguous')
  })
})

const areas = (row: string, head = '| area | from | to | outline | load |\n|---|---|---|---|---|') =>
  `${grid}\`\`\`areas roof\n${head}\n${row}\n\`\`\`\n`

describe('an area', () => {
  test('is the same whichever corners and winding give it', () => {
    for (const shape of [
      'A1 | B2 | ',
      'B2 | A1 | ',
      'B1 | A2 | ',
      ' | | A1 B1 B2 A2',
      ' | | A2 B2 B1 A1',
      ' | | (A, 1) B1 (24 ft, 18 ft) (A, 2)',
    ]) {
      const [area, cx] = quoted(areas(`| S | ${shape} | 9 psf |`), 'roof.area', 'roof.areas.S.x')
      expect(area, shape).toBeCloseTo(24 * 18 * FOOT ** 2, 9)
      expect(cx, shape).toBeCloseTo(12 * FOOT, 9)
    }
  })

  test('takes the unit of its column where the number is bare', () => {
    const [load] = quoted(
      areas('| S | A1 | B2 | 50 |', '| area | from | to | load (psf) |\n|---|---|---|---|'),
      'roof.areas.S.w',
    )
    expect(load).toBeCloseTo((50 * 4.4482216152605) / FOOT ** 2, 6)
  })

  test('of bare number from a value takes it too, and its step still holds', () => {
    const text = `${areas('| S | A1 | B2 | 10*n |', '| area | from | to | load (psf) |\n|---|---|---|---|')}\n\`\`\`equations\nn = 5\n\`\`\`\n`
    const [load] = quoted(text, 'roof.areas.S.w')
    expect(load).toBeCloseTo((50 * 4.4482216152605) / FOOT ** 2, 6)
  })

  test('with less than three corners, none between them, or a load below zero is refused', () => {
    expect(rules(areas('| S | | | A1 B2 | 9 psf |'))).toEqual(['outline-too-short'])
    expect(rules(areas('| S | A1 | A2 | | 9 psf |'))).toEqual(['area-empty'])
    expect(rules(areas('| S | | | (0 ft, 0 ft) (4 ft, 4 ft) (8 ft, 8 ft) | 9 psf |'))).toEqual(['area-empty'])
    expect(rules(areas('| S | A1 | B2 | | -9 psf |'))).toEqual(['load-below-zero'])
  })

  test('may rest on the plan it is part of, but not on the weight', () => {
    expect(rules(areas('| S | A1 | B2 | | 20 kip / roof.area |'))).toEqual([])
    expect(rules(areas('| S | A1 | B2 | | roof.W / roof.area |'))).toEqual(['ring-of-definitions'])
  })
})

describe('openings', () => {
  const cut = (...rows: string[]) =>
    areas(['| S | A1 | B2 | | 10 psf |', '| T | B1 | 40 ft, 18 ft | | 20 psf |', ...rows].join('\n'))
  const net = (...rows: string[]) =>
    quoted(cut(...rows), 'roof.area', 'roof.W').map((value, i) => value / (i === 0 ? FOOT ** 2 : 4448.2216152605))

  test('over two areas take from each by its own load', () => {
    const [area, weight] = net('| H | 20 ft, 2 ft | 30 ft, 6 ft | | opening |')
    expect(area).toBeCloseTo(40 * 18 - 40, 6)
    expect(weight).toBeCloseTo((24 * 18 - 16) * 0.01 + (16 * 18 - 24) * 0.02, 9)
  })

  test('that overlap take the shared plan once, and say so', () => {
    const text = cut('| H | 2 ft, 2 ft | 8 ft, 8 ft | | opening |', '| I | 5 ft, 5 ft | 11 ft, 11 ft | | opening |')
    const document = compiled(`${text}\n\`\`\`equations\na = roof.area\n\`\`\`\n`)
    expect(document.diagnostics.map(({ rule }) => rule)).toEqual(['opening-partly-outside'])
    expect((document.context.roots.get('a')?.si ?? 0) / FOOT ** 2).toBeCloseTo(40 * 18 - 36 - 36 + 9, 6)
  })
})

describe('equations', () => {
  const text = (...lines: string[]) => `\`\`\`equations\n${lines.join('\n')}\n\`\`\`\n`

  test('may stand in any order', () => {
    expect(quoted(text('c = a + b', 'b = 2*a', 'a = 3 m'), 'c')).toEqual([9])
  })

  test('in a chain of thousands, written backwards, are worked', () => {
    const n = 4000
    const lines = Array.from({ length: n }, (_, i) => (i === n - 1 ? `v${i} = 1 m` : `v${i} = v${i + 1} + 1 m`))
    expect(quoted(text(...lines), 'v0')).toEqual([n])
  })

  test('in a ring of thousands end in one message', () => {
    const n = 3000
    const lines = Array.from({ length: n }, (_, i) => `v${i} = v${(i + 1) % n} + 1 m`)
    const found = new Set(rules(text(...lines)))
    expect([...found].every(rule => rule === 'ring-of-definitions' || rule === 'definitions-too-deep')).toBe(true)
    expect(found.size).toBeGreaterThan(0)
  })
})

describe('spelling', () => {
  test('American and British workings are the same', () => {
    const ask = (words: string) =>
      compiled(`${areas('| S | A1 | B2 | | 9 psf |')}\n\`\`\`working roof\n${words}\n\`\`\`\n`)
    expect(ask('center of mass').parts.length).toBe(ask('Centre of mass').parts.length)
    expect(ask('center of mass').diagnostics).toEqual([])
  })
})
