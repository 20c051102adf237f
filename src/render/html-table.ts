/** A table of the calculation, with the formulas of its columns below it. */

import { joinTex } from '../base/tex.ts'
import { unitOnPage } from '../base/unit.ts'
import type { Column, ColumnFormula, Row, Table } from '../explain/sheet.ts'
import { escapeHtml, pageText } from './escape.ts'
import { givenText, type Marks, markedText } from './html-marks.ts'
import { idAttribute, inlineMath, type Setting, sourceHtml, titleHtml } from './html-parts.ts'
import { fitFactor, tableWidth } from './measure.ts'

/** Room across a sheet of paper, in em of the table's type, and across a phone. */
const ROOM_PAPER = 54
const ROOM_PHONE = 26

/** Smallest type of a table on paper, as a share of its usual size: hard to read, but nothing is cut off. */
const LEAST = 0.35

/** A table of so few rows is kept on one sheet. */
const SHORT = 12

export function tableHtml(table: Table, setting: Setting): string {
  const { id, number, caption, columns, rows, foot, formulas, sourceLines } = table
  const width = tableWidth(table)
  const fit = fitFactor(width, ROOM_PAPER, LEAST)
  // A box that may scroll sideways must be reached by keyboard; one that fits would only be a stop on the way.
  const reach =
    width > ROOM_PHONE ? ` tabindex="0" role="region" aria-label="${escapeHtml(`Table ${number}`.trim())}"` : ''
  return `<div class="tbl${rows.length <= SHORT ? ' short' : ''}"${idAttribute(id)}${fit < 1 ? ` style="--fit:${fit.toFixed(2)}"` : ''}>
<div class="scroll"${reach}><table>
<caption><span>${titleHtml('Table', number)}${pageText(caption)} ${sourceHtml(sourceLines)}</span></caption>
<thead><tr>${columns.map(column => headHtml(column, setting)).join('')}</tr></thead>
<tbody>
${rows.map(row => rowHtml(row, columns, setting)).join('\n')}
</tbody>${foot === undefined ? '' : `\n<tfoot>${rowHtml(foot, columns, setting)}</tfoot>`}
</table></div>
${formulas.length === 0 ? '' : `<ul class="how">${formulas.map(formula => formulaHtml(formula, setting)).join('')}</ul>\n`}</div>`
}

/** Which numbers of a table bear marks, in short. */
export const marksInTable = ({ rows, foot }: Table, marks: Marks): string =>
  [...rows, ...(foot ? [foot] : [])]
    .map(({ cells, ids = [], places = [] }) => {
      const printed = ids.map(id => (marks.has(id) ? '1' : '0')).join('')
      const repeated = places.map((place, i) =>
        cells[i] === ''
          ? ''
          : marks
              .within(place)
              .map(({ id }) => id)
              .join(),
      )
      return printed + repeated.join('|')
    })
    .join('/')

function headHtml({ head, unit, align }: Column, setting: Setting): string {
  const title = typeof head === 'string' ? pageText(head) : inlineMath(head, setting)
  const below = unit === '' ? '' : `<span class="u">${pageText(unitOnPage(unit))}</span>`
  return `<th scope="col"${side(align)}>${title}${below}</th>`
}

const side = (align: Column['align']): string => (align === 'right' ? ' class="r"' : '')

function rowHtml({ cells, ids, places, governs }: Row, columns: readonly Column[], { marks }: Setting): string {
  const set = columns.map(({ align }, i) => {
    const cell = cells[i] ?? ''
    const place = places?.[i]
    const text = place ? givenText(cell, place, marks) : markedText(cell, ids?.[i], marks)
    if (i > 0) return `<td${side(align)}>${text}</td>`
    return `<th scope="row"${side(align)}>${text}${governs ? ' <span class="mark">governs</span>' : ''}</th>`
  })
  return `<tr${governs ? ' class="governs"' : ''}>${set.join('')}</tr>`
}

function formulaHtml({ symbol, formula, reference }: ColumnFormula, setting: Setting): string {
  const from = reference === '' ? '' : `<span class="ref">${pageText(reference)}</span>`
  return `<li>${inlineMath(joinTex(symbol, '=', formula), setting)}${from}</li>`
}
