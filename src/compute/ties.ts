/** The walls of a building as ties of its floors. */
import type { Value } from '../base/value.ts'
import type { Rigidity } from './rigidity.ts'
import type { WallSection } from './section.ts'
import type { Tie } from './stack.ts'
import { cantilever } from './upright.ts'

/** A level with its walls. */
export interface WalledLevel {
  readonly rigidity: Rigidity
  /** Needed where any wall runs through. */
  readonly elevation?: Value
  /** Of walls that run through the levels; none where each storey is worked on its own. */
  readonly sections: ReadonlyMap<string, WallSection>
}

/** A tie of the stack with the wall that it stands for. */
export interface NamedTie {
  readonly name: string
  readonly tie: Tie
}

/** Where the upright axis of the stack stands in plan, in m. */
export interface StackAxis {
  readonly x: number
  readonly y: number
}

/** The axis stands at the centre of rigidity of the lowest storey: near the walls, so that arms keep their digits. */
export const axisOf = ([lowest]: readonly WalledLevel[]): StackAxis => ({
  x: lowest?.rigidity.x.si ?? 0,
  y: lowest?.rigidity.y.si ?? 0,
})

/** @param rising from the lowest level up; a wall with a section stands from the lowest level on */
export function tiesOf(rising: readonly WalledLevel[], axis: StackAxis): readonly NamedTie[] {
  const found: NamedTie[] = []
  const heightOf = (i: number) => (rising[i]?.elevation?.si ?? Number.NaN) - (rising[i - 1]?.elevation?.si ?? 0)
  rising.forEach(({ rigidity, sections }, storey) => {
    for (const { name, k, ...wall } of rigidity.springs) {
      const line = {
        c: wall.c.si,
        s: wall.s.si,
        r: (wall.x.si - axis.x) * wall.s.si - (wall.y.si - axis.y) * wall.c.si,
      }
      if (!sections.has(name)) found.push({ name, tie: { kind: 'storey', storey, k: k.si, ...line } })
      else if (storey === 0) {
        const run = rising.slice(0, heightInStoreys(rising, name)).map((level, i) => {
          const section = level.sections.get(name)
          return { h: heightOf(i), EI: section?.EI.si ?? Number.NaN, GA: section?.GA.si ?? Number.NaN }
        })
        found.push({ name, tie: { kind: 'continuous', wall: cantilever(run), ...line } })
      }
    }
  })
  return found
}

/** The number of storeys through which a wall runs from the foundation. */
function heightInStoreys(rising: readonly WalledLevel[], name: string): number {
  const end = rising.findIndex(({ sections }) => !sections.has(name))
  return end === -1 ? rising.length : end
}
