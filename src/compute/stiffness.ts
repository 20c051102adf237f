/** Stiffness of a wall from its construction, length and height. */

import { type Formula, formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Construction, Ends } from '../model/construction.ts'
import type { Assumption } from '../model/scope.ts'
import type { BuiltWall, Wall } from '../model/walls.ts'
import { segment } from './segment.ts'
import { c, k, L, s, x1, x2, y1, y2 } from './symbols.ts'

const E = sym('E', 'E', 'modulus')
const G = sym('G', 'G', 'modulus')
const nu = sym('nu', '\\nu', 'number')
const t = sym('t', 't', 'thickness')
export const h = sym('h', 'h', 'length')
const fm = sym('fm', "f'_{m}", 'strength')
const fc = sym('fc', "f'_{c}", 'strength')

const modulusOf = {
  // Seen in Taly, p. 128 (MSJC-08 1.8.2.2); the clause number of the later editions is from memory.
  'concrete masonry': formula({
    gives: E,
    body: '900*fm',
    of: [fm],
    source: 'TMS 402 4.2.2, concrete masonry (clause number unchecked)',
  }),
  'clay masonry': formula({
    gives: E,
    body: '700*fm',
    of: [fm],
    source: 'TMS 402 4.2.2, clay masonry (clause number unchecked)',
  }),
  // From memory, as the reference has it.
  concreteUS: formula({
    gives: E,
    body: '57000*sqrt(fc*(1 psi))',
    of: [fc],
    source: 'ACI 318-19 19.2.2.1, normal weight (unchecked)',
  }),
  concreteSI: formula({
    gives: E,
    body: '4700*sqrt(fc*(1 MPa))',
    of: [fc],
    source: 'ACI 318M-19 19.2.2.1, normal weight (unchecked)',
  }),
}

const shearModulus = {
  byPoisson: formula({ gives: G, body: 'E/(2*(1 + nu))', of: [E, nu], source: 'isotropic elasticity' }),
  byShare: formula({
    gives: G,
    body: '0.4*E',
    of: [E],
    source: 'TMS 402 4.2.2 for masonry (clause number unchecked); common practice for concrete',
  }),
}

const BEAM = 'beam theory, flexure and shear'
const uncracked = ['shape factor 1.2', 'uncracked section']

// derived: Δ/V = h³/(αEI) + 1.2h/(GA) with I = tL³/12 and A = tL; α is 3 for a cantilever and 12 with
// both ends held. Taly, p. 450, prints the first with G = 0.4E.
export const wallStiffness = {
  cantilever: formula({
    gives: k,
    body: 'E*t/(4*(h/L)^3 + 3*(h/L))',
    of: [E, t, h, L],
    source: BEAM,
    assumes: ['fixed at the foot, free at the head', 'G = 0.4 E', ...uncracked],
  }),
  fixed: formula({
    gives: k,
    body: 'E*t/((h/L)^3 + 3*(h/L))',
    of: [E, t, h, L],
    source: BEAM,
    assumes: ['both ends held', 'G = 0.4 E', ...uncracked],
  }),
  cantileverWithG: formula({
    gives: k,
    body: 'E*t/(4*(h/L)^3 + 1.2*(E/G)*(h/L))',
    of: [E, t, h, L, G],
    source: BEAM,
    assumes: ['fixed at the foot, free at the head', ...uncracked],
  }),
  fixedWithG: formula({
    gives: k,
    body: 'E*t/((h/L)^3 + 1.2*(E/G)*(h/L))',
    of: [E, t, h, L, G],
    source: BEAM,
    assumes: ['both ends held', ...uncracked],
  }),
}

const direction = {
  c: formula({ gives: c, body: '(x_2 - x_1)/L', of: [x1, x2, L], source: 'geometry' }),
  s: formula({ gives: s, body: '(y_2 - y_1)/L', of: [y1, y2, L], source: 'geometry' }),
}

export interface WallLine {
  readonly L: Value
  /** Midpoint. */
  readonly x: Value
  readonly y: Value
  /** Cosine and sine of its direction. */
  readonly c: Value
  readonly s: Value
}

export function workLine({ name, from, to }: Wall, level: string, display: Display): WallLine {
  const id = `${level}.wall.${name}`
  const ends = { x_1: from.x, y_1: from.y, x_2: to.x, y_2: to.y }
  const length = work(`${id}.L`, segment.L, ends, display, [name])
  return {
    L: length,
    x: work(`${id}.x`, segment.x, { x_1: from.x, x_2: to.x }, display, [name]),
    y: work(`${id}.y`, segment.y, { y_1: from.y, y_2: to.y }, display, [name]),
    c: work(`${id}.c`, direction.c, { x_1: from.x, x_2: to.x, L: length }, display, [name]),
    s: work(`${id}.s`, direction.s, { y_1: from.y, y_2: to.y, L: length }, display, [name]),
  }
}

export interface Moduli {
  readonly E: Value
  readonly G: Value
  /** True when G is 0.4 E, which has formulas of its own. */
  readonly commonShear: boolean
}

/** Moduli of a construction: stated, or worked from its strength. */
export function workModuli(
  construction: Construction,
  display: Display,
  assume: (assumption: Assumption) => void,
): Moduli {
  const { name, nu, G: stated } = construction
  const id = `constructions.${name}`
  const E =
    construction.E ??
    work(
      `${id}.E`,
      modulusFor(construction, display),
      { [strengthName(construction)]: strengthOf(construction) },
      display,
      [name],
    )
  if (stated) return { E, G: stated, commonShear: false }
  if (nu) return { E, G: work(`${id}.G`, shearModulus.byPoisson, { E, nu }, display, [name]), commonShear: false }
  assume({ text: `The shear modulus of ${verbatim(name)} is 0.4 E.`, because: 'neither G nor nu is stated' })
  return { E, G: work(`${id}.G`, shearModulus.byShare, { E }, display, [name]), commonShear: true }
}

function modulusFor({ material }: Construction, { system }: Display) {
  switch (material) {
    case 'concrete':
      return system === 'US' ? modulusOf.concreteUS : modulusOf.concreteSI
    case 'concrete masonry':
    case 'clay masonry':
      return modulusOf[material]
    case 'section':
      throw new Error('a section states its modulus')
  }
}

const strengthName = ({ material }: Construction): string => (material === 'concrete' ? 'fc' : 'fm')

function strengthOf({ name, strength }: Construction): Value {
  if (!strength) throw new Error(`${name} has neither a modulus nor a strength`)
  return strength
}

/** Stiffness of a built wall along its own line. */
export function workStiffness(
  wall: BuiltWall,
  length: Value,
  construction: Construction,
  moduli: Moduli,
  level: string,
  display: Display,
): Value {
  const inputs = { ...elastic(construction, moduli), h: wall.height, L: length }
  return work(`${level}.wall.${wall.name}.k`, stiffnessOf(construction.ends, moduli), inputs, display, [wall.name])
}

/** The formula of a solid rectangle: G has a letter of its own where it is not 0.4 E. */
export function stiffnessOf(ends: Ends, { commonShear }: Moduli): Formula {
  if (commonShear) return wallStiffness[ends]
  return ends === 'cantilever' ? wallStiffness.cantileverWithG : wallStiffness.fixedWithG
}

/** What its formula needs beside the height and the length. */
export const elastic = ({ t }: Construction, { E, G, commonShear }: Moduli): Readonly<Record<string, Value>> =>
  commonShear ? { E, t } : { E, G, t }
