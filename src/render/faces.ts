/** Which faces of the text families a page needs. */
import type { Sheet } from '../explain/sheet.ts'
import type { BodyPart } from './body.ts'

/** One entry of the assets `faces.screen.json` and `faces.paper.json`. */
export interface Face {
  /** The asset `faces/NAME.css` holds its rule. */
  readonly name: string
  readonly family: Family
  readonly style: 'normal' | 'italic'
  /** First and last code point of each range that the face covers. */
  readonly ranges: readonly (readonly [number, number])[]
}

export type Family = 'text' | 'label'

export interface Need {
  readonly family: Family
  readonly style: Face['style']
  readonly characters: ReadonlySet<number>
}

/** The faces that hold at least one character of what is set in their family and style. */
export function facesFor(faces: readonly Face[], needs: readonly Need[]): readonly Face[] {
  return faces.filter(face => needs.some(need => serves(face, need)))
}

function serves(face: Face, { family, style, characters }: Need): boolean {
  if (face.family !== family || face.style !== style) return false
  for (const code of characters) if (covers(face, code)) return true
  return false
}

const covers = ({ ranges }: Face, code: number): boolean =>
  ranges.some(([first, last]) => code >= first && code <= last)

/** What the page sets in each family. Prose holds both: its tables and headings of columns are set as labels. */
export function needsOf(sheet: Sheet, body: readonly BodyPart[]): readonly Need[] {
  const text = new Set<number>([32])
  const label = new Set<number>([32])
  collect(sheet, label)
  collect(sheet.titleBlock, text)
  for (const part of body) {
    collect(part, part.kind === 'prose' || part.kind === 'note' || part.kind === 'heading' ? text : label)
    if (part.kind === 'register') collect(part.title, text)
    if (part.kind === 'prose' && part.html.includes('<table')) collect(part.html, label)
  }
  const needs: Need[] = [
    { family: 'text', style: 'normal', characters: text },
    { family: 'label', style: 'normal', characters: label },
  ]
  const prose = body.flatMap(part => (part.kind === 'prose' ? [part.html] : []))
  if (prose.some(html => slanted.test(html))) needs.push({ family: 'text', style: 'italic', characters: text })
  if (prose.some(html => slantedInTable.test(html))) needs.push({ family: 'label', style: 'italic', characters: label })
  return needs
}

const slanted = /<(?:em|i)[\s>]/
const slantedInTable = /<t[hd][\s>](?:(?!<\/t[hd]>)[\s\S])*<(?:em|i)[\s>]/

/** Adds the code points of every text within a value; formulas are set in faces of their own. */
function collect(value: unknown, into: Set<number>): void {
  if (typeof value === 'string') collectText(value, into)
  else if (typeof value === 'object' && value !== null && !('parts' in value)) {
    for (const inner of Object.values(value)) collect(inner, into)
  }
}

/** The page's own words and all of ASCII are in the Latin face, which the space already asks for. */
function collectText(text: string, into: Set<number>): void {
  for (const [mark] of text.matchAll(/[\u{80}-\u{10ffff}]/gu)) into.add(mark.codePointAt(0) ?? 0)
}
