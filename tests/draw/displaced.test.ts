/** The displaced shape against the closed form of a rigid body that moves and turns by a small angle. */
import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { drawDisplaced } from '../../src/draw/displaced.ts'
import type { DisplacedView } from '../../src/draw/displacedview.ts'
import { figuresOf } from '../support/figures.ts'
import { displacedBuildings } from './displacedviews.ts'
import { apart, offSheet, overlapsOf, pathPoints, type ReadElement, readXml, textsOf, withClass } from './reading.ts'

const read = (view: DisplacedView): ReadElement => readXml(drawDisplaced(view))
const wordsOf = (root: ReadElement): string =>
  textsOf(root)
    .map(({ text }) => text)
    .join(' | ')

/** The factor that the key prints. */
function factorOf(root: ReadElement): number {
  const printed = /displaced × ([\d.,\u202f]+)/.exec(wordsOf(root))?.[1]
  return printed === undefined ? 1 : Number(printed.replace(/[,\u202f]/g, ''))
}

describe.each(Object.entries(displacedBuildings))('%s', (_, view) => {
  const root = read(view)

  test('sets no text upon another or off the sheet', () => {
    expect(overlapsOf(root)).toEqual([])
    expect(offSheet(root)).toEqual([])
    expect(JSON.stringify(root)).not.toMatch(/NaN|Infinity/)
  })

  test('moves every corner of the slab as a rigid body does, times the factor that is printed', () => {
    const rest = withClass(root, 'pm-rest')[0]
    const moved = withClass(root, 'pm-edge')[0]
    const [a, b] = [pathPoints(rest), pathPoints(moved)]
    const corners = view.outline.flat()
    expect(a).toHaveLength(corners.length)
    expect(b).toHaveLength(corners.length)
    // The scale of the sheet from two corners at rest, which lie where the slab was given.
    const [p, q] = [corners[0] ?? { x: 0, y: 0 }, corners[2] ?? { x: 0, y: 0 }]
    const scale = apart(a[0], a[2]) / Math.hypot(p.x - q.x, p.y - q.y)
    const factor = factorOf(root)
    const { at, u, v, phi } = view.centre
    corners.forEach((corner, idx) => {
      // Chopra, Dynamics of Structures, rigid diaphragm: u_x = u − y θ, u_y = v + x θ about the centre (from memory, unchecked).
      const dx = (u - phi * (corner.y - at.y)) * factor * scale
      const dy = (v + phi * (corner.x - at.x)) * factor * scale
      expect((b[idx]?.x ?? 0) - (a[idx]?.x ?? 0)).toBeCloseTo(dx, 1)
      expect((b[idx]?.y ?? 0) - (a[idx]?.y ?? 0)).toBeCloseTo(-dy, 1)
    })
  })

  test('prints the movement of the centres and of the corner, and the rotation', () => {
    const words = wordsOf(root)
    expect(words).toContain(`CM ${view.mass.printed}`)
    expect(words).toContain(`C2 ${view.corner.printed}`)
    expect(words).toContain(`CR ${view.printed.centre}`)
    expect(words).toContain(view.printed.rotation)
  })

  test('gives the same bytes twice', () => {
    expect(drawDisplaced(structuredClone(view))).toBe(drawDisplaced(view))
  })
})

test('the factor is 1, 2 or 5 times a power of ten, and moves no point farther than a tenth of the plan', () => {
  for (const view of Object.values(displacedBuildings)) {
    const root = read(view)
    const factor = factorOf(root)
    expect([1, 2, 5]).toContain(Number(factor.toExponential()[0]))
    const rest = pathPoints(withClass(root, 'pm-rest')[0])
    const moved = pathPoints(withClass(root, 'pm-edge')[0])
    const size = Math.max(...rest.map(p => p.x), ...rest.map(p => p.y)) - Math.min(...rest.map(p => Math.min(p.x, p.y)))
    expect(Math.max(...rest.map((p, idx) => apart(p, moved[idx])))).toBeLessThanOrEqual(size * 0.11)
  }
})

test('what does not move has no arrow and no factor', () => {
  const root = read(displacedBuildings.still ?? never())
  expect(withClass(root, 'pm-shear')).toEqual([])
  expect(wordsOf(root)).not.toContain('×')
  expect(read(displacedBuildings.turning ?? never())).toSatisfy(turning => withClass(turning, 'pm-shear').length > 0)
})

test('the arrow of the rotation turns the way the slab does', () => {
  const drawn = displacedBuildings.turning ?? never()
  const arcOf = (phi: number) => {
    const arcs = withClass(read({ ...drawn, centre: { ...drawn.centre, phi } }), 'pm-shear')
    return arcs.map(({ attributes }) => attributes.d ?? '').find(d => d.includes(' A ')) ?? ''
  }
  // The sweep flag of an arc is 1 when it runs clockwise on the sheet.
  expect(/A \S+ \S+ 0 0 (\d)/.exec(arcOf(0.0004))?.[1]).toBe('0')
  expect(/A \S+ \S+ 0 0 (\d)/.exec(arcOf(-0.0004))?.[1]).toBe('1')
})

test('a displacement in full brings the sketch of its case, told in words with the figures of its table', () => {
  const source = readFileSync(new URL('../../samples/boatyard.md', import.meta.url), 'utf8')
  const compiled = compileText('boatyard.md', source)
  const figure = figuresOf(compiled).find(({ id }) => id.startsWith('roof.displaced.'))
  const name = figure?.id.replace('roof.displaced.', '') ?? ''
  const values = compiled.context.roots
  const inches = (id: string) => (values.get(id)?.si ?? Number.NaN) / 0.0254
  const told = /centre of mass moves|center of mass moves ([−\d.]+), ([−\d.]+) in/.exec(figure?.alternative ?? '')
  const [x, y] = [told?.[1], told?.[2]].map(text => Number(text?.replace('−', '-')))
  expect(x).toBeCloseTo(inches(`roof.displacement.CM.x.${name}`), 5)
  expect(y).toBeCloseTo(inches(`roof.displacement.CM.y.${name}`), 5)
  expect(figure?.alternative).toContain('106.33 kip')
  expect(figure?.alternative).toMatch(/turns .*rad/)
})

test('the displaced shape can be asked for alone, in one case or in all, and not where stiffness is relative', () => {
  const source = readFileSync(new URL('../golden/two-levels/input.md', import.meta.url), 'utf8')
  const asked = (text: string) => compileText('a.md', `${source}\n\`\`\`working ${text}\n\`\`\`\n`)
  const ids = (text: string) =>
    figuresOf(asked(text))
      .map(({ id }) => id)
      .filter(id => id.includes('.displaced.'))
  expect(ids('roof\ndisplaced shape\ncase: EX+')).toEqual(['roof.displaced.EX+'])
  expect(ids('roof\ndisplaced shape\ncase: all')).toHaveLength(6)
  expect(ids('roof\ndisplaced shape')).toHaveLength(1)
  const relative = readFileSync(new URL('../golden/relative/input.md', import.meta.url), 'utf8')
  const level = /```walls (\S+)/.exec(relative)?.[1] ?? ''
  const { diagnostics } = compileText('b.md', `${relative}\n\`\`\`working ${level}\ndisplaced shape\n\`\`\`\n`)
  expect(diagnostics.map(({ rule }) => rule)).toContain('drift-not-worked')
})

function never(): never {
  throw new Error('there is such a building')
}
