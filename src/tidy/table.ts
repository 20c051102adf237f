/** A pipe table with its bars below each other. */
import { cellsAsTyped } from '../read/table.ts'
import type { Text } from '../read/text.ts'
import { fillOf, widthOf } from './width.ts'

type Side = 'left' | 'right' | 'middle'

/** How a column is set, and the colons that say so in the line of dashes. */
interface Column {
  readonly width: number
  readonly opens: boolean
  readonly closes: boolean
}

/**
 * @param lines head, line of dashes and rows of a table that the document's reader took without a fault
 * @returns as many lines; a row that leaves out its last cells gets them empty
 */
export function tidyTable([head, rule, ...body]: readonly Text[]): readonly string[] {
  if (!head || !rule) return []
  const names = cellsAsTyped(head).map(({ text }) => spacedUnit(text))
  const marks = cellsAsTyped(rule).map(({ text }) => text)
  const rows = [names, ...body.map(line => cellsAsTyped(line).map(({ text }) => text))]
  const columns = names.map((_, i): Column => {
    const mark = marks[i] ?? ''
    const width = Math.max(1, ...rows.map(cells => widthOf(cells[i] ?? '')))
    return { width, opens: mark.startsWith(':'), closes: mark.endsWith(':') }
  })
  const [first = '', ...rest] = rows.map(cells => rowOf(cells, columns))
  return [first, ruleOf(columns), ...rest]
}

/** `height(ft)` as `height (ft)`. */
const spacedUnit = (name: string): string => name.replace(/^(.*?\S)\s*\(\s*([^()]*?)\s*\)$/s, '$1 ($2)')

const rowOf = (cells: readonly string[], columns: readonly Column[]): string =>
  `|${columns.map((column, i) => ` ${set(cells[i] ?? '', column)} |`).join('')}`

/** The dashes take the room of the spaces too. */
const ruleOf = (columns: readonly Column[]): string =>
  `|${columns
    .map(({ width, opens, closes }) => {
      const dashes = '-'.repeat(width + 2 - Number(opens) - Number(closes))
      return `${opens ? ':' : ''}${dashes}${closes ? ':' : ''}|`
    })
    .join('')}`

function set(cell: string, column: Column): string {
  const fill = fillOf(cell, column.width)
  switch (sideOf(column)) {
    case 'left':
      return cell + fill
    case 'right':
      return fill + cell
    case 'middle': {
      const half = fill.length >> 1
      return fill.slice(0, half) + cell + fill.slice(half)
    }
  }
}

function sideOf({ opens, closes }: Column): Side {
  if (!closes) return 'left'
  return opens ? 'middle' : 'right'
}
