/** Equilibrium of the wall shears with what acts, for each case. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Case, caseOnPage } from './cases.ts'
import type { Along } from './distribution.ts'
import type { Acting } from './loading.ts'
import { appliedMoment } from './storey.ts'
import { c, s, V, Vx, Vy, x, y } from './symbols.ts'

export interface Residual {
  readonly x: Value
  readonly y: Value
  readonly M: Value
  /** The largest of them over the storey shear. */
  readonly ratio: Value
  /** What the walls resist, along x, along y and about the origin. */
  readonly resisted: { readonly x: Value; readonly y: Value; readonly M: Value }
  readonly appliedMoment: Value
}

const Vc = sym('V_c', 'V\\,c', 'force')
const Vs = sym('V_s', 'V\\,s', 'force')
const Vr = sym('V_r', 'V\\,r', 'moment')
const Mo = sym('M_o', 'M_o', 'moment')
const sumVc = sym('sum_Vc', '\\sum V\\,c', 'force')
const sumVs = sym('sum_Vs', '\\sum V\\,s', 'force')
const sumVr = sym('sum_Vr', '\\sum V\\,r', 'moment')
const Rx = sym('R_x', 'R_x', 'force')
const Ry = sym('R_y', 'R_y', 'force')
const RM = sym('R_M', 'R_M', 'moment')
const ratio = sym('R', 'R', 'residual')
const span = sym('l', '\\ell', 'length')

const EQUILIBRIUM = 'equilibrium about the origin'

const balance = {
  Vc: formula({ gives: Vc, body: 'V*c', of: [V, c], source: EQUILIBRIUM }),
  Vs: formula({ gives: Vs, body: 'V*s', of: [V, s], source: EQUILIBRIUM }),
  Vr: formula({ gives: Vr, body: 'V*(x*s - y*c)', of: [V, x, s, y, c], source: EQUILIBRIUM }),
  alongX: formula({ gives: Rx, body: 'sum_Vc - V_x', of: [sumVc, Vx], source: EQUILIBRIUM }),
  alongY: formula({ gives: Ry, body: 'sum_Vs - V_y', of: [sumVs, Vy], source: EQUILIBRIUM }),
  noneX: formula({ gives: Rx, body: 'sum_Vc', of: [sumVc], source: EQUILIBRIUM }),
  noneY: formula({ gives: Ry, body: 'sum_Vs', of: [sumVs], source: EQUILIBRIUM }),
  moment: formula({ gives: RM, body: 'sum_Vr - M_o', of: [sumVr, Mo], source: EQUILIBRIUM }),
  ratioX: formula({
    gives: ratio,
    body: 'max(abs(R_x), abs(R_y), abs(R_M)/l)/abs(V_x)',
    of: [Rx, Ry, RM, span, Vx],
    source: EQUILIBRIUM,
  }),
  ratioY: formula({
    gives: ratio,
    body: 'max(abs(R_x), abs(R_y), abs(R_M)/l)/abs(V_y)',
    of: [Rx, Ry, RM, span, Vy],
    source: EQUILIBRIUM,
  }),
  ratioBoth: formula({
    gives: ratio,
    body: 'max(abs(R_x), abs(R_y), abs(R_M)/l)/max(abs(V_x), abs(V_y))',
    of: [Rx, Ry, RM, span, Vx, Vy],
    source: EQUILIBRIUM,
  }),
}

/**
 * The wall shears against the forces as they act on the plan, about the origin: a check that does not lean
 * on the centre of rigidity. */
export function residualOf(
  level: string,
  each: Case,
  walls: Tabulation,
  acting: readonly Acting[],
  { x: alongX, y: alongY }: Along,
  display: Display,
): Residual {
  const { name } = each
  walls
    .work(balance.Vc, { V: 'V', c: 'c' }, `Vc.${name}`)
    .work(balance.Vs, { V: 'V', s: 's' }, `Vs.${name}`)
    .work(balance.Vr, { V: 'V', x: 'x', s: 's', y: 'y', c: 'c' }, `Vr.${name}`)
  const id = `${level}.residual`
  const sums = {
    sum_Vc: walls.sum('V_c', sumVc, `${level}.sum.Vc.${name}`),
    sum_Vs: walls.sum('V_s', sumVs, `${level}.sum.Vs.${name}`),
    sum_Vr: walls.sum('V_r', sumVr, `${level}.sum.Vr.${name}`),
  }
  const about = [caseOnPage(name)]
  const x = alongX
    ? work(`${id}.x.${name}`, balance.alongX, { sum_Vc: sums.sum_Vc, V_x: alongX }, display, about)
    : work(`${id}.x.${name}`, balance.noneX, sums, display, about)
  const y = alongY
    ? work(`${id}.y.${name}`, balance.alongY, { sum_Vs: sums.sum_Vs, V_y: alongY }, display, about)
    : work(`${id}.y.${name}`, balance.noneY, sums, display, about)
  const applied = appliedMoment(level, each, acting, display)
  const M = work(`${id}.M.${name}`, balance.moment, { sum_Vr: sums.sum_Vr, M_o: applied }, display, about)
  const l = longestArm(walls)
  const inputs = { R_x: x, R_y: y, R_M: M, l, ...(alongX ? { V_x: alongX } : {}), ...(alongY ? { V_y: alongY } : {}) }
  const rule = alongX && alongY ? balance.ratioBoth : alongX ? balance.ratioX : balance.ratioY
  return {
    x,
    y,
    M,
    ratio: work(`${id}.ratio.${name}`, rule, inputs, display, about),
    resisted: { x: sums.sum_Vc, y: sums.sum_Vs, M: sums.sum_Vr },
    appliedMoment: applied,
  }
}

/** The scale of the moments: the farthest wall from the origin. */
function longestArm(walls: Tabulation): Value {
  const [xs, ys] = [walls.column('x').numbers, walls.column('y').numbers]
  let farthest = 0
  let at = 0
  xs.forEach((one, i) => {
    const distance = Math.hypot(one, ys[i] ?? 0)
    if (distance > farthest) [farthest, at] = [distance, i]
  })
  const of = walls.column('x').cell(at)
  return {
    ...of,
    id: `${of.id}.distance`,
    tex: span.tex,
    si: farthest || 1,
    unit: of.unit,
    origin: { kind: 'measured', what: `distance of wall ${walls.rows[at] ?? ''} from the origin`, spans: [] },
  }
}
