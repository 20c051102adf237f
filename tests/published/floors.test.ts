/** Areas, centroids and polar moments of floors against closed forms of geometry, and openings against floors drawn without them. */
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'

interface Floor {
  readonly A: number
  readonly x: number
  readonly y: number
  /** Polar second moment of area about the centroid. */
  readonly polar: number
}

/** Area, centroid and polar moment of a floor of unit load, from its weight and mass moments. */
function floor(rows: readonly string[]): Floor {
  const { in: of } = reading(
    ['```areas roof', '| area | from | to | outline | load |', '|---|---|---|---|---|', ...rows, '```'].join('\n'),
  )
  const W = of('roof.W', 'kN')
  closeTo(of('roof.area', 'm^2'), W, W)
  return { A: W, x: of('roof.CM.x', 'm'), y: of('roof.CM.y', 'm'), polar: of('roof.I_p', 'kN*m^2') }
}

type Corner = readonly [x: number, y: number]
const outlined = (name: string, corners: readonly Corner[], load = '1 kPa') =>
  `| ${name} | | | ${corners.map(([x, y]) => `(${x} m, ${y} m)`).join(' ')} | ${load} |`
const boxed = (name: string, [x1, y1]: Corner, [x2, y2]: Corner, load = '1 kPa') =>
  `| ${name} | ${x1} m, ${y1} m | ${x2} m, ${y2} m | | ${load} |`

function same(found: Floor, expected: Floor, share = 1e-9): void {
  closeTo(found.A, expected.A, expected.A, share)
  closeTo(found.x, expected.x, Math.sqrt(expected.A), share)
  closeTo(found.y, expected.y, Math.sqrt(expected.A), share)
  closeTo(found.polar, expected.polar, expected.polar, share)
}

describe('areas, centroids and polar moments', () => {
  test('a triangle: half its base times its height, a third of its corners, A/36 of its squared sides', () => {
    const corners: readonly Corner[] = [
      [2, 1],
      [11, 3],
      [5, 9],
    ]
    const A = 0.5 * Math.abs(9 * 8 - 3 * 2)
    const sides = 9 ** 2 + 2 ** 2 + (6 ** 2 + 6 ** 2) + (3 ** 2 + 8 ** 2)
    same(floor([outlined('T', corners)]), { A, x: 18 / 3, y: 13 / 3, polar: (A * sides) / 36 })
  })

  test('a rectangle, in corners and in outline: A (b² + d²)/12', () => {
    const expected = { A: 60, x: 8, y: 5.5, polar: (60 * (12 ** 2 + 5 ** 2)) / 12 }
    same(floor([boxed('R', [2, 3], [14, 8])]), expected)
    same(floor([boxed('R', [14, 3], [2, 8])]), expected)
    same(
      floor([
        outlined('R', [
          [2, 3],
          [14, 3],
          [14, 8],
          [2, 8],
        ]),
      ]),
      expected,
    )
  })

  test('a trapezoid of sides a and b: h (a + b)/2, at h (2b + a)/(3 (a + b)) from a', () => {
    const [a, b, h] = [12, 6, 4]
    const found = floor([
      outlined('Z', [
        [0, 0],
        [a, 0],
        [a - 3, h],
        [a - 3 - b, h],
      ]),
    ])
    const A = (h * (a + b)) / 2
    // Symmetric about x = 6, and so the sum of a rectangle 6 x 4 and two triangles 3 x 4.
    const y = (h * (2 * b + a)) / (3 * (a + b))
    const part = (area: number, width: number, height: number, by: number, dx: number, dy: number) =>
      (area * (width ** 2 + height ** 2)) / by + area * (dx ** 2 + dy ** 2)
    const polar = part(24, 6, 4, 12, 0, 2 - y) + 2 * part(6, 3, 4, 18, 4, h / 3 - y)
    same(found, { A, x: 6, y, polar })
  })

  test('a polygon of 360 sides: n r²/2 sin(2π/n), and A r²/6 (2 + cos(2π/n)); a circle to four digits', () => {
    const [n, r] = [360, 15]
    const corners = Array.from({ length: n }, (_, i): Corner => {
      const angle = (2 * Math.PI * (i + 0.3)) / n
      return [40 + r * Math.cos(angle), 25 + r * Math.sin(angle)]
    })
    const A = (n * r ** 2 * Math.sin((2 * Math.PI) / n)) / 2
    const found = floor([outlined('O', corners)])
    same(found, { A, x: 40, y: 25, polar: (A * r ** 2 * (2 + Math.cos((2 * Math.PI) / n))) / 6 })
    closeTo(found.A, Math.PI * r ** 2, found.A, 1e-4)
    closeTo(found.polar, (Math.PI * r ** 4) / 2, found.polar, 2e-4)
  })

  test('two areas of unlike load meet at their common centre of mass', () => {
    const { in: of } = reading(
      [
        '```areas roof',
        '| area | from | to | load |',
        '|---|---|---|---|',
        '| L | 0 m, 0 m | 4 m, 4 m | 3 kPa |',
        '| R | 4 m, 0 m | 10 m, 4 m | 1 kPa |',
        '```',
      ].join('\n'),
    )
    closeTo(of('roof.W', 'kN'), 72, 72)
    closeTo(of('roof.CM.x', 'm'), (48 * 2 + 24 * 7) / 72, 10)
  })

  test('line and point loads: a line counts with w L³/12 of its own, a point with nothing', () => {
    const { in: of } = reading(
      [
        '```areas roof',
        '| area | from | to | load |',
        '|---|---|---|---|',
        '| F | 0 m, 0 m | 10 m, 10 m | 0 kPa |',
        '```',
        '',
        '```line-loads roof',
        '| line | from | to | load |',
        '|---|---|---|---|',
        '| P | 0 m, 0 m | 6 m, 8 m | 2 kN/m |',
        '```',
        '',
        '```point-loads roof',
        '| point | at | load |',
        '|---|---|---|',
        '| U | 9 m, 4 m | 10 kN |',
        '```',
      ].join('\n'),
    )
    closeTo(of('roof.W', 'kN'), 30, 30)
    closeTo(of('roof.CM.x', 'm'), (20 * 3 + 10 * 9) / 30, 10)
    closeTo(of('roof.CM.y', 'm'), 4, 10)
    closeTo(of('roof.I_p', 'kN*m^2'), (2 * 10 ** 3) / 12 + 20 * 2 ** 2 + 10 * 4 ** 2, 500)
  })
})

describe('openings', () => {
  const hall = boxed('Hall', [0, 0], [20, 10])

  test('one wholly within takes away its own area and moment', () => {
    const found = floor([hall, boxed('Well', [12, 2], [16, 8], 'opening')])
    const [A, cut] = [200, 24]
    const net = A - cut
    const x = (A * 10 - cut * 14) / net
    const polar = (A * 500) / 12 + A * (10 - x) ** 2 - (cut * 52) / 12 - cut * (14 - x) ** 2
    same(found, { A: net, x, y: 5, polar })
  })

  test('one over the edge takes away only what is there', () => {
    const found = floor([hall, boxed('Bite', [15, -5], [30, 5], 'opening')])
    same(
      found,
      floor([
        outlined('Hall', [
          [0, 0],
          [15, 0],
          [15, 5],
          [20, 5],
          [20, 10],
          [0, 10],
        ]),
      ]),
    )
    closeTo(found.A, 175, 175)
  })

  test('one across two areas of unlike load takes from each at its own load', () => {
    const { in: of } = reading(
      [
        '```areas roof',
        '| area | from | to | load |',
        '|---|---|---|---|',
        '| L | 0 m, 0 m | 10 m, 10 m | 4 kPa |',
        '| R | 10 m, 0 m | 20 m, 10 m | 1 kPa |',
        '| Well | 8 m, 0 m | 14 m, 5 m | opening |',
        '```',
      ].join('\n'),
    )
    closeTo(of('roof.W', 'kN'), 400 - 40 + 100 - 20, 500)
    closeTo(of('roof.area', 'm^2'), 170, 170)
    closeTo(of('roof.CM.x', 'm'), (400 * 5 - 40 * 9 + 100 * 15 - 20 * 12) / 440, 20)
    closeTo(of('roof.CM.y', 'm'), (400 * 5 - 40 * 2.5 + 100 * 5 - 20 * 2.5) / 440, 20)
  })

  test('two that overlap take their common part once', () => {
    const found = floor([hall, boxed('A', [2, 2], [8, 8], 'opening'), boxed('B', [6, 4], [12, 6], 'opening')])
    const [cut, tail] = [36, 8]
    const net = 200 - cut - tail
    const x = (2000 - cut * 5 - tail * 10) / net
    const y = 5
    const polar =
      (200 * 500) / 12 +
      200 * (10 - x) ** 2 -
      ((cut * 72) / 12 + cut * (5 - x) ** 2) -
      ((tail * 20) / 12 + tail * (10 - x) ** 2)
    same(found, { A: net, x, y, polar })
  })

  test('a triangle cut from a corner leaves the other four corners', () => {
    const found = floor([
      hall,
      outlined(
        'Cut',
        [
          [20, 10],
          [14, 10],
          [20, 6],
        ],
        'opening',
      ),
    ])
    const net = 200 - 12
    const [x, y] = [(2000 - 12 * 18) / net, (1000 - (12 * 26) / 3) / net]
    const sides = 6 ** 2 + 4 ** 2 + (6 ** 2 + 4 ** 2)
    const polar =
      (200 * 500) / 12 +
      200 * ((10 - x) ** 2 + (5 - y) ** 2) -
      (12 * sides) / 36 -
      12 * ((18 - x) ** 2 + (26 / 3 - y) ** 2)
    same(found, { A: net, x, y, polar })
  })

  test('a crooked one across a crooked edge comes to the same as the floor drawn around it, to a tenth of a micrometre', () => {
    const roof: readonly Corner[] = [
      [0, 0],
      [20, 4],
      [18, 12],
      [1, 9],
    ]
    // Cut from the right side, between two points of it.
    const on = (share: number): Corner => [20 - 2 * share, 4 + 8 * share]
    const notch: readonly Corner[] = [on(0.25), on(0.75), [13, 9], [12, 6.5]]
    const beyond: readonly Corner[] = [on(0.25), [25, 6], [25, 10], on(0.75), [13, 9], [12, 6.5]]
    const drawn = [roof[0], roof[1], on(0.25), [12, 6.5], [13, 9], on(0.75), roof[2], roof[3]] as readonly Corner[]
    const expected = floor([outlined('Roof', drawn)])
    same(floor([outlined('Roof', roof), outlined('Notch', notch, 'opening')]), expected, 1e-7)
    same(floor([outlined('Roof', roof), outlined('Notch', beyond, 'opening')]), expected, 1e-7)
    expect(expected.A).toBeLessThan(150)
  })
})
