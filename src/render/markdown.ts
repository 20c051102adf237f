/** The sheet as a Markdown tree: readable as text, and drawn by any viewer that knows GFM and mathematics. */
import type { Heading, ListItem, RootContent } from 'mdast'
import type { Source } from '../base/span.ts'
import { linesInWords } from '../base/span.ts'
import { joinTex } from '../base/tex.ts'
import type { Check, Equation, Figure, Piece, Register, Sheet } from '../explain/sheet.ts'
import { CAUTION, markOf } from './imprint.ts'
import { checksNode } from './markdown-check.ts'
import { faultNodes } from './markdown-fault.ts'
import { anchor, paragraph, plain, strong, text } from './markdown-parts.ts'
import { prefaceNodes, titleNodes } from './markdown-preface.ts'
import { tableNodes } from './markdown-table.ts'
import { mathBlock } from './math-nodes.ts'
import { markdownTex } from './math-source.ts'

export interface MarkdownSetting {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Depth of a heading inside a working. */
  readonly level: Heading['depth']
  /** Where the drawing of a figure is put, relative to the document; without it the drawing itself is put in. */
  readonly figureFile?: (figure: Figure) => string
}

/** Pieces in order; checks that follow each other share a table. */
export function piecesNodes(pieces: readonly Piece[], setting: MarkdownSetting): readonly RootContent[] {
  const out: RootContent[] = []
  let checks: Check[] = []
  const closeChecks = () => {
    if (checks.length > 0) out.push(checksNode(checks))
    checks = []
  }
  for (const piece of pieces) {
    if (piece.kind === 'check') {
      checks.push(piece)
      continue
    }
    closeChecks()
    out.push(...pieceNodes(piece, setting))
  }
  closeChecks()
  return out
}

export function pieceNodes(piece: Piece, setting: MarkdownSetting): readonly RootContent[] {
  switch (piece.kind) {
    case 'equation':
      return equationNodes(piece)
    case 'table':
      return tableNodes(piece)
    case 'figure':
      return figureNodes(piece, setting)
    case 'check':
      return [checksNode([piece])]
    case 'note':
      return [paragraph(text(piece.text))]
    case 'heading':
      return titledNodes(piece.id, piece.text, setting.level)
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

/** A link leads to the line above the formula, so that the formula is in view. */
function equationNodes(equation: Equation): readonly RootContent[] {
  const { id, number, symbol, lines, result, reference, assumes, sourceLines } = equation
  const rows = [...lines, result].map((tex, i) => markdownTex(joinTex(i === 0 ? symbol : '', ' &= ', tex)))
  const origin = [
    reference,
    assumes.length === 0 ? '' : `assumes ${assumes.join('; ')}`,
    linesInWords(sourceLines),
  ].filter(part => part !== '')
  const name = number === '' ? [] : [strong(`Equation ${number}.`)]
  const from = origin.length === 0 ? [] : [text(`${name.length > 0 ? ' ' : ''}${origin.join(' · ')}`)]
  const above = [...anchor(id), ...name, ...from]
  return [
    ...(above.length === 0 ? [] : [paragraph(...above)]),
    mathBlock(`\\begin{aligned}\n${rows.join(' \\\\\n')}\n\\end{aligned}`),
  ]
}

function figureNodes(figure: Figure, { figureFile }: MarkdownSetting): readonly RootContent[] {
  const { id, number, caption, alternative, svg } = figure
  const name = number === '' ? [] : [strong(`Figure ${number}.`), text(' ')]
  const title = number === '' && caption === '' ? [] : [...name, text(caption)]
  if (figureFile === undefined)
    return [
      { type: 'html', value: svg },
      ...(id === '' && title.length === 0 ? [] : [paragraph(...anchor(id), ...title)]),
    ]
  return [
    paragraph(...anchor(id), { type: 'image', url: figureFile(figure), alt: plain(alternative) }),
    ...(title.length === 0 ? [] : [paragraph(...title)]),
  ]
}

/** A heading that links lead to; the anchor alone where it has no words. */
const titledNodes = (id: string, title: string, depth: Heading['depth']): readonly RootContent[] =>
  title === ''
    ? [paragraph(...anchor(id))].filter(({ children }) => children.length > 0)
    : [{ type: 'heading', depth, children: [...anchor(id), text(plain(title))] }]

function registerNodes({ id, title, items }: Register, { level }: MarkdownSetting): readonly RootContent[] {
  const list = items.map(
    (item): ListItem => ({
      type: 'listItem',
      spread: false,
      children: [paragraph(text(item.detail === '' ? item.text : `${item.text} (${item.detail})`))],
    }),
  )
  return [...titledNodes(id, title, level), { type: 'list', ordered: true, start: 1, spread: false, children: list }]
}
