/** Puts formulas to work on values. */
import { type Formula, run, type Sym } from './formula.ts'
import { type Display, roundingOfKind, unitOfKind } from './kind.ts'
import { texWords } from './typeset.ts'
import type { Value } from './value.ts'

/** A symbol's TeX with more said below it: `k` about W1 is k_{W1}, `K_{xx}` about roof is K_{xx,roof}. */
export function texAbout(tex: string, ...about: readonly string[]): string {
  if (about.length === 0) return tex
  const words = about.map(texWords).join('{,}')
  const below = /^(.*)_(?:\{(.*)\}|(\w))$/s.exec(tex)
  return below ? `${below[1]}_{${below[2] ?? below[3]}{,}${words}}` : `${tex}_{${words}}`
}

/**
 * One step: the formula's value under an id, from the values of its symbols.
 * @param about what tells this value's letter from others of its kind, such as the wall's name
 */
export function work(
  id: string,
  formula: Formula,
  inputs: Readonly<Record<string, Value>>,
  display: Display,
  about: readonly string[] = [],
): Value {
  const numbers: Record<string, number> = {}
  const used = new Map<string, Value>()
  for (const name of formula.symbols.keys()) {
    const input = inputs[name]
    if (!input) throw new Error(`${id} has no ${name} to work with`)
    numbers[name] = input.si
    used.set(name, input)
  }
  const si = run(formula, numbers)
  if (typeof si !== 'number') throw new Error(`${id} came out as a column`)
  return {
    id,
    tex: texAbout(formula.gives.tex, ...about),
    si,
    ...shownAs(formula.gives, display),
    origin: { kind: 'worked', step: { formula, inputs: used } },
  }
}

/** How values of a symbol print. */
export function shownAs({ kind }: Sym, display: Display): Pick<Value, 'unit' | 'rounding'> {
  return { unit: unitOfKind(kind, display), rounding: roundingOfKind(kind) }
}
