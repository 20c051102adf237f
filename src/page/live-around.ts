/** What stands around the blocks, changed without going through them: a long page would pay for that at every save. */
import { changesBetween } from '../serve/patch.ts'
import { turnInto } from './live-morph.ts'
import { MARK } from './places.ts'

/** Where the blocks stand: the marks before the first and after the last. */
export interface Run {
  readonly start: Comment
  readonly end: Comment
}

/** The elements from the one around everything to the one that holds the blocks. */
export function wayTo(page: Element, mark: Node): readonly Element[] {
  const way: Element[] = []
  for (let element = mark.parentElement; element; element = element.parentElement) {
    way.unshift(element)
    if (element === page) return way
  }
  return []
}

/**
 * Turns what stands around the blocks into what stands around a mark in another tree.
 * @returns false where the blocks stand otherwise in it, and nothing has been changed
 */
export function turnAround(page: Element, { start, end }: Run, made: Element, mark: Comment): boolean {
  const way = wayTo(page, start)
  const next = wayTo(made, mark)
  const isAlike = way.length === next.length && way.every((element, i) => element.tagName === next[i]?.tagName)
  const levels = way.map((holder, i) => {
    const [inner, innerNext] = [way[i + 1], next[i + 1]]
    const newHolder = next[i] ?? made
    return [
      besides(holder, inner ?? start, inner ?? end),
      besides(newHolder, innerNext ?? mark, innerNext ?? mark),
      holder,
      newHolder,
      inner ?? start,
    ] as const
  })
  if (!isAlike || levels.some(([old, now]) => old.text !== now.text)) return false
  for (const [old, now, holder, newHolder, inner] of levels) {
    if (holder !== page) takeAttributes(holder, newHolder)
    turnAll(holder, old.before, now.before, inner)
    turnAll(holder, old.after, now.after, null)
  }
  return true
}

/** Every number around the blocks. */
export function marksAround(page: Element, { start, end }: Run): readonly HTMLElement[] {
  const way = wayTo(page, start)
  return way
    .flatMap((holder, i) => {
      const { before, after } = besides(holder, way[i + 1] ?? start, way[i + 1] ?? end)
      return [...before, ...after]
    })
    .flatMap(element => [...element.querySelectorAll<HTMLElement>(MARK)])
}

/** The elements of a holder before and after a stretch of it, and the bare words between them. */
function besides(holder: Element, first: Node, last: Node) {
  const before: Element[] = []
  const after: Element[] = []
  let text = ''
  const take = (node: Node | null, to: Element[], until: Node | null): void => {
    for (let each = node; each && each !== until; each = each.nextSibling)
      if (each instanceof Element) to.push(each)
      else if (each instanceof Text) text += each.data.trim()
  }
  take(holder.firstChild, before, first)
  take(last.nextSibling, after, null)
  return { before, after, text }
}

function turnAll(holder: Element, old: readonly Element[], made: readonly Element[], end: Node | null): void {
  let at = 0
  let from = 0
  const changes = changesBetween(
    old.map(element => element.outerHTML),
    made.map(element => element.outerHTML),
  )
  for (const change of changes)
    switch (change[0]) {
      case 'keep':
        at += change[1]
        from += change[1]
        break
      case 'drop':
        for (const element of old.slice(from, from + change[1])) element.remove()
        from += change[1]
        break
      case 'turn':
      case 'add': {
        const [was, element] = [old[from], made[at]]
        if (element && change[0] === 'turn' && was) turnInto(was, element)
        else if (element) holder.insertBefore(element, was ?? end)
        at++
        if (change[0] === 'turn') from++
        break
      }
    }
}

function takeAttributes(to: Element, from: Element): void {
  for (const { name, value } of from.attributes) if (to.getAttribute(name) !== value) to.setAttribute(name, value)
}
