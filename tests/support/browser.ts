/** The browser that tests measure in: an installed one, or the one that comes along where none is. */
import { fileURLToPath } from 'node:url'
import puppeteer, { type Browser } from 'puppeteer-core'
import { PATIENCE, startBrowser } from '../../src/pdf/browser.ts'
import { embeddedBrowser } from '../../src/pdf/embedded.ts'
import { installedBrowsers, thisMachine } from '../../src/pdf/places.ts'

const { platform, arch, environment } = thisMachine
const named = environment.PLATEMARK_BROWSER
const root = fileURLToPath(new URL('../../', import.meta.url))

/** False where none is installed and none comes along, which is so only off Linux on x86-64. */
export const hasBrowser: boolean =
  named !== undefined || (platform === 'linux' && arch === 'x64') || installedBrowsers(thisMachine).length > 0

/** @throws when no browser starts, with what was tried */
export async function launchBrowser(): Promise<Browser> {
  const choice = named === undefined ? undefined : { program: named, namedBy: 'PLATEMARK_BROWSER' }
  const started = await startBrowser({ named: choice, near: root, patience: PATIENCE })
  if (!started.ok) throw new Error(started.because)
  return started.value
}

/** The same browser with its network, for pages that a server of ours gives. @throws when no browser starts */
export async function launchOnline(): Promise<Browser> {
  const cut = await launchBrowser()
  const { spawnfile = '', spawnargs = [] } = cut.process() ?? {}
  await cut.close()
  const args = spawnargs.filter(word => /^--(?:no-sandbox|disable-gpu|headless)/.test(word))
  // The embedded browser brings its own libraries and faces, which it has to be told of.
  const embedded = await embeddedBrowser(root, thisMachine)
  const own = embedded.ok && embedded.value.program === spawnfile ? embedded.value.environment : {}
  return puppeteer.launch({
    executablePath: spawnfile,
    args,
    env: { ...process.env, ...own },
    headless: spawnargs.includes('--headless') ? 'shell' : true,
  })
}
