/** Opens the panel on any number of the page, and keeps the walk from there. */
import { runsOf } from '../explain/letter.ts'
import type { Island } from '../render/island.ts'
import { type Data, type IslandValue, readData } from './data.ts'
import { make } from './elements.ts'
import { contents } from './panel.ts'
import { giveStops, idOf, isIn, MARK, marksOf, moveStop, neighbour, pace, placeOf, stopFor } from './places.ts'

/** Tells the trace that the page has changed; an open panel shows the new numbers. */
export type Refresh = () => void

/** A page that changes under the reader, and carries no island. */
export interface Changing {
  /** Gets the island of the page as it is now. */
  readonly load: () => Promise<Island>
  /** What else is to be heard of a value, such as what it was before; empty where there is nothing. */
  readonly note: (id: string) => string
}

/** What a page that changes under the reader gives and is given. */
export interface Trace {
  readonly refresh: Refresh
  /** Gives the numbers of a part of the page their stops for the keyboard, before it is put in. */
  readonly prepare: (within: ParentNode) => void
}

const ADDRESS = '#trace='

/**
 * Starts the trace of this page, from the island that it carries or from one that is got when it is first needed.
 * @returns undefined where the page has neither
 */
export function startTrace(changing?: Changing): Trace | undefined {
  const load = changing?.load
  let data = load ? undefined : readIsland()
  if (!data && !load) return undefined
  /** Counts the changes of the page, so that an island which was asked for before one is not taken for its own. */
  let turn = 0
  const root = document.documentElement
  const panel = make('aside.trace')
  panel.setAttribute('aria-label', 'Trace')
  const status = make('p.unseen')
  status.setAttribute('role', 'status')
  let walk: readonly string[] = []
  let opener: HTMLElement | undefined
  let addressBefore = ''
  /** The number of a step that the arrow keys have chosen, by the step's button. */
  const chosen = new Map<Element, HTMLElement>()

  root.classList.add('traceable')
  document.body.append(panel, status)
  giveStops(label, document)
  openFromAddress()

  document.addEventListener('click', event => {
    const { target, ctrlKey, metaKey, shiftKey, altKey } = event
    if (!(target instanceof Element) || isIn(target, '.trace') || ctrlKey || metaKey || shiftKey || altKey) return
    const step = target.closest('.trace-step')
    const mark = step ? (chosen.get(step) ?? resultOf(step)) : markUnder(target)
    const selecting = !step && getSelection()?.isCollapsed === false
    if (!mark || selecting || !mayOpen(idOf(mark))) return
    event.preventDefault()
    open(mark, idOf(mark))
  })
  document.addEventListener('keydown', event => {
    const { key, target } = event
    if (key === 'Escape' && isOpen()) close()
    else if (
      target instanceof HTMLElement &&
      (isIn(target, '.trace-step') ? chooseIn(target, key) : press(target, key))
    )
      event.preventDefault()
  })
  document.addEventListener('focusout', ({ target }) => {
    if (target instanceof Element) choose(target, undefined)
  })
  addEventListener('hashchange', openFromAddress)

  return {
    prepare: within => giveStops(label, within),
    refresh: () => {
      turn++
      data = load ? undefined : (readIsland() ?? data)
      if (!load) giveStops(label, document)
      if (isOpen()) withData(again)
    },
  }

  /** Shows the walk anew, or what is left of it, and leaves the reader where they were in it. */
  function again(): void {
    if (!isOpen()) return
    walk = walk.filter(id => data?.find(id))
    if (walk.length === 0) {
      close()
      return
    }
    const { scrollTop } = panel
    const stops = () => [...panel.querySelectorAll<HTMLElement>('button, summary, h2')]
    const held = document.activeElement
    const at = held instanceof HTMLElement ? stops().indexOf(held) : -1
    const unfolded = panel.querySelector('details')?.open === true
    show(false)
    const details = panel.querySelector('details')
    if (details) details.open = unfolded
    stops()[at]?.focus({ preventScroll: true })
    panel.scrollTop = scrollTop
  }

  /** Does a thing once the island of the page as it is now is there. */
  function withData(act: () => void): void {
    if (data || !load) {
      act()
      return
    }
    const asked = turn
    load().then(
      island => {
        if (asked !== turn) return
        data = readData(island)
        act()
      },
      // The server is gone; the page says so elsewhere.
      () => undefined,
    )
  }

  /** A page that has still to get its island knows of no number that it cannot tell of. */
  function mayOpen(id: string): boolean {
    return data ? data.find(id) !== undefined : load !== undefined
  }

  function label(id: string): string {
    const value = data?.find(id)
    return (value ? inWords(value) : id) + (changing?.note(id) ?? '')
  }

  function isOpen(): boolean {
    return root.classList.contains('tracing')
  }

  function open(from: HTMLElement | undefined, id: string): void {
    withData(() => {
      if (data?.find(id)) openNow(from, id)
    })
  }

  function openNow(from: HTMLElement | undefined, id: string): void {
    const before = from?.getBoundingClientRect().top ?? 0
    if (!isOpen()) addressBefore = location.hash.startsWith(ADDRESS) ? '' : location.hash
    opener = from
    walk = [id]
    root.classList.add('tracing')
    show(true)
    // The sheet may have made room at its side: what was asked about stays where it was.
    if (from) scrollBy({ top: from.getBoundingClientRect().top - before, behavior: 'instant' })
    if (from) clear(from)
  }

  /** Scrolls a number out from under a panel that takes the lower part of the window. */
  function clear(mark: HTMLElement): void {
    const { top, height } = panel.getBoundingClientRect()
    const { bottom } = mark.getBoundingClientRect()
    const covered = height < innerHeight && bottom > top - 24
    if (covered) mark.scrollIntoView({ block: 'center', behavior: pace() })
  }

  /** Sets the panel to the end of the walk. @param take true to bring the focus into it */
  function show(take: boolean): void {
    const id = walk.at(-1) ?? ''
    if (!data) return
    panel.replaceChildren(...contents(walk, data, { walk: walkTo, back: backTo, show: showPlace, close }))
    panel.scrollTop = 0
    for (const mark of document.querySelectorAll('.trace-here')) mark.classList.remove('trace-here')
    for (const mark of marksOf(id)) mark.classList.add('trace-here')
    history.replaceState(null, '', `${ADDRESS}${encodeURIComponent(id)}`)
    if (take) panel.querySelector('h2')?.focus({ preventScroll: true })
  }

  /** Walks on; a value that the walk has been at already ends it there. */
  function walkTo(id: string): void {
    const at = walk.indexOf(id)
    walk = at === -1 ? [...walk, id] : walk.slice(0, at + 1)
    show(true)
  }

  function backTo(at: number): void {
    walk = walk.slice(0, at + 1)
    show(true)
  }

  function showPlace(mark: HTMLElement): void {
    mark.scrollIntoView({ block: 'center', inline: 'nearest', behavior: pace() })
    stopFor(mark)?.focus({ preventScroll: true })
  }

  function close(): void {
    root.classList.remove('tracing')
    panel.replaceChildren()
    for (const mark of document.querySelectorAll('.trace-here')) mark.classList.remove('trace-here')
    if (location.hash.startsWith(ADDRESS))
      history.replaceState(null, '', addressBefore || location.href.replace(/#.*/, ''))
    if (opener) stopFor(opener)?.focus({ preventScroll: true })
    opener = undefined
    walk = []
  }

  function openFromAddress(): void {
    if (!location.hash.startsWith(ADDRESS)) return
    const id = decoded(location.hash.slice(ADDRESS.length))
    withData(() => {
      if (!data?.find(id)) return
      const mark = placeOf(id)
      openNow(mark, id)
      mark?.scrollIntoView({ block: 'center' })
    })
  }

  /** Enter and space open a number that has the focus; arrow keys move among its neighbours. */
  function press(target: HTMLElement, key: string): boolean {
    if (!target.matches(`${MARK}[role="button"]`)) return false
    if (key === 'Enter' || key === ' ') {
      open(target, idOf(target))
      return true
    }
    if (!MOVES.has(key)) return false
    const next = neighbour(target, key)
    if (next !== target) moveStop(target, next)
    return true
  }

  function chooseIn(step: HTMLElement, key: string): boolean {
    if (key !== 'ArrowLeft' && key !== 'ArrowRight') return false
    const marks = inReadingOrder(step.closest('.eq'))
    const at = marks.indexOf(chosen.get(step) ?? resultOf(step) ?? step)
    const next = marks[(at + (key === 'ArrowRight' ? 1 : marks.length - 1)) % marks.length]
    choose(step, next)
    if (next) status.textContent = label(idOf(next))
    return true
  }

  function choose(step: Element, mark: HTMLElement | undefined): void {
    chosen.get(step)?.classList.remove('trace-at')
    if (mark) {
      chosen.set(step, mark)
      mark.classList.add('trace-at')
      mark.scrollIntoView({ block: 'nearest', inline: 'nearest' })
    } else chosen.delete(step)
  }
}

const MOVES: ReadonlySet<string> = new Set(['ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown', 'Home', 'End'])

const resultOf = (step: Element): HTMLElement | undefined =>
  step.closest('.eq')?.querySelector<HTMLElement>(`.result ${MARK}`) ?? undefined

/** The numbers of a step line by line, each from the left: KaTeX writes what is below a bar before what is above it. */
function inReadingOrder(step: Element | null): readonly HTMLElement[] {
  const lines = [...(step?.querySelectorAll('.rhs') ?? [])]
  return lines.flatMap(line =>
    [...line.querySelectorAll<HTMLElement>(MARK)].sort(
      (a, b) => a.getBoundingClientRect().left - b.getBoundingClientRect().left,
    ),
  )
}

/** The number that was pointed at, or the only one of the cell around it. */
function markUnder(target: Element): HTMLElement | undefined {
  const mark = target.closest<HTMLElement>(MARK)
  if (mark) return mark
  const marks = target.closest('td, a.q, .demand, .capacity, .ratio, .result')?.querySelectorAll<HTMLElement>(MARK)
  return marks?.length === 1 ? marks[0] : undefined
}

/** Such as `k_W1 = 13,625 kip/in`, to be heard. */
const inWords = ([, tex, printed]: IslandValue): string =>
  `${runsOf(tex)
    .map(({ text }) => text)
    .join(' ')} = ${printed}`

function decoded(text: string): string {
  try {
    return decodeURIComponent(text)
  } catch {
    return ''
  }
}

function readIsland(): Data | undefined {
  const text = document.querySelector('script.trace-data')?.textContent
  // The page's own island, written by `islandOf`.
  return text ? readData(JSON.parse(text) as Island) : undefined
}
