/** Marks on the numbers that moved: what each was before, and by how much it changed. */
import type { Move, Moves } from '../serve/message.ts'
import { changeInWords } from '../serve/words.ts'
import { isIn } from './places.ts'

export interface Marker {
  /** Shows these in place of those before. */
  readonly show: (moves: Moves) => void
  /** Marks again what has been put in anew. */
  readonly again: () => void
  /** What is said of a value, such as `, was 41.2 kip, +4.2 %`; empty where it has not moved. */
  readonly note: (id: string) => string
}

/** @param marksOf every number on the page that is a value */
export function createMarker(marksOf: (id: string) => readonly HTMLElement[]): Marker {
  let moves: Moves = { numbers: [], checks: [], back: [] }
  let moved = new Map<string, Move>()
  const shown = new Map<Element, string>()
  const mark = (element: Element, words: string, short: string): void => {
    shown.set(element, words)
    if (element.getAttribute('data-was') === short && element.classList.contains('moved')) return
    element.classList.add('moved')
    element.setAttribute('data-was', short)
    element.setAttribute('title', words)
  }
  const again = (): void => {
    const before = new Set(shown.keys())
    shown.clear()
    for (const move of moved.values())
      for (const element of marksOf(move.id)) {
        if (isWord(element, move)) continue
        mark(element, inWords(move), shortly(move, element))
        const line = isIn(element, '.result') ? element.closest('.rhs') : null
        if (line) mark(line, inWords(move), inWords(move))
      }
    for (const { id, was, now } of moves.checks) {
      const verdict = now && document.getElementById(id)?.querySelector('.verdict')
      if (was && verdict) mark(verdict, `was ${verdictOf(was.ok)}`, `was ${verdictOf(was.ok)}`)
    }
    for (const element of before) if (!shown.has(element)) clear(element)
  }
  return {
    again,
    show: next => {
      moves = next
      moved = new Map(next.numbers.filter(({ now }) => now !== undefined).map(move => [move.id, move]))
      again()
    },
    note: id => {
      const move = moved.get(id)
      return move ? `, ${inWords(move)}` : ''
    },
  }
}

/** A word in the prose, such as the wall that governs, leads to the number that it tells of, and is none itself. */
function isWord(element: Element, { now = '' }: Move): boolean {
  const text = element.textContent ?? ''
  return isIn(element, '.prose') && text !== now && !/^[−-]?\d[^a-z]*(?:[.%\s\u00a0]|$)/i.test(text)
}

function clear(element: Element): void {
  element.classList.remove('moved')
  for (const name of ['data-was', 'title']) element.removeAttribute(name)
  if (element.getAttribute('class') === '') element.removeAttribute('class')
}

export const verdictOf = (ok: boolean): string => (ok ? 'OK' : 'NG')

/** Such as `was 41.2 kip, +4.2 %`. */
export function inWords({ was, change }: Move): string {
  if (was === undefined) return 'new'
  return change === undefined ? `was ${was}` : `was ${was}, ${changeInWords(change)}`
}

/** A column has its unit in its head; in the prose there is room for it. */
function shortly(move: Move, element: Element): string {
  const { was } = move
  if (was === undefined) return 'new'
  return isIn(element, 'td') ? `was ${was.split(' ')[0]}` : `was ${was}`
}
