/** Modes of vibration: periods, the mass that takes part, shapes. */
import type { Vibration } from '../compute/vibration.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import { residualCheck, residualOnPage } from './residual.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export function explainModes(
  { modes, shapes, residuals: every, enough, all }: Vibration,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const residuals = every.slice(0, modes.rows.length)
  const check = residualCheck('mode.balance', 'Modes of vibration put back, largest residual', residuals, 'M', context)
  context.check(check)
  const first = explainValue(modes.column('T').cell(0), context)
  if (detail === 'result') return [first, check]
  for (const value of residuals) context.root(value)
  const table = explainTable(
    modes,
    {
      id: 'modes',
      caption: `Periods, participation factors, and the share of the whole mass that takes part along x and y: the first ${modes.rows.length} of ${all} modes. From mode ${enough} on the sums reach 90% along both. Put back, the forces of inertia of each mode balance the storey shears of the walls to the residual shown.`,
      rowHead: 'Mode',
      columns: ['T', 'Gamma_x', 'Gamma_y', 'm_x', 's_x', 'm_y', 's_y'],
      words: [
        {
          head: 'Residual',
          cells: residuals.map(value => residualOnPage(value, context)),
          ids: residuals.map(({ id }) => id),
        },
      ],
    },
    context,
  )
  const drawn = shapes.slice(0, detail === 'table' ? 0 : shapes.length).map((shape, m) =>
    explainTable(
      shape,
      {
        id: `modes.${m + 1}`,
        caption: `Shape of mode ${m + 1}: movement of the centre of mass of each level along x and y, and that of a point at the radius of gyration as the level turns, the largest of all being 1.`,
        rowHead: 'Level',
        columns: ['u', 'v', 'theta_i'],
      },
      context,
    ),
  )
  return [table, ...drawn, check]
}
