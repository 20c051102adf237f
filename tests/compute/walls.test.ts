/** Walls that cannot hold a floor, and the way in which a wall counts its shear. */
import { describe, expect, test } from 'vitest'
import { reading } from '../support/worked.ts'

const areaBlock = (level: string, x1: number, x2: number, depth: number, load: number) =>
  [
    `\`\`\`areas ${level}`,
    '| area | from | to | load |',
    '|---|---|---|---|',
    `| F | ${x1} m, 0 m | ${x2} m, ${depth} m | ${load} kPa |`,
    '```',
  ].join('\n')

describe('walls that cannot hold a floor', () => {
  const floorWith = (rows: readonly string[]) =>
    reading(
      [
        areaBlock('roof', 0, 20, 12, 4),
        ['```walls roof', '| wall | from | to | k |', '|---|---|---|---|', ...rows, '```'].join('\n'),
        '```forces roof\nx: 100 kN\n```',
      ].join('\n\n'),
    )
  const faultOf = (rows: readonly string[]) => {
    const found = floorWith(rows).sheet.scope.lookup('roof.CR.x')
    return found && !found.ok ? found.because.map(({ rule, message }) => `${rule}: ${message}`) : []
  }

  test.each([
    [
      'none along y',
      ['| A | 0 m, 0 m | 8 m, 0 m | 5 kN/mm |', '| B | 0 m, 12 m | 8 m, 12 m | 5 kN/mm |'],
      'no stiffness along y',
    ],
    [
      'none along x',
      ['| A | 0 m, 0 m | 0 m, 8 m | 5 kN/mm |', '| B | 9 m, 0 m | 9 m, 8 m | 5 kN/mm |'],
      'no stiffness along x',
    ],
    [
      'all parallel at an angle',
      ['| A | 0 m, 0 m | 6 m, 3 m | 5 kN/mm |', '| B | 8 m, 2 m | 14 m, 5 m | 7 kN/mm |'],
      'all walls are parallel',
    ],
    [
      'all through one point',
      [
        '| A | 0 m, 6 m | 6 m, 6 m | 5 kN/mm |',
        '| B | 10 m, 0 m | 10 m, 4 m | 5 kN/mm |',
        '| C | 12 m, 8 m | 14 m, 10 m | 5 kN/mm |',
      ],
      'all walls meet in one point',
    ],
    ['only one', ['| A | 0 m, 0 m | 6 m, 3 m | 5 kN/mm |'], 'all walls are parallel'],
  ])('%s: no centre is made up', (_, rows, because) => {
    expect(faultOf(rows)).toEqual([`walls-unstable: the walls of roof cannot hold it: ${because}`])
  })

  test('a wall of no length is refused where it stands', () => {
    expect(faultOf(['| A | 0 m, 0 m | 0 m, 0 m | 5 kN/mm |', '| B | 9 m, 0 m | 9 m, 8 m | 5 kN/mm |'])).toEqual([
      'wall-without-length: wall A has no length',
    ])
  })

  test('some walls with a unit and some without cannot be put together', () => {
    expect(faultOf(['| A | 0 m, 0 m | 5 m, 0 m | 5 kN/mm |', '| B | 9 m, 0 m | 9 m, 8 m | 5 |'])[0]).toMatch(
      /^stiffness-mixed: /,
    )
  })
})

describe('the sign and the direction of a wall', () => {
  const shears = (row: string) => {
    const read = reading(
      [
        areaBlock('roof', 0, 20, 12, 4),
        [
          '```walls roof',
          '| wall | from | to | k |',
          '|---|---|---|---|',
          row,
          '| S | 0 m, 0 m | 20 m, 0 m | 9 kN/mm |',
          '| N | 0 m, 12 m | 20 m, 12 m | 9 kN/mm |',
          '```',
        ].join('\n'),
        '```forces roof\ny: 100 kN\naccidental: 0%\n```',
      ].join('\n\n'),
    )
    return read.in('roof.wall.W.V.EY', 'kN')
  }

  test('a wall parallel to y is positive upward, whichever end is written first', () => {
    expect(shears('| W | 4 m, 2 m | 4 m, 10 m | 5 kN/mm |')).toBeCloseTo(100, 9)
    expect(shears('| W | 4 m, 10 m | 4 m, 2 m | 5 kN/mm |')).toBeCloseTo(100, 9)
  })

  // Not so yet: the direction is taken from the sign of x₂ − x₁, which here is that of its last bit.
  test('and also where its two ends were summed in other ways and differ in their last bit', () => {
    expect(shears('| W | 0.1 m + 0.2 m, 2 m | 0.3 m, 10 m | 5 kN/mm |')).toBeCloseTo(100, 9)
    expect(shears('| W | 0.3 m, 2 m | 0.1 m + 0.2 m, 10 m | 5 kN/mm |')).toBeCloseTo(100, 9)
  })
})
