/** One edge of the drawing, top or left: which dimensions and bubbles it carries, and how far out each lies. */
import { type Lettering, lettering } from './label.ts'
import { arrangeStems, type Stem, type Stop } from './stems.ts'

export interface Bay {
  readonly from: Stop
  readonly to: Stop
  readonly text: Lettering
  /** A short bay has its text turned across the chain, beyond it, between the two stems. */
  readonly set: 'along' | 'turned' | 'none'
}

export interface AxisLayout {
  readonly stems: readonly Stem[]
  /** Grid lines that found no room for a bubble. */
  readonly unnamed: readonly Stop[]
  readonly bays: readonly Bay[]
  /** The whole length, when the chain does not say it already. */
  readonly overall?: Lettering
  /** The chain runs between the outermost of the building, for want of two grid lines. */
  readonly endsOnly: boolean
  readonly bubble: { readonly along: number; readonly out: number }
  readonly out: Distances
}

/** Distances outward from the plan. */
export interface Distances {
  readonly chain: number
  readonly overall: number
  readonly jogFrom: number
  readonly jogTo: number
  readonly turned: number
  readonly bubbles: number
  readonly rowStep: number
  /** Everything on this edge lies within. */
  readonly end: number
}

export interface AxisInput {
  readonly lines: readonly Stop[]
  readonly ends: readonly [Stop, Stop]
  readonly dimension: (metres: number) => string
  readonly edge: 'top' | 'left'
  /** How far stems may stray along the axis. */
  readonly low: number
  readonly high: number
  /** Depth of a chain of wall ends between the plan and the grid's own. */
  readonly inner: number
}

/** Room kept beside the plan for names of the outermost walls. */
export const besidePlan = 36
const rowOfText = 18
const bubbleSize = 21
const widestBubble = 66
const turnedHeight = 17
const sameStop = 0.01

export function layoutAxis(input: AxisInput): AxisLayout {
  const lines = [...input.lines].sort((a, b) => a.at - b.at || (a.name < b.name ? -1 : 1))
  const along = bubbleAlong(lines, input.edge)
  for (let every = 1; ; every++) {
    const kept = everyNth(lines, every)
    const bays = baysOf(chainOf(kept, input.ends), input.dimension, hasLength(kept))
    const gaps = kept.slice(1).map((_, idx) => (hasLength(kept) && bays[idx]?.set === 'turned' ? turnedHeight : 0))
    const stems = arrangeStems(kept, { bubble: along, gaps, low: input.low, high: input.high })
    if (stems !== undefined)
      return complete(
        input,
        stems,
        lines.filter(line => !kept.includes(line)),
        bays,
      )
    // A single stem always has its room, so the search ends.
    if (kept.length <= 1) return complete(input, [], lines, bays)
  }
}

function complete(
  input: AxisInput,
  stems: readonly Stem[],
  unnamed: readonly Stop[],
  bays: readonly Bay[],
): AxisLayout {
  const width = bubbleWidth(stems.map(({ stop }) => stop))
  const bubble = input.edge === 'top' ? { along: width, out: bubbleSize } : { along: bubbleSize, out: width }
  const [first, last] = [bays[0]?.from, bays.at(-1)?.to]
  const whole =
    first === undefined || last === undefined || bays.length < 2 ? undefined : Math.abs(last.metres - first.metres)
  const overall = whole === undefined ? {} : { overall: lettering('dimension', 120, input.dimension(whole)) }
  const endsOnly = !hasLength(stems.map(({ stop }) => stop))
  return {
    stems,
    unnamed,
    bays,
    ...overall,
    endsOnly,
    bubble,
    out: distances(stems, bays, whole !== undefined, bubble.out, input.inner),
  }
}

function everyNth(lines: readonly Stop[], every: number): readonly Stop[] {
  if (every === 1) return lines
  const kept = lines.filter((_, idx) => idx % every === 0)
  const last = lines.at(-1)
  return last === undefined || kept.at(-1) === last ? kept : [...kept.slice(0, Math.max(1, kept.length - 1)), last]
}

const hasLength = (stops: readonly Stop[]): boolean => (stops.at(-1)?.at ?? 0) - (stops[0]?.at ?? 0) > sameStop

function chainOf(kept: readonly Stop[], [low, high]: readonly [Stop, Stop]): readonly Stop[] {
  if (hasLength(kept)) return kept
  return Math.abs(high.at - low.at) > sameStop ? [low, high] : []
}

function baysOf(stops: readonly Stop[], dimension: (metres: number) => string, gridded: boolean): readonly Bay[] {
  return stops.slice(1).flatMap((to, idx): readonly Bay[] => {
    const from = stops[idx]
    if (from === undefined) return []
    const text = lettering('dimension', 120, dimension(Math.abs(to.metres - from.metres)))
    const room = to.at - from.at
    if (room < sameStop) return [{ from, to, text, set: 'none' }]
    return [{ from, to, text, set: gridded && text.width + 3 > room ? 'turned' : 'along' }]
  })
}

function bubbleWidth(lines: readonly Stop[]): number {
  const widest = Math.max(0, ...lines.map(({ name }) => bubbleName(name).width + 5))
  return Math.max(bubbleSize, widest)
}

const bubbleAlong = (lines: readonly Stop[], edge: 'top' | 'left'): number =>
  edge === 'top' ? bubbleWidth(lines) : bubbleSize

export const bubbleName = (name: string): Lettering => lettering('bubble', widestBubble - 10, name)

/**
 * Outward from the plan: the chain, its turned texts, the whole length, the bubbles.
 * Where stems jog, the whole length is taken inside the chain, where they still run true.
 */
function distances(
  stems: readonly Stem[],
  bays: readonly Bay[],
  whole: boolean,
  bubbleOut: number,
  inner: number,
): Distances {
  const jogs = stems.some(({ stop, place }) => Math.abs(place - stop.at) > 0.5)
  const turnedWidth = Math.max(0, ...bays.map(bay => (bay.set === 'turned' ? bay.text.width : 0)))
  const first = besidePlan + inner
  const chain = first + (jogs && whole ? rowOfText + 4 : 0)
  const past = bays.length > 0 ? chain + rowOfText : inner > 0 ? first : 6
  const jogTo = jogs ? past + 12 : past
  const turned = jogs ? jogTo + 1 : chain + 4
  const afterTexts = Math.max(jogTo, turned + turnedWidth + 1)
  const overall = jogs ? first : afterTexts + 3
  const bubbles = whole && !jogs ? overall + rowOfText : afterTexts + 2
  const rowStep = bubbleOut + 4
  const rows = Math.max(0, ...stems.map(({ row }) => row + 1))
  const end = rows === 0 ? Math.max(afterTexts, whole && !jogs ? overall + rowOfText : 0) : bubbles + rows * rowStep
  return { chain, overall, jogFrom: past, jogTo, turned, bubbles, rowStep, end }
}
