/** The marks of the centres and of north. */
import { add, normal, type Point, times, toward } from './geometry.ts'
import { type Lettering, lettering, setLettering } from './label.ts'
import { element, type SceneElement, type SceneNode, words } from './scene.ts'

/** Radius of the quartered circle, and half the diagonal of the lozenge. */
export const circleRadius = 7
export const lozengeReach = 8.5

/** Centre of mass: a circle in quarters, two of them black. */
export function quarteredCircle({ x, y }: Point, r: number): readonly SceneElement[] {
  const quarter = (sx: number, sy: number): string =>
    words('M', x, y, 'L', x + sx * r, y, 'A', r, r, 0, 0, sx * sy > 0 ? 1 : 0, x, y + sy * r, 'Z')
  return [
    element('circle', { class: 'pm-mark', cx: x, cy: y, r }),
    element('path', { class: 'pm-mark-full', d: `${quarter(1, -1)} ${quarter(-1, 1)}` }),
  ]
}

/** Centre of rigidity: a lozenge with a dot. */
export function lozenge(at: Point, reach: number): readonly SceneElement[] {
  return [element('path', { class: 'pm-mark', d: lozengePath(at, reach) }), dotAt('pm-mark-full', at, 1.8)]
}

/** The lozenge where it meets the other centre: an outline alone, cased in paper so that both read. */
export function openLozenge(at: Point, reach: number): readonly SceneElement[] {
  const d = lozengePath(at, reach)
  return [
    element('path', { class: 'pm-mark-casing', d }),
    element('path', { class: 'pm-mark-open', d }),
    dotAt('pm-mark-ring', at, 2.2),
  ]
}

function lozengePath({ x, y }: Point, r: number): string {
  return words('M', x - r, y, 'L', x, y - r, 'L', x + r, y, 'L', x, y + r, 'Z')
}

function dotAt(className: string, { x, y }: Point, r: number): SceneElement {
  return element('circle', { class: className, cx: x, cy: y, r })
}

const needle = 15
/** Everything of a north point lies within this of its centre, whichever way it turns. */
export const northReach = 27
const northLetter: Lettering = lettering('north', 30, 'N')

/** A needle with one half black, its letter upright beyond the tip. */
export function northPoint(at: Point, angle: number): readonly SceneNode[] {
  const u = toward(angle)
  const side = times(normal(u), 5)
  const tip = add(at, times(u, needle))
  const tail = add(at, times(u, -needle))
  const notch = add(at, times(u, -needle * 0.55))
  const half = (aside: Point): string => {
    const foot = add(tail, aside)
    return words('M', tip.x, tip.y, 'L', foot.x, foot.y, 'L', notch.x, notch.y, 'Z')
  }
  return [
    element('path', { class: 'pm-north', d: half(side) }),
    element('path', { class: 'pm-scale', d: half(times(side, -1)) }),
    ...setLettering(northLetter, add(at, times(u, needle + 9)), 0, 'clear'),
  ]
}
