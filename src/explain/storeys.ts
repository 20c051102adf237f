/** Storey forces and shears of the building. */
import { verbatim } from '../base/language.ts'
import type { LevelWork } from '../compute/level.ts'
import { elevationOf, lettersOf, type Storeys } from '../compute/storeys.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Request } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

/** @param level the storey to work as steps; the lowest, whose shear is that of the base, when none is named */
export function explainStoreys(
  sheet: Worksheet,
  level: LevelWork | undefined,
  { detail }: Request,
  context: Context,
): readonly Piece[] {
  const made = sheet.storeys()
  if (!made.ok) return [{ kind: 'fault', diagnostics: made.because }]
  const { axes, table } = made.value
  const named = level ? table.rows.indexOf(level.name) : -1
  const at = named === -1 ? table.rows.length - 1 : named
  const steps = axes.map(axis => explainValue(table.column(lettersOf[axis].V.name).cell(at), context))
  if (detail === 'result') return steps
  const rows = tableOf(made.value, context)
  if (detail === 'table') return [rows]
  const drawn = context.sketch.storeys(made.value)
  const figure: Piece = drawn.ok
    ? {
        kind: 'figure',
        id: context.anchor('storeys.diagram'),
        number: '',
        caption: context.words('Force of each level, and shear of the storey below it.'),
        ...drawn.value,
      }
    : { kind: 'fault', diagnostics: drawn.because }
  return [rows, figure, ...steps]
}

/** One row a level from the top down, the forces summed below: their sum is the shear of the lowest storey. */
function tableOf({ axes, table, stated }: Storeys, context: Context): Piece {
  const last = table.rows.length - 1
  const sums = Object.fromEntries(
    axes.map(axis => [lettersOf[axis].F.name, table.column(lettersOf[axis].V.name).cell(last)]),
  )
  const lowest = verbatim(table.rows[last] ?? '')
  return explainTable(
    table,
    {
      id: 'storeys',
      caption:
        table.rows.length === 1
          ? `Force at ${lowest} and shear of the storey below it.`
          : `Force at each level, and shear of the storey below it: the sum of the forces at that level and above. The sum of all is the shear of the storey below ${lowest}.`,
      rowHead: 'Level',
      columns: [
        ...(stated ? [elevationOf.name] : []),
        ...axes.flatMap(axis => [lettersOf[axis].F.name, lettersOf[axis].V.name]),
      ],
      ...(table.rows.length > 1 ? { sums } : {}),
    },
    context,
  )
}
