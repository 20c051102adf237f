/** What acts on the slab: areas told apart by their load, and loads that act at a point. */
import { pointPlacing } from './centres.ts'
import type { Field } from './field.ts'
import { type Box, box, type Point } from './geometry.ts'
import { hatching, mostHatches } from './hatch.ts'
import { lettering } from './label.ts'
import type { LegendEntry } from './legend.ts'
import type { Placing } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'
import type { Patch } from './slab.ts'
import { textStyles } from './style.ts'
import { shorten } from './textwidth.ts'

/** The areas of each load in the order of their first use; none where all areas carry the same. */
export function loadGroups(areas: readonly Patch[]): ReadonlyMap<string, readonly Patch[]> {
  const groups = new Map<string, Patch[]>()
  for (const area of areas) {
    if (area.load === '') continue
    const known = groups.get(area.load)
    if (known === undefined) groups.set(area.load, [area])
    else known.push(area)
  }
  return groups.size > 1 ? groups : new Map()
}

/** A hatch of its own for each load, broken around the texts that are set. */
export function hatchLoads(
  groups: ReadonlyMap<string, readonly Patch[]>,
  openings: readonly Patch[],
  texts: readonly Box[],
): readonly SceneNode[] {
  const holes = openings.map(({ outline }) => outline)
  return [...groups.values()].flatMap((areas, idx) =>
    areas.flatMap(({ outline }) => hatching(idx, outline, holes, texts)),
  )
}

const namesInKey = 3
const longestName = 110

/** A swatch of each hatch, its load, and the areas that carry it. */
export function loadEntries(groups: ReadonlyMap<string, readonly Patch[]>): readonly LegendEntry[] {
  return [...groups].slice(0, mostHatches).map(([load, areas], idx) => {
    const names = areas.slice(0, namesInKey).map(({ name }) => shorten(name, textStyles.legend, longestName).text)
    const more = areas.length - names.length
    return {
      symbol: at => swatch(idx, at),
      text: `${load}: ${names.join(', ')}${more > 0 ? ` and ${more} more` : ''}`,
    }
  })
}

function swatch(idx: number, { x, y }: Point): readonly SceneNode[] {
  const [w, h] = [16, 7.5]
  const outline = [
    { x: x - w, y: y - h },
    { x: x + w, y: y - h },
    { x: x + w, y: y + h },
    { x: x - w, y: y + h },
  ]
  return [
    element('rect', { class: 'pm-swatch', x: x - w, y: y - h, width: 2 * w, height: 2 * h }),
    ...hatching(idx, outline, [], []),
  ]
}

/** A load that acts at a point, on the sheet. */
export interface PointMark {
  readonly at: Point
  readonly name: string
  readonly load: string
}

const markRadius = 4.5

/** A circle with a cross: a force into the page. */
export function pointLoadSymbol({ x, y }: Point): readonly SceneNode[] {
  const arm = markRadius * Math.SQRT1_2
  const d = words('M', x - arm, y - arm, 'L', x + arm, y + arm, 'M', x - arm, y + arm, 'L', x + arm, y - arm)
  return [
    element('circle', { class: 'pm-load', cx: x, cy: y, r: markRadius }),
    element('path', { class: 'pm-load-cross', d }),
  ]
}

export function drawPointLoads(marks: readonly PointMark[], field: Field): readonly SceneNode[] {
  for (const { at } of marks) field.addInk(box(at, 2 * markRadius, 2 * markRadius))
  return marks.flatMap(({ at }) => pointLoadSymbol(at))
}

export const pointLoadPlacing = ({ at, name, load }: PointMark): Placing =>
  pointPlacing(lettering('area', 150, name, load), at, markRadius)
