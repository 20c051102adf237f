/** The view in the coordinates of the sheet. */
import type { Centres, Force, Mark } from './centres.ts'
import { type Frame, isWithin } from './frame.ts'
import type { Point } from './geometry.ts'
import type { PointMark } from './loads.ts'
import type { Patch } from './slab.ts'
import type { PlanView } from './view.ts'

export function patchesOf(
  view: PlanView,
  { toSheet }: Frame,
): { readonly areas: readonly Patch[]; readonly openings: readonly Patch[] } {
  return {
    areas: view.areas.map(({ name, load, outline }) => ({ name, load, outline: outline.map(toSheet) })),
    openings: view.openings.map(({ name, outline }) => ({ name, load: '', outline: outline.map(toSheet) })),
  }
}

export const pointMarksOf = ({ pointLoads = [] }: PlanView, { toSheet, plan }: Frame): readonly PointMark[] =>
  pointLoads.map(({ name, load, at }) => ({ name, load, at: toSheet(at) })).filter(({ at }) => isWithin(at, plan, 3))

/** The centres that lie on the sheet; for each that lies beyond it, a line that says so. */
export function centresOf(
  view: PlanView,
  frame: Frame,
): { readonly centres: Centres; readonly beyond: readonly string[] } {
  const onSheet = (p: Point): boolean => isWithin(frame.toSheet(p), frame.plan, 3)
  const mass = markOf(view.centreOfMass, 'CM', frame)
  const rigidity = markOf(view.centreOfRigidity, 'CR', frame)
  const force = forceOf(view, frame)
  const beyond = [
    ...(view.centreOfMass && !onSheet(view.centreOfMass.at)
      ? [`Beyond the sketch: CM ${view.centreOfMass.printed}`]
      : []),
    ...(view.centreOfRigidity && !onSheet(view.centreOfRigidity.at)
      ? [`Beyond the sketch: CR ${view.centreOfRigidity.printed}`]
      : []),
    ...(view.force && !onSheet(view.force.at) ? [`Acts beyond the sketch: ${view.force.printed}`] : []),
  ]
  const held = {
    ...(mass && view.centreOfMass && onSheet(view.centreOfMass.at) ? { mass } : {}),
    ...(rigidity && view.centreOfRigidity && onSheet(view.centreOfRigidity.at) ? { rigidity } : {}),
    ...(force && view.force && onSheet(view.force.at) ? { force } : {}),
  }
  return { centres: held, beyond }
}

function markOf(centre: PlanView['centreOfMass'], name: string, frame: Frame): Mark | undefined {
  return centre && { at: frame.toSheet(centre.at), text: `${name} ${centre.printed}` }
}

/** A force of nothing has no direction, and no arrow. */
function forceOf({ force }: PlanView, frame: Frame): Force | undefined {
  if (force === undefined || Math.hypot(force.x, force.y) === 0) return undefined
  return { at: frame.toSheet(force.at), angle: Math.atan2(-force.y, force.x), text: force.printed }
}
