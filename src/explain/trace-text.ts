/** Where a number came from, as text: each step under the one that uses it, each value told once. */
import { plain } from '../base/plain.ts'
import { printed, type Value } from '../base/value.ts'
import type { Account } from './context.ts'
import { substituted } from './equation.ts'
import { letterPlain } from './letter.ts'
import { ownSpans, sourceLine } from './traced.ts'

export function traceText(value: Value, context: Account): string {
  const told = new Set<string>()
  const lines: string[] = []
  const waiting: { readonly value: Value; readonly depth: number }[] = [{ value, depth: 0 }]
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { value, depth } = next
    const [head, ...rest] = entryOf(value, told.has(value.id), context)
    const margin = '  '.repeat(depth)
    lines.push(`${margin}${head}`, ...rest.map(line => `${margin}    ${line}`))
    if (told.has(value.id) || value.origin.kind !== 'worked') continue
    told.add(value.id)
    const inputs = [...value.origin.step.inputs.values()].reverse()
    for (const input of inputs) waiting.push({ value: input, depth: depth + 1 })
  }
  return lines.join('\n')
}

function entryOf(value: Value, again: boolean, context: Account): readonly string[] {
  const { id, tex, origin } = value
  const head = `${id}: ${letterPlain(tex)} = ${printed(value, context.language)}`
  const written = context.lines(ownSpans(origin)).map(line => `line ${line}: ${sourceLine(context.source, line)}`)
  switch (origin.kind) {
    case 'given':
      return [head, ...written]
    case 'measured':
      return [head, context.words(origin.what), ...written]
    case 'default':
      return [head, context.words(`assumed: ${origin.assumption}`)]
    case 'worked': {
      if (again) return [`${head} (told above)`]
      const { body, inShort, source } = origin.step.formula
      const how =
        inShort === undefined ? [`= ${plain(body, name => name)}`, `= ${substituted(origin.step, value)}`] : []
      return [head, ...how, context.words(source), ...written]
    }
  }
}
