/** Forces and storey shears of the whole building, level by level: what stands above a storey is what it carries. */
import { sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout } from '../base/work.ts'
import type { Axis, Loading } from './cases.ts'
import { lettersOf } from './loading.ts'
import { storeyShear } from './storey.ts'

/** A level with its forces. */
export interface LoadedLevel {
  readonly level: string
  readonly elevation?: Value
  readonly force: { readonly x?: Value; readonly y?: Value }
}

export interface Storeys {
  readonly loading: Loading
  /** The axes along which any force is stated. */
  readonly axes: readonly Axis[]
  /** From the top down: z where elevations are stated, and F and V of each axis. */
  readonly table: Tabulation
  readonly stated: boolean
}

export const elevationOf = sym('z', 'z', 'length')

/** @param levels from the top down, every one with the forces stated for it */
export function workStoreys(loading: Loading, levels: readonly LoadedLevel[], display: Display): Storeys {
  const { F, V, path } = lettersOf[loading]
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
    const [ofForce, ofShear] = [F[axis], V[axis]]
    const none = (id: string, tex: string): Value => ({
      id,
      tex,
      si: 0,
      ...shownAs(ofForce, display),
      origin: { kind: 'measured', what: `no force along ${axis} is stated`, spans: [] },
    })
    table
      .take(
        ofForce,
        levels.map(
          ({ level, force }) => force[axis] ?? none(`${level}.${path}force.${axis}`, texAbout(ofForce.tex, level)),
        ),
      )
      .take(
        ofShear,
        levels.map(({ level }, at) => {
          // The levels above this storey and its own, in the order in which its own work has them.
          const acting = levels.slice(0, at + 1)
          return acting.some(({ force }) => force[axis])
            ? storeyShear(level, axis, loading, acting, display)
            : none(`${level}.${path}storey.${axis}`, texAbout(ofShear.tex, level))
        }),
      )
  }
  return { loading, axes, table, stated }
}
