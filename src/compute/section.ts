/** What a wall that runs through several storeys is made of in one of them. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Construction } from '../model/construction.ts'
import type { BuiltWall } from '../model/walls.ts'
import type { Moduli } from './stiffness.ts'
import { k, L } from './symbols.ts'

export interface WallSection {
  readonly EI: Value
  readonly GA: Value
}

export const bending = sym('EI', 'E\\,I', 'bendingStiffness')
export const shearing = sym('GA', 'G\\,A_v', 'shearStiffness')
const E = sym('E', 'E', 'modulus')
const G = sym('G', 'G', 'modulus')
const t = sym('t', 't', 'thickness')
const h = sym('h', 'h', 'length')

const RECTANGLE = 'rectangular section'
const uncracked = ['uncracked section']
// derived: what is left of the storey's deflection 1/k once flexure is taken off, as for a wall without openings.
const PIERCED = 'shear part of the deflection of the storey, h/(G A_v) = 1/k less its flexure (derived)'

const sections = {
  EI: formula({ gives: bending, body: 'E*t*L^3/12', of: [E, t, L], source: RECTANGLE, assumes: uncracked }),
  GA: formula({
    gives: shearing,
    body: 'G*t*L/1.2',
    of: [G, t, L],
    source: RECTANGLE,
    assumes: ['shape factor 1.2', ...uncracked],
  }),
  pierced: {
    cantilever: formula({ gives: shearing, body: 'h/(1/k - h^3/(3*EI))', of: [h, k, bending], source: PIERCED }),
    fixed: formula({ gives: shearing, body: 'h/(1/k - h^3/(12*EI))', of: [h, k, bending], source: PIERCED }),
  },
}

/**
 * E I and G A_v of a wall in one storey. Openings are counted in its shear stiffness: it is such that the storey, worked on
 * its own, keeps the stiffness that its strips and piers have.
 *
 * @param pierced the storey's stiffness, of a wall with openings
 */
export function workSection(
  wall: BuiltWall,
  length: Value,
  { t: thickness, ends }: Construction,
  { E: modulus, G: shear }: Moduli,
  pierced: Value | undefined,
  level: string,
  display: Display,
): WallSection {
  const id = `${level}.wall.${wall.name}`
  const about = [wall.name]
  const EI = work(`${id}.EI`, sections.EI, { E: modulus, t: thickness, L: length }, display, about)
  const GA = pierced
    ? work(`${id}.GA`, sections.pierced[ends], { h: wall.height, k: pierced, EI }, display, about)
    : work(`${id}.GA`, sections.GA, { G: shear, t: thickness, L: length }, display, about)
  // An opening only softens a wall, so there is always a shear part left.
  if (!(GA.si > 0)) throw new Error(`${GA.id} is ${GA.si}`)
  return { EI, GA }
}
