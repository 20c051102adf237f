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

/** Our own words in the document's spelling; never applied to what the engineer wrote. */
export function inLanguage(text: string, language: Language): string {
  if (language === 'en-GB') return text
  return american.reduce((out, [british, spelling]) => out.replace(british, spelling), text)
}

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
