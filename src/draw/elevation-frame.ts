/** Where a wall lies on the sheet of its elevation, and at what scale. */
import type { ElevationView } from './elevation-view.ts'
import { besideSheet, sheetWidth } from './frame.ts'
import type { Bounds, Point } from './geometry.ts'
import { lettering } from './label.ts'
import type { Sheet } from './placement.ts'
import { element, type SceneNode, words } from './scene.ts'

const tallest = 340
const narrowest = 420

export interface Frame {
  readonly width: number
  readonly scale: number
  readonly face: Bounds
  readonly x: (metres: number) => number
  readonly y: (metres: number) => number
}

/** The margins hold the widest that may stand in them, so that the scale does not hang on what is drawn. */
export function frameOf({ length, height, levels, openings, dimension }: ElevationView, widestLevel: number): Frame {
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

export const boundsOf = (
  {
    left,
    right,
    low,
    high,
  }: { readonly left: number; readonly right: number; readonly low: number; readonly high: number },
  { x, y }: Frame,
): Bounds => ({ x0: x(left), y0: y(high), x1: x(right), y1: y(low) })

const holds = ({ x0, y0, x1, y1 }: Bounds, { x, y }: Point): boolean => x > x0 && x < x1 && y > y0 && y < y1

export function groundOf(view: ElevationView, frame: Frame): Sheet['groundAt'] {
  const piers = view.piers.map(pier => boundsOf(pier, frame))
  return at => (piers.some(pier => holds(pier, at)) ? 'wash' : 'paper')
}

export const cornersOf = ({ x0, y0, x1, y1 }: Bounds): readonly Point[] => [
  { x: x0, y: y1 },
  { x: x1, y: y1 },
  { x: x1, y: y0 },
  { x: x0, y: y0 },
]

export const path = (className: string, points: readonly Point[], closed = ''): SceneNode =>
  element('path', {
    class: className,
    d: `${points.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' ')}${closed}`,
  })
