/** A value in a few lines of plain text, for a reader who points at it. */

import type { Result } from '../base/ledger.ts'
import { plain } from '../base/plain.ts'
import { linesInWords } from '../base/span.ts'
import { printed, type Value, type Word } from '../base/value.ts'
import type { Compiled } from '../compile.ts'
import { substituted } from '../explain/equation.ts'
import { letterPlain } from '../explain/letter.ts'
import { ownSpans } from '../explain/traced.ts'
import { isWord } from '../model/scope.ts'

/** The number as it prints, or the word; the first fault where there is neither. */
export function inShort(found: Result<Value | Word>, { context }: Compiled): string {
  if (!found.ok) return `not worked: ${found.because[0]?.message ?? 'what it rests on has a fault'}`
  return isWord(found.value) ? found.value.text : printed(found.value, context.language)
}

/** The number with its letter, its formula, values put in, clause and lines. */
export function inFull(id: string, found: Result<Value | Word>, compiled: Compiled): readonly string[] {
  if (!found.ok || isWord(found.value)) {
    const because = found.ok && isWord(found.value) ? [found.value.because] : []
    return [`${id}: ${inShort(found, compiled)}`, ...because.map(text => compiled.context.words(text))]
  }
  const { context } = compiled
  const { origin, tex } = found.value
  const head = `${found.value.id}: ${letterPlain(tex)} = ${printed(found.value, context.language)}`
  const lines = context.lines(ownSpans(origin))
  const written = lines.length === 0 ? [] : [linesInWords(lines)]
  switch (origin.kind) {
    case 'given':
      return [head, 'given', ...written]
    case 'measured':
      return [head, context.words(origin.what), ...written]
    case 'default':
      return [head, context.words(`assumed: ${origin.assumption}`)]
    case 'worked': {
      const { body, inShort, source } = origin.step.formula
      // A sum over many is told in words, as the page tells it.
      const how =
        inShort === undefined
          ? [`= ${plain(body, name => name)}`, `= ${substituted(origin.step, found.value)}`].map(shortened)
          : []
      return [head, ...how, context.words(source), ...written]
    }
  }
}

const LONGEST = 400

const shortened = (text: string): string => (text.length > LONGEST ? `${text.slice(0, LONGEST)}…` : text)
