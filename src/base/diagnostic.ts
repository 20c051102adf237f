import type { Span } from './span.ts'

/** An `error` leaves its block without a result; a `warning` has one, marked or in part. */
export type Severity = 'error' | 'warning'

/** A place with a few words about it, printed under the marks. */
export interface Label {
  readonly span: Span
  readonly text: string
}

/** What is wrong, where, why, and what would be right, in the engineer's words. */
export interface Diagnostic {
  /** Stable name of the kind of fault, such as `wall-outside-level`. */
  readonly rule: string
  readonly severity: Severity
  /** One line, without a full stop: what is wrong, with both values. */
  readonly message: string
  /** The cause. */
  readonly at: Label
  /** Other places involved. */
  readonly also: readonly Label[]
  /** Why it matters and what to do: whole sentences. */
  readonly help: string
}
