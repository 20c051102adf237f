/** The value ids that other parts rely on, in a building that has all of them. */
import { describe, expect, test } from 'vitest'
import { levelValue } from '../../src/compute/ids.ts'
import { reading } from '../support/worked.ts'

const text = `
\`\`\`areas roof
| area | from | to | load |
|---|---|---|---|
| Shop | 0 ft, 0 ft | 60 ft, 40 ft | 60 psf |
| Hatch | 30 ft, 4 ft | 36 ft, 10 ft | opening |
\`\`\`

\`\`\`line-loads roof
| line | from | to | load |
|---|---|---|---|
| Parapet | 0 ft, 0 ft | 60 ft, 0 ft | 80 plf |
\`\`\`

\`\`\`point-loads roof
| point | at | load |
|---|---|---|
| Fan | 40 ft, 20 ft | 2 kip |
\`\`\`

\`\`\`construction CMU8
material: concrete masonry
f'm: 2000 psi
t: 7.63 in
ends: cantilever
\`\`\`

\`\`\`walls roof
| wall | from | to | height | construction |
|---|---|---|---|---|
| S | 0 ft, 0 ft | 40 ft, 0 ft | 12 ft | CMU8 |
| N | 0 ft, 40 ft | 30 ft, 40 ft | 12 ft | CMU8 |
| W | 0 ft, 0 ft | 0 ft, 30 ft | 12 ft | CMU8 |
| K | 50 ft, 10 ft | 58 ft, 24 ft | 12'-6" | CMU8 |
\`\`\`

\`\`\`forces roof
x: 0.2 * roof.W
y: 0.15 * roof.W
accidental: 5%
\`\`\`
`

const { value, in: of, sheet } = reading(text)
const cases = ['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'] as const

describe('the names of the results contract', () => {
  test.each([
    ['roof.W', 'kip'],
    ['roof.area', 'ft^2'],
    ['roof.perimeter', 'ft'],
    ['roof.CM.x', 'ft'],
    ['roof.CM.y', 'ft'],
    ['roof.CR.x', 'ft'],
    ['roof.CR.y', 'ft'],
    ['roof.e.x', 'ft'],
    ['roof.e.y', 'ft'],
    ['roof.K.xx', 'kip/in'],
    ['roof.K.xy', 'kip/in'],
    ['roof.K.yy', 'kip/in'],
    ['roof.J', 'kip*ft^2/in'],
    ['roof.wall.K.k', 'kip/in'],
    ['roof.wall.K.L', 'ft'],
    ['roof.wall.K.h', 'ft'],
    ['roof.force.x', 'kip'],
    ['roof.storey.y', 'kip'],
    ['roof.areas.Shop.A', 'ft^2'],
    ['roof.areas.Hatch.A', 'ft^2'],
    ['roof.lines.Parapet.W', 'kip'],
    ['roof.points.Fan.W', 'kip'],
    ['constructions.CMU8.E', 'ksi'],
    ['constructions.CMU8.G', 'ksi'],
    ["constructions.CMU8.f'm", 'psi'],
    ['constructions.CMU8.t', 'in'],
  ])('%s is found under that very id, in %s', (id, unitText) => {
    expect(value(id).id).toBe(id)
    expect(Number.isFinite(of(id, unitText))).toBe(true)
    expect(value(id).unit.factors.length).toBeGreaterThan(0)
  })

  test('every case has its shears, its moment, its displacements and its residual', () => {
    for (const name of cases) {
      for (const wall of ['S', 'N', 'W', 'K'])
        for (const key of ['V', 'Vd', 'Vt'])
          expect(value(`roof.wall.${wall}.${key}.${name}`).id).toBe(`roof.wall.${wall}.${key}.${name}`)
      for (const key of ['T', 'u', 'v', 'phi', 'drift', 'displacement.CM.x', 'displacement.C2.y', 'residual.M'])
        expect(Number.isFinite(value(`roof.${key}.${name}`).si), `${key} ${name}`).toBe(true)
    }
  })

  test('the weight and the centre of mass by hand', () => {
    // (2400 - 36) ft² at 60 psf, 60 ft at 80 plf, and 2 kip.
    const W = (2364 * 60) / 1000 + 4.8 + 2
    expect(of('roof.W', 'kip')).toBeCloseTo(W, 9)
    expect(of('roof.CM.x', 'ft')).toBeCloseTo((144 * 30 - 2.16 * 33 + 4.8 * 30 + 2 * 40) / W, 9)
    expect(of('roof.CM.y', 'ft')).toBeCloseTo((144 * 20 - 2.16 * 7 + 4.8 * 0 + 2 * 20) / W, 9)
  })
})

test('an area, a line and a point of one name are told apart', () => {
  const { in: told } = reading(`
\`\`\`areas
| area | from | to | load |
|---|---|---|---|
| East | 0 ft, 0 ft | 60 ft, 40 ft | 50 psf |
\`\`\`

\`\`\`line-loads
| line | from | to | load |
|---|---|---|---|
| East | 60 ft, 0 ft | 60 ft, 40 ft | 100 plf |
\`\`\`

\`\`\`point-loads
| point | at | load |
|---|---|---|
| East | 58 ft, 20 ft | 3 kip |
\`\`\`
`)
  expect(told('level.areas.East.Wx', 'kip*ft')).toBeCloseTo(120 * 30, 9)
  expect(told('level.lines.East.Wx', 'kip*ft')).toBeCloseTo(4 * 60, 9)
  expect(told('level.points.East.Wx', 'kip*ft')).toBeCloseTo(3 * 58, 9)
  expect(told('level.lines.East.I', 'kip*ft^2')).not.toBe(told('level.areas.East.I', 'kip*ft^2'))
})

describe('names that are not there', () => {
  test.each([
    'roof.foo',
    'roof.W.x',
    'roof.CM',
    'roof.CM.z',
    'roof.wall.Q.k',
    'roof.wall.S.foo',
    'roof.wall.S.V.EZ',
    'roof.corner.C99.x',
    'roof.T.WX',
    'roof.areas.Nave.A',
    'roof.wall.S.V.EX.more',
    'constructions.CMU12.E',
    'constructions.CMU8.foo',
    'attic.W',
    'roof.constructor',
    'roof.__proto__',
    'roof.wall.__proto__.k',
    'roof.',
    'roof..W',
    '.',
    '',
  ])('%j is no value', id => {
    expect(sheet.scope.lookup(id)).toBeUndefined()
  })

  test('a level answers no path that is longer than its names', () => {
    const [roof] = sheet.levels
    expect(roof && levelValue(roof, ['wall', 'S', 'V', 'EX', 'EX'])).toBeUndefined()
    expect(roof && levelValue(roof, [])).toBeUndefined()
  })
})
