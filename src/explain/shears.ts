/** Torsion, wall shears, design shears, displacement and equilibrium. */

import { sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs } from '../base/work.ts'
import { type Axis, caseOnPage } from '../compute/cases.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { CaseResult, Distribution } from '../compute/distribution.ts'
import { T, V, Vx, Vy } from '../compute/symbols.ts'
import { isTied } from '../compute/tied.ts'
import { casesInWords } from './casewords.ts'
import type { Context } from './context.ts'
import { explainTiedShears } from './continuous.ts'
import { explainValue } from './equation.ts'
import type { Detail } from './request.ts'
import { residualCheck, residualOnPage } from './residual.ts'
import type { Check, Piece } from './sheet.ts'
import { explainTable } from './table.ts'

const caseTable = (cases: readonly CaseResult[], display: Display): Tabulation =>
  new Tabulation(
    cases.map(each => caseOnPage(each.case.name)),
    (row, key) => `${key}.${row}`,
    display,
  )

/** Takes the storey shears into a table of cases: one column where every case is along one axis, else one along each. */
function takeShears(
  level: string,
  table: Tabulation,
  cases: readonly CaseResult[],
  display: Display,
): readonly string[] {
  if (cases.every(each => each.case.parts.length === 1)) {
    table.take(
      V,
      cases.flatMap(({ shear: { x, y } }) => x ?? y ?? []),
    )
    return [V.name]
  }
  const letters = { x: Vx, y: Vy }
  const none = (axis: Axis, name: string): Value => ({
    id: `${level}.storey.${axis}.${name}`,
    tex: letters[axis].tex,
    si: 0,
    ...shownAs(letters[axis], display),
    origin: { kind: 'measured', what: `no force of ${caseOnPage(name)} acts along ${axis}`, spans: [] },
  })
  return (['x', 'y'] as const).map(axis => {
    table.take(
      letters[axis],
      cases.map(({ shear, case: { name } }) => shear[axis] ?? none(axis, name)),
    )
    return letters[axis].name
  })
}

export function explainTorsion(
  { level, cases }: Distribution,
  shown: readonly CaseResult[],
  detail: Detail,
  display: Display,
  context: Context,
): readonly Piece[] {
  const results = shown.flatMap(each => [
    ...(detail === 'full' ? [...shareSteps(each, context), ...momentTable(level, each, context)] : []),
    explainValue(each.moment, context),
  ])
  if (detail === 'result') return results
  const table = caseTable(cases, display)
  const shears = takeShears(level, table, cases, display)
  table.take(
    T,
    cases.map(({ moment }) => moment),
  )
  const want = {
    id: `${level}.torsion`,
    caption: `Storey shear and its moment about the centre of rigidity of ${verbatim(level)}, counter-clockwise positive. ${casesInWords(cases.map(each => each.case))}`,
    rowHead: 'Case',
    columns: [...shears, 'T'],
  }
  const all = explainTable(table, want, context)
  return detail === 'table' ? [all] : [...results, all]
}

/** What a case takes of the storey shears, where it does not take them whole. */
const shareSteps = ({ case: { name }, shear: { x, y } }: CaseResult, context: Context): readonly Piece[] =>
  [x, y].flatMap(shear => (shear?.id.endsWith(`.${name}`) ? [explainValue(shear, context)] : []))

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
  const { name } = result.case
  const at = points.rows.indexOf(governing.corner)
  const [dx, dy] = [points.column('delta_x'), points.column('delta_y')]
  const corner = governing.value
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
  const shears = takeShears(level, table, cases, display)
  table
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
  for (const { residual } of cases) context.root(residual.ratio)
  const residuals = cases.map(({ residual }) => residualOnPage(residual.ratio, context))
  const check = equilibriumCheck(distribution, context)
  if (detail === 'result') return [check]
  return [
    explainTable(
      table,
      {
        id: `${level}.equilibrium`,
        caption: `What acts on ${verbatim(level)} and what its walls resist, moments about the origin. The residual is the largest difference over the storey shear.`,
        rowHead: 'Case',
        columns: [...shears, 'R_x', 'R_y', 'M_o', 'R_M'],
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
