/** Reads the one pipe table of a block. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { diagnose, part, type Text, trimmed } from './text.ts'

export interface HeaderCell {
  readonly name: Text
  /** The unit in brackets, which bare numbers of the column take. */
  readonly unit?: Text
}

export interface TableRow {
  /** One a column, in the order of the header; an empty cell has empty text. */
  readonly cells: readonly Text[]
  readonly line: Text
}

export interface Table {
  readonly header: readonly HeaderCell[]
  readonly rows: readonly TableRow[]
  readonly headerLine: Text
}

const RULE = /^\|?(?:\s*:?-+:?\s*\|)*\s*:?-+:?\s*\|?$/

export function readTable(lines: readonly Text[]): Result<Table> {
  const [headerLine, rule, ...body] = lines
  if (!headerLine || !rule || !RULE.test(rule.text))
    return bad([noRule(rule ?? headerLine ?? { text: '', span: { start: 0, end: 0 } })])
  const header = cellsOf(headerLine).map(headerCell)
  const repeated = header.filter(({ name }, i) => header.findIndex(other => other.name.text === name.text) !== i)
  const faults: Diagnostic[] = repeated.map(({ name }) =>
    diagnose('error', 'column-repeated', name.span, `column ${name.text} stands twice`, 'Keep one of them.'),
  )
  const rows = all(body.map(line => rowOf(line, header)))
  if (!rows.ok || faults.length > 0) return bad([...faults, ...(rows.ok ? [] : rows.because)])
  return good({ header, rows: rows.value, headerLine })
}

function rowOf(line: Text, header: readonly HeaderCell[]): Result<TableRow> {
  const cells = cellsOf(line)
  const extra = cells[header.length]
  if (extra)
    return bad([
      diagnose(
        'error',
        'cell-too-many',
        extra.span,
        `this row has ${cells.length} cells for ${header.length} columns`,
        'Remove the extra cell, or add its column to the head. A | within a cell is written \\|.',
      ),
    ])
  const end = { text: '', span: { start: line.span.end, end: line.span.end } }
  return good({ cells: header.map((_, i) => cells[i] ?? end), line })
}

function headerCell(cell: Text): HeaderCell {
  const found = /^(.*?)\s*\(([^()]*)\)$/s.exec(cell.text)
  const name = found?.[1] ?? cell.text
  if (found?.[2] === undefined) return { name: { text: name, span: cell.span } }
  const open = cell.text.lastIndexOf('(')
  return { name: part(cell, 0, name.length), unit: trimmed(part(cell, open + 1, cell.text.length - 1)) }
}

const cellsOf = (line: Text): readonly Text[] => cellsAsTyped(line).map(unescaped)

/** Cells between bars that are not escaped, without the space around them; the bars at both ends may be there or not. */
export function cellsAsTyped(line: Text): readonly Text[] {
  const cells: Text[] = []
  let from = line.text.startsWith('|') ? 1 : 0
  for (let i = from; i < line.text.length; i++) {
    if (line.text[i] === '\\') i++
    else if (line.text[i] === '|') {
      cells.push(trimmed(part(line, from, i)))
      from = i + 1
    }
  }
  const rest = part(line, from)
  return rest.text.trim() === '' ? cells : [...cells, trimmed(rest)]
}

const unescaped = ({ text, span }: Text): Text => ({ text: text.replaceAll('\\|', '|'), span })

const noRule = ({ span }: Text): Diagnostic =>
  diagnose(
    'error',
    'table-without-rule',
    span,
    'this table has no line of dashes under its head',
    'Put | --- | --- | under the head, one for each column.',
  )
