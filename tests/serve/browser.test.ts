/** The live page in a real browser: what a save does to it, and what it leaves alone. */
import type { Browser, Page } from 'puppeteer-core'
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest'
import { hasBrowser, launchOnline } from '../support/browser.ts'
import { sourceOf } from '../support/pages.ts'
import { room, type Watched, watched } from './watched.ts'

const starter = sourceOf('samples/starter.md')

let browser: Browser | undefined
let watch: Watched | undefined
const pages: Page[] = []
const complaints: string[] = []

beforeAll(async () => {
  if (hasBrowser) browser = await launchOnline()
}, 240_000)
afterAll(async () => browser?.close())
afterEach(async () => {
  await Promise.all(pages.splice(0).map(page => page.close()))
  await watch?.end()
  watch = undefined
  // A page may not complain: a style or script that its policy stops would show here.
  expect(complaints.splice(0)).toEqual([])
})

async function shown(text: string, args: readonly string[] = ['@/a.md']): Promise<Page> {
  watch = await watched(args, { 'a.md': text })
  return opened(watch.address)
}

async function opened(address: string, width = 1180): Promise<Page> {
  const page = await browser?.newPage()
  if (!page) throw new Error('the browser did not start')
  pages.push(page)
  page.on('console', message => {
    // A connection that is refused while the server is away is told by the browser itself.
    if (!message.text().includes('ERR_')) complaints.push(message.text())
  })
  page.on('pageerror', error => complaints.push(String(error)))
  await page.setViewport({ width, height: 700 })
  await page.emulateMediaFeatures([{ name: 'prefers-reduced-motion', value: 'reduce' }])
  await page.goto(address)
  await has(page, `document.querySelector('.live-state')?.textContent.includes('save')`)
  return page
}

/** Waits until an expression holds in the page. */
const has = (page: Page, expression: string): Promise<unknown> =>
  page.waitForFunction(expression, { timeout: 15_000, polling: 20 })

const get = async (page: Page, expression: string): Promise<string> => String(await page.evaluate(expression))

/** Saves a text and waits until the page has taken it in. */
async function save(page: Page, text: string): Promise<void> {
  const next = 1 + Number(await get(page, `/save (\\d+)/.exec(document.querySelector('.live-state').textContent)[1]`))
  watch?.put('a.md', text)
  await has(page, `document.querySelector('.live-state').textContent.includes('save ${next}')`)
}

const press = (page: Page, selector: string): Promise<unknown> =>
  page.evaluate(`document.querySelector(${JSON.stringify(selector)}).click()`)

const heavier = starter.replace('55 psf', '75 psf')

describe.skipIf(!hasBrowser)('the live page (skipped where no browser is found)', () => {
  test('shows a save without being loaded again, in every tab', async () => {
    const page = await shown(starter)
    const other = await opened(watch?.address ?? '')
    for (const each of [page, other]) await each.evaluate('window.here = true')
    await save(page, heavier)
    for (const each of [page, other]) {
      await has(each, `document.querySelector('main').textContent.includes('weighs 21')`)
      expect(await get(each, 'window.here')).toBe('true')
    }
  })

  test('changes nothing in what did not change', async () => {
    const page = await shown(starter)
    await page.evaluate(`window.held = [...document.querySelectorAll('main > *')]`)
    await save(page, starter.replace('One room', 'One single room'))
    expect(await get(page, `window.held.every(block => block.isConnected)`)).toBe('true')
    expect(await get(page, `document.querySelectorAll('.moved').length`)).toBe('0')
  })

  test('is the page that build writes, block by block', async () => {
    const page = await shown(starter)
    await save(page, starter.replace('55 psf', '55 pfs'))
    await save(page, heavier)
    const now = await get(page, STRIPPED)
    await page.reload()
    await has(page, `document.querySelector('.live-state')`)
    expect(now).toBe(await get(page, STRIPPED))
  })

  test('keeps what is read where it is when something comes above it', async () => {
    const page = await shown(starter)
    await page.evaluate(
      `document.querySelector('[id="roof.CR.x"]').scrollIntoView({ block: 'start', behavior: 'instant' })`,
    )
    const top = () => get(page, `Math.round(document.querySelector('[id="roof.CR.x"]').getBoundingClientRect().top)`)
    await new Promise(done => setTimeout(done, 200))
    const before = Number(await top())
    await save(
      page,
      starter.replace('One room', `${'A long remark that pushes all below it down. '.repeat(40)}\n\nOne room`),
    )
    await new Promise(done => setTimeout(done, 200))
    expect(Math.abs(Number(await top()) - before)).toBeLessThanOrEqual(1)
    expect(Number(await get(page, 'scrollY'))).toBeGreaterThan(300)
  })

  test('keeps focus, selection, folds and the scroll of a table', async () => {
    const page = await shown(starter)
    await page.evaluate(`
      window.number = document.querySelector('.tbl [data-v][tabindex="0"]')
      number.focus()
      window.step = document.querySelector('[id="roof.W"] .trace-step')`)
    await save(page, heavier)
    expect(await get(page, `document.activeElement === number`)).toBe('true')
    await page.evaluate(`
      step.focus()
      const words = document.querySelector('.prose p').firstChild
      getSelection().setBaseAndExtent(words, 0, words, 8)`)
    await save(page, starter)
    expect(await get(page, `document.activeElement === step && step.isConnected`)).toBe('true')
    expect(await get(page, `getSelection().toString()`)).toBe('One room')
  })

  test('keeps an open trace panel on its value, with the new numbers', async () => {
    const page = await shown(starter)
    await page.click('[id="roof.W"] .trace-step')
    await has(page, `document.querySelector('.trace h2')?.textContent.includes('15.4')`)
    await save(page, heavier)
    await has(page, `document.querySelector('.trace h2')?.textContent.includes('21')`)
    expect(await get(page, `document.querySelector('.trace-id').textContent`)).toBe('roof.W')
  })

  test('asks for the island only when a panel wants it', async () => {
    const page = await shown(starter)
    const asked: string[] = []
    page.on('request', request => asked.push(request.url()))
    await save(page, heavier)
    expect(asked.filter(url => url.endsWith('island'))).toEqual([])
    await page.click('[id="roof.W"] .trace-step')
    await has(page, `document.querySelector('.trace h2')`)
    expect(asked.filter(url => url.endsWith('island'))).toHaveLength(1)
  })

  test('shows a fault in its place and in the list, leads to it, and recovers', async () => {
    const page = await shown(starter)
    await save(page, starter.replace('55 psf', '55 pfs'))
    expect(await get(page, `document.querySelector('.live-state').textContent`)).toMatch(/^1 error/)
    expect(await get(page, `document.querySelector('main').textContent`)).not.toMatch(/15\.4/)
    expect(await get(page, `document.querySelector('.draft') !== null`)).toBe('true')
    await press(page, '[data-key="messages"]')
    await press(page, '.live-row')
    expect(await get(page, `document.activeElement.closest('.fault') !== null`)).toBe('true')
    // A page that is loaded now is told of the fault too, without a save.
    await page.reload()
    await has(page, `/^1 error/.test(document.querySelector('.live-state')?.textContent)`)
    await save(page, starter)
    expect(await get(page, `document.querySelectorAll('.fault, .draft').length`)).toBe('0')
    expect(await get(page, `document.querySelector('.live-state').textContent`)).toMatch(/^sound/)
  })

  test('marks what moved with what it was, lists it, and leads to it', async () => {
    const page = await shown(starter)
    await save(page, heavier)
    const mark = `document.querySelector('[id="roof.W"] .result [data-v="roof.W"]')`
    expect(await get(page, `${mark}.title`)).toMatch(/^was 15\.4 kip, \+36\.4/)
    expect(await get(page, `getComputedStyle(${mark}.closest('.rhs'), '::after').content`)).toContain('was 15.4 kip')
    await press(page, '[data-key="moves"]')
    const panel = await get(page, `document.querySelector('.live-panel').innerText`)
    expect(panel).toMatch(/roof\.W\s+15\.4 kip → 21 kip\s+\+36\.4/)
    await press(page, '[data-key="v roof.W"]')
    expect(await get(page, `document.activeElement.closest('.eq').id`)).toBe('roof.W')
    // A word that the calculation settles is no number.
    expect(await get(page, `document.querySelectorAll('[data-v="roof.wall.S.V"].moved').length > 0`)).toBe('true')
    expect(
      await get(page, `[...document.querySelectorAll('.prose .moved')].map(m => m.textContent).join()`),
    ).not.toMatch(/[A-Z]/)
  })

  test('lists a check that turned on top, in words', async () => {
    const page = await shown(room('50 psf'))
    await save(page, room('70 psf'))
    await press(page, '[data-key="moves"]')
    const panel = await get(page, `document.querySelector('.live-panel').innerText`)
    expect(panel).toMatch(/^By save 2\.\s+Checks \(1\)\s+Weight of the roof\s+OK, ratio 0\.83\d* → NG, ratio 1\.1/)
    expect(await get(page, `document.querySelector('.check .verdict.moved').dataset.was`)).toBe('was OK')
  })

  test('holds a state to compare with, through more saves and a new load, until it is released', async () => {
    const page = await shown(room('50 psf'))
    const was = () => get(page, `document.querySelector('.result [data-v="roof.W"]').title`)
    await press(page, '[data-key="pin"]')
    await has(page, `document.querySelector('[data-key="pin"]').textContent.includes('release')`)
    await save(page, room('60 psf'))
    await save(page, room('40 psf'))
    expect(await was()).toMatch(/^was 5 kip, −20\.0/)
    await page.reload()
    await has(page, `document.querySelector('.result [data-v="roof.W"]')?.title`)
    expect(await was()).toMatch(/^was 5 kip, −20\.0/)
    await save(page, room('50 psf'))
    expect(await was()).toBe('')
    await press(page, '[data-key="pin"]')
    await save(page, room('60 psf'))
    expect(await was()).toMatch(/^was 5 kip, \+20\.0/)
  })

  test('says that it is not connected when the server ends, and follows one that takes its place', async () => {
    const page = await shown(room('50 psf'))
    const { port, folder } = watch as Watched
    await page.evaluate('window.here = true')
    await watch?.end()
    await has(page, `document.querySelector('.live-state').textContent.startsWith('not connected · as of save 1')`)
    watch = await watched(['@/a.md', '--port', String(port)], { 'a.md': room('70 psf') }, folder)
    await has(page, `document.querySelector('main').textContent.includes('weighs 7')`)
    await has(page, `document.querySelector('.live-state').textContent.startsWith('sound')`)
    expect(await get(page, 'window.here')).toBe('true')
  })

  test('brings an edit into sight, unless that is switched off or the reader is busy', async () => {
    const far = `${starter}\n\n## Late\n\nA last remark.\n`
    const page = await shown(far)
    await save(page, far.replace('A last remark', 'The last remark'))
    await has(page, 'scrollY > 500')
    await page.evaluate(`scrollTo(0, 0)`)
    await press(page, '[data-key="follow"]')
    await save(page, far)
    expect(await get(page, 'scrollY')).toBe('0')
  })

  test('leads from a number to its line in the source', async () => {
    const page = await shown(starter, ['@/a.md', '--editor', 'true {path} {line}'])
    await page.evaluate(
      `document.querySelector('[id="roof.W"] .result [data-v]').dispatchEvent(new MouseEvent('dblclick', { bubbles: true }))`,
    )
    await has(page, `/^Opened .*a\\.md:\\d+$/.test(document.querySelector('.live-readout').textContent)`)
  })

  test('fits a phone, and is not printed', async () => {
    await shown(starter)
    const page = await opened(watch?.address ?? '', 390)
    await save(page, heavier)
    await press(page, '[data-key="moves"]')
    expect(Number(await get(page, `document.documentElement.scrollWidth`))).toBeLessThanOrEqual(390)
    await page.emulateMediaType('print')
    expect(await get(page, `getComputedStyle(document.querySelector('.live-strip')).display`)).toBe('none')
    expect(
      await get(page, `getComputedStyle(document.querySelector('[id="roof.W"] .rhs.moved'), '::after').content`),
    ).toBe('none')
  })

  test('of several documents begins with a list of them, which follows too', async () => {
    watch = await watched(['@'], { 'a.md': room('50 psf'), 'b.md': starter })
    const page = await browser?.newPage()
    if (!page) throw new Error('the browser did not start')
    pages.push(page)
    await page.goto(watch.address)
    await has(page, `document.body.innerText.includes('1 OK')`)
    watch.put('a.md', room('70 psf'))
    await has(page, `document.body.innerText.includes('1 of 1 NG')`)
    watch.put('b.md', starter.replace('55 psf', '55 pfs'))
    await has(page, `document.body.innerText.includes('1 error')`)
  })
})

/** The blocks as they stand, without what the live page itself adds to them. */
const STRIPPED = `(() => {
  const main = document.querySelector('main').cloneNode(true)
  for (const element of main.querySelectorAll('*')) {
    element.classList.remove('moved')
    if (element.getAttribute('class') === '') element.removeAttribute('class')
    for (const name of ['data-was', 'title', 'style', 'aria-label']) element.removeAttribute(name)
    for (const { name, value } of [...element.attributes].sort((a, b) => (a.name < b.name ? -1 : 1))) {
      element.removeAttribute(name)
      element.setAttribute(name, value)
    }
  }
  return main.innerHTML.replaceAll(/>\\s+</g, '><')
})()`
