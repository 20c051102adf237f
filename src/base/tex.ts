/**
 * TeX whose numerals are kept apart from the rest.
 *
 * The page holds the same few formulas thousands of times with other numbers in
 * them. Keeping the numerals in slots lets the renderer set a shape once and
 * fill it many times. `parts` has one entry more than `slots`; the TeX source is
 * parts[0] slots[0] parts[1] … A slot is digits, with at most one decimal point;
 * signs, digit grouping and powers of ten belong to the parts.
 *
 * Two more kinds of slot stand around a stretch that prints a value: one that names the value, and one
 * that ends the stretch. They are no TeX: only the page sees them, and `texSource` leaves them out.
 */
export interface Tex {
  readonly parts: readonly string[]
  readonly slots: readonly string[]
}

/** TeX without numerals. */
export const tex = (source: string): Tex => ({ parts: [source], slots: [] })

/** One numeral: digits with at most one decimal point. */
export const numeral = (digits: string): Tex => ({ parts: ['', ''], slots: [digits] })

const OPEN = '\u0011'
const CLOSE = '\u0012'

/** TeX that prints a value, marked with the id of that value. */
export const marked = (id: string, inner: Tex): Tex =>
  joinTex({ parts: ['', ''], slots: [OPEN + id] }, inner, { parts: ['', ''], slots: [CLOSE] })

/** The id that a slot marks the beginning of, `end` for the end of a marked stretch, or undefined for a numeral. */
export function markOf(slot: string): { readonly id: string } | 'end' | undefined {
  if (slot.startsWith(OPEN)) return { id: slot.slice(OPEN.length) }
  return slot === CLOSE ? 'end' : undefined
}

/** The same TeX without marks. */
export const unmarked = ({ parts, slots }: Tex): Tex =>
  slots.some(slot => markOf(slot) !== undefined)
    ? joinTex(
        parts[0] ?? '',
        ...slots.map((slot, i) => {
          const after = parts[i + 1] ?? ''
          return markOf(slot) === undefined ? { parts: ['', after], slots: [slot] } : after
        }),
      )
    : { parts, slots }

/** The TeX source as one string. */
export function texSource({ parts, slots }: Tex): string {
  let out = parts[0] ?? ''
  for (let i = 0; i < slots.length; i++) {
    const slot = slots[i] ?? ''
    out += (markOf(slot) === undefined ? slot : '') + (parts[i + 1] ?? '')
  }
  return out
}

/** Joins pieces of TeX in order; plain strings hold no numerals. */
export function joinTex(...pieces: readonly (Tex | string)[]): Tex {
  const parts: string[] = ['']
  const slots: string[] = []
  for (const piece of pieces) {
    const last = parts.length - 1
    if (typeof piece === 'string') {
      parts[last] += piece
      continue
    }
    parts[last] += piece.parts[0] ?? ''
    for (let i = 0; i < piece.slots.length; i++) {
      slots.push(piece.slots[i] ?? '')
      parts.push(piece.parts[i + 1] ?? '')
    }
  }
  return { parts, slots }
}
