/** A given block as the page shows it: what the engineer stated, as stated. */
import type { Block } from '../read/block.ts'
import type { Context } from './context.ts'
import type { Piece, Row, Table } from './sheet.ts'

const titles: Readonly<Record<string, string>> = {
  grid: 'Grid',
  levels: 'Levels',
  areas: 'Areas',
  'line-loads': 'Line loads',
  'point-loads': 'Point loads',
  construction: 'Construction',
  walls: 'Walls',
  openings: 'Openings in walls',
  forces: 'Forces',
  seismic: 'Seismic',
  wind: 'Wind',
  spectrum: 'Spectrum',
}

export function explainGiven(block: Block, context: Context): readonly Piece[] {
  const { topic, about, table, settings, options } = block
  const joint = topic === 'construction' ? ' ' : ' of '
  const title = `${titles[topic] ?? topic}${about ? `${joint}${about.text}` : ''}, as given`
  const stated = [...settings, ...options]
  const id = `given.${topic}${about ? `.${about.text}` : ''}`
  const lines = context.places([block.info])
  const pieces: Piece[] = []
  if (table) {
    const columns = table.header.map(({ name, unit }, i) => ({
      head: name.text,
      unit: unit?.text ?? '',
      align:
        i === 0 || !numeric(table.rows.map(({ cells }) => cells[i]?.text ?? ''))
          ? ('left' as const)
          : ('right' as const),
    }))
    const rows = table.rows.map(
      ({ cells }): Row => ({
        cells: cells.map(({ text }) => text),
        places: cells.map(({ span }) => span),
        governs: false,
      }),
    )
    pieces.push(given(id, title, columns, rows, lines))
  }
  if (stated.length > 0) {
    const noted = stated.some(({ comment }) => comment !== '')
    const heads = [table ? 'Setting' : 'Name', 'Value', ...(noted ? ['Note'] : [])]
    const columns = heads.map(head => ({ head, unit: '', align: 'left' as const }))
    const rows = stated.map(
      ({ name, value, comment }): Row => ({
        cells: [name.text, value.text, ...(noted ? [comment] : [])],
        places: [nowhere, value.span, ...(noted ? [nowhere] : [])],
        governs: false,
      }),
    )
    pieces.push(given(table ? `${id}.settings` : id, title, columns, rows, lines))
  }
  return pieces
}

/** A cell that repeats no value of the source. */
const nowhere = { start: 0, end: 0 }

const numeric = (cells: readonly string[]): boolean =>
  cells.every(text => text === '' || /^[-−]?\d/.test(text)) && !cells.some(text => text.includes(','))

const given = (
  id: string,
  caption: string,
  columns: Table['columns'],
  rows: readonly Row[],
  sourceLines: readonly number[],
): Table => ({
  kind: 'table',
  id,
  number: '',
  caption,
  columns,
  rows,
  formulas: [],
  sourceLines,
})
