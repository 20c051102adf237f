/** Arguments, files and exit codes. */
import { basename, dirname, extname, join, relative, resolve } from 'node:path'
import { parseArgs } from 'node:util'
import { inWords, suggestion } from './base/near.ts'
import { good } from './base/outcome.ts'
import { longForm, oneLine, sorted } from './base/report.ts'
import type { Value } from './base/value.ts'
import type { Compiled } from './compile.ts'
import { compileText } from './compile.ts'
import { auditSteps } from './explain/audit.ts'
import { missingForSubmittal } from './explain/submittal.ts'
import { everyValue } from './explain/trace.ts'
import { traceText } from './explain/trace-text.ts'
import { type DocumentFile, documentsIn, nearbyOf, print, readText, unreadable, writeWhole } from './files.ts'
import { help, helpFor } from './help.ts'
import { hostAt } from './host.ts'
import { isWord } from './model/scope.ts'
import type { Press } from './pdf/press.ts'
import { type Format, type OutputFile, paperOf, publish } from './publish.ts'
import { PIPED, tidyDocument } from './tidy-command.ts'

export { stillPrinting } from './files.ts'

const DONE = 0
const ERRORS = 1
const WRONG_USAGE = 2

const formats: readonly string[] = ['html', 'pdf', 'md', 'json'] satisfies readonly Format[]
const isFormat = (word: string): word is Format => formats.includes(word)

const host = hostAt(join(__dirname, 'assets'))

const commands = ['build', 'check', 'audit', 'trace', 'tidy'] as const
type Command = (typeof commands)[number]

interface Settings {
  readonly command: Command
  readonly documents: readonly DocumentFile[]
  readonly to: readonly Format[]
  readonly out: string | undefined
  readonly draft: boolean
  readonly oneLine: boolean
  /** True when what a submittal must carry is asked for too. */
  readonly submittal: boolean
  /** True when `tidy` writes nothing. */
  readonly checkOnly: boolean
  /** The value that `trace` tells of. */
  readonly id: string
  readonly browser: NamedBrowser | undefined
}

interface NamedBrowser {
  readonly program: string
  readonly namedBy: string
}

/** @returns the exit code; in a promise only where a PDF is wanted, since all else is quicker done at once */
export function run(args: readonly string[]): number | Promise<number> {
  if (args[0] === 'watch') return watch(args.slice(1))
  const settings = readArguments(args)
  if (typeof settings === 'number' || settings instanceof Promise) return settings
  if (settings.to.includes('pdf')) return runWithPress(settings)
  const codes = settings.documents.map(document => guarded(document, settings))
  return Math.max(DONE, ...codes)
}

/** What watches is loaded when it is asked for. */
async function watch(args: readonly string[]): Promise<number> {
  if (args.includes('--help')) return say(helpFor('watch'))
  const { readWatch, runWatch } = await import('./serve/command.ts')
  const settings = readWatch(args, process.env)
  return settings.ok ? runWatch(settings.value, host, __dirname) : misuse(settings.because)
}

function guarded(document: DocumentFile, settings: Settings): number {
  try {
    return actions[settings.command](document, settings)
  } catch (error) {
    return ownFault(document, error)
  }
}

/** One browser prints every document, and is ended whatever happens. */
async function runWithPress(settings: Settings): Promise<number> {
  const { openPress, PATIENCE } = await import('./pdf/press.ts')
  const press = openPress({ named: settings.browser, near: __dirname, patience: PATIENCE })
  const said = new Set<string>()
  let code = DONE
  try {
    for (const document of settings.documents)
      code = Math.max(
        code,
        await buildWithPress(document, settings, press, said).catch(error => ownFault(document, error)),
      )
  } finally {
    await press.close()
  }
  return code
}

/** A fault of our own must not hide the other documents, and is said as what it is. */
function ownFault(document: DocumentFile, error: unknown): number {
  const detail = error instanceof Error ? (process.env.PLATEMARK_DEBUG ? (error.stack ?? '') : error.message) : ''
  return fail(
    `${shownPath(document.path)}: Platemark has a fault of its own here: ${detail}\nPlease report it with the document. Nothing was written.`,
  )
}

/** Serves an editor until it ends the connection. Editors name the streams, and may name their own process. */
function serveEditor(args: readonly string[]): number | Promise<number> {
  if (args.includes('--help')) return say(helpFor('lsp'))
  const strange = args.find(arg => arg !== '--stdio' && !/^--clientProcessId=\d+$/.test(arg))
  if (strange !== undefined) return misuse(`platemark lsp takes no ${strange}.`)
  return import('./lsp/command.ts').then(({ serveEditor }) => serveEditor())
}

function readArguments(args: readonly string[]): Settings | number | Promise<number> {
  const [word, ...rest] = args
  if (word === '--version') return say(host.version)
  if (word === undefined) return misuse('A command is missing.')
  if (word === '--help' || word === 'help') return say(help)
  if (word === 'lsp') return serveEditor(rest)
  const command = commands.find(command => command === word)
  if (!command)
    return misuse(`There is no command ${word}. ${suggestion(word, [...commands, 'lsp', 'watch'], 'command')}`)
  if (rest.includes('--help')) return say(helpFor(command))
  return readOptions(command, rest)
}

const options = {
  build: {
    to: { type: 'string' },
    out: { type: 'string' },
    draft: { type: 'boolean' },
    browser: { type: 'string' },
    list: { type: 'boolean' },
  },
  check: { list: { type: 'boolean' }, submittal: { type: 'boolean' } },
  audit: { list: { type: 'boolean' } },
  trace: { list: { type: 'boolean' } },
  tidy: { check: { type: 'boolean' } },
} as const

function readOptions(command: Command, args: readonly string[]): Settings | number {
  let parsed: {
    readonly values: Readonly<Record<string, unknown>>
    readonly positionals: readonly string[]
  }
  try {
    parsed = parseArgs({ args: [...args], options: options[command], allowPositionals: true })
  } catch (error) {
    return misuse(`${error instanceof Error ? (error.message.split('. ')[0] ?? '') : ''}.`)
  }
  const { values } = parsed
  const asksForValue = command === 'trace'
  if (asksForValue && parsed.positionals.length !== 2) return misuse('Name one Markdown file and the id of a value.')
  const id = asksForValue ? (parsed.positionals[1] ?? '') : ''
  const positionals = asksForValue ? parsed.positionals.slice(0, 1) : parsed.positionals
  if (positionals.length === 0) return misuse('Name a Markdown file, or a folder of them.')
  const to = (typeof values.to === 'string' ? values.to : 'html').split(',').map(word => word.trim())
  const strange = to.find(word => !isFormat(word))
  if (strange !== undefined) return misuse(`There is no format ${strange}. Formats are ${inWords(formats, 'and')}.`)
  if (values.browser !== undefined && !to.includes('pdf')) return misuse('--browser is for --to pdf.')
  const piped = command === 'tidy' && positionals.includes(PIPED)
  if (piped && positionals.length > 1) return misuse(`${PIPED} is the text piped in, and stands alone.`)
  const found = piped ? [good([{ path: PIPED, within: '' }])] : positionals.map(path => documentsIn(path))
  const missing = found.flatMap(each => (each.ok ? [] : [each.because]))
  if (missing.length > 0) return fail(missing.join('\n'))
  return {
    command,
    documents: onlyOnce(found.flatMap(each => (each.ok ? each.value : []))),
    to: to.filter(isFormat),
    out: typeof values.out === 'string' ? values.out : undefined,
    draft: values.draft === true,
    oneLine: values.list === true,
    submittal: values.submittal === true,
    checkOnly: values.check === true,
    id,
    browser: namedBrowser(values.browser),
  }
}

function namedBrowser(option: unknown): NamedBrowser | undefined {
  if (typeof option === 'string') return { program: option, namedBy: '--browser' }
  const { PLATEMARK_BROWSER } = process.env
  return PLATEMARK_BROWSER ? { program: PLATEMARK_BROWSER, namedBy: 'PLATEMARK_BROWSER' } : undefined
}

/** Each document once, however often it was named. */
function onlyOnce(documents: readonly DocumentFile[]): readonly DocumentFile[] {
  return [...new Map(documents.map(document => [resolve(document.path), document])).values()]
}

function compileFile(path: string): Compiled | undefined {
  const read = readText(path)
  if (read.ok) return compileText(shownPath(path), read.value, nearbyOf(path))
  print('errors', unreadable(shownPath(path), read.because))
  return undefined
}

const shownPath = (path: string): string => relative(process.cwd(), resolve(path)).replaceAll('\\', '/')

/** A document that was worked, with the text files that it gives. */
interface Worked {
  readonly compiled: Compiled
  readonly errors: number
  readonly folder: string
  readonly stem: string
  readonly files: readonly OutputFile[]
}

function build(document: DocumentFile, settings: Settings): number {
  const worked = work(document, settings)
  return worked ? deliver(worked, []) : ERRORS
}

/** @param said what has been said about the browser of earlier documents */
async function buildWithPress(
  document: DocumentFile,
  settings: Settings,
  press: Press,
  said: Set<string>,
): Promise<number> {
  const worked = work(document, settings)
  if (!worked) return ERRORS
  const { compiled, errors, stem } = worked
  if (errors > 0 && !settings.draft) return deliver(worked, [])
  const printed = await press.print(paperOf(compiled, settings.draft && errors > 0, host))
  if (printed.ok) return deliver(worked, [{ name: `${stem}.pdf`, text: '', bytes: printed.value }])
  if (!said.has(printed.because)) fail(printed.because)
  said.add(printed.because)
  deliver(worked, [])
  return fail(`${compiled.source.path}: the PDF was not written`)
}

/** Pages are written by a sound build, or as a draft; results always are. */
function work({ path, within }: DocumentFile, settings: Settings): Worked | undefined {
  const compiled = compileFile(path)
  if (!compiled) return undefined
  const errors = tell(compiled, settings)
  const folder = settings.out === undefined ? dirname(path) : join(settings.out, within)
  const stem = basename(path, extname(path))
  // Beside its source the worked Markdown needs a name of its own.
  const isBeside = resolve(folder) === resolve(dirname(path))
  const stemOf = (format: Format) => (format === 'md' && isBeside ? `${stem}.worked` : stem)
  const wanted = settings.to.filter(format => format === 'json' || errors === 0 || settings.draft)
  const files = wanted.flatMap(format =>
    format === 'pdf' ? [] : publish(compiled, stemOf(format), format, settings.draft && errors > 0, host),
  )
  return { compiled, errors, folder, stem, files }
}

function deliver({ compiled, errors, folder, files }: Worked, printed: readonly OutputFile[]): number {
  const all = [...files, ...printed]
  const written = writeWhole(folder, all)
  if (!written.ok) return fail(written.because)
  for (const { name } of all) print('output', `${shownPath(join(folder, name))}\n`)
  sayChecks(compiled)
  return errors > 0 ? ERRORS : DONE
}

function check({ path }: DocumentFile, settings: Settings): number {
  const compiled = compileFile(path)
  if (!compiled) return ERRORS
  const { choices, context, diagnostics } = compiled
  const wanted = settings.submittal ? missingForSubmittal(choices, context) : []
  const errors = tell({ ...compiled, diagnostics: sorted(compiled.source, [...diagnostics, ...wanted]) }, settings)
  return errors > 0 || sayChecks(compiled) > 0 ? ERRORS : DONE
}

/** Goes over every printed line. A line that does not hold is a fault of ours, and is said as one. */
function audit({ path }: DocumentFile, settings: Settings): number {
  const compiled = compileFile(path)
  if (!compiled) return ERRORS
  const errors = tell(compiled, settings)
  const { source, context } = compiled
  const { lines, broken } = auditSteps(context.roots.values())
  for (const { id, line, because } of broken) print('output', `${source.path}: ${id}: ${because}: ${line}\n`)
  print(
    'output',
    `${source.path}: ${count(lines, 'line')} audited, ${broken.length === 0 ? 'all hold' : `${broken.length} do not hold`}\n`,
  )
  return errors > 0 || broken.length > 0 ? ERRORS : DONE
}

/** Tells where a value came from. What is printed is known by its id; anything else is looked up. */
function trace({ path }: DocumentFile, settings: Settings): number {
  const compiled = compileFile(path)
  if (!compiled) return ERRORS
  const errors = tell(compiled, settings)
  const { context, scope } = compiled
  const known = everyValue([...context.besides.values(), ...context.roots.values()])
  const found = known.find(({ id }) => id === settings.id) ?? looked(scope.lookup(settings.id))
  if (!found)
    return fail(
      `${shownPath(path)}: there is no value ${settings.id}. ${suggestion(
        settings.id,
        known.map(({ id }) => id),
        'value',
      )}`,
    )
  print('output', `${traceText(found, context)}\n`)
  return errors > 0 ? ERRORS : DONE
}

const looked = (found: ReturnType<Compiled['scope']['lookup']>): Value | undefined =>
  found?.ok && !isWord(found.value) ? found.value : undefined

const tidy = ({ path }: DocumentFile, { checkOnly }: Settings): number =>
  tidyDocument({ path, shown: path === PIPED ? path : shownPath(path), check: checkOnly }) ? DONE : ERRORS

const actions = { build, check, audit, trace, tidy } as const

/** Prints every diagnostic and a closing count. @returns the number of errors */
function tell({ source, diagnostics }: Compiled, settings: Settings): number {
  for (const diagnostic of diagnostics)
    print('errors', settings.oneLine ? `${oneLine(source, diagnostic)}\n` : `${longForm(source, diagnostic)}\n\n`)
  const errors = diagnostics.filter(({ severity }) => severity === 'error').length
  const warnings = diagnostics.length - errors
  if (diagnostics.length > 0)
    print('errors', `${source.path}: ${count(errors, 'error')}, ${count(warnings, 'warning')}\n`)
  return errors
}

/** Prints how the checks came out. @returns the number that failed */
function sayChecks({ source, checks }: Compiled): number {
  for (const { what, demand, capacity, ratioPrinted, ok } of checks)
    print(
      'output',
      `${source.path}: ${what}: ${demand} ${ok ? '≤' : '>'} ${capacity}, ratio ${ratioPrinted}, ${ok ? 'OK' : 'NG'}\n`,
    )
  const failed = checks.filter(({ ok }) => !ok).length
  print('output', `${source.path}: ${count(checks.length, 'check')}, ${failed === 0 ? 'none' : failed} failed\n`)
  return failed
}

const count = (n: number, noun: string): string => `${n} ${noun}${n === 1 ? '' : 's'}`

function say(text: string): number {
  print('output', `${text}\n`)
  return DONE
}

function misuse(text: string): number {
  print('errors', `${text}\nSee platemark --help.\n`)
  return WRONG_USAGE
}

function fail(text: string): number {
  print('errors', `${text}\n`)
  return ERRORS
}
