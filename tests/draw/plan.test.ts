import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { drawPlan } from '../../src/draw/plan.ts'
import { textStyles } from '../../src/draw/style.ts'
import type { PlanView } from '../../src/draw/view.ts'
import { plans } from './plans.ts'
import {
  all,
  firstStroke,
  offSheet,
  overlapsOf,
  ownText,
  type ReadElement,
  readXml,
  textsOf,
  viewBox,
  withClass,
} from './reading.ts'
import { bare, buildings, hangar, wall } from './views.ts'

const read = (view: PlanView): ReadElement => readXml(drawPlan(view))
const building = (name: string): PlanView => buildings[name] ?? bare
const wordsOf = (root: ReadElement): readonly string[] => textsOf(root).map(({ text }) => text)

describe.each(Object.entries(buildings))('%s', (_, view) => {
  test('no two texts overlap', () => {
    expect(overlapsOf(read(view))).toEqual([])
  })
  test('every text lies on the sheet', () => {
    const root = read(view)
    expect(offSheet(root)).toEqual([])
  })
  test('every wall has its name, every shear its figure', () => {
    const texts = textsOf(read(view))
    const names = texts.filter(({ role }) => role === 'wall').map(({ text, full }) => full ?? text)
    const figures = texts.filter(({ role }) => role === 'figure' || role === 'governing').map(({ text }) => text)
    expect(names.sort()).toEqual(view.walls.map(({ name }) => name).sort())
    expect(figures.sort()).toEqual(view.walls.flatMap(({ shear }) => (shear ? [shear.printed] : [])).sort())
  })
  test('every grid line has its bubble', () => {
    const root = read(view)
    expect(withClass(root, 'pm-bubble')).toHaveLength(view.gridX.length + view.gridY.length)
    expect(wordsOf(root)).toEqual(expect.arrayContaining([...view.gridX, ...view.gridY].map(({ name }) => name)))
  })
})

describe('any plan', () => {
  test('is well-formed, no wider than a page, with no two texts overlapping and none off the sheet', () => {
    fc.assert(
      fc.property(plans, view => {
        const root = read(view)
        const [, , width = 0, height = 0] = viewBox(root)
        expect(width).toBeGreaterThan(0)
        expect(width).toBeLessThanOrEqual(740)
        expect(height).toBeGreaterThan(0)
        expect(overlapsOf(root)).toEqual([])
        expect(offSheet(root)).toEqual([])
        expect(JSON.stringify(root)).not.toMatch(/NaN|Infinity/)
      }),
      { numRuns: 60, seed: 20261102 },
    )
  }, 120_000)

  test('gives the same bytes twice', () => {
    fc.assert(
      fc.property(plans, view => drawPlan(view) === drawPlan(structuredCloneOf(view))),
      { numRuns: 20, seed: 7 },
    )
  }, 120_000)
})

/** A copy that shares nothing with the view but its functions. */
function structuredCloneOf(view: PlanView): PlanView {
  const { dimension, ...rest } = view
  return { ...structuredClone(rest), dimension }
}

test('a plan far from its origin is drawn as it is at its origin', () => {
  const near: PlanView = {
    ...bare,
    walls: [wall('A', { x: 0, y: 0 }, { x: 8, y: 0 }, 5), wall('B', { x: 8, y: 0 }, { x: 8, y: 4 }, -3)],
  }
  const away = { x: 2 ** 20, y: -(2 ** 21) }
  const moved = (p: { readonly x: number; readonly y: number }): { x: number; y: number } => ({
    x: p.x + away.x,
    y: p.y + away.y,
  })
  const far = { ...near, walls: near.walls.map(each => ({ ...each, from: moved(each.from), to: moved(each.to) })) }
  expect(drawPlan(far)).toBe(drawPlan(near))
})

test('a hostile name is set as the characters it is made of', () => {
  const name = '<script>alert("1")</script>&amp;'
  const view = { ...bare, title: name, walls: [wall(name, { x: 0, y: 0 }, { x: 9, y: 0 }, 1)] }
  const svg = drawPlan(view)
  expect(svg).not.toContain('<script')
  expect(textsOf(readXml(svg)).find(({ role }) => role === 'wall')?.full ?? '').toBe('')
  expect(wordsOf(readXml(svg))).toContain(name)
  expect(ownText(all(readXml(svg), ({ tag }) => tag === 'title')[0] ?? { tag: '', attributes: {}, children: [] })).toBe(
    name,
  )
})

test('a name too long for its wall is shortened, and whole in its title', () => {
  const name = 'Retaining wall along the boundary with the old mill, upper part'
  const root = read({ ...bare, walls: [wall(name, { x: 0, y: 0 }, { x: 9, y: 0 })] })
  const label = textsOf(root).find(({ role }) => role === 'wall')
  expect(label?.text).toMatch(/^Retaining wall .*…$/)
  expect(label?.full).toBe(name)
})

test('names read from below or from the right, along walls at every angle', () => {
  for (let degrees = 0; degrees < 360; degrees += 7) {
    const angle = (degrees * Math.PI) / 180
    const root = read({
      ...bare,
      walls: [wall('Wall', { x: 0, y: 0 }, { x: 9 * Math.cos(angle), y: 9 * Math.sin(angle) })],
    })
    const set = textsOf(root).find(({ role }) => role === 'wall')?.angle ?? Number.NaN
    expect(Math.abs(Math.sin(set + angle)), `wall at ${degrees}°`).toBeLessThan(1e-4)
    expect(set * 180).toBeGreaterThanOrEqual(-105.001 * Math.PI)
    expect(set * 180).toBeLessThan(75.001 * Math.PI)
  }
})

describe('a shear arrow', () => {
  const walls = [10, -5, 0.001, 0].map((shear, idx) =>
    wall(`W${idx}`, { x: 0, y: idx * 6 }, { x: 20, y: idx * 6 }, shear),
  )
  const root = read({ ...bare, walls })
  const arrows = withClass(root, 'pm-shear').map(firstStroke)
  const lengths = arrows.map(([x0, , x1]) => x1 - x0)

  test('is as long as its shear is great; one too small to scale is a head alone, a shear of nothing has none', () => {
    const [greatest = 0, half = 0, head = 0, sample, sampleHead] = lengths
    expect(lengths).toHaveLength(5)
    expect(half / greatest).toBeCloseTo(-0.5, 4)
    expect(head).toBeCloseTo(5.5, 2)
    expect([sample, sampleHead]).toEqual([24, 5.5])
    expect(wordsOf(root)).toContain('too small for its arrow to scale')
  })
  test('has a key of a round figure, at the scale of the arrows', () => {
    const keyed = read({ ...bare, walls, forceUnit: { si: 1000, name: 'kN' } })
    const drawn = withClass(keyed, 'pm-shear').map(firstStroke)
    const key = /this arrow: ([\d.]+) kN/.exec(wordsOf(keyed).join(' '))?.[1]
    const [first = [0, 0, 0, 0], , , sample = [0, 0, 0, 0]] = drawn
    expect(key).toBe('5')
    expect((sample[2] - sample[0]) / (first[2] - first[0])).toBeCloseTo(5 / 10, 4)
  })
  test('points from the first end of its wall to the second when positive, back when negative', () => {
    expect(lengths.slice(0, 3).map(Math.sign)).toEqual([1, -1, 1])
  })
})

test('the force ends at its point', () => {
  const view: PlanView = { ...building('granary'), force: { at: { x: 4, y: 5 }, x: 3, y: 4, printed: '5 kN' } }
  const { centreOfMass: _, centreOfRigidity: __, ...rest } = view
  const arrow = withClass(read(rest), 'pm-force')[0]
  const walls = withClass(read(rest), 'pm-wall').map(firstStroke)
  const [north = [0, 0, 0, 0], south = [0, 0, 0, 0]] = walls
  const [x, y] = firstStroke(arrow ?? { tag: '', attributes: {}, children: [] })
  const scale = (south[1] - north[1]) / 18
  expect(x).toBeCloseTo(north[0] + (4 - 3) * scale, 1)
  expect(y).toBeCloseTo(south[1] - 5 * scale, 1)
})

describe('the legend', () => {
  test('explains only what is drawn', () => {
    const line = wall('W1', { x: 0, y: 0 }, { x: 6, y: 0 })
    expect(withClass(read({ ...bare, walls: [line] }), 'pm-t-legend')).toHaveLength(0)
    const words = wordsOf(read(building('granary')))
    expect(words).toContain('centre of rigidity')
    expect(words).not.toContain('eccentricity')
    expect(wordsOf(read(building('ropewalk')))).toEqual(expect.arrayContaining(['eccentricity', 'wall that governs']))
  })
  test('says when a centre lies beyond the sheet', () => {
    const view = { ...building('ropewalk'), centreOfRigidity: { at: { x: 900, y: 0 }, printed: '2952.8, 0.0 ft' } }
    const words = wordsOf(read(view))
    expect(words).toContain('Beyond the sketch: CR 2952.8, 0.0 ft')
    expect(words).not.toContain('center of rigidity')
  })
})

describe('the governing wall', () => {
  test('is framed, its figure underlined', () => {
    const root = read(building('ropewalk'))
    expect(withClass(root, 'pm-governs')).toHaveLength(2)
    expect(withClass(root, 'pm-t-governing').map(ownText)).toEqual(['19.8'])
    expect(drawPlan(building('ropewalk'))).toMatch(/\.pm-t-governing\{text-decoration:underline/)
  })
  test('is named even among a thousand others', () => {
    const walls = hangar.walls.map((each, idx) => (idx === 517 ? { ...each, governs: true } : each))
    expect(wordsOf(read({ ...hangar, walls }))).toContain('W518')
  })
})

describe('a thousand walls', () => {
  test('are all drawn, and the names and figures left out are counted', () => {
    const root = read(hangar)
    expect(withClass(root, 'pm-wall')).toHaveLength(1000)
    const set = textsOf(root).filter(({ role }) => role === 'wall' || role === 'figure').length
    const area = textsOf(root).some(({ text }) => text === 'Hall') ? 0 : 1
    const missing = 2000 - set + area
    expect(missing).toBeGreaterThan(0)
    expect(wordsOf(root).join(' ')).toContain(`${missing} names and figures are left out`)
    expect(overlapsOf(root)).toEqual([])
  })
  test('have the grid names that found no room counted', () => {
    const root = read(hangar)
    const bubbles = withClass(root, 'pm-bubble').length
    expect(withClass(root, 'pm-gridline')).toHaveLength(130)
    expect(wordsOf(root).join(' ')).toContain(`${130 - bubbles} grid lines are drawn without their names`)
  })
})

describe('dimensions', () => {
  /** Without walls, whose ends are dimensioned too. */
  const dimensionsOf = (view: PlanView): readonly string[] =>
    textsOf(read({ ...view, walls: [] }))
      .filter(({ role }) => role === 'dimension')
      .map(({ text }) => text)

  test('run between grid lines, with the whole where it is more than one', () => {
    expect(dimensionsOf(building('ropewalk'))).toEqual(['24 ft', '36 ft', '60 ft', '22 ft', '18 ft', '40 ft'])
  })
  test('without a grid give the extents of the building', () => {
    expect(dimensionsOf(building('boathouse'))).toEqual(['64 ft', '46 ft'])
  })
  test('with one grid line give the extents too', () => {
    expect(dimensionsOf({ ...building('boathouse'), gridX: [{ name: 'A', at: 4 }] })).toEqual(['64 ft', '46 ft'])
  })
  test('have a tick at either end of each', () => {
    const ticks = withClass(read({ ...building('ropewalk'), walls: [] }), 'pm-tick').map(
      ({ attributes }) => (attributes.d ?? '').split('M').length - 1,
    )
    expect(ticks).toEqual([3, 2, 3, 2])
  })
})

describe('the element', () => {
  const root = read(building('ropewalk'))

  test('tells its title and description to those who cannot see it', () => {
    const [title, description] = (root.attributes['aria-labelledby'] ?? '').split(' ')
    const byId = (id: string | undefined): string | undefined => all(root, e => e.attributes.id === id).map(ownText)[0]
    expect(root.attributes.role).toBe('img')
    expect(byId(title)).toBe(building('ropewalk').title)
    expect(byId(description)).toBe(building('ropewalk').description)
  })
  test('has ids of its own', () => {
    const ids = Object.values(buildings).flatMap(view =>
      all(read(view), e => e.attributes.id !== undefined).map(e => e.attributes.id),
    )
    expect(new Set(ids).size).toBe(ids.length)
  })
  test('styles nothing outside itself', () => {
    const style = all(root, ({ tag }) => tag === 'style')
      .map(ownText)
      .join('')
    const selectors = [...style.matchAll(/([^{}]+)\{[^{}]*\}/g)].map(([, selector]) => selector ?? '')
    expect(selectors.length).toBeGreaterThan(20)
    expect(selectors.filter(selector => !selector.startsWith('.pm-plan ') || selector.includes(','))).toEqual([])
    expect(style).not.toMatch(/[<>&]/)
  })
  test.each(Object.entries(buildings))('styles every class that %s uses, and no other', (_, view) => {
    const drawn = read(view)
    const style = all(drawn, ({ tag }) => tag === 'style')
      .map(ownText)
      .join('')
    const used = all(drawn, ({ tag }) => tag !== 'g' && tag !== 'svg')
    const classes = new Set(used.flatMap(e => (e.attributes.class ?? '').split(' ').filter(name => name !== '')))
    const styled = [...style.matchAll(/\.(pm-[a-z-]+)\{/g)].map(([, name]) => name ?? '')
    expect([...classes].filter(name => !styled.includes(name))).toEqual([])
    expect(styled.filter(name => !classes.has(name) && withClass(drawn, name).length === 0)).toEqual([])
  })
  test('sets no text below 11', () => {
    expect(Math.min(...Object.values(textStyles).map(({ size }) => size))).toBeGreaterThanOrEqual(11)
  })
})
