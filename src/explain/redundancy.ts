/** Redundancy of a storey by taking away each of its walls. */
import { verbatim } from '../base/language.ts'
import { inWords } from '../base/near.ts'
import type { Axis } from '../compute/cases.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { Redundancy, Removed } from '../compute/redundancy.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export function explainRedundancy(found: Redundancy, detail: Detail, context: Context): readonly Piece[] {
  const { level, walls, sums, losses, removed, axes, turning, cases, strengthStated } = found
  const verdicts = verdictsOf(found, context)
  if (detail === 'result') return verdicts
  const slender = walls.columns.some(({ sym }) => sym.name === 'h_L') ? ['h_L'] : []
  const strengths = explainTable(
    walls,
    {
      id: `${level}.strength`,
      caption: strengthStated
        ? `Strength of the walls of ${verbatim(level)} along x and y.`
        : `Length of the walls of ${verbatim(level)} along x and y, which stands for their strength: it is not stated for all of them.`,
      rowHead: 'Wall',
      columns: ['c', 's', strengthStated ? 'V_n' : 'L', ...slender, 'R_x', 'R_y'],
      sums: { R_x: sums.x, R_y: sums.y },
      // Its head is the formula.
      knownFormulas: ['h_L'],
    },
    context,
  )
  const lost = explainTable(
    losses,
    {
      id: `${level}.losses`,
      caption: `What the storey below ${verbatim(level)} loses of its strength along x and y without a wall or a line of walls, and whether the rest still holds it.`,
      rowHead: 'Without',
      columns: ['R_x', 'loss_x', 'R_y', 'loss_y'],
      words: [{ head: 'The rest', cells: removed.map(({ stands }) => context.words(stands ? 'stands' : 'falls')) }],
    },
    context,
  )
  const turn = explainTable(
    turning,
    {
      id: `${level}.turning`,
      caption: `Drift of the two edges of ${verbatim(level)} along each axis in the case that turns it most, solved again without each wall that may go: ${TOLD}.`,
      rowHead: 'Without',
      columns: axes.flatMap(axis => [`Delta_${axis}1`, `Delta_${axis}2`, `eta_${axis}`]),
      words: axes.map(axis => ({ head: `Case, ${axis}`, cells: cases[axis].map(caseOnPage) })),
    },
    context,
  )
  const tables = [strengths, lost, turn]
  if (detail === 'table') return [...tables, ...verdicts]
  const steps = axes.flatMap(axis => [worst(losses, `loss_${axis}`), worst(turning, `eta_${axis}`)])
  return [...tables, ...steps.map(value => explainValue(value, context)), ...verdicts]
}

const TOLD = 'the larger over the mean of both is the ratio that tells how far it turns'

/** The largest cell of a column, the first of equals. */
function worst(table: Redundancy['losses'], name: string) {
  const { numbers, cell } = table.column(name)
  return cell(numbers.reduce((best, value, i) => (value > (numbers[best] ?? 0) * (1 + 1e-12) ? i : best), 0))
}

/** ASCE 7 Table 12.3-3, shear walls (limits quoted from memory, unchecked). */
const rule = { slender: 1, loss: 0.33, ratio: 1.4, clause: 'ASCE 7 12.3.4.2 (a), Table 12.3-3 (unchecked)' }

/** Whether the rule of the standard is met along each axis; nothing where the standard has another rule. */
function verdictsOf(found: Redundancy, context: Context): readonly Piece[] {
  if (!/^ASCE 7/.test(context.basis.standard ?? '')) return []
  const level = verbatim(found.level)
  const along = found.axes.map(axis => {
    const breaking = found.removed.flatMap(group => {
      const why = counts(found, group) ? breaks(found, group, axis) : ''
      return why === '' ? [] : [`${verbatim(group.name)} (${why})`]
    })
    return breaking.length === 0
      ? `Along ${axis} the storey below ${level} meets the rule of ${rule.clause}: without any one wall that is higher than long it loses no more than 33% of its strength, and the ratio of its drifts stays at or below 1.4.`
      : `Along ${axis} the storey below ${level} does not meet the rule of ${rule.clause}, by which it may lose no more than 33% of its strength and turn by a ratio of no more than 1.4 without any one wall that is higher than long. It does not without ${inWords(breaking, 'or')}.`
  })
  const rho =
    'In categories D to F ρ is 1.0 along an axis where every storey that resists more than 35% of the base shear meets the rule, and 1.3 otherwise (ASCE 7 12.3.4, unchecked).'
  return [...along, rho].map((text): Piece => ({ kind: 'note', text: context.words(text) }))
}

/** Only single walls higher than long are taken away; one whose height is not stated counts as such. */
function counts({ walls }: Redundancy, group: Removed): boolean {
  const [only = '', ...more] = group.walls
  if (more.length > 0) return false
  const column = walls.columns.find(({ sym }) => sym.name === 'h_L')
  return column === undefined || (column.numbers[walls.rows.indexOf(only)] ?? Number.NaN) > rule.slender
}

/** In what a storey without the group breaks the rule; empty where it keeps it. */
function breaks({ losses, turning }: Redundancy, { name, stands }: Removed, axis: Axis): string {
  const number = (table: Redundancy['losses'], column: string) =>
    table.column(column).numbers[table.rows.indexOf(name)] ?? Number.NaN
  if (!stands) return 'it falls'
  const [weak, turns] = [number(losses, `loss_${axis}`) > rule.loss, number(turning, `eta_${axis}`) > rule.ratio]
  return [...(weak ? ['strength'] : []), ...(turns ? ['turning'] : [])].join(' and ')
}
