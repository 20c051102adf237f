/**
 * A table whose columns are formulas: each is run once over all rows, and any
 * cell can still be asked which values it came from.
 */
import type { Numbers } from './evaluate.ts'
import { type Formula, run, type Sym } from './formula.ts'
import type { Display } from './kind.ts'
import type { Value } from './value.ts'
import { shownAs, texAbout } from './work.ts'

export interface TableColumn {
  readonly sym: Sym
  readonly numbers: Float64Array
  /** Absent where the column's values come from elsewhere. */
  readonly formula?: Formula
  /** The value of a row, with its origin. */
  readonly cell: (rowIdx: number) => Value
}

/** The input of a column's formula: another column, by its symbol's name, or one value for all rows. */
export type ColumnInput = string | Value

export class Tabulation {
  readonly rows: readonly string[]
  private readonly held = new Map<string, TableColumn>()
  private readonly idOf: (row: string, key: string) => string
  private readonly display: Display

  /** @param idOf the value id of a cell, from its row and its column's key */
  constructor(rows: readonly string[], idOf: (row: string, key: string) => string, display: Display) {
    this.rows = rows
    this.idOf = idOf
    this.display = display
  }

  /** A column of values worked or given elsewhere, one a row. */
  take(sym: Sym, values: readonly Value[]): this {
    const numbers = Float64Array.from(values, ({ si }) => si)
    this.held.set(sym.name, { sym, numbers, cell: rowIdx => required(values[rowIdx]) })
    return this
  }

  /**
   * A column worked from others.
   * @param inputs for each symbol of the formula, a column's name or one value
   * @param key of the ids of its cells; the symbol's name when left out
   */
  work(formula: Formula, inputs: Readonly<Record<string, ColumnInput>>, key: string = formula.gives.name): this {
    const numbers: Record<string, Numbers> = {}
    for (const name of formula.symbols.keys()) {
      const input = inputs[name]
      numbers[name] = typeof input === 'string' ? this.column(input).numbers : required(input).si
    }
    const result = run(formula, numbers)
    const column = typeof result === 'number' ? new Float64Array(this.rows.length).fill(result) : result
    const cells: Value[] = []
    const cell = (rowIdx: number) => {
      cells[rowIdx] ??= this.worked(formula, inputs, key, column, rowIdx)
      return required(cells[rowIdx])
    }
    this.held.set(formula.gives.name, { sym: formula.gives, numbers: column, formula, cell })
    return this
  }

  column(name: string): TableColumn {
    return required(this.held.get(name))
  }

  get columns(): readonly TableColumn[] {
    return [...this.held.values()]
  }

  /** True when a cell of the table has this id. */
  has(id: string): boolean {
    return this.rows.some((_, rowIdx) => this.columns.some(({ cell }) => cell(rowIdx).id === id))
  }

  /** The sum of a column, as a value that later formulas use by the symbol `of`. */
  sum(name: string, of: Sym, id: string): Value {
    const { numbers, cell, sym: column } = this.column(name)
    let si = 0
    for (const one of numbers) si += one
    const rows = this.rows.length
    let origin: Value['origin'] | undefined
    return {
      id,
      tex: of.tex,
      si,
      ...shownAs(of, this.display),
      get origin() {
        origin ??= sumOrigin(
          of,
          column,
          Array.from({ length: rows }, (_, rowIdx) => cell(rowIdx)),
        )
        return origin
      },
    }
  }

  private worked(
    formula: Formula,
    inputs: Readonly<Record<string, ColumnInput>>,
    key: string,
    numbers: Float64Array,
    rowIdx: number,
  ): Value {
    const row = required(this.rows[rowIdx])
    const values = Object.entries(inputs).map(([name, input]) => {
      const value = typeof input === 'string' ? this.column(input).cell(rowIdx) : input
      return [name, value] as const
    })
    return {
      id: this.idOf(row, key),
      tex: texAbout(formula.gives.tex, row),
      si: required(numbers[rowIdx]),
      ...shownAs(formula.gives, this.display),
      origin: { kind: 'worked', step: { formula, inputs: new Map(values) } },
    }
  }
}

const nowhere = { start: 0, end: 0 }

function sumOrigin(of: Sym, column: Sym, cells: readonly Value[]): Value['origin'] {
  const named = cells.map((cell, rowIdx) => ({ name: `${column.name}_${rowIdx + 1}`, cell }))
  const formula: Formula = {
    gives: of,
    body: {
      kind: 'call',
      fn: 'sum',
      args: named.map(({ name }) => ({ kind: 'name', name, span: nowhere })),
      span: nowhere,
    },
    symbols: new Map(named.map(({ name, cell }) => [name, { name, tex: cell.tex, kind: of.kind }])),
    source: 'sum of the column',
    assumes: [],
    inShort: `\\sum ${column.tex}`,
  }
  return { kind: 'worked', step: { formula, inputs: new Map(named.map(({ name, cell }) => [name, cell])) } }
}

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a table was asked for a row or column that it does not have')
  return value
}
