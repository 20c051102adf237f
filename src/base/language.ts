/** The language a document prints in: it sets spelling and the grouping of digits. */
export type Language = 'en-US' | 'en-GB'

/** British spelling, which is the spelling of the code, to American. */
const american: readonly (readonly [RegExp, string])[] = [
  [/\b([Cc])entre/g, '$1enter'],
  [/\b([Ss])toreys/g, '$1tories'],
  [/\b([Ss])torey/g, '$1tory'],
  [/\b([Mm])etre/g, '$1eter'],
  [/\b([Cc])olour/g, '$1olor'],
  [/\b([Bb])ehaviour/g, '$1ehavior'],
  [/\b([Nn])eighbour/g, '$1eighbor'],
  [/\b([Mm])odelled/g, '$1odeled'],
]

/** Marks, from the private use area, around a name that keeps its own spelling. */
const [OPEN, CLOSE] = ['\ue000', '\ue001']

/** A name of the engineer's within words of ours. */
export const verbatim = (name: string): string => `${OPEN}${name.replace(/[\ue000\ue001]/g, '')}${CLOSE}`

/** Our own words in the document's spelling, and names as the engineer wrote them. */
export function inLanguage(text: string, language: Language): string {
  const pieces = text.split(/\ue000([^\ue001]*)\ue001/)
  if (language === 'en-GB') return pieces.join('')
  // Every second piece is a name.
  return pieces.map((piece, i) => (i % 2 === 1 ? piece : americanOf(piece))).join('')
}

const americanOf = (text: string): string =>
  american.reduce((out, [british, spelling]) => out.replace(british, spelling), text)

/** Either spelling to the one the code uses, so that both are understood. */
export function toBritish(text: string): string {
  return text
    .replace(/\b([Cc])enter/g, '$1entre')
    .replace(/\b([Ss])tories\b/g, '$1toreys')
    .replace(/\b([Ss])tory/g, '$1torey')
    .replace(/\b([Cc])olor/g, '$1olour')
    .replace(/\b([Bb])ehavior/g, '$1ehaviour')
}

/** The mark between groups of three digits. */
export const digitGroup = (language: Language): string => (language === 'en-US' ? ',' : '\u202f')
