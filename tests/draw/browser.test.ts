/** The sketch as a browser sets it: its real letters, not our estimate of them. */
import type { Browser } from 'puppeteer-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { type Box, boxesMeet } from '../../src/draw/geometry.ts'
import { drawPlan } from '../../src/draw/plan.ts'
import { browserPath, launchBrowser } from '../support/browser.ts'
import { buildings, hangar } from './views.ts'

let browser: Browser | undefined

beforeAll(async () => {
  if (browserPath !== undefined) browser = await launchBrowser()
}, 60_000)

afterAll(async () => browser?.close())

interface Measured {
  readonly text: string
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
  return [{ text: letters, box: { at: { x: middle.x, y: middle.y }, halfWidth: width / 2, halfHeight: height / 2, angle } }]
})`

test.skipIf(browserPath === undefined).each(Object.entries({ ...buildings, hangar }))(
  'in a browser no two texts of %s overlap (skipped where no browser is found)',
  async (_, view) => {
    const page = await browser?.newPage()
    if (page === undefined) throw new Error('the browser did not start')
    await page.setContent(`<!doctype html><body style="margin:0">${drawPlan(view)}`)
    // The page hands back plain data, in the shape that the lines above give it.
    const texts = (await page.evaluate(measure)) as readonly Measured[]
    await page.close()
    expect(texts.length).toBeGreaterThan(4)
    // A browser rounds the height of a line up to whole units.
    const shrunk = texts.map(({ text, box }) => ({ text, box: { ...box, halfHeight: box.halfHeight - 0.5 } }))
    const overlaps = shrunk.flatMap((a, idx) =>
      shrunk.slice(idx + 1).flatMap(b => (boxesMeet(a.box, b.box) ? [`${a.text} / ${b.text}`] : [])),
    )
    expect(overlaps).toEqual([])
  },
  30_000,
)
