/** The results contract: one JSON object, stable between releases. Its schema stands beside this file. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Language } from '../base/language.ts'
import { plain } from '../base/plain.ts'
import { positionOf, type Source } from '../base/span.ts'
import { unitText } from '../base/unit.ts'
import { printed, spansOf, type Value } from '../base/value.ts'
import { substituted } from '../explain/equation.ts'
import type { Check } from '../explain/sheet.ts'
import { everyValue } from '../explain/trace.ts'

export interface Results {
  readonly version: string
  readonly source: Source
  readonly sha256: string
  readonly language: Language
  /** The values that were printed; what they rest on is found from them. */
  readonly roots: Iterable<Value>
  readonly checks: readonly Check[]
  readonly diagnostics: readonly Diagnostic[]
}

export function renderJson(results: Results): string {
  const { version, source, sha256, language, checks, diagnostics } = results
  const values = everyValue(results.roots)
  const object = {
    platemark: version,
    source: { path: source.path, sha256 },
    values: Object.fromEntries(values.map(value => [value.id, quantity(value, language)])),
    steps: values.flatMap(value => step(value, source, language)),
    checks: checks.map(({ id, what, demand, capacity, numbers, ratio, ok, reference, sourceLines }) => ({
      id,
      what,
      demand: { value: finite(numbers.demand), unit: numbers.unit, printed: demand },
      capacity: { value: finite(numbers.capacity), unit: numbers.unit, printed: capacity },
      ratio: finite(ratio),
      ok,
      reference,
      line: sourceLines[0] ?? null,
    })),
    diagnostics: diagnostics.map(({ rule, severity, message, help, at }) => ({
      rule,
      severity,
      ...positionOf(source, at.span.start),
      message,
      help,
    })),
  }
  return `${JSON.stringify(object, null, 1)}\n`
}

const finite = (number: number): number | null => (Number.isFinite(number) ? number : null)

const quantity = (value: Value, language: Language) => ({
  value: finite(value.si / value.unit.scale),
  unit: unitText(value.unit),
  printed: printed(value, language),
})

function step(value: Value, source: Source, language: Language) {
  const { origin } = value
  if (origin.kind !== 'worked') return []
  const { formula, inputs } = origin.step
  const [first] = spansOf(value)
  return [
    {
      id: value.id,
      symbol: value.tex,
      formula: plain(formula.body, name => name),
      substituted: substituted(origin.step, value),
      inputs: Object.fromEntries([...inputs].map(([name, { id }]) => [name, id])),
      result: quantity(value, language),
      reference: formula.source,
      line: first ? positionOf(source, first.start).line : null,
    },
  ]
}
