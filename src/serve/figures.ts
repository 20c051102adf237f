/** The numbers of a document as they stand after a build, kept to be compared with later ones. */
import { printed, type Value } from '../base/value.ts'
import type { Compiled } from '../compile.ts'
import type { Figure, Table, Verdict } from './message.ts'

export interface Figures {
  readonly numbers: ReadonlyMap<string, Held>
  readonly checks: ReadonlyMap<string, Verdict>
  /** What was there once: a number that comes back after a fault is compared with what it was before it. */
  readonly lost: Pick<Figures, 'numbers' | 'checks'>
}

/** A figure with the value that it is of, so that one which has not moved is not printed again. */
export interface Held extends Figure {
  readonly value: Value
}

const nothing = { numbers: new Map<string, Held>(), checks: new Map<string, Verdict>() }
export const noFigures: Figures = { ...nothing, lost: nothing }

/** @param before the figures of the build before, which keep those that have not moved */
export function figuresOf({ context, checks }: Compiled, before: Figures): Figures {
  const numbers = new Map<string, Held>()
  for (const values of [context.roots, context.besides])
    for (const [id, value] of values) {
      const old = before.numbers.get(id)
      numbers.set(id, old && isSame(old.value, value) ? old : held(value, printed(value, context.language)))
    }
  const verdicts = new Map(
    checks.map(({ id, what, ratioPrinted, ok }): [string, Verdict] => [id, { id, what, ratio: ratioPrinted, ok }]),
  )
  return { numbers, checks: verdicts, lost: lostOf(before, numbers, verdicts) }
}

/** The figures of a document that cannot be worked at all. */
export const withoutFigures = (before: Figures): Figures => ({
  ...nothing,
  lost: lostOf(before, nothing.numbers, nothing.checks),
})

const held = (value: Value, text: string): Held => ({
  id: value.id,
  letter: value.tex,
  printed: text,
  si: value.si,
  given: value.origin.kind === 'given',
  value,
})

const isSame = (a: Value, b: Value): boolean =>
  a === b ||
  (a.si === b.si &&
    a.tex === b.tex &&
    a.unit === b.unit &&
    a.rounding === b.rounding &&
    a.origin.kind === b.origin.kind)

function lostOf(before: Figures, numbers: Figures['numbers'], checks: Figures['checks']): Figures['lost'] {
  return {
    numbers: leftOver(before.numbers, before.lost.numbers, numbers),
    checks: leftOver(before.checks, before.lost.checks, checks),
  }
}

function leftOver<T>(
  had: ReadonlyMap<string, T>,
  lost: ReadonlyMap<string, T>,
  has: ReadonlyMap<string, T>,
): ReadonlyMap<string, T> {
  const out = new Map<string, T>()
  for (const held of [lost, had]) for (const [id, each] of held) if (!has.has(id)) out.set(id, each)
  return out
}

export const tableOf = (version: number, { numbers, checks }: Figures): Table => ({
  version,
  numbers: [...numbers.values()].map(({ id, letter, printed, si, given }) => ({ id, letter, printed, si, given })),
  checks: [...checks.values()],
})
