/**
 * Where in a block someone is writing. It goes by the text of the lines rather than by what was read of them: what is
 * being written is seldom whole.
 */
import type { Node } from 'mdast'
import { lineOf, lineText } from '../base/span.ts'
import type { Text } from '../read/text.ts'
import { isTopic, type Topic } from '../read/topics.ts'
import { isCode, type Opened, spanOf } from './opened.ts'

export type Place =
  /** On the first line of a fence, whose words before the one at the cursor are all there. */
  | { readonly kind: 'info'; readonly words: readonly string[]; readonly typed: Text }
  /** In the head of a table; `inUnit` between the brackets of a column's unit. */
  | {
      readonly kind: 'head'
      readonly inside: Inside
      readonly columns: readonly string[]
      readonly inUnit: boolean
      readonly typed: Text
    }
  | {
      readonly kind: 'cell'
      readonly inside: Inside
      readonly column: string
      readonly typed: Text
    }
  | { readonly kind: 'setting'; readonly inside: Inside; readonly name: string; readonly typed: Text }
  /** At the start of a line that may become a setting, or ask for something. */
  | { readonly kind: 'line'; readonly inside: Inside; readonly typed: Text }
  /** Behind the `{{` of a quote. */
  | { readonly kind: 'quote'; readonly typed: Text }

/** The block around the place. */
export interface Inside {
  readonly topic: Topic
  readonly about: string
  /** Its other lines, without the one at the cursor. */
  readonly others: readonly string[]
}

/** Undefined in prose, in fences of other kinds, and in comments. */
export function placeAt(document: Opened, offset: number): Place | undefined {
  const { source } = document
  const around = nodesAround(document.tree(), offset)
  const code = around.find(isCode)
  const line = lineOf(source, offset)
  const lineStart = source.lineStarts[line - 1] ?? 0
  const before = source.text.slice(lineStart, offset)
  if (!code) return inQuote(around, before, offset)
  const first = lineOf(source, spanOf(code).start)
  if (line === first) return inInfo(source.text.slice(spanOf(code).start, offset), offset)
  const [topic = '', ...about] = `${code.lang ?? ''} ${code.meta ?? ''}`.trim().split(/\s+/)
  if (!isTopic(topic) || CLOSING.test(lineText(source, line))) return undefined
  const lines = code.value.split('\n').map((text, i) => ({ text, line: first + 1 + i }))
  const inside: Inside = {
    topic,
    about: about.filter(word => !word.includes('=')).join(' '),
    others: lines.filter(each => each.line !== line).map(({ text }) => text),
  }
  const rows = lines.filter(each => each.line < line && each.text.trim().startsWith('|')).map(({ text }) => text)
  const own = before.replace(/^[\s>]*/, '')
  if (own.startsWith('|')) return inTable(inside, rows, own, lineText(source, line), offset)
  return /(?:^|\s)#/.test(before) ? undefined : inLine(inside, own, offset)
}

/** Marks that are all of a line: those that close the fence. */
const CLOSING = /^[\s>]*(?:`{3,}|~{3,})\s*$/

/** Nodes that a place is in, the innermost last; at the end of one it is still in it. */
function nodesAround(tree: Node, offset: number): readonly Node[] {
  const found: Node[] = []
  let next: Node | undefined = tree
  while (next) {
    found.push(next)
    // Every parent of an mdast tree holds its children under this name.
    const children: readonly Node[] = 'children' in next ? (next.children as readonly Node[]) : []
    next = children.findLast(child => {
      const { start, end } = spanOf(child)
      return start <= offset && offset <= end
    })
  }
  return found
}

function inQuote(around: readonly Node[], before: string, offset: number): Place | undefined {
  if (around.at(-1)?.type !== 'text') return undefined
  const found = /\{\{\s*([^{}]*)$/.exec(before)
  return found ? { kind: 'quote', typed: endingAt(found[1] ?? '', offset) } : undefined
}

function inInfo(before: string, offset: number): Place | undefined {
  const found = /^[`~]{3,}\s*(.*)$/s.exec(before)
  if (!found) return undefined
  const words = (found[1] ?? '').split(/\s+/)
  const typed = words.at(-1) ?? ''
  return { kind: 'info', words: words.slice(0, -1), typed: endingAt(typed, offset) }
}

function inTable(
  inside: Inside,
  rows: readonly string[],
  own: string,
  whole: string,
  offset: number,
): Place | undefined {
  const typed = endingAt((cellsOf(own).at(-1) ?? '').trimStart(), offset)
  const [head] = rows
  if (head === undefined) {
    const columns = cellsOf(whole).map(columnName)
    const unit = /^.*\(([^()]*)$/s.exec(typed.text)?.[1]
    return {
      kind: 'head',
      inside,
      columns,
      inUnit: unit !== undefined,
      typed: unit === undefined ? typed : endingAt(unit, offset),
    }
  }
  if (rows.length === 1) return undefined
  const header = cellsOf(head).map(columnName)
  const column = header[cellsOf(own).length - 1]
  return column === undefined ? undefined : { kind: 'cell', inside, column, typed }
}

/** Texts between bars that are not escaped, from the first bar on. */
const cellsOf = (line: string): readonly string[] => line.replace(/^[^|]*\|/, '').split(/(?<!\\)\|/)

const columnName = (cell: string): string => cell.replace(/\([^()]*\)?\s*$/, '').trim()

function inLine(inside: Inside, own: string, offset: number): Place {
  const setting = /^([\p{L}][\p{L}\p{N}_' -]*?)\s*:\s+(.*)$/su.exec(own)
  if (setting && inside.topic !== 'equations')
    return { kind: 'setting', inside, name: setting[1] ?? '', typed: endingAt(setting[2] ?? '', offset) }
  return { kind: 'line', inside, typed: endingAt(own, offset) }
}

const endingAt = (text: string, offset: number): Text => ({ text, span: { start: offset - text.length, end: offset } })
