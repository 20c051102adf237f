/** What stands below the plan: scale bar, legend and notes. */
import { inLanguage } from '../base/language.ts'
import { arrowKey } from './arrowkey.ts'
import { shortestArrow } from './arrows.ts'
import type { Centres } from './centres.ts'
import type { Field } from './field.ts'
import { besideSheet, type Frame } from './frame.ts'
import { drawLegend, type LegendEntry, symbolOf } from './legend.ts'
import { drawScaleBar } from './scalebar.ts'
import type { SceneNode } from './scene.ts'
import type { PlanView } from './view.ts'
import { arrowLength } from './walllabels.ts'
import type { WallLook } from './walls.ts'

export function notesOf(view: PlanView, leftOut: number, unnamed: number): readonly string[] {
  const count = (n: number, one: string, many: string): readonly string[] =>
    n === 0 ? [] : [inLanguage(n === 1 ? `1 ${one}` : `${n} ${many}`, view.language)]
  return [
    ...count(
      leftOut,
      'name or figure is left out for want of room.',
      'names and figures are left out for want of room.',
    ),
    ...count(
      unnamed,
      'grid line is drawn without its name for want of room.',
      'grid lines are drawn without their names for want of room.',
    ),
  ]
}

/** Only what is drawn is explained. */
export function legendOf(
  view: PlanView,
  centres: Centres,
  { legs, shears, look }: { readonly legs: boolean; readonly shears: boolean; readonly look: WallLook },
): readonly LegendEntry[] {
  const own = (text: string): string => inLanguage(text, view.language)
  return [
    ...(shears ? shearEntries(view, look) : []),
    ...(view.walls.some(({ governs }) => governs)
      ? [{ symbol: symbolOf.governs, text: own('wall that governs') }]
      : []),
    ...(centres.force ? [{ symbol: symbolOf.force, text: view.legend.force }] : []),
    ...(centres.mass ? [{ symbol: symbolOf.centreOfMass, text: view.legend.centreOfMass }] : []),
    ...(centres.rigidity ? [{ symbol: symbolOf.centreOfRigidity, text: view.legend.centreOfRigidity }] : []),
    ...(legs ? [{ symbol: symbolOf.eccentricity, text: own('eccentricity') }] : []),
  ]
}

/** What an arrow means, its scale by one of a round figure, and what an arrowhead alone means where there is one. */
function shearEntries(view: PlanView, look: WallLook): readonly LegendEntry[] {
  const key = arrowKey(look.greatest, look.longestArrow, view.forceUnit, view.language)
  const bare = view.walls.some(({ shear }) => {
    const length = arrowLength(shear?.value ?? 0, look)
    return length > 0 && length < shortestArrow
  })
  return [
    { symbol: symbolOf.arrow(key?.length ?? 24), text: view.legend.shear + (key ? `; this arrow: ${key.text}` : '') },
    ...(bare ? [{ symbol: symbolOf.bareHead, text: 'too small for its arrow to scale' }] : []),
  ]
}

export interface FooterDrawn {
  readonly nodes: readonly SceneNode[]
  readonly top: number
  readonly bottom: number
}

export function drawFooter(
  view: PlanView,
  frame: Frame,
  field: Field,
  entries: readonly LegendEntry[],
  notes: readonly string[],
): FooterDrawn {
  const held = field.bounds() ?? frame.plan
  const y = Math.max(held.y1, frame.plan.y1 + 14) + 24
  const x = Math.min(Math.max(frame.plan.x0, 16), 100)
  const bar = drawScaleBar({ x, y }, frame.scale * view.scaleUnit.metres, view.scaleUnit.name, view.language)
  const beside = x + bar.width + 40
  const room = frame.width - 16 - beside
  const at = room >= 220 ? { x: beside, y } : { x, y: y + 36 }
  const legend = drawLegend(entries, notes, at, room >= 220 ? room : frame.width - 16 - x)
  return { nodes: [...bar.nodes, ...legend.nodes], top: held.y0 - besideSheet, bottom: Math.max(y + 24, legend.bottom) }
}
