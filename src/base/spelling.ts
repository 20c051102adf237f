/** What names and units are spelt with. */
export interface Spelling {
  /** A part of a dotted name may be a load case, whose sign belongs to it: `roof.wall.W1.V.EX+`. */
  readonly name: RegExp
  readonly unit: RegExp
  /** A sign that a unit begins with. */
  readonly unitStart: RegExp
}

/** @param L a letter, within a class @param N a digit, within a class */
function spelling(L: string, N: string, flags: string): Spelling {
  const word = `[${L}${N}_]+(?:'[${L}${N}_]+)?`
  const start = `[${L}_][${L}${N}_]*(?:'[${L}${N}_]+)?`
  return {
    name: new RegExp(`${start}(?:\\.(?:(?:[EW][XY]\\d*[+-]|WXY\\d[+-]{1,2})(?![${L}${N}(.])|${word}))*`, `${flags}y`),
    unit: new RegExp(`[${L}°]+|%`, `${flags}y`),
    unitStart: new RegExp(`[${L}°]`, flags),
  }
}

const ascii = spelling('A-Za-z', '0-9', '')
let everyScript: Spelling | undefined

/** In ASCII the letters of every script are those from A to Z; patterns of all letters take long to make. */
export function spellingOf(text: string): Spelling {
  if (!/[\u0080-\uffff]/.test(text)) return ascii
  everyScript ??= spelling('\\p{L}', '\\p{N}', 'u')
  return everyScript
}
