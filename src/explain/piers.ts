/** A wall with openings: its strips and piers, how its stiffness comes together from them, and what each pier carries. */
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import type { PierShears } from '../compute/pier-shears.ts'
import type { Pierced } from '../compute/pierced.ts'
import { h } from '../compute/stiffness.ts'
import { k, L, V } from '../compute/symbols.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

/** From the outlines of piers and strips to k of the wall. */
export function explainPierced(level: string, pierced: Pierced, context: Context): readonly Piece[] {
  const { wall, held, whole, groups, stripTable, steps } = pierced
  const about = verbatim(wall)
  const outline = ['a_1', 'a_2', 'L', 'z_1', 'z_2', 'h']
  const table = (key: string, made: Tabulation | undefined, caption: string, stiffness: string, head: string) =>
    made
      ? [
          explainTable(
            made,
            {
              id: `${level}.wall.${wall}.${key}`,
              caption,
              rowHead: head,
              columns: [...outline, stiffness],
              words: wordsOf(pierced, made, stiffness),
            },
            context,
          ),
        ]
      : []
  const where = 'from its start along it and from its foot up'
  return [
    { kind: 'note', text: context.words(inShort(pierced)) },
    ...table('piers', held, `Solid piers of wall ${about}, held at both ends; places are ${where}.`, 'k', 'Pier'),
    ...table(
      'whole',
      whole,
      `Walls without openings that wall ${about} is parted into; places are ${where}.`,
      'k',
      'Pier',
    ),
    ...table('strips', stripTable, `Solid strips of wall ${about} that hold its openings.`, 'k_s', 'Strip'),
    ...groups.flatMap((made, i) =>
      table(
        `groups${i === 0 ? '' : i + 1}`,
        made,
        `Piers of wall ${about} that hold openings, as if solid.`,
        'k_o',
        'Pier',
      ),
    ),
    ...steps.map(value => explainValue(value, context)),
  ]
}

function inShort({ wall, strips, across }: Pierced): string {
  const about = verbatim(wall)
  const parts = across
    ? `Openings of full height part wall ${about} into ${across.rows.join(', ')}, side by side.`
    : `Wall ${about} has openings.`
  if (strips.length === 0) return parts
  return `${parts} Under one force a wall or pier with openings deflects as its solid outline does, less each solid strip as high as the openings in it, plus the piers of that strip together.`
}

/** What each row of an outline table holds or stands in. */
function wordsOf({ strips, wall }: Pierced, { rows }: Tabulation, stiffness: string) {
  const standsIn = (row: string) => strips.find(({ parts }) => parts.rows.includes(row))?.name ?? wall
  const holds = (row: string) => strips.find(({ name }) => name === row)?.parts.rows.join(', ') ?? ''
  const held = (row: string) =>
    strips
      .filter(({ of }) => of === row)
      .map(({ name }) => name)
      .join(', ')
  switch (stiffness) {
    case 'k_s':
      return [{ head: 'Piers', cells: rows.map(holds) }]
    case 'k_o':
      return [
        { head: 'Strips', cells: rows.map(held) },
        { head: 'In', cells: rows.map(standsIn) },
      ]
    default:
      return [{ head: 'In', cells: rows.map(standsIn) }]
  }
}

/** The wall's shear shared out, strip by strip. */
export function explainPierShears(
  level: string,
  wall: string,
  shears: readonly PierShears[],
  context: Context,
): readonly Piece[] {
  return shears.map(({ strip, table, K, total }) =>
    explainTable(
      table,
      {
        id: `${level}.wall.${wall}.shears.${strip ?? 'across'}`,
        caption:
          strip === undefined
            ? `Design shear of wall ${verbatim(wall)} in the parts that stand side by side.`
            : `Design shear of the piers in strip ${strip} of wall ${verbatim(wall)}.`,
        rowHead: 'Pier',
        columns: ['k', 'V_s', 'V'],
        sums: { k: K, V: total },
      },
      context,
    ),
  )
}

/** The piers that an elevation names, with what each carries where shears are known. */
export function explainPierTable(
  level: string,
  pierced: Pierced,
  shears: readonly PierShears[],
  display: Display,
  context: Context,
): Piece {
  const { wall, piers } = pierced
  const rows = piers.map(({ name }) => name)
  const table = new Tabulation(rows, (row, key) => `${level}.wall.${wall}.pier.${row}.${key}`, display)
  const carried = rows.flatMap(row => shears.flatMap(each => cell(each.table, row, 'V') ?? []))
  for (const symbol of [L, h])
    table.take(
      symbol,
      rows.map(row => outlineOf(pierced, row, symbol.name)),
    )
  table.take(
    k,
    rows.map(row => stiffnessOf(pierced, row)),
  )
  const known = carried.length === rows.length
  if (known) table.take(V, carried)
  const want = {
    id: `${level}.elevation.${wall}.piers`,
    caption: `Piers of wall ${verbatim(wall)}${known ? ', and the design shear of each' : ''}.`,
    rowHead: 'Pier',
    columns: ['L', 'h', 'k', ...(known ? ['V'] : [])],
    words: piers.some(({ holds }) => holds.length > 0)
      ? [{ head: 'Holds', cells: piers.map(({ holds }) => holds.join(', ')) }]
      : [],
  }
  return explainTable(table, want, context)
}

function cell(table: Tabulation | undefined, row: string, column: string): Value | undefined {
  const at = table?.rows.indexOf(row) ?? -1
  return at === -1 ? undefined : table?.column(column).cell(at)
}

const outlineOf = ({ held, whole, groups }: Pierced, row: string, column: string): Value =>
  required([held, whole, ...groups].map(table => cell(table, row, column)).find(value => value))

const stiffnessOf = ({ across, strips }: Pierced, row: string): Value =>
  required([across, ...strips.map(({ parts }) => parts)].map(table => cell(table, row, 'k')).find(value => value))

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a pier has no row in the tables of its wall')
  return value
}
