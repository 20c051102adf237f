/** Tall buildings that the bench solves, straight from the kernels. */
import { envelopeOf, solveCase } from '../../src/compute/envelope.ts'
import { type FloorMass, modesOf } from '../../src/compute/modal.ts'
import { type RemovableWall, removals, type StoreyCase, solvedAgain } from '../../src/compute/removal.ts'
import { combine, quadratic, responseOf } from '../../src/compute/response.ts'
import { type Line, type Stack, stackOf, type Tie } from '../../src/compute/stack.ts'
import { cantilever } from '../../src/compute/upright.ts'

/** Walls in all directions on a floor of 80 m by 40 m, about its middle. */
const lineOf = (w: number): Line => {
  const angle = (w * Math.PI * 7) / 31
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const [x, y] = [(w % 20) * 4 - 38, Math.floor(w / 20) * 4 - 18]
  return { c, s, r: x * s - y * c }
}

function tower(levels: number, walls: number): Stack {
  const ties = Array.from({ length: walls }, (_, w): Tie => {
    const sections = Array.from({ length: levels }, (_, i) => ({
      h: 3.2,
      EI: (1e10 * (1 + (w % 13))) / (1 + i / levels),
      GA: 1e9 * (1 + (w % 7)),
    }))
    return { kind: 'continuous', wall: cantilever(sections), ...lineOf(w) }
  })
  const made = stackOf(levels, ties)
  if (!made.ok) throw new Error('the tower of the bench does not stand')
  return made.value
}

/** Six cases, along x and y with the mass in its place and to both sides. */
const casesOf = (levels: number): readonly Float64Array[] =>
  (['x', 'y'] as const).flatMap(axis =>
    [-1, 0, 1].map(side =>
      Float64Array.from({ length: 3 * levels }, (_, i) => {
        const force = 1e5 * (1 + Math.floor(i / 3))
        if (i % 3 === 2) return side * 2 * force
        return (i % 3 === 0) === (axis === 'x') ? force : 0
      }),
    ),
  )

/** @returns the largest residual of all cases, which shows that they were solved */
export function solveTower(levels: number, walls: number): number {
  const stack = tower(levels, walls)
  const cases = casesOf(levels).map(each => solveCase(stack, each))
  const most = envelopeOf(stack, cases)
  if (most.length !== walls) throw new Error('a wall has no envelope')
  return Math.max(...cases.map(({ residual }) => residual))
}

/** All modes of a tower and its storey shears in both directions. @returns the largest residual of a mode */
export function vibrateTower(levels: number, walls: number): number {
  const stack = tower(levels, walls)
  const floors = Array.from(
    { length: levels },
    (_, i): FloorMass => ({ mass: 1e6, polar: 6e8, x: i / 30, y: 1 - i / 40 }),
  )
  const modes = modesOf(stack, floors)
  for (const axis of ['x', 'y'] as const) {
    const shears = modes.map(mode => responseOf(mode, floors, axis, period => 4 / Math.max(0.5, period)).shears)
    combine(shears, quadratic(modes, 0.05))
  }
  return Math.max(...modes.map(({ residual }) => residual))
}

interface Storey {
  readonly walls: readonly RemovableWall[]
  readonly cases: readonly StoreyCase[]
  readonly edges: { readonly x: readonly [number, number]; readonly y: readonly [number, number] }
}

const storeyOf = (walls: number, level: number): Storey => ({
  walls: Array.from({ length: walls }, (_, w) => ({ ...lineOf(w), k: 1e8 * (1 + ((w + level) % 13)), strength: 1e5 })),
  cases: casesOf(1).map(([Vx = 0, Vy = 0, T = 0]) => ({ axis: Vx === 0 ? 'y' : 'x', Vx, Vy, T })),
  edges: { x: [-20, 20], y: [-40, 40] },
})

/** Each wall of each level taken away in turn. @returns how many */
export function removeWalls(levels: number, walls: number): number {
  let count = 0
  for (let level = 0; level < levels; level++) {
    const storey = storeyOf(walls, level)
    const made = removals(
      storey,
      storey.walls.map((_, w) => [w]),
    )
    if (made.ok) count += made.value.length
  }
  return count
}

/** The same, each put together and solved from the start. */
export function removeWallsAnew(levels: number, walls: number): number {
  let count = 0
  for (let level = 0; level < levels; level++) {
    const storey = storeyOf(walls, level)
    for (let w = 0; w < walls; w++) if ('turning' in solvedAgain(storey, [w])) count++
  }
  return count
}
