/** What stands between the title block and the calculation: how the checks came out, the contents, the revisions. */
import type { ContentsEntry, Preface, Revision, SummaryCheck } from '../explain/sheet.ts'
import { escapeHtml, fragment, pageText } from './escape.ts'
import { checkHtml } from './html-check.ts'
import type { Setting } from './html-parts.ts'
import { tableHtml } from './html-table.ts'

/** Sections and their parts; what lies deeper is found from there. */
const DEEPEST = 1

export function summaryHtml({ checks }: Preface, setting: Setting): string {
  if (checks.length === 0) return ''
  const failed = checks.filter(({ check }) => !check.ok).length
  const verdict = failed === 0 ? `all ${checks.length} OK` : `${failed} of ${checks.length} NG`
  return `<section class="summary" aria-labelledby="summary-of-checks">
<h2 class="front" id="summary-of-checks">Checks <span class="tally">${checks.length === 1 && failed === 0 ? 'OK' : verdict}, the worst first</span></h2>
<ul class="checks">
${checks.map(check => summaryCheckHtml(check, setting)).join('\n')}
</ul>
</section>`
}

/** A check whose place is in the calculation leads there. */
const summaryCheckHtml = ({ check, place }: SummaryCheck, setting: Setting): string =>
  checkHtml(place === undefined ? check : { ...check, id: '' }, setting, place)

export function contentsHtml({ contents }: Preface): string {
  const shown = contents.filter(({ depth }) => depth <= DEEPEST)
  if (shown.length === 0) return ''
  return `<nav class="contents" aria-labelledby="table-of-contents">
<h2 class="front" id="table-of-contents">Contents</h2>
<ol>
${shown.map(entryHtml).join('\n')}
</ol>
</nav>`
}

/** `folio` takes the number of the sheet on paper. */
const entryHtml = ({ id, number, text, depth }: ContentsEntry): string =>
  `<li class="${depth === 0 ? 'section' : 'part-of'}"><a href="${escapeHtml(fragment(id))}"><span class="no">${escapeHtml(number)}</span> <span class="words">${pageText(text)}</span></a><span class="folio" data-for="${escapeHtml(id)}"></span></li>`

export function revisionsHtml({ revisions }: Preface): string {
  if (revisions.length === 0) return ''
  return `<section class="revisions" aria-labelledby="table-of-revisions">
<h2 class="front" id="table-of-revisions">Revisions</h2>
<div class="scroll"><table>
<thead><tr>${['Rev.', 'Date', 'By', 'Checked', 'What changed'].map(head => `<th scope="col">${head}</th>`).join('')}</tr></thead>
<tbody>
${revisions.toReversed().map(revisionHtml).join('\n')}
</tbody>
</table></div>
</section>`
}

const revisionHtml = ({ revision, date, by, checked, note }: Revision): string =>
  `<tr><th scope="row">${pageText(revision)}</th>${[date, by, checked, note].map(text => `<td>${pageText(text)}</td>`).join('')}</tr>`

export const criteriaHtml = ({ criteria }: Preface, setting: Setting): string =>
  criteria === undefined ? '' : `<section class="criteria">${tableHtml(criteria, setting)}</section>`
