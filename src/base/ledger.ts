/**
 * Work done on demand, each once. What depends on itself is found here and said
 * with its whole path.
 */
import type { Diagnostic } from './diagnostic.ts'
import type { Outcome } from './outcome.ts'
import { bad } from './outcome.ts'
import type { Span } from './span.ts'

/** A result, or the faults that stand at its root. */
export type Result<T> = Outcome<T, readonly Diagnostic[]>

interface Task {
  readonly name: string
  readonly at: Span
}

export class Ledger {
  private readonly underWay: Task[] = []

  /**
   * A function that does its work when first asked and keeps the result.
   * @param name what is worked, as a ring would name it
   * @param at the place of its definition
   */
  once<T>(name: string, at: Span, work: () => Result<T>): () => Result<T> {
    let result: Result<T> | undefined
    const task: Task = { name, at }
    return () => {
      if (result) return result
      const first = this.underWay.indexOf(task)
      if (first !== -1) return bad([ring(this.underWay.slice(first))])
      if (this.underWay.length >= DEEPEST) return bad([tooDeep(task)])
      this.underWay.push(task)
      result = work()
      this.underWay.pop()
      return result
    }
  }
}

/** A longer chain of definitions would exhaust the machine before it told the reader anything. */
const DEEPEST = 600

function tooDeep({ name, at }: Task): Diagnostic {
  return {
    rule: 'definitions-too-deep',
    severity: 'error',
    message: `${name} stands at the end of more than ${DEEPEST} definitions that each wait for the next`,
    at: { span: at, text: '' },
    also: [],
    help: 'Put definitions before their use, or state an intermediate value as a number.',
  }
}

function ring(tasks: readonly Task[]): Diagnostic {
  const [first] = tasks
  const last = tasks.at(-1)
  const path = [...tasks, ...(first ? [first] : [])].map(({ name }) => name)
  return {
    rule: 'ring-of-definitions',
    severity: 'error',
    message: `${first?.name ?? ''} rests on itself: ${path.join(' → ')}`,
    at: { span: last?.at ?? { start: 0, end: 0 }, text: `asks for ${first?.name ?? ''} again` },
    also: tasks.slice(0, -1).map(({ name, at }) => ({ span: at, text: `${name} is part of the ring` })),
    help: 'State one of these values as a number.',
  }
}

/** Several results as one, or all the faults of those that failed. */
export function together<T extends Readonly<Record<string, Result<unknown>>>>(
  parts: T,
): Result<{ readonly [K in keyof T]: T[K] extends Result<infer V> ? V : never }> {
  const faults = new Set<Diagnostic>()
  const values: Record<string, unknown> = {}
  for (const [name, part] of Object.entries(parts)) {
    if (part.ok) values[name] = part.value
    else for (const fault of part.because) faults.add(fault)
  }
  if (faults.size > 0) return bad([...faults])
  // Every part was good, so each name holds the value of its own part.
  return { ok: true, value: values as { readonly [K in keyof T]: T[K] extends Result<infer V> ? V : never } }
}

/** A list of results as one list, or all their faults. */
export function all<T>(parts: readonly Result<T>[]): Result<readonly T[]> {
  const faults = new Set<Diagnostic>()
  const values: T[] = []
  for (const part of parts) {
    if (part.ok) values.push(part.value)
    else for (const fault of part.because) faults.add(fault)
  }
  return faults.size > 0 ? bad([...faults]) : { ok: true, value: values }
}
