/** Letters and formulas of a wall with openings. */
import { type Formula, formula, sym } from '../base/formula.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import { h } from './stiffness.ts'
import { k, L } from './symbols.ts'

export const position = {
  a1: sym('a_1', 'a_1', 'length'),
  a2: sym('a_2', 'a_2', 'length'),
  z1: sym('z_1', 'z_1', 'length'),
  z2: sym('z_2', 'z_2', 'length'),
}
export const start = sym('a', 'a', 'length')
export const foot = sym('z', 'z', 'length')
const left = sym('l', '\\ell', 'length')
const sill = sym('s', 's', 'length')
const width = sym('b', 'b', 'length')
export const solid = sym('k_o', 'k_o', 'stiffness')
export const strip = sym('k_s', 'k_s', 'stiffness')
export const sum = sym('K', 'K', 'stiffness')

const GEOMETRY = 'geometry'
export const edges = {
  right: formula({ gives: position.a2, body: 'l + b', of: [left, width], source: GEOMETRY }),
  head: formula({ gives: position.z2, body: 's + h', of: [sill, h], source: GEOMETRY }),
  L: formula({ gives: L, body: 'a_2 - a_1', of: [position.a1, position.a2], source: GEOMETRY }),
  h: formula({ gives: h, body: 'z_2 - z_1', of: [position.z1, position.z2], source: GEOMETRY }),
}

const SIDE_BY_SIDE = 'stiffnesses side by side add up: Taly, Design of Reinforced Masonry Structures, Example 7.7'
const METHOD =
  'solid wall less strips plus piers: Taly, Design of Reinforced Masonry Structures, p. 7.26, Method B; TI 809-04, Appendix H, example H1'
const assumes = [
  'piers beside openings, and the solid strips that they take the place of, are held at both ends',
  'what is solid above and below a strip of openings does not turn',
]

/** Another letter for what a formula gives. */
export const giving = (of: Formula, gives: typeof k): Formula => ({ ...of, gives })

const exchanges = new Map<string, Formula>()

/** 1/k of what holds these strips, each with its letters. */
export function exchange(names: readonly string[]): Formula {
  const known = exchanges.get(names.join())
  if (known) return known
  const of = names.flatMap(name => [
    sym(`k_s${name}`, texAbout(strip.tex, name), 'stiffness'),
    sym(`K_${name}`, texAbout(sum.tex, name), 'stiffness'),
  ])
  const terms = names.map(name => ` - 1/k_s${name} + 1/K_${name}`)
  const made = formula({ gives: k, body: `1/(1/k_o${terms.join('')})`, of: [solid, ...of], source: METHOD, assumes })
  exchanges.set(names.join(), made)
  return made
}

/** A longer sum is told by its sign and its table. */
const SPELT_OUT = 6

/** Stiffnesses of what stands side by side, as a sum of its terms. */
export function sumOf(parts: Tabulation, of: typeof k, id: string, about: readonly string[]): Value {
  const value = parts.sum('k', of, id)
  const tex = texAbout(of.tex, ...about)
  if (value.origin.kind !== 'worked') return { ...value, tex }
  const { formula: summed, inputs } = value.origin.step
  const { inShort = '', ...terms } = summed
  const told = { ...terms, source: SIDE_BY_SIDE }
  const shown: Formula = parts.rows.length > SPELT_OUT ? { ...told, inShort } : told
  return { ...value, tex, origin: { kind: 'worked', step: { formula: shown, inputs } } }
}
