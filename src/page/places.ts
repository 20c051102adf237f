/** Where a value stands on the page, and how its numbers are reached without a mouse. */

export const MARK = '[data-v]'

export const idOf = (mark: Element): string => mark.getAttribute('data-v') ?? ''

export const isIn = (mark: Element, selector: string): boolean => mark.closest(selector) !== null

/** Where a value is printed: the step that works it before a table, a table before a quote. */
export function placeOf(id: string): HTMLElement | undefined {
  const marks = marksOf(id)
  return marks.find(mark => isIn(mark, '.result')) ?? marks.find(mark => isIn(mark, '.tbl, .checks')) ?? marks[0]
}

/** Every number on the page that is this value. */
export const marksOf = (id: string): readonly HTMLElement[] => [
  ...document.querySelectorAll<HTMLElement>(`[data-v="${CSS.escape(id)}"]`),
]

/** What a place is called: `equation 4.1`, `table 5.2`. */
export function nameOf(mark: Element): string {
  const step = mark.closest('.eq')
  if (step) return `equation ${step.querySelector('.n')?.textContent ?? ''}`.trim()
  const table = mark.closest('.tbl')?.querySelector('caption b')?.textContent
  if (table) return table.charAt(0).toLowerCase() + table.slice(1)
  return isIn(mark, '.checks') ? 'its check' : 'the text'
}

/** The numbers that share one stop of the tab key: those of a table or a list of checks. */
const GROUPS = '.tbl, .checks'

/** The numbers of a step lie in a formula that is set for the eye alone; its own number stands for them. */
const STEPS = '.eq'

/**
 * Gives each table and list of checks one stop, on its first number, and each step a button in its number.
 * May be called again after the page has changed.
 * @param label what the button of a step is called, by the value that the step works
 * @param within the part of the page that is meant
 */
export function giveStops(label: (id: string) => string, within: ParentNode): void {
  for (const group of within.querySelectorAll(GROUPS)) {
    const first = group.querySelector<HTMLElement>(`[data-v][tabindex="0"]`) ?? group.querySelector<HTMLElement>(MARK)
    if (first) stopAt(first)
  }
  for (const mark of within.querySelectorAll<HTMLElement>(`.prose :not(a) > ${MARK}`)) stopAt(mark)
  for (const step of within.querySelectorAll(STEPS)) giveButton(step, label)
}

function giveButton(step: Element, label: (id: string) => string): void {
  const number = step.querySelector('.n')
  const result = step.querySelector(`.result ${MARK}`)
  if (!number || !result || number.querySelector('button')) return
  const name = number.textContent ?? ''
  const made = document.createElement('button')
  made.type = 'button'
  made.className = 'trace-step'
  made.textContent = name === '' ? '=' : name
  made.setAttribute('aria-label', `${name} trace ${label(idOf(result))}`.trim())
  number.replaceChildren(made)
}

function stopAt(mark: HTMLElement): void {
  mark.tabIndex = 0
  mark.setAttribute('role', 'button')
}

/** Moves the one stop of a group to another of its numbers. */
export function moveStop(from: HTMLElement, to: HTMLElement): void {
  from.removeAttribute('tabindex')
  from.removeAttribute('role')
  stopAt(to)
  to.focus()
}

/** Brings the stop of a group to a number, or gives the element that stands for it. */
export function stopFor(mark: HTMLElement): HTMLElement | null {
  if (isIn(mark, STEPS)) return mark.closest(STEPS)?.querySelector<HTMLElement>('.trace-step') ?? null
  const link = mark.closest('a')
  if (link) return link
  const group = mark.closest(GROUPS)
  const held = group?.querySelector<HTMLElement>('[data-v][tabindex="0"]')
  if (held && held !== mark) {
    held.removeAttribute('tabindex')
    held.removeAttribute('role')
  }
  stopAt(mark)
  return mark
}

/** The number that an arrow key leads to from one of a table or list; the same where there is no more. */
export function neighbour(mark: HTMLElement, key: string): HTMLElement {
  const group = mark.closest(GROUPS)
  const row = mark.closest('tr, .check')
  if (!group || !row) return mark
  const beside = [...row.querySelectorAll<HTMLElement>(MARK)]
  const at = beside.indexOf(mark)
  switch (key) {
    case 'ArrowLeft':
      return beside[at - 1] ?? mark
    case 'ArrowRight':
      return beside[at + 1] ?? mark
    case 'Home':
      return beside[0] ?? mark
    case 'End':
      return beside.at(-1) ?? mark
    default: {
      const rows = [...group.querySelectorAll('tr, .check')].filter(other => other.querySelector(MARK))
      const next = rows[rows.indexOf(row) + (key === 'ArrowDown' ? 1 : -1)]
      return (next && sameColumn(mark, next)) ?? mark
    }
  }
}

function sameColumn(mark: HTMLElement, row: Element): HTMLElement | undefined {
  const column = mark.closest<HTMLTableCellElement>('td, th')?.cellIndex
  const marks = [...row.querySelectorAll<HTMLElement>(MARK)]
  if (column === undefined) return marks[0]
  const away = (other: HTMLElement) =>
    Math.abs((other.closest<HTMLTableCellElement>('td, th')?.cellIndex ?? 0) - column)
  return marks.reduce<HTMLElement | undefined>(
    (best, other) => (best && away(best) <= away(other) ? best : other),
    undefined,
  )
}

export const pace = (): ScrollBehavior =>
  matchMedia('(prefers-reduced-motion: reduce)').matches ? 'instant' : 'smooth'
