/** The engineer's own lines at work: each value and each check when it is first asked for. */
import { namesIn } from '../base/expr.ts'
import type { Cell, Result, Work } from '../base/ledger.ts'
import { bad } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { type Equation, readEquations, workEquation } from '../model/equations.ts'
import { type Limit, limitLines, workLimit } from '../model/limits.ts'
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

interface CheckLine {
  readonly ordinal: number
  readonly work: Work<Limit>
}

export function equationLines(scope: Scope): EquationLines {
  const { ledger } = scope
  /** The equations of this build by their names. */
  const equations = new Map<string, Equation>()
  /** What works each name that was ever given or asked for. */
  const slots = new Map<string, Cell<Work<Value> | undefined>>()
  const names = ledger.cell<readonly string[]>([], sameNames)
  let lines: ReadonlyMap<Text, Cell<Result<Equation>>> = new Map()
  let limits: ReadonlyMap<Text, CheckLine> = new Map()

  const slotOf = (name: string): Cell<Work<Value> | undefined> => {
    const known = slots.get(name) ?? ledger.cell<Work<Value> | undefined>(undefined)
    slots.set(name, known)
    return known
  }

  function replace(blocks: readonly Block[]): void {
    const read = readEquations(blocks)
    lines = new Map(
      [...read].map(([line, reading]) => {
        const known = lines.get(line) ?? ledger.cell(reading)
        known.set(reading)
        return [line, known]
      }),
    )
    const given = new Map<string, Equation>()
    for (const reading of read.values()) if (reading.ok) given.set(reading.value.name.text, reading.value)
    for (const name of [...equations.keys()]) if (!given.has(name)) drop(name)
    for (const [name, equation] of given) if (equations.get(name) !== equation) take(name, equation)
    names.set([...given.keys()])
    limits = new Map(
      limitLines(blocks.flatMap(({ lines }) => lines)).map(([line, ordinal]) => [line, checkOf(line, ordinal)]),
    )
  }

  function drop(name: string): void {
    equations.delete(name)
    slotOf(name).set(undefined)
  }

  function take(name: string, equation: Equation): void {
    equations.set(name, equation)
    slotOf(name).set(ledger.once(name, equation.span, () => workEquation(equation, scope)))
  }

  function checkOf(line: Text, ordinal: number): CheckLine {
    const known = limits.get(line)
    if (known?.ordinal === ordinal) return known
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
    const read = lines.get(line)?.get()
    if (!read) return bad([])
    return read.ok ? (value(read.value.name.text) ?? bad([])) : read
  }

  return {
    replace,
    value,
    equation,
    limit: line => limits.get(line)?.work() ?? bad([]),
    names: () => names.get(),
    readers: () => [
      ...[...lines.keys()].map(line => () => equation(line)),
      ...[...limits.values()].map(({ work }) => work),
    ],
  }
}

const sameNames = (a: readonly string[], b: readonly string[]): boolean =>
  a.length === b.length && a.every((name, i) => name === b[i])
