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
import { createShapeCache, type Kept, type Shape, type ShapeCache, setFormula } from './shapes.ts'

export { createShapeCache, type ShapeCache }

export type Mode = 'inline' | 'display'

/** Sets the formulas of one page, and remembers which classes its formulas carry. */
export interface Typesetter {
  readonly html: (tex: Tex, mode: Mode) => string
  readonly mathml: (tex: Tex) => string
  /**
   * Something with formulas in it, set once and kept for as long as the object is.
   * @param how all that the setting rests on besides the object
   */
  readonly kept: (object: object, how: string, set: () => string) => string
  /** Class attributes of all HTML set so far, such as `mord mathnormal`. */
  readonly classes: () => ReadonlySet<string>
}

export function createTypesetter(cache: ShapeCache = createShapeCache()): Typesetter {
  const all = new Set<Shape>()
  const keptParts: Kept[] = []
  let used = all
  const see = (shape: Shape): void => {
    used.add(shape)
  }
  const setAnew = (set: () => string): Kept => {
    used = new Set()
    const html = set()
    const shapes = used
    used = all
    return { html, shapes }
  }
  return {
    kept: (object, how, set) => {
      const ways = cache.kept.get(object) ?? new Map<string, Kept>()
      cache.kept.set(object, ways)
      const made = ways.get(how) ?? setAnew(set)
      ways.set(how, made)
      keptParts.push(made)
      return made.html
    },
    html: (tex, mode) => setFormula(tex, mode, cache, see),
    mathml: tex => setFormula(unmarked(tex), 'mathml', cache, see),
    classes: () => {
      for (const { shapes } of keptParts) for (const shape of shapes) all.add(shape)
      return new Set([...all].flatMap(({ classes }) => classes))
    },
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
