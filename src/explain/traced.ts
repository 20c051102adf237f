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
import type { Context } from './context.ts'
import { type Run, runsOf } from './letter.ts'
import { everyValue } from './trace.ts'

export interface TracedFormula {
  /** The right side in letters. */
  readonly letters: Tex
  /** The same as text. */
  readonly text: string
  readonly reference: string
  readonly assumes: readonly string[]
  /** The formula's own letters for its inputs, in order. Absent where they are the letters of the inputs themselves. */
  readonly symbols?: readonly (readonly Run[])[]
}

export interface TracedValue {
  readonly value: Value
  readonly letter: readonly Run[]
  readonly printed: string
  readonly kind: Origin['kind']
  /** What is said of a value that no formula gives: how it was measured, or what was assumed. */
  readonly words: string
  /** Index of its formula. */
  readonly formula?: number
  /** Indices of the values put in, in the order of the formula's symbols. */
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

/** Everything printed, and all that it rests on. */
export function traced(context: Context): Traced {
  const all = everyValue([...context.besides.values(), ...context.roots.values()])
  const indexOf = new Map(all.map(({ id }, i) => [id, i]))
  const formulas = new Map<string, { readonly index: number; readonly formula: TracedFormula }>()
  const lines = new Map<number, string>()
  const keep = (value: Value, formula: Formula): number => {
    const made = tracedFormula(value, formula, context)
    const key = JSON.stringify([texSource(made.letters), made.reference, made.assumes, made.symbols])
    const held = formulas.get(key) ?? { index: formulas.size, formula: made }
    formulas.set(key, held)
    return held.index
  }
  const values = all.map((value): TracedValue => {
    const { origin } = value
    const own = context.lines(ownSpans(origin))
    for (const line of own) lines.set(line, excerpt(context.source, line))
    const base = {
      value,
      letter: runsOf(value.tex),
      printed: printed(value, context.language),
      kind: origin.kind,
      words: context.words(wordsOf(origin)),
      lines: own,
    }
    if (origin.kind !== 'worked') return { ...base, inputs: [] }
    const { formula, inputs } = origin.step
    const used = [...formula.symbols.keys()].flatMap(name => inputs.get(name) ?? [])
    return { ...base, formula: keep(value, formula), inputs: used.flatMap(({ id }) => indexOf.get(id) ?? []) }
  })
  return {
    values,
    formulas: [...formulas.values()].map(({ formula }) => formula),
    lines: new Map([...lines].sort(([a], [b]) => a - b)),
  }
}

function tracedFormula({ origin }: Value, formula: Formula, context: Context): TracedFormula {
  const { body, symbols, inShort, source, assumes } = formula
  const inputs = origin.kind === 'worked' ? origin.step.inputs : new Map<string, Value>()
  const own = [...symbols].every(([name, { tex }]) => inputs.get(name)?.tex === tex)
  const letters =
    inShort === undefined
      ? typeset(body, name => letter(symbols.get(name)?.tex ?? name), context.language)
      : tex(inShort)
  return {
    letters,
    text: inShort === undefined ? plain(body, name => name) : source,
    reference: context.words(source),
    assumes: assumes.map(text => context.words(text)),
    ...(own ? {} : { symbols: [...symbols.values()].map(({ tex }) => runsOf(tex)) }),
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

/** A line longer than this is cut around nothing: its beginning tells what it is. */
const LONGEST = 400

function excerpt(source: Source, line: number): string {
  const text = lineText(source, line).trim()
  return text.length > LONGEST ? `${text.slice(0, LONGEST)}…` : text
}

/** A value that stands within a stretch of the source, and where. */
export interface Placed extends Span {
  readonly id: string
}

/**
 * Finds the values that the engineer wrote within a stretch of the source, in order and none within another.
 */
export function givenWithin({ values }: Traced): (at: Span) => readonly Placed[] {
  const placed = values
    .flatMap(({ value, kind }): readonly Placed[] =>
      kind === 'given' || kind === 'worked' ? ownSpans(value.origin).map(span => ({ ...span, id: value.id })) : [],
    )
    .sort((a, b) => a.start - b.start || b.end - a.end || (a.id < b.id ? -1 : 1))
  return ({ start, end }) => {
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
