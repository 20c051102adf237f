/** Which of KaTeX's faces and style rules a page needs, read from the classes its formulas carry. */

const faceOfClass: ReadonlyMap<string, string> = new Map([
  ['mathnormal', 'KaTeX_Math-Italic'],
  ['boldsymbol', 'KaTeX_Math-BoldItalic'],
  ['mathit', 'KaTeX_Main-Italic'],
  ['textit', 'KaTeX_Main-Italic'],
  ['mathbf', 'KaTeX_Main-Bold'],
  ['textbf', 'KaTeX_Main-Bold'],
  ['amsrm', 'KaTeX_AMS-Regular'],
  ['mathbb', 'KaTeX_AMS-Regular'],
  ['textbb', 'KaTeX_AMS-Regular'],
  ['mathcal', 'KaTeX_Caligraphic-Regular'],
  ['mathfrak', 'KaTeX_Fraktur-Regular'],
  ['textfrak', 'KaTeX_Fraktur-Regular'],
  ['mathboldfrak', 'KaTeX_Fraktur-Bold'],
  ['textboldfrak', 'KaTeX_Fraktur-Bold'],
  ['mathtt', 'KaTeX_Typewriter-Regular'],
  ['texttt', 'KaTeX_Typewriter-Regular'],
  ['mathscr', 'KaTeX_Script-Regular'],
  ['textscr', 'KaTeX_Script-Regular'],
  ['mathsf', 'KaTeX_SansSerif-Regular'],
  ['textsf', 'KaTeX_SansSerif-Regular'],
  ['mathboldsf', 'KaTeX_SansSerif-Bold'],
  ['textboldsf', 'KaTeX_SansSerif-Bold'],
  ['mathsfit', 'KaTeX_SansSerif-Italic'],
  ['mathitsf', 'KaTeX_SansSerif-Italic'],
  ['textitsf', 'KaTeX_SansSerif-Italic'],
  ['small-op', 'KaTeX_Size1-Regular'],
  ['large-op', 'KaTeX_Size2-Regular'],
  ['delim-size1', 'KaTeX_Size1-Regular'],
  ['delim-size4', 'KaTeX_Size4-Regular'],
])

/** Faces named by two classes together. */
const faceOfPair: readonly (readonly [string, string, string])[] = [
  ['textbf', 'textit', 'KaTeX_Main-BoldItalic'],
  ['textbf', 'textsf', 'KaTeX_SansSerif-Bold'],
  ['textit', 'textsf', 'KaTeX_SansSerif-Italic'],
  ['delimsizing', 'size1', 'KaTeX_Size1-Regular'],
  ['delimsizing', 'size2', 'KaTeX_Size2-Regular'],
  ['delimsizing', 'size3', 'KaTeX_Size3-Regular'],
  ['delimsizing', 'size4', 'KaTeX_Size4-Regular'],
]

/** Every face that a formula may need. */
export const allMathFaces: readonly string[] = [
  ...new Set(['KaTeX_Main-Regular', ...faceOfClass.values(), ...faceOfPair.map(([, , face]) => face)]),
].sort()

/** Names of the faces, sorted; the regular face is part of every formula. */
export function mathFaces(classAttributes: ReadonlySet<string>): readonly string[] {
  const faces = new Set<string>()
  for (const attribute of classAttributes) {
    faces.add('KaTeX_Main-Regular')
    const names = attribute.split(' ')
    for (const name of names) {
      const face = faceOfClass.get(name)
      if (face !== undefined) faces.add(face)
    }
    for (const [one, other, face] of faceOfPair) if (names.includes(one) && names.includes(other)) faces.add(face)
  }
  return [...faces].sort()
}

/** The rules of KaTeX's style sheet that these classes can meet; the sheet holds one rule a line. */
export function mathRules(sheet: string, classAttributes: ReadonlySet<string>): string {
  if (classAttributes.size === 0) return ''
  const names = new Set([...classAttributes].flatMap(attribute => attribute.split(' ')))
  return sheet
    .split('\n')
    .map(rule => keptRule(rule, names))
    .join('')
}

function keptRule(rule: string, names: ReadonlySet<string>): string {
  const open = rule.indexOf('{')
  if (open === -1) return ''
  const selectors = splitSelectors(rule.slice(0, open)).filter(selector => canMeet(selector, names))
  return selectors.length === 0 ? '' : selectors.join(',') + rule.slice(open)
}

/** Commas inside `:not(…)` do not part selectors, but KaTeX's sheet has none there. */
const splitSelectors = (list: string): readonly string[] => list.split(',')

function canMeet(selector: string, names: ReadonlySet<string>): boolean {
  const asked = selector.replace(/:not\([^)]*\)/g, '').matchAll(/\.([\w-]+)/g)
  for (const [, name] of asked) if (name !== undefined && !names.has(name)) return false
  return true
}
