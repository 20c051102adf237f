/** Forces of stated pressures on the strips of wall. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
import type { StatedWind } from '../model/wind-stated.ts'
import { type Axis, across } from './cases.ts'
import { lettersOf } from './loading.ts'
import type { WindLevel } from './wind.ts'
import { stripTable } from './wind-pressure.ts'
import type { Part } from './wind-resultant.ts'
import { type Strip, stripsOf, z1, z2 } from './wind-strips.ts'

/** Wind along an axis: its strips in a table, and the parts that each level takes. */
export interface Facing {
  readonly axis: Axis
  readonly strips: Tabulation
  readonly parts: readonly Part[]
  /** The same under the least pressures, where there are any. */
  readonly least: readonly Part[]
}

export interface StatedWork {
  readonly kind: 'stated'
  readonly strips: readonly Strip[]
  readonly facing: readonly Facing[]
}

export const B = sym('B', 'B', 'length')
export const pw = sym('p_w', 'p_w', 'areaLoad')
export const pl = sym('p_l', 'p_l', 'areaLoad')

const rule = (axis: Axis) =>
  formula({
    gives: lettersOf.wind.F[axis],
    body: '(p_w + p_l)*B*(z_2 - z_1)',
    of: [pw, pl, B, z2, z1],
    source: 'stated pressures on the strip: the windward one pushes, the leeward one pulls',
  })

const top = formula({
  gives: sym('z_p', 'z_p', 'length'),
  body: 'z + h_p',
  of: [sym('z', 'z', 'length'), sym('h_p', 'h_p', 'length')],
  source: 'top of the parapet',
})

/** The height of the top of a parapet on the highest level. */
export const topOf = (elevation: Value, parapet: Value, display: Display): Value =>
  work('wind.z_p', top, { z: elevation, h_p: parapet }, display)

export function workStatedWind(given: StatedWind, levels: readonly WindLevel[], display: Display): StatedWork {
  const [highest] = levels
  const reach = highest && given.parapet ? topOf(highest.elevation, given.parapet, display) : undefined
  const strips = stripsOf(levels, undefined, reach, display)
  return {
    kind: 'stated',
    strips,
    facing: given.axes.map((axis): Facing => {
      const table = stripTable(strips, display)
        .take(B, widthsOf(strips, levels, axis))
        .take(pw, pressuresOf(strips, given, axis, 'windward'))
        .take(pl, pressuresOf(strips, given, axis, 'leeward'))
        .work(rule(axis), { p_w: 'p_w', p_l: 'p_l', B: 'B', z_2: 'z_2', z_1: 'z_1' }, `F_${axis}`)
      return { axis, strips: table, parts: partsOf(strips, table, lettersOf.wind.F[axis].name), least: [] }
    }),
  }
}

/** The width of each strip across the wind: the extent of the plan that its walls follow. */
export function widthsOf(strips: readonly Strip[], levels: readonly WindLevel[], axis: Axis): readonly Value[] {
  const sizes = new Map(levels.map(({ level, plan }) => [level, plan.size[across(axis)]]))
  return strips.flatMap(({ plan }) => sizes.get(plan) ?? [])
}

/** Strips with their forces out of a column of their table. */
export const partsOf = (strips: readonly Strip[], table: Tabulation, column: string): readonly Part[] =>
  strips.map(({ name, level, plan }, i) => ({ name, level, plan, F: table.column(column).cell(i) }))

function pressuresOf(
  strips: readonly Strip[],
  given: StatedWind,
  axis: Axis,
  side: 'windward' | 'leeward',
): readonly Value[] {
  return strips.flatMap(({ level }) => {
    const value = given.at(level, axis)?.[side]
    return value ? [{ ...value, tex: texAbout(value.tex, level) }] : []
  })
}
