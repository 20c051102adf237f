/** Elevations of walls: what they say, and that no two of their texts overlap as a browser sets them. */
import type { Browser } from 'puppeteer-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { drawElevation } from '../../src/draw/elevation.ts'
import { type Box, boundsOfBox, boxesMeet } from '../../src/draw/geometry.ts'
import { hasBrowser, launchBrowser } from '../support/browser.ts'
import { elevations } from './elevations.ts'
import { readXml } from './reading.ts'

let browser: Browser | undefined

beforeAll(async () => {
  if (!hasBrowser) return
  browser = await launchBrowser()
}, 60_000)

afterAll(async () => browser?.close())

interface Measured {
  readonly size: { readonly width: number; readonly height: number }
  readonly texts: readonly { readonly text: string; readonly fontSize: number; readonly box: Box }[]
}

/** Run by the page: the size of the sheet, and the box of each text, turned as it is set. */
const measure = `({
  size: { width: document.querySelector('svg').viewBox.baseVal.width, height: document.querySelector('svg').viewBox.baseVal.height },
  texts: [...document.querySelectorAll('svg text')].flatMap(text => {
    const letters = text.lastChild?.textContent ?? ''
    const { x, y, width, height } = text.getBBox()
    const matrix = text.getCTM()
    if (letters.trim() === '') return []
    const middle = new DOMPoint(x + width / 2, y + height / 2).matrixTransform(matrix)
    const angle = Math.atan2(matrix.b, matrix.a)
    const fontSize = parseFloat(getComputedStyle(text).fontSize)
    return [{ text: letters, fontSize, box: { at: { x: middle.x, y: middle.y }, halfWidth: width / 2, halfHeight: height / 2, angle } }]
  }),
})`

test.skipIf(!hasBrowser).each(Object.entries(elevations))(
  'in a browser the texts of %s stand apart and on the sheet (skipped where no browser is found)',
  async (_, view) => {
    const page = await browser?.newPage()
    if (page === undefined) throw new Error('the browser did not start')
    await page.setContent(`<!doctype html><body style="margin:0">${drawElevation(view)}`)
    // The page hands back plain data, in the shape that the lines above give it.
    const { size, texts } = (await page.evaluate(measure)) as Measured
    await page.close()
    expect(texts.length).toBeGreaterThan(4)
    // A browser rounds the height of a line up to whole units.
    const shrunk = texts.map(({ text, box }) => ({ text, box: { ...box, halfHeight: box.halfHeight - 0.5 } }))
    const overlaps = shrunk.flatMap((a, idx) =>
      shrunk.slice(idx + 1).flatMap(b => (boxesMeet(a.box, b.box) ? [`${a.text} / ${b.text}`] : [])),
    )
    expect(overlaps).toEqual([])
    const outside = shrunk.filter(({ box }) => {
      const { x0, y0, x1, y1 } = boundsOfBox(box)
      return x0 < 0 || y0 < 0 || x1 > size.width || y1 > size.height
    })
    expect(outside.map(({ text }) => text)).toEqual([])
    expect(Math.min(...texts.map(({ fontSize }) => fontSize))).toBeGreaterThanOrEqual(11)
  },
  30_000,
)

describe('an elevation', () => {
  test.each(Object.entries(elevations))('of %s is well formed, told in words, and the same each time', (_, view) => {
    const svg = drawElevation(view)
    expect(drawElevation(view)).toBe(svg)
    const { attributes, children } = readXml(svg)
    expect(attributes.role).toBe('img')
    const told = children.flatMap(child => (typeof child === 'string' ? [] : [child]))
    expect(told.slice(0, 2).map(({ tag }) => tag)).toEqual(['title', 'desc'])
    expect(svg).not.toMatch(/NaN|Infinity|undefined/)
  })
})

const building = (from: string, to: string) => `
\`\`\`grid
x: A 0 m, B 5 m, C 9 m
y: 1 0 m, 2 6 m
\`\`\`

\`\`\`levels
| level | elevation |
|---|---|
| roof | 3.2 m |
\`\`\`

\`\`\`areas roof
| area | from | to | load |
|---|---|---|---|
| F | A1 | C2 | 4 kPa |
\`\`\`

\`\`\`construction BRICK
material: clay masonry
f'm: 10 MPa
t: 200 mm
\`\`\`

\`\`\`walls roof
| wall | from | to | height | construction |
|---|---|---|---|---|
| S | ${from} | ${to} | 3 m | BRICK |
| N | A2 | B2 | 3 m | BRICK |
| W | A1 | A2 | 3 m | BRICK |
\`\`\`

\`\`\`openings roof
| wall | opening | left | sill | width | height |
|---|---|---|---|---|---|
| S | D1 | 1 m | 0 m | 1 m | 2.1 m |
\`\`\`

\`\`\`forces roof
x: 40 kN
y: 40 kN
\`\`\`

\`\`\`working roof
elevations
case: EX
\`\`\`
`

const svgOf = (text: string): string => {
  const { parts, diagnostics } = compileText('wall.md', text)
  expect(diagnostics.filter(({ severity }) => severity === 'error')).toEqual([])
  const pieces = parts.flatMap(part => (part.kind === 'pieces' ? part.pieces : []))
  return pieces.flatMap(piece => (piece.kind === 'figure' ? [piece.svg] : []))[0] ?? ''
}

const textsOf = (svg: string): readonly string[] =>
  [...svg.matchAll(/<text[^>]*>([^<]*)<\/text>/g)].map(([, t]) => t ?? '')
/** Where the middle of a text stands across the sheet. */
const across = (svg: string, text: string): number =>
  Number(new RegExp(`<text[^>]* x="([^"]+)"[^>]*>${text}</text>`).exec(svg)?.[1])

describe('what an elevation of a building shows', () => {
  test('its level and its foot with their elevations, its grid lines and its dimensions', () => {
    const texts = textsOf(svgOf(building('A1', 'C1')))
    for (const wanted of ['\u2068roof\u2069, +10.499 ft', '\u2068base\u2069, ±0 ft', 'A', 'B', 'C', 'D1', 'P1', 'P2'])
      expect(texts).toContain(wanted)
  })

  test('the start of the wall is on the left, whichever way it runs', () => {
    const [forth, back] = [svgOf(building('A1', 'C1')), svgOf(building('C1', 'A1'))]
    expect(across(forth, 'A')).toBeLessThan(across(forth, 'C'))
    expect(across(back, 'C')).toBeLessThan(across(back, 'A'))
    // The door is 1 m from the start of 9 m: its jamb stands left of the grid line in the middle either way.
    const jamb = (svg: string) => Number(/class="pm-void" d="M ([\d.]+)/.exec(svg)?.[1])
    for (const svg of [forth, back]) expect(jamb(svg)).toBeLessThan(across(svg, 'B'))
    expect(jamb(forth)).toBe(jamb(back))
  })

  test('the shear of a case points along x or against it, as the wall is seen', () => {
    const tips = [svgOf(building('A1', 'C1')), svgOf(building('C1', 'A1'))].map(svg => {
      const [, tail, tip] = /class="pm-shear" d="M ([\d.-]+) [\d.-]+ L ([\d.-]+)/.exec(svg) ?? []
      return Math.sign(Number(tip) - Number(tail))
    })
    expect(tips).toEqual([1, -1])
  })
})
