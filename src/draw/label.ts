/** Texts on the sheet: their elements and the boxes they need. */
import { add, type Box, box, normal, type Point, times, toward } from './geometry.ts'
import { element, type SceneElement, words } from './scene.ts'
import { type TextRole, textStyles } from './style.ts'
import { type Fitted, lineHeight, shorten, textWidth } from './textwidth.ts'

/** What a text lies on: clear ground, or lines that it masks with the colour of the ground. */
export type Ground = 'clear' | 'paper' | 'wash'

const groundClasses: Record<Ground, string> = { clear: '', paper: ' pm-over', wash: ' pm-over-wash' }

/** White space at either end of a text. */
const sidebearing = 2.5
/** From the middle of the capitals down to the baseline, in parts of the size. */
const baselineDrop = 0.34

export interface Lettering {
  readonly lines: readonly Fitted[]
  readonly role: TextRole
  readonly width: number
  readonly height: number
  /** A level text that keeps to one end of its box, next to what it names, however narrow its font turns out. */
  readonly keeps?: 'start' | 'end'
}

export function lettering(role: TextRole, room: number, ...texts: readonly string[]): Lettering {
  const style = textStyles[role]
  const lines = texts.filter(text => text !== '').map(text => shorten(text, style, room))
  const width = Math.max(0, ...lines.map(line => textWidth(line.text, style))) + 2 * sidebearing
  return { role, lines, width, height: lines.length * style.size * lineHeight }
}

export function letteringBox(letters: Lettering, at: Point, angle = 0): Box {
  return box(at, letters.width, letters.height, angle)
}

/** The lines of a lettering about their common middle. */
export function setLettering(letters: Lettering, at: Point, angle: number, ground: Ground): readonly SceneElement[] {
  const { size } = textStyles[letters.role]
  const down = normal(toward(angle))
  const side = letters.keeps === undefined ? 0 : letters.width / 2 - sidebearing
  const end = { x: at.x + (letters.keeps === 'start' ? -side : side), y: at.y }
  const kept = letters.keeps === undefined ? '' : `pm-${letters.keeps} `
  return letters.lines.map((line, idx) => {
    const middle = (idx - (letters.lines.length - 1) / 2) * size * lineHeight
    return textElement(
      line,
      `${kept}pm-t-${letters.role}${groundClasses[ground]}`,
      add(end, times(down, middle + size * baselineDrop)),
      angle,
    )
  })
}

/** A text that starts at `at`, set level, with its middle at that height. */
export function startText(text: string, role: TextRole, at: Point): SceneElement {
  return textElement({ text }, `pm-start pm-t-${role}`, { x: at.x, y: at.y + textStyles[role].size * baselineDrop }, 0)
}

/** A text that ends at `at`, in the same way. */
export function endText(text: string, role: TextRole, at: Point): SceneElement {
  return textElement({ text }, `pm-end pm-t-${role}`, { x: at.x, y: at.y + textStyles[role].size * baselineDrop }, 0)
}

function textElement({ text, full }: Fitted, className: string, at: Point, angle: number): SceneElement {
  const place =
    angle === 0
      ? { x: at.x, y: at.y }
      : { transform: words('translate(', at.x, at.y, ') rotate(', (angle * 180) / Math.PI, ')') }
  const whole = full === undefined ? [] : [element('title', {}, [full])]
  return element('text', { class: className, ...place }, [...whole, text])
}

/** The angle along a line at which text reads from below or from the right, up to a little past upright. */
export function readableAngle(angle: number): number {
  const past = (15 * Math.PI) / 180
  const half = Math.PI
  const turned = angle - half * Math.floor((angle + half / 2 + past) / half)
  return Math.abs(turned) < 1e-9 ? 0 : turned
}
