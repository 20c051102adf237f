/**
 * A value and where it came from. Every number of a document is one: typed by the engineer, worked
 * by a step from other values, or taken by default. The chain of `inputs` is the whole trace.
 */
import type { Formula } from './formula.ts'

import type { Language } from './language.ts'
import { asTyped, type Numeral, numeralOnPage, rounded } from './numeral.ts'
import { valuePlain } from './plain.ts'
import type { Span } from './span.ts'
import { type Unit, unitOnPage, unitText } from './unit.ts'

/** A formula put to use: which value stood for each symbol. */
export interface Step {
  readonly formula: Formula
  readonly inputs: ReadonlyMap<string, Value>
}

export type Origin =
  | { readonly kind: 'given'; readonly span: Span }
  /** `span` is set where the engineer wrote the formula. */
  | { readonly kind: 'worked'; readonly step: Step; readonly span?: Span }
  /** Measured from the plan as drawn: a corner of a part that is cut, the length of an outline. */
  | { readonly kind: 'measured'; readonly what: string; readonly spans: readonly Span[] }
  /** Taken because the document does not say; `assumption` is printed in the list of assumptions. */
  | { readonly kind: 'default'; readonly assumption: string }

export interface Value {
  /** Dotted name, such as `roof.CM.x`. */
  readonly id: string
  /** Its letter in TeX, with the subscripts that tell it from others. */
  readonly tex: string
  /** In base SI: N, m, s, rad. */
  readonly si: number
  /** The unit it prints in. */
  readonly unit: Unit
  /** Smaller than this, in base SI, it is rounding and prints as 0. */
  readonly rounding: number
  readonly origin: Origin
}

/** A word that the calculation settles, such as the wall that governs. */
export interface Word {
  readonly id: string
  readonly text: string
  /** Why it is this one. */
  readonly because: string
  /** The value that it tells of. */
  readonly about: string
}

/** The number in the unit that it prints in. */
export const shown = ({ si, unit, rounding }: Value): number => (Math.abs(si) < rounding ? 0 : si / unit.scale)

/** The number as it prints: a typed one with all its digits, a worked one rounded. */
export function printedNumeral(value: Value, extra = 0): Numeral {
  return typed(value.origin) ? asTyped(shown(value), extra) : rounded(shown(value), extra)
}

const typed = ({ kind }: Origin): boolean => kind === 'given' || kind === 'default'

/** Such as `13,625 kip/in`. */
export function printed(value: Value, language: Language): string {
  return onPage(printedNumeral(value), value.unit, language)
}

/** A number with its unit as the page prints it. */
export function onPage(numeral: Numeral, unit: Unit, language: Language): string {
  const text = unitOnPage(unitText(unit))
  const number = numeralOnPage(numeral, language)
  if (text === '') return number
  if (text === '%') return `${number}%`
  return text === 'deg' ? `${number}°` : `${number} ${text}`
}

/** In plain text that reads back. */
export const printedPlain = (value: Value, extra = 0): string => valuePlain(printedNumeral(value, extra), value.unit)

/** All lines of the source that a value rests on directly: those of its own and of the inputs of its step. */
export function spansOf(value: Value): readonly Span[] {
  const { origin } = value
  switch (origin.kind) {
    case 'given':
      return [origin.span]
    case 'default':
      return []
    case 'measured':
      return origin.spans
    case 'worked': {
      const own = origin.span ? [origin.span] : []
      return [
        ...own,
        ...[...origin.step.inputs.values()].flatMap(({ origin }) => (origin.kind === 'given' ? [origin.span] : [])),
      ]
    }
  }
}

/** True when two values come from one expression and every number in it is the same: their equations print alike. */
export function printsAlike(a: Value, b: Value): boolean {
  if (!isAlike(a, b) || a.origin.kind !== 'worked' || b.origin.kind !== 'worked') return false
  if (a.origin.span?.start !== b.origin.span?.start) return false
  const [one, other] = [a.origin.step, b.origin.step]
  if (one.formula.body !== other.formula.body || one.inputs.size !== other.inputs.size) return false
  for (const [name, input] of one.inputs) {
    const counterpart = other.inputs.get(name)
    if (!counterpart || !isAlike(input, counterpart)) return false
  }
  return true
}

/** The same number under the same letter and id, and written at the same place where the engineer typed it. */
function isAlike(a: Value, b: Value): boolean {
  if (a === b) return true
  return (
    a.id === b.id &&
    a.tex === b.tex &&
    a.si === b.si &&
    a.unit === b.unit &&
    a.rounding === b.rounding &&
    typedAt(a) === typedAt(b)
  )
}

/** Where a value was typed, or how else it came about. */
const typedAt = ({ origin }: Value): number | string => (origin.kind === 'given' ? origin.span.start : origin.kind)
