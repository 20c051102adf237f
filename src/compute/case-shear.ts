/** The storey shear of a case as plain numbers, for the solvers. */
import type { CaseResult } from './distribution.ts'

/** Along x and y, in N. */
export interface CaseShear {
  readonly x: number
  readonly y: number
}

export const shearIn = ({ shear: { x, y } }: CaseResult): CaseShear => ({ x: x?.si ?? 0, y: y?.si ?? 0 })
