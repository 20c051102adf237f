/** Title block, draft banner, summary of checks, contents and revisions as Markdown. */
import type { ListItem, RootContent } from 'mdast'
import type { ContentsEntry, Preface, Revision, Sheet, Table, TitleBlock } from '../explain/sheet.ts'
import { draftWords } from './imprint.ts'
import { checksNode } from './markdown-check.ts'
import { heading, linkTo, paragraph, strong, text } from './markdown-parts.ts'
import { tableNodes } from './markdown-table.ts'

export function titleNodes(sheet: Sheet): readonly RootContent[] {
  const { titleBlock, draft } = sheet
  const { title, project } = titleBlock
  const fields = fieldsOf(titleBlock)
  const banner: RootContent = {
    type: 'blockquote',
    children: [paragraph(strong('Draft'), text(`: ${draftWords(sheet)}`))],
  }
  return [
    heading(title || project || 'Calculation', 1),
    ...(fields === '' ? [] : [paragraph(text(fields))]),
    ...(draft ? [banner] : []),
  ]
}

function fieldsOf(block: TitleBlock): string {
  const fields: readonly (readonly [string, string])[] = [
    ['Project', block.title === '' ? '' : block.project],
    ['Location', block.location],
    ['No.', block.number],
    ['Revision', block.revision],
    ['Date', block.date],
    ['Standard', block.standard],
    ['By', block.by],
    ['Checked', block.checked],
  ]
  return fields
    .filter(([, value]) => value !== '')
    .map(([name, value]) => `${name} ${value}`)
    .join(' · ')
}

export function prefaceNodes({ checks, contents, criteria, revisions }: Preface): readonly RootContent[] {
  return [
    ...(criteria === undefined ? [] : tableNodes(criteria)),
    ...(checks.length === 0
      ? []
      : [
          paragraph(strong('Checks, the worst first')),
          checksNode(
            checks.map(({ check }) => check),
            check => checks.find(each => each.check === check)?.place,
          ),
        ]),
    ...(contents.length === 0 ? [] : [paragraph(strong('Contents')), contentsList(contents)]),
    ...(revisions.length === 0 ? [] : [paragraph(strong('Revisions')), ...tableNodes(revisionTable(revisions))]),
  ]
}

const list = (children: readonly ListItem[]): RootContent => ({
  type: 'list',
  ordered: false,
  spread: false,
  children: [...children],
})

const item = (...children: Parameters<typeof paragraph>): ListItem => ({
  type: 'listItem',
  spread: false,
  children: [paragraph(...children)],
})

/** Sections, each with its parts below it. */
function contentsList(contents: readonly ContentsEntry[]): RootContent {
  const items: ListItem[] = []
  for (const entry of contents.filter(({ depth }) => depth <= 1)) {
    const words = linkTo(entry.id, `${entry.number} ${entry.text}`.trim())
    const last = items.at(-1)
    if (entry.depth === 0 || !last) items.push(item(words))
    else {
      const below = last.children[1]
      if (below?.type === 'list') below.children.push(item(words))
      else last.children.push({ type: 'list', ordered: false, spread: false, children: [item(words)] })
    }
  }
  return list(items)
}

const revisionTable = (revisions: readonly Revision[]): Table => ({
  kind: 'table',
  id: '',
  number: '',
  caption: '',
  columns: ['Rev.', 'Date', 'By', 'Checked', 'What changed'].map(head => ({ head, unit: '', align: 'left' as const })),
  rows: revisions.toReversed().map(({ revision, date, by, checked, note }) => ({
    cells: [revision, date, by, checked, note],
    governs: false,
  })),
  formulas: [],
  sourceLines: [],
})
