/**
 * Raised and lowered digits within a text. The faces of a page hold only the raised digits 1, 2 and 3; the rest would come
 * from whatever face the reader's machine has, so whoever sets a text sets plain digits higher or lower.
 */
export interface Run {
  /** With plain digits where it is raised or lowered. */
  readonly text: string
  readonly set: 'level' | 'raised' | 'lowered'
}

const raisedSigns = '⁰¹²³⁴⁵⁶⁷⁸⁹⁻'
const loweredSigns = '₀₁₂₃₄₅₆₇₈₉₋'
const plainSigns = '0123456789−'

const plainOf: ReadonlyMap<string, string> = new Map(
  [raisedSigns, loweredSigns].flatMap(signs => Array.from(signs, (sign, i) => [sign, plainSigns.charAt(i)] as const)),
)

const shifted = /[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+|[₀₁₂₃₄₅₆₇₈₉₋]+/gu

/** The text in order, cut where digits begin or end to stand higher or lower; an ordinary text is one run. */
export function digitRuns(text: string): readonly Run[] {
  const runs: Run[] = []
  let from = 0
  const level = (to: number) => {
    if (to > from) runs.push({ text: text.slice(from, to), set: 'level' })
  }
  for (const { 0: run, index } of text.matchAll(shifted)) {
    if (/^[¹²³]$/u.test(run)) continue
    level(index)
    const plain = Array.from(run, sign => plainOf.get(sign) ?? sign).join('')
    runs.push({ text: plain, set: loweredSigns.includes(run.charAt(0)) ? 'lowered' : 'raised' })
    from = index + run.length
  }
  level(text.length)
  return runs
}
