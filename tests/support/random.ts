/** A seeded source of random choices, so that a run of tests is the same everywhere. */
export interface Random {
  /** From 0 to below 1. */
  readonly share: () => number
  /** A whole number from `least` to `most`, both included. */
  readonly whole: (least: number, most: number) => number
  readonly pick: <T>(from: readonly T[]) => T
}

/** The mulberry32 generator: small, fast, and even enough for tests. */
export function randomFrom(seed: number): Random {
  let state = seed >>> 0
  const share = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
  const whole = (least: number, most: number) => least + Math.floor(share() * (most - least + 1))
  const pick = <T>(from: readonly T[]): T => {
    const found = from[whole(0, from.length - 1)]
    if (found === undefined) throw new Error('there is nothing to pick from')
    return found
  }
  return { share, whole, pick }
}
