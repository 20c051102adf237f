/** A stack of floors under all its load cases: drifts, wall forces, and the largest of each with its case. */
import { type ByStorey, drifts, imbalance, type Stack, storeyShears, type WallForces, wallForces } from './stack.ts'

/** A load case at work on a stack. */
export interface SolvedCase {
  /** Shears of each storey along x and y, and torsion about the axis. */
  readonly shears: ByStorey
  readonly drifts: ByStorey
  /** What each tie of the stack carries, in their order. */
  readonly forces: readonly WallForces[]
  /** Largest difference between what acts and what the walls resist, as a share of the largest shear. */
  readonly residual: number
}

/** @param levels force along x and y in N and moment about the axis in N·m of each level, from the lowest up */
export function solveCase(stack: Stack, levels: ByStorey): SolvedCase {
  const shears = storeyShears(levels)
  const moved = drifts(stack, shears)
  const forces = stack.ties.map(tie => wallForces(tie, moved))
  return { shears, drifts: moved, forces, residual: imbalance(stack, shears, forces) }
}

/** For each storey of one tie, the shear and the moment of largest size, signed, and the index of their case. */
export interface WallEnvelope {
  readonly V: Float64Array
  readonly caseOfV: Int32Array
  readonly M: Float64Array
  readonly caseOfM: Int32Array
}

/** One envelope a tie. Of two cases that are as large the first governs. @param cases at least one */
export function envelopeOf({ ties }: Stack, cases: readonly SolvedCase[]): readonly WallEnvelope[] {
  return ties.map((_, w) => {
    const n = cases[0]?.forces[w]?.V.length ?? 0
    const most = {
      V: new Float64Array(n),
      caseOfV: new Int32Array(n),
      M: new Float64Array(n),
      caseOfM: new Int32Array(n),
    }
    cases.forEach(({ forces }, at) => {
      const own = forces[w]
      if (!own) return
      takeLarger(own.V, at, most.V, most.caseOfV)
      takeLarger(own.M, at, most.M, most.caseOfM)
    })
    return most
  })
}

/** What is larger by less than its rounding leaves the earlier case in its place, so that no machine turns it round. */
const LARGER = 1 + 1e-12

function takeLarger(values: Float64Array, at: number, most: Float64Array, which: Int32Array): void {
  for (let i = 0; i < values.length; i++) {
    const [value, before] = [values[i] ?? 0, most[i] ?? 0]
    if (at > 0 && Math.abs(value) <= Math.abs(before) * LARGER) continue
    most[i] = value
    which[i] = at
  }
}
