/** The strip along the foot of the window: how the document stands, what moved, what is wrong. */
import type { Message, Move, Moves, Report, Turn } from '../serve/message.ts'
import { changeInWords, counted, inWords } from '../serve/words.ts'
import { button, letter, make } from './elements.ts'
import { verdictOf } from './live-marks.ts'

export interface Strip {
  /** Its height in pixels, which the page is covered by. */
  readonly height: () => number
  readonly show: (shown: Shown) => void
  /** A line of what is pointed at; empty for none. */
  readonly read: (text: string) => void
  /** Offers a text to be copied, beside the line. */
  readonly offer: (text: string) => void
}

export interface Shown {
  readonly report: Report
  readonly save: number
  readonly connected: boolean
  readonly moves: Moves
  /** The save that the marks are of. */
  readonly movedBy: number
  /** The save that the page is compared with, where one is held. */
  readonly pinned: number | undefined
  readonly follow: boolean
}

export interface Acts {
  readonly jump: (id: string) => void
  readonly jumpToMessage: (message: Message) => void
  readonly pin: () => void
  readonly release: () => void
  readonly follow: (on: boolean) => void
  readonly openSource: () => void
}

type Panel = 'moves' | 'messages'

/** As many rows as anyone reads; the page marks the rest. */
const MOST = 200

export function createStrip(acts: Acts): Strip {
  const strip = make('aside.live-strip')
  strip.setAttribute('aria-label', 'Live')
  const bar = make('div.live-bar')
  const panel = make('div.live-panel')
  panel.id = 'live-panel'
  const readout = make('p.live-readout')
  readout.setAttribute('role', 'status')
  const copy = make('span.live-copy')
  const source = button('.live-source', acts.openSource, 'Open source line')
  strip.append(panel, bar)
  document.body.append(strip)
  let height = 0
  let open: Panel | undefined
  let shown: Shown | undefined

  const draw = (): void => {
    if (!shown) return
    const { scrollTop } = panel
    const held = document.activeElement
    const key = held instanceof HTMLElement && strip.contains(held) ? held.dataset.key : undefined
    bar.replaceChildren(...barOf(shown, open, toggle, acts), make('div.live-told', readout, copy, source))
    panel.hidden = open === undefined
    panel.replaceChildren(...panelOf(shown, open, acts))
    panel.scrollTop = scrollTop
    // What had the focus was made anew.
    if (key) strip.querySelector<HTMLElement>(`[data-key="${CSS.escape(key)}"]`)?.focus({ preventScroll: true })
    // The whole page takes its style anew when this changes.
    if (bar.offsetHeight !== height) {
      height = bar.offsetHeight
      document.documentElement.style.setProperty('--live-strip', `${height}px`)
    }
  }
  const toggle = (which: Panel): void => {
    open = open === which ? undefined : which
    draw()
  }
  strip.addEventListener('keydown', event => {
    if (event.key !== 'Escape' || open === undefined) return
    event.stopPropagation()
    const was = open
    toggle(was)
    strip.querySelector<HTMLElement>(`[data-key="${was}"]`)?.focus()
  })
  return {
    height: () => strip.getBoundingClientRect().height,
    show: next => {
      shown = next
      draw()
    },
    read: text => {
      if (readout.textContent !== text) readout.textContent = text
      copy.replaceChildren()
    },
    offer: text => {
      const done = () => copy.replaceChildren('copied')
      copy.replaceChildren(button('.live-copy', () => void navigator.clipboard.writeText(text).then(done), 'Copy'))
    },
  }
}

function barOf(shown: Shown, open: Panel | undefined, toggle: (which: Panel) => void, acts: Acts): readonly Node[] {
  const { report, save, connected, moves, pinned, follow } = shown
  const { numbers, checks } = moves
  const state = make(
    `p.live-state${connected && report.state === 'sound' ? '' : ' live-ng'}`,
    make('b', connected ? inWords(report) : 'not connected'),
    ` · ${connected ? `save ${save}` : `as of save ${save}`}`,
    ...(report.checks === 0
      ? []
      : [
          ' · ',
          make(
            `span${report.failed > 0 ? '.live-ng' : ''}`,
            `${counted(report.checks, 'check')}, ${report.failed === 0 ? 'none' : report.failed} NG`,
          ),
        ]),
  )
  const opener = (which: Panel, text: string): HTMLElement => {
    const made = keyed(
      which,
      button('.live-open', () => toggle(which), text),
    )
    made.setAttribute('aria-expanded', String(open === which))
    made.setAttribute('aria-controls', 'live-panel')
    return made
  }
  const check = keyed('follow', make('input')) as HTMLInputElement
  check.type = 'checkbox'
  check.checked = follow
  check.addEventListener('change', () => acts.follow(check.checked))
  return [
    state,
    opener('moves', `What moved (${numbers.length + checks.length})`),
    opener('messages', `Messages (${report.messages.length})`),
    keyed(
      'pin',
      pinned === undefined
        ? button('.live-pin', acts.pin, 'Compare with this state')
        : button('.live-pin', acts.release, `Compared with save ${pinned}: release`),
    ),
    make('label.live-follow', check, ' Follow edits'),
  ]
}

function panelOf(shown: Shown, open: Panel | undefined, acts: Acts): readonly Node[] {
  switch (open) {
    case undefined:
      return []
    case 'moves':
      return movesOf(shown, acts)
    case 'messages':
      return [messagesOf(shown.report, acts)]
  }
}

function movesOf({ moves, movedBy, save, pinned }: Shown, acts: Acts): readonly Node[] {
  const { numbers, checks } = moves
  const since =
    pinned !== undefined
      ? `Against save ${pinned}.`
      : numbers.length + checks.length === 0
        ? 'No number has moved yet.'
        : movedBy === save
          ? `By save ${save}.`
          : `By save ${movedBy}; nothing moved since.`
  const results = numbers.filter(({ given, was, now }) => !given && was !== undefined && now !== undefined)
  const written = numbers.filter(({ given, was, now }) => given && was !== undefined && now !== undefined)
  const came = numbers.filter(({ was }) => was === undefined)
  const gone = numbers.filter(({ now }) => now === undefined)
  return [
    make('p.live-since', since),
    ...section('Checks', checks, turn => turnRow(turn, acts)),
    ...section('Results', results, move => moveRow(move, acts)),
    ...section('Written', written, move => moveRow(move, acts)),
    ...section('New', came, move => moveRow(move, acts)),
    ...section('No longer worked', gone, move => moveRow(move, acts)),
  ]
}

function section<T>(title: string, entries: readonly T[], row: (entry: T) => HTMLElement): readonly Node[] {
  if (entries.length === 0) return []
  const more = entries.length - MOST
  return [
    make('h2', `${title} (${entries.length})`),
    make('ul.live-rows', ...entries.slice(0, MOST).map(entry => make('li', row(entry)))),
    ...(more > 0 ? [make('p.live-soft', `${more} more, marked on the page.`)] : []),
  ]
}

function moveRow(move: Move, acts: Acts): HTMLElement {
  const { id, letter: tex, was, now, change } = move
  const content = [
    make('span.live-name', letter(tex), ' ', make('code', id)),
    make(
      'span.live-way',
      was ?? 'new',
      ...(was && now ? [' → '] : [' ']),
      make('b', was ? (now ?? 'gone') : (now ?? '')),
    ),
    make('span.live-change', change === undefined ? '' : changeInWords(change)),
  ]
  // What is gone has no place to jump to.
  if (now === undefined) return make('div.live-row', ...content)
  return keyed(
    `v ${id}`,
    button('.live-row', () => acts.jump(id), ...content),
  )
}

function turnRow({ id, what, was, now }: Turn, acts: Acts): HTMLElement {
  const said = (verdict: Turn['now']): string => (verdict ? `${verdictOf(verdict.ok)}, ratio ${verdict.ratio}` : '')
  const content = [
    make('span.live-name', what),
    make(
      `span.live-way${now && !now.ok ? ' live-ng' : ''}`,
      was ? said(was) : 'new',
      ' → ',
      make('b', now ? said(now) : 'gone'),
    ),
    make('span.live-change'),
  ]
  if (!now) return make('div.live-row', ...content)
  return keyed(
    `c ${id}`,
    button('.live-row', () => acts.jump(id), ...content),
  )
}

function messagesOf({ messages }: Report, acts: Acts): HTMLElement {
  if (messages.length === 0) return make('p.live-since', 'Nothing is wrong with the document.')
  const rows = messages.map((each, i) => {
    const { severity, rule, message, line } = each
    return make(
      'li',
      keyed(
        `m ${i}`,
        button(
          '.live-row',
          () => acts.jumpToMessage(each),
          make(`span.live-name${severity === 'error' ? ' live-ng' : ''}`, make('b', severity), ' ', message),
          make('span.live-way', rule),
          make('span.live-change', `line ${line}`),
        ),
      ),
    )
  })
  return make('ul.live-rows', ...rows)
}

function keyed(key: string, element: HTMLElement): HTMLElement {
  element.dataset.key = key
  return element
}
