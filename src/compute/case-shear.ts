/** The storey shear of a case as plain numbers, for the solvers. */
import type { Axis } from './cases.ts'
import type { CaseResult } from './distribution.ts'

/** Along x and y, in N, and the axis that the case is for. */
export interface CaseShear {
  readonly axis: Axis
  readonly x: number
  readonly y: number
}

export function shearIn({ case: { axis }, shear }: CaseResult): CaseShear {
  return axis === 'x' ? { axis, x: shear.si, y: 0 } : { axis, x: 0, y: shear.si }
}
