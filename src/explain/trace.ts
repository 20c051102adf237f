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
  return byId(found)
}

/** The same, but no more than `most` of them: those nearest to what is printed. */
export function nearestValues(roots: Iterable<Value>, most: number): readonly Value[] {
  const found = new Map<string, Value>()
  let ring = [...roots]
  while (ring.length > 0 && found.size < most) {
    const next: Value[] = []
    for (const value of ring) {
      if (found.has(value.id) || found.size >= most) continue
      found.set(value.id, value)
      if (value.origin.kind === 'worked') for (const input of value.origin.step.inputs.values()) next.push(input)
    }
    ring = next
  }
  return byId(found)
}

const byId = (found: ReadonlyMap<string, Value>): readonly Value[] =>
  [...found.values()].sort((a, b) => (a.id < b.id ? -1 : a.id > b.id ? 1 : 0))
