/** What moved between two states of a document. */
import type { Figure, Move, Moves, Turn, Verdict } from './message.ts'

/** Numbers and verdicts by id; `lost` are those that were there at some time before. */
export interface State {
  readonly numbers: ReadonlyMap<string, Figure>
  readonly checks: ReadonlyMap<string, Verdict>
  readonly lost?: Pick<State, 'numbers' | 'checks'>
}

/** A number has moved when it prints another text: what cannot be seen is not told. */
export function movesBetween(before: State, after: State): Moves {
  return {
    numbers: [...numberMoves(before, after)].sort(byChange),
    checks: [...checkTurns(before, after)].sort((a, b) => gravity(a) - gravity(b)),
    back: [...back(before, after, 'numbers', same), ...back(before, after, 'checks', (a, b) => a.ok === b.ok)],
  }
}

const same = (a: Figure, b: Figure): boolean => a.printed === b.printed

function back<K extends 'numbers' | 'checks'>(
  before: State,
  after: State,
  kind: K,
  isAsBefore: (a: Held<K>, b: Held<K>) => boolean,
): readonly string[] {
  // A map of either kind holds what its kind says.
  const [lost, had, now] = [before.lost?.[kind], before[kind], after[kind]] as readonly (
    | Map<string, Held<K>>
    | undefined
  )[]
  return [...(lost ?? [])].flatMap(([id, was]) => {
    const is = now?.get(id)
    return is && !had?.has(id) && isAsBefore(was, is) ? [id] : []
  })
}

type Held<K extends 'numbers' | 'checks'> = K extends 'numbers' ? Figure : Verdict

function numberMoves(before: State, after: State): readonly Move[] {
  const moves: Move[] = []
  for (const [id, now] of after.numbers) {
    const was = before.numbers.get(id) ?? before.lost?.numbers.get(id)
    if (was !== now && was?.printed !== now.printed) moves.push(moveOf(was, now))
  }
  for (const [id, was] of before.numbers) if (!after.numbers.has(id)) moves.push(moveOf(was, undefined))
  return moves
}

/** @param was @param now one of them is there */
export function moveOf(was: Figure | undefined, now: Figure | undefined): Move {
  const { id = '', letter = '', given = false } = now ?? was ?? {}
  return {
    id,
    letter,
    given,
    ...(was ? { was: was.printed } : {}),
    ...(now ? { now: now.printed, si: now.si } : {}),
    ...(was && now && isSlight(was) && isSlight(now) ? { slight: true } : {}),
    ...(was && now && was.si !== 0 ? { change: (now.si - was.si) / Math.abs(was.si) } : {}),
  }
}

function checkTurns(before: State, after: State): readonly Turn[] {
  const turns: Turn[] = []
  for (const [id, now] of after.checks) {
    const was = before.checks.get(id) ?? before.lost?.checks.get(id)
    if (was?.ok !== now.ok) turns.push({ id, what: now.what, ...(was ? { was } : {}), now })
  }
  for (const [id, was] of before.checks) if (!after.checks.has(id)) turns.push({ id, what: was.what, was })
  return turns
}

/** A ratio so small is what rounding leaves: a residual, say. A number with a unit has a space in it. */
const isSlight = ({ si, printed }: Figure): boolean => Math.abs(si) < 1e-6 && !printed.includes(' ')

/** Results before what was written; those that were nothing or have another unit first, then the largest change. */
const byChange = (a: Move, b: Move): number =>
  Number(a.given) - Number(b.given) || rank(b) - rank(a) || (a.id < b.id ? -1 : a.id > b.id ? 1 : 0)

function rank({ was, now, change, slight }: Move): number {
  if (slight) return 0
  if (now === undefined) return -2
  if (was === undefined) return -1
  return change === undefined ? Infinity : Math.abs(change)
}

function gravity({ was, now }: Turn): number {
  if (now === undefined) return 3
  if (!now.ok) return was ? 0 : 1
  return 2
}
