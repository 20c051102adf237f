/** A tabulation as a table of the page, its columns as formulas below it. */

import type { Kind } from '../base/kind.ts'
import { columnDecimals, fixed, numeralOnPage } from '../base/numeral.ts'
import type { Span } from '../base/span.ts'
import type { Tabulation } from '../base/tabulation.ts'
import { tex, texSource } from '../base/tex.ts'
import { letter, typeset } from '../base/typeset.ts'
import { unitText } from '../base/unit.ts'
import { shown, spansOf, type Value } from '../base/value.ts'
import type { Context } from './context.ts'
import type { Column, ColumnFormula, Row, Table } from './sheet.ts'

export interface TableWant {
  readonly id: string
  readonly caption: string
  /** Head of the first column, which names the rows. */
  readonly rowHead: string
  /** The columns to show, by the names of their symbols, in order. */
  readonly columns: readonly string[]
  /** Sums under their columns. */
  readonly sums?: Readonly<Record<string, Value>>
  /** Index of the row that governs. */
  readonly governs?: number
  /** Words in columns of their own, after the numbers. */
  readonly words?: readonly WordColumn[]
  /** Columns whose formulas are told elsewhere. */
  readonly knownFormulas?: readonly string[]
}

/** Text after the numbers; `ids` where it prints values after all. */
export interface WordColumn {
  readonly head: string
  readonly cells: readonly string[]
  readonly ids?: readonly string[]
}

export function explainTable(table: Tabulation, want: TableWant, context: Context): Table {
  const decimals = decimalsByKind(table, want)
  const columns = want.columns.map(name => numberColumn(table, name, want.sums?.[name], decimals, context))
  const words = want.words ?? []
  const id = want.id
  context.tabled(id, table)
  for (const name of want.columns) for (let i = 0; i < table.rows.length; i++) root(table.column(name).cell(i), context)
  for (const sum of Object.values(want.sums ?? {})) root(sum, context)
  const rows = table.rows.map(
    (name, i): Row => ({
      cells: [name, ...columns.map(({ cells }) => cells[i] ?? ''), ...words.map(({ cells }) => cells[i] ?? '')],
      ids: ['', ...columns.map(({ ids }) => ids[i] ?? ''), ...words.map(({ ids }) => ids?.[i] ?? '')],
      governs: want.governs === i,
    }),
  )
  const foot: Row = {
    cells: [context.words('Sum'), ...columns.map(({ sum }) => sum), ...words.map(() => '')],
    ids: ['', ...want.columns.map(name => want.sums?.[name]?.id ?? ''), ...words.map(() => '')],
    governs: false,
  }
  return {
    kind: 'table',
    id,
    number: '',
    caption: context.words(want.caption),
    columns: [
      { head: context.words(want.rowHead), unit: '', align: 'left' },
      ...columns.map(({ column }) => column),
      ...words.map(({ head }): Column => ({ head: context.words(head), unit: '', align: 'left' })),
    ],
    rows,
    ...(want.sums ? { foot } : {}),
    formulas: formulasOf(table, want, context),
    sourceLines: context.places(givenSpans(table, want.columns)),
  }
}

const root = (value: Value, context: Context): void => {
  context.root(value)
}

interface NumberColumn {
  readonly column: Column
  readonly cells: readonly string[]
  readonly ids: readonly string[]
  readonly sum: string
}

/** Columns that measure the same in one unit print with the same decimals, so that they can be compared. */
function decimalsByKind(table: Tabulation, { columns, sums }: TableWant): ReadonlyMap<Kind, number> {
  const numbers = new Map<Kind, number[]>()
  for (const name of columns) {
    const { sym, cell } = table.column(name)
    const found = numbers.get(sym.kind) ?? []
    for (let i = 0; i < table.rows.length; i++) found.push(shown(cell(i)))
    const sum = sums?.[name]
    if (sum) found.push(shown(sum))
    numbers.set(sym.kind, found)
  }
  return new Map([...numbers].map(([kind, found]) => [kind, columnDecimals(found)]))
}

function numberColumn(
  table: Tabulation,
  name: string,
  sum: Value | undefined,
  decimals: ReadonlyMap<Kind, number>,
  { language }: Context,
): NumberColumn {
  const { sym, cell } = table.column(name)
  const values = table.rows.map((_, i) => cell(i))
  const unit = values[0] ? unitText(values[0].unit) : ''
  const print = (value: Value) => numeralOnPage(fixed(shown(value), decimals.get(sym.kind) ?? 0), language)
  return {
    column: { head: tex(sym.tex), unit, align: 'right' },
    cells: values.map(print),
    ids: values.map(({ id }) => id),
    sum: sum ? print(sum) : '',
  }
}

function formulasOf(
  table: Tabulation,
  { columns, knownFormulas = [] }: TableWant,
  context: Context,
): readonly ColumnFormula[] {
  const found = columns.flatMap(name => {
    const { sym, formula } = table.column(name)
    if (!formula || knownFormulas.includes(name)) return []
    context.uses(formula)
    const body =
      formula.inShort === undefined
        ? typeset(formula.body, symbol => letter(formula.symbols.get(symbol)?.tex ?? symbol), context.language)
        : tex(formula.inShort)
    // W x is the product that its head says.
    if (texSource(body) === sym.tex) return []
    return [{ symbol: tex(sym.tex), formula: body, reference: context.words(formula.source) }]
  })
  // A source that several formulas share in a row is told once, after the last.
  return found.map((one, i) => (found[i + 1]?.reference === one.reference ? { ...one, reference: '' } : one))
}

/** Places where the engineer wrote what the table shows. */
function givenSpans(table: Tabulation, columns: readonly string[]): readonly Span[] {
  return columns.flatMap(name =>
    table.rows.flatMap((_, i) => {
      const value = table.column(name).cell(i)
      return value.origin.kind === 'worked' && value.origin.span === undefined && table.column(name).formula
        ? []
        : spansOf(value)
    }),
  )
}
