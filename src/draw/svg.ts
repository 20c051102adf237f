/** The root of every drawing: its size, its words for those who cannot see it, and the style of what it holds. */
import type { Language } from '../base/language.ts'
import type { Bounds } from './geometry.ts'
import { element, type SceneNode, serialise, words } from './scene.ts'
import { rootClass, stylesheetOf } from './style.ts'

/** What stands for a drawing in words. */
export interface Described {
  readonly title: string
  readonly description: string
  readonly language: Language
}

/** @returns the whole `<svg>` element; the same nodes give the same bytes */
export function svgOf(
  { title, description, language }: Described,
  nodes: readonly SceneNode[],
  { x0, y0, x1, y1 }: Bounds,
): string {
  const id = `${rootClass}-${hash(`${title}\n${description}`)}`
  const size = { width: x1 - x0, height: y1 - y0 }
  const drawn = [element('rect', { class: 'pm-sheet', x: x0, y: y0, ...size }), ...nodes]
  return serialise(
    element(
      'svg',
      {
        xmlns: 'http://www.w3.org/2000/svg',
        class: rootClass,
        viewBox: words(x0, y0, size.width, size.height),
        ...size,
        role: 'img',
        lang: language,
        'aria-labelledby': `${id}-title ${id}-desc`,
      },
      [
        element('title', { id: `${id}-title` }, [title]),
        element('desc', { id: `${id}-desc` }, [description]),
        element('style', {}, [stylesheetOf(classesIn(drawn))]),
        ...drawn,
      ],
    ),
  )
}

function classesIn(nodes: readonly SceneNode[], found: Set<string> = new Set()): ReadonlySet<string> {
  for (const node of nodes) {
    if (typeof node === 'string') continue
    const { class: names } = node.attributes
    if (typeof names === 'string') for (const name of names.split(' ')) found.add(name)
    classesIn(node.children, found)
  }
  return found
}

/** FNV-1a: short, the same everywhere, and used for nothing but telling drawings on one page apart. */
function hash(text: string): string {
  let sum = 0x811c9dc5
  for (const sign of text) sum = Math.imul(sum ^ (sign.codePointAt(0) ?? 0), 0x01000193)
  return (sum >>> 0).toString(16).padStart(8, '0')
}
