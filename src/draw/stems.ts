/** How grid lines reach their bubbles: straight where there is room, else in rows and with a jog. */
import { spread } from './spread.ts'

/** A place on one axis of the plan, along that axis of the sheet. */
export interface Stop {
  readonly at: number
  readonly metres: number
  readonly name: string
}

export interface Stem {
  readonly stop: Stop
  /** Where the bubble stands along the axis. */
  readonly place: number
  /** 0 is the row nearest to the plan. */
  readonly row: number
}

export interface StemNeeds {
  /** Size of a bubble along the axis. */
  readonly bubble: number
  /** Least distance between stems i and i + 1, for a dimension set between them. */
  readonly gaps: readonly number[]
  readonly low: number
  readonly high: number
}

const mostRows = 4
/** Between bubbles, and between a bubble and a stem that passes it. */
const clear = 2.5

/** `undefined` when even jogged stems find no room. */
export function arrangeStems(stops: readonly Stop[], needs: StemNeeds): readonly Stem[] | undefined {
  const rows = fewestRows(stops, needs)
  if (rows === undefined) return undefined
  const gaps = needs.gaps.map(gap => Math.max(gap, stemGap(needs.bubble, rows)))
  const places = spread(
    stops.map(({ at }) => at),
    gaps,
    needs.low,
    needs.high,
  )
  return inRows(
    stops.map((stop, idx) => ({ stop, place: places[idx] ?? stop.at })),
    needs.bubble,
    rows,
  )
}

/** Distance at which stems can stand when bubbles take turns in so many rows. */
function stemGap(bubble: number, rows: number): number {
  return rows === 1 ? bubble + clear : Math.max(bubble / 2 + clear, (bubble + rows * clear) / rows)
}

/** The fewest rows that need no jog; failing that, the fewest that fit at all. */
function fewestRows(stops: readonly Stop[], { bubble, gaps, low, high }: StemNeeds): number | undefined {
  const counts = Array.from({ length: mostRows }, (_, idx) => idx + 1)
  const own = stops.slice(1).map((stop, idx) => stop.at - (stops[idx]?.at ?? stop.at))
  const straight = counts.find(rows => own.every(gap => gap >= stemGap(bubble, rows)))
  const roomy = counts.filter(
    rows => gaps.reduce((sum, gap) => sum + Math.max(gap, stemGap(bubble, rows)), 0) <= high - low,
  )
  if (straight === undefined) return roomy.find(rows => rows > 1)
  return own.every((gap, idx) => gap >= (gaps[idx] ?? 0)) || roomy.includes(straight) ? straight : roomy[0]
}

/** Each bubble takes the nearest row that it can share and whose stem passes the bubbles below it. */
function inRows(stems: readonly Omit<Stem, 'row'>[], bubble: number, rows: number): readonly Stem[] {
  const set: Stem[] = []
  for (const stem of stems) {
    const row = Array.from({ length: rows }, (_, idx) => idx).find(each =>
      set.every(other => apart(other, stem.place, each, bubble)),
    )
    set.push({ ...stem, row: row ?? set.length % rows })
  }
  return set
}

function apart(other: Stem, place: number, row: number, bubble: number): boolean {
  const need = other.row === row ? bubble + clear : bubble / 2 + clear
  return Math.abs(place - other.place) >= need - 1e-6
}
