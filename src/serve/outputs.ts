/** Writes what was asked for to the disk, after the browser has been told, and never outside its folder. */
import { realpathSync } from 'node:fs'
import { basename, dirname, extname, join, relative, resolve, sep } from 'node:path'
import { bad, good, type Outcome } from '../base/outcome.ts'
import type { Compiled } from '../compile.ts'
import { writeWhole } from '../files.ts'
import type { Press } from '../pdf/press.ts'
import { type Format, type Host, type OutputFile, paperOf, publish } from '../publish.ts'

export interface Wanted {
  readonly to: readonly Format[]
  readonly out: string | undefined
  readonly draft: boolean
}

export interface Outputs {
  /** Writes a build soon; another one before that takes its place. */
  readonly write: (document: Written, compiled: Compiled) => void
  /** Writes at once what is still to be written, and waits for what is being printed. */
  readonly finish: () => Promise<void>
}

/** A document as it is written. */
export interface Written {
  readonly path: string
  readonly shown: string
  readonly within: string
}

export interface Telling {
  /** A file was written. */
  readonly wrote: (path: string) => void
  readonly failed: (because: string) => void
}

/** Saves closer than this to each other are written once. */
const QUIET = 150

/** However fast saves come, a build is written after this long. */
const LONGEST = 2000

/** @param press what prints a PDF; undefined where none is wanted */
export function createOutputs(wanted: Wanted, host: Host, press: Press | undefined, tell: Telling): Outputs {
  const waiting = new Map<string, { readonly due: number; timer: NodeJS.Timeout; run: () => void }>()
  const printing = createPrinting(host, press, tell)
  const writeNow = (document: Written, compiled: Compiled): void => {
    try {
      const errors = compiled.diagnostics.some(({ severity }) => severity === 'error')
      const whole = !errors || wanted.draft
      const folder = wanted.out === undefined ? dirname(document.path) : join(wanted.out, document.within)
      const stem = basename(document.path, extname(document.path))
      const formats = wanted.to.filter(format => format === 'json' || whole)
      const files = formats.flatMap(format =>
        format === 'pdf'
          ? []
          : publish(compiled, stemFor(format, stem, wanted.out), format, errors && wanted.draft, host),
      )
      const put = (some: readonly OutputFile[]) => deliver(wanted.out ?? folder, folder, some, document, tell)
      put(files)
      if (formats.includes('pdf'))
        printing.print(document.shown, compiled, errors, bytes => put([{ name: `${stem}.pdf`, text: '', bytes }]))
    } catch (error) {
      const detail = error instanceof Error ? error.message : String(error)
      tell.failed(`${document.shown}: Platemark has a fault of its own here: ${detail}\nNothing was written.`)
    }
  }
  return {
    write: (document, compiled) => {
      const before = waiting.get(document.path)
      clearTimeout(before?.timer)
      const now = performance.now()
      const due = before?.due ?? now + LONGEST
      const run = () => {
        waiting.delete(document.path)
        writeNow(document, compiled)
      }
      waiting.set(document.path, { due, run, timer: setTimeout(run, Math.max(0, Math.min(QUIET, due - now))) })
    },
    finish: async () => {
      for (const { timer, run } of [...waiting.values()]) {
        clearTimeout(timer)
        run()
      }
      await printing.finish()
    },
  }
}

// Beside its source the worked Markdown needs a name of its own.
const stemFor = (format: Format, stem: string, out: string | undefined): string =>
  format === 'md' && out === undefined ? `${stem}.worked` : stem

/** @param root the folder that nothing is written outside of */
function deliver(root: string, folder: string, files: readonly OutputFile[], document: Written, tell: Telling): void {
  const place = insideOf(root, folder)
  const written = place.ok ? fits(folder, files, document.path) : place
  const done = written.ok ? writeWhole(folder, files) : written
  if (!done.ok) tell.failed(`${document.shown}: ${done.because}. It is tried again at the next save.`)
  else for (const { name } of files) tell.wrote(join(folder, name))
}

/** A folder within another, with every link on the way followed. */
export function insideOf(root: string, folder: string): Outcome<undefined> {
  const [real, within] = [followed(root), followed(folder)]
  const way = relative(real, within)
  return way === '..' || way.startsWith(`..${sep}`) || resolve(real, way) !== within
    ? bad(`${folder} leads out of ${root}, and nothing is written there`)
    : good(undefined)
}

/** A path with its links followed as far as it is there. */
function followed(path: string): string {
  const whole = resolve(path)
  try {
    return realpathSync(whole)
  } catch {
    const above = dirname(whole)
    return above === whole ? whole : join(followed(above), basename(whole))
  }
}

/** No result takes the place of the document itself, or has a name that leads elsewhere. */
function fits(folder: string, files: readonly OutputFile[], source: string): Outcome<undefined> {
  const own = followed(source)
  const strange = files.find(({ name }) => basename(name) !== name || followed(join(folder, name)) === own)
  return strange ? bad(`${join(folder, strange.name)} would take the place of the document`) : good(undefined)
}

interface Printing {
  readonly print: (shown: string, compiled: Compiled, draft: boolean, put: (bytes: Uint8Array) => void) => void
  readonly finish: () => Promise<void>
}

/** Prints one document at a time; of each only the newest build that waits. */
function createPrinting(host: Host, press: Press | undefined, tell: Telling): Printing {
  const next = new Map<string, () => Promise<void>>()
  let running: Promise<void> | undefined
  const run = async (): Promise<void> => {
    for (let [first] = next; first; [first] = next) {
      next.delete(first[0])
      await first[1]()
    }
    running = undefined
  }
  return {
    print: (shown, compiled, draft, put) => {
      if (!press) return
      next.set(shown, async () => {
        try {
          const printed = await press.print(paperOf(compiled, draft, host))
          if (printed.ok) put(printed.value)
          else tell.failed(`${printed.because}\n${shown}: the PDF was not written`)
        } catch (error) {
          const detail = error instanceof Error ? error.message : String(error)
          tell.failed(`${shown}: the PDF was not written: ${detail}`)
        }
      })
      running ??= run()
    },
    finish: async () => running,
  }
}
