/** What stands below the plan: scale bar, legend and notes. */
import { inLanguage } from '../base/language.ts'
import type { Centres } from './centres.ts'
import type { Field } from './field.ts'
import { besideSheet, type Frame } from './frame.ts'
import { drawLegend, type LegendEntry } from './legend.ts'
import { drawScaleBar } from './scalebar.ts'
import type { SceneNode } from './scene.ts'
import type { PlanView } from './view.ts'

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
  { legs, shears }: { readonly legs: boolean; readonly shears: boolean },
): readonly LegendEntry[] {
  const own = (text: string): string => inLanguage(text, view.language)
  return [
    ...(shears ? [{ symbol: 'shear' as const, text: view.legend.shear }] : []),
    ...(view.walls.some(({ governs }) => governs)
      ? [{ symbol: 'governs' as const, text: own('wall that governs') }]
      : []),
    ...(centres.force ? [{ symbol: 'force' as const, text: view.legend.force }] : []),
    ...(centres.mass ? [{ symbol: 'centreOfMass' as const, text: view.legend.centreOfMass }] : []),
    ...(centres.rigidity ? [{ symbol: 'centreOfRigidity' as const, text: view.legend.centreOfRigidity }] : []),
    ...(legs ? [{ symbol: 'eccentricity' as const, text: own('eccentricity') }] : []),
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
