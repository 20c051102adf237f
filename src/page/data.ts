/** The page's trace, read from its island: values by id, and which results rest on each. */
import type { Island, IslandFormula, IslandValue } from '../render/island.ts'

export type { IslandValue }

export interface Data {
  readonly find: (id: string) => IslandValue | undefined
  /** The values put in, each with the letter that the formula has for it. */
  readonly inputs: (value: IslandValue) => readonly Input[]
  /** How many of the values put in the page does not carry. */
  readonly missing: (value: IslandValue) => number
  readonly uses: (id: string) => readonly IslandValue[]
  readonly formula: (value: IslandValue) => IslandFormula | undefined
  /** The pieces of a formula as it was set when the page was made. */
  readonly pieces: (formula: IslandFormula) => readonly string[]
  /** Values that the engineer wrote, which a value comes down to; each once, in the order of the walk. */
  readonly roots: (value: IslandValue) => readonly IslandValue[]
  readonly line: (number: number) => string
}

export interface Input {
  /** In TeX. */
  readonly letter: string
  readonly value: IslandValue
}

export function readData({ values, formulas, pieces, lines }: Island): Data {
  const byId = new Map(values.map(value => [value[0], value]))
  const usesOf = new Map<string, Set<IslandValue>>()
  for (const value of values)
    for (const { value: input } of inputs(value)) {
      const known = usesOf.get(input[0]) ?? new Set()
      usesOf.set(input[0], known.add(value))
    }

  function inputs(value: IslandValue): readonly Input[] {
    if (value[3] !== 'worked') return []
    const symbols = formulas[value[5]]?.[4]
    return value[6].flatMap((at, i) => {
      const input = values[at]
      return input ? [{ letter: symbols?.[i] ?? input[1], value: input }] : []
    })
  }

  function roots(value: IslandValue): readonly IslandValue[] {
    const seen = new Set<IslandValue>()
    const found: IslandValue[] = []
    const waiting = [value]
    for (let next = waiting.pop(); next; next = waiting.pop()) {
      if (seen.has(next)) continue
      seen.add(next)
      if (next !== value && next[3] === 'given') found.push(next)
      waiting.push(
        ...inputs(next)
          .map(({ value }) => value)
          .reverse(),
      )
    }
    return found
  }

  return {
    find: id => byId.get(id),
    inputs,
    missing: value => (value[3] === 'worked' ? value[6].filter(at => at === -1).length : 0),
    uses: id => [...(usesOf.get(id) ?? [])],
    formula: value => (value[3] === 'worked' ? formulas[value[5]] : undefined),
    pieces: ([set]) => set.flatMap(at => pieces.slice(at, at + 1)),
    roots,
    line: number => lines[number] ?? '',
  }
}
