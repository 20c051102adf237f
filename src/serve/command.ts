/** `watch`: its arguments, and the loop that runs until it is told to end. */
import { createHash, randomBytes } from 'node:crypto'
import { statSync } from 'node:fs'
import { extname, relative, resolve, sep } from 'node:path'
import { parseArgs } from 'node:util'
import { setFlagsFromString } from 'node:v8'
import type { Diagnostic } from '../base/diagnostic.ts'
import { inWords as listed } from '../base/near.ts'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { longForm, oneLine } from '../base/report.ts'
import type { Source } from '../base/span.ts'
import { type DocumentFile, documentsIn, print } from '../files.ts'
import type { Format, Host } from '../publish.ts'
import { createDesk } from './desk.ts'
import { type Built, WatchedDocument } from './document.ts'
import { type Editor, readEditor } from './editor.ts'
import { listen } from './http.ts'
import { openBrowser } from './opening.ts'
import { createOutputs } from './outputs.ts'
import { isHidden, startWatching } from './watching.ts'
import { counted, inWords, movesInWords } from './words.ts'

export interface WatchSettings {
  readonly files: readonly string[]
  readonly folders: readonly string[]
  /** Empty where nothing is written. */
  readonly to: readonly Format[]
  readonly out: string | undefined
  readonly draft: boolean
  readonly port: number
  readonly open: boolean
  readonly editor: Editor | undefined
  readonly oneLine: boolean
  readonly browser: string | undefined
}

const formats: readonly string[] = ['html', 'pdf', 'md', 'json'] satisfies readonly Format[]
const isFormat = (word: string): word is Format => formats.includes(word)

/** @returns why the arguments cannot be used */
export function readWatch(args: readonly string[], environment: NodeJS.ProcessEnv): Outcome<WatchSettings> {
  const read = parsed(args)
  if (!read.ok) return read
  const { values, positionals } = read.value
  if (positionals.length === 0) return bad('Name a Markdown file, or a folder of them.')
  const to = (values.to ?? '').split(',').flatMap(word => (word.trim() === '' ? [] : [word.trim()]))
  const strange = to.find(word => !isFormat(word))
  if (strange !== undefined) return bad(`There is no format ${strange}. Formats are ${listed(formats, 'and')}.`)
  if (to.length === 0 && values.out !== undefined) return bad('--out is for --to: without it nothing is written.')
  if (values.browser !== undefined && !to.includes('pdf')) return bad('--browser is for --to pdf.')
  const port = Number(values.port ?? '0')
  if (!/^\d+$/.test(values.port ?? '0') || port > 65535)
    return bad(`${values.port} is no port: name one from 0 to 65535.`)
  const template = values.editor ?? environment.PLATEMARK_EDITOR
  const editor = template ? readEditor(template) : good(undefined)
  if (!editor.ok) return editor
  const folders = positionals.filter(isFolder)
  const files = positionals.filter(path => !isFolder(path))
  const strangeFile = files.find(path => extname(path) !== '.md' && !isThere(path))
  if (strangeFile !== undefined) return bad(`${strangeFile}: there is no such file or folder.`)
  return good({
    files,
    folders,
    to: to.filter(isFormat),
    out: values.out,
    draft: values.draft === true,
    port,
    open: values.open === true,
    editor: editor.value,
    oneLine: values.list === true,
    browser: values.browser ?? environment.PLATEMARK_BROWSER,
  })
}

const options = {
  to: { type: 'string' },
  out: { type: 'string' },
  draft: { type: 'boolean' },
  port: { type: 'string' },
  open: { type: 'boolean' },
  editor: { type: 'string' },
  browser: { type: 'string' },
  list: { type: 'boolean' },
} as const

function parsed(args: readonly string[]) {
  try {
    return good(parseArgs({ args: [...args], options, allowPositionals: true }))
  } catch (error) {
    return bad(`${error instanceof Error ? (error.message.split('. ')[0] ?? '') : ''}.`)
  }
}

const isThere = (path: string): boolean => statSync(path, { throwIfNoEntry: false }) !== undefined
const isFolder = (path: string): boolean => statSync(path, { throwIfNoEntry: false })?.isDirectory() === true

export interface Watch {
  readonly address: string
  /** Writes what is still to be written and ends everything. */
  readonly end: () => Promise<void>
}

/** Where what is said goes. */
export interface Voice {
  readonly output: (text: string) => void
  readonly errors: (text: string) => void
}

/** Runs until the process is told to end. @param near folder of the program, where a browser that comes along is */
export async function runWatch(settings: WatchSettings, host: Host, near: string): Promise<number> {
  // The launcher puts off optimised code for runs that end at once; this one pays for it. The figure is V8's own.
  if (process.versions.node.startsWith('20.')) setFlagsFromString('--interrupt-budget=135168')
  const voice: Voice = { output: text => print('output', text), errors: text => print('errors', text) }
  const started = await startWatch(settings, host, near, voice)
  if (!started.ok) {
    voice.errors(`${started.because}\n`)
    return 1
  }
  await new Promise<void>(done => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.once(signal, () => done())
  })
  await started.value.end()
  return 0
}

export async function startWatch(
  settings: WatchSettings,
  host: Host,
  near: string,
  voice: Voice,
): Promise<Outcome<Watch>> {
  const several = settings.folders.length > 0 || settings.files.length > 1
  const run = randomBytes(6).toString('hex')
  const token = randomBytes(18).toString('base64url')
  const desk = createDesk(run, token)
  const press = settings.to.includes('pdf') ? await pressFor(settings, near) : undefined
  const outputs = createOutputs(settings, host, press, {
    wrote: path => voice.output(`${shownPath(path)}\n`),
    failed: because => voice.errors(`${because}\n`),
  })
  const folders = settings.folders.map(folder => resolve(folder))
  // What is written into a watched folder is no document of it.
  const out = settings.out === undefined ? undefined : resolve(settings.out)
  const leftOut = out !== undefined && folders.some(folder => out.startsWith(folder + sep)) ? [out] : []
  const byFile = new Map<string, Set<WatchedDocument>>()
  const watching = startWatching(folders, leftOut, {
    file: path => {
      for (const document of byFile.get(path) ?? []) document.look(path !== resolve(document.path))
    },
    folder: () => gather(),
  })
  const watchFor = (document: WatchedDocument, path: string): void => {
    const file = resolve(path)
    const known = byFile.get(file) ?? new Set()
    byFile.set(file, known.add(document))
    watching.addFile(file)
  }
  const built = (document: WatchedDocument, made: Built): void => {
    desk.stir(document)
    sayBuilt(document, made, settings.oneLine, voice)
    if (document.compiled && settings.to.length > 0) outputs.write(document, document.compiled)
  }
  const add = ({ path, within }: DocumentFile): void => {
    const key = createHash('sha256').update(resolve(path)).digest('hex').slice(0, 12)
    if (desk.documents.has(key)) return
    const document: WatchedDocument = new WatchedDocument(path, shownPath(path), within, {
      host,
      watch: file => watchFor(document, file),
      built,
    })
    desk.add(key, document)
    watchFor(document, path)
    document.look()
  }
  const gather = (): void => {
    for (const folder of settings.folders) {
      const found = documentsIn(folder)
      if (found.ok) found.value.filter(({ path }) => !isHidden(path) && !isWithin(path, leftOut)).forEach(add)
    }
  }
  const listening = await listen(
    { desk, host, run, token, editor: settings.editor, several, pathOf: ({ path }) => resolve(path) },
    settings.port,
  )
  if (!listening.ok) {
    await Promise.all([watching.close(), press?.close()])
    return listening
  }
  const address = `http://127.0.0.1:${listening.value.port}/`
  voice.output(`Live at ${address} until this program is ended (Ctrl+C).\n`)
  for (const path of settings.files) add({ path, within: '' })
  gather()
  if (desk.documents.size === 0)
    voice.output(`No Markdown file in ${settings.folders.join(', ')} yet; waiting for one.\n`)
  if (settings.open && !(await openBrowser(address)))
    voice.errors('No browser could be started: open the address yourself.\n')
  return good({
    address,
    end: async () => {
      await watching.close()
      for (const document of desk.documents.values()) document.close()
      await outputs.finish()
      await Promise.all([listening.value.close(), press?.close()])
    },
  })
}

async function pressFor({ browser }: WatchSettings, near: string) {
  const { openPress, PATIENCE } = await import('../pdf/press.ts')
  const named = browser === undefined ? undefined : { program: browser, namedBy: '--browser or PLATEMARK_BROWSER' }
  return openPress({ named, near, patience: PATIENCE })
}

const isWithin = (path: string, folders: readonly string[]): boolean =>
  folders.some(folder => resolve(path).startsWith(folder + sep))

const shownPath = (path: string): string => relative(process.cwd(), resolve(path)).replaceAll('\\', '/')

/** One line for each save, and what is wrong in full. */
function sayBuilt(document: WatchedDocument, { state, moves, ms, fault }: Built, list: boolean, voice: Voice): void {
  const { shown, compiled } = document
  const { report, version } = state
  const say = (source: Source, diagnostic: Diagnostic): void =>
    voice.errors(list ? `${oneLine(source, diagnostic)}\n` : `${longForm(source, diagnostic)}\n\n`)
  if (compiled) for (const each of compiled.diagnostics) say(compiled.source, each)
  if (fault) {
    const { rule, message, help, offset } = fault.fault
    const at = { span: { start: offset, end: offset + 1 }, text: '' }
    say(fault.source, { rule, severity: 'error', message, help, at, also: [] })
    voice.errors(`${shown}: waiting for the next save\n`)
    return
  }
  const parts = [
    inWords(report),
    version === 1 ? '' : movesInWords(moves),
    report.checks === 0 ? '' : `${counted(report.checks, 'check')}, ${report.failed === 0 ? 'none' : report.failed} NG`,
    `${Math.round(ms)} ms`,
  ]
  voice.output(`${shown}: ${parts.filter(part => part !== '').join('; ')}\n`)
}
