/** Each piece of the calculation as HTML. Pieces only set; they compute nothing that is printed. */
import type { Figure, Heading, Note, Piece, Register } from '../explain/sheet.ts'
import { escapeHtml, pageText } from './escape.ts'
import { checkHtml } from './html-check.ts'
import { equationHtml } from './html-equation.ts'
import { faultHtml } from './html-fault.ts'
import { idAttribute, type Setting, titleHtml } from './html-parts.ts'
import { marksInTable, tableHtml } from './html-table.ts'

/** A piece that the build before had too is not set anew. */
export function pieceHtml(piece: Piece, setting: Setting): string {
  const { typesetter, medium, level } = setting
  const anew = () => setPiece(piece, setting)
  switch (piece.kind) {
    case 'equation':
      return typesetter.kept(piece, medium, anew)
    case 'table':
      return typesetter.kept(piece, `${medium} ${marksInTable(piece, setting.marks)}`, anew)
    case 'register':
      return typesetter.kept(piece, String(level), anew)
    case 'figure':
      return typesetter.kept(piece, '', anew)
    case 'check':
    case 'note':
    case 'heading':
    case 'fault':
      return anew()
  }
}

function setPiece(piece: Piece, setting: Setting): string {
  switch (piece.kind) {
    case 'equation':
      return equationHtml(piece, setting)
    case 'table':
      return tableHtml(piece, setting)
    case 'figure':
      return figureHtml(piece)
    case 'check':
      return checkHtml(piece, setting)
    case 'note':
      return noteHtml(piece)
    case 'heading':
      return headingHtml(piece, setting)
    case 'register':
      return registerHtml(piece, setting)
    case 'fault':
      return faultHtml(piece, setting)
  }
}

const figureHtml = ({
  id,
  number,
  caption,
  svg,
  alternative,
}: Figure): string => `<figure class="plan"${idAttribute(id)}>
<div class="drawing" tabindex="0" role="img" aria-label="${escapeHtml(alternative)}">${svg}</div>
<figcaption>${titleHtml('Figure', number)}${pageText(caption)}</figcaption>
</figure>`

const noteHtml = ({ text }: Note): string => `<p class="note">${pageText(text)}</p>`

function headingHtml({ id, text }: Heading, { level }: Setting): string {
  const number = /^\d+(?:\.\d+)*(?=\s)/.exec(text)?.[0] ?? ''
  const marked = number === '' ? '' : `<span class="hn">${number}</span>`
  return `<h${level} class="part"${idAttribute(id)}>${marked}${pageText(text.slice(number.length))}</h${level}>`
}

function registerHtml({ id, title, items }: Register, { level }: Setting): string {
  const list = items.map(
    ({ text, detail }) =>
      `<li>${pageText(text)}${detail === '' ? '' : ` <span class="detail">${pageText(detail)}</span>`}</li>`,
  )
  return `<section class="register"${idAttribute(id)}>
${title === '' ? '' : `<h${level} class="part">${pageText(title)}</h${level}>\n`}<ol>
${list.join('\n')}
</ol>
</section>`
}
