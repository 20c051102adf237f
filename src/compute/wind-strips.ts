/**
 * The strips of wall that each diaphragm takes wind from: half the storey below it and half the one above. The
 * lower half of the lowest storey goes to the ground. A strip is cut where the exposure begins to grow with height.
 *
 *   roof  ───────  ┐            The walls of a storey are as wide as the plan of the level that stands on
 *                  │ roof       them: of the upper storey as the roof, of the lower as the floor.
 *         ─ ─ ─ ─  ┤
 *                  │ floor
 *   floor ───────  ┤
 *                  │ floor
 *         ─ ─ ─ ─  ┤
 *                  │ ground
 *   base  ───────  ┘
 */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'

export interface Strip {
  readonly name: string
  /** The level whose diaphragm takes it, and the level whose plan its walls follow. */
  readonly level: string
  readonly plan: string
  readonly z1: Value
  readonly z2: Value
}

export interface Height {
  readonly level: string
  readonly elevation: Value
}

export const z1 = sym('z_1', 'z_1', 'length')
export const z2 = sym('z_2', 'z_2', 'length')

const middle = formula({
  gives: sym('z', 'z', 'length'),
  body: '(z_1 + z_2)/2',
  of: [z1, z2],
  source: 'half way up the storey',
})

/** Strips thinner than this, in m, are the rounding of two heights that are one. */
const SAME = 1e-6

/**
 * @param heights from the top down, every one above the base
 * @param cut height at which strips are cut, where there is one
 * @param top height that the walls reach above the highest level, where they go on beyond it
 * @returns from the top down
 */
export function stripsOf(
  heights: readonly Height[],
  cut: Value | undefined,
  top: Value | undefined,
  display: Display,
): readonly Strip[] {
  const rising = [...heights].reverse()
  let foot: Value = {
    id: 'wind.base',
    tex: texAbout('z', 'base'),
    si: 0,
    ...shownAs(z1, display),
    origin: { kind: 'measured', what: 'the base, from which elevations are measured', spans: [] },
  }
  let below: string | undefined
  const halves: Omit<Strip, 'name'>[] = []
  for (const { level, elevation } of rising) {
    const mid = work(`${level}.wind.z_mid`, middle, { z_1: foot, z_2: elevation }, display, [level])
    if (below !== undefined) halves.push({ level: below, plan: level, z1: foot, z2: mid })
    halves.push({ level, plan: level, z1: mid, z2: elevation })
    foot = elevation
    below = level
  }
  if (top && below !== undefined) halves.push({ level: below, plan: below, z1: foot, z2: top })
  return halves
    .flatMap(half => cutAt(half, cut))
    .map((strip, i) => ({ ...strip, name: `S${i + 1}` }))
    .reverse()
}

function cutAt(half: Omit<Strip, 'name'>, cut: Value | undefined): readonly Omit<Strip, 'name'>[] {
  if (!cut || cut.si <= half.z1.si + SAME || cut.si >= half.z2.si - SAME) return [half]
  return [
    { ...half, z2: cut },
    { ...half, z1: cut },
  ]
}
