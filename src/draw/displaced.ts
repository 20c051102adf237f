/**
 * The displaced shape of a level in a case: the slab at rest, dashed, and as it moves with its
 * walls, drawn larger by a round factor that is printed.
 *
 * A point p moves by u − φ (y − y_r) and v + φ (x − x_r), as the printed displacements do.
 */
import { inLanguage } from '../base/language.ts'
import { arrowKey } from './arrowkey.ts'
import { scaledArrow, shortestArrow } from './arrows.ts'
import { type Centres, drawMarked, type Force, pointPlacing } from './centres.ts'
import type { DisplacedView, MovedPoint } from './displacedview.ts'
import { Field } from './field.ts'
import { besideBar, type FooterDrawn, lower } from './footer.ts'
import { besideSheet, type Frame, frameOf, isWithin } from './frame.ts'
import { add, between, boundsOfPoints, distance, type Point, sidesOf, strokeBox, times, toward } from './geometry.ts'
import { lettering } from './label.ts'
import { drawLegend, type LegendEntry, symbolOf } from './legend.ts'
import { type Placing, place, priceOfCrossing, type Sheet } from './placement.ts'
import { drawScaleBar, plainFigure, roundLength } from './scalebar.ts'
import { element, layer, type SceneNode, words } from './scene.ts'
import { closed, groundOf } from './slab.ts'
import { svgOf } from './svg.ts'
import type { PlanPoint } from './view.ts'
import { namePlacing } from './walllabels.ts'
import { drawWalls, type WallLine } from './walls.ts'

/** The farthest point moves at most this share of the plan's larger side. */
const farthestMove = 0.1
/** Less than this, in metres, is no displacement but the rounding of one. */
const rounding = 1e-12
const margins = { left: 70, right: 70 }
const stroke = 4.5
const manyWalls = 120
const farthest = 6000

/** How a point of the slab moves, in metres. */
export function moveOf({ at, u, v, phi }: DisplacedView['centre'], p: PlanPoint): Point {
  return { x: u - phi * (p.y - at.y), y: v + phi * (p.x - at.x) }
}

/** 1, 2 or 5 times a power of ten, by which displacements are drawn larger than the plan; 1 where nothing moves. */
export function magnification(view: DisplacedView): number {
  const points = pointsOf(view)
  const bounds = boundsOfPoints(points) ?? { x0: 0, y0: 0, x1: 0, y1: 0 }
  const size = Math.max(bounds.x1 - bounds.x0, bounds.y1 - bounds.y0)
  const most = Math.max(0, ...points.map(p => Math.hypot(moveOf(view.centre, p).x, moveOf(view.centre, p).y)))
  return most > rounding && size > 0 ? roundLength((size * farthestMove) / most) : 1
}

const pointsOf = ({ outline, walls }: DisplacedView): readonly PlanPoint[] => [
  ...outline.flat(),
  ...walls.flatMap(({ from, to }) => [from, to]),
]

/** @returns the whole `<svg>` element; the same view gives the same bytes */
export function drawDisplaced(view: DisplacedView): string {
  const factor = magnification(view)
  const displaced = (p: PlanPoint): PlanPoint => {
    const move = moveOf(view.centre, p)
    return { x: p.x + factor * move.x, y: p.y + factor * move.y }
  }
  const held = [...pointsOf(view), ...pointsOf(view).map(displaced), view.mass.at]
  const frame = frameOf(boundsOfPoints(held) ?? { x0: 0, y0: 0, x1: 0, y1: 0 }, margins)
  const field = new Field(besideSheet / 2, frame.width - besideSheet / 2)
  const rest = view.outline.map(ring => ring.map(frame.toSheet))
  const moved = view.outline.map(ring => ring.map(p => frame.toSheet(displaced(p))))
  for (const side of [...rest, ...moved].flatMap(sidesOf)) field.addLine(side, priceOfCrossing.legs)

  const restWalls = view.walls.map(({ from, to }) => ({ a: frame.toSheet(from), b: frame.toSheet(to) }))
  const lines = view.walls.map(
    ({ name, from, to }): WallLine => ({
      wall: { name, from, to, governs: false },
      from: frame.toSheet(displaced(from)),
      to: frame.toSheet(displaced(to)),
      stroke,
      half: stroke / 2,
    }),
  )
  const walls = drawWalls(lines, field)
  for (const { a, b } of restWalls) field.addInk(strokeBox(a, b, 3))

  const patches = moved.map(outline => ({ name: '', load: '', outline }))
  const sheet: Sheet = { field, groundAt: groundOf(patches, []), farthest }
  const { centres, beyond } = centresOf(view, frame)
  const turn = centres.rigidity ? drawTurn(view, frame, field) : []
  const marks = drawMarked(centres, field)
  const moves = [view.mass, view.corner].map(point => drawMove(point, displaced, frame, field))
  const named = setAll(
    { ...sheet, farthest: view.walls.length > manyWalls ? 0 : farthest },
    lines.map(line => namePlacing(line, sheet)),
  )
  const labels = setAll(sheet, [...marks.labels, cornerPlacing(view.corner, frame.toSheet(displaced(view.corner.at)))])
  const footer = drawFoot(view, frame, field, factor, centres, [...beyond, ...leftOutNotes(view, named.leftOut)])
  const nodes = [
    ...layer('pm-slab', [
      element('path', { class: 'pm-wash', 'fill-rule': 'evenodd', d: moved.map(closed).join(' ') }),
      element('path', { class: 'pm-edge', d: moved.map(closed).join(' ') }),
      element('path', { class: 'pm-rest', d: rest.map(closed).join(' ') }),
    ]),
    ...layer('pm-walls', [
      ...(restWalls.length > 0
        ? [
            element('path', {
              class: 'pm-rest-wall',
              d: restWalls.map(({ a, b }) => words('M', a.x, a.y, 'L', b.x, b.y)).join(' '),
            }),
          ]
        : []),
      ...walls,
    ]),
    ...layer('pm-centres', [...moves.flat(), ...turn, ...marks.nodes]),
    ...layer('pm-labels', [...named.nodes, ...labels.nodes]),
    ...layer('pm-footer', footer.nodes),
  ]
  return svgOf(view, nodes, { x0: 0, y0: footer.top, x1: frame.width, y1: footer.bottom })
}

/** The marks that lie on the sheet, and for each that lies beyond it a line that tells what it would. */
function centresOf(
  view: DisplacedView,
  { toSheet, plan }: Frame,
): { readonly centres: Centres; readonly beyond: readonly string[] } {
  const { force, mass, centre, printed } = view
  const onSheet = (p: PlanPoint): boolean => isWithin(toSheet(p), plan, 3)
  const acts: Force | undefined = force && {
    at: toSheet(force.at),
    angle: Math.atan2(-force.y, force.x),
    text: force.printed,
  }
  const text = `CR ${printed.centre}`
  const more = `φ = ${printed.rotation}`
  return {
    centres: {
      mass: { at: toSheet(mass.at), text: `${mass.name} ${mass.printed}` },
      ...(onSheet(centre.at) ? { rigidity: { at: toSheet(centre.at), text, more } } : {}),
      ...(force && acts && onSheet(force.at) ? { force: acts } : {}),
    },
    beyond: [
      ...(onSheet(centre.at) ? [] : [`Beyond the sketch: ${text}, ${more}`]),
      ...(force && !onSheet(force.at) ? [`Acts beyond the sketch: ${force.printed}`] : []),
    ],
  }
}

const turnRadius = 21

/** The rotation about the centre of rigidity, on the side away from the centre of mass; its size is printed, not drawn. */
function drawTurn({ centre, mass }: DisplacedView, { toSheet }: Frame, field: Field): readonly SceneNode[] {
  if (Math.abs(centre.phi) < rounding) return []
  const at = toSheet(centre.at)
  const from = toSheet(mass.at)
  const away = distance(at, from) > 1 ? Math.atan2(at.y - from.y, at.x - from.x) : Math.PI / 2
  // Counter-clockwise on the plan is against the angles of the sheet, whose y runs down.
  const way = centre.phi > 0 ? -1 : 1
  const points = [-3, -2, -1, 0, 1, 2, 3].map(step => add(at, times(toward(away + way * step * 0.3), turnRadius)))
  points.slice(1).forEach((b, idx) => {
    field.addInk(strokeBox(points[idx] ?? b, b, 6))
  })
  const [first, tip] = [points[0] ?? at, points.at(-1) ?? at]
  const heading = away + way * (0.9 + Math.PI / 2 - 0.15)
  const barbs = [-1, 1].map(side => add(tip, times(toward(heading + Math.PI + side * 0.55), 6.5)))
  const [left = tip, right = tip] = barbs
  const d = words('M', first.x, first.y, 'A', turnRadius, turnRadius, 0, 0, way > 0 ? 1 : 0, tip.x, tip.y)
  const head = words('M', left.x, left.y, 'L', tip.x, tip.y, 'L', right.x, right.y)
  return [element('path', { class: 'pm-shear', d: `${d} ${head}` })]
}

/** The way of a point from rest to where it is displaced; too short to see, it is left to its figure. */
function drawMove(
  { at }: MovedPoint,
  displaced: (p: PlanPoint) => PlanPoint,
  { toSheet }: Frame,
  field: Field,
): readonly SceneNode[] {
  const [a, b] = [toSheet(at), toSheet(displaced(at))]
  const length = distance(a, b)
  if (length < shortestArrow) return []
  field.addInk(strokeBox(a, b, 7))
  return [scaledArrow(between(a, b, 0.5), Math.atan2(b.y - a.y, b.x - a.x), length)]
}

const cornerPlacing = ({ name, printed }: MovedPoint, at: Point): Placing =>
  pointPlacing(lettering('governing', 230, `${name} ${printed}`), at, 5)

function setAll(
  sheet: Sheet,
  placings: readonly Placing[],
): { readonly nodes: readonly SceneNode[]; readonly leftOut: number } {
  const set = placings.map(placing => place(sheet, placing))
  return { nodes: set.flatMap(nodes => nodes ?? []), leftOut: set.filter(nodes => nodes === undefined).length }
}

function leftOutNotes({ language }: DisplacedView, leftOut: number): readonly string[] {
  if (leftOut === 0) return []
  return [inLanguage(`${leftOut} ${leftOut === 1 ? 'name is' : 'names are'} left out for want of room.`, language)]
}

/** The scale of the plan, what each line is, and the scale of the displacements. */
function drawFoot(
  view: DisplacedView,
  frame: Frame,
  field: Field,
  factor: number,
  centres: Centres,
  notes: readonly string[],
): FooterDrawn {
  const held = field.bounds() ?? frame.plan
  const y = Math.max(held.y1, frame.plan.y1 + 14) + 24
  const x = 24
  const bar = drawScaleBar({ x, y }, frame.scale * view.scaleUnit.metres, view.scaleUnit.name, view.language)
  const entries = entriesOf(view, frame, factor, centres)
  const legend = lower(
    drawLegend(entries, notes, { x, y: y + 40 }, frame.width - 16 - x),
    besideBar(entries, notes, { x: x + bar.width + 40, y }, frame.width - 16),
  )
  return {
    nodes: [...bar.nodes, ...legend.nodes],
    top: held.y0 - besideSheet,
    bottom: Math.max(y + 24, legend.bottom),
  }
}

function entriesOf(
  view: DisplacedView,
  { scale }: Frame,
  factor: number,
  { force, rigidity }: Centres,
): readonly LegendEntry[] {
  const { language, displacementUnit, forceWords } = view
  const own = (text: string): string => inLanguage(text, language)
  const room = 1000 * scale
  const moves = factor === 1 ? undefined : arrowKey(room / scale / factor, room, displacementUnit, language)
  const times = factor === 1 ? '' : ` × ${plainFigure(factor, language)}`
  return [
    { symbol: symbolOf.line('pm-rest'), text: own('at rest') },
    { symbol: symbolOf.line('pm-wall-sample'), text: own(`displaced${times}`) },
    ...(moves
      ? [{ symbol: symbolOf.arrow(moves.length), text: own(`displacement x, y; this arrow: ${moves.text}`) }]
      : []),
    ...(force ? [{ symbol: symbolOf.force, text: forceWords }] : []),
    { symbol: symbolOf.centreOfMass, text: own('centre of mass') },
    ...(rigidity ? [{ symbol: symbolOf.centreOfRigidity, text: own('centre of rigidity, rotation φ') }] : []),
  ]
}
