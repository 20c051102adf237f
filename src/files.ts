/** Reading documents and writing results; nothing else touches the disk. */
import {
  accessSync,
  chmodSync,
  chownSync,
  constants,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  realpathSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
  writeSync,
} from 'node:fs'
import { dirname, extname, join, relative, resolve } from 'node:path'
import type { Diagnostic } from './base/diagnostic.ts'
import { bad, good, type Outcome } from './base/outcome.ts'
import { longForm } from './base/report.ts'
import { sourceOf } from './base/span.ts'
import type { OutputFile } from './publish.ts'
import type { Nearby } from './read/nearby.ts'

/** A document to be built. */
export interface DocumentFile {
  readonly path: string
  /** Folder of it within the folder that was named, kept where results go elsewhere. */
  readonly within: string
}

/** The Markdown files that a path names: itself, or those of a folder and the folders in it. */
export function documentsIn(path: string): Outcome<readonly DocumentFile[]> {
  try {
    if (!statSync(path).isDirectory()) return good([{ path, within: '' }])
    const found = markdownIn(path).map(file => ({ path: file, within: relative(path, dirname(file)) }))
    return found.length > 0 ? good(found) : bad(`${path}: no Markdown file in this folder`)
  } catch (error) {
    return bad(`${path}: ${reason(error)}`)
  }
}

function markdownIn(folder: string): readonly string[] {
  const entries = readdirSync(folder, { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1))
  return entries.flatMap(entry => {
    const path = join(folder, entry.name)
    if (entry.isDirectory()) return entry.name.startsWith('.') || entry.name === 'node_modules' ? [] : markdownIn(path)
    return extname(entry.name) === '.md' && !entry.name.endsWith('.worked.md') ? [path] : []
  })
}

/** A calculation is prose and tables; a file beyond this is something else. */
const LARGEST = 5 * 1024 * 1024

/** Why a file has no text; where only some of it is strange, the rest and the place are there to be shown. */
export interface TextFault extends Pick<Diagnostic, 'rule' | 'message' | 'help'> {
  readonly text: string
  readonly offset: number
}

const faultOfWhole = { text: '', offset: 0 }

/** Why a document of some bytes is not read; undefined where it is. */
export const sizeFault = (size: number): TextFault | undefined =>
  size > LARGEST
    ? {
        rule: 'file-too-large',
        message: `this file has ${megabytes(size)} MB; ${megabytes(LARGEST)} MB are read`,
        help: 'Split the document.',
        ...faultOfWhole,
      }
    : undefined

export function readText(path: string): Outcome<string, TextFault> {
  try {
    const { size } = statSync(path)
    const fault = sizeFault(size)
    if (fault) return bad(fault)
    return decode(readFileSync(path))
  } catch (error) {
    return bad({
      rule: 'file-unreadable',
      message: `this file cannot be read: ${reason(error)}`,
      help: 'Check its name and its permissions.',
      ...faultOfWhole,
    })
  }
}

/** The files that the document at `path` names. */
export const nearbyOf = (path: string): Nearby => ({
  read: name => {
    try {
      const file = resolve(dirname(path), name)
      const found = statSync(file)
      if (found.isDirectory()) return bad('it is a folder')
      // A device or a pipe might never end.
      if (!found.isFile()) return bad('it is not a file')
      const { size } = found
      if (size > LARGEST) return bad(`it has ${megabytes(size)} MB; ${megabytes(LARGEST)} MB are read`)
      return good(readFileSync(file))
    } catch (error) {
      return bad(reason(error))
    }
  },
})

const megabytes = (size: number): string => String(Number((size / 1048576).toFixed(1)))

/** What is said of a file that has no text. */
export function unreadable(path: string, { text, offset, rule, message, help }: TextFault): string {
  const at = { span: { start: offset, end: offset + 1 }, text: '' }
  return `${longForm(sourceOf(path, text), { rule, severity: 'error', message, help, at, also: [] })}\n\n`
}

/** The text that is piped in, under the same limits as a file, with its byte order mark. */
export function readPiped(): Outcome<string, TextFault> {
  try {
    const bytes = readFileSync(0)
    const fault = sizeFault(bytes.length)
    if (fault) return bad(fault)
    const read = decode(bytes)
    return read.ok ? good(markOf(bytes) + read.value) : read
  } catch (error) {
    return bad({
      rule: 'file-unreadable',
      message: `the text piped in cannot be read: ${reason(error)}`,
      help: 'Pipe a document in, or name a file.',
      ...faultOfWhole,
    })
  }
}

function decode(bytes: Uint8Array): Outcome<string, TextFault> {
  try {
    return good(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch {
    const text = new TextDecoder('utf-8').decode(bytes)
    const offset = Math.max(0, text.indexOf('\ufffd'))
    return bad({ rule: 'not-utf-8', message: 'this file is not UTF-8 text', help: 'Save it as UTF-8.', text, offset })
  }
}

/** Writes each file whole or not at all: a reader never sees half of one. */
export function writeWhole(folder: string, files: readonly OutputFile[]): Outcome<undefined> {
  if (files.length === 0) return good(undefined)
  let workshop: string | undefined
  try {
    mkdirSync(folder, { recursive: true })
    workshop = mkdtempSync(join(folder, '.platemark-'))
    for (const file of files) {
      mkdirSync(dirname(join(workshop, file.name)), { recursive: true })
      writeFileSync(join(workshop, file.name), file.bytes ?? file.text)
    }
    for (const { name } of files) renameSync(join(workshop, name), join(folder, name))
    return good(undefined)
  } catch (error) {
    return bad(`${folder}: the results cannot be written: ${reason(error)}`)
  } finally {
    if (workshop !== undefined) rmSync(workshop, { recursive: true, force: true })
  }
}

/**
 * Puts another text in the place of a file's, whole or not at all. A link is followed; mode, owner and a byte order
 * mark stay. A file that may not be written is refused, though its folder would allow it to be replaced.
 */
export function rewrite(path: string, text: string): Outcome<undefined> {
  let workshop: string | undefined
  try {
    const file = realpathSync(path)
    accessSync(file, constants.W_OK)
    const { mode, uid, gid } = statSync(file)
    workshop = mkdtempSync(join(dirname(file), '.platemark-'))
    const written = join(workshop, 'text')
    writeFileSync(written, markOf(readFileSync(file)) + text)
    const made = statSync(written)
    if (made.uid !== uid || made.gid !== gid) chownSync(written, uid, gid)
    chmodSync(written, mode)
    renameSync(written, file)
    return good(undefined)
  } catch (error) {
    return bad(`${path}: it cannot be rewritten: ${reason(error)}`)
  } finally {
    if (workshop !== undefined) rmSync(workshop, { recursive: true, force: true })
  }
}

/** A byte order mark, which reading takes off, where some bytes begin with one. */
const markOf = (bytes: Buffer): string => (bytes.subarray(0, 3).toString() === '\ufeff' ? '\ufeff' : '')

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file or folder',
  EACCES: 'permission is refused',
  EPERM: 'permission is refused',
  EROFS: 'the disk is read-only',
  ENOTDIR: 'part of the path is not a folder',
  EEXIST: 'a file stands where a folder is needed',
  EISDIR: 'it is a folder',
  ENOSPC: 'the disk is full',
}

function reason(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  return reasons[code] ?? (error instanceof Error ? error.message : String(error))
}

let handedOver = false

/** True when a text may still be on its way, so that the process must end by itself. */
export const stillPrinting = (): boolean => handedOver

/**
 * Prints to the terminal or whatever stands in its place. Written straight to the file: setting
 * up the streams of `process` takes longer than many a document.
 */
export function print(to: 'output' | 'errors', text: string): void {
  const bytes = Buffer.from(text)
  let written = 0
  try {
    while (written < bytes.length) written += writeSync(to === 'output' ? 1 : 2, bytes, written)
  } catch {
    // A pipe that is full for now, or that nobody reads any more: the stream knows how to wait and how to end.
    const stream = to === 'output' ? process.stdout : process.stderr
    handedOver = true
    if (stream.listenerCount('error') === 0) stream.on('error', () => undefined)
    stream.write(bytes.subarray(written))
  }
}
