/**
 * Plan stiffness of walls at any angle, tied by a rigid diaphragm: centre of rigidity, principal
 * axes, torsional stiffness. Where every wall lies along an axis the scalar sums are worked
 * instead, which come to the same.
 */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { WallLine } from './stiffness.ts'
import { c, J, Kxx, Kxy, Kyy, k, rho, s, x, xr, y, yr } from './symbols.ts'

/** A wall with its stiffness along its own line. */
export interface Spring extends WallLine {
  readonly name: string
  readonly k: Value
}

export interface Rigidity {
  readonly level: string
  readonly springs: readonly Spring[]
  /** True when every wall lies along x or y. */
  readonly orthogonal: boolean
  readonly K: { readonly xx: Value; readonly yy: Value; readonly xy?: Value }
  /** Kxx Kyy − Kxy², where the walls are not orthogonal. */
  readonly D?: Value
  readonly x: Value
  readonly y: Value
  readonly J: Value
  /** Angle of the stiffer principal axis from x, where the walls are not orthogonal. */
  readonly angle?: Value
  /** Columns of every wall, with those of the sums and of the arms. */
  readonly walls: Tabulation
  readonly sums: readonly Value[]
}

const kx = sym('k_x', 'k_x', 'stiffness')
const ky = sym('k_y', 'k_y', 'stiffness')
const kxy = sym('k_xy', 'k_{xy}', 'stiffness')
const kxY = sym('k_x_y', 'k_x\\,y', 'stiffnessMoment')
const kyX = sym('k_y_x', 'k_y\\,x', 'stiffnessMoment')
const arm = sym('r', 'r', 'length')
const kxr = sym('k_xr', 'k_{x\\varphi}', 'stiffnessMoment')
const kyr = sym('k_yr', 'k_{y\\varphi}', 'stiffnessMoment')
const kRho2 = sym('k_rho2', 'k\\,{\\rho}^{2}', 'torsionalStiffness')
const Kxr = sym('K_xr', 'K_{x\\varphi}', 'stiffnessMoment')
const Kyr = sym('K_yr', 'K_{y\\varphi}', 'stiffnessMoment')
const sumKxY = sym('sum_kx_y', '\\sum k_x\\,y', 'stiffnessMoment')
const sumKyX = sym('sum_ky_x', '\\sum k_y\\,x', 'stiffnessMoment')
const determinant = sym('D', 'D', 'stiffnessSquared')
const alpha = sym('alpha', '\\alpha', 'angle')

const DIAPHRAGM = 'rigid diaphragm on springs (derived)'

const column = {
  kx: formula({ gives: kx, body: 'k*c^2', of: [k, c], source: DIAPHRAGM }),
  ky: formula({ gives: ky, body: 'k*s^2', of: [k, s], source: DIAPHRAGM }),
  kxy: formula({ gives: kxy, body: 'k*c*s', of: [k, c, s], source: DIAPHRAGM }),
  kxY: formula({ gives: kxY, body: 'k_x*y', of: [kx, y], source: DIAPHRAGM }),
  kyX: formula({ gives: kyX, body: 'k_y*x', of: [ky, x], source: DIAPHRAGM }),
  arm: formula({ gives: arm, body: 'x*s - y*c', of: [x, s, y, c], source: 'arm about the origin' }),
  kxr: formula({ gives: kxr, body: 'k*c*r', of: [k, c, arm], source: DIAPHRAGM }),
  kyr: formula({ gives: kyr, body: 'k*s*r', of: [k, s, arm], source: DIAPHRAGM }),
  rho: formula({
    gives: rho,
    body: '(x - x_r)*s - (y - y_r)*c',
    of: [x, xr, s, y, yr, c],
    source: 'arm about the centre of rigidity',
  }),
  kRho2: formula({ gives: kRho2, body: 'k*rho^2', of: [k, rho], source: DIAPHRAGM }),
}

// The scalar form is that of Taly, pp. 508-511 (Ex. 7.12); the full form is derived from the three
// equations of equilibrium of the diaphragm, and reduces to it when Kxy = 0.
export const centreOfRigidity = {
  scalarX: formula({
    gives: xr,
    body: 'sum_ky_x/K_yy',
    of: [sumKyX, Kyy],
    source: DIAPHRAGM,
    assumes: ['walls along the axes'],
  }),
  scalarY: formula({
    gives: yr,
    body: 'sum_kx_y/K_xx',
    of: [sumKxY, Kxx],
    source: DIAPHRAGM,
    assumes: ['walls along the axes'],
  }),
  determinant: formula({ gives: determinant, body: 'K_xx*K_yy - K_xy^2', of: [Kxx, Kyy, Kxy], source: DIAPHRAGM }),
  x: formula({
    gives: xr,
    body: '(K_xx*K_yr - K_xy*K_xr)/D',
    of: [Kxx, Kyr, Kxy, Kxr, determinant],
    source: DIAPHRAGM,
  }),
  y: formula({
    gives: yr,
    body: '(K_xy*K_yr - K_yy*K_xr)/D',
    of: [Kxy, Kyr, Kyy, Kxr, determinant],
    source: DIAPHRAGM,
  }),
  angle: formula({
    gives: alpha,
    body: 'atan2(2*K_xy, K_xx - K_yy)/2',
    of: [Kxy, Kxx, Kyy],
    source: 'Mohr’s circle of the plan stiffness',
  }),
}

/** A wall this nearly along an axis is along it: the sine is the rounding of its coordinates. */
const ALONG_AXIS = 1e-9
/** Relative to the whole stiffness: below this a direction has none, and no centre exists. */
const NO_STIFFNESS = 1e-12

export type Unstable =
  | 'no stiffness along x'
  | 'no stiffness along y'
  | 'all walls are parallel'
  | 'all walls meet in one point'

export function workRigidity(level: string, springs: readonly Spring[], display: Display): Outcome<Rigidity, Unstable> {
  const orthogonal = springs.every(({ c, s }) => Math.abs(c.si * s.si) < ALONG_AXIS)
  const walls = new Tabulation(
    springs.map(({ name }) => name),
    (row, key) => `${level}.wall.${row}.${key}`,
    display,
  )
    .take(
      k,
      springs.map(({ k }) => k),
    )
    .take(
      c,
      springs.map(({ c }) => c),
    )
    .take(
      s,
      springs.map(({ s }) => s),
    )
    .take(
      x,
      springs.map(({ x }) => x),
    )
    .take(
      y,
      springs.map(({ y }) => y),
    )
    .work(column.kx, { k: 'k', c: 'c' })
    .work(column.ky, { k: 'k', s: 's' })
  const K = { xx: walls.sum('k_x', Kxx, `${level}.K.xx`), yy: walls.sum('k_y', Kyy, `${level}.K.yy`) }
  const centre = orthogonal ? scalarCentre(level, walls, K, display) : fullCentre(level, walls, K, display)
  if (!centre.ok) return centre
  walls
    .work(column.rho, { x: 'x', x_r: centre.value.x, s: 's', y: 'y', y_r: centre.value.y, c: 'c' })
    .work(column.kRho2, { k: 'k', rho: 'rho' })
  const torsional = walls.sum('k_rho2', J, `${level}.J`)
  // Arms below a hundred-thousandth of the walls' spread are rounding.
  const spread = Math.max(
    ...springs.map(({ x, y }) => Math.hypot(x.si - centre.value.x.si, y.si - centre.value.y.si)),
    1e-3,
  )
  if (torsional.si <= 1e-10 * (K.xx.si + K.yy.si) * spread * spread) return bad('all walls meet in one point')
  return good({ level, springs, orthogonal, ...centre.value, J: torsional, walls })
}

type Centre = Pick<Rigidity, 'K' | 'D' | 'x' | 'y' | 'angle' | 'sums'>
type AxisStiffness = { readonly xx: Value; readonly yy: Value }

function scalarCentre(level: string, walls: Tabulation, K: AxisStiffness, display: Display): Outcome<Centre, Unstable> {
  const total = K.xx.si + K.yy.si
  if (K.xx.si <= NO_STIFFNESS * total) return bad('no stiffness along x')
  if (K.yy.si <= NO_STIFFNESS * total) return bad('no stiffness along y')
  walls.work(column.kxY, { k_x: 'k_x', y: 'y' }).work(column.kyX, { k_y: 'k_y', x: 'x' })
  const sums = [
    walls.sum('k_x_y', sumKxY, `${level}.sum.kx_y`),
    walls.sum('k_y_x', sumKyX, `${level}.sum.ky_x`),
  ] as const
  return good({
    K,
    x: work(`${level}.CR.x`, centreOfRigidity.scalarX, { sum_ky_x: sums[1], K_yy: K.yy }, display),
    y: work(`${level}.CR.y`, centreOfRigidity.scalarY, { sum_kx_y: sums[0], K_xx: K.xx }, display),
    sums,
  })
}

function fullCentre(
  level: string,
  walls: Tabulation,
  axis: AxisStiffness,
  display: Display,
): Outcome<Centre, Unstable> {
  walls.work(column.kxy, { k: 'k', c: 'c', s: 's' }).work(column.arm, { x: 'x', s: 's', y: 'y', c: 'c' })
  walls.work(column.kxr, { k: 'k', c: 'c', r: 'r' }).work(column.kyr, { k: 'k', s: 's', r: 'r' })
  const K = { ...axis, xy: walls.sum('k_xy', Kxy, `${level}.K.xy`) }
  const [K_xr, K_yr] = [walls.sum('k_xr', Kxr, `${level}.K.xphi`), walls.sum('k_yr', Kyr, `${level}.K.yphi`)]
  const base = { K_xx: K.xx, K_yy: K.yy, K_xy: K.xy }
  const D = work(`${level}.D`, centreOfRigidity.determinant, base, display)
  if (D.si <= NO_STIFFNESS * (K.xx.si + K.yy.si) ** 2) return bad('all walls are parallel')
  return good({
    K,
    D,
    x: work(`${level}.CR.x`, centreOfRigidity.x, { K_xx: K.xx, K_xy: K.xy, K_xr, K_yr, D }, display),
    y: work(`${level}.CR.y`, centreOfRigidity.y, { K_yy: K.yy, K_xy: K.xy, K_xr, K_yr, D }, display),
    angle: work(`${level}.alpha`, centreOfRigidity.angle, base, display),
    sums: [K_xr, K_yr],
  })
}
