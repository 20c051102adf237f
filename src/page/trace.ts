/** Opens the panel on any number of the page, and keeps the walk from there. */
import { runsOf } from '../explain/letter.ts'
import type { Island } from '../render/island.ts'
import { type Data, type IslandValue, readData } from './data.ts'
import { make } from './elements.ts'
import { contents } from './panel.ts'
import { giveStops, idOf, isIn, MARK, marksOf, moveStop, neighbour, placeOf, stopFor } from './places.ts'

/** Tells the trace that the page's island has changed; an open panel shows the new numbers. */
export type Refresh = () => void

const ADDRESS = '#trace='

/** Starts the trace of this page. @returns undefined where the page has no island */
export function startTrace(): Refresh | undefined {
  let data = readIsland()
  if (!data) return undefined
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
  giveStops(label)
  openFromAddress()

  document.addEventListener('click', event => {
    const { target, ctrlKey, metaKey, shiftKey, altKey } = event
    if (!(target instanceof Element) || isIn(target, '.trace') || ctrlKey || metaKey || shiftKey || altKey) return
    const step = target.closest('.trace-step')
    const mark = step ? (chosen.get(step) ?? resultOf(step)) : markUnder(target)
    const selecting = !step && getSelection()?.isCollapsed === false
    if (!mark || selecting || !data?.find(idOf(mark))) return
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

  return () => {
    data = readIsland() ?? data
    giveStops(label)
    walk = walk.filter(id => data?.find(id))
    if (!isOpen()) return
    if (walk.length === 0) close()
    else show(false)
  }

  function label(id: string): string {
    const value = data?.find(id)
    return value ? inWords(value) : id
  }

  function isOpen(): boolean {
    return root.classList.contains('tracing')
  }

  function open(from: HTMLElement | undefined, id: string): void {
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
    if (!data?.find(id)) return
    const mark = placeOf(id)
    open(mark, id)
    mark?.scrollIntoView({ block: 'center' })
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

const pace = (): ScrollBehavior => (matchMedia('(prefers-reduced-motion: reduce)').matches ? 'instant' : 'smooth')

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
