/** The blocks of the page, each an element between two marks, and the numbers that stand in each. */
import type { Change } from '../serve/message.ts'
import { marksAround, type Run, turnAround } from './live-around.ts'
import { turnInto } from './live-morph.ts'
import { idOf, MARK } from './places.ts'

const START = 'calculation'
const END = '/calculation'

export interface Blocks {
  readonly elements: readonly Element[]
  /** @returns the elements that are new or not as they were, in order */
  readonly change: (changes: readonly Change[]) => readonly Element[]
  /** @returns all elements */
  readonly replace: (all: readonly string[]) => readonly Element[]
  /**
   * Changes what stands around the blocks.
   * @returns false where the blocks have no place in it that they could keep
   */
  readonly surround: (around: string) => boolean
  /** Every number on the page that is this value. */
  readonly marksOf: (id: string) => readonly HTMLElement[]
}

/**
 * @param page what holds the blocks and all around them
 * @param prepare makes a new part ready for the keyboard before it is put in
 */
export function findBlocks(page: HTMLElement, prepare: (part: ParentNode) => void): Blocks | undefined {
  const found = marksIn(page)
  if (!found) return undefined
  const { start, end } = found
  const elements: Element[] = []
  for (let node = start.nextSibling; node && node !== end; node = node.nextSibling)
    if (node instanceof Element) elements.push(node)
  if (elements.length > MANY) partsOf(elements, end)
  const marks = createMarks()
  // What stands around the blocks is one part more.
  const within = (part: Element): readonly HTMLElement[] => [
    ...(part.matches(MARK) ? [part as HTMLElement] : []),
    ...part.querySelectorAll<HTMLElement>(MARK),
  ]
  for (const element of elements) marks.set(element, within(element))
  marks.set(page, marksAround(page, found))

  const make = (html: string): Element => {
    const template = document.createElement('template')
    template.innerHTML = html
    prepare(template.content)
    // A block is one element; a text that makes none keeps its place all the same.
    return template.content.firstElementChild ?? document.createElement('span')
  }
  const add = (at: number, element: Element): void => {
    const [before, after] = [elements[at - 1], elements[at]]
    if (after) after.before(element)
    else if (before) before.after(element)
    else end.before(element)
    elements.splice(at, 0, element)
  }
  const turn = (at: number, html: string): Element => {
    const old = elements[at]
    const made = make(html)
    if (!old) {
      add(at, made)
      return made
    }
    const turned = turnInto(old, made)
    if (turned !== old) marks.drop(old)
    elements[at] = turned
    return turned
  }
  const drop = (at: number, count: number): void => {
    for (const gone of elements.splice(at, count)) {
      marks.drop(gone)
      gone.remove()
    }
  }
  return {
    elements,
    change: changes => {
      const changed: Element[] = []
      let at = 0
      for (const change of changes)
        switch (change[0]) {
          case 'keep':
            at += change[1]
            break
          case 'drop':
            drop(at, change[1])
            break
          case 'turn':
            changed.push(turn(at, change[1]))
            at++
            break
          case 'add': {
            const made = make(change[1])
            add(at, made)
            changed.push(made)
            at++
            break
          }
        }
      for (const element of changed) marks.set(element, within(element))
      return changed
    },
    replace: all => {
      all.forEach((html, at) => {
        turn(at, html)
      })
      drop(all.length, elements.length - all.length)
      for (const element of elements) marks.set(element, within(element))
      return elements
    },
    surround: around => {
      const made = page.cloneNode(false) as HTMLElement
      made.innerHTML = around
      const way = page.querySelector(':scope > .live-back')
      if (way) made.prepend(way.cloneNode(true))
      const place = commentIn(made, START)
      prepare(made)
      if (!place || !turnAround(page, found, made, place)) return false
      marks.set(page, marksAround(page, found))
      return true
    },
    marksOf: marks.of,
  }
}

/** A page of more blocks lays out only those that are near the window. */
const MANY = 300

/** Blocks that are laid out or left out together: a browser goes over all that stand beside each other. */
const TOGETHER = 40

function partsOf(elements: readonly Element[], end: Comment): void {
  for (let at = 0; at < elements.length; at += TOGETHER) {
    const part = document.createElement('div')
    part.className = 'live-part'
    end.before(part)
    part.append(...elements.slice(at, at + TOGETHER))
  }
}

function marksIn(page: HTMLElement): Run | undefined {
  const [start, end] = [commentIn(page, START), commentIn(page, END)]
  return start && end ? { start, end } : undefined
}

function commentIn(root: Node, text: string): Comment | undefined {
  const walk = document.createTreeWalker(root, NodeFilter.SHOW_COMMENT)
  for (let node = walk.nextNode(); node; node = walk.nextNode())
    if (node instanceof Comment && node.data === text) return node
  return undefined
}

/** Numbers by their value, kept part by part, so that a change costs what it changes. */
function createMarks() {
  const byId = new Map<string, Set<HTMLElement>>()
  const byPart = new Map<Element, readonly HTMLElement[]>()
  const ids = new WeakMap<HTMLElement, string>()
  const drop = (part: Element): void => {
    for (const mark of byPart.get(part) ?? []) byId.get(ids.get(mark) ?? '')?.delete(mark)
    byPart.delete(part)
  }
  return {
    drop,
    set: (part: Element, marks: readonly HTMLElement[]): void => {
      drop(part)
      byPart.set(part, marks)
      for (const mark of marks) {
        const id = idOf(mark)
        ids.set(mark, id)
        const known = byId.get(id) ?? new Set()
        byId.set(id, known.add(mark))
      }
    },
    of: (id: string): readonly HTMLElement[] => [...(byId.get(id) ?? [])],
  }
}
