/** Torsion, wall shears, design shears, displacement and equilibrium. */

import { sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { CaseResult, Distribution } from '../compute/distribution.ts'
import { T, V } from '../compute/symbols.ts'
import { isTied } from '../compute/tied.ts'
import type { Context } from './context.ts'
import { explainTiedShears } from './continuous.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import { residualCheck, residualOnPage, shownCheck } from './residual.ts'
import type { Check, Piece } from './sheet.ts'
import { explainTable } from './table.ts'

const caseTable = (cases: readonly CaseResult[], display: Display): Tabulation =>
  new Tabulation(
    cases.map(each => caseOnPage(each.case.name)),
    (row, key) => `${key}.${row}`,
    display,
  )

export function explainTorsion(
  { level, cases }: Distribution,
  shown: readonly CaseResult[],
  detail: Detail,
  display: Display,
  context: Context,
): readonly Piece[] {
  const results = shown.flatMap(each => [
    ...(detail === 'full' ? momentTable(level, each, context) : []),
    explainValue(each.moment, context),
  ])
  if (detail === 'result') return results
  const table = caseTable(cases, display)
    .take(
      V,
      cases.map(({ shear }) => shear),
    )
    .take(
      T,
      cases.map(({ moment }) => moment),
    )
  const want = {
    id: `${level}.torsion`,
    caption: `Storey shear and its moment about the centre of rigidity of ${verbatim(level)}, counter-clockwise positive. In EX+ the mass is moved toward positive y, in EY+ toward positive x.`,
    rowHead: 'Case',
    columns: ['V', 'T'],
  }
  const all = explainTable(table, want, context)
  return detail === 'table' ? [all] : [...results, all]
}

/** How the moment comes together where the forces of several levels act. */
function momentTable(
  level: string,
  { case: { name }, moment, moments }: CaseResult,
  context: Context,
): readonly Piece[] {
  if (!moments) return []
  const want = {
    id: `${level}.moments.${name}`,
    caption: `Moment of each level's force about the centre of rigidity of ${verbatim(level)}, case ${caseOnPage(name)}.`,
    rowHead: 'Level',
    columns: moments.columns.map(({ sym }) => sym.name),
    sums: { T: moment },
  }
  return [explainTable(moments, want, context)]
}

export function explainWallShears(
  { level, cases }: Distribution,
  shown: CaseResult,
  walls: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  if (isTied(shown)) return explainTiedShears(level, shown, walls, detail, context)
  const steps = walls.flatMap(wall => shearSteps(shown, wall, detail).map(value => explainValue(value, context)))
  if (detail === 'result') return steps
  const { name } = shown.case
  const others = cases.length > 1 ? '; the other cases are worked in the same way' : ''
  const table = explainTable(
    shown.walls,
    {
      id: `${level}.shears.${name}`,
      caption: `Direct and torsional shear of the walls of ${verbatim(level)} in case ${caseOnPage(name)}${others}.`,
      rowHead: 'Wall',
      columns: ['k', 'c', 's', 'rho', 'V_d', 'V_t', 'V'],
    },
    context,
  )
  const moved = isSkewed(shown) ? [shown.u, shown.v].map(value => explainValue(value, context)) : []
  return detail === 'table' ? [table] : [...moved, ...steps, table]
}

/** Skewed walls share direct shear through the displacement of the centre of rigidity. */
const isSkewed = ({ walls }: CaseResult): boolean => walls.column('V_d').formula?.symbols.has('u_0') ?? false

function shearSteps({ walls }: CaseResult, wall: string, detail: Detail): readonly Value[] {
  const at = walls.rows.indexOf(wall)
  if (at === -1) return []
  return (detail === 'result' ? ['V'] : ['V_d', 'V_t', 'V']).map(name => walls.column(name).cell(at))
}

export function explainDesignShears(
  { level, design, governingCase, governingWall }: Distribution,
  walls: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const steps = walls.flatMap(wall => {
    const at = design.rows.indexOf(wall)
    return at === -1 ? [] : ['V', 'v'].map(name => explainValue(design.column(name).cell(at), context))
  })
  if (detail === 'result') return steps
  const columns = design.columns.map(({ sym }) => sym.name).filter(name => name !== 'L' && name !== 'v')
  const cases = design.rows.map((_, i) => caseOnPage(governingCase(i).text))
  const table = explainTable(
    design,
    {
      id: `${level}.design`,
      caption: `Shear of each wall of ${verbatim(level)} in every case, and its design shear. ${verbatim(design.rows[governingWall] ?? '')} has the largest shear per length and governs.`,
      rowHead: 'Wall',
      columns: [...columns, 'L', 'v'],
      governs: governingWall,
      words: [{ head: 'Case', cells: cases }],
    },
    context,
  )
  return detail === 'table' ? [table] : [table, ...steps]
}

export function explainDisplacement(
  level: string,
  all: readonly Displacement[],
  shown: readonly Displacement[],
  detail: Detail,
  display: Display,
  context: Context,
): readonly Piece[] {
  if (detail === 'result') return shown.map(({ governing }) => explainValue(governing.value, context))
  const worked = shown.flatMap(each => displacedPoints(level, each, detail, context))
  const drift = caseTable(
    all.map(({ result }) => result),
    display,
  ).take(
    sym('delta', '\\delta', 'displacement'),
    all.map(({ governing }) => governing.value),
  )
  const want = {
    id: `${level}.drift`,
    caption: `Largest displacement of a corner of ${verbatim(level)} along the force in each case, relative to the foot of its walls.`,
    rowHead: 'Case',
    columns: ['delta'],
    words: [{ head: 'Corner', cells: all.map(({ governing }) => governing.corner) }],
  }
  return [...worked, explainTable(drift, want, context)]
}

/** The movement of one case: at the centre of rigidity, at the centre of mass, at the governing corner, and all in a table. */
function displacedPoints(
  level: string,
  { points, result, governing }: Displacement,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const { name, axis } = result.case
  const at = points.rows.indexOf(governing.corner)
  const [dx, dy] = [points.column('delta_x'), points.column('delta_y')]
  const corner = (axis === 'x' ? dx : dy).cell(at)
  const steps = [result.u, result.v, result.phi, dx.cell(0), dy.cell(0), corner].map(value =>
    explainValue(value, context),
  )
  const want = {
    id: `${level}.displacement.${name}`,
    caption: `Displacement of the centre of mass and of the corners of ${verbatim(level)} in case ${caseOnPage(name)}.`,
    rowHead: 'Point',
    columns: ['x', 'y', 'delta_x', 'delta_y'],
    governs: at,
  }
  const table = explainTable(points, want, context)
  return detail === 'table' ? [table] : [...steps, table]
}

const resisted = {
  x: sym('R_x', '\\sum V\\,c', 'force'),
  y: sym('R_y', '\\sum V\\,s', 'force'),
  M: sym('R_M', '\\sum V\\,r', 'moment'),
}
const applied = sym('M_o', 'M_o', 'moment')

export function explainEquilibrium(
  distribution: Distribution,
  detail: Detail,
  display: Display,
  context: Context,
): readonly Piece[] {
  const { level, cases } = distribution
  const table = caseTable(cases, display)
    .take(
      V,
      cases.map(({ shear }) => shear),
    )
    .take(
      resisted.x,
      cases.map(({ residual }) => residual.resisted.x),
    )
    .take(
      resisted.y,
      cases.map(({ residual }) => residual.resisted.y),
    )
    .take(
      applied,
      cases.map(({ residual }) => residual.appliedMoment),
    )
    .take(
      resisted.M,
      cases.map(({ residual }) => residual.resisted.M),
    )
  for (const { residual } of cases) context.roots.set(residual.ratio.id, residual.ratio)
  const residuals = cases.map(({ residual }) => residualOnPage(residual.ratio, context))
  const check = shownCheck(equilibriumCheck(distribution, context), context)
  if (detail === 'result') return [check]
  return [
    explainTable(
      table,
      {
        id: `${level}.equilibrium`,
        caption: `What acts on ${verbatim(level)} and what its walls resist, moments about the origin. The residual is the largest difference over the storey shear.`,
        rowHead: 'Case',
        columns: ['V', 'R_x', 'R_y', 'M_o', 'R_M'],
        words: [{ head: 'Residual', cells: residuals, ids: cases.map(({ residual }) => residual.ratio.id) }],
      },
      context,
    ),
    check,
  ]
}

/** The check of the case with the largest residual. */
export const equilibriumCheck = ({ level, cases }: Distribution, context: Context): Check =>
  residualCheck(
    `${level}.equilibrium`,
    `Equilibrium of ${verbatim(level)}, largest residual`,
    cases.map(({ residual }) => residual.ratio),
    level,
    context,
  )
