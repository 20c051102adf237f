/**
 * The explained document: what every output format prints, in reading order.
 * No format computes anything; each only sets these pieces in its own way.
 */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Language } from '../base/language.ts'
import type { Span } from '../base/span.ts'
import type { Tex } from '../base/tex.ts'
import type { Paper, TitleBlock } from '../model/front.ts'
import type { Revision } from '../model/revisions.ts'
import type { ContentsEntry } from './number.ts'

export type { ContentsEntry, Revision, TitleBlock }

/** One worked formula: its letters, its values, its result, and where each came from. */
export interface Equation {
  readonly kind: 'equation'
  /** The value id of the result, which is also its anchor on the page. */
  readonly id: string
  /** The number printed beside it, such as `4.1`. Empty until the document is numbered. */
  readonly number: string
  readonly symbol: Tex
  /** Right-hand sides in order: the formula in letters, then with values put in. Either may be missing. */
  readonly lines: readonly Tex[]
  /** The result with its unit, set apart from the lines above it. */
  readonly result: Tex
  /** Clause, publication or derivation. */
  readonly reference: string
  /** What the formula takes for granted. */
  readonly assumes: readonly string[]
  /** Source lines of the inputs, ascending. */
  readonly sourceLines: readonly number[]
}

export interface Column {
  /** The column's symbol or plain words. */
  readonly head: Tex | string
  /** Printed under the head, in the plain spelling of units (`kip/in`, `ft^2`); empty when there is none. */
  readonly unit: string
  readonly align: 'left' | 'right'
}

export interface Row {
  /** Printed text, one cell a column; numbers are already grouped and rounded. */
  readonly cells: readonly string[]
  /** The id of the value that each cell prints; empty where it prints none. */
  readonly ids?: readonly string[]
  /** The place in the source that each cell repeats, where the row is one that the engineer wrote. */
  readonly places?: readonly Span[]
  /** Marks the row that governs. */
  readonly governs: boolean
}

/** How a column of a table comes from the others. */
export interface ColumnFormula {
  readonly symbol: Tex
  readonly formula: Tex
  readonly reference: string
}

export interface Table {
  readonly kind: 'table'
  readonly id: string
  readonly number: string
  readonly caption: string
  readonly columns: readonly Column[]
  readonly rows: readonly Row[]
  /** The row of sums, where the table has one. */
  readonly foot?: Row
  readonly formulas: readonly ColumnFormula[]
  readonly sourceLines: readonly number[]
}

export interface Figure {
  readonly kind: 'figure'
  readonly id: string
  readonly number: string
  readonly caption: string
  /** A whole `<svg>` element, with its own style, title and description. */
  readonly svg: string
  /** One sentence that stands for the picture. */
  readonly alternative: string
}

/** A demand against its limit. */
export interface Check {
  readonly kind: 'check'
  readonly id: string
  readonly what: string
  readonly demand: string
  readonly capacity: string
  /** Both as numbers, in one unit in its plain spelling. */
  readonly numbers: { readonly demand: number; readonly capacity: number; readonly unit: string }
  /** Demand over capacity. */
  readonly ratio: number
  readonly ratioPrinted: string
  /** Ids of the values that the three print. */
  readonly ids?: { readonly demand: string; readonly capacity: string; readonly ratio: string }
  readonly ok: boolean
  readonly reference: string
  readonly sourceLines: readonly number[]
}

/** A sentence or two of our own between pieces. */
export interface Note {
  readonly kind: 'note'
  readonly text: string
}

/** A heading inside a working that has several parts. */
export interface Heading {
  readonly kind: 'heading'
  /** Its anchor; empty until the document is numbered. */
  readonly id: string
  readonly text: string
}

/** A list such as the assumptions or the references of the document. */
export interface Register {
  readonly kind: 'register'
  readonly id: string
  /** Empty where the section above it bears it. */
  readonly title: string
  readonly items: readonly { readonly text: string; readonly detail: string }[]
}

/** Stands where a result would be. */
export interface Fault {
  readonly kind: 'fault'
  readonly diagnostics: readonly Diagnostic[]
}

export type Piece = Equation | Table | Figure | Check | Note | Heading | Register | Fault

/** A value quoted in prose by `{{id}}`. */
export interface Quote {
  readonly id: string
  readonly printed: string
}

/** A check and the place where it is worked, where the document shows it. */
export interface SummaryCheck {
  readonly check: Check
  readonly place: string | undefined
}

export interface Template {
  /** What stands in the page's body, with fields such as `{{body}}`. Ours when left out. */
  readonly html?: string
  /** Rules that follow ours. */
  readonly css?: string
}

/** What stands before the calculation. A list that the document places itself is empty here. */
export interface Preface {
  readonly contents: readonly ContentsEntry[]
  /** Worst first. */
  readonly checks: readonly SummaryCheck[]
  readonly criteria: Table | undefined
  readonly revisions: readonly Revision[]
}

export interface Sheet {
  readonly titleBlock: TitleBlock
  readonly preface: Preface
  /** True where a sheet of its own, with room for signature and seal, stands before everything. */
  readonly cover: boolean
  readonly paper: Paper
  /** The firm's own sheet and style; empty for ours. */
  readonly template: Template
  /** The firm's mark as a `data:` address. */
  readonly logo?: string | undefined
  readonly language: Language
  /** First eight hex digits of the source's SHA-256, grouped in fours. */
  readonly sourceMark: string
  readonly version: string
  /** The faults of the whole document; a draft prints their count in a banner. */
  readonly faults: readonly Diagnostic[]
  readonly draft: boolean
}
