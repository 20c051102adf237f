/** The engineer's own lines at work: each value and each check when it is first asked for. */
import { namesIn } from '../base/expr.ts'
import type { Cell, Result, Work } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { printsAlike, type Value } from '../base/value.ts'
import { type Equation, readEquation, readEquations, workEquation } from '../model/equations.ts'
import { isLimit, type Limit, limitLines, workLimit } from '../model/limits.ts'
import type { Scope } from '../model/scope.ts'
import type { Block } from '../read/block.ts'
import type { Text } from '../read/text.ts'

export interface EquationLines {
  /** Takes the equation blocks of the next build; what rests on a line that changed is worked again. */
  readonly replace: (blocks: readonly Block[]) => void
  /** The value that a name stands for; undefined when no line gives it. */
  readonly value: (name: string) => Result<Value> | undefined
  /** The value of a line, by the line itself. */
  readonly equation: (line: Text) => Result<Value>
  readonly limit: (line: Text) => Result<Limit>
  /** Every name that a line gives. */
  readonly names: () => readonly string[]
  /** All lines in order, equations before checks. */
  readonly readers: () => readonly (() => Result<unknown>)[]
}

/** The lines of a block, each read. */
interface BlockLines {
  readonly equations: readonly (readonly [Text, Result<Equation>])[]
  readonly limits: readonly Text[]
  /** The names that the equations give, in order. */
  readonly names: readonly string[]
}

/** A block is read once, however many builds it stands in. */
const known = new WeakMap<Block, BlockLines>()

function linesOf(block: Block): BlockLines {
  const read = known.get(block) ?? readLines(block)
  known.set(block, read)
  return read
}

function readLines({ lines }: Block): BlockLines {
  const equations = lines.filter(line => !isLimit(line)).map(line => [line, readEquation(line)] as const)
  const names = equations.flatMap(([, read]) => (read.ok ? [read.value.name.text] : []))
  return { equations, limits: lines.filter(isLimit), names }
}

interface CheckLine {
  readonly ordinal: number
  readonly work: Work<Limit>
}

const noneRepeated: ReadonlyMap<Text, Result<Equation>> = new Map()

export function equationLines(scope: Scope): EquationLines {
  const { ledger } = scope
  /** The equations of this build by their names. */
  const equations = new Map<string, Equation>()
  /** What works each name that was ever given or asked for. */
  const slots = new Map<string, Cell<Work<Value> | undefined>>()
  /** Lines that give a name which a line before them gives too. */
  const repeated = ledger.cell(noneRepeated)
  /** The names of each block. */
  const named = ledger.cell<readonly string[]>([], sameItems)
  const works = new WeakMap<Block, { readonly equations: Work<undefined>; readonly limits: Work<undefined> }>()
  let blocks: readonly Block[] = []
  let limits: ReadonlyMap<Text, CheckLine> = new Map()

  const slotOf = (name: string): Cell<Work<Value> | undefined> => {
    const slot = slots.get(name) ?? ledger.cell<Work<Value> | undefined>(undefined)
    slots.set(name, slot)
    return slot
  }

  function replace(next: readonly Block[]): void {
    for (const [name, slot] of slots) if (!equations.has(name) && !slot.isRead()) slots.delete(name)
    const gone = new Set(blocks)
    const come = next.filter(block => !gone.delete(block))
    blocks = next
    const count = blocks.reduce((sum, block) => sum + linesOf(block).names.length, 0)
    const given = new Map(come.flatMap(equationsOf))
    for (const name of [...gone].flatMap(block => linesOf(block).names)) if (!given.has(name)) drop(name)
    for (const [name, equation] of given) take(name, equation)
    // Fewer names than lines that give one: some name stands twice, and only the first line is to give it.
    if (equations.size < count || repeated.get() !== noneRepeated) takeFirst(count)
    named.set(blocks.map(block => linesOf(block).names.join()))
    limits = new Map(
      limitLines(blocks.flatMap(block => linesOf(block).limits)).map(([line, ordinal]) => [
        line,
        checkOf(line, ordinal),
      ]),
    )
  }

  const equationsOf = (block: Block): readonly (readonly [string, Equation])[] =>
    linesOf(block).equations.flatMap(([, read]) => (read.ok ? [[read.value.name.text, read.value] as const] : []))

  /** Goes through all lines, where a name stands twice or did so in the build before. */
  function takeFirst(count: number): void {
    const read = readEquations(blocks)
    const given = new Map(
      [...read.values()].flatMap(each => (each.ok ? [[each.value.name.text, each.value] as const] : [])),
    )
    for (const name of [...equations.keys()]) if (!given.has(name)) drop(name)
    for (const [name, equation] of given) take(name, equation)
    repeated.set(given.size < count ? read : noneRepeated)
  }

  function drop(name: string): void {
    equations.delete(name)
    slotOf(name).set(undefined)
  }

  function take(name: string, equation: Equation): void {
    if (equations.get(name) === equation) return
    equations.set(name, equation)
    slotOf(name).set(ledger.once(name, equation.span, () => workEquation(equation, scope), keeps))
  }

  function checkOf(line: Text, ordinal: number): CheckLine {
    const check = limits.get(line)
    if (check?.ordinal === ordinal) return check
    return { ordinal, work: ledger.once(`check ${line.text}`, line.span, () => workLimit(line, ordinal, scope)) }
  }

  const isDone = (name: string): boolean => slots.get(name)?.get()?.isDone() ?? false

  /**
   * Works what an equation rests on first, so that a long chain does not nest. A ring is left to the
   * ledger, which tells its path.
   */
  function workInOrder(name: string): void {
    const waiting = [name]
    const opened = new Set<string>()
    const ordered = new Set<string>()
    for (let next = waiting.at(-1); next !== undefined; next = waiting.at(-1)) {
      if (opened.has(next)) {
        waiting.pop()
        ordered.add(next)
        continue
      }
      opened.add(next)
      const body = equations.get(next)?.body
      const rest = body
        ? [...namesIn(body).keys()].filter(other => equations.has(other) && !ordered.has(other) && !isDone(other))
        : []
      if (rest.some(other => opened.has(other))) break
      waiting.push(...rest)
    }
    for (const earlier of ordered) slots.get(earlier)?.get()?.()
  }

  function value(name: string): Result<Value> | undefined {
    if (equations.has(name) && !isDone(name)) ledger.apart(() => workInOrder(name))
    return slotOf(name).get()?.()
  }

  const equation = (line: Text): Result<Value> => {
    const read = repeated.get().get(line) ?? readEquation(line)
    return read.ok ? (value(read.value.name.text) ?? bad([])) : read
  }

  const limit = (line: Text): Result<Limit> => limits.get(line)?.work() ?? bad([])

  /** All lines of a block at once: of a block that has not changed only one thing is asked. */
  function worksOf(block: Block) {
    const lines = linesOf(block)
    const made = works.get(block) ?? {
      equations: ledger.once('equations', block.info, () => faultsOf(lines.equations.map(([line]) => equation(line)))),
      limits: ledger.once('checks', block.info, () => faultsOf(lines.limits.map(limit))),
    }
    works.set(block, made)
    return made
  }

  return {
    replace,
    value,
    equation,
    limit,
    names: () => {
      named.get()
      return [...new Set(blocks.flatMap(block => linesOf(block).names))]
    },
    readers: () => [
      ...blocks.map(block => worksOf(block).equations),
      ...blocks.filter(block => linesOf(block).limits.length > 0).map(block => worksOf(block).limits),
    ],
  }
}

/**
 * A value that prints as it did stays for all that rests on it, and is only told what it rests on itself now: a
 * change ends where it no longer shows.
 */
function keeps(before: Value, now: Value): boolean {
  if (!printsAlike(before, now)) return false
  // Nothing else of the two differs.
  Object.assign(before, { origin: now.origin })
  return true
}

function faultsOf(results: readonly Result<unknown>[]): Result<undefined> {
  const faults = results.flatMap(result => (result.ok ? [] : result.because))
  return faults.length > 0 ? bad(faults) : good(undefined)
}

const sameItems = (a: readonly string[], b: readonly string[]): boolean =>
  a.length === b.length && a.every((item, i) => item === b[i])
