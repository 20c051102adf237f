/** `platemark tidy`: brings files into canonical form, or names those that are not. */
import { print, readPiped, readText, rewrite, unreadable } from './files.ts'
import { tidy } from './tidy/tidy.ts'

/** The name that stands for the text piped in. */
export const PIPED = '-'

export interface TidyRequest {
  readonly path: string
  /** The path as messages show it. */
  readonly shown: string
  /** True when nothing is to be written. */
  readonly check: boolean
}

/** @returns true unless the text could not be read or written or, where nothing is written, is not tidy */
export function tidyDocument({ path, shown, check }: TidyRequest): boolean {
  const isPiped = path === PIPED
  const read = isPiped ? readPiped() : readText(path)
  if (!read.ok) {
    print('errors', unreadable(isPiped ? 'text piped in' : shown, read.because))
    return false
  }
  const text = tidy(read.value)
  const isTidy = text === read.value
  if (isPiped && !check) print('output', text)
  else if (!isTidy) {
    const written = check ? undefined : rewrite(path, text)
    if (written?.ok === false) {
      print('errors', `${written.because}\n`)
      return false
    }
    print('output', `${shown}\n`)
  }
  return isTidy || !check
}
