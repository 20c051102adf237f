/** Elements made from plain texts; nothing is ever read as markup. */
import type { IslandLetter, Piece } from './data.ts'

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

const SVG = 'http://www.w3.org/2000/svg'

/** A formula from the pieces that it was set in. */
export function formula(pieces: readonly Piece[]): DocumentFragment {
  const whole = document.createDocumentFragment()
  const open: (Element | DocumentFragment)[] = [whole]
  for (const [name, text, ...attributes] of pieces) {
    if (name === '/') open.pop()
    else {
      const element = /^(?:svg|path)$/.test(name) ? document.createElementNS(SVG, name) : document.createElement(name)
      for (let i = 0; i < attributes.length; i += 2) {
        const key = attributes[i] ?? ''
        if (key !== 'xmlns') element.setAttribute(key, attributes[i + 1] ?? '')
      }
      open.at(-1)?.append(element)
      open.push(element)
    }
    if (text !== '') open.at(-1)?.append(text)
  }
  return whole
}
