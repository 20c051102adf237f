/** The design shears: every case, the largest of them, and the wall that governs. */
import { verbatim } from '../base/language.ts'
import { type Case, caseOnPage } from '../compute/cases.ts'
import { MOST_CASES, shearColumn } from '../compute/design.ts'
import type { Distribution } from '../compute/distribution.ts'
import { V } from '../compute/symbols.ts'
import { casesInWords } from './casewords.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export function explainDesignShears(
  distribution: Distribution,
  walls: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const { level, design, cases: all, governingCase, governingWall } = distribution
  const steps = walls.flatMap(wall => {
    const at = design.rows.indexOf(wall)
    return at === -1 ? [] : ['V', 'v'].map(name => explainValue(design.column(name).cell(at), context))
  })
  if (detail === 'result') return steps
  const apart = all.length > MOST_CASES
  const columns = apart
    ? [V.name]
    : design.columns.map(({ sym }) => sym.name).filter(name => name !== 'L' && name !== 'v')
  const cases = design.rows.map((_, i) => caseOnPage(governingCase(i).text))
  const table = explainTable(
    design,
    {
      id: `${level}.design`,
      caption: `${apart ? `Design shear of each wall of ${verbatim(level)}, the largest of the tables above.` : `Shear of each wall of ${verbatim(level)} in every case, and its design shear.`} ${verbatim(design.rows[governingWall] ?? '')} has the largest shear per length and governs.`,
      rowHead: 'Wall',
      columns: [...columns, 'L', 'v'],
      governs: governingWall,
      words: [{ head: 'Case', cells: cases }],
    },
    context,
  )
  const tables = [...(apart ? caseTables(distribution, context) : []), table]
  return detail === 'table' ? tables : [...tables, ...steps]
}

/** The shears of many cases, in a table for each kind of case. */
function caseTables({ level, design, cases }: Distribution, context: Context): readonly Piece[] {
  const groups = new Map<string, Case[]>()
  for (const { case: each } of cases) {
    const key = `${each.loading} ${each.parts.length}`
    groups.set(key, [...(groups.get(key) ?? []), each])
  }
  return [...groups.values()].map((group, i) => {
    const names = group.map(({ name }) => caseOnPage(name))
    return explainTable(
      design,
      {
        id: `${level}.design.${i + 1}`,
        caption: `Shear of each wall of ${verbatim(level)} in cases ${names[0]} to ${names.at(-1)}. ${casesInWords(group)}`,
        rowHead: 'Wall',
        columns: group.map(({ name }) => shearColumn(name)),
      },
      context,
    )
  })
}
