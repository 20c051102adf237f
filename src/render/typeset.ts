/**
 * Sets TeX through KaTeX, once per shape.
 *
 * A document holds the same few formulas with other numbers and names in them, and KaTeX
 * takes a quarter of a millisecond for each. A shape is set once with a placeholder in
 * every slot; its output, cut at the placeholders, is then joined with the numerals and
 * words at hand. The result is byte for byte what KaTeX gives for the whole source,
 * which a test holds it to. A stretch that prints a value is KaTeX's own `\\htmlData`.
 */
import { joinTex, type Tex, unmarked } from '../base/tex.ts'
import { createShapeCache, type Shape, type ShapeCache, setFormula } from './shapes.ts'

export { createShapeCache, type ShapeCache }

export type Mode = 'inline' | 'display'

/** Sets the formulas of one page, and remembers which classes its formulas carry. */
export interface Typesetter {
  readonly html: (tex: Tex, mode: Mode) => string
  readonly mathml: (tex: Tex) => string
  /** Class attributes of all HTML set so far, such as `mord mathnormal`. */
  readonly classes: () => ReadonlySet<string>
}

export function createTypesetter(cache: ShapeCache = createShapeCache()): Typesetter {
  const used = new Set<Shape>()
  const see = (shape: Shape): void => {
    used.add(shape)
  }
  return {
    html: (tex, mode) => setFormula(tex, mode, cache, see),
    mathml: tex => setFormula(unmarked(tex), 'mathml', cache, see),
    classes: () => new Set([...used].flatMap(({ classes }) => classes)),
  }
}

/** The same TeX with the marks between groups of digits left out, so that a numeral is read out as one number. */
export function withoutDigitGroups(tex: Tex): Tex {
  const { parts, slots } = unmarked(tex)
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
