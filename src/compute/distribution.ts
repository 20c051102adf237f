/**
 * Storey shear to the walls through a rigid diaphragm: direct and torsional
 * shear in every case, the design shear of each wall, and equilibrium.
 *
 * x to the right, y up, moments counter-clockwise; e = CM − CR. A case moves the
 * mass across its force by the accidental arm: in EX+ toward positive y.
 */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value, Word } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'
import { type Axis, type Case, caseOnPage, casesOf } from './cases.ts'
import { designTable, governingCase } from './design.ts'
import { type Residual, residualOf } from './equilibrium.ts'
import type { Rigidity } from './rigidity.ts'
import { type Acting, type Eccentricity, storeyShear, workEccentricity, workMoment } from './storey.ts'
import { c, J, Kxx, Kxy, Kyy, k, phi, rho, s, T, u0, V, Vx, Vy, v0 } from './symbols.ts'

export interface CaseResult {
  readonly case: Case
  /** The storey shear along the case's axis. */
  readonly shear: Value
  /** Moment of the storey's forces about the centre of rigidity. */
  readonly moment: Value
  /** One row a level, where several act. */
  readonly moments?: Tabulation
  /** Displacement of the centre of rigidity and rotation. */
  readonly u: Value
  readonly v: Value
  readonly phi: Value
  /** V_d, V_t and V of every wall. */
  readonly walls: Tabulation
  readonly residual: Residual
}

export interface Distribution {
  readonly level: string
  readonly eccentricity: Eccentricity
  readonly acting: readonly Acting[]
  readonly storey: { readonly x?: Value; readonly y?: Value }
  readonly cases: readonly CaseResult[]
  /** V in each case, the design shear V and the unit shear v of every wall. */
  readonly design: Tabulation
  readonly governingCase: (wallIdx: number) => Word
  /** Index of the wall of largest unit shear. */
  readonly governingWall: number
}

const D = sym('D', 'D', 'stiffnessSquared')
const Vd = sym('V_d', 'V_d', 'force')
const Vt = sym('V_t', 'V_t', 'force')

const DIAPHRAGM = 'rigid diaphragm on springs (derived)'

export const movement = {
  along: {
    u: formula({ gives: u0, body: 'V_x/K_xx', of: [Vx, Kxx], source: DIAPHRAGM }),
    v: formula({ gives: v0, body: 'V_y/K_yy', of: [Vy, Kyy], source: DIAPHRAGM }),
  },
  skewX: {
    u: formula({ gives: u0, body: 'K_yy*V_x/D', of: [Kyy, Vx, D], source: DIAPHRAGM }),
    v: formula({ gives: v0, body: '-K_xy*V_x/D', of: [Kxy, Vx, D], source: DIAPHRAGM }),
  },
  skewY: {
    u: formula({ gives: u0, body: '-K_xy*V_y/D', of: [Kxy, Vy, D], source: DIAPHRAGM }),
    v: formula({ gives: v0, body: 'K_xx*V_y/D', of: [Kxx, Vy, D], source: DIAPHRAGM }),
  },
  phi: formula({ gives: phi, body: 'T/J', of: [T, J], source: DIAPHRAGM }),
}

// Direct shear by share of stiffness and torsional shear by k ρ / J: Taly, pp. 508-511 (Ex. 7.12).
export const wallShear = {
  directX: formula({ gives: Vd, body: 'V_x*k*c/K_xx', of: [Vx, k, c, Kxx], source: DIAPHRAGM }),
  directY: formula({ gives: Vd, body: 'V_y*k*s/K_yy', of: [Vy, k, s, Kyy], source: DIAPHRAGM }),
  directSkew: formula({ gives: Vd, body: 'k*(c*u_0 + s*v_0)', of: [k, c, u0, s, v0], source: DIAPHRAGM }),
  torsional: formula({ gives: Vt, body: 'T*k*rho/J', of: [T, k, rho, J], source: DIAPHRAGM }),
  total: formula({ gives: V, body: 'V_d + V_t', of: [Vd, Vt], source: 'both act along the wall' }),
}

export function workDistribution(
  rigidity: Rigidity,
  acting: readonly Acting[],
  mass: Acting['mass'],
  display: Display,
): Distribution {
  const { level } = rigidity
  const e = workEccentricity(level, mass, rigidity, display)
  const axes = (['x', 'y'] as const).filter(axis => acting.some(({ force }) => force[axis]))
  const storey = Object.fromEntries(axes.map(axis => [axis, storeyShear(level, axis, acting, display)])) as {
    readonly [A in Axis]?: Value
  }
  const cases = casesOf(axes).map(each => workCase(each, rigidity, acting, storey[each.axis], e, display))
  return { level, eccentricity: e, acting, storey, cases, ...designed(rigidity, cases, display) }
}

/** The design shears that follow from the shears of all cases, and what governs them. */
export function designed(
  rigidity: Rigidity,
  cases: readonly CaseResult[],
  display: Display,
): Pick<Distribution, 'design' | 'governingCase' | 'governingWall'> {
  const design = designTable(rigidity, cases, display)
  const largest = design.column('v').numbers
  return {
    design,
    governingCase: wallIdx => governingCase(rigidity.level, cases, design, wallIdx),
    governingWall: largest.reduce((best, value, i) => (value > (largest[best] ?? 0) * (1 + 1e-12) ? i : best), 0),
  }
}

function workCase(
  each: Case,
  rigidity: Rigidity,
  acting: readonly Acting[],
  shear: Value | undefined,
  e: Eccentricity,
  display: Display,
): CaseResult {
  if (!shear) throw new Error(`case ${each.name} has no storey shear`)
  const { level } = rigidity
  const { moment, moments } = workMoment(each, rigidity, acting, e, display)
  const move = moved(each, rigidity, shear, display)
  const walls = wallShears(each, rigidity, { shear, moment, ...move }, display)
  return {
    case: each,
    shear,
    moment,
    ...(moments ? { moments } : {}),
    ...move,
    phi: work(`${level}.phi.${each.name}`, movement.phi, { T: moment, J: rigidity.J }, display, [
      caseOnPage(each.name),
    ]),
    walls,
    residual: residualOf(level, each, walls, acting, shear, display),
  }
}

/** V_d, V_t and V of every wall from what acts on the level in a case. */
export function wallShears(
  each: Case,
  rigidity: Rigidity,
  acts: { readonly shear: Value; readonly moment: Value; readonly u: Value; readonly v: Value },
  display: Display,
): Tabulation {
  const { level, walls: known, J } = rigidity
  const about = [caseOnPage(each.name)]
  const walls = new Tabulation(known.rows, (row, key) => `${level}.wall.${row}.${key}`, display)
  for (const name of ['k', 'c', 's', 'rho', 'x', 'y']) walls.takeColumn(known.column(name))
  directShear(walls, each, rigidity, acts.shear, acts)
  return walls
    .work(wallShear.torsional, { T: acts.moment, k: 'k', rho: 'rho', J }, `Vt.${each.name}`, about)
    .work(wallShear.total, { V_d: 'V_d', V_t: 'V_t' }, `V.${each.name}`, about)
}

function directShear(
  walls: Tabulation,
  { name, axis }: Case,
  { K, orthogonal }: Rigidity,
  shear: Value,
  { u, v }: { readonly u: Value; readonly v: Value },
): void {
  const key = `Vd.${name}`
  const about = [caseOnPage(name)]
  if (!orthogonal) walls.work(wallShear.directSkew, { k: 'k', c: 'c', u_0: u, s: 's', v_0: v }, key, about)
  else if (axis === 'x') walls.work(wallShear.directX, { V_x: shear, k: 'k', c: 'c', K_xx: K.xx }, key, about)
  else walls.work(wallShear.directY, { V_y: shear, k: 'k', s: 's', K_yy: K.yy }, key, about)
}

function moved(
  { name, axis }: Case,
  { level, K, D, orthogonal }: Rigidity,
  shear: Value,
  display: Display,
): { readonly u: Value; readonly v: Value } {
  const [idU, idV] = [`${level}.u.${name}`, `${level}.v.${name}`]
  if (orthogonal || !K.xy || !D) {
    const still = (id: string, of: Sym): Value => ({
      id,
      tex: texAbout(of.tex, caseOnPage(name)),
      si: 0,
      ...shownAs(of, display),
      origin: { kind: 'measured', what: `no part of the force of ${caseOnPage(name)} acts this way`, spans: [] },
    })
    if (axis === 'x')
      return {
        u: work(idU, movement.along.u, { V_x: shear, K_xx: K.xx }, display, [caseOnPage(name)]),
        v: still(idV, v0),
      }
    return {
      u: still(idU, u0),
      v: work(idV, movement.along.v, { V_y: shear, K_yy: K.yy }, display, [caseOnPage(name)]),
    }
  }
  const { xx, yy, xy } = K
  if (axis === 'x')
    return {
      u: work(idU, movement.skewX.u, { K_yy: yy, V_x: shear, D }, display, [caseOnPage(name)]),
      v: work(idV, movement.skewX.v, { K_xy: xy, V_x: shear, D }, display, [caseOnPage(name)]),
    }
  return {
    u: work(idU, movement.skewY.u, { K_xy: xy, V_y: shear, D }, display, [caseOnPage(name)]),
    v: work(idV, movement.skewY.v, { K_xx: xx, V_y: shear, D }, display, [caseOnPage(name)]),
  }
}
