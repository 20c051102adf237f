/** The panel: what one value is, what it rests on, what rests on it, and the way that led here. */
import type { Data, Input, IslandValue } from './data.ts'
import { button, formula, letter, make } from './elements.ts'
import { nameOf, placeOf } from './places.ts'

/** What can be done from the panel. */
export interface Acts {
  /** Walks on to a value. */
  readonly walk: (id: string) => void
  /** Returns to an earlier value of the walk. */
  readonly back: (to: number) => void
  readonly show: (mark: HTMLElement) => void
  readonly close: () => void
}

/** The contents of the panel for the last value of a walk. */
export function contents(walk: readonly string[], data: Data, acts: Acts): readonly Node[] {
  const value = data.find(walk.at(-1) ?? '')
  if (!value) return []
  const inputs = data.inputs(value)
  const uses = data.uses(value[0]).map((use): Input => ({ letter: use[1], value: use }))
  return [
    bar(walk, data, acts),
    make(
      'div.trace-body',
      make('section.trace-what', ...what(value, data, acts)),
      make(
        'section.trace-rests',
        ...list('Rests on', inputs, data, acts),
        ...leftOut(data.missing(value)),
        ...origins(value, inputs, data, acts),
      ),
      make(
        'section.trace-uses',
        ...(uses.length > 0
          ? list('Used in', uses, data, acts)
          : [make('h3', 'Used in'), make('p.trace-soft', 'Nothing else in this document rests on it.')]),
      ),
    ),
  ]
}

function bar(walk: readonly string[], data: Data, acts: Acts): HTMLElement {
  const steps = walk.map((id, i) => {
    const value = data.find(id)
    const name = value ? letter(value[1]) : id
    if (i === walk.length - 1) {
      const here = make('li', name)
      here.setAttribute('aria-current', 'step')
      return here
    }
    return make(
      'li',
      button('.trace-crumb', () => acts.back(i), name),
    )
  })
  const way = make('nav', make('ol.trace-walk', ...steps))
  way.setAttribute('aria-label', 'Way walked')
  const close = button('.trace-close', acts.close, 'Close')
  if (walk.length < 2) return make('div.trace-bar', make('p', 'Trace'), close)
  return make(
    'div.trace-bar',
    button('.trace-back', () => acts.back(walk.length - 2), 'Back'),
    way,
    close,
  )
}

function what(value: IslandValue, data: Data, acts: Acts): readonly Node[] {
  const [id, tex, printed, , lines] = value
  const title = make('h2', letter(tex), ' = ', make('b', printed))
  title.tabIndex = -1
  return [
    title,
    make('p.trace-id', make('code', id)),
    ...place(id, acts),
    ...worked(value, data),
    ...clause(value, data),
    ...(lines.length > 0 ? [make('ul.trace-lines', ...lines.map(line => sourceLine(line, data, 'li')))] : []),
  ]
}

function place(id: string, acts: Acts): readonly Node[] {
  const mark = placeOf(id)
  if (!mark) return [make('p.trace-soft', 'Not printed in this document by itself.')]
  return [
    make(
      'p',
      button('.trace-show', () => acts.show(mark), `Show in ${nameOf(mark)}`),
    ),
  ]
}

/** The letter and the formula that gives it. */
function worked(value: IslandValue, data: Data): readonly Node[] {
  const told = data.formula(value)
  if (!told) return []
  const box = make('div.trace-formula', formula(data.pieces(told)))
  box.setAttribute('role', 'img')
  box.setAttribute('aria-label', told[1])
  return [make('div.trace-line', letter(value[1]), make('span.trace-is', '='), box)]
}

function clause(value: IslandValue, data: Data): readonly Node[] {
  switch (value[3]) {
    case 'given':
      return [make('p.trace-clause', 'Given by the engineer.')]
    case 'measured':
      return [make('p.trace-clause', value[5])]
    case 'default':
      return [make('p.trace-clause', `Assumed: ${value[5]}`)]
    case 'worked': {
      const [, , reference = '', assumes = []] = data.formula(value) ?? []
      return [
        make('p.trace-clause', reference),
        ...(assumes.length > 0 ? [make('p.trace-soft', `Assumes ${assumes.join('; ')}.`)] : []),
      ]
    }
  }
}

const sourceLine = (line: number, data: Data, kind: string): HTMLElement =>
  make(`${kind}.trace-source`, make('span', `line ${line}`), ' ', make('code', data.line(line)))

function list(title: string, entries: readonly Input[], data: Data, acts: Acts): readonly Node[] {
  if (entries.length === 0) return []
  return [make('h3', title), make('ul.trace-list', ...entries.map(entry => make('li', entryOf(entry, data, acts))))]
}

/** A value to walk to: its letter, its number, and its line in the source or its id. */
function entryOf({ letter: tex, value }: Input, data: Data, acts: Acts): HTMLElement {
  const [id, , printed, kind, lines] = value
  const [line] = lines
  const below =
    kind === 'given' && line !== undefined
      ? sourceLine(line, data, 'span')
      : make('span.trace-source', make('code', id))
  return button('.trace-entry', () => acts.walk(id), letter(tex), ' ', make('b', printed), ' ', below)
}

/** A page of very many values does not carry them all. */
const leftOut = (count: number): readonly Node[] =>
  count === 0
    ? []
    : [make('p.trace-soft', `${count} more, which this page is too large to carry: ask platemark trace for them.`)]

/** The engineer's own values that it all comes down to, where they are not its inputs already. */
function origins(value: IslandValue, inputs: readonly Input[], data: Data, acts: Acts): readonly Node[] {
  const found = data.roots(value)
  if (found.length === 0 || inputs.every(({ value }) => value[3] === 'given')) return []
  const title = found.length === 1 ? '1 given value at the root' : `${found.length} given values at the root`
  const entries = found.map((each): Input => ({ letter: each[1], value: each }))
  const box = make('details', make('summary', title))
  // A long list is made when it is asked for.
  box.addEventListener('toggle', () => {
    if (box.childElementCount === 1)
      box.append(make('ul.trace-list', ...entries.map(entry => make('li', entryOf(entry, data, acts)))))
  })
  return [box]
}
