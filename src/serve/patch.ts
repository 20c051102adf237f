/** The way from one list of blocks to another: what is kept, what turns into what, what comes and goes. */
import type { Change } from './message.ts'

/**
 * Blocks that are the same string are kept. Between them a block turns into the one that bears its id, or
 * else into its neighbour of the same kind, so that a browser can change it in place.
 *
 * Takes time in proportion to the blocks, not to their product: only blocks that stand once in each list are aligned.
 */
export function changesBetween(before: readonly string[], after: readonly string[]): readonly Change[] {
  let start = 0
  while (start < before.length && start < after.length && before[start] === after[start]) start++
  let end = 0
  const shorter = Math.min(before.length, after.length)
  while (end < shorter - start && before[before.length - 1 - end] === after[after.length - 1 - end]) end++
  const changes: Change[] = []
  const add = (change: Change): void => {
    const last = changes.at(-1)
    if ((change[0] === 'keep' || change[0] === 'drop') && change[1] === 0) return
    if (last?.[0] === 'keep' && change[0] === 'keep') changes[changes.length - 1] = ['keep', last[1] + change[1]]
    else if (last?.[0] === 'drop' && change[0] === 'drop') changes[changes.length - 1] = ['drop', last[1] + change[1]]
    else changes.push(change)
  }
  add(['keep', start])
  for (const change of middle(before.slice(start, before.length - end), after.slice(start, after.length - end)))
    add(change)
  add(['keep', end])
  return changes
}

function middle(before: readonly string[], after: readonly string[]): readonly Change[] {
  return between(
    before,
    after,
    block => block,
    ([old], [made]) => keyed(old, made),
  )
}

const keyed = (before: readonly string[], after: readonly string[]): readonly Change[] =>
  between(before, after, idOf, ([old], [made]) => inOrder(old, made))

type Gap = readonly [blocks: readonly string[]]

/** Aligns blocks by a key that stands once in each list, and works the gaps between them in another way. */
function between(
  before: readonly string[],
  after: readonly string[],
  keyOf: (block: string) => string,
  gap: (before: Gap, after: Gap) => readonly Change[],
): readonly Change[] {
  const out: Change[] = []
  let [i, j] = [0, 0]
  for (const [k, l] of [...aligned(before.map(keyOf), after.map(keyOf)), [before.length, after.length] as const]) {
    if (k > i || l > j) out.push(...gap([before.slice(i, k)], [after.slice(j, l)]))
    const made = after[l]
    if (made !== undefined && k < before.length) out.push(before[k] === made ? ['keep', 1] : ['turn', made])
    i = k + 1
    j = l + 1
  }
  return out
}

/** Pairs of places of the same key, ascending in both; a key that is empty or stands more than once pairs nothing. */
function aligned(before: readonly string[], after: readonly string[]): readonly (readonly [number, number])[] {
  const places = once(after)
  const pairs = [...once(before)].flatMap(([key, i]) => {
    const j = places.get(key)
    return j === undefined ? [] : [[i, j] as const]
  })
  return ascending(pairs.sort(([a], [b]) => a - b))
}

function once(keys: readonly string[]): ReadonlyMap<string, number> {
  const found = new Map<string, number>()
  const more = new Set<string>()
  keys.forEach((key, i) => {
    if (key === '' || more.has(key)) return
    if (found.delete(key)) more.add(key)
    else found.set(key, i)
  })
  return found
}

/** The longest run of pairs whose second numbers ascend; the first ones do already. */
function ascending(pairs: readonly (readonly [number, number])[]): readonly (readonly [number, number])[] {
  /** Index of the pair that ends the best run of each length. */
  const ends: number[] = []
  const before: number[] = []
  pairs.forEach(([, j], at) => {
    let low = 0
    let high = ends.length
    while (low < high) {
      const half = (low + high) >> 1
      if ((pairs[ends[half] ?? 0]?.[1] ?? 0) < j) low = half + 1
      else high = half
    }
    before[at] = ends[low - 1] ?? -1
    ends[low] = at
  })
  const run: (readonly [number, number])[] = []
  for (let at = ends.at(-1) ?? -1; at >= 0; at = before[at] ?? -1) {
    const pair = pairs[at]
    if (pair) run.push(pair)
  }
  return run.reverse()
}

/** Each turns into the next one of its kind; what is left over comes or goes. */
function inOrder(before: readonly string[], after: readonly string[]): readonly Change[] {
  const out: Change[] = []
  let i = 0
  for (const made of after) {
    const old = before[i]
    if (old === undefined || kindOf(old) !== kindOf(made) || unlike(idOf(old), idOf(made))) out.push(['add', made])
    else {
      out.push(old === made ? ['keep', 1] : ['turn', made])
      i++
    }
  }
  if (i < before.length) out.push(['drop', before.length - i])
  return out
}

const unlike = (a: string, b: string): boolean => a !== '' && b !== '' && a !== b

/** The first tag of a block, such as `<div class="eq long" id="roof.CM.x" role="group">`. */
const tagOf = (block: string): string => block.slice(0, block.indexOf('>') + 1)
const idOf = (block: string): string => / id="([^"]*)"/.exec(tagOf(block))?.[1] ?? ''
const kindOf = (block: string): string => /^<[a-z0-9]+(?: class="[\w-]+)?/.exec(block)?.[0] ?? ''

/** The blocks that come of another list by its changes: what a browser does, in text. */
export function applied(before: readonly string[], changes: readonly Change[]): readonly string[] {
  const out: string[] = []
  let at = 0
  for (const change of changes)
    switch (change[0]) {
      case 'keep':
        out.push(...before.slice(at, at + change[1]))
        at += change[1]
        break
      case 'drop':
        at += change[1]
        break
      case 'turn':
        out.push(change[1])
        at++
        break
      case 'add':
        out.push(change[1])
        break
    }
  return out
}
