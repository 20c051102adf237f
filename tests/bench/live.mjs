/**
 * Times a save until it is repainted in the browser. A document of `tests/bench/generate.mjs` is watched and shown; one number
 * of it is changed again and again, at another place each time. The clock starts before the file is written and
 * stops in the page in the task that follows the first animation frame after the change was put in: the browser
 * sets and paints the page between the two. Both clocks are the system's own (`performance.timeOrigin + performance.now()`), read in two processes
 * of one machine. As a program: node tests/bench/live.mjs [EDITS] [SECTIONS…]
 */
import { spawn } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import puppeteer from 'puppeteer-core'
import { longDocument } from './generate.mjs'

const root = fileURLToPath(new URL('../..', import.meta.url))
const [edits = 200, ...given] = process.argv.slice(2).map(Number)
const sizes = given.length > 0 ? given : [10, 50, 200]
const folder = mkdtempSync(join(tmpdir(), 'platemark-live-'))
const browser = await puppeteer.launch({
  executablePath: process.env.PLATEMARK_BROWSER ?? '/usr/bin/chromium',
  args: ['--no-sandbox'],
})

/** Milliseconds of the system's clock, with fractions. */
const clock = () => performance.timeOrigin + performance.now()

/** @typedef {{ all: number[], build: number[], client: number[] }} Times `all` from save to repaint, `build` of it as the server says, `client` from the event to the end of the change */

/** @param {number} sections @returns {Promise<Times>} */
async function timesOf(sections) {
  const path = join(folder, `long-${sections}.md`)
  const text = longDocument(sections, sections * 10)
  writeFileSync(path, text)
  const watch = spawn(process.execPath, [join(root, 'dist/platemark.cjs'), 'watch', path], { cwd: folder })
  /** @type {number[]} */
  const builds = []
  const address = await new Promise(done => {
    watch.stdout.on('data', bytes => {
      for (const [, ms] of String(bytes).matchAll(/ (\d+) ms\n/g)) builds.push(Number(ms))
      const found = /http\S+/.exec(String(bytes))
      if (found) done(found[0])
    })
  })
  const page = await browser.newPage()
  await page.setViewport({ width: 1180, height: 900 })
  // A page that glides to each edit would still be on its way at the next.
  await page.emulateMediaFeatures([{ name: 'prefers-reduced-motion', value: 'reduce' }])
  await page.goto(address, { timeout: 120_000 })
  await page.evaluate(`
    window.painted = new Map()
    document.addEventListener('platemark-updated', ({ detail }) => {
      const changed = performance.timeOrigin + performance.now()
      const { port1, port2 } = new MessageChannel()
      port2.onmessage = () =>
        window.painted.set(detail.version, { changed, heard: detail.heard, painted: performance.timeOrigin + performance.now() })
      requestAnimationFrame(() => port1.postMessage(0))
    })`)
  await page.waitForFunction(`document.querySelector('.live-state')`)
  /** @type {Times} */
  const times = { all: [], build: [], client: [] }
  for (let i = 0; i < edits + 5; i++) {
    const version = i + 2
    const began = clock()
    writeFileSync(path, edited(text, sections, i))
    const seen = /** @type {{ changed: number, heard: number, painted: number }} */ (
      await (await page.waitForFunction(`window.painted.get(${version})`, { polling: 5, timeout: 60_000 })).jsonValue()
    )
    // The first few warm both ends up.
    if (i >= 5) {
      times.all.push(seen.painted - began)
      times.client.push(seen.changed - seen.heard)
    }
    // Longer than the watch holds back what it hears of one file.
    await new Promise(done => setTimeout(done, 80))
  }
  times.build = builds.slice(-edits)
  await page.close()
  const ended = new Promise(done => watch.once('exit', done))
  watch.kill('SIGINT')
  await ended
  return times
}

/** A first load of one section, which its own line of numbers and the sums after it rest on. @param {string} text @param {number} sections @param {number} i */
function edited(text, sections, i) {
  const section = 1 + ((i * 7) % sections)
  return text.replace(new RegExp(`^(w_${section} = )\\d+`, 'm'), (_, head) => `${head}${20 + (i % 30)}`)
}

/** @param {readonly number[]} times @param {number} share */
const at = (times, share) => [...times].sort((a, b) => a - b)[Math.floor(share * (times.length - 1))]?.toFixed(1) ?? ''

try {
  console.log(`save to repainted, ${edits} edits, ms: 50th and 95th percentile`)
  for (const sections of sizes) {
    const { all, build, client } = await timesOf(sections)
    console.log(
      `${String(sections).padStart(4)} sections: ${at(all, 0.5)} and ${at(all, 0.95)}; of it building ${at(build, 0.5)} and ${at(build, 0.95)}, changing the page ${at(client, 0.5)} and ${at(client, 0.95)}`,
    )
  }
} finally {
  await browser.close()
  rmSync(folder, { recursive: true, force: true })
}
