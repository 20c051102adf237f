/** Turns one element into another in place, so that what the reader holds in it stays: focus, selection, scroll, folds. */
import morphdom from 'morphdom'
import { MARK } from './places.ts'

/**
 * @param keep an element whose children are left alone, with the one that stands for it in the new tree
 * @returns the element that stands there now
 */
export function turnInto(old: Element, made: Element, keep?: readonly [Element, Element]): Element {
  const held = document.activeElement
  const turned = morphdom(old, made, {
    // The element that is kept is known in both trees, wherever it stands.
    getNodeKey: node => (keep?.includes(node as Element) ? ' kept' : node instanceof Element ? node.id : ''),
    onBeforeElUpdated: (from, to) => {
      if (keep?.[0] === from) return true
      if (from.isEqualNode(to)) return false
      if (from instanceof HTMLDetailsElement && from.open) to.setAttribute('open', '')
      // A number that the arrow keys have led to keeps the stop of its table.
      if (from === held && from.matches(MARK)) for (const name of ['tabindex', 'role']) copy(name, from, to)
      return true
    },
    onBeforeElChildrenUpdated: from => keep?.[0] !== from,
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
