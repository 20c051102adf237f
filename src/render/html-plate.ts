/** The title block, set on a plate, the cover that carries it, and the banner of a draft. */
import type { Sheet, TitleBlock } from '../explain/sheet.ts'
import { escapeHtml, pageText } from './escape.ts'
import { draftWords } from './imprint.ts'

export function plateHtml(block: TitleBlock, logo: string): string {
  const { title, project, location } = block
  const heading = title === '' ? project : title
  const above = [title === '' ? '' : project, location].filter(part => part !== '')
  return `<header class="plate">
${logo}<div class="name">${above.length === 0 ? '' : `<p class="project">${above.map(pageText).join(', ')}</p>`}
<h1${heading === '' ? ' class="unseen"' : ''}>${heading === '' ? 'Calculation' : pageText(heading)}</h1></div>
<dl>${[...issueOf(block), ...signedOf(block)].map(fieldHtml).join('')}</dl>
</header>`
}

type Field = readonly [name: string, value: string]

const issueOf = ({ number, revision, date, standard }: TitleBlock): readonly Field[] => {
  const written: readonly Field[] = [
    ['No.', number],
    ['Revision', revision],
    ['Date', date],
    ['Standard', standard],
  ]
  return written.filter(([, value]) => value !== '')
}

/** By and Checked stay when empty: they are signed by hand. */
const signedOf = ({ by, checked }: TitleBlock): readonly Field[] => [
  ['By', by],
  ['Checked', checked],
]

const fieldHtml = ([name, value]: Field): string =>
  `<div><dt>${name}</dt><dd${value === '' ? ' class="blank"' : ''}>${value === '' ? '<span class="unseen">not signed</span>' : pageText(value)}</dd></div>`

/** A sheet of its own: what is calculated, for which issue, from what, and who answers for it. */
export function coverHtml(sheet: Sheet, logo: string, lists: string, caution: string, mark: string): string {
  const { title, project, location } = sheet.titleBlock
  const heading = title === '' ? project : title
  return `<section class="cover" aria-label="Cover">
<header class="plate">
${logo}<div class="name">${project === '' || title === '' ? '' : `<p class="project">${pageText(project)}</p>`}
<h1${heading === '' ? ' class="unseen"' : ''}>${heading === '' ? 'Calculation' : pageText(heading)}</h1>
${location === '' ? '' : `<p class="location">${pageText(location)}</p>\n`}</div>
<dl>${issueOf(sheet.titleBlock).map(fieldHtml).join('')}</dl>
</header>
${lists}
<div class="signing">
${signatureHtml('Originated by', sheet.titleBlock.by)}
${signatureHtml('Checked by', sheet.titleBlock.checked)}
<div class="seal"><p class="label">Seal</p></div>
</div>
<p class="cover-foot"><span>${caution}</span> <span>${mark}</span></p>
</section>`
}

const signatureHtml = (label: string, name: string): string => `<div class="signature">
<p class="label">${label}</p>
<p class="signer">${name === '' ? '<span class="unseen">not named</span>' : pageText(name)}</p>
<p class="line"><span>Signature</span><span>Date</span></p>
</div>`

/** The firm's mark, as a picture that can neither run nor call for anything. */
export const logoHtml = ({ logo }: Sheet): string =>
  logo === undefined ? '' : `<img class="logo" src="${escapeHtml(logo)}" alt="Mark of the firm">\n`

export function bannerHtml(sheet: Sheet): string {
  return sheet.draft ? `<p class="draft" role="region" aria-label="Draft"><b>Draft</b> ${draftWords(sheet)}</p>` : ''
}
