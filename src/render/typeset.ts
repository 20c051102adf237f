/**
 * Sets TeX through KaTeX, once per shape.
 *
 * A document holds the same few formulas with other numbers in them, and KaTeX
 * takes a quarter of a millisecond for each. A shape is set once with a
 * placeholder in every slot; its output, cut at the placeholders, is then
 * joined with the numerals at hand. The result is byte for byte what KaTeX
 * gives for the whole source, which a test holds it to.
 */
import katex from 'katex'
import { joinTex, type Tex, texSource } from '../base/tex.ts'

export type Mode = 'inline' | 'display'

/** Output of KaTeX for a shape, cut at its slots. A slot may come more than once, and in another order than in the source. */
interface Shape {
  readonly cuts: readonly string[]
  readonly order: readonly number[]
  /** Class attributes of the output, each once. */
  readonly classes: ReadonlySet<string>
  /** Set when KaTeX takes the numeral apart, so that only its own output will do. */
  readonly whole: boolean
}

type Shapes = Map<string, Shape>

/** Shapes set so far; one cache may serve any number of pages. */
export interface ShapeCache {
  readonly inline: Shapes
  readonly display: Shapes
  readonly mathml: Shapes
}

export const createShapeCache = (): ShapeCache => ({
  inline: new Map(),
  display: new Map(),
  mathml: new Map(),
})

/** Sets the formulas of one page, and remembers which classes its formulas carry. */
export interface Typesetter {
  readonly html: (tex: Tex, mode: Mode) => string
  readonly mathml: (tex: Tex) => string
  /** Class attributes of all HTML set so far, such as `mord mathnormal`. */
  readonly classes: () => ReadonlySet<string>
}

export function createTypesetter(cache: ShapeCache = createShapeCache()): Typesetter {
  const used = new Set<Shape>()
  const set = (tex: Tex, shapes: Shapes, output: Output): string => {
    const shape = shapeOf(tex, shapes, output)
    used.add(shape)
    return shape.whole ? output(texSource(tex)) : fill(shape, tex.slots)
  }
  return {
    html: (tex, mode) =>
      mode === 'inline' ? set(tex, cache.inline, inlineHtml) : set(tex, cache.display, displayHtml),
    mathml: tex => set(tex, cache.mathml, mathml),
    classes: () => new Set([...used].flatMap(shape => [...shape.classes])),
  }
}

type Output = (source: string) => string

// Our own TeX is at fault if it does not parse, so KaTeX throws; `strict` would only write to the console.
const common = { throwOnError: true, trust: false, strict: false } as const
const inlineHtml: Output = source =>
  katex.renderToString(source, {
    ...common,
    output: 'html',
    displayMode: false,
  })
const displayHtml: Output = source =>
  katex.renderToString(source, {
    ...common,
    output: 'html',
    displayMode: true,
  })
const mathml: Output = source => katex.renderToString(source, { ...common, output: 'mathml' })

function shapeOf(tex: Tex, shapes: Shapes, output: Output): Shape {
  const key = keyOf(tex)
  const known = shapes.get(key)
  if (known !== undefined) return known
  const made = makeShape(tex, output)
  shapes.set(key, made)
  return made
}

function fill({ cuts, order }: Shape, slots: readonly string[]): string {
  let out = cuts[0] ?? ''
  for (let i = 0; i < order.length; i++) out += (slots[order[i] ?? 0] ?? '') + (cuts[i + 1] ?? '')
  return out
}

/** The parts with a mark between them for each slot: the numeral itself where KaTeX treats a single digit specially. */
function keyOf({ parts, slots }: Tex): string {
  let key = parts[0] ?? ''
  for (let i = 0; i < slots.length; i++) {
    const slot = slots[i] ?? ''
    const after = parts[i + 1] ?? ''
    requireNumeral(slot)
    key += (slot.length === 1 && isLoneArgument(parts[i] ?? '', after) ? `\u0002${slot}` : '\u0001') + after
  }
  return key
}

/** A slot goes into the page unescaped, so anything but digits and a point is a fault of ours. */
function requireNumeral(slot: string): void {
  for (let i = 0; i < slot.length; i++) {
    const code = slot.charCodeAt(i)
    if ((code < 48 || code > 57) && code !== 46) throw new Error(`not a numeral: ${slot}`)
  }
  if (slot === '') throw new Error('a slot of TeX is empty')
}

/**
 * Whether a numeral stands alone in the braces of a command, as in `\mathbf{8}`.
 *
 * KaTeX drops the braces of a lone character there, which changes the markup
 * around it. Scripts and fractions keep theirs, and they are the common case.
 */
function isLoneArgument(before: string, after: string): boolean {
  if (!before.endsWith('{') || !after.startsWith('}')) return false
  if (after.startsWith('^', 1) || after.startsWith('_', 1)) return true
  const opener = before.charAt(before.length - 2)
  return opener !== '^' && opener !== '_' && opener !== '}' && !before.endsWith('\\frac{')
}

// Ten digits that no part holds: five that mark the place, five that count the slots.
const placeholder = (slot: number): string => `91735${String(slot).padStart(5, '0')}`
const placeholders = /91735(\d{5})/

function makeShape(tex: Tex, output: Output): Shape {
  const { parts, slots } = tex
  const fixed = slots.map((slot, i) => slot.length === 1 && isLoneArgument(parts[i] ?? '', parts[i + 1] ?? ''))
  const stand = slots.map((slot, i) => (fixed[i] === true ? slot : placeholder(i)))
  const found = output(texSource({ parts, slots: stand })).split(placeholders)
  const cuts = found.filter((_, i) => i % 2 === 0)
  const order = found.filter((_, i) => i % 2 === 1).map(Number)
  const expected = fixed.filter(isFixed => !isFixed).length * (output === mathml ? 2 : 1)
  // A placeholder that KaTeX took apart (an unbraced exponent, say) is missing; italic digits differ in measure.
  const whole = order.length !== expected || slantedDigits.test(texSource(tex))
  return {
    cuts,
    order,
    classes: output === mathml ? new Set() : classesOf(cuts.join('')),
    whole,
  }
}

const slantedDigits = /\\(?:math(?!bf|rm)|text(?=it|sl|tt|sf)|boldsymbol|it\b)/

function classesOf(html: string): ReadonlySet<string> {
  return new Set(Array.from(html.matchAll(/class="([^"]*)"/g), match => match[1] ?? ''))
}

/** The same TeX with the marks between groups of digits left out, so that a numeral is read out as one number. */
export function withoutDigitGroups({ parts, slots }: Tex): Tex {
  const pieces: (Tex | string)[] = [parts[0] ?? '']
  let open = ''
  for (let i = 0; i < slots.length; i++) {
    const after = parts[i + 1] ?? ''
    open += slots[i] ?? ''
    const continues = (after === '{,}' || after === '\\,') && /^\d{3}(?:\.|$)/.test(slots[i + 1] ?? '')
    if (continues) continue
    pieces.push({ parts: ['', after], slots: [open] })
    open = ''
  }
  return joinTex(...pieces)
}
