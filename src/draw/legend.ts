/** Below the plan: the scale bar, the meaning of each symbol drawn, and what had to be left out. */
import { bareHead, broadArrow, thinArrow } from './arrows.ts'
import type { Point } from './geometry.ts'
import { startText } from './label.ts'
import { element, type SceneNode, words } from './scene.ts'
import { textStyles } from './style.ts'
import { lozenge, quarteredCircle } from './symbols.ts'
import { textWidth, wrap } from './textwidth.ts'
import { wallFrame } from './walls.ts'

export interface LegendEntry {
  /** Drawn about a point, within `symbolWidth` of the left edge of its row. */
  readonly symbol: (at: Point) => readonly SceneNode[]
  readonly text: string
}

export interface Footer {
  readonly nodes: readonly SceneNode[]
  readonly bottom: number
}

/** Where texts begin, and the middle of the symbols before them. */
const symbolWidth = 46
const symbolMiddle = 19
const columnGap = 24
const rowHeight = 20
const textRow = 18

/** Sets entries in as many columns as the room takes, then the notes in full width. */
export function drawLegend(entries: readonly LegendEntry[], notes: readonly string[], at: Point, room: number): Footer {
  const set = entries.map(({ symbol, text }): SetEntry => {
    const lines = wrap(text, textStyles.legend, room - symbolWidth)
    const widest = Math.max(...lines.map(line => textWidth(line, textStyles.legend)))
    return { symbol, lines, width: symbolWidth + widest + columnGap }
  })
  let x = at.x
  let bottom = at.y
  const nodes = columnsOf(set, room + columnGap).flatMap(column => {
    let y = at.y
    const drawn = column.flatMap(entry => {
      const own = drawEntry(entry, { x, y })
      y += rowHeight + (entry.lines.length - 1) * textRow
      return own
    })
    x += widthOf(column)
    bottom = Math.max(bottom, y)
    return drawn
  })
  return withNotes(nodes, notes, { x: at.x, y: bottom }, room)
}

interface SetEntry extends Pick<LegendEntry, 'symbol'> {
  readonly lines: readonly string[]
  readonly width: number
}

const widthOf = (column: readonly SetEntry[]): number => Math.max(...column.map(({ width }) => width))

/** As many columns as stand side by side in the room, each as wide as its own widest entry. */
function columnsOf(entries: readonly SetEntry[], room: number): readonly (readonly SetEntry[])[] {
  for (let count = entries.length; count > 1; count--) {
    const rows = Math.ceil(entries.length / count)
    const columns = Array.from({ length: Math.ceil(entries.length / rows) }, (_, idx) =>
      entries.slice(idx * rows, (idx + 1) * rows),
    )
    if (columns.reduce((sum, column) => sum + widthOf(column), 0) <= room) return columns
  }
  return entries.length === 0 ? [] : [entries]
}

function withNotes(nodes: readonly SceneNode[], notes: readonly string[], at: Point, room: number): Footer {
  const lines = notes.flatMap(note => wrap(note, textStyles.legend, room))
  const set = lines.map((line, idx) => startText(line, 'legend', { x: at.x, y: at.y + idx * textRow }))
  return { nodes: [...nodes, ...set], bottom: at.y + lines.length * textRow }
}

function drawEntry({ symbol, lines }: SetEntry, at: Point): readonly SceneNode[] {
  const texts = lines.map((line, idx) => startText(line, 'legend', { x: at.x + symbolWidth, y: at.y + idx * textRow }))
  return [...symbol({ x: at.x + symbolMiddle, y: at.y }), ...texts]
}

/** The symbols of a plan, about the middle of their place. */
export const symbolOf = {
  centreOfMass: (at: Point) => quarteredCircle(at, 6),
  centreOfRigidity: (at: Point) => lozenge(at, 7),
  force: ({ x, y }: Point) => [broadArrow({ x: x + 14, y }, 0, 28)],
  eccentricity: ({ x, y }: Point) => [
    element('path', { class: 'pm-legs', d: words('M', x - 12, y + 5, 'L', x + 12, y + 5, 'L', x + 12, y - 6) }),
  ],
  governs: governingSymbol,
  arrow: (length: number) => (at: Point) => [thinArrow(at, 0, length)],
  /** A piece of a line as the drawing has it. */
  line:
    (className: string) =>
    ({ x, y }: Point) => [element('path', { class: className, d: words('M', x - 16, y, 'L', x + 16, y) })],
  /** A length of a diagram between two strokes. */
  width: (length: number) => (at: Point) => [widthSymbol(at, length)],
  bareHead: (at: Point) => [bareHead(at, 0)],
} as const

function widthSymbol({ x, y }: Point, length: number): SceneNode {
  const [a, b] = [x - length / 2, x + length / 2]
  return element('path', {
    class: 'pm-step-line',
    d: words('M', a, y - 5, 'L', a, y + 5, 'M', b, y - 5, 'L', b, y + 5, 'M', a, y, 'L', b, y),
  })
}

function governingSymbol({ x, y }: Point): readonly SceneNode[] {
  const [a, b] = [
    { x: x - 10, y },
    { x: x + 10, y },
  ]
  const stroke = element('path', { class: 'pm-wall', 'stroke-width': 5, d: words('M', a.x, a.y, 'L', b.x, b.y) })
  return [stroke, wallFrame(a, b, 5)]
}
