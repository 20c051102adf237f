/** Prose and pieces in reading order. */
import type { Check } from '../explain/sheet.ts'
import type { BodyPart, Prose } from './body.ts'
import { checkHtml } from './html-check.ts'
import type { Setting } from './html-parts.ts'
import { pieceHtml } from './html-pieces.ts'

/** Pieces in order; checks that follow each other share a list, and headings take their level from the prose before them. */
export function bodyBlocks(body: readonly BodyPart[], setting: Setting): readonly string[] {
  const out: string[] = []
  const lift = 2 - topLevel(body)
  let checks: Check[] = []
  let level = setting.level
  const closeChecks = () => {
    if (checks.length > 0)
      out.push(`<ul class="checks">\n${checks.map(check => checkHtml(check, setting)).join('\n')}\n</ul>`)
    checks = []
  }
  for (const part of body) {
    if (part.kind === 'check') {
      checks.push(part)
      continue
    }
    closeChecks()
    if (part.kind === 'prose') {
      const prose = proseAsBefore(part, lift)
      level = prose.lastLevel === undefined ? level : Math.min(6, prose.lastLevel + 1)
      out.push(prose.html)
    } else out.push(pieceHtml(part, { ...setting, level }))
  }
  closeChecks()
  return out
}

// A whole tag, quoted values and all, so that nothing inside an attribute is taken for a tag; then a section number.
const tags = /<(\/?)([a-z][a-z0-9]*)((?:"[^"]*"|'[^']*'|[^'">])*)>(\d+(?:\.\d+)*\.?(?=\s))?/gi

/** Level of the highest heading in the prose: it becomes the page's second, below the title. */
function topLevel(body: readonly BodyPart[]): number {
  let top = 7
  for (const part of body)
    if (part.kind === 'prose') for (const level of headingLevels(part)) top = Math.min(top, level)
  return top === 7 ? 2 : top
}

const levelsBefore = new WeakMap<Prose, readonly number[]>()

function headingLevels(prose: Prose): readonly number[] {
  const known =
    levelsBefore.get(prose) ??
    Array.from(prose.html.matchAll(tags), ([, , name = '']) => levelOf(name)).filter(level => level > 0)
  levelsBefore.set(prose, known)
  return known
}

/** 1 to 6 for `h1` to `h6`, otherwise 0. */
const levelOf = (name: string): number => (/^h[1-6]$/i.test(name) ? Number(name.charAt(1)) : 0)

interface SetProse {
  readonly html: string
  readonly lastLevel: number | undefined
}

const setBefore = new WeakMap<Prose, { readonly lift: number; readonly set: SetProse }>()

function proseAsBefore(prose: Prose, lift: number): SetProse {
  const before = setBefore.get(prose)
  if (before?.lift === lift) return before.set
  const set = proseHtml(prose.html, lift)
  setBefore.set(prose, { lift, set })
  return set
}

/** Prose with its headings moved by `lift` levels, their numbers marked, and its tables in boxes that scroll. */
function proseHtml(html: string, lift: number): SetProse {
  let lastLevel: number | undefined
  const set = html.replace(tags, (tag, slash: string, name: string, rest: string, number = '') => {
    const level = levelOf(name)
    if (level > 0) {
      lastLevel = Math.min(6, level + lift)
      const marked = number !== '' && slash === '' ? `<span class="hn">${number}</span>` : number
      return `<${slash}h${lastLevel}${rest}>${marked}`
    }
    if (name.toLowerCase() !== 'table') return tag
    return slash === '' ? `<div class="scroll" tabindex="0">${tag}` : `${tag}</div>`
  })
  return { html: `<div class="prose">${set}</div>`, lastLevel }
}
