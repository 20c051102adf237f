/** A table of the calculation as a GFM table. */
import type { List, ListItem, PhrasingContent, RootContent, TableRow } from 'mdast'
import { linesInWords } from '../base/span.ts'
import { joinTex } from '../base/tex.ts'
import { unitOnPage } from '../base/unit.ts'
import type { Column, ColumnFormula, Row, Table } from '../explain/sheet.ts'
import { anchor, paragraph, rowOf, strong, text } from './markdown-parts.ts'
import { inlineMath } from './math-nodes.ts'

export function tableNodes({
  id,
  number,
  caption,
  columns,
  rows,
  foot,
  formulas,
  sourceLines,
}: Table): readonly RootContent[] {
  const words = [caption, linesInWords(sourceLines)].filter(part => part !== '').join(' · ')
  const above = [
    ...anchor(id),
    ...(number === '' ? [] : [strong(`Table ${number}.`)]),
    ...(words === '' ? [] : [text(number === '' ? words : ` ${words}`)]),
  ]
  const body = rows.map(row => rowNode(row, columns.length))
  return [
    ...(above.length === 0 ? [] : [paragraph(...above)]),
    {
      type: 'table',
      align: columns.map(({ align }) => align),
      children: [headNode(columns), ...body, ...(foot === undefined ? [] : [sumNode(foot, columns.length)])],
    },
    ...(formulas.length === 0 ? [] : [formulaList(formulas)]),
  ]
}

const headNode = (columns: readonly Column[]): TableRow => rowOf(columns.map(headCell))

function headCell({ head, unit }: Column): PhrasingContent[] {
  const title = typeof head === 'string' ? text(head) : inlineMath(head)
  return unit === '' ? [title] : [title, text(` (${unitOnPage(unit)})`)]
}

/** The governing row says so, since Markdown cannot shade it. */
function rowNode({ cells, governs }: Row, width: number): TableRow {
  return rowOf(
    padded(cells, width).map((cell, i) => {
      if (!governs) return [text(cell)]
      return i === 0 ? [strong(cell), text(' (governs)')] : boldCell(cell)
    }),
  )
}

const sumNode = ({ cells }: Row, width: number): TableRow => rowOf(padded(cells, width).map(boldCell))

/** An empty cell stays empty: two pairs of stars with nothing between them would print as stars. */
const boldCell = (cell: string): PhrasingContent[] => (cell.trim() === '' ? [] : [strong(cell)])

const padded = (cells: readonly string[], width: number): readonly string[] =>
  Array.from({ length: width }, (_, i) => cells[i] ?? '')

function formulaList(formulas: readonly ColumnFormula[]): List {
  const children = formulas.map(({ symbol, formula, reference }): ListItem => {
    const from = reference === '' ? [] : [text(` — ${reference}`)]
    return {
      type: 'listItem',
      spread: false,
      children: [paragraph(inlineMath(joinTex(symbol, '=', formula)), ...from)],
    }
  })
  return { type: 'list', ordered: false, spread: false, children }
}
