/**
 * The diagram of storey forces and shears: the levels at their heights, along each axis the
 * force of every level as an arrow in proportion, and the shear of the storeys in steps.
 */
import { inLanguage } from '../base/language.ts'
import type { Axis } from '../compute/cases.ts'
import { arrowKey } from './arrowkey.ts'
import { scaledArrow, shortestArrow } from './arrows.ts'
import { endText, lettering, setLettering, startText } from './label.ts'
import { drawLegend, type LegendEntry, symbolOf } from './legend.ts'
import { element, layer, type SceneNode, words } from './scene.ts'
import { spread } from './spread.ts'
import type { StoreyLevel, StoreyView } from './storeyview.ts'
import { textStyles } from './style.ts'
import { svgOf } from './svg.ts'
import { textWidth } from './textwidth.ts'

const besideSheet = 8
/** Names and elevations stand left of this. */
const namesEnd = 172
const leastFigureRoom = 64
const arrowRoom = 54
const shearRoom = 66
const gap = 14
const panelGap = 8
/** Levels nearer than this on the sheet have their texts moved apart, and led to their lines. */
const textRow = 17
const tallest = 900
/** A text stands this far above the line of its level. */
const above = 9.5

interface Place {
  readonly level: StoreyLevel
  /** Where its line is, and where that of the level below it, or of the base. */
  readonly y: number
  readonly foot: number
  /** Where its texts stand, and those of the storey below it. */
  readonly textY: number
  readonly shearY: number
  readonly lettered: boolean
}

interface Heights {
  readonly places: readonly Place[]
  readonly base: number
  /** The sheet has room for texts straight above every line. */
  readonly open: boolean
  readonly leftOut: number
}

/** @returns the whole `<svg>` element; the same view gives the same bytes */
export function drawStoreys(view: StoreyView): string {
  const heights = placeLevels(view.levels)
  const figureRoom = roomForFigures(view)
  const panelLeft = (idx: number): number =>
    namesEnd + 16 + idx * (2 * figureRoom + arrowRoom + gap + shearRoom + panelGap)
  const panels = view.axes.map((axis, idx) => drawPanel(view, axis, panelLeft(idx) + figureRoom, heights))
  const right = panelLeft(view.axes.length) - panelGap
  const width = right + besideSheet
  const names = drawLevels(heights, right, view)
  const scale = scaleOf(view)
  const notes = notesOf(view, heights)
  const legend = drawLegend(entriesOf(view, scale), notes, { x: besideSheet + 8, y: heights.base + 48 }, width - 32)
  const nodes = [
    ...layer('pm-levels', names),
    ...layer('pm-storeys', panels.flat()),
    ...layer('pm-footer', legend.nodes),
  ]
  return svgOf(view, nodes, { x0: 0, y0: headY - 18, x1: width, y1: legend.bottom + 2 })
}

/** Room for the widest figure on either side of a panel. */
function roomForFigures({ axes, levels }: StoreyView): number {
  const texts = levels.flatMap(({ along }) =>
    axes.flatMap(axis => [along[axis]?.force, along[axis]?.shear].flatMap(figure => figure?.printed ?? [])),
  )
  return Math.max(leastFigureRoom, ...texts.map(text => textWidth(text, textStyles.figure) + 18))
}

const headY = -42

/** Heights to scale, as tall as the texts need and the page allows; then every few levels have theirs. */
function placeLevels(levels: readonly StoreyLevel[]): Heights {
  const count = Math.max(1, levels.length)
  const tall = Math.min(tallest, Math.max(150, 44 * Math.min(count, 8), 28 * count))
  const top = levels[0]?.elevation?.metres ?? 1
  const ys = levels.map(({ elevation }) => tall * (1 - (elevation?.metres ?? top) / top))
  const feet = [...ys.slice(1), tall]
  const open = ys.every((y, idx) => (feet[idx] ?? tall) - y >= textRow + 1)
  const every = Math.ceil((count * textRow) / tall)
  const lettered = levels.map((_, idx) => idx % every === 0 || idx === count - 1)
  const chosen = ys.filter((_, idx) => lettered[idx])
  const gaps = chosen.slice(1).map(() => textRow)
  const textYs = spread(
    chosen.map(y => y - above),
    gaps,
    -above,
    tall - textRow,
  )
  const shearYs = spread(
    feet.flatMap((foot, idx) => (lettered[idx] ? [(foot + (ys[idx] ?? foot)) / 2] : [])),
    gaps,
    0,
    tall - textRow / 2,
  )
  let next = 0
  const places = levels.map((level, idx): Place => {
    const y = ys[idx] ?? 0
    const at = lettered[idx] ? next++ : -1
    return {
      level,
      y,
      foot: feet[idx] ?? tall,
      textY: textYs[at] ?? y,
      shearY: shearYs[at] ?? y,
      lettered: at >= 0,
    }
  })
  return { places, base: tall, open, leftOut: lettered.filter(each => !each).length }
}

/** A line for each level with its name and elevation above it, and the ground; on a crowded sheet the names alone. */
function drawLevels({ places, base, open }: Heights, right: number, { language }: StoreyView): readonly SceneNode[] {
  const names = places.flatMap(({ level, textY, lettered }) => (lettered ? levelText(level, textY) : []))
  if (!open) return names
  const lines = places.map(({ y }) => words('M', besideSheet, y, 'L', right, y))
  return [
    element('path', { class: 'pm-level', d: lines.join(' ') }),
    polyline('pm-ground', [besideSheet, base], [right, base]),
    startText(inLanguage('base', language), 'dimension', { x: besideSheet, y: base - above }),
    ...names,
  ]
}

function levelText({ name, elevation }: StoreyLevel, y: number): readonly SceneNode[] {
  const figure = elevation ? lettering('dimension', 90, elevation.printed) : undefined
  const room = namesEnd - besideSheet - (figure?.width ?? 0) - 14
  const letters = lettering('wall', room, name)
  return [
    ...setLettering({ ...letters, keeps: 'start' }, { x: besideSheet + letters.width / 2, y }, 0, 'clear'),
    ...(figure ? setLettering({ ...figure, keeps: 'end' }, { x: namesEnd - 6 - figure.width / 2, y }, 0, 'clear') : []),
  ]
}

interface Scale {
  /** Sheet units to the newton, of arrows and of shears. */
  readonly force: number
  readonly shear: number
  readonly greatestForce: number
  readonly greatestShear: number
  /** How far shears of either sign reach from their line of zero. */
  readonly low: number
  readonly high: number
}

/** One scale for both axes, so that they can be compared. */
function scaleOf({ axes, levels }: StoreyView): Scale {
  const figures = levels.flatMap(({ along }) => axes.flatMap(axis => along[axis] ?? []))
  const shears = figures.map(({ shear }) => shear.value)
  const greatestForce = Math.max(0, ...figures.map(({ force }) => Math.abs(force.value)))
  const low = Math.min(0, ...shears)
  const high = Math.max(0, ...shears)
  const span = high - low
  const shear = span > 0 ? shearRoom / span : 0
  return {
    force: greatestForce > 0 ? arrowRoom / greatestForce : 0,
    shear,
    greatestForce,
    greatestShear: Math.max(high, -low),
    low: low * shear,
    high: high * shear,
  }
}

/** @param left where arrows begin; figures stand before it */
function drawPanel(view: StoreyView, axis: Axis, left: number, heights: Heights): readonly SceneNode[] {
  const own = (text: string): string => inLanguage(text, view.language)
  const scale = scaleOf(view)
  const mast = left + arrowRoom
  const zero = mast + gap - scale.low
  const heads = [
    startText(own(`Along ${axis}`), 'wall', { x: left - 58, y: headY }),
    endText(own('force'), 'legend', { x: mast, y: headY + 15 }),
    startText(own('storey shear'), 'legend', { x: mast + gap, y: headY + 15 }),
  ]
  const mastLine = element('path', { class: 'pm-mast', d: words('M', mast, 0, 'L', mast, heights.base) })
  return [
    ...heads,
    ...drawSteps(axis, zero, heights, scale),
    ...(heights.open ? [] : [polyline('pm-ground', [mast - 8, heights.base], [zero + scale.high + 8, heights.base])]),
    mastLine,
    ...heights.places.flatMap(place => drawForce(place, axis, left, mast, heights, scale)),
    ...heights.places.flatMap(place => shearFigure(place, axis, zero, heights, scale)),
  ]
}

/** An arrow along the line of its level with its tip, or where it pulls its tail, at the building. */
function drawForce(
  place: Place,
  axis: Axis,
  left: number,
  mast: number,
  { open }: Heights,
  scale: Scale,
): readonly SceneNode[] {
  const force = place.level.along[axis]?.force
  if (force === undefined) return []
  const length = Math.abs(force.value) * scale.force
  const drawn = Math.max(length, shortestArrow)
  const arrow =
    force.value === 0
      ? []
      : [scaledArrow({ x: mast - 2 - drawn / 2, y: place.y }, force.value < 0 ? Math.PI : 0, length)]
  if (!place.lettered) return arrow
  const end = open ? mast - 4 : left - 8
  const leader = open
    ? []
    : [polyline('pm-leader', [end + 2, place.textY], [end + 9, place.y], [mast - 4 - drawn, place.y])]
  return [...arrow, ...leader, endText(force.printed, 'figure', { x: end, y: place.textY })]
}

/** The shear of every storey as far out as it is great, between its level and the one below. */
function drawSteps(axis: Axis, zero: number, { places, base }: Heights, { shear }: Scale): readonly SceneNode[] {
  const steps = places.map(({ level, y, foot }) => {
    const x = zero + (level.along[axis]?.shear.value ?? 0) * shear
    return words('L', x, y, 'L', x, foot)
  })
  const d = words('M', zero, places[0]?.y ?? 0, ...steps, 'L', zero, base, 'Z')
  const ties = places.flatMap(({ level, foot }) => {
    const x = zero + (level.along[axis]?.shear.value ?? 0) * shear
    return [words('M', zero, foot, 'L', x, foot)]
  })
  return [element('path', { class: 'pm-step', d }), element('path', { class: 'pm-step-line', d: ties.join(' ') })]
}

function shearFigure(
  place: Place,
  axis: Axis,
  zero: number,
  { open }: Heights,
  { shear, high }: Scale,
): readonly SceneNode[] {
  const figure = place.level.along[axis]?.shear
  if (figure === undefined || !place.lettered) return []
  const edge = zero + Math.max(0, figure.value * shear)
  if (open) return [startText(figure.printed, 'figure', { x: edge + 6, y: place.shearY })]
  const column = zero + high + 12
  const middle = (place.y + place.foot) / 2
  return [
    polyline('pm-leader', [edge, middle], [zero + high + 1, middle], [column - 4, place.shearY]),
    startText(figure.printed, 'figure', { x: column, y: place.shearY }),
  ]
}

const polyline = (className: string, ...points: readonly (readonly [number, number])[]): SceneNode =>
  element('path', {
    class: className,
    d: points.map(([x, y], idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' '),
  })

function entriesOf({ language, forceUnit, levels, axes }: StoreyView, scale: Scale): readonly LegendEntry[] {
  const own = (text: string): string => inLanguage(text, language)
  const arrow = arrowKey(scale.greatestForce, arrowRoom, forceUnit, language)
  const shear = arrowKey(scale.greatestShear, scale.greatestShear * scale.shear, forceUnit, language)
  const bare = levels.some(({ along }) =>
    axes.some(axis => {
      const length = Math.abs(along[axis]?.force.value ?? 0) * scale.force
      return length > 0 && length < shortestArrow
    }),
  )
  return [
    ...(arrow
      ? [{ symbol: symbolOf.arrow(arrow.length), text: own(`force of a level; this arrow: ${arrow.text}`) }]
      : []),
    ...(bare ? [{ symbol: symbolOf.bareHead, text: own('force too small for its arrow to scale') }] : []),
    ...(shear ? [{ symbol: symbolOf.width(shear.length), text: own(`storey shear; this width: ${shear.text}`) }] : []),
  ]
}

function notesOf({ levels, language }: StoreyView, { leftOut }: Heights): readonly string[] {
  const own = (text: string): string => inLanguage(text, language)
  return [
    ...(levels.some(({ elevation }) => elevation === undefined)
      ? [own('The height is not to scale: no elevation is stated.')]
      : []),
    ...(leftOut > 0 ? [own(`Figures of ${leftOut} levels are left out for want of room.`)] : []),
  ]
}
