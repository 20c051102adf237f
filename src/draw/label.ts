/** Texts on the sheet: their elements and the boxes they need. */
import { digitRuns } from '../base/raised.ts'
import { add, type Box, box, normal, type Point, times, toward } from './geometry.ts'
import { element, formatNumber, type SceneElement, type SceneNode, words } from './scene.ts'
import { type TextRole, textStyles } from './style.ts'
import { type Fitted, lineHeight, shorten, textWidth } from './textwidth.ts'

/** What a text lies on: clear ground, or lines that it masks with the colour of the ground. */
export type Ground = 'clear' | 'paper' | 'wash'

/** A box below the text: an outline around its letters would reach a PDF as shapes, and the text twice. */
const maskClasses = { paper: 'pm-mask', wash: 'pm-mask-wash' } as const

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
  const set = letters.lines.map((line, idx) => {
    const middle = (idx - (letters.lines.length - 1) / 2) * size * lineHeight
    return { line, middle }
  })
  const masks =
    ground === 'clear'
      ? []
      : set.map(({ line, middle }) =>
          maskElement(line.text, letters, maskClasses[ground], add(at, times(down, middle)), angle),
        )
  const texts = set.map(({ line, middle }) =>
    textElement(line, `${kept}pm-t-${letters.role}`, add(end, times(down, middle + size * baselineDrop)), angle),
  )
  return [...masks, ...texts]
}

/** The letters of the page's face are about this much of the width that is kept free for them. */
const FACE_SHARE = 0.94

function maskElement(
  text: string,
  { role, keeps, width }: Lettering,
  className: string,
  at: Point,
  angle: number,
): SceneElement {
  const style = textStyles[role]
  const own = textWidth(text, style) * FACE_SHARE + 2
  const left =
    keeps === 'start' ? sidebearing - 1 - width / 2 : keeps === 'end' ? width / 2 - sidebearing + 1 - own : -own / 2
  const size = { width: own, height: style.size * 1.1 }
  const top = -size.height / 2
  return element('rect', {
    class: className,
    ...(angle === 0
      ? { x: at.x + left, y: at.y + top, ...size }
      : { x: left, y: top, ...size, transform: placed(at, angle) }),
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
  const place = angle === 0 ? { x: at.x, y: at.y } : { transform: placed(at, angle) }
  const whole = full === undefined ? [] : [element('title', {}, [full])]
  return element('text', { class: className, ...place }, [...whole, ...withShiftedDigits(text)])
}

const placed = (at: Point, angle: number): string =>
  words('translate(', at.x, at.y, ') rotate(', (angle * 180) / Math.PI, ')')

/** How far raised digits stand above the line and lowered ones below it, and how large they are, in parts of the size. */
const SHIFT = 0.34
const SMALLER = 0.72

/** The text with its raised and lowered digits in the face of the rest; what follows them comes back to the line. */
function withShiftedDigits(text: string): readonly SceneNode[] {
  let back = 0
  return digitRuns(text).map(run => {
    const up = run.set === 'level' ? 0 : run.set === 'raised' ? -SHIFT : SHIFT
    const move = up + back
    back = -up
    if (run.set === 'level')
      return move === 0 ? run.text : element('tspan', { dy: `${formatNumber(move)}em` }, [run.text])
    // An em is that of the smaller digits.
    return element('tspan', { dy: `${formatNumber(move / SMALLER)}em`, 'font-size': `${100 * SMALLER}%` }, [run.text])
  })
}

/** The angle along a line at which text reads from below or from the right, up to a little past upright. */
export function readableAngle(angle: number): number {
  const past = (15 * Math.PI) / 180
  const half = Math.PI
  const turned = angle - half * Math.floor((angle + half / 2 + past) / half)
  return Math.abs(turned) < 1e-9 ? 0 : turned
}
