/** Elements made from plain texts; nothing is ever read as markup. */
import type { IslandLetter } from './data.ts'

type Content = Node | string

/** @param kind tag and class, such as `p.trace-id` */
export function make(kind: string, ...contents: readonly Content[]): HTMLElement {
  const [tag = 'div', name = ''] = kind.split('.')
  const element = document.createElement(tag)
  if (name !== '') element.className = name
  element.append(...contents)
  return element
}

export function button(kind: string, act: () => void, ...contents: readonly Content[]): HTMLElement {
  const element = make(`button${kind}`, ...contents)
  element.setAttribute('type', 'button')
  element.addEventListener('click', act)
  return element
}

const tags: Readonly<Record<string, string>> = { l: 'span', b: 'sub', a: 'sup' }

/** A letter with what stands below and above it. */
export const letter = (runs: IslandLetter): HTMLElement =>
  make(
    'span.trace-letter',
    ...runs.map(run => {
      const place = run.charAt(0)
      const tag = tags[place.toLowerCase()] ?? 'span'
      return make(place === place.toLowerCase() ? `${tag}.trace-slope` : tag, run.slice(1))
    }),
  )
