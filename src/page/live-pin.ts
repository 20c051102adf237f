/** The moves that are shown: those of the last save that moved a number, or all against a state that is held. */
import type { Figure, Moves, Table, Verdict } from '../serve/message.ts'
import { movesBetween } from '../serve/moved.ts'

export interface Comparison {
  readonly moves: () => Moves
  /** The save that the marks are of. */
  readonly movedBy: () => number
  readonly pinned: () => number | undefined
  /** Takes in what a save moved. */
  readonly saved: (version: number, moves: Moves) => void
  readonly pin: (table: Table) => void
  readonly release: () => void
  /** All numbers as they are now, where what happened in between is not known. */
  readonly now: (table: Table) => void
}

const none: Moves = { numbers: [], checks: [], back: [] }

/** @param held a state that was held before the page was loaded again @param keep keeps it, or lets it go */
export function createComparison(held: Table | undefined, keep: (table: Table | undefined) => void): Comparison {
  let last = { version: 0, moves: none }
  let against = held
  /** What is now, where it is not as it is in the state that is held. */
  let present = held && stateOf(held)
  /** What is gone for now, to be put back as it was. */
  const away: Present = { numbers: new Map(), checks: new Map() }
  const compared = (): Moves => (against && present ? movesBetween(stateOf(against), present) : none)
  let known = none
  return {
    moves: () => (against ? known : last.moves),
    movedBy: () => last.version,
    pinned: () => against?.version,
    saved: (version, moves) => {
      if (moves.numbers.length + moves.checks.length > 0) last = { version, moves }
      if (!against || !present) return
      takeIn(moves, present, away)
      known = compared()
    },
    pin: table => {
      against = table
      present = stateOf(table)
      known = none
      keep(table)
    },
    release: () => {
      against = undefined
      present = undefined
      known = none
      keep(undefined)
    },
    now: table => {
      present = stateOf(table)
      known = compared()
    },
  }
}

interface Present {
  readonly numbers: Map<string, Figure>
  readonly checks: Map<string, Verdict>
}

function takeIn({ numbers, checks, back }: Moves, present: Present, away: Present): void {
  for (const move of numbers) {
    if (move.now === undefined) shift(move.id, present.numbers, away.numbers)
    else present.numbers.set(move.id, { ...move, printed: move.now, si: move.si ?? 0 })
  }
  for (const { id, what, now } of checks) {
    if (now) present.checks.set(id, { id, what, ...now })
    else shift(id, present.checks, away.checks)
  }
  for (const id of back) {
    shift(id, away.numbers, present.numbers)
    shift(id, away.checks, present.checks)
  }
}

function shift<T>(id: string, from: Map<string, T>, to: Map<string, T>): void {
  const held = from.get(id)
  if (held === undefined) return
  from.delete(id)
  to.set(id, held)
}

const stateOf = ({ numbers, checks }: Table): Present => ({
  numbers: new Map(numbers.map(each => [each.id, each])),
  checks: new Map(checks.map(each => [each.id, each])),
})
