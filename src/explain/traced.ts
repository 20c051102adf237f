/**
 * The trace as plain data: for every value what it is, the formula and the values it was worked from,
 * and the lines of the source where it was written. The page's panel and `platemark trace` tell it.
 */
import type { Formula } from '../base/formula.ts'
import { plain } from '../base/plain.ts'
import { lineText, type Source, type Span } from '../base/span.ts'
import { type Tex, tex, texSource } from '../base/tex.ts'
import { letter, typeset } from '../base/typeset.ts'
import { type Origin, printed, type Value } from '../base/value.ts'
import type { Account } from './context.ts'
import { nearestValues } from './trace.ts'

export interface TracedFormula {
  /** The right side in letters. */
  readonly letters: Tex
  /** The same as text. */
  readonly text: string
  readonly reference: string
  readonly assumes: readonly string[]
  /** The formula's own letters for its inputs in TeX, in order. Absent where they are the letters of the inputs themselves. */
  readonly symbols?: readonly string[]
}

export interface TracedValue {
  readonly value: Value
  readonly printed: string
  readonly kind: Origin['kind']
  /** What is said of a value that no formula gives: how it was measured, or what was assumed. */
  readonly words: string
  /** Index of its formula. */
  readonly formula?: number
  /** Indices of the values put in, in the order of the formula's symbols; -1 for one that is left out. */
  readonly inputs: readonly number[]
  /** Lines of the source where the engineer wrote it, from 1, ascending. */
  readonly lines: readonly number[]
}

export interface Traced {
  /** Sorted by id. */
  readonly values: readonly TracedValue[]
  readonly formulas: readonly TracedFormula[]
  /** The text of each line that a value was written in. */
  readonly lines: ReadonlyMap<number, string>
}

/** The trace of a page of this many values is as large as the page; what lies deeper is left to the command. */
export const MOST_VALUES = 20_000

/** What is printed and all that it rests on, or no more than `most` of it, nearest to what is printed. */
export function traced(context: Account, most: number = MOST_VALUES): Traced {
  const all = nearestValues([...context.besides.values(), ...context.roots.values(), ...context.cells], most)
  const indexOf = new Map(all.map(({ id }, i) => [id, i]))
  const formulas = new Formulas(context)
  const lines = new Map<number, string>()
  const values = all.map((value): TracedValue => {
    const { origin } = value
    const spans = ownSpans(origin)
    const own = spans.length === 0 ? [] : context.lines(spans)
    for (const line of own) if (!lines.has(line)) lines.set(line, sourceLine(context.source, line))
    const base = {
      value,
      printed: printed(value, context.language),
      kind: origin.kind,
      words: origin.kind === 'measured' || origin.kind === 'default' ? context.words(wordsOf(origin)) : '',
      lines: own,
    }
    if (origin.kind !== 'worked') return { ...base, inputs: [] }
    const { formula, inputs } = origin.step
    const used = [...formula.symbols.keys()].flatMap(name => inputs.get(name) ?? [])
    return {
      ...base,
      formula: formulas.indexOf(formula, inputs),
      inputs: used.map(({ id }) => indexOf.get(id) ?? -1),
    }
  })
  return {
    values,
    formulas: formulas.all(),
    lines: new Map([...lines].sort(([a], [b]) => a - b)),
  }
}

/** The formulas of a document, each told once however many values it gives. */
class Formulas {
  /** By the formula itself; told with the letters of the inputs, and with its own. */
  private readonly known = new Map<Formula, { ofInputs?: number; own?: number }>()
  private readonly told = new Map<string, number>()
  private readonly list: TracedFormula[] = []
  private readonly context: Account

  constructor(context: Account) {
    this.context = context
  }

  all(): readonly TracedFormula[] {
    return this.list
  }

  indexOf(formula: Formula, inputs: ReadonlyMap<string, Value>): number {
    const known = this.known.get(formula) ?? {}
    this.known.set(formula, known)
    const alike = [...formula.symbols.values()].every(({ name, tex }) => inputs.get(name)?.tex === tex)
    if (alike) {
      known.ofInputs ??= this.tell(tracedFormula(formula, this.context))
      return known.ofInputs
    }
    const symbols = () => [...formula.symbols.values()].map(({ tex }) => tex)
    known.own ??= this.tell({ ...tracedFormula(formula, this.context), symbols: symbols() })
    return known.own
  }

  private tell(formula: TracedFormula): number {
    const key = JSON.stringify({ ...formula, letters: texSource(formula.letters) })
    const index = this.told.get(key) ?? this.list.length
    if (index === this.list.length) this.list.push(formula)
    this.told.set(key, index)
    return index
  }
}

function tracedFormula(formula: Formula, context: Account): TracedFormula {
  const { body, symbols, inShort, source, assumes } = formula
  const letters =
    inShort === undefined
      ? typeset(body, name => letter(symbols.get(name)?.tex ?? name), context.language)
      : tex(inShort)
  return {
    letters,
    text: inShort === undefined ? plain(body, name => name) : source,
    reference: context.words(source),
    assumes: assumes.map(text => context.words(text)),
  }
}

function wordsOf(origin: Origin): string {
  switch (origin.kind) {
    case 'given':
    case 'worked':
      return ''
    case 'measured':
      return origin.what
    case 'default':
      return origin.assumption
  }
}

/** Where the engineer wrote the value itself, not what it rests on. */
export function ownSpans(origin: Origin): readonly Span[] {
  switch (origin.kind) {
    case 'given':
      return [origin.span]
    case 'worked':
      return origin.span ? [origin.span] : []
    case 'measured':
      return origin.spans
    case 'default':
      return []
  }
}

/** Of a longer line the beginning tells what it is. */
const LONGEST = 400

/** A line of the source, in one space between its words. */
export function sourceLine(source: Source, line: number): string {
  // Columns of a table are padded for the eye that reads them below each other.
  const text = lineText(source, line).trim().replace(/\s+/g, ' ')
  return text.length > LONGEST ? `${text.slice(0, LONGEST)}…` : text
}

/** A value that stands within a stretch of the source, and where. */
export interface Placed extends Span {
  readonly id: string
}

/**
 * Finds the values that the engineer wrote within a stretch of the source, in order and none within another.
 * @param cells values of the cells that were read
 */
export function givenWithin(cells: Iterable<Value>): (at: Span) => readonly Placed[] {
  let placed: readonly Placed[] | undefined
  return ({ start, end }) => {
    placed ??= [...cells]
      .flatMap(({ id, origin }) => ownSpans(origin).map(span => ({ ...span, id })))
      .sort((a, b) => a.start - b.start || b.end - a.end || (a.id < b.id ? -1 : 1))
    const found: Placed[] = []
    for (let i = firstFrom(placed, start); i < placed.length; i++) {
      const each = placed[i]
      if (each === undefined || each.start >= end) break
      if (each.end <= end && each.end > each.start && each.start >= (found.at(-1)?.end ?? start)) found.push(each)
    }
    return found
  }
}

/** Index of the first place that starts at or after an offset. */
function firstFrom(placed: readonly Placed[], start: number): number {
  let low = 0
  let high = placed.length
  while (low < high) {
    const middle = (low + high) >> 1
    if ((placed[middle]?.start ?? 0) < start) low = middle + 1
    else high = middle
  }
  return low
}
