/**
 * Rough widths, for choosing a layout without a browser at hand.
 *
 * A page cannot measure itself without scripts. These estimates only decide
 * whether a formula or a table is set smaller on paper, never what is printed.
 */
import { type Tex, texSource } from '../base/tex.ts'
import type { Table } from '../explain/sheet.ts'

interface Reader {
  readonly tokens: readonly string[]
  at: number
}

/** Width of the widest stretch of a formula that cannot be broken over lines, in em of its type. */
export function unbreakableWidth(tex: Tex): number {
  const reader: Reader = {
    tokens: texSource(tex).match(/\\[a-zA-Z]+|\\?[\s\S]/g) ?? [],
    at: 0,
  }
  let widest = 0
  let stretch = 0
  // Between \left and \right KaTeX keeps a line together.
  let depth = 0
  while (reader.at < reader.tokens.length) {
    const token = reader.tokens[reader.at] ?? ''
    stretch += itemWidth(reader)
    widest = Math.max(widest, stretch)
    if (token === '\\left') depth++
    else if (token === '\\right') depth--
    else if (depth === 0 && operators.has(token)) stretch = 0
  }
  return widest
}

/** KaTeX lets a line break after these. */
const operators: ReadonlySet<string> = new Set([
  '+',
  '-',
  '=',
  '<',
  '>',
  '\\times',
  '\\cdot',
  '\\le',
  '\\ge',
  '\\approx',
  '\\pm',
  '\\div',
])

const commandWidth: ReadonlyMap<string, number> = new Map([
  ['\\,', 0.17],
  ['\\!', -0.17],
  ['\\:', 0.22],
  ['\\;', 0.28],
  ['\\ ', 0.3],
  ['\\quad', 1],
  ['\\qquad', 2],
  ['\\left', 0.1],
  ['\\right', 0.1],
  ['\\sum', 1.6],
  ['\\int', 1.1],
  ['\\text', 0],
  ['\\mathrm', 0],
  ['\\mathbf', 0],
  ['\\mathit', 0],
  ['\\operatorname', 0.1],
  ['\\bar', 0],
  ['\\hat', 0],
  ['\\overline', 0],
])

/** Width of the next item, moving past it. */
function itemWidth(reader: Reader): number {
  const token = reader.tokens[reader.at++] ?? ''
  if (token === '{') return untilClose(reader)
  if (token === '^' || token === '_') return 0.7 * itemWidth(reader)
  if (/^\\[dt]?frac$/.test(token)) return Math.max(itemWidth(reader), itemWidth(reader)) + 0.25
  if (token === '\\sqrt') return itemWidth(reader) + 0.9
  if (operators.has(token)) return 1.15
  return commandWidth.get(token) ?? plainWidth(token)
}

function untilClose(reader: Reader): number {
  let width = 0
  while (reader.at < reader.tokens.length && reader.tokens[reader.at] !== '}') width += itemWidth(reader)
  reader.at++
  return width
}

function plainWidth(token: string): number {
  if (/^[\s{}&]$/.test(token)) return 0
  return /^[.,;:'|()[\]]$/.test(token) ? 0.36 : 0.47
}

/** Words in a cell go over several lines rather than make the table wider than this, in characters. */
const BROKEN = 36

/** Width of a table in em of its type, with the space between its columns. */
export function tableWidth({ columns, rows, foot }: Table): number {
  const all = foot === undefined ? rows : [...rows, foot]
  return columns.reduce((sum, { head, unit, align }, i) => {
    const cells = all.map(({ cells }) => (align === 'right' ? (cells[i] ?? '').length : lengthOfWords(cells[i] ?? '')))
    const title = typeof head === 'string' ? head.length * 0.55 : unbreakableWidth(head) * 1.05
    const longest = cells.reduce((most, length) => Math.max(most, length), 0)
    return sum + Math.max(longest * 0.5, title, unit.length * 0.4) + 1.3
  }, 0)
}

const lengthOfWords = (text: string): number =>
  text.length <= BROKEN ? text.length : Math.max(BROKEN, ...text.split(/\s+/).map(word => word.length))

/** The factor that makes `width` fit into `room`: at most 1, and never below `least`, which can still be read. */
export const fitFactor = (width: number, room: number, least: number): number =>
  Math.max(least, Math.min(1, room / width))
