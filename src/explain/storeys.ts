/** Storey forces and shears of the building. */
import { verbatim } from '../base/language.ts'
import type { Loading } from '../compute/cases.ts'
import type { LevelWork } from '../compute/level.ts'
import { lettersOf } from '../compute/loading.ts'
import { elevationOf, type Storeys } from '../compute/storeys.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail, Request } from './request.ts'
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
  return made.ok
    ? storeyPieces(made.value, level?.name, detail, context)
    : [{ kind: 'fault', diagnostics: made.because }]
}

/** @param name the storey to work as steps; the lowest when none is named */
export function storeyPieces(
  storeys: Storeys,
  name: string | undefined,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const { loading, axes, table } = storeys
  const named = name === undefined ? -1 : table.rows.indexOf(name)
  const at = named === -1 ? table.rows.length - 1 : named
  const steps = axes.map(axis => explainValue(table.column(lettersOf[loading].V[axis].name).cell(at), context))
  if (detail === 'result') return steps
  const rows = tableOf(storeys, context)
  if (detail === 'table') return [rows]
  const drawn = context.sketch.storeys(storeys)
  const figure: Piece = drawn.ok
    ? {
        kind: 'figure',
        id: `${idOf(loading)}.diagram`,
        number: '',
        caption: context.words(`${titleOf(loading)} of each level, and shear of the storey below it.`),
        ...drawn.value,
      }
    : { kind: 'fault', diagnostics: drawn.because }
  return [rows, figure, ...steps]
}

/** One row a level from the top down, the forces summed below: their sum is the shear of the lowest storey. */
function tableOf({ loading, axes, table, stated }: Storeys, context: Context): Piece {
  const { F, V } = lettersOf[loading]
  const last = table.rows.length - 1
  const sums = Object.fromEntries(axes.map(axis => [F[axis].name, table.column(V[axis].name).cell(last)]))
  const lowest = verbatim(table.rows[last] ?? '')
  return explainTable(
    table,
    {
      id: idOf(loading),
      caption:
        table.rows.length === 1
          ? `${titleOf(loading)} at ${lowest} and shear of the storey below it.`
          : `${titleOf(loading)} at each level, and shear of the storey below it: the sum of the forces at that level and above. The sum of all is the shear of the storey below ${lowest}.`,
      rowHead: 'Level',
      columns: [...(stated ? [elevationOf.name] : []), ...axes.flatMap(axis => [F[axis].name, V[axis].name])],
      ...(table.rows.length > 1 ? { sums } : {}),
    },
    context,
  )
}

const idOf = (loading: Loading): string => {
  switch (loading) {
    case 'seismic':
      return 'storeys'
    case 'wind':
      return 'storeys.wind'
    case 'least wind':
      return 'storeys.wind.least'
  }
}

const titleOf = (loading: Loading): string => {
  switch (loading) {
    case 'seismic':
      return 'Force'
    case 'wind':
      return 'Force of wind'
    case 'least wind':
      return 'Least force of wind'
  }
}
