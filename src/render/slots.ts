/**
 * Cuts TeX at what changes from one use of a formula to the next: its numerals, and the words of
 * names such as the W1 of k_{\text{W1}}. What is left is the formula's shape.
 */
import { markOf, type Tex } from '../base/tex.ts'

/** TeX whose slots hold words besides numerals. Two of one key differ in nothing but their slots. */
export interface CutTex extends Tex {
  readonly key: string
  /** What each slot holds, and for a word how tall and deep it is. */
  readonly marks: readonly string[]
}

const NUMERAL = '\u0001'
const WORD = '\u0003'
const VALUE = '\u0004'
const VALUE_END = '\u0005'
const OPEN = '\\text{'

export function cutTex(tex: Tex): CutTex {
  const cut: Cutting = { key: '', parts: [''], slots: [], marks: [] }
  const { parts, slots } = tex
  addPart(cut, parts[0] ?? '')
  for (let i = 0; i < slots.length; i++) {
    const slot = slots[i] ?? ''
    const after = parts[i + 1] ?? ''
    const mark = markOf(slot)
    if (mark === 'end') endMark(cut)
    else if (mark !== undefined) startMark(cut, mark.id)
    else {
      requireNumeral(slot)
      if (slot.length === 1 && isLoneArgument(parts[i] ?? '', after)) addText(cut, slot)
      else addSlot(cut, slot, NUMERAL)
    }
    addPart(cut, after)
  }
  return cut
}

interface Cutting {
  key: string
  readonly parts: string[]
  readonly slots: string[]
  readonly marks: string[]
}

function addText(cut: Cutting, text: string): void {
  cut.key += text
  cut.parts[cut.parts.length - 1] += text
}

function addSlot(cut: Cutting, slot: string, mark: string): void {
  cut.key += mark
  cut.slots.push(slot)
  cut.marks.push(mark)
  cut.parts.push('')
}

/** The id goes into an attribute of the page by way of a slot, so it is escaped here, as KaTeX escapes one. */
function startMark(cut: Cutting, id: string): void {
  cut.parts[cut.parts.length - 1] += '\\htmlData{v='
  addSlot(cut, attribute(id), VALUE)
  cut.parts[cut.parts.length - 1] += '}{'
}

function endMark(cut: Cutting): void {
  cut.key += VALUE_END
  cut.parts[cut.parts.length - 1] += '}'
}

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#x27;',
}
const attribute = (text: string): string => text.replace(/[&<>"']/g, sign => entities[sign] ?? sign)

/** Adds a part, with the words in it as slots of their own. */
function addPart(cut: Cutting, part: string): void {
  let from = 0
  for (let at = part.indexOf(OPEN); at !== -1; at = part.indexOf(OPEN, from)) {
    const start = at + OPEN.length
    const end = part.indexOf('}', start)
    const word = part.slice(start, end === -1 ? start : end)
    const size = sizeOf(word)
    addText(cut, part.slice(from, start))
    if (size === '') addText(cut, word)
    else addSlot(cut, word, WORD + size)
    from = start + word.length
  }
  addText(cut, from === 0 ? part : part.slice(from))
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

// KaTeX places a word by the height and depth of its tallest and deepest letters and by nothing else. Letters
// of one row are alike in KaTeX_Main-Regular; the first of each stands for it. A word with any other sign is no slot.
const heights = ['xacegmnopqrsuvwyz-,.', '+', 't', '0123456789', 'ij', 'XABCDEFGHIJKLMNOPQRSTUVWYZ', 'hbdfkl']
const depths = ['x', '+', 'pgjqyQ,']

const levelOf = (levels: readonly string[]): ReadonlyMap<string, number> =>
  new Map(levels.flatMap((letters, level) => Array.from(letters, letter => [letter, level] as const)))
const heightOf = levelOf(heights)
const depthOf = levelOf(depths)

const sizes = new Map<string, string>()

/** Two letters as tall and as deep as a word, or nothing where the word is not to be a slot. */
function sizeOf(word: string): string {
  let size = sizes.get(word)
  if (size === undefined) {
    size = measured(word)
    sizes.set(word, size)
  }
  return size
}

function measured(word: string): string {
  // KaTeX joins hyphens to a dash, and commas alone are lower than any letter.
  if (word.includes('--') || !/[A-Za-z0-9]/.test(word)) return ''
  let [tallest, deepest] = [0, 0]
  for (const letter of word) {
    const height = heightOf.get(letter)
    if (height === undefined) return ''
    tallest = Math.max(tallest, height)
    deepest = Math.max(deepest, depthOf.get(letter) ?? 0)
  }
  return (heights[tallest]?.charAt(0) ?? '') + (depths[deepest]?.charAt(0) ?? '')
}

// Texts that no part holds: a mark, then the number of the slot, in digits or in letters of the lowest height.
const figures = 'acemnorsuz'
const inLetters = (number: string): string => number.replace(/\d/g, digit => figures.charAt(Number(digit)))
const inDigits = (letters: string): string => letters.replace(/\D/g, letter => String(figures.indexOf(letter)))
const placeholders = /91735(\d{5})|znxzn([acemnorsuz]{5})..|vnxvn(\d{5})/

/** The slots of a cut with a placeholder in each. */
export function placeholdersFor({ marks }: CutTex): readonly string[] {
  return marks.map((mark, i) => {
    const number = String(i).padStart(5, '0')
    if (mark === NUMERAL) return `91735${number}`
    return mark === VALUE ? `vnxvn${number}` : `znxzn${inLetters(number)}${mark.slice(1)}`
  })
}

/** Cuts an output at its placeholders: the texts between them, and the number of the slot at each cut. */
export function cutOutput(output: string): { readonly cuts: readonly string[]; readonly order: readonly number[] } {
  const found: readonly (string | undefined)[] = output.split(placeholders)
  const cuts: string[] = []
  const order: number[] = []
  for (let i = 0; i < found.length; i += 4) {
    cuts.push(found[i] ?? '')
    const [numeral, word, value] = [found[i + 1], found[i + 2], found[i + 3]]
    if (word !== undefined) order.push(Number(inDigits(word)))
    else if (numeral !== undefined || value !== undefined) order.push(Number(numeral ?? value))
  }
  return { cuts, order }
}

/**
 * A formula that KaTeX must see as it is: its TeX, with placeholders only for the ids of marked values,
 * which are no TeX, and what stands for each in the output.
 */
export function wholeSource(cut: CutTex): { readonly source: Tex; readonly put: (output: string) => string } {
  const held = placeholdersFor(cut)
  const slots = cut.slots.map((slot, i) => (cut.marks[i] === VALUE ? (held[i] ?? '') : slot))
  const put = (output: string): string =>
    output.replace(/vnxvn(\d{5})/g, (_, at: string) => cut.slots[Number(at)] ?? '')
  return { source: { parts: cut.parts, slots }, put }
}
