/** Forces and storey shears of the whole building, level by level: what stands above a storey is what it carries. */
import { sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout } from '../base/work.ts'
import type { Forces } from '../model/forces.ts'
import type { Axis } from './cases.ts'
import { storeyShear } from './storey.ts'
import { Fx, Fy, Vx, Vy } from './symbols.ts'

/** A level with its forces. */
export interface LoadedLevel {
  readonly level: string
  readonly elevation?: Value
  readonly force: Pick<Forces, 'x' | 'y'>
}

export interface Storeys {
  /** The axes along which any force is stated. */
  readonly axes: readonly Axis[]
  /** From the top down: z where elevations are stated, and F and V of each axis. */
  readonly table: Tabulation
  readonly stated: boolean
}

export const elevationOf = sym('z', 'z', 'length')
export const lettersOf = { x: { F: Fx, V: Vx }, y: { F: Fy, V: Vy } } as const

/** @param levels from the top down, every one with the forces stated for it */
export function workStoreys(levels: readonly LoadedLevel[], display: Display): Storeys {
  const axes = (['x', 'y'] as const).filter(axis => levels.some(({ force }) => force[axis]))
  const elevations = levels.flatMap(({ elevation }) => elevation ?? [])
  const stated = elevations.length === levels.length
  const table = new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.${key}`,
    display,
  )
  if (stated) table.take(elevationOf, elevations)
  for (const axis of axes) {
    const { F, V } = lettersOf[axis]
    const none = (id: string, tex: string): Value => ({
      id,
      tex,
      si: 0,
      ...shownAs(F, display),
      origin: { kind: 'measured', what: `no force along ${axis} is stated`, spans: [] },
    })
    table
      .take(
        F,
        levels.map(({ level, force }) => force[axis] ?? none(`${level}.force.${axis}`, texAbout(F.tex, level))),
      )
      .take(
        V,
        levels.map(({ level }, at) => {
          // The levels above this storey and its own, in the order in which its own work has them.
          const acting = levels.slice(0, at + 1)
          return acting.some(({ force }) => force[axis])
            ? storeyShear(level, axis, acting, display)
            : none(`${level}.storey.${axis}`, texAbout(V.tex, level))
        }),
      )
  }
  return { axes, table, stated }
}
