/**
 * The plan sketch of a level, as one self-contained element of SVG.
 *
 * Lines are drawn first and take their place in the field; then every label looks for
 * a place of its own, the most important first.
 */
import { areaPlacing, openingPlacing } from './arealabels.ts'
import { type AxisLayout, besidePlan } from './axis.ts'
import { drawCentres } from './centres.ts'
import { bottomEdge, drawAxis, leftEdge, rightEdge, topEdge } from './dimensions.ts'
import { Field } from './field.ts'
import { drawFooter, legendOf, notesOf } from './footer.ts'
import { besideSheet, type Frame } from './frame.ts'
import { box } from './geometry.ts'
import { layOut } from './layout.ts'
import { drawPointLoads, hatchLoads, loadEntries, loadGroups, pointLoadPlacing, pointLoadSymbol } from './loads.ts'
import { centresOf, patchesOf, pointMarksOf } from './onsheet.ts'
import { type Placing, place, placePair, type Sheet } from './placement.ts'
import { layer, type SceneNode } from './scene.ts'
import { drawEdges, drawOpenings, groundOf, washOf } from './slab.ts'
import { svgOf } from './svg.ts'
import { northPoint, northReach } from './symbols.ts'
import type { PlanView } from './view.ts'
import { drawWallChain, type WallChains } from './wallchain.ts'
import { namePlacing, shearPlacing } from './walllabels.ts'
import { drawWalls, lookOf, type WallLine, type WallLook, wallLines } from './walls.ts'

/** More walls than this and a label that finds no place beside its wall is left out, with a note; the governing wall's never is. */
const manyWalls = 120
/** Leaders as long as this always find free ground, above the plan or below it. */
const farthest = 6000

/** @returns the whole `<svg>` element; the same view gives the same bytes */
export function drawPlan(view: PlanView): string {
  const { frame, top, left, chains } = layOut(view)
  const field = new Field(besideSheet / 2, frame.width - besideSheet / 2)
  const patches = patchesOf(view, frame)
  const sheet: Sheet = {
    field,
    groundAt: groundOf(patches.areas, patches.openings),
    farthest,
  }
  const groups = loadGroups(patches.areas)
  const look = lookOf(view.walls, frame.scale)
  const lines = wallLines(view.walls, frame.toSheet, frame.scale, look)
  const { centres, beyond } = centresOf(view, frame)

  const edges = [...drawEdges(patches.areas, field), ...drawOpenings(patches.openings, field)]
  const axes = [
    ...drawAxis(top, topEdge(frame.plan), field),
    ...drawAxis(left, leftEdge(frame.plan), field),
    ...drawChains(chains, frame, field),
  ]
  const north = drawNorth(view, frame, top, field)
  const walls = drawWalls(lines, field)
  const pointMarks = pointMarksOf(view, frame)
  const pointLoads = drawPointLoads(pointMarks, field)
  const marks = drawCentres(centres, field)
  const governing = lines.filter(({ wall }) => wall.governs)

  const thorough = setAll(sheet, [
    ...marks.labels.map(label => [label]),
    ...governing.map(line => placingsOf(line, look, sheet)),
  ])
  const others = setAll({ ...sheet, farthest: view.walls.length > manyWalls ? 0 : farthest }, [
    ...lines.filter(({ wall }) => !wall.governs).map(line => placingsOf(line, look, sheet)),
    ...patches.openings.map(opening => [openingPlacing(opening)]),
    ...pointMarks.map(mark => [pointLoadPlacing(mark)]),
    ...patches.areas.map(area => [areaPlacing(area, patches.openings)]),
  ])

  const notes = [
    ...beyond,
    ...notesOf(view, {
      leftOut: thorough.leftOut + others.leftOut,
      unnamed: top.unnamed.length + left.unnamed.length,
      crowded: chains.crowded,
    }),
  ]
  const footer = drawFooter(
    view,
    frame,
    field,
    [
      ...legendOf(view, centres, { legs: marks.legs, shears: thorough.shears || others.shears, look }),
      ...(pointMarks.length > 0 ? [{ symbol: pointLoadSymbol, text: 'point load' }] : []),
      ...loadEntries(groups),
    ],
    notes,
  )
  const drawn = [
    ...layer('pm-slab', [...washOf(patches.areas), ...hatchLoads(groups, patches.openings, field.texts()), ...edges]),
    ...layer('pm-axes', axes),
    ...layer('pm-walls', walls),
    ...layer('pm-loads', pointLoads),
    ...layer('pm-centres', marks.nodes),
    ...layer('pm-labels', [...thorough.nodes, ...others.nodes]),
    ...north,
    ...layer('pm-footer', footer.nodes),
  ]
  return svgOf(view, drawn, { x0: 0, y0: footer.top, x1: frame.width, y1: footer.bottom })
}

function drawChains(chains: WallChains, { plan }: Frame, field: Field): readonly SceneNode[] {
  const edges = { top: topEdge, bottom: bottomEdge, left: leftEdge, right: rightEdge } as const
  return (['top', 'bottom', 'left', 'right'] as const).flatMap(name => {
    const chain = chains[name]
    return chain === undefined ? [] : drawWallChain(chain, edges[name](plan), besidePlan, field)
  })
}

function drawNorth(view: PlanView, { width }: Frame, top: AxisLayout, field: Field): readonly SceneNode[] {
  if (view.north === undefined) return []
  const at = { x: width - besideSheet / 2 - northReach, y: Math.min(-northReach, -top.out.end + northReach) }
  field.addText(box(at, 2 * northReach, 2 * northReach))
  return northPoint(at, -view.north)
}

/** What is set together: of a wall its name and, once worked, its shear. */
function placingsOf(line: WallLine, look: WallLook, sheet: Sheet): readonly Placing[] {
  const shear = shearPlacing(line, look, sheet)
  return shear === undefined ? [namePlacing(line, sheet)] : [namePlacing(line, sheet), shear]
}

interface Labels {
  readonly nodes: readonly SceneNode[]
  readonly leftOut: number
  readonly shears: boolean
}

function setAll(sheet: Sheet, groups: readonly (readonly Placing[])[]): Labels {
  const set = groups.flatMap(group => {
    const [first, second] = group
    const placed = first && second ? placePair(sheet, first, second) : group.map(each => place(sheet, each))
    return placed.map((nodes, idx) => ({ nodes, shows: group[idx]?.shows }))
  })
  return {
    nodes: set.flatMap(({ nodes }) => nodes ?? []),
    leftOut: set.filter(({ nodes }) => nodes === undefined).length,
    shears: set.some(({ nodes, shows }) => nodes !== undefined && shows === 'shear'),
  }
}
