/** The editor that a source line is opened in: an address for the browser, or a program. */
import { bad, good, type Outcome } from '../base/outcome.ts'

export type Editor =
  /** Such as `myeditor://open?file={path}&line={line}`. */
  | { readonly kind: 'address'; readonly template: string }
  /** Such as `myeditor --line {line} {path}`: a program and its arguments. */
  | { readonly kind: 'program'; readonly words: readonly string[] }

export interface Spot {
  readonly path: string
  readonly line: number
  readonly column: number
}

const SCHEME = /^[a-z][a-z0-9+.-]*:\/\//i

/** Schemes that would run something in the page, or lead somewhere that is no editor. */
const strange = /^(?:https?|ftp|file|data|blob|javascript|vbscript|about|view-source):/i

/** Reads a template. Words of a command are parted at spaces; quotes hold a word together. No shell ever reads it. */
export function readEditor(template: string): Outcome<Editor> {
  const text = template.trim()
  if (!text.includes('{path}')) return bad(`${template}: an editor is told the file by {path}, which is not in it`)
  if (strange.test(text)) return bad(`${template}: this address does not lead to an editor`)
  if (SCHEME.test(text)) return good({ kind: 'address', template: text })
  const words = [...text.matchAll(/"([^"]*)"|'([^']*)'|[^\s"']+/g)].map(([whole, a, b]) => a ?? b ?? whole)
  const [program = ''] = words
  if (program === '' || program.includes('{')) return bad(`${template}: an editor begins with the name of a program`)
  return good({ kind: 'program', words })
}

export const addressOf = (template: string, { path, line, column }: Spot): string =>
  filled(template, { path: encodeURI(path.replaceAll('\\', '/')).replace(/[?#]/g, encodeURIComponent), line, column })

/** Each word is filled by itself, so that a name with spaces, quotes or dashes stays within its argument. */
export const argumentsOf = (words: readonly string[], spot: Spot): readonly string[] =>
  words.map(word => filled(word, spot))

const filled = (text: string, { path, line, column }: Spot): string =>
  text.replace(/\{(path|line|column)\}/g, (_, name: string) =>
    name === 'path' ? path : String(name === 'line' ? line : column),
  )
