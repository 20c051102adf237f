/** Walls taken away in a document, against the same document written without them. */
import { describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { closeTo } from '../support/agrees.ts'
import { type Reading, reading } from '../support/worked.ts'

interface Row {
  readonly name: string
  readonly ends: string
  readonly strength?: string
}

const walls: readonly Row[] = [
  { name: 'S1', ends: '0 ft, 0 ft | 10 ft, 0 ft', strength: '30 kip' },
  { name: 'S2', ends: '40 ft, 0 ft | 52 ft, 0 ft', strength: '36 kip' },
  { name: 'N', ends: '0 ft, 40 ft | 11 ft, 40 ft', strength: '33 kip' },
  { name: 'W', ends: '0 ft, 0 ft | 0 ft, 11 ft', strength: '33 kip' },
  { name: 'E', ends: '60 ft, 10 ft | 60 ft, 20 ft', strength: '30 kip' },
  { name: 'K', ends: '50 ft, 10 ft | 58 ft, 24 ft', strength: '40 kip' },
]

const documentOf = (rows: readonly Row[], working = '') =>
  [
    '---\nunits: US\nstandard: ASCE 7-22\n---',
    '```areas roof\n| area | from | to | load |\n|---|---|---|---|\n| Shop | 0 ft, 0 ft | 60 ft, 40 ft | 60 psf |\n```',
    "```construction CMU8\nmaterial: concrete masonry\nf'm: 2000 psi\nt: 7.63 in\nends: cantilever\n```",
    [
      '```walls roof\n| wall | from | to | height | construction | strength |\n|---|---|---|---|---|---|',
      ...rows.map(({ name, ends, strength = '' }) => `| ${name} | ${ends} | 12 ft | CMU8 | ${strength} |`),
      '```',
    ].join('\n'),
    '```forces roof\nx: 30 kip\ny: 24 kip\naccidental: 5%\n```',
    working === '' ? '' : `\`\`\`working roof\n${working}\n\`\`\``,
  ].join('\n\n')

const all = reading(documentOf(walls))

describe('a storey without a wall, or without a line of walls', () => {
  test.each([['none'], ['S1'], ['S2'], ['N'], ['W'], ['E'], ['K'], ['S1+S2']])(
    'without %s drifts as a document in which it does not stand',
    name => {
      const gone = name.split('+')
      const rest = reading(documentOf(walls.filter(wall => !gone.includes(wall.name))))
      for (const [axis, corners] of [
        ['x', ['C1', 'C4']],
        ['y', ['C1', 'C2']],
      ] as const) {
        // C1 lower left, C2 lower right, C4 upper left: one corner of each edge.
        const drifts = ['', '+', '-'].map(mark =>
          corners.map(corner => rest.si(`roof.displacement.${corner}.${axis}.E${axis.toUpperCase()}${mark}`)),
        )
        const ratios = drifts.map(([a = 0, b = 0]) => Math.max(Math.abs(a), Math.abs(b)) / Math.abs((a + b) / 2))
        const largest = Math.max(...ratios)
        closeTo(all.si(`roof.without.${name}.ratio.${axis}`), largest, largest)
        const [a = 0, b = 0] = drifts[ratios.indexOf(largest)] ?? []
        closeTo(all.si(`roof.without.${name}.edge.${axis}.1`), a, Math.abs(a) + Math.abs(b))
        closeTo(all.si(`roof.without.${name}.edge.${axis}.2`), b, Math.abs(a) + Math.abs(b))
      }
    },
  )

  test('loses the share of the strength that the wall has along each axis', () => {
    const whole = { x: 30 + 36 + 33 + (40 * 8) / Math.hypot(8, 14), y: 33 + 30 + (40 * 14) / Math.hypot(8, 14) }
    closeTo(all.in('roof.strength.x', 'kip'), whole.x, whole.x)
    closeTo(all.si('roof.without.N.loss.x'), 33 / whole.x, 1)
    closeTo(all.si('roof.without.N.loss.y'), 0, 1)
    closeTo(all.si('roof.without.S1+S2.loss.x'), 66 / whole.x, 1)
    closeTo(all.si('roof.without.K.loss.y'), (40 * 14) / Math.hypot(8, 14) / whole.y, 1)
  })

  test('counts its walls by length where a strength is missing, and says so', () => {
    const rows = walls.map(wall => (wall.name === 'E' ? { name: wall.name, ends: wall.ends } : wall))
    const read = reading(documentOf(rows))
    closeTo(read.si('roof.without.S2.loss.x'), 12 / (10 + 12 + 11 + 8), 1)
    const told = ({ sheet }: Reading) =>
      sheet.assumptions().filter(({ text }) => /proportion to their length/.test(text)).length
    expect([told(read), told(all)]).toEqual([1, 0])
    closeTo(read.in('roof.lengths.x', 'ft'), 41, 41)
    for (const [id, where] of [
      ['roof.strength.x', read],
      ['roof.lengths.x', all],
      ['roof.without.Q.loss.x', all],
      ['roof.without', all],
      ['roof.without.N', all],
    ] as const)
      expect(where.sheet.scope.lookup(id)).toBeUndefined()
  })
})

describe('the note on the rule', () => {
  const notesOf = (rows: readonly Row[]) => {
    const compiled = compileText('test.md', documentOf(rows, 'redundancy\ndetail: result'))
    expect(compiled.diagnostics).toEqual([])
    return compiled.parts.flatMap(part =>
      part.kind === 'pieces' ? part.pieces.flatMap(piece => (piece.kind === 'note' ? [piece.text] : [])) : [],
    )
  }

  test('names the walls without which a storey is too weak or turns too far, among those higher than long', () => {
    const [x = '', y = ''] = notesOf(walls)
    // W takes 33 of 97.7 kip along y, and without it the ratios are 1.405 and 1.688. K would take more but is longer than high.
    expect(x).toMatch(/does not meet .* without W \(turning\)\.$/)
    expect(y).toMatch(/does not meet .* without W \(strength and turning\)\.$/)
  })

  test('says when what is left falls', () => {
    const [, y = ''] = notesOf(walls.filter(({ name }) => name !== 'K' && name !== 'E'))
    expect(y).toMatch(/W \(it falls\)/)
  })

  test('says where the rule is met', () => {
    const long = walls.map(wall => ({
      ...wall,
      ends: wall.ends
        .replace('10 ft, 0 ft', '20 ft, 0 ft')
        .replace('11 ft, 40 ft', '21 ft, 40 ft')
        .replace('0 ft, 11 ft', '0 ft, 21 ft')
        .replace('60 ft, 20 ft', '60 ft, 30 ft'),
    }))
    for (const text of notesOf(long).slice(0, 2))
      expect(text).toMatch(/^Along [xy] the story below roof meets the rule/)
  })
})
