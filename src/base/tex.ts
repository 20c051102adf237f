/**
 * TeX whose numerals are kept apart from the rest.
 *
 * The page holds the same few formulas thousands of times with other numbers in
 * them. Keeping the numerals in slots lets the renderer set a shape once and
 * fill it many times. `parts` has one entry more than `slots`; the TeX source is
 * parts[0] slots[0] parts[1] … A slot is digits, with at most one decimal point;
 * signs, digit grouping and powers of ten belong to the parts.
 */
export interface Tex {
  readonly parts: readonly string[]
  readonly slots: readonly string[]
}

/** TeX without numerals. */
export const tex = (source: string): Tex => ({ parts: [source], slots: [] })

/** One numeral: digits with at most one decimal point. */
export const numeral = (digits: string): Tex => ({ parts: ['', ''], slots: [digits] })

/** The TeX source as one string. */
export function texSource({ parts, slots }: Tex): string {
  let out = parts[0] ?? ''
  for (let i = 0; i < slots.length; i++) out += (slots[i] ?? '') + (parts[i + 1] ?? '')
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
