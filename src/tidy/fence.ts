/** The lines of one fence of ours, each in its canonical form. */
import { parseExpr } from '../base/parse.ts'
import { readEquation } from '../model/equations.ts'
import { isLimit } from '../model/limits.ts'
import { type Block, readBlock } from '../read/block.ts'
import { part, type Text, trimmed } from '../read/text.ts'
import { joinedLines, type Piece } from './remarks.ts'
import { tidyTable } from './table.ts'

/**
 * @param info what stands behind the marks of the first line
 * @param content the lines within, each with its place
 * @returns as many lines; what the reader could not take is left as it was typed
 */
export function tidyContent(info: Text, content: readonly Text[]): readonly string[] {
  const block = readBlock(info, content)
  const rows = content.filter(isRow)
  // A table that was not taken whole, or that has no columns, is not set in columns.
  const { header = [], rows: taken = [] } = block.table ?? {}
  const whole = header.length > 0 && rows.length === taken.length + 2
  const tidied = whole ? tidyTable(rows.map(trimmed)) : rows.map(({ text }) => text.trimEnd())
  const settings = new Map(block.settings.map(setting => [setting.name.span.start, setting]))
  const lines = new Map(block.lines.map(line => [line.span.start, line]))
  let row = 0
  return joinedLines(
    content.map((raw): Piece => {
      if (isRow(raw)) return { kind: 'whole', text: tidied[row++] ?? raw.text }
      const line = trimmed(raw)
      if (line.text.startsWith('#'))
        return { kind: 'comment', text: line.text, indent: line.span.start - raw.span.start }
      // Without its indent a line of marks would close the fence.
      if (/^(?:```|~~~)/.test(line.text)) return { kind: 'whole', text: raw.text }
      const setting = settings.get(line.span.start)
      if (setting) {
        const { name, value } = setting
        const comment = restOf(line, value.span.end)
        return { kind: 'line', text: value.text === '' ? `${name.text}:` : `${name.text}: ${value.text}`, comment }
      }
      const plain = lines.get(line.span.start)
      if (plain) return { kind: 'line', text: canonical(plain, block), comment: restOf(line, plain.span.end) }
      return { kind: 'whole', text: raw.text.trimEnd() }
    }),
  )
}

const isRow = ({ text }: Text): boolean => text.trimStart().startsWith('|')

/** What stands behind a place of a line. */
const restOf = (line: Text, end: number): string => part(line, end - line.span.start).text.trim()

/** An equation or a check with its signs set apart; any other line as typed. */
function canonical(line: Text, { topic }: Block): string {
  if (topic !== 'equations') return line.text
  return (isLimit(line) ? limitForm(line) : equationForm(line)) ?? line.text
}

/** Undefined for what does not read as `demand <= capacity`. */
function limitForm({ text }: Text): string | undefined {
  const [, left = '', sign = '', right = ''] = /^([^<>≤≥]*?)\s*(<=|≤)\s*([^<>≤≥]*)$/s.exec(text) ?? []
  return parseExpr(left).ok && parseExpr(right).ok ? `${left} ${sign} ${right}` : undefined
}

/** Undefined for what does not read as `name = expression -> unit`. The expression stays as typed. */
function equationForm(line: Text): string | undefined {
  if (!readEquation(line).ok) return undefined
  const sign = line.text.indexOf('=')
  const arrow = line.text.indexOf('->', sign)
  const name = line.text.slice(0, sign).trim()
  const body = line.text.slice(sign + 1, arrow === -1 ? undefined : arrow).trim()
  return arrow === -1 ? `${name} = ${body}` : `${name} = ${body} -> ${line.text.slice(arrow + 2).trim()}`
}
