/** How far the centre of mass and the corners of the plan move in a case. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { type Axis, caseOnPage } from './cases.ts'
import type { CaseResult } from './distribution.ts'
import type { Plan } from './plan.ts'
import type { Rigidity } from './rigidity.ts'
import { phi, u0, v0, x, xr, y, yr } from './symbols.ts'

const dx = sym('delta_x', '\\delta_x', 'displacement')
const dy = sym('delta_y', '\\delta_y', 'displacement')

const RIGID = 'small rotation of a rigid diaphragm about its centre of rigidity'

export const displacement = {
  x: formula({ gives: dx, body: 'u_0 - phi*(y - y_r)', of: [u0, phi, y, yr], source: RIGID }),
  y: formula({ gives: dy, body: 'v_0 + phi*(x - x_r)', of: [v0, phi, x, xr], source: RIGID }),
}

export interface Displacement {
  readonly result: CaseResult
  /** The centre of mass, then the corners of the plan. */
  readonly points: Tabulation
  /** The largest displacement along a force of the case, at a corner. */
  readonly governing: { readonly corner: string; readonly axis: Axis; readonly value: Value }
}

export const CENTRE_OF_MASS = 'CM'

export function workDisplacement(
  { corners }: Plan,
  mass: { readonly x: Value; readonly y: Value },
  rigidity: Rigidity,
  result: CaseResult,
  display: Display,
): Displacement {
  const { level } = rigidity
  const { parts, name } = result.case
  const id = (row: string, key: string) => `${level}.displacement.${row}.${key}`
  const points = new Tabulation([CENTRE_OF_MASS, ...corners.map(({ name }) => name)], id, display)
    .take(x, [mass.x, ...corners.map(({ x }) => x)])
    .take(y, [mass.y, ...corners.map(({ y }) => y)])
    .work(displacement.x, { u_0: result.u, phi: result.phi, y: 'y', y_r: rigidity.y }, `x.${name}`, [caseOnPage(name)])
    .work(displacement.y, { v_0: result.v, phi: result.phi, x: 'x', x_r: rigidity.x }, `y.${name}`, [caseOnPage(name)])
  return {
    result,
    points,
    governing: largestOf(
      points,
      parts.map(({ axis }) => axis),
    ),
  }
}

/** The corner that moves farthest along a force of the case. */
function largestOf(points: Tabulation, axes: readonly Axis[]): Displacement['governing'] {
  let best = { axis: axes[0] ?? 'x', at: 1, size: -1 }
  for (const axis of axes)
    points.column(`delta_${axis}`).numbers.forEach((value, at) => {
      if (at > 0 && Math.abs(value) > best.size * (1 + 1e-12)) best = { axis, at, size: Math.abs(value) }
    })
  return {
    corner: points.rows[best.at] ?? '',
    axis: best.axis,
    value: points.column(`delta_${best.axis}`).cell(best.at),
  }
}
