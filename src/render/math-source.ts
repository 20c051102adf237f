/**
 * TeX as Markdown carries it. A reader that does not know formulas takes `\,`, `_`, `*`, `<` or `|`
 * for signs of its own and hands on what is left; so a formula is spelt with commands that no reader of
 * Markdown touches and that KaTeX, MathJax and pandoc all know. One sign is left to those who know formulas:
 * `\\` between the rows of a block, for which there is no other spelling that all three take.
 */
import { type Tex, texSource } from '../base/tex.ts'

export function markdownTex(tex: Tex): string {
  const source = texSource(tex)
  let out = ''
  let from = 0
  for (const found of source.matchAll(WORDS)) {
    out += lettered(source.slice(from, found.index)) + words(plainWords(found[1] ?? ''))
    from = found.index + found[0].length
  }
  out += lettered(source.slice(from))
  return closedUp(out)
}

/** `\text{…}` as `texWords` writes it, with no braces inside but escaped ones and those of its commands. */
const WORDS = /\\text\{((?:\\text[a-z]+\{\}|\\[^a-z]|[^\\{}])*)\}/g

/** The words that `texWords` was given. */
const plainWords = (inside: string): string =>
  inside
    .replace(/\\textbackslash\{\}|\\textasciicircum\{\}|\\textasciitilde\{\}/g, command => unseen[command] ?? command)
    .replace(/\\([{}$&#_%])/g, '$1')
    .replace(/[\ue000-\ue002]/g, mark => '\\^~'.charAt(mark.charCodeAt(0) - 0xe000))

/** Stand-ins while the escapes are undone, so that a backslash of the words starts none. */
const unseen: Readonly<Record<string, string>> = {
  '\\textbackslash{}': '\ue000',
  '\\textasciicircum{}': '\ue001',
  '\\textasciitilde{}': '\ue002',
}

/** Signs that mean something to Markdown, to TeX or to MathJax's text, which knows no commands. */
const signs: Readonly<Record<string, string>> = {
  '*': '{\\ast}',
  _: '\\underline{\\ \\ }',
  '<': '{\\lt}',
  '>': '{\\gt}',
  '|': '{\\vert}',
  '[': '\\lbrack ',
  ']': '\\rbrack ',
  '{': '\\lbrace ',
  '}': '\\rbrace ',
  '\\': '\\backslash ',
  '^': '{\\wedge}',
  '~': '{\\sim}',
  '`': '\\backprime ',
  '#': '{\\sharp}',
  '−': '{-}',
  '²': '{}^{2}',
  '³': '{}^{3}',
  // No command of both stands for these; the full-width forms are letters to everyone.
  $: '\\text{＄}',
  '&': '\\text{＆}',
  '%': '\\text{％}',
}

const words = (plain: string): string =>
  plain
    .split(/([*_<>|[\]{}\\^~`#−²³$&%])/u)
    .map(run => (run === '' ? '' : (signs[run] ?? `\\text{${run}}`)))
    .join('')

/** Commands of one sign by others; a thin space has none that all know, and a plain one serves. GitHub does not allow `\operatorname`. */
const lettered = (source: string): string =>
  source
    .replaceAll('\\,', '\\ ')
    .replace(/\\mathrm\{\\%\}|\\%/g, '\\text{ percent}')
    .replaceAll('\\operatorname{', '\\mathrm{')
    .replaceAll('\\|', '\\Vert ')
    .replaceAll('|', '\\vert ')

/** No space but those that TeX needs, and none after which `_` could open an emphasis. */
const closedUp = (source: string): string =>
  source
    .replace(/\s+/g, ' ')
    .replace(/(\\[A-Za-z]+) (?=[^A-Za-z ])/g, '$1')
    .replace(/(?<![\p{L}\p{N}])_(?=\S)/gu, '_ ')
    .replace(/^ +|(?<!\\) +$/g, '')
