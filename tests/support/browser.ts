/** The browser that tests measure in, where one is installed. */
import { existsSync } from 'node:fs'
import puppeteer, { type Browser } from 'puppeteer-core'

const places = [
  '/usr/bin/chromium',
  '/usr/bin/chromium-browser',
  '/usr/bin/google-chrome',
  '/usr/bin/google-chrome-stable',
]

/** Undefined where no browser is found; `CHROME_PATH` names another. */
export const browserPath: string | undefined = process.env.CHROME_PATH ?? places.find(existsSync)

/** @throws when there is no browser */
export function launchBrowser(): Promise<Browser> {
  if (browserPath === undefined) throw new Error('no browser is installed')
  return puppeteer.launch({
    executablePath: browserPath,
    args: ['--no-sandbox', '--disable-gpu', '--no-first-run'],
  })
}
