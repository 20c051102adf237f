/**
 * The elevation of a wall, to scale, as one self-contained element of SVG: its outline with the piers washed and the
 * openings crossed, the chains of dimensions below and on the left, levels on the right, grid lines and shear above.
 */
import { inLanguage } from '../base/language.ts'
import { thinArrow } from './arrows.ts'
import { type Chain, drawChain, layoutChain } from './chain.ts'
import type { Edge } from './dimensions.ts'
import { boundsOf, type Frame, frameOf, groundOf } from './elevation-frame.ts'
import { drawFace, drawGrid, drawLevel, levelLetters, stemsOf } from './elevation-parts.ts'
import type { ElevationView } from './elevation-view.ts'
import { openingPlacing, pierPlacing } from './facelabels.ts'
import { Field } from './field.ts'
import { besideSheet } from './frame.ts'
import { type Bounds, box, type Point } from './geometry.ts'
import { lettering, letteringBox, setLettering, startText } from './label.ts'
import { type Placing, place, type Sheet, type Spot } from './placement.ts'
import { drawScaleBar } from './scalebar.ts'
import { element, layer, type SceneNode } from './scene.ts'
import { textStyles } from './style.ts'
import { svgOf } from './svg.ts'
import { shorten, wrap } from './textwidth.ts'

/** A longer leader would be harder to follow than the table of piers or the block of openings. */
const farthest = 90
const quarterTurn = Math.PI / 2

/** @returns the whole `<svg>` element; the same view gives the same bytes */
export function drawElevation(view: ElevationView): string {
  const levels = view.levels.map(({ name, elevation, at }) => ({ at, letters: levelLetters(name, elevation) }))
  const frame = frameOf(view, Math.max(0, ...levels.map(({ letters }) => letters.width)))
  const field = new Field(besideSheet / 2, frame.width - besideSheet / 2)
  const sheet: Sheet = { field, groundAt: groundOf(view, frame), farthest }
  const face = drawFace(view, frame, field)
  const { bottom, side } = chainsOf(view, frame)
  const chains = [...drawChain(bottom, belowFace(frame.face), field), ...drawChain(side, besideFace(frame.face), field)]
  const levelLines = levels.flatMap(level => drawLevel(level, frame, field))
  const stems = stemsOf(view, frame)
  const grid = drawGrid(view, stems ?? [], frame, field)
  const labels = [
    ...(view.shear ? [shearPlacing(view.shear, frame)] : []),
    ...view.openings.map(each => openingPlacing(each.name, each.size, boundsOf(each, frame))),
    ...view.piers.map(each => pierPlacing(each.name, boundsOf(each, frame))),
  ].map(placing => place(sheet, placing))
  const unnamed = labels.filter(nodes => nodes === undefined).length
  const notes = [...view.notes, ...notesOf(view, unnamed, bottom.leftOut + side.leftOut, stems ? 0 : view.grid.length)]
  const held = field.bounds() ?? frame.face
  const footer = drawFooter(view, notes, frame, held.y1 + 22)
  return svgOf(
    view,
    [
      ...layer('pm-walls', face),
      ...layer('pm-axes', [...grid, ...levelLines, ...chains]),
      ...layer(
        'pm-labels',
        labels.flatMap(nodes => nodes ?? []),
      ),
      ...layer('pm-footer', footer.nodes),
    ],
    { x0: 0, y0: held.y0 - besideSheet, x1: frame.width, y1: footer.bottom },
  )
}

const belowFace = ({ y0, y1 }: Bounds): Edge => ({
  at: (along, out) => ({ x: along, y: y1 + out }),
  follow: 0,
  across: -quarterTurn,
  depth: y1 - y0,
  freeEnd: 'before',
  textOut: 1,
})

const besideFace = ({ x0, x1 }: Bounds): Edge => ({
  at: (along, out) => ({ x: x0 - out, y: along }),
  follow: -quarterTurn,
  across: 0,
  depth: x1 - x0,
  freeEnd: 'before',
  textOut: 1,
})

function chainsOf({ length, height, openings, dimension }: ElevationView, frame: Frame) {
  const along = [0, ...openings.flatMap(({ left, right }) => [left, right]), length]
  const up = [0, ...openings.flatMap(({ low, high }) => [low, high]), height]
  const bottom = layoutChain(
    along.map(metres => ({ at: frame.x(metres), metres })),
    dimension,
    besideSheet + 10,
    frame.width - besideSheet - 10,
  )
  const side = layoutChain(
    up.map(metres => ({ at: frame.y(metres), metres })),
    dimension,
    Math.min(frame.face.y0, -60) - 20,
    frame.face.y1 + 10,
  )
  return { bottom, side } satisfies Record<string, Chain>
}

const arrowGap = 9

/** The arrow along the head of the wall and its figure above it, where grid lines and levels leave room. */
function shearPlacing({ printed, toward, governs }: NonNullable<ElevationView['shear']>, { face }: Frame): Placing {
  const letters = lettering(governs ? 'governing' : 'figure', 240, printed)
  const length = Math.max(26, Math.min(72, (face.x1 - face.x0) * 0.7))
  const spot = (x: number, y: number, price: number): Spot => {
    const [at, text] = [
      { x, y },
      { x, y: y - arrowGap / 2 - letters.height / 2 + 1 },
    ]
    return {
      price,
      texts: [letteringBox(letters, text)],
      ink: [box(at, length, arrowGap)],
      draw: ground => [...arrowsOf(at, length, toward), ...setLettering(letters, text, 0, ground)],
    }
  }
  const y = face.y0 - 10
  const shares = [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8]
  return {
    near: shares.map((share, idx) => spot(face.x0 + share * (face.x1 - face.x0), y, idx)),
    anchors: [{ x: (face.x0 + face.x1) / 2, y: face.y0 }],
    free: at => spot(at.x, at.y, 0),
  }
}

function arrowsOf(at: Point, length: number, toward: 'start' | 'end' | undefined): readonly SceneNode[] {
  const right = thinArrow(at, 0, length)
  const left = thinArrow(at, Math.PI, length)
  return toward === undefined ? [right, left] : [toward === 'end' ? right : left]
}

function notesOf({ language }: ElevationView, names: number, dimensions: number, grid: number): readonly string[] {
  const count = (n: number, one: string, many: string): readonly string[] =>
    n === 0 ? [] : [inLanguage(n === 1 ? `1 ${one}` : `${n} ${many}`, language)]
  return [
    ...count(names, 'name is left out for want of room.', 'names are left out for want of room.'),
    ...count(dimensions, 'dimension is left out for want of room.', 'dimensions are left out for want of room.'),
    ...count(grid, 'grid line is left out for want of room.', 'grid lines are left out for want of room.'),
  ]
}

const textRow = 18

/** Name, scale bar and words, below everything else. */
function drawFooter(view: ElevationView, notes: readonly string[], frame: Frame, y: number) {
  const x = 16
  const bar = drawScaleBar({ x, y }, frame.scale * view.scaleUnit.metres, view.scaleUnit.name, view.language)
  const beside = x + bar.width + 36
  const room = frame.width - 16 - beside
  const lines = notes.flatMap(note => wrap(note, textStyles.legend, room))
  const name = shorten(view.name, textStyles.wall, room)
  const whole = name.full === undefined ? [] : [element('title', {}, [name.full])]
  return {
    nodes: [
      ...bar.nodes,
      { ...startText(name.text, 'wall', { x: beside, y }), children: [...whole, name.text] },
      ...lines.map((line, idx) => startText(line, 'legend', { x: beside, y: y + (idx + 1) * textRow })),
    ],
    bottom: Math.max(y + 26, y + (lines.length + 1) * textRow),
  }
}
