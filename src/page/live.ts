/** The script of a page that follows the saves of its document. */
import type { Island } from '../render/island.ts'
import type { Message, Place, Report, Table, Update } from '../serve/message.ts'
import { type Blocks, findBlocks } from './live-blocks.ts'
import { connect } from './live-connection.ts'
import { followList } from './live-list.ts'
import { createMarker, type Marker } from './live-marks.ts'
import { createComparison } from './live-pin.ts'
import { holdStill, isInSight } from './live-scroll.ts'
import { openPlace, placeAt } from './live-source.ts'
import { keep, kept } from './live-storage.ts'
import { createStrip } from './live-strip.ts'
import { idOf, MARK, pace, placeOf, stopFor } from './places.ts'
import { startTrace, type Trace } from './trace.ts'

const page = document.getElementById('live-page')
const { live, at = '', of = '/' } = document.body.dataset
if (page && live === 'list') followList(page, of)
if (page && live === 'document') follow(page)

function follow(page: HTMLElement): void {
  let note = (_id: string): string => ''
  const trace = startTrace({ load: () => fetched<Island>('island'), note: id => note(id) })
  const found = findBlocks(page, part => trace?.prepare(part))
  if (found && trace) run(page, found, trace, reads => (note = reads))
}

function run(page: HTMLElement, blocks: Blocks, trace: Trace, noteFrom: (note: Marker['note']) => void): void {
  const marker = createMarker(blocks.marksOf)
  noteFrom(marker.note)
  const comparison = createComparison(kept<Table>('pin'), table => keep('pin', table))
  let token = ''
  let save = Number(at.split('.')[1] ?? 0)
  let connected = false
  let follows = kept<boolean>('follow') ?? true
  let report: Report = { state: 'sound', errors: 0, checks: 0, failed: 0, messages: [] }
  /** The element last pointed at or brought to the focus, whose source line may be asked for. */
  let pointed: Element | undefined
  let touched = Number.NEGATIVE_INFINITY

  const strip = createStrip({
    jump: id => jumpTo(placeOf(id) ?? document.getElementById(id)),
    jumpToMessage: message => {
      const box = boxOf(page, message)
      if (box) jumpTo(box)
      else open({ line: message.line })
    },
    pin: () => {
      fetched<Table>('numbers').then(table => {
        comparison.pin(table)
        redraw()
      }, lost)
    },
    release: () => {
      comparison.release()
      redraw()
    },
    follow: on => {
      follows = on
      keep('follow', on)
    },
    openSource: () => {
      const place = pointed?.isConnected ? placeAt(pointed, blocks.elements) : undefined
      if (place) open(place)
      else strip.read('Point at a number first, or move to one with the keyboard.')
    },
  })

  connect(of, at, {
    hello: hello => {
      token = hello.token
      connected = true
      // The page is as it was built; what it says of itself comes with the first report.
      show()
    },
    update: (update, heard) => {
      if (typeof update === 'string') return
      take(update)
      document.dispatchEvent(new CustomEvent('platemark-updated', { detail: { version: update.version, heard } }))
    },
    lost,
  })
  if (comparison.pinned() !== undefined) catchUp()

  document.addEventListener('dblclick', event => {
    const target = pressed?.isConnected ? pressed : event.target
    if (!(target instanceof Element) || !page.contains(target)) return
    const place = placeAt(target, blocks.elements)
    if (place) open(place)
  })
  // The first press may move the page; it is that which says what was meant.
  let pressed: Element | undefined
  document.addEventListener('click', ({ detail, target }) => {
    if (detail === 1) pressed = target instanceof Element ? target : undefined
  })
  for (const kind of ['focusin', 'pointerover'] as const)
    document.addEventListener(kind, ({ target }) => {
      if (target instanceof Element && page.contains(target)) point(target)
    })
  for (const kind of ['wheel', 'touchmove', 'keydown', 'pointerdown'] as const)
    document.addEventListener(
      kind,
      ({ target }) => {
        if (!(target instanceof Element && target.closest('.live-strip'))) touched = performance.now()
      },
      { passive: true },
    )

  function lost(): void {
    connected = false
    show()
  }

  function show(): void {
    strip.show({
      report,
      save,
      connected,
      moves: comparison.moves(),
      movedBy: comparison.movedBy(),
      pinned: comparison.pinned(),
      follow: follows,
    })
  }

  function redraw(): void {
    marker.show(comparison.moves())
    show()
  }

  function take(update: Update): void {
    const { version, title, style, paper, around, changes, whole, moves, edited } = update
    let changed: readonly Element[] = []
    save = version
    report = update.report
    if (moves) comparison.saved(version, moves)
    if (title !== undefined) document.title = plain(title)
    holdStill(page, () => {
      rule('live-style', style)
      rule('live-paper', paper)
      if (around !== undefined && !blocks.surround(around)) {
        // A sheet of another build: the page is fetched as a whole.
        location.reload()
        return
      }
      if (changes) changed = blocks.change(changes)
      if (whole) changed = blocks.replace(whole)
      marker.show(comparison.moves())
    })
    if (whole && comparison.pinned() !== undefined) catchUp()
    trace.refresh()
    show()
    if (follows && changes && changed.length > 0)
      bring(edited === undefined ? undefined : blocks.elements[edited], changed)
  }

  /** Brings the edit into sight, where nothing of what it changed is and the reader is not busy elsewhere. */
  function bring(edited: Element | undefined, changed: readonly Element[]): void {
    const busy = performance.now() - touched < BUSY || getSelection()?.isCollapsed === false || isHeld(page)
    const covered = strip.height()
    const target = edited && changed.includes(edited) ? edited : changed[0]
    if (busy || !target || changed.some(element => isInSight(element, covered))) return
    target.scrollIntoView({ block: 'center', behavior: pace() })
  }

  /** Compares with the state that is held, after a time of which nothing is known. */
  function catchUp(): void {
    fetched<Table>('numbers').then(table => {
      comparison.now(table)
      redraw()
    }, lost)
  }

  function point(target: Element): void {
    const step = target.closest('.trace-step')
    const mark = step ? step.closest('.eq')?.querySelector(`.result ${MARK}`) : target.closest(MARK)
    pointed = mark ?? target
    const id = mark ? idOf(mark) : ''
    const words = id === '' ? '' : marker.note(id)
    strip.read(words === '' ? '' : `${id}${words}`)
  }

  function jumpTo(element: Element | null | undefined): void {
    if (!(element instanceof HTMLElement)) return
    element.scrollIntoView({ block: 'center', inline: 'nearest', behavior: 'instant' })
    element.classList.add('live-here')
    setTimeout(() => element.classList.remove('live-here'), 1600)
    const stop = element.matches(MARK) ? stopFor(element) : element
    if (stop && !stop.matches('a, button, [tabindex]')) stop.tabIndex = -1
    stop?.focus({ preventScroll: true })
  }

  function open(place: Place): void {
    openPlace(of, place, token).then(({ words, copy }) => {
      strip.read(words)
      if (copy !== undefined) strip.offer(copy)
    })
  }
}

/** A reader who has just moved the page or pressed something is not to be led away, for this long. */
const BUSY = 2500

/** True where the keyboard is at something on the page or in the trace. */
const isHeld = (page: Element): boolean => {
  const held = document.activeElement
  return held !== null && held !== document.body && (page.contains(held) || held.closest('.trace') !== null)
}

/** The box on the page that tells of a message. */
function boxOf(page: Element, { rule, message, line }: Message): Element | undefined {
  const boxes = [...page.querySelectorAll('.fault > div')].filter(
    box =>
      box.querySelector('.rule span')?.textContent === rule && box.querySelector('.message')?.textContent === message,
  )
  return boxes.find(box => box.querySelector('.place')?.textContent === `line ${line}`) ?? boxes[0]
}

/** Gives a style element other rules, where there are any. */
function rule(id: string, css: string | undefined): void {
  const element = document.getElementById(id)
  if (css !== undefined && element && element.textContent !== css) element.textContent = css
}

/** A title is sent as it stands in the page's markup. */
function plain(html: string): string {
  const made = document.createElement('textarea')
  made.innerHTML = html
  return made.value
}

async function fetched<T>(name: string): Promise<T> {
  const answer = await fetch(of + name)
  if (!answer.ok) throw new Error(`${name}: ${answer.status}`)
  // The server's own JSON.
  return (await answer.json()) as T
}
