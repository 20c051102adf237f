/** The tabs of one browser, each printing the next page that waits. */
import type { Browser } from 'puppeteer-core'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { openTab, type Tab } from './tab.ts'

export interface Desk {
  /** @returns a PDF for each page, in their order; or what the browser said instead */
  readonly print: (pages: readonly string[]) => Promise<Outcome<readonly Uint8Array[]>>
  readonly close: () => Promise<void>
}

/** Two tabs print nearly twice as fast as one; more gained nothing where this was measured, on two cores. */
const TABS = 2

/** How long a browser may take to end by itself, in ms. */
const LAST_WORDS = 5_000

export function createDesk(browser: Browser): Desk {
  let tabs: Tab[] = []
  const tabsFor = async (count: number): Promise<readonly Tab[]> => {
    // A browser opens with an empty tab.
    const waiting = tabs.length === 0 ? await browser.pages() : []
    while (tabs.length < Math.min(TABS, count)) tabs.push(await openTab(waiting.pop() ?? (await browser.newPage())))
    return tabs.slice(0, count)
  }
  const printAll = async (pages: readonly string[]): Promise<Outcome<readonly Uint8Array[]>> => {
    const printed: Uint8Array[] = []
    let next = 0
    const work = async (tab: Tab) => {
      while (next < pages.length) {
        const i = next++
        printed[i] = await tab.print(pages[i] ?? '')
      }
    }
    try {
      await Promise.all((await tabsFor(pages.length)).map(work))
      return good(printed)
    } catch (error) {
      next = pages.length
      // What a tab was at is unknown now: what is printed next gets new ones.
      await Promise.all(tabs.map(({ close }) => close()))
      tabs = []
      return bad(`the browser did not print it: ${error instanceof Error ? error.message : String(error)}`)
    }
  }
  let before: Promise<unknown> = Promise.resolve()
  return {
    // A tab holds one page at a time, so whoever prints waits for those who came first.
    print: pages => {
      const now = before.then(() => printAll(pages))
      before = now
      return now
    },
    close: async () => {
      const program = browser.process()
      const timer = setTimeout(() => program?.kill('SIGKILL'), LAST_WORDS)
      await browser.close().catch(() => program?.kill('SIGKILL'))
      clearTimeout(timer)
    },
  }
}
