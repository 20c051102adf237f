/** Files as they are read for a build, and which ones those are. */
import { dirname, resolve } from 'node:path'
import type { Outcome } from '../base/outcome.ts'
import { nearbyOf, readText, type TextFault } from '../files.ts'
import type { Nearby } from '../read/nearby.ts'

/** The files that a document names, each told to `named` when it is asked for, whether or not it is there. */
export function nearbyNaming(path: string, named: (file: string) => void): Nearby {
  const nearby = nearbyOf(path)
  return {
    read: name => {
      named(resolve(dirname(path), name))
      return nearby.read(name)
    },
  }
}

/** What an editor may take between emptying a file and filling it. */
const EMPTY_FOR = 250

/**
 * Reads a document as it stands. One that is empty, or is not there, may be so only while it is being saved: it is
 * looked at again until that has gone on for too long.
 *
 * @param since when the document was first seen so, in milliseconds; undefined when it was not
 * @returns undefined to be asked again
 */
export function readSettled(path: string, since: number | undefined): Outcome<string, TextFault> | undefined {
  const read = readText(path)
  const passing = read.ok ? read.value === '' : read.because.rule === 'file-unreadable'
  return passing && (since === undefined || performance.now() - since < EMPTY_FOR) ? undefined : read
}
