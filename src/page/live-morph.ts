/** Turns one element into another in place, so that what the reader holds in it stays: focus, selection, scroll, folds. */
import morphdom from 'morphdom'
import { MARK } from './places.ts'

/** @returns the element that stands there now */
export function turnInto(old: Element, made: Element): Element {
  const held = document.activeElement
  const turned = morphdom(old, made, {
    onBeforeElUpdated: (from, to) => {
      if (from.isEqualNode(to)) return false
      if (from instanceof HTMLDetailsElement && from.open) to.setAttribute('open', '')
      // A number that the arrow keys have led to keeps the stop of its table.
      if (from === held && from.matches(MARK)) for (const name of ['tabindex', 'role']) copy(name, from, to)
      return true
    },
  })
  if (held instanceof HTMLElement && held.matches(`${MARK}[tabindex]`))
    for (const other of held.closest('.tbl, .checks')?.querySelectorAll('[data-v][tabindex]') ?? [])
      if (other !== held) other.removeAttribute('tabindex')
  // Without an element in its place morphdom gives back the one that was turned.
  return turned as Element
}

function copy(name: string, from: Element, to: Element): void {
  const value = from.getAttribute(name)
  if (value !== null) to.setAttribute(name, value)
}
