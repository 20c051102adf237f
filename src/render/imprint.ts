/** The words that every form of the document carries. */
import type { Sheet } from '../explain/sheet.ts'
import { count } from './body.ts'

export const CAUTION = 'To be reviewed by the engineer of record; local codes govern.'

export const markOf = ({ version, sourceMark }: Sheet): string => `Platemark ${version} · source ${sourceMark}`

export const draftWords = ({ faults }: Sheet): string =>
  `${count(faults.length, 'fault')} in this document. Not for issue.`
