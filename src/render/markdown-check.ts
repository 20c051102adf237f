/** Checks as a table: what is asked, what there is, and the verdict in words. */
import type { Table, TableRow } from 'mdast'
import type { Check } from '../explain/sheet.ts'
import { linesInWords } from './body.ts'
import { anchor, rowOf, strong, text } from './markdown-parts.ts'

const heads = ['Check', 'Demand', 'Capacity', 'Ratio', 'Verdict', 'From'] as const

export function checksNode(checks: readonly Check[]): Table {
  return {
    type: 'table',
    align: ['left', 'right', 'right', 'right', 'left', 'left'],
    children: [rowOf(heads.map(head => [text(head)])), ...checks.map(checkRow)],
  }
}

function checkRow({ id, what, demand, capacity, ratioPrinted, ok, reference, sourceLines }: Check): TableRow {
  const origin = [reference, linesInWords(sourceLines)].filter(part => part !== '').join(' · ')
  return rowOf([
    [...anchor(id), text(what)],
    [text(demand)],
    [text(`${ok ? '≤' : '>'} ${capacity}`)],
    [text(ratioPrinted)],
    ok ? [text('OK')] : [strong('NG')],
    [text(origin)],
  ])
}
