/** Accessibility of whole pages: the rules of WCAG 2.2 AA as axe-core has them, headings in order, formulas as MathML. */
import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import type { Browser, Page } from 'puppeteer-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { hasBrowser, launchBrowser } from '../support/browser.ts'
import { samplePages } from '../support/pages.ts'
import { awkward } from './awkward.ts'

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

let browser: Browser
let page: Page

beforeAll(async () => {
  if (!hasBrowser) return
  browser = await launchBrowser()
  page = await browser.newPage()
}, 240_000)
afterAll(async () => browser?.close())

const every = {
  runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
  // A heading that is a formula holds MathML, which this rule does not take for text.
  rules: { 'empty-table-header': { enabled: false } },
}
/** The rules that depend on colours and on the width. */
const byLook = { runOnly: ['color-contrast', 'target-size', 'scrollable-region-focusable'] }

/** @returns a line for each violation: the rule, how many places, the first of them */
async function violations(width: number, scheme: 'light' | 'dark', within: string, options: object): Promise<string[]> {
  await page.setViewport({ width, height: 800 })
  await page.emulateMediaFeatures([
    { name: 'prefers-color-scheme', value: scheme },
    { name: 'prefers-reduced-motion', value: 'reduce' },
  ])
  const found = await page.evaluate(
    `axe.run(${JSON.stringify(within)}, ${JSON.stringify({
      ...options,
      resultTypes: ['violations'],
    })}).then(({ violations, passes }) => [passes.length, violations.map(({ id, nodes }) => id + ' at ' + nodes.length + ': ' + nodes[0].html.slice(0, 120))])`,
  )
  const [passes, told] = found as [number, string[]]
  expect(passes).toBeGreaterThan(0)
  return told.map(each => `${width} px, ${scheme}: ${each}`)
}

/** Opens the panel on the first number of the page. @returns false where the page has none */
const trace = (): Promise<unknown> =>
  page.evaluate(`(() => {
    const mark = document.querySelector('.result [data-v], td [data-v]')
    mark?.click()
    document.querySelector('.trace details')?.setAttribute('open', '')
    return mark !== null
  })()`)

/** No rule looks into a formula: what is set for the eye alone goes, and MathML becomes one text, so that rules run in time. */
const withoutEyeLetters = `
  for (const box of document.querySelectorAll('.katex-html')) box.replaceChildren()
  for (const math of document.querySelectorAll('math')) math.textContent = math.textContent`

describe.skipIf(!hasBrowser)('accessibility (skipped where no browser can be had)', () => {
  test.each([...samplePages, ...awkward.filter(([name]) => /draft|table|left/.test(name))])('%s', async (_, html) => {
    await page.setContent(html)
    expect(await page.$$eval('h1, h2, h3, h4, h5, h6', all => all.map(({ tagName }) => Number(tagName[1])))).toSatisfy(
      (levels: readonly number[]) =>
        levels[0] === 1 &&
        levels.filter(level => level === 1).length === 1 &&
        levels.every((level, i) => i === 0 || level <= (levels[i - 1] ?? 0) + 1),
    )
    const unread = `[...document.querySelectorAll('.eq .katex-html, table .katex-html')]
      .filter(box => !box.closest('.lines, th, td, li, .trace, caption')?.parentElement.querySelector('math')).length`
    expect(await page.evaluate(unread)).toBe(0)
    await page.evaluate(axe)
    await page.evaluate(withoutEyeLetters)
    const told = await violations(1280, 'light', 'html', every)
    told.push(...(await violations(360, 'dark', 'html', byLook)))
    if (await trace()) {
      told.push(...(await violations(360, 'light', '.trace', every)))
      told.push(...(await violations(1280, 'dark', '.trace', byLook)))
    }
    expect(told).toEqual([])
  })
})
