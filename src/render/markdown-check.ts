/** Checks as a table: what is asked, what there is, and the verdict in words. */
import type { PhrasingContent, Table, TableRow } from 'mdast'
import { linesInWords } from '../base/span.ts'
import type { Check } from '../explain/sheet.ts'
import { anchor, linkTo, rowOf, strong, text } from './markdown-parts.ts'

const heads = ['Check', 'Demand', 'Capacity', 'Ratio', 'Verdict', 'From'] as const

/** @param placeOf the anchor of the step that works a check, where the checks are told of elsewhere */
export function checksNode(checks: readonly Check[], placeOf?: (check: Check) => string | undefined): Table {
  return {
    type: 'table',
    align: ['left', 'right', 'right', 'right', 'left', 'left'],
    children: [
      rowOf(heads.map(head => [text(head)])),
      ...checks.map(check => checkRow(check, nameOf(check, placeOf?.(check)))),
    ],
  }
}

const nameOf = ({ id, what }: Check, place: string | undefined): readonly PhrasingContent[] =>
  place === undefined ? [...anchor(id), text(what)] : [linkTo(place, what)]

function checkRow(
  { demand, capacity, ratioPrinted, ok, reference, sourceLines }: Check,
  name: readonly PhrasingContent[],
): TableRow {
  const origin = [reference, linesInWords(sourceLines)].filter(part => part !== '').join(' · ')
  return rowOf([
    name,
    [text(demand)],
    [text(`${ok ? '≤' : '>'} ${capacity}`)],
    [text(ratioPrinted)],
    ok ? [text('OK')] : [strong('NG')],
    [text(origin)],
  ])
}
