/** Matches the columns of a block's table to those that its topic has. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { all, type Result } from '../base/ledger.ts'
import { inWords, suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Unit } from '../base/unit.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { headUnit } from './cell.ts'

/** One row with its cells by column; a column that is left out, or an empty cell, is undefined. */
export interface RowOf {
  readonly line: Text
  readonly cell: (column: string) => Text | undefined
  readonly unit: (column: string) => Unit | undefined
}

export interface ColumnRules {
  readonly needed: readonly string[]
  readonly optional: readonly string[]
  /** Sets of optional columns, of which one must be there whole. */
  readonly oneOf?: readonly (readonly string[])[]
}

/** The rows of a block's table, or what is wrong with its head. */
export function recordsOf(block: Block, rules: ColumnRules): Result<readonly RowOf[]> {
  const { needed, optional, oneOf = [] } = rules
  if (block.faults.length > 0) return bad(block.faults)
  if (!block.table)
    return bad([
      diagnose(
        'error',
        'table-missing',
        block.info,
        `a block ${block.topic} needs a table`,
        `Its columns are ${inWords(needed, 'and')}.`,
      ),
    ])
  const { header, headerLine, rows } = block.table
  if (rows.length === 0)
    return bad([
      diagnose(
        'error',
        'table-empty',
        headerLine.span,
        `this table of ${block.topic} has no rows`,
        'Add a row, or leave the block out.',
      ),
    ])
  const known = [...needed, ...optional]
  const faults: Diagnostic[] = []
  const units = new Map<string, Unit>()
  for (const { name, unit } of header) {
    if (!known.includes(name.text))
      faults.push(
        diagnose(
          'error',
          'unknown-column',
          name.span,
          `${block.topic} has no column ${name.text}`,
          suggestion(name.text, known, 'column'),
        ),
      )
    const made = headUnit(unit)
    if (!made.ok) faults.push(...made.because)
    else if (made.value) units.set(name.text, made.value)
  }
  const missing = needed.filter(column => !header.some(({ name }) => name.text === column))
  const misspelt = faults.some(({ rule }) => rule === 'unknown-column')
  if (missing.length > 0 && !misspelt)
    faults.push(
      diagnose(
        'error',
        'column-missing',
        headerLine.span,
        `column ${inWords(missing, 'and')} is missing`,
        `A table of ${block.topic} has ${inWords(needed, 'and')}${optional.length > 0 ? `, and may have ${inWords(optional, 'and')}` : ''}.`,
      ),
    )
  const present = (column: string) => header.some(({ name }) => name.text === column)
  if (faults.length === 0 && oneOf.length > 0 && !oneOf.some(set => set.every(present)))
    faults.push(
      diagnose(
        'error',
        'column-missing',
        headerLine.span,
        `a table of ${block.topic} also has ${inWords(
          oneOf.map(set => inWords(set, 'and')),
          'or',
        )}`,
        'Add the columns that are missing.',
      ),
    )
  if (faults.length > 0) return bad(faults)
  const order = new Map(header.map(({ name }, i) => [name.text, i]))
  return good(
    rows.map(({ cells, line }) => ({
      line,
      cell: column => {
        const found = cells[order.get(column) ?? -1]
        return found && found.text !== '' ? found : undefined
      },
      unit: column => units.get(column),
    })),
  )
}

/** A cell that must be filled. */
export function filled(record: RowOf, column: string): Result<Text> {
  const cell = record.cell(column)
  if (cell) return good(cell)
  return bad([
    diagnose('error', 'cell-empty', record.line.span, `this row has no ${column}`, `Fill the cell ${column}.`),
  ])
}

const LONGEST_NAME = 64

/** A name that can be quoted as part of a value id. */
export function nameIn(record: RowOf, column: string): Result<Text> {
  const cell = filled(record, column)
  return cell.ok ? checkedName(cell.value, column) : cell
}

export function checkedName(name: Text, what: string): Result<Text> {
  const { text, span } = name
  if ([...text].length > LONGEST_NAME)
    return bad([
      diagnose(
        'error',
        'name-too-long',
        span,
        `this name of a ${what} has ${[...text].length} characters; ${LONGEST_NAME} are read`,
        'Give a short name and put the rest in the text.',
      ),
    ])
  const sign = /[.{}|\p{Cc}]/u.exec(text)?.[0]
  if (sign !== undefined)
    return bad([
      diagnose(
        'error',
        'name-not-usable',
        span,
        `a name cannot hold ${JSON.stringify(sign)}`,
        'Values are asked for by dotted names, so a name holds no dot, brace or bar.',
      ),
    ])
  return name.text === ''
    ? bad([diagnose('error', 'name-missing', span, `the ${what} has no name`, 'Give it one.')])
    : good(name)
}

/** Refuses a name that stands twice, pointing at both. */
export function duplicates(names: readonly Text[], what: string): readonly Diagnostic[] {
  const first = new Map<string, Text>()
  return names.flatMap(name => {
    const before = first.get(name.text)
    if (!before) {
      first.set(name.text, name)
      return []
    }
    return [
      diagnose('error', 'name-repeated', name.span, `${what} ${name.text} stands twice`, 'Give each its own name.', {
        also: [{ span: before.span, text: 'first here' }],
      }),
    ]
  })
}

/** Refuses settings that the topic does not have. */
export function strangeSettings(block: Block, known: readonly string[]): readonly Diagnostic[] {
  return [...block.settings, ...block.options]
    .filter(({ name }) => !known.includes(name.text))
    .map(({ name }) =>
      diagnose(
        'error',
        'unknown-setting',
        name.span,
        `${block.topic} has no setting ${name.text}`,
        suggestion(name.text, known, 'setting'),
      ),
    )
}

/** Refuses lines that are neither a setting nor a row. */
export function strangeLines(block: Block): readonly Diagnostic[] {
  return block.lines.map(line =>
    diagnose(
      'error',
      'line-not-understood',
      line.span,
      'this line is neither a setting nor a row of a table',
      'A setting is written name: value; a row starts with |; a comment starts with #.',
    ),
  )
}

export const settingOf = (block: Block, name: string): Text | undefined =>
  [...block.settings, ...block.options].find(setting => setting.name.text === name)?.value

/**
 * The rows of all blocks of one topic, each read by its name; a name that stands twice is refused.
 * @param column the column that holds the name
 */
export function readRows<T>(
  blocks: readonly Block[],
  column: string,
  rules: ColumnRules,
  read: (record: RowOf, name: Text) => Result<T>,
): Result<readonly T[]> {
  const names: Text[] = []
  const parts = blocks.flatMap((block): readonly Result<T>[] => {
    const records = recordsOf(block, rules)
    const faults = [...strangeSettings(block, []), ...strangeLines(block)]
    if (!records.ok || faults.length > 0) return [bad([...faults, ...(records.ok ? [] : records.because)])]
    return records.value.map((record): Result<T> => {
      const name = nameIn(record, column)
      if (!name.ok) return name
      names.push(name.value)
      return read(record, name.value)
    })
  })
  const repeated = duplicates(names, column)
  const done = all(parts)
  return repeated.length > 0 ? bad([...repeated, ...(done.ok ? [] : done.because)]) : done
}
