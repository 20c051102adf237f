/** Elements made from plain texts; nothing is ever read as markup by the browser. */
import { runsOf } from '../explain/letter.ts'

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

const tags = { line: 'span', below: 'sub', above: 'sup' } as const

/** A letter with what stands below and above it. */
export const letter = (tex: string): HTMLElement =>
  make(
    'span.trace-letter',
    ...runsOf(tex).map(({ at, upright, text }) => make(tags[at] + (upright ? '' : '.trace-slope'), text)),
  )

const SVG = 'http://www.w3.org/2000/svg'

/** A formula from the pieces that it was set in, each a tag without its first sign, and the text after it. */
export function formula(pieces: readonly string[]): DocumentFragment {
  const whole = document.createDocumentFragment()
  const open: (Element | DocumentFragment)[] = [whole]
  for (const piece of pieces) {
    // Attributes hold no `>`, as KaTeX writes them.
    const end = piece.indexOf('>')
    const tag = piece.slice(0, end)
    if (tag.startsWith('/')) open.pop()
    else {
      const name = /^\w+/.exec(tag)?.[0] ?? 'span'
      const element = name === 'span' ? document.createElement(name) : document.createElementNS(SVG, name)
      for (const [, key = '', value = ''] of tag.matchAll(/ ([\w-]+)="([^"]*)"/g))
        element.setAttribute(key, plain(value))
      open.at(-1)?.append(element)
      if (!tag.endsWith('/')) open.push(element)
    }
    open.at(-1)?.append(plain(piece.slice(end + 1)))
  }
  return whole
}

const signs: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', '#x27': "'" }

const plain = (text: string): string => text.replace(/&(amp|lt|gt|quot|#x27);/g, (_, name: string) => signs[name] ?? '')
