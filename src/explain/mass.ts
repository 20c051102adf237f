/** Weight, centre of mass and polar moment. */
import { verbatim } from '../base/language.ts'
import type { Mass } from '../compute/mass.ts'
import type { Plan } from '../compute/plan.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export function explainMass(mass: Mass, plan: Plan, detail: Detail, context: Context): readonly Piece[] {
  const { level } = mass
  const results = [mass.W, mass.x, mass.y].map(value => explainValue(value, context))
  if (detail === 'result') return results
  const tables = mass.lines || mass.points ? separateTables(mass, context) : []
  const columns = tables.length === 0 ? ['A', 'w', 'W', 'x', 'y', 'W_x', 'W_y'] : ['W', 'x', 'y', 'W_x', 'W_y']
  const caption =
    tables.length === 0 ? `Areas of ${verbatim(level)}.${openingNote(plan)}` : `All parts of ${verbatim(level)}.`
  const parts = explainTable(
    mass.parts,
    {
      id: `${level}.parts`,
      caption,
      rowHead: tables.length === 0 ? 'Area' : 'Part',
      columns,
      sums: { W: mass.W, W_x: mass.sums.Wx, W_y: mass.sums.Wy },
      knownFormulas: tables.length === 0 ? [] : ['W'],
    },
    context,
  )
  return [...(detail === 'full' ? outlines(plan, context) : []), ...tables, parts, ...results]
}

function openingNote({ parts }: Plan): string {
  const cut = parts.filter(({ area, name }) => area.name !== name).map(({ name }) => name)
  if (cut.length === 0) return ''
  return ` ${verbatim(cut.join(', '))}: ${cut.length === 1 ? 'an opening counts' : 'openings count'} as negative area.`
}

function separateTables({ level, areas, lines, points }: Mass, context: Context): readonly Piece[] {
  const table = (tabulation: Mass['areas'], kind: string, rowHead: string, columns: readonly string[]) =>
    tabulation
      ? [
          explainTable(
            tabulation,
            { id: `${level}.${kind}`, caption: `${rowHead}s of ${verbatim(level)}.`, rowHead, columns },
            context,
          ),
        ]
      : []
  return [
    ...table(areas, 'areas', 'Area', ['A', 'w', 'W', 'x', 'y']),
    ...table(lines, 'lines', 'Line', ['L', 'w', 'W', 'x', 'y']),
    ...table(points, 'points', 'Point', ['W', 'x', 'y']),
  ]
}

/** The sides of every outline that is no rectangle, and what follows from them. */
function outlines({ level, parts }: Plan, context: Context): readonly Piece[] {
  return parts.flatMap(({ name, sides, A, x, y }): readonly Piece[] => {
    if (!sides) return []
    const table = explainTable(
      sides,
      {
        id: `${level}.areas.${name}.sides`,
        caption: `Sides of ${verbatim(name)}, each from (x₁, y₁) to (x₂, y₂), in order around it.`,
        rowHead: 'Side',
        columns: ['x_1', 'y_1', 'x_2', 'y_2', 'a', 'a_x', 'a_y'],
      },
      context,
    )
    return [table, ...[A, x, y].map(value => explainValue(value, context))]
  })
}

export function explainPolarMoment({ level, parts, Ip }: Mass, detail: Detail, context: Context): readonly Piece[] {
  const result = explainValue(Ip, context)
  if (detail === 'result') return [result]
  const table = explainTable(
    parts,
    {
      id: `${level}.polar`,
      caption: `Moment of each part of ${verbatim(level)} about the centre of mass.`,
      rowHead: 'Part',
      columns: ['W', 'x', 'y', 'I_o', 'I'],
      sums: { I: Ip },
      knownFormulas: ['W'],
    },
    context,
  )
  return [table, result]
}
