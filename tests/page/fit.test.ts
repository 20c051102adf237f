/** Nothing leaves its column, on any width or on paper; a page asks for nothing and is whole without its script. */
import type { Browser, Page } from 'puppeteer-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { hasBrowser, launchBrowser } from '../support/browser.ts'
import { listen, samplePages } from '../support/pages.ts'
import { awkward, longTable } from './awkward.ts'

let browser: Browser
let page: Page
const complaints: string[] = []

beforeAll(async () => {
  if (!hasBrowser) return
  browser = await launchBrowser()
  page = await browser.newPage()
  await page.emulateMediaFeatures([{ name: 'prefers-reduced-motion', value: 'reduce' }])
  listen(page, complaints)
}, 240_000)
afterAll(async () => browser?.close())

/**
 * Run by the page: what sticks out of the column, and is not in a box that scrolls; where paper is meant, no box scrolls.
 * A step's own button brings its numbers into sight with the arrow keys.
 */
const outside = (paper: boolean): string => `(() => {
  const said = new Set()
  const tell = (why, box) => said.add(why + ': ' + box.tagName + '.' + box.className + ' ' + (box.textContent ?? '').trim().replace(/\\s+/g, ' ').slice(0, 40))
  if (document.documentElement.scrollWidth > innerWidth + 1) said.add('the page scrolls sideways: ' + document.documentElement.scrollWidth)
  const sheet = document.querySelector('.sheet')
  const { left, right } = sheet.getBoundingClientRect()
  const style = getComputedStyle(sheet)
  const from = left + parseFloat(style.paddingLeft) - 1, to = right - parseFloat(style.paddingRight) + 1
  const walk = box => {
    const { overflowX, display } = getComputedStyle(box)
    if (display === 'none' || box.matches('.unseen, .katex-mathml, svg, .trace-step')) return
    const inner = box.scrollWidth > box.clientWidth + 1 && box.clientWidth > 0
    const rect = box.getBoundingClientRect()
    if (rect.width > 0 && (rect.left < from || rect.right > to)) tell('sticks out by ' + Math.max(from - rect.left, rect.right - to).toFixed(0), box)
    if (overflowX !== 'visible') {
      if (inner && ${paper}) tell('is clipped', box)
      if (box.scrollWidth > box.clientWidth + 14 && overflowX !== 'hidden' && !box.matches('[tabindex="0"]') && !box.querySelector('[tabindex="0"], a, button') && !box.closest('.eq')?.querySelector('.trace-step')) tell('is out of reach of the keys', box)
      return
    }
    if (inner && box.matches('.check > *, dd, h1, h2, h3, h4, td, th, .eq > *, .places li')) tell('is fuller than its place', box)
    for (const child of box.children) walk(child)
  }
  for (const child of sheet.children) walk(child)
  return [...said].slice(0, 8)
})()`

const MM = 96 / 25.4
/** Width of what is printed within the margins of the page's own rule. */
const papers = [
  ['A4', Math.floor((210 - 34) * MM)],
  ['letter', Math.floor((215.9 - 34) * MM)],
] as const

async function show(html: string, scripts = true): Promise<void> {
  complaints.length = 0
  await page.setJavaScriptEnabled(scripts)
  await page.emulateMediaType('screen')
  await page.setContent(html)
}

async function strays(): Promise<readonly string[]> {
  const found: string[] = []
  for (const width of [360, 768, 1440]) {
    await page.setViewport({ width, height: 800 })
    for (const each of (await page.evaluate(outside(false))) as string[]) found.push(`${width} px: ${each}`)
  }
  await page.emulateMediaType('print')
  for (const [name, width] of papers) {
    await page.setViewport({ width, height: 1000 })
    for (const each of (await page.evaluate(outside(true))) as string[]) found.push(`${name}: ${each}`)
  }
  return found
}

const words = async (): Promise<string> =>
  String(await page.evaluate(`document.querySelector('.sheet').textContent.replace(/\\s+/g, ' ')`))

describe.skipIf(!hasBrowser)('pages at 360, 768 and 1440 px and on paper (skipped where no browser can be had)', () => {
  test.each([...samplePages, ...awkward])(
    '%s keeps to its column, asks for nothing and complains of nothing',
    async (_, html) => {
      await show(html)
      const whole = await words()
      expect(await strays()).toEqual([])
      expect(complaints).toEqual([])
      expect(await page.title()).not.toBe('ran')
      await show(html, false)
      expect(await words()).toBe(whole)
    },
  )

  test('a table of 2,000 rows has them all, and scrolls alone', async () => {
    await show(longTable)
    expect(await page.$$eval('tbody tr', rows => rows.length)).toBe(2000)
    await page.setViewport({ width: 360, height: 800 })
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBe(360)
  })
})
