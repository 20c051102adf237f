/** The face of a wall, its levels and the grid lines that it meets. */
import { bubbleName } from './axis.ts'
import { boundsOf, cornersOf, type Frame, path } from './elevation-frame.ts'
import type { ElevationView } from './elevation-view.ts'
import type { Field } from './field.ts'
import { besideSheet } from './frame.ts'
import { type Bounds, box } from './geometry.ts'
import { type Lettering, lettering, letteringBox, setLettering } from './label.ts'
import { priceOfCrossing } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'
import { arrangeStems, type Stem } from './stems.ts'
import { textStyles } from './style.ts'
import { shorten, textWidth } from './textwidth.ts'

const pastWall = 10
const bubbleHeight = 21

/** Outline, piers, openings with their crosses. */
export function drawFace(view: ElevationView, frame: Frame, field: Field): readonly SceneNode[] {
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

const widestLevel = 150

/**
 * The name as far as there is room for it before its elevation. It is set apart as a text of its own direction, so
 * that a name from right to left does not turn the figures round.
 */
export function levelLetters(name: string, elevation: string): Lettering {
  if (elevation === '') return lettering('dimension', widestLevel, name)
  const tail = `, ${elevation}`
  const { text } = shorten(name, textStyles.dimension, widestLevel - textWidth(tail, textStyles.dimension))
  return lettering('dimension', 2 * widestLevel, `\u2068${text}\u2069${tail}`)
}

/** A line past the right end of the wall, its words on it; those of the foot stand below. */
export function drawLevel(
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
  return [path('pm-level-line', [line.a, line.b]), ...setLettering(letters, middle, 0, 'clear')]
}

/** Room between the head of the wall and the bubbles, where the shear is shown. */
const shearRoom = 44

export function stemsOf({ grid }: ElevationView, { x, width }: Frame): readonly Stem[] | undefined {
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

export function drawGrid(
  view: ElevationView,
  stems: readonly Stem[],
  frame: Frame,
  field: Field,
): readonly SceneNode[] {
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
