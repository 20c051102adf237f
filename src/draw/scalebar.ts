/** The scale bar. */
import { digitGroup, type Language } from '../base/language.ts'
import type { Point } from './geometry.ts'
import { lettering, setLettering } from './label.ts'
import { element, type SceneNode } from './scene.ts'

export interface ScaleBar {
  readonly nodes: readonly SceneNode[]
  readonly width: number
}

const longest = 150
const thickness = 4

/** Greatest of 1, 2 or 5 times a power of ten that is no more than `most`. */
export function roundLength(most: number): number {
  const power = 10 ** Math.floor(Math.log10(most) + 1e-9)
  const steps = [5, 2, 1].map(step => step * power)
  return steps.find(step => step <= most * (1 + 1e-9)) ?? power
}

/** A bar in two halves, one black; its middle stands at the height of `at`. */
export function drawScaleBar(at: Point, unitsPerSheet: number, unit: string, language: Language): ScaleBar {
  const whole = roundLength(longest / unitsPerSheet)
  const half = (whole * unitsPerSheet) / 2
  const bar = (x: number, className: string): SceneNode =>
    element('rect', { class: className, x, y: at.y - thickness / 2, width: half, height: thickness })
  const last = lettering(
    'scale',
    120,
    unit === '' ? plainFigure(whole, language) : `${plainFigure(whole, language)} ${unit}`,
  )
  const middle = lettering('scale', 60, plainFigure(whole / 2, language))
  const figures = [lettering('scale', 60, '0'), middle, last]
  const tight = middle.width / 2 + Math.max(middle.width, last.width) / 2 > half
  const texts = figures.flatMap((letters, idx) =>
    tight && idx === 1 ? [] : setLettering(letters, { x: at.x + idx * half, y: at.y + 13 }, 0, 'clear'),
  )
  return {
    nodes: [bar(at.x, 'pm-scale'), bar(at.x + half, 'pm-scale-open'), ...texts],
    width: 2 * half + last.width / 2,
  }
}

/** Half of a round length needs one figure more than the length itself, and no more. */
export function plainFigure(value: number, language: Language): string {
  const figures = Number(value.toPrecision(3))
  const [whole = '0', part] = figures < 1e-6 ? [String(figures)] : String(figures).split('.')
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, digitGroup(language)) : whole
  return part === undefined ? grouped : `${grouped}.${part}`
}
