/** What stands below the plan: scale bar, legend and notes. */
import { inLanguage } from '../base/language.ts'
import { arrowKey } from './arrowkey.ts'
import { shortestArrow } from './arrows.ts'
import type { Centres } from './centres.ts'
import type { Field } from './field.ts'
import { besideSheet, type Frame } from './frame.ts'
import type { Point } from './geometry.ts'
import { drawLegend, type Footer, type LegendEntry, symbolOf } from './legend.ts'
import { drawScaleBar } from './scalebar.ts'
import type { SceneNode } from './scene.ts'
import type { PlanView } from './view.ts'
import { arrowLength } from './walllabels.ts'
import type { WallLook } from './walls.ts'

/** What could not be drawn. */
export interface Missing {
  readonly leftOut: number
  readonly unnamed: number
  /** Some walls have no dimensions to their ends. */
  readonly crowded: boolean
}

export function notesOf(view: PlanView, { leftOut, unnamed, crowded }: Missing): readonly string[] {
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
    ...(crowded ? ['Not every wall is dimensioned, for want of room; its ends are as given.'] : []),
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
  const legend = lower(
    drawLegend(entries, notes, { x, y: y + 40 }, frame.width - 16 - x),
    besideBar(entries, notes, { x: x + bar.width + 40, y }, frame.width - 16),
  )
  return { nodes: [...bar.nodes, ...legend.nodes], top: held.y0 - besideSheet, bottom: Math.max(y + 24, legend.bottom) }
}

/** The legend next to the scale bar, where that leaves it room. */
export const besideBar = (
  entries: readonly LegendEntry[],
  notes: readonly string[],
  at: Point,
  right: number,
): Footer | undefined => (right - at.x >= 220 ? drawLegend(entries, notes, at, right - at.x) : undefined)

/** The one that makes the sheet less tall: beside the bar where both are alike. */
export const lower = (below: Footer, beside: Footer | undefined): Footer =>
  beside !== undefined && beside.bottom <= below.bottom ? beside : below
