/** Response of the building to a spectrum. */
import { verbatim } from '../base/language.ts'
import type { Spectral, SpectralAxis } from '../compute/spectral.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export const explainSpectral = ({ given, axes }: Spectral, detail: Detail, context: Context): readonly Piece[] =>
  axes.flatMap(each => axisPieces(each, given.combination, detail, context))

function axisPieces(
  { axis, modes, base, factor, storeys }: SpectralAxis,
  combination: string,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const result = [base, ...(factor ? [factor] : [])].map(value => explainValue(value, context))
  if (detail === 'result') return result
  const each = explainTable(
    modes,
    {
      id: `modal.${axis}.modes`,
      caption: `Acceleration of each mode in multiples of g, and its base shear as the ground moves along ${axis}.`,
      rowHead: 'Mode',
      columns: ['T', 'S_a', `m_${axis}`, 'V_m'],
    },
    context,
  )
  const lowest = verbatim(storeys.rows.at(-1) ?? '')
  const all = explainTable(
    storeys,
    {
      id: `modal.${axis}.storeys`,
      caption: `Storey shears and torsion about the centre of rigidity as the ground moves along ${axis}: each worked in every mode, those not shown among them, and then combined by ${combination}, so that they have no sign, and those of one row do not act at one time. The storey below ${lowest} has the base shear.`,
      rowHead: 'Storey',
      columns: ['V_x', 'V_y', 'T', ...(factor ? ['f_Vx', 'f_Vy', 'f_T'] : [])],
    },
    context,
  )
  return detail === 'table' ? [each, all] : [each, ...result, all]
}
