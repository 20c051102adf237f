/** Storey forces and shears: ordinates to scale, equilibrium, and the words that stand for them. */
import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { drawStoreys } from '../../src/draw/storeys.ts'
import type { StoreyView } from '../../src/draw/storeyview.ts'
import { figuresOf } from '../support/figures.ts'
import { reading } from '../support/worked.ts'
import {
  firstStroke,
  offSheet,
  overlapsOf,
  pathPoints,
  type ReadElement,
  readXml,
  textsOf,
  withClass,
} from './reading.ts'
import { storeyBuildings } from './storeyviews.ts'

const read = (view: StoreyView): ReadElement => readXml(drawStoreys(view))
const building = (name: string): StoreyView => {
  const found = storeyBuildings[name]
  if (!found) throw new Error(`there is no building ${name}`)
  return found
}
const twoLevels = readFileSync(new URL('../golden/two-levels/input.md', import.meta.url), 'utf8')

describe.each(Object.entries(storeyBuildings))('%s', (_, view) => {
  const root = read(view)

  test('sets no text upon another or off the sheet', () => {
    expect(overlapsOf(root)).toEqual([])
    expect(offSheet(root)).toEqual([])
    expect(JSON.stringify(root)).not.toMatch(/NaN|Infinity/)
  })

  test('steps out as far as the shear is great, on one scale for both axes', () => {
    const greatest = Math.max(
      ...view.levels.flatMap(({ along }) => [along.x, along.y].map(a => Math.abs(a?.shear.value ?? 0))),
    )
    const drawn = withClass(root, 'pm-step').map(pathPoints)
    expect(drawn).toHaveLength(view.axes.length)
    const widest = Math.max(...drawn.flatMap(points => points.map(p => Math.abs(p.x - (points[0]?.x ?? 0)))))
    view.axes.forEach((axis, panel) => {
      const points = drawn[panel] ?? []
      const zero = points[0]?.x ?? 0
      view.levels.forEach(({ along }, idx) => {
        const out = (points[1 + 2 * idx]?.x ?? 0) - zero
        const share = (along[axis]?.shear.value ?? 0) / (greatest || 1)
        expect(out).toBeCloseTo(share * widest, 1)
      })
    })
  })

  test('stands every level at its height', () => {
    const points = pathPoints(withClass(root, 'pm-step')[0])
    const base = points.at(-1)?.y ?? 0
    const top = points[0]?.y ?? 0
    const highest = view.levels[0]?.elevation?.metres ?? 1
    view.levels.forEach(({ elevation }, idx) => {
      if (elevation)
        expect(base - (points[1 + 2 * idx]?.y ?? 0)).toBeCloseTo(((base - top) * elevation.metres) / highest, 1)
    })
  })

  test('gives the same bytes twice', () => {
    expect(drawStoreys(structuredClone(view))).toBe(drawStoreys(view))
  })
})

test('arrows are in proportion, point the way of their force, and a force of nothing has none', () => {
  const drawn = withClass(read({ ...building('mixedSigns'), axes: ['x'] }), 'pm-shear')
  const lengths = drawn.map(firstStroke).map(([x0, , x1]) => x1 - x0)
  // Forces of 100, −240, 0.02 and 180 kN.
  expect((lengths[0] ?? 0) / (lengths[3] ?? 1)).toBeCloseTo(100 / 180, 3)
  expect((lengths[1] ?? 0) / (lengths[3] ?? 1)).toBeCloseTo(-240 / 180, 3)
  expect(withClass(read(building('nothing')), 'pm-shear')).toEqual([])
})

test('every figure is printed where there is room for all', () => {
  for (const name of ['threeLevels', 'thirtyLevels', 'mezzanines', 'mixedSigns']) {
    const view = building(name)
    const wanted = view.levels.flatMap(({ along }) =>
      view.axes.flatMap(axis => [along[axis]?.force.printed, along[axis]?.shear.printed]),
    )
    const texts = textsOf(read(view)).map(({ text }) => text)
    expect(
      wanted.filter(text => text !== undefined && !texts.includes(text)),
      name,
    ).toEqual([])
  }
})

test('a long name is shortened, and whole in its title', () => {
  const label = textsOf(read(building('mezzanines'))).find(({ full }) => full?.startsWith('aaaa'))
  expect(label?.text).toMatch(/^a+…$/)
  expect(label?.full).toBe('a'.repeat(400))
})

test('what is left out of a very tall building is counted', () => {
  const words = textsOf(read(building('ninetyLevels'))).map(({ text }) => text)
  const names = words.filter(text => /^Level \d+$/.test(text)).length
  expect(words).toContain(`Figures of ${90 - names} levels are left out for want of room.`)
})

describe('the working', () => {
  const asked = (lines: string, source = twoLevels) => compileText('a.md', `${source}\n\`\`\`working${lines}\n\`\`\`\n`)

  test('prints shears that hold the forces above them in equilibrium', () => {
    const { sheet, si } = reading(twoLevels)
    const made = sheet.storeys()
    if (!made.ok) throw new Error('the storeys can be worked')
    const { table } = made.value
    expect(table.rows).toEqual(['roof', 'floor'])
    // The forces as the source states them: 6 and 10 kip, 1 kip = 4448.2216152605 N exactly.
    const kip = 4448.2216152605
    for (const axis of ['x', 'y']) {
      const shears = Array.from(table.column(`V_${axis}`).numbers)
      expect(shears[0]).toBeCloseTo(6 * kip, 6)
      expect(shears[1]).toBeCloseTo(16 * kip, 6)
      expect(shears[1]).toBe(si(`floor.storey.${axis}`))
    }
  })

  test('brings a table, a diagram with its figures in words, and the shear at the base as a step', () => {
    const document = asked('\nstory shears')
    expect(document.diagnostics).toEqual([])
    const figure = figuresOf(document).find(({ id }) => id === 'storeys.diagram')
    expect(figure?.alternative).toBe(
      'Force of each level and shear of the story below it, from the top down. ' +
        'roof at 23 ft: force 6 kip and shear 6 kip along x, force 6 kip and shear 6 kip along y. ' +
        'floor at 12 ft: force 10 kip and shear 16 kip along x, force 10 kip and shear 16 kip along y.',
    )
    expect([...document.context.roots.keys()]).toEqual(
      expect.arrayContaining(['roof.elevation', 'roof.force.x', 'roof.storey.x', 'floor.storey.y']),
    )
  })

  test('names no level where all are meant, and may name one to work its shear', () => {
    const ids = (lines: string) =>
      asked(lines)
        .parts.flatMap(part => (part.kind === 'pieces' ? part.pieces : []))
        .flatMap(piece => (piece.kind === 'equation' ? [piece.id] : []))
        .slice(-2)
    expect(ids('\nstorey shears\ndetail: result')).toEqual(['floor.storey.x', 'floor.storey.y'])
    expect(ids(' roof\nstorey shears\ndetail: result')).toEqual(['roof.storey.x', 'roof.storey.y'])
    expect(asked(' attic\nstorey shears').diagnostics.map(({ severity }) => severity)).toContain('error')
  })

  test('of one level without an elevation is a diagram of one storey, not to scale', () => {
    const starter = readFileSync(new URL('../../samples/starter.md', import.meta.url), 'utf8')
    const document = asked(' roof\nstorey shears', starter)
    expect(document.diagnostics).toEqual([])
    const svg = figuresOf(document).find(({ id }) => id === 'storeys.diagram')?.svg ?? ''
    expect(svg).toContain('The height is not to scale: no elevation is stated.')
  })

  test('where a level has no force along one axis prints none there', () => {
    const source = twoLevels.replace('| roof  | 6 kip  | 6 kip  |', '| roof  |        | 6 kip  |')
    const document = asked('\nstorey shears', source)
    expect(document.diagnostics).toEqual([])
    expect(figuresOf(document).at(-1)?.alternative).toContain('roof at 23 ft: force 0 kip and shear 0 kip along x')
  })

  test('where a level has no forces says so', () => {
    const source = twoLevels.replace('| roof  | 6 kip  | 6 kip  |\n', '')
    expect(asked('\nstorey shears', source).diagnostics.map(({ rule }) => rule)).toContain('forces-missing')
  })
})
