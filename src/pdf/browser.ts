/** A browser at work: found, started, and given back. */
import { basename } from 'node:path'
import puppeteer, { type Browser } from 'puppeteer-core'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { embeddedBrowser } from './embedded.ts'
import { installedBrowsers, type Machine, programNamed, thisMachine } from './places.ts'

export interface BrowserChoice {
  /** The program to use and no other, and what named it, such as `--browser`; otherwise one is looked for. */
  readonly named: { readonly program: string; readonly namedBy: string } | undefined
  /** A folder from which the embedded browser's package can be found. */
  readonly near: string
  /** How long a browser may take to start, in ms. */
  readonly patience: number
}

export const PATIENCE = 30_000

/** Starts the named browser; or an installed one; or the embedded one. */
export async function startBrowser(choice: BrowserChoice, machine: Machine = thisMachine): Promise<Outcome<Browser>> {
  const { named, near, patience } = choice
  if (named !== undefined) {
    const program = programNamed(named.program, machine)
    if (program === undefined) return bad(`${named.namedBy}: there is no program ${named.program}.\n${ADVICE}`)
    const started = await start(program, {}, patience)
    return started.ok ? started : bad(`${named.namedBy}: ${started.because}.\n${ADVICE}`)
  }
  const tried: string[] = []
  for (const installed of installedBrowsers(machine)) {
    const started = await start(installed, {}, patience)
    if (started.ok) return started
    tried.push(started.because)
  }
  if (tried.length === 0) tried.push('no Chrome, Chromium or Edge is on the PATH or in its usual place')
  const embedded = await embeddedBrowser(near, machine)
  if (!embedded.ok) return bad(noBrowser([...tried, embedded.because]))
  const started = await start(embedded.value.program, embedded.value.environment, patience)
  return started.ok ? started : bad(noBrowser([...tried, started.because]))
}

const ADVICE = 'Name an installed Chrome, Chromium or Edge, or none and let one be looked for.'

const noBrowser = (tried: readonly string[]): string => `There is no browser to print the PDF with:
${tried.map(each => `  - ${each}`).join('\n')}
Install Chrome, Chromium or Edge, or name one with --browser PATH or in PLATEMARK_BROWSER.
The page needs none: build it with --to html and print it from any browser.`

async function start(
  program: string,
  environment: Readonly<Record<string, string>>,
  patience: number,
): Promise<Outcome<Browser>> {
  const isEmbedded = 'LD_LIBRARY_PATH' in environment
  // The system's sandbox asks for rights that the superuser's processes and the embedded browser do not have. What
  // is printed is our own page, without scripts or network.
  const sandbox = isEmbedded || process.getuid?.() === 0 ? ['--no-sandbox'] : []
  try {
    return good(
      await puppeteer.launch({
        executablePath: program,
        headless: isEmbedded || /headless.shell/.test(basename(program)) ? 'shell' : true,
        args: [...sandbox, '--disable-gpu', '--host-resolver-rules=MAP * ~NOTFOUND', '--force-color-profile=srgb'],
        env: { ...process.env, ...environment },
        timeout: patience,
      }),
    )
  } catch (error) {
    return bad(`${program} ${reasonOf(error, patience)}`)
  }
}

function reasonOf(error: unknown, patience: number): string {
  const message = error instanceof Error ? error.message : String(error)
  if (/timed out/i.test(message)) return `gave no sign of a browser within ${patience / 1000} s`
  const said = /stderr:\s*\n([^\n]+)/.exec(message)?.[1]?.trim() ?? ''
  return `does not start as a browser${said === '' ? '' : ` (it says: ${said.slice(0, 200)})`}`
}
