/** Arrows: the thin open one of a wall's shear and the broad hollow one of the storey force. */
import { add, normal, type Point, times, toward } from './geometry.ts'
import { element, type SceneElement, words } from './scene.ts'

const barb = 5.5
const halfBarb = 3.6

/** A shaft with two barbs, about its middle. */
export function thinArrow(middle: Point, angle: number, length: number): SceneElement {
  const u = toward(angle)
  const tail = add(middle, times(u, -length / 2))
  const tip = add(middle, times(u, length / 2))
  const neck = add(tip, times(u, -Math.min(barb, length * 0.6)))
  const [left, right] = [add(neck, times(normal(u), halfBarb)), add(neck, times(normal(u), -halfBarb))]
  const d = words('M', tail.x, tail.y, 'L', tip.x, tip.y, 'M', left.x, left.y, 'L', tip.x, tip.y, 'L', right.x, right.y)
  return element('path', { class: 'pm-shear', d })
}

/** What is too small for a shaft to scale has its barbs alone, which tell its direction. */
export function bareHead(middle: Point, angle: number): SceneElement {
  const u = toward(angle)
  const tip = add(middle, times(u, barb / 2))
  const neck = add(tip, times(u, -barb))
  const [left, right] = [add(neck, times(normal(u), halfBarb)), add(neck, times(normal(u), -halfBarb))]
  return element('path', {
    class: 'pm-shear',
    d: words('M', left.x, left.y, 'L', tip.x, tip.y, 'L', right.x, right.y),
  })
}

/** An arrow to scale, or its head alone where it would be shorter than `shortestArrow`. */
export const scaledArrow = (middle: Point, angle: number, length: number): SceneElement =>
  length < shortestArrow ? bareHead(middle, angle) : thinArrow(middle, angle, length)

export const shortestArrow = 7

/** How wide `broadArrow` is across its head. */
export const broadArrowWidth = 18
const broadHead = 15

/** A hollow arrow whose tip stands at a point. */
export function broadArrow(tip: Point, angle: number, length: number): SceneElement {
  const u = toward(angle)
  const head = Math.min(broadHead, length * 0.6)
  const at = (back: number, aside: number): Point => add(tip, add(times(u, -back), times(normal(u), aside)))
  const half = broadArrowWidth / 2
  const outline = [
    at(0, 0),
    at(head, half),
    at(head, 3.5),
    at(length, 3.5),
    at(length, -3.5),
    at(head, -3.5),
    at(head, -half),
  ]
  const d = `${outline.map(({ x, y }, idx) => words(idx === 0 ? 'M' : 'L', x, y)).join(' ')} Z`
  return element('path', { class: 'pm-force', d })
}
