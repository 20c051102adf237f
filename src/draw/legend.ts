/** Below the plan: the scale bar, the meaning of each symbol drawn, and what had to be left out. */
import { broadArrow, thinArrow } from './arrows.ts'
import type { Point } from './geometry.ts'
import { startText } from './label.ts'
import { element, type SceneNode, words } from './scene.ts'
import { textStyles } from './style.ts'
import { lozenge, quarteredCircle } from './symbols.ts'
import { textWidth, wrap } from './textwidth.ts'
import { wallFrame } from './walls.ts'

export type MarkName = 'shear' | 'centreOfMass' | 'centreOfRigidity' | 'force' | 'eccentricity' | 'governs'

export interface LegendEntry {
  readonly symbol: MarkName
  readonly text: string
}

export interface Footer {
  readonly nodes: readonly SceneNode[]
  readonly bottom: number
}

const symbolWidth = 34
const columnGap = 24
const rowHeight = 20
const textRow = 18

/** Sets entries in as many columns as the room takes, then the notes in full width. */
export function drawLegend(entries: readonly LegendEntry[], notes: readonly string[], at: Point, room: number): Footer {
  const texts = entries.map(({ text }) => wrap(text, textStyles.legend, room - symbolWidth))
  const widest = Math.max(0, ...texts.flat().map(line => textWidth(line, textStyles.legend)))
  const columnWidth = symbolWidth + widest + columnGap
  const columns = Math.max(1, Math.min(entries.length, Math.floor((room + columnGap) / columnWidth)))
  const rows = Math.ceil(entries.length / columns)
  const nodes: SceneNode[] = []
  let bottom = at.y
  for (let column = 0; column < columns; column++) {
    let y = at.y
    for (let idx = column * rows; idx < Math.min(entries.length, (column + 1) * rows); idx++) {
      const [entry, lines] = [entries[idx], texts[idx] ?? []]
      if (entry === undefined) continue
      nodes.push(...drawEntry(entry.symbol, lines, { x: at.x + column * columnWidth, y }))
      y += rowHeight + (lines.length - 1) * textRow
    }
    bottom = Math.max(bottom, y)
  }
  return withNotes(nodes, notes, { x: at.x, y: bottom }, room)
}

function withNotes(nodes: readonly SceneNode[], notes: readonly string[], at: Point, room: number): Footer {
  const lines = notes.flatMap(note => wrap(note, textStyles.legend, room))
  const set = lines.map((line, idx) => startText(line, 'legend', { x: at.x, y: at.y + idx * textRow }))
  return { nodes: [...nodes, ...set], bottom: at.y + lines.length * textRow }
}

function drawEntry(symbol: MarkName, lines: readonly string[], at: Point): readonly SceneNode[] {
  const texts = lines.map((line, idx) => startText(line, 'legend', { x: at.x + symbolWidth, y: at.y + idx * textRow }))
  return [...drawSymbol(symbol, { x: at.x + 13, y: at.y }), ...texts]
}

function drawSymbol(symbol: MarkName, at: Point): readonly SceneNode[] {
  switch (symbol) {
    case 'shear':
      return [thinArrow(at, 0, 24)]
    case 'centreOfMass':
      return quarteredCircle(at, 6)
    case 'centreOfRigidity':
      return lozenge(at, 7)
    case 'force':
      return [broadArrow({ x: at.x + 14, y: at.y }, 0, 28)]
    case 'eccentricity':
      return [
        element('path', {
          class: 'pm-legs',
          d: words('M', at.x - 12, at.y + 5, 'L', at.x + 12, at.y + 5, 'L', at.x + 12, at.y - 6),
        }),
      ]
    case 'governs':
      return governingSymbol(at)
  }
}

function governingSymbol({ x, y }: Point): readonly SceneNode[] {
  const [a, b] = [
    { x: x - 10, y },
    { x: x + 10, y },
  ]
  const stroke = element('path', { class: 'pm-wall', 'stroke-width': 5, d: words('M', a.x, a.y, 'L', b.x, b.y) })
  return [stroke, wallFrame(a, b, 5)]
}
