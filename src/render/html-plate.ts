/** The title block, set on a plate, and the banner of a draft above it. */
import type { Sheet, TitleBlock } from '../explain/sheet.ts'
import { pageText } from './escape.ts'
import { draftWords } from './imprint.ts'

export function plateHtml(block: TitleBlock): string {
  const { title, project } = block
  const heading = title === '' ? project : title
  return `<header class="plate">
<div class="name">${title === '' || project === '' ? '' : `<p class="project">${pageText(project)}</p>`}
<h1${heading === '' ? ' class="unseen"' : ''}>${heading === '' ? 'Calculation' : pageText(heading)}</h1></div>
<dl>${fieldsOf(block).map(fieldHtml).join('')}</dl>
</header>`
}

/** By and Checked stay on the plate when empty: they are signed by hand. */
function fieldsOf({
  number,
  revision,
  date,
  standard,
  by,
  checked,
}: TitleBlock): readonly (readonly [string, string])[] {
  const written: readonly (readonly [string, string])[] = [
    ['No.', number],
    ['Revision', revision],
    ['Date', date],
    ['Standard', standard],
  ]
  return [...written.filter(([, value]) => value !== ''), ['By', by], ['Checked', checked]]
}

const fieldHtml = ([name, value]: readonly [string, string]): string =>
  `<div><dt>${name}</dt><dd${value === '' ? ' class="blank"' : ''}>${value === '' ? '<span class="unseen">not signed</span>' : pageText(value)}</dd></div>`

export function bannerHtml(sheet: Sheet): string {
  return sheet.draft ? `<p class="draft" role="note"><b>Draft</b> ${draftWords(sheet)}</p>` : ''
}
