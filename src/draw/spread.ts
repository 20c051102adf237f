/** Places along a line, moved as little as need be for each to have its room. */

/**
 * Nearest places to `wanted` (ascending) with at least `gaps[i]` between place i and i + 1.
 *
 * Least squares with order kept: take the gaps away, pool neighbours that are out of
 * order into their mean, and put the gaps back.
 *
 * @source derived: pooling adjacent violators solves the isotonic least-squares problem
 */
export function spread(
  wanted: readonly number[],
  gaps: readonly number[],
  low: number,
  high: number,
): readonly number[] {
  const offsets = runningSums(gaps)
  const pools: { sum: number; count: number }[] = []
  wanted.forEach((at, idx) => {
    let pool = { sum: at - (offsets[idx] ?? 0), count: 1 }
    for (let last = pools.at(-1); last !== undefined && mean(last) > mean(pool); last = pools.at(-1)) {
      pool = { sum: pool.sum + last.sum, count: pool.count + last.count }
      pools.pop()
    }
    pools.push(pool)
  })
  const most = high - (offsets.at(-1) ?? 0)
  const flat = pools.flatMap(pool => Array<number>(pool.count).fill(Math.max(low, Math.min(most, mean(pool)))))
  return flat.map((at, idx) => at + (offsets[idx] ?? 0))
}

const mean = ({ sum, count }: { readonly sum: number; readonly count: number }): number => sum / count

function runningSums(gaps: readonly number[]): readonly number[] {
  let sum = 0
  return [0, ...gaps.map(gap => (sum += gap))]
}
