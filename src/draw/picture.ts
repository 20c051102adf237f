/** The outermost element of a drawing: its size, its words for those who cannot see it, its style. */
import type { Language } from '../base/language.ts'
import type { Bounds } from './geometry.ts'
import { element, type SceneNode, words } from './scene.ts'
import { rootClass, stylesheet } from './style.ts'

interface Told {
  readonly title: string
  readonly description: string
  readonly language: Language
}

/** @param style rules beside those that every drawing has */
export function picture(
  { title, description, language }: Told,
  { x0, y0, x1, y1 }: Bounds,
  style: string,
  drawn: readonly SceneNode[],
): SceneNode {
  const id = `${rootClass}-${hash(`${title}\n${description}`)}`
  const size = { width: x1 - x0, height: y1 - y0 }
  return element(
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
      element('style', {}, [stylesheet + style]),
      element('rect', { class: 'pm-sheet', x: x0, y: y0, ...size }),
      ...drawn,
    ],
  )
}

/** FNV-1a: short, the same everywhere, and used for nothing but telling drawings on one page apart. */
function hash(text: string): string {
  let sum = 0x811c9dc5
  for (const sign of text) sum = Math.imul(sum ^ (sign.codePointAt(0) ?? 0), 0x01000193)
  return (sum >>> 0).toString(16).padStart(8, '0')
}
