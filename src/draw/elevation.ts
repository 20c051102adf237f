/**
 * The elevation of a wall, to scale, as one self-contained element of SVG: its outline with the piers washed and the
 * openings crossed, the chains of dimensions below and on the left, levels on the right, grid lines and shear above.
 */
import { inLanguage } from '../base/language.ts'
import { thinArrow } from './arrows.ts'
import { bubbleName } from './axis.ts'
import { type Chain, drawChain, layoutChain } from './chain.ts'
import type { Edge } from './dimensions.ts'
import type { ElevationView } from './elevation-view.ts'
import { openingPlacing, pierPlacing } from './facelabels.ts'
import { Field } from './field.ts'
import { besideSheet, sheetWidth } from './frame.ts'
import { type Bounds, box, type Point } from './geometry.ts'
import { type Lettering, lettering, letteringBox, setLettering, startText } from './label.ts'
import { picture } from './picture.ts'
import { type Placing, place, priceOfCrossing, type Sheet, type Spot } from './placement.ts'
import { drawScaleBar } from './scalebar.ts'
import { element, layer, type SceneNode, serialise, words } from './scene.ts'
import { arrangeStems, type Stem } from './stems.ts'
import { rootClass, textStyles } from './style.ts'
import { shorten, textWidth, wrap } from './textwidth.ts'

const tallest = 340
const narrowest = 420
/** A longer leader would be harder to follow than the table of piers or the block of openings. */
const farthest = 90
const quarterTurn = Math.PI / 2
const pastWall = 10
const bubbleHeight = 21

const style = [
  ['.pm-face', 'fill:var(--paper,#fffdf8);stroke:none'],
  ['.pm-face-edge', 'fill:none;stroke:var(--ink,#1d1c1a);stroke-width:1.8;stroke-linejoin:miter'],
  ['.pm-pier', 'fill:var(--wash,#f5efe3);stroke:var(--soft,#6b675f);stroke-width:.5'],
  ['.pm-void', 'fill:var(--paper,#fffdf8);stroke:var(--ink,#1d1c1a);stroke-width:1.3'],
  ['.pm-foot', 'fill:none;stroke:var(--ink,#1d1c1a);stroke-width:2.4'],
  ['.pm-level', 'fill:none;stroke:var(--soft,#6b675f);stroke-width:.8'],
]
  .map(([selector, body]) => `.${rootClass} ${selector}{${body}}`)
  .join('')

/** Where the wall lies on the sheet. */
interface Frame {
  readonly width: number
  readonly scale: number
  readonly face: Bounds
  readonly x: (metres: number) => number
  readonly y: (metres: number) => number
}

/** @returns the whole `<svg>` element; the same view gives the same bytes */
export function drawElevation(view: ElevationView): string {
  const levels = view.levels.map(({ name, elevation, at }) => ({ at, letters: levelLetters(name, elevation) }))
  const frame = frameOf(view, Math.max(0, ...levels.map(({ letters }) => letters.width)))
  const field = new Field(besideSheet / 2, frame.width - besideSheet / 2)
  const sheet: Sheet = { field, groundAt: groundOf(view, frame), farthest }
  const face = drawFace(view, frame, field)
  const { bottom, side } = chainsOf(view, frame)
  const chains = [...drawChain(bottom, bottomEdge(frame.face), field), ...drawChain(side, leftEdge(frame.face), field)]
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
  return serialise(
    picture(view, { x0: 0, y0: held.y0 - besideSheet, x1: frame.width, y1: footer.bottom }, style, [
      ...layer('pm-walls', face),
      ...layer('pm-axes', [...grid, ...levelLines, ...chains]),
      ...layer(
        'pm-labels',
        labels.flatMap(nodes => nodes ?? []),
      ),
      ...layer('pm-footer', footer.nodes),
    ]),
  )
}

/** The margins hold the widest that may stand in them, so that the scale does not hang on what is drawn. */
function frameOf({ length, height, levels, openings, dimension }: ElevationView, widestLevel: number): Frame {
  const sizes = [height, ...openings.flatMap(({ low, high }) => [low, high - low, height - high])]
  const widest = Math.max(...sizes.map(size => lettering('dimension', 120, dimension(size)).width))
  const left = besideSheet + 96 + widest
  const right = besideSheet + 14 + Math.max(widestLevel, 20)
  const top = Math.max(height, ...levels.map(({ at }) => at))
  const scale = Math.min((sheetWidth - left - right) / length, tallest / top)
  const width = Math.min(sheetWidth, Math.max(narrowest, left + right + length * scale))
  const x0 = left + (width - left - right - length * scale) / 2
  return {
    width,
    scale,
    face: { x0, y0: -height * scale, x1: x0 + length * scale, y1: 0 },
    x: metres => x0 + metres * scale,
    y: metres => -metres * scale,
  }
}

const boundsOf = (
  {
    left,
    right,
    low,
    high,
  }: { readonly left: number; readonly right: number; readonly low: number; readonly high: number },
  { x, y }: Frame,
): Bounds => ({ x0: x(left), y0: y(high), x1: x(right), y1: y(low) })

const holds = ({ x0, y0, x1, y1 }: Bounds, { x, y }: Point): boolean => x > x0 && x < x1 && y > y0 && y < y1

function groundOf(view: ElevationView, frame: Frame): Sheet['groundAt'] {
  const piers = view.piers.map(pier => boundsOf(pier, frame))
  return at => (piers.some(pier => holds(pier, at)) ? 'wash' : 'paper')
}

const cornersOf = ({ x0, y0, x1, y1 }: Bounds): readonly Point[] => [
  { x: x0, y: y1 },
  { x: x1, y: y1 },
  { x: x1, y: y0 },
  { x: x0, y: y0 },
]

const path = (className: string, points: readonly Point[], closed = ''): SceneNode =>
  element('path', {
    class: className,
    d: `${points.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' ')}${closed}`,
  })

/** Outline, piers, openings with their crosses. */
function drawFace(view: ElevationView, frame: Frame, field: Field): readonly SceneNode[] {
  const edgesOf = (bounds: Bounds, price: number): void => {
    const corners = cornersOf(bounds)
    corners.forEach((a, idx) => {
      field.addLine({ a, b: corners[(idx + 1) % 4] ?? a }, price)
    })
  }
  const outline = cornersOf(frame.face)
  edgesOf(frame.face, Number.POSITIVE_INFINITY)
  const piers = view.piers.map(pier => {
    edgesOf(boundsOf(pier, frame), priceOfCrossing.seam)
    return path('pm-pier', cornersOf(boundsOf(pier, frame)), ' Z')
  })
  const openings = view.openings.flatMap(opening => {
    const bounds = boundsOf(opening, frame)
    edgesOf(bounds, Number.POSITIVE_INFINITY)
    const [a, b, c, d] = cornersOf(bounds)
    if (!a || !b || !c || !d) return []
    field.addLine({ a, b: c }, 1)
    field.addLine({ a: b, b: d }, 1)
    return [
      path('pm-void', cornersOf(bounds), ' Z'),
      element('path', { class: 'pm-crossed', d: words('M', a.x, a.y, 'L', c.x, c.y, 'M', b.x, b.y, 'L', d.x, d.y) }),
    ]
  })
  const { x0, x1, y1 } = frame.face
  const foot = path('pm-foot', [
    { x: x0 - 6, y: y1 },
    { x: x1 + 6, y: y1 },
  ])
  return [path('pm-face', outline, ' Z'), ...piers, path('pm-face-edge', outline, ' Z'), ...openings, foot]
}

const bottomEdge = ({ y0, y1 }: Bounds): Edge => ({
  at: (along, out) => ({ x: along, y: y1 + out }),
  follow: 0,
  across: -quarterTurn,
  depth: y1 - y0,
  freeEnd: 'before',
})

const leftEdge = ({ x0, x1 }: Bounds): Edge => ({
  at: (along, out) => ({ x: x0 - out, y: along }),
  follow: -quarterTurn,
  across: 0,
  depth: x1 - x0,
  freeEnd: 'before',
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

const widestLevel = 150

/**
 * The name as far as there is room for it before its elevation. It is set apart as a text of its own direction, so
 * that a name from right to left does not turn the figures round.
 */
function levelLetters(name: string, elevation: string): Lettering {
  if (elevation === '') return lettering('dimension', widestLevel, name)
  const tail = `, ${elevation}`
  const { text } = shorten(name, textStyles.dimension, widestLevel - textWidth(tail, textStyles.dimension))
  return lettering('dimension', 2 * widestLevel, `\u2068${text}\u2069${tail}`)
}

/** A line past the right end of the wall, its words on it; those of the foot stand below. */
function drawLevel(
  { at, letters }: { readonly at: number; readonly letters: Lettering },
  { y, face }: Frame,
  field: Field,
): readonly SceneNode[] {
  const height = y(at)
  const line = {
    a: { x: face.x1 + 6, y: height },
    b: { x: face.x1 + 12 + letters.width, y: height },
  }
  const middle = {
    x: face.x1 + 10 + letters.width / 2,
    y: height + (at > 0 ? -1 : 1) * (letters.height / 2),
  }
  field.addLine(line, Number.POSITIVE_INFINITY)
  field.addText(letteringBox(letters, middle))
  return [path('pm-level', [line.a, line.b]), ...setLettering(letters, middle, 0, 'clear')]
}

/** Room between the head of the wall and the bubbles, where the shear is shown. */
const shearRoom = 44

function stemsOf({ grid }: ElevationView, { x, width }: Frame): readonly Stem[] | undefined {
  const stops = [...grid]
    .sort((a, b) => a.at - b.at || (a.name < b.name ? -1 : 1))
    .map(({ name, at }) => ({ name, at: x(at), metres: at }))
  const bubble = Math.max(bubbleHeight, ...stops.map(({ name }) => bubbleName(name).width + 5))
  return arrangeStems(stops, {
    bubble,
    gaps: [],
    low: besideSheet + bubble / 2,
    high: width - besideSheet - bubble / 2,
  })
}

function drawGrid(view: ElevationView, stems: readonly Stem[], frame: Frame, field: Field): readonly SceneNode[] {
  const top = frame.y(Math.max(view.height, ...view.levels.map(({ at }) => at))) - shearRoom
  return stems.flatMap(({ stop, place, row }) => {
    const letters = bubbleName(stop.name)
    const at = { x: place, y: top - 14 - row * (bubbleHeight + 4) - bubbleHeight / 2 }
    const width = Math.max(bubbleHeight, letters.width + 5)
    const points = [
      { x: stop.at, y: frame.face.y1 + pastWall },
      { x: stop.at, y: top },
      { x: place, y: top - 10 },
      { x: place, y: at.y + bubbleHeight / 2 },
    ]
    points.slice(1).forEach((b, idx) => {
      field.addLine({ a: points[idx] ?? b, b }, priceOfCrossing.gridLine)
    })
    field.addText(box(at, width, bubbleHeight))
    return [
      path('pm-gridline', points),
      element('rect', {
        class: 'pm-bubble',
        x: at.x - width / 2,
        y: at.y - bubbleHeight / 2,
        width,
        height: bubbleHeight,
        rx: bubbleHeight / 2,
      }),
      ...setLettering(letters, at, 0, 'clear'),
    ]
  })
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
