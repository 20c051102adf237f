/** The sheet as a Markdown tree: readable as text, and drawn by any viewer that knows GFM and mathematics. */
import type { Heading, ListItem, Paragraph, RootContent } from 'mdast'
import type { Source } from '../base/span.ts'
import { linesInWords } from '../base/span.ts'
import { joinTex, texSource } from '../base/tex.ts'
import type { Check, Equation, Figure, Piece, Register, Sheet } from '../explain/sheet.ts'
import { CAUTION, markOf } from './imprint.ts'
import { faultNodes } from './markdown-fault.ts'
import { anchor, heading, paragraph, plain, strong, text } from './markdown-parts.ts'
import { prefaceNodes, titleNodes } from './markdown-preface.ts'
import { tableNodes } from './markdown-table.ts'
import { mathBlock } from './math-nodes.ts'

export interface MarkdownSetting {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Depth of a heading inside a working. */
  readonly level: Heading['depth']
  /** Where the picture of a figure is put, relative to the document. */
  readonly figureFile: (figure: Figure) => string
}

export function pieceNodes(piece: Piece, setting: MarkdownSetting): readonly RootContent[] {
  switch (piece.kind) {
    case 'equation':
      return equationNodes(piece)
    case 'table':
      return [...anchor(piece.id), ...tableNodes(piece)]
    case 'figure':
      return figureNodes(piece, setting)
    case 'check':
      return [checkNode(piece)]
    case 'note':
      return [paragraph(text(piece.text))]
    case 'heading':
      return [...anchor(piece.id), heading(piece.text, setting.level)]
    case 'register':
      return registerNodes(piece, setting)
    case 'fault':
      return faultNodes(piece, setting.source)
  }
}

/** The whole document: what stands before it, the body as given, and the closing lines. */
export function documentNodes(sheet: Sheet, body: readonly RootContent[]): readonly RootContent[] {
  return [
    ...titleNodes(sheet),
    ...prefaceNodes(sheet.preface),
    ...body,
    { type: 'thematicBreak' },
    paragraph(text(`${CAUTION} ${markOf(sheet)}.`)),
  ]
}

function equationNodes({
  id,
  number,
  symbol,
  lines,
  result,
  reference,
  assumes,
  sourceLines,
}: Equation): readonly RootContent[] {
  const rows = [...lines, result].map((tex, i) => texSource(joinTex(i === 0 ? symbol : '', ' &= ', tex)).trim())
  const origin = [
    reference,
    assumes.length === 0 ? '' : `assumes ${assumes.join('; ')}`,
    linesInWords(sourceLines),
  ].filter(part => part !== '')
  const name = number === '' ? [] : [strong(`Equation ${number}`)]
  const below = [...name, ...(origin.length === 0 ? [] : [text(`${name.length > 0 ? ': ' : ''}${origin.join(' · ')}`)])]
  return [
    ...anchor(id),
    mathBlock(`\\begin{aligned}\n${rows.join(' \\\\\n')}\n\\end{aligned}`),
    ...(below.length === 0 ? [] : [paragraph(...below)]),
  ]
}

function figureNodes(figure: Figure, { figureFile }: MarkdownSetting): readonly RootContent[] {
  const { id, number, caption, alternative } = figure
  const name = number === '' ? [] : [strong(`Figure ${number}`), text(' ')]
  return [
    ...anchor(id),
    paragraph({ type: 'image', url: figureFile(figure), alt: plain(alternative) }),
    paragraph(...name, text(caption)),
  ]
}

function checkNode({ id, what, demand, capacity, ratioPrinted, ok, reference, sourceLines }: Check): Paragraph {
  const origin = [reference, linesInWords(sourceLines)].filter(part => part !== '').join(' · ')
  return paragraph(
    ...anchor(id),
    strong(what),
    text(`: ${demand} ${ok ? '≤' : '>'} ${capacity}, ratio ${ratioPrinted}, `),
    strong(ok ? 'OK' : 'NG'),
    ...(origin === '' ? [] : [text(` (${origin})`)]),
  )
}

function registerNodes({ id, title, items }: Register, { level }: MarkdownSetting): readonly RootContent[] {
  const list = items.map(
    (item): ListItem => ({
      type: 'listItem',
      spread: false,
      children: [paragraph(text(item.detail === '' ? item.text : `${item.text} (${item.detail})`))],
    }),
  )
  return [
    ...anchor(id),
    ...(title === '' ? [] : [heading(title, level)]),
    { type: 'list', ordered: true, start: 1, spread: false, children: list },
  ]
}
