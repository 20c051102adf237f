/** What the server tells a live page, and what the page keeps of it. Plain data, the same at both ends. */

/** A step on the way from the blocks that a page has to those that it shall have, in order. */
export type Change =
  | readonly ['keep', count: number]
  | readonly ['drop', count: number]
  | readonly ['add', html: string]
  /** The next block turns into this one. */
  | readonly ['turn', html: string]

/** A number of the document as it prints. */
export interface Figure {
  readonly id: string
  /** In TeX. */
  readonly letter: string
  readonly printed: string
  /** In base SI; tells how large a change is. */
  readonly si: number
  readonly given: boolean
}

export interface Verdict {
  readonly id: string
  readonly what: string
  readonly ratio: string
  readonly ok: boolean
}

/** A number that is not what it was. */
export interface Move {
  readonly id: string
  readonly letter: string
  readonly given: boolean
  /** As it printed, and as it prints; one of them is missing where it appeared or went. */
  readonly was?: string
  readonly now?: string
  /** As it is now, in base SI. */
  readonly si?: number
  /** True for what rounding leaves, whose changes tell nothing. */
  readonly slight?: true
  /** Share of its size before, signed; missing where it was nothing, appeared or went. */
  readonly change?: number
}

/** A check whose verdict is not what it was, or that appeared or went. */
export interface Turn {
  readonly id: string
  readonly what: string
  readonly was?: Pick<Verdict, 'ok' | 'ratio'>
  readonly now?: Pick<Verdict, 'ok' | 'ratio'>
}

export interface Moves {
  /** Results first, then what the engineer wrote; the largest change first. */
  readonly numbers: readonly Move[]
  /** Those that fail now first. */
  readonly checks: readonly Turn[]
  /** Ids of numbers and checks that were gone and are as they were before. */
  readonly back: readonly string[]
}

/** All numbers of one state, as they are sent to be compared with later ones. */
export interface Table {
  readonly version: number
  readonly numbers: readonly Figure[]
  readonly checks: readonly Verdict[]
}

export interface Message {
  readonly severity: 'error' | 'warning'
  readonly rule: string
  readonly message: string
  readonly line: number
  readonly column: number
}

/** How a document stands. */
export interface Report {
  /** `waiting`: there is no text to work; `broken`: a fault of our own. */
  readonly state: 'sound' | 'faulty' | 'waiting' | 'broken'
  readonly errors: number
  readonly checks: number
  readonly failed: number
  readonly messages: readonly Message[]
}

export interface Update {
  readonly version: number
  /** Left out where they are as they were. */
  readonly title?: string
  readonly style?: string
  /** The rules for paper, which name the state of the source and so change with every save. */
  readonly paper?: string
  readonly around?: string
  /** From the blocks that the page has; a page that is told everything gets `whole` in place of it. */
  readonly changes?: readonly Change[]
  readonly whole?: readonly string[]
  readonly report: Report
  /** Left out where the page is told everything: it may have slept for any time. */
  readonly moves?: Moves
  /** The block that the edit was made in. */
  readonly edited?: number
}

/** Said first on every connection. */
export interface Hello {
  /** Tells one run of the server from another. */
  readonly run: string
  /** Lets a page of ours, and no other, ask for the editor. */
  readonly token: string
  readonly version: number
  /** How the document stands; a page that was just loaded has it from here. */
  readonly report?: Report
}

/** What is asked when a source line is to be opened. */
export interface Place {
  readonly id?: string
  readonly line?: number
  readonly block?: number
  /** Which part of a block of prose, from 0. */
  readonly part?: number
}

export interface Opened {
  readonly path: string
  readonly line: number
  readonly column: number
  /** An address for the browser to go to; without one the server has started a program, or there is no editor. */
  readonly address?: string
  readonly started: boolean
  /** Why it has not been started. */
  readonly because?: string
}
