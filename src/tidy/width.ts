/** How many columns of a terminal or an editor a text takes. */
import stringWidth from 'string-width'

const PLAIN = /^[ -~]*$/

/** Wide characters count two, combining ones none; nothing but those asks for the package. */
export const widthOf = (text: string): number => (PLAIN.test(text) ? text.length : stringWidth(text))

/** Spaces that fill a text up to a width. */
export const fillOf = (text: string, width: number): string => ' '.repeat(Math.max(0, width - widthOf(text)))
