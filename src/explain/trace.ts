/** The values that a document rests on. */
import type { Value } from '../base/value.ts'

/** Printed values and all that they rest on, each once, sorted by id. */
export function everyValue(roots: Iterable<Value>): readonly Value[] {
  const found = new Map<string, Value>()
  const waiting = [...roots]
  for (let value = waiting.pop(); value; value = waiting.pop()) {
    if (found.has(value.id)) continue
    found.set(value.id, value)
    if (value.origin.kind === 'worked') waiting.push(...value.origin.step.inputs.values())
  }
  return [...found.values()].sort((a, b) => (a.id < b.id ? -1 : a.id > b.id ? 1 : 0))
}
