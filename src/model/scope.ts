/** What the reading of a cell may ask of the rest of the document. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import type { Ledger, Result } from '../base/ledger.ts'
import type { Span } from '../base/span.ts'
import type { Value, Word } from '../base/value.ts'

/** Something taken because the document does not say it. */
export interface Assumption {
  readonly text: string
  /** What it is taken from: a clause, common practice, a convention of ours. */
  readonly because: string
}

export interface Scope {
  readonly ledger: Ledger
  readonly display: Display
  /** A value by its id, worked now if it was not; undefined when there is no such id. */
  readonly lookup: (id: string) => Result<Value | Word> | undefined
  /** Every id that could be asked for, to offer near names. */
  readonly ids: () => readonly string[]
  readonly warn: (fault: Diagnostic) => void
  readonly assume: (assumption: Assumption) => void
  /** Tells of a value that a cell works from others, so that the page can show the step. */
  readonly stated: (value: Value, at: Span) => void
  /** Tells of the value of a cell, so that the page can say where it comes from. */
  readonly read: (value: Value) => void
}

export const isWord = (found: Value | Word): found is Word => 'text' in found
