/**
 * Storey shear to the walls through a rigid diaphragm: direct and torsional
 * shear in every case, the design shear of each wall, and equilibrium.
 *
 * x to the right, y up, moments counter-clockwise; e = CM − CR for an earthquake. A case may move
 * its force across its line: in EX+ the mass is moved toward positive y.
 */
import { type Formula, formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value, Word } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'
import { type Case, caseOnPage, type Loading } from './cases.ts'
import { designTable, governingCase } from './design.ts'
import { type Residual, residualOf } from './equilibrium.ts'
import type { Acting } from './loading.ts'
import type { Rigidity } from './rigidity.ts'
import { caseShear, type Eccentricity, storeyShear, workEccentricity, workMoment } from './storey.ts'
import { c, J, Kxx, Kxy, Kyy, k, phi, rho, s, T, u0, V, Vx, Vy, v0 } from './symbols.ts'

/** What acts at and above a storey of one loading, and the cases made of it. */
export interface Load {
  readonly loading: Loading
  readonly cases: readonly Case[]
  /** From the top down, the storey's own level last. */
  readonly acting: readonly Acting[]
}

/** A load with what it comes to at a storey. */
export interface StoreyLoad extends Load {
  readonly storey: Along
  readonly eccentricity: Eccentricity
}

/** Storey shears along the axes on which any force acts. */
export interface Along {
  readonly x?: Value
  readonly y?: Value
}

export interface CaseResult {
  readonly case: Case
  /** The storey shear in the case. */
  readonly shear: Along
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
  readonly loads: readonly StoreyLoad[]
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
  skew: {
    u: formula({ gives: u0, body: '(K_yy*V_x - K_xy*V_y)/D', of: [Kyy, Vx, Kxy, Vy, D], source: DIAPHRAGM }),
    v: formula({ gives: v0, body: '(K_xx*V_y - K_xy*V_x)/D', of: [Kxx, Vy, Kxy, Vx, D], source: DIAPHRAGM }),
  },
  phi: formula({ gives: phi, body: 'T/J', of: [T, J], source: DIAPHRAGM }),
}

// Direct shear by share of stiffness and torsional shear by k ρ / J: Taly, pp. 508-511 (Ex. 7.12).
export const wallShear = {
  directX: formula({ gives: Vd, body: 'V_x*k*c/K_xx', of: [Vx, k, c, Kxx], source: DIAPHRAGM }),
  directY: formula({ gives: Vd, body: 'V_y*k*s/K_yy', of: [Vy, k, s, Kyy], source: DIAPHRAGM }),
  directBoth: formula({
    gives: Vd,
    body: 'V_x*k*c/K_xx + V_y*k*s/K_yy',
    of: [Vx, k, c, Kxx, Vy, s, Kyy],
    source: DIAPHRAGM,
  }),
  directSkew: formula({ gives: Vd, body: 'k*(c*u_0 + s*v_0)', of: [k, c, u0, s, v0], source: DIAPHRAGM }),
  torsional: formula({ gives: Vt, body: 'T*k*rho/J', of: [T, k, rho, J], source: DIAPHRAGM }),
  total: formula({ gives: V, body: 'V_d + V_t', of: [Vd, Vt], source: 'both act along the wall' }),
}

/** @param loads at least one */
export function workDistribution(rigidity: Rigidity, loads: readonly Load[], display: Display): Distribution {
  const { level } = rigidity
  const acting = loads.map(load => actOnStorey(load, rigidity, display))
  const cases = acting.flatMap(load => load.cases.map(each => workCase(each, rigidity, load, display)))
  return { level, loads: acting, cases, ...designed(rigidity, cases, display) }
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

function actOnStorey(load: Load, rigidity: Rigidity, display: Display): StoreyLoad {
  const { level } = rigidity
  const { loading, acting } = load
  const own = acting.at(-1)
  if (!own) throw new Error(`nothing of ${loading} acts on ${level}`)
  const axes = (['x', 'y'] as const).filter(axis => acting.some(({ force }) => force[axis]))
  return {
    ...load,
    storey: Object.fromEntries(axes.map(axis => [axis, storeyShear(level, axis, loading, acting, display)])),
    eccentricity: workEccentricity(level, loading, own.at, rigidity, display),
  }
}

function workCase(each: Case, rigidity: Rigidity, load: StoreyLoad, display: Display): CaseResult {
  const { level } = rigidity
  const shear: Along = Object.fromEntries(
    each.parts.map(part => {
      const whole = load.storey[part.axis]
      if (!whole) throw new Error(`case ${each.name} has no storey shear along ${part.axis}`)
      return [part.axis, caseShear(level, each, part, whole, display)]
    }),
  )
  const { moment, moments } = workMoment(each, rigidity, load.acting, load.eccentricity, display)
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
    residual: residualOf(level, each, walls, load.acting, shear, display),
  }
}

/** V_d, V_t and V of every wall from what acts on the level in a case. */
export function wallShears(
  each: Case,
  rigidity: Rigidity,
  acts: { readonly shear: Along; readonly moment: Value; readonly u: Value; readonly v: Value },
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
  { name }: Case,
  { K, orthogonal }: Rigidity,
  { x, y }: Along,
  { u, v }: { readonly u: Value; readonly v: Value },
): void {
  const key = `Vd.${name}`
  const about = [caseOnPage(name)]
  if (!orthogonal) walls.work(wallShear.directSkew, { k: 'k', c: 'c', u_0: u, s: 's', v_0: v }, key, about)
  else if (x && y)
    walls.work(wallShear.directBoth, { V_x: x, V_y: y, k: 'k', c: 'c', s: 's', K_xx: K.xx, K_yy: K.yy }, key, about)
  else if (x) walls.work(wallShear.directX, { V_x: x, k: 'k', c: 'c', K_xx: K.xx }, key, about)
  else if (y) walls.work(wallShear.directY, { V_y: y, k: 'k', s: 's', K_yy: K.yy }, key, about)
}

/** The formulas and inputs of u and v where an axis has a force, or is coupled with one that has. */
function moved(
  each: Case,
  { level, K, D, orthogonal }: Rigidity,
  { x, y }: Along,
  display: Display,
): { readonly u: Value; readonly v: Value } {
  const about = caseOnPage(each.name)
  const at = { u: `${level}.u.${each.name}`, v: `${level}.v.${each.name}` }
  const moves = (of: 'u' | 'v', rule: Formula, inputs: Readonly<Record<string, Value>>): Value =>
    work(at[of], rule, inputs, display, [about])
  const { xx, yy, xy } = K
  if (orthogonal || !xy || !D) {
    const still = (of: 'u' | 'v', { tex, ...kind }: Sym): Value => ({
      id: at[of],
      tex: texAbout(tex, about),
      si: 0,
      ...shownAs({ tex, ...kind }, display),
      origin: { kind: 'measured', what: `no part of the force of ${about} acts this way`, spans: [] },
    })
    return {
      u: x ? moves('u', movement.along.u, { V_x: x, K_xx: xx }) : still('u', u0),
      v: y ? moves('v', movement.along.v, { V_y: y, K_yy: yy }) : still('v', v0),
    }
  }
  if (x && y) {
    const inputs = { K_xx: xx, K_yy: yy, K_xy: xy, V_x: x, V_y: y, D }
    return { u: moves('u', movement.skew.u, inputs), v: moves('v', movement.skew.v, inputs) }
  }
  if (x)
    return {
      u: moves('u', movement.skewX.u, { K_yy: yy, V_x: x, D }),
      v: moves('v', movement.skewX.v, { K_xy: xy, V_x: x, D }),
    }
  if (y)
    return {
      u: moves('u', movement.skewY.u, { K_xy: xy, V_y: y, D }),
      v: moves('v', movement.skewY.v, { K_xx: xx, V_y: y, D }),
    }
  throw new Error(`case ${each.name} has no force`)
}
