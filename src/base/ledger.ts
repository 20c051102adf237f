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

/** What some work did besides its result: told to whoever gathers it under a channel. */
export interface Channel<T> {
  /** Only for the type: what is told here. */
  readonly told?: T
}

export const channel = <T>(): Channel<T> => ({})

interface Telling {
  readonly channel: Channel<unknown>
  readonly what: unknown
}

/** Something that work reads: a task, or a place whose content may be replaced. */
interface Read {
  /** Tasks whose result rests on this. */
  readonly readers: Set<Task>
  /** When it last became another. */
  changed: number
}

interface Task extends Read {
  readonly name: string
  readonly at: Span
  readonly work: () => Result<unknown>
  /** Whether a new result leaves the one before in its place. */
  readonly keeps: (before: unknown, now: unknown) => boolean
  /** Undefined while there is none. */
  result: Result<unknown> | undefined
  /** True when something that it rests on may have changed. */
  isDoubtful: boolean
  /** When all that it rests on was last seen to be as it was. */
  checked: number
  /** What it read and what it told, in order, each read once. */
  log: (Read | Telling)[]
  /** The build in which it was last asked for by nobody but the build itself. */
  asked: number
  /** The build in which what it told was last gathered. */
  gathered: number
}

const newTask = (
  name: string,
  at: Span,
  work: () => Result<unknown>,
  keeps: (before: unknown, now: unknown) => boolean,
): Task => ({
  name,
  at,
  work,
  keeps,
  result: undefined,
  isDoubtful: false,
  checked: 0,
  changed: 0,
  log: [],
  readers: new Set(),
  asked: -1,
  gathered: -1,
})

/** A content that may be replaced between builds; what read it is then worked again. */
export interface Cell<T> {
  readonly get: () => T
  /** @returns true when the content is another than before */
  readonly set: (next: T) => boolean
  /** True while some result rests on the content. */
  readonly isRead: () => boolean
}

/** Work that is done when it is first asked for. */
export interface Work<T> {
  (): Result<T>
  /** True when the result is at hand. */
  readonly isDone: () => boolean
}

/**
 * Work done on demand, each once. Each task knows what it read, so that of a long document only that is
 * worked again which rests on what was changed. A ledger that is new and one that has seen many changes
 * give the same results: a task's log depends on nothing but what it read.
 */
export class Ledger {
  private readonly underWay: Task[] = []
  /** What the build itself asked for and told, in order. */
  private root: (Read | Telling)[] = []
  private build = 0
  /** Tasks that may have lost their last reader. */
  private readonly loose = new Set<Task>()
  private gathered: Gathering = newGathering()
  /** Counts every change of a result or a content. */
  private clock = 0
  /** True once a ring was found or a chain cut for its depth, which depend on where they were entered. */
  strained = false

  /**
   * A function that does its work when first asked and keeps the result.
   * @param name what is worked, as a ring would name it
   * @param at the place of its definition
   * @param keeps true where a new result is as good as the one before, which then stays: what rests on it is not worked again
   */
  once<T>(name: string, at: Span, work: () => Result<T>, keeps: (before: T, now: T) => boolean = () => false): Work<T> {
    // Both results that it is asked about come from this work.
    const task = newTask(name, at, work, keeps as Task['keeps'])
    const ask = (): Result<T> => {
      this.read(task)
      // The result comes from this work, or is a fault.
      return this.upToDate(task) as Result<T>
    }
    return Object.assign(ask, { isDone: () => task.result !== undefined && !task.isDoubtful })
  }

  private upToDate(task: Task): Result<unknown> {
    if (task.result && !task.isDoubtful) return task.result
    const first = this.underWay.indexOf(task)
    if (first !== -1 || this.underWay.length >= DEEPEST) {
      this.strained = true
      return bad([first === -1 ? tooDeep(task) : ring(this.underWay.slice(first).filter(({ name }) => name !== ''))])
    }
    this.underWay.push(task)
    const result = task.result && this.holds(task) ? task.result : this.workAnew(task)
    this.underWay.pop()
    task.isDoubtful = false
    task.checked = this.clock
    return result
  }

  /** True when nothing that the task read has changed since it was last seen to hold. */
  private holds({ log, checked }: Task): boolean {
    for (const read of log) {
      if (!('readers' in read)) continue
      if (isTask(read)) this.upToDate(read)
      if (read.changed > checked) return false
    }
    return true
  }

  private workAnew(task: Task): Result<unknown> {
    const before = task.result
    this.clear(task)
    const now = task.work()
    const isKept = before?.ok && now.ok && task.keeps(before.value, now.value)
    if (!isKept) task.changed = ++this.clock
    task.result = isKept ? before : now
    return task.result
  }

  /** @param same tells whether a content is as good as another */
  cell<T>(first: T, same: (a: T, b: T) => boolean = Object.is): Cell<T> {
    let content = first
    const read: Read = { readers: new Set(), changed: 0 }
    return {
      get: () => {
        this.read(read)
        return content
      },
      set: next => {
        if (same(content, next)) return false
        content = next
        read.changed = ++this.clock
        doubt(read)
        return true
      },
      isRead: () => read.readers.size > 0,
    }
  }

  /** Tells something that is gathered at the end of each build in which this work has a part. */
  tell<T>(channel: Channel<T>, what: T): void {
    this.log().push({ channel, what })
  }

  /** Work asked for within is not noted as something that the task under way rests on. */
  apart(work: () => void): void {
    const nobody = newTask(
      '',
      { start: 0, end: 0 },
      () => bad([]),
      () => false,
    )
    this.underWay.push(nobody)
    work()
    this.underWay.pop()
    this.clear(nobody)
  }

  /** What was told under a channel in this build so far, in the order in which a first build comes to it. */
  told<T>(channel: Channel<T>): readonly T[] {
    gather(this.gathered, this.root, this.build)
    // What is told under a channel is of its type.
    return (this.gathered.told.get(channel) ?? []) as readonly T[]
  }

  /** Begins the next build; what nobody asked for in the last one is let go. */
  next(): void {
    for (const task of this.loose) {
      // Taken out first: it comes in again, and to the end, when it loses its last reader after all.
      this.loose.delete(task)
      if (task.readers.size === 0 && task.asked !== this.build) this.clear(task)
    }
    for (const read of this.root) if (isTask(read)) this.loose.add(read)
    this.root = []
    this.gathered = newGathering()
    this.build++
  }

  private log(): (Read | Telling)[] {
    return this.underWay.at(-1)?.log ?? this.root
  }

  private read(what: Read): void {
    const reader = this.underWay.at(-1)
    if (reader === undefined) {
      if (isTask(what)) {
        if (what.asked === this.build) return
        what.asked = this.build
      }
      this.root.push(what)
    } else if (!what.readers.has(reader)) {
      what.readers.add(reader)
      reader.log.push(what)
    }
  }

  private clear(task: Task): void {
    for (const read of task.log)
      if ('readers' in read && read.readers.delete(task) && isTask(read) && read.readers.size === 0)
        this.loose.add(read)
    task.result = undefined
    task.log = []
  }
}

/** Every result that rests on something is looked at again when it is asked for. */
function doubt(what: Read): void {
  const waiting = [...what.readers]
  for (let task = waiting.pop(); task; task = waiting.pop()) {
    if (task.isDoubtful) continue
    task.isDoubtful = true
    waiting.push(...task.readers)
  }
}

const isTask = (read: Read | Telling): read is Task => 'log' in read

interface Gathering {
  readonly told: Map<Channel<unknown>, unknown[]>
  /** How much of the build's own log has been gone through. */
  from: number
}

const newGathering = (): Gathering => ({ told: new Map(), from: 0 })

/** Goes through the rest of a log and the logs of the tasks in it, each once and without nesting. */
function gather(into: Gathering, root: readonly (Read | Telling)[], build: number): void {
  const open: { readonly log: readonly (Read | Telling)[]; at: number }[] = [{ log: root, at: into.from }]
  for (let top = open.at(-1); top; top = open.at(-1)) {
    const next = top.log[top.at++]
    if (next === undefined) open.pop()
    else if ('channel' in next) {
      const list = into.told.get(next.channel)
      if (list) list.push(next.what)
      else into.told.set(next.channel, [next.what])
    } else if (isTask(next) && next.gathered !== build) {
      next.gathered = build
      if (next.log.length > 0) open.push({ log: next.log, at: 0 })
    }
  }
  into.from = root.length
}

/** A longer chain of definitions would exhaust the machine before it told the reader anything. */
const DEEPEST = 600

function tooDeep({ name, at }: Pick<Task, 'name' | 'at'>): Diagnostic {
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
