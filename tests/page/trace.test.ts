/** The trace in the page, by mouse and by keyboard, in a real browser. */
import type { Browser, Page } from 'puppeteer-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { hasBrowser, launchBrowser } from '../support/browser.ts'
import { htmlOf, listen, sourceOf } from '../support/pages.ts'

const source = sourceOf('samples/boatyard.md')
const boatyard = htmlOf(source, 'samples/boatyard.md')

/** Number of the line of the sample that starts so, as an editor counts. */
function lineOf(start: string): number {
  const at = source.split('\n').findIndex(line => line.startsWith(start))
  if (at === -1) throw new Error(`the sample has no line that starts with ${start}`)
  return at + 1
}

let browser: Browser | undefined
let page: Page | undefined
const complaints: string[] = []

beforeAll(async () => {
  if (hasBrowser) browser = await launchBrowser()
}, 240_000)
afterAll(async () => browser?.close())

/** A page with scripts on, that records what it complains of and what it asks the network for. */
async function opened(html: string, width = 1180, scripts = true): Promise<Page> {
  await page?.close()
  page = await browser?.newPage()
  if (!page) throw new Error('the browser did not start')
  complaints.length = 0
  listen(page, complaints)
  await page.setJavaScriptEnabled(scripts)
  await page.setViewport({ width, height: 800 })
  await page.emulateMediaFeatures([{ name: 'prefers-reduced-motion', value: 'reduce' }])
  await page.setContent(html)
  return page
}

/** What the panel shows, line after line; the tests are checked without a browser's types. */
const panelOf = async (page: Page): Promise<string> =>
  String(await page.evaluate(`document.querySelector('.trace').innerText`)).replace(/\s+/g, ' ')

/** The markup within the first element that a selector finds. */
const markupOf = (page: Page, selector: string): Promise<unknown> =>
  page.evaluate(`document.querySelector(${JSON.stringify(selector)}).innerHTML`)

/** Presses the mouse in the middle of an element. */
async function press(page: Page, selector: string): Promise<void> {
  const found = await page.$(selector)
  if (!found) throw new Error(`there is no ${selector}`)
  await found.scrollIntoView()
  await found.click()
}

const entry = (page: Page, text: string): Promise<void> =>
  page.evaluate(
    `[...document.querySelectorAll('.trace-entry')].find(e => e.innerText.includes(${JSON.stringify(text)})).click()`,
  ) as Promise<void>

const focused = (page: Page): Promise<unknown> =>
  page.evaluate(`document.activeElement.className + ' ' + document.activeElement.textContent`)

describe.skipIf(!hasBrowser)('the trace of a page (skipped where no browser is found)', () => {
  test('a result shows its formula, its inputs with their values, its clause and their source lines', async () => {
    const page = await opened(boatyard)
    await press(page, '.result [data-v="roof.wall.P1.k"]')
    const text = await panelOf(page)
    expect(text).toMatch(/kP1 ?= ?18,025 kip\/in/)
    expect(text).toContain('beam theory, flexure and shear')
    expect(text).toContain('Assumes fixed at the foot, free at the head')
    expect(text).toMatch(/E 3,605 ksi constructions\.CON10\.E/)
    expect(text).toContain(`t 10 in line ${lineOf('t: 10 in')} t: 10 in`)
    expect(text).toMatch(/Used in.*roof\.wall\.P1\.Vd\.EX/)
    const formula = await page.$eval('.trace-formula', box => box.textContent)
    const onPage = await page.$eval('[id="roof.wall.P1.k"] .rhs', line => line.textContent)
    expect(formula).toBe(onPage)
    expect(complaints).toEqual([])
  })

  test('the formula in the panel is set with the very elements that KaTeX wrote', async () => {
    const page = await opened(boatyard)
    for (const id of ['roof.wall.P1.k', 'roof.wall.P1.L', 'constructions.CON10.E', 'roof.CR.x']) {
      await press(page, `.result [data-v="${id}"]`)
      const there = await markupOf(page, '.trace-formula')
      const here = await markupOf(page, `[id="${id}"] .rhs`)
      expect(there).toBe(here)
    }
  })

  test('a number put into a line, a cell of a table, a given cell, a check and a quote each tell of themselves', async () => {
    const page = await opened(boatyard)
    await press(page, '[id="roof.wall.P1.k"] .rhs [data-v="roof.wall.P1.h"]')
    expect(await panelOf(page)).toContain(`Given by the engineer. line ${lineOf('| P1 ')}`)
    await press(page, 'td [data-v="roof.wall.K1.k"]')
    expect(await panelOf(page)).toMatch(/kK1 ?= ?3,409 kip\/in/)
    await press(page, 'td [data-v="grid.C"]')
    expect(await panelOf(page)).toMatch(/xC ?= ?64 ft/)
    await press(page, '.check .capacity [data-v]')
    expect(await panelOf(page)).toContain('Assumed: limit of the arithmetic')
    await press(page, 'a.q [data-v="V_E"]')
    expect(await panelOf(page)).toMatch(/VE ?= ?106\.33 kip/)
    expect(complaints).toEqual([])
  })

  test('walks on to an input, says the way, and comes back along it', async () => {
    const page = await opened(boatyard)
    await press(page, '.result [data-v="roof.wall.P1.k"]')
    await entry(page, 'constructions.CON10.E')
    await entry(page, `line ${lineOf("f'c: 4000 psi")}`)
    expect(await panelOf(page)).toMatch(/^Back kP1 ECON10 f′c,CON10 Close f′c,CON10 ?= ?4,000 psi/)
    expect(await panelOf(page)).toMatch(/Used in.*constructions\.CON10\.E/)
    await page.click('.trace-back')
    expect(await panelOf(page)).toMatch(/^Back kP1 ECON10 Close ECON10 ?= ?3,605 ksi/)
    await page.click('.trace-crumb')
    expect(await panelOf(page)).toMatch(/^Trace Close kP1/)
    await entry(page, 'roof.wall.P1.Vd.EX+')
    expect(await panelOf(page)).toContain('roof.wall.P1.Vd.EX+')
  })

  test('leads to where the value is printed', async () => {
    const page = await opened(boatyard)
    await press(page, 'a.q [data-v="roof.W"]')
    await page.click('.trace-show')
    const top = await page.$eval('[id="roof.W"] .result', result => result.getBoundingClientRect().top)
    expect(top).toBeGreaterThan(0)
    expect(top).toBeLessThan(800)
    expect(await focused(page)).toMatch(/^trace-step \d+\.\d+$/)
  })

  test('lists the given values that a number comes down to', async () => {
    const page = await opened(boatyard)
    await press(page, '.result [data-v="roof.wall.P1.k"]')
    await page.click('.trace summary')
    const rows = await page.$$eval('.trace details li', items => items.map(item => item.textContent ?? ''))
    expect(rows).toHaveLength(6)
    expect(rows.join()).toContain("f'c: 4000 psi")
  })

  test('is reached, walked and closed without a mouse, and the focus goes back', async () => {
    const page = await opened(boatyard)
    await page.focus('[id="roof.wall.P1.k"] .trace-step')
    await page.keyboard.press('Enter')
    expect(await focused(page)).toContain('18,025 kip/in')
    await page.keyboard.press('Escape')
    expect(await focused(page)).toBe('trace-step 6.6')
    await page.keyboard.press('ArrowRight')
    // An input of the step is said as it is chosen, and told in the panel when it is opened.
    const said = String(await page.$eval('[role="status"]', status => status.textContent))
    expect(said).toMatch(/ = (?:3,605 ksi|10 in|14 ft|28 ft)$/)
    await page.keyboard.press('Enter')
    expect(await panelOf(page)).toContain(said.slice(said.indexOf('=')))
    await page.keyboard.press('Tab')
    await page.keyboard.press('Escape')
    await page.focus('[id="roof.stiffness"] [tabindex="0"][data-v]')
    expect(await focused(page)).toContain('16.00')
    await page.keyboard.press('ArrowDown')
    await page.keyboard.press('ArrowDown')
    await page.keyboard.press('ArrowRight')
    await page.keyboard.press('ArrowRight')
    expect(await focused(page)).toContain('18,025')
    await page.keyboard.press(' ')
    expect(await panelOf(page)).toMatch(/kP1 ?= ?18,025 kip\/in/)
    await page.keyboard.press('Escape')
    expect(await focused(page)).toContain('18,025')
    expect(await page.$$eval('[id="roof.stiffness"] [tabindex="0"][data-v]', stops => stops.length)).toBe(1)
    expect(await page.$eval('.trace', panel => panel.childElementCount)).toBe(0)
  })

  test('every number in a line takes the pointer that is put on it, whatever KaTeX lays over it', async () => {
    const page = await opened(boatyard)
    const missed = await page.evaluate(`[...document.querySelectorAll('.eq .rhs [data-v]')].filter(mark => {
      mark.scrollIntoView({ block: 'center', inline: 'center', behavior: 'instant' })
      const { left, top, width, height } = mark.getBoundingClientRect()
      return !mark.contains(document.elementFromPoint(left + width / 2, top + height / 2))
    }).map(mark => mark.dataset.v)`)
    expect(missed).toEqual([])
  })

  test('leaves no stop of the tab key inside what is hidden from readers by ear', async () => {
    const page = await opened(boatyard)
    expect(await page.$$eval('[aria-hidden="true"] [tabindex], [aria-hidden="true"] button', all => all.length)).toBe(0)
    const stops = await page.$$eval('[tabindex="0"], button, a[href]', all => all.length)
    const marks = await page.$$eval('[data-v]', all => all.length)
    expect(stops).toBeLessThan(marks / 5)
  })

  test('on a phone the number that was asked about is not hidden by the panel', async () => {
    const page = await opened(boatyard, 390)
    await press(page, '.result [data-v="roof.CR.x"]')
    const bottom = await page.$eval('.result [data-v="roof.CR.x"]', mark => mark.getBoundingClientRect().bottom)
    const top = await page.$eval('.trace', panel => panel.getBoundingClientRect().top)
    expect(bottom).toBeLessThan(top)
    const wide = await page.evaluate('document.documentElement.scrollWidth')
    expect(wide).toBe(390)
  })

  test('without scripts the page is as it is without a trace', async () => {
    const shot = async (html: string) => {
      const page = await opened(html, 900, false)
      return Buffer.from(await page.screenshot()).toString('base64')
    }
    const bare = boatyard.replace(/<script[\s\S]*?<\/script>/g, '').replace(/ data-v="[^"]*"/g, '')
    expect(await shot(boatyard)).toBe(await shot(bare))
    const page = await opened(boatyard, 900, false)
    expect(await page.$$('button, .trace')).toHaveLength(0)
  })

  test('the policy lets the one script run and no other', async () => {
    const page = await opened(boatyard.replace('</main>', '<script>document.title="ran"</script></main>'))
    expect(await page.title()).not.toBe('ran')
    expect(await page.$('.trace')).not.toBeNull()
  })

  test('hostile names are shown as they were written, and end nothing', async () => {
    const name = 'W<b>1</b> "q" \\ & </script><script>alert(1)</script>'
    const page = await opened(
      htmlOf(`---
title: </script><script>document.title='ran'</script>
---

\`\`\`areas
| area | from | to | load |
|---|---|---|---|
| ${name} | 0 ft, 0 ft | 9 ft, 9 ft | 50 psf |
\`\`\`

\`\`\`working
center of mass
\`\`\`
`),
    )
    expect(await page.title()).not.toBe('ran')
    await press(page, 'td [data-v$=".A"]')
    expect(await panelOf(page)).toContain(name)
    expect(await page.$$('.trace b b, .trace script')).toHaveLength(0)
    expect(complaints).toEqual([])
  })
})
