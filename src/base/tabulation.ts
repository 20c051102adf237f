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
  /** The id of a row's value, without making the value. */
  readonly idOf: (rowIdx: number) => string
}

/** The input of a column's formula: another column, by its symbol's name, or one value for all rows. */
export type ColumnInput = string | Value

export class Tabulation {
  readonly rows: readonly string[]
  private readonly held = new Map<string, TableColumn>()
  /** Made when first asked for. */
  private ids: ReadonlySet<string> | undefined
  private readonly idOf: (row: string, key: string, rowIdx: number) => string
  private readonly display: Display

  /** @param idOf the value id of a cell, from its row, its column's key, and where the row stands among those of one name */
  constructor(rows: readonly string[], idOf: (row: string, key: string, rowIdx: number) => string, display: Display) {
    this.rows = rows
    this.idOf = idOf
    this.display = display
  }

  /** A column of values worked or given elsewhere, one a row. */
  take(sym: Sym, values: readonly Value[]): this {
    const numbers = new Float64Array(values.length)
    for (let i = 0; i < values.length; i++) numbers[i] = required(values[i]).si
    const cell = (rowIdx: number) => required(values[rowIdx])
    return this.hold({ sym, numbers, cell, idOf: rowIdx => cell(rowIdx).id })
  }

  /**
   * A column of another table of the same rows, as values that are known: its formula is told there.
   * @param as its symbol here
   */
  takeColumn({ sym, numbers, cell, idOf }: TableColumn, as: Sym = sym): this {
    return this.hold({ sym: as, numbers, cell, idOf })
  }

  private hold(column: TableColumn): this {
    this.held.set(column.sym.name, column)
    this.ids = undefined
    return this
  }

  /**
   * A column worked from others.
   * @param inputs for each symbol of the formula, a column's name or one value
   * @param key of the ids of its cells; the symbol's name when left out
   * @param about what its letter says beside the row, such as the load case
   */
  work(
    formula: Formula,
    inputs: Readonly<Record<string, ColumnInput>>,
    key: string = formula.gives.name,
    about: readonly string[] = [],
  ): this {
    const numbers: Record<string, Numbers> = {}
    for (const name of formula.symbols.keys()) {
      const input = inputs[name]
      numbers[name] = typeof input === 'string' ? this.column(input).numbers : required(input).si
    }
    const result = run(formula, numbers)
    const column = typeof result === 'number' ? new Float64Array(this.rows.length).fill(result) : result
    const cells: Value[] = []
    const cell = (rowIdx: number) => {
      cells[rowIdx] ??= this.worked(formula, inputs, key, column, rowIdx, about)
      return required(cells[rowIdx])
    }
    const idOf = (rowIdx: number) => this.idOf(required(this.rows[rowIdx]), key, rowIdx)
    return this.hold({ sym: formula.gives, numbers: column, formula, cell, idOf })
  }

  column(name: string): TableColumn {
    return required(this.held.get(name))
  }

  get columns(): readonly TableColumn[] {
    return [...this.held.values()]
  }

  /** True when a cell of the table has this id. */
  has(id: string): boolean {
    this.ids ??= new Set(this.columns.flatMap(({ idOf }) => this.rows.map((_, rowIdx) => idOf(rowIdx))))
    return this.ids.has(id)
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
    about: readonly string[],
  ): Value {
    const row = required(this.rows[rowIdx])
    const values = Object.entries(inputs).map(([name, input]) => {
      const value = typeof input === 'string' ? this.column(input).cell(rowIdx) : input
      return [name, value] as const
    })
    return {
      id: this.idOf(row, key, rowIdx),
      tex: texAbout(formula.gives.tex, row, ...about),
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
