/** The drawings as a browser sets it: its real letters, not our estimate of them. */
import { readFileSync } from 'node:fs'
import type { Browser } from 'puppeteer-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { drawDisplaced } from '../../src/draw/displaced.ts'
import { drawElevation } from '../../src/draw/elevation.ts'
import { type Box, boundsOfBox, boxesMeet } from '../../src/draw/geometry.ts'
import { drawPlan } from '../../src/draw/plan.ts'
import { drawStoreys } from '../../src/draw/storeys.ts'
import { hasBrowser, launchBrowser } from '../support/browser.ts'
import { figuresOf } from '../support/figures.ts'
import { displacedBuildings } from './displacedviews.ts'
import { elevations } from './elevations.ts'
import { storeyBuildings } from './storeyviews.ts'
import { buildings, hangar } from './views.ts'

let browser: Browser | undefined

beforeAll(async () => {
  if (hasBrowser) browser = await launchBrowser()
}, 240_000)

afterAll(async () => browser?.close())

interface Measured {
  readonly text: string
  readonly fontSize: number
  readonly box: Box
}

/** Run by the page: the box of each text, turned as it is set. */
const measure = `[...document.querySelectorAll('svg text')].flatMap(text => {
  const letters = text.lastChild?.textContent ?? ''
  const { x, y, width, height } = text.getBBox()
  const matrix = text.getCTM()
  if (letters.trim() === '') return []
  const middle = new DOMPoint(x + width / 2, y + height / 2).matrixTransform(matrix)
  const angle = Math.atan2(matrix.b, matrix.a)
  const fontSize = parseFloat(getComputedStyle(text).fontSize)
  return [{ text: letters, fontSize, box: { at: { x: middle.x, y: middle.y }, halfWidth: width / 2, halfHeight: height / 2, angle } }]
})`

const sheet = `(() => { const { width, height } = document.querySelector('svg').viewBox.baseVal; return { width, height } })()`

const samples = ['boatyard', 'observatory', 'starter', 'manual/03-building', 'manual/04-workings', 'manual/05-values']
const ofSamples = samples.flatMap(name => {
  const path = `samples/${name}.md`
  const compiled = compileText(path, readFileSync(new URL(`../../${path}`, import.meta.url), 'utf8'))
  return figuresOf(compiled).map(({ id, svg }) => [`${name} ${id}`, svg] as const)
})

/** On the sheet of a drawing; smaller letters are lost in a copy. */
const SMALLEST = 11

const drawings: readonly (readonly [string, string])[] = [
  ...Object.entries({ ...buildings, hangar }).map(([name, view]) => [`the plan of ${name}`, drawPlan(view)] as const),
  ...Object.entries(elevations).map(([name, view]) => [`the elevation of ${name}`, drawElevation(view)] as const),
  ...Object.entries(displacedBuildings).map(([name, view]) => [`the displaced ${name}`, drawDisplaced(view)] as const),
  ...Object.entries(storeyBuildings).map(([name, view]) => [`the storeys of ${name}`, drawStoreys(view)] as const),
  ...ofSamples,
]

test.skipIf(!hasBrowser).each(drawings)(
  'in a browser no two texts of %s overlap, and none leaves the sheet (skipped where no browser is found)',
  async (_, svg) => {
    const page = await browser?.newPage()
    if (page === undefined) throw new Error('the browser did not start')
    await page.setContent(`<!doctype html><body style="margin:0">${svg}`)
    // The page hands back plain data, in the shape that the lines above give it.
    const texts = (await page.evaluate(measure)) as readonly Measured[]
    const { width, height } = (await page.evaluate(sheet)) as Readonly<Record<'width' | 'height', number>>
    await page.close()
    expect(texts.length).toBeGreaterThan(4)
    // A browser rounds the height of a line up to whole units.
    const shrunk = texts.map(({ text, box }) => ({ text, box: { ...box, halfHeight: box.halfHeight - 0.5 } }))
    const overlaps = shrunk.flatMap((a, idx) =>
      shrunk.slice(idx + 1).flatMap(b => (boxesMeet(a.box, b.box) ? [`${a.text} / ${b.text}`] : [])),
    )
    expect(overlaps).toEqual([])
    // Boxes are in the pixels of the page, whose corner is that of the sheet.
    const off = shrunk.filter(({ box }) => {
      const { x0, y0, x1, y1 } = boundsOfBox(box)
      return x0 < -1 || y0 < -1 || x1 > width + 1 || y1 > height + 1
    })
    expect(off.map(({ text }) => text)).toEqual([])
    expect(texts.filter(({ fontSize }) => fontSize < SMALLEST).map(({ text }) => text)).toEqual([])
  },
  120_000,
)
