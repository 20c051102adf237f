/** Walls that run through the levels: how the floors move, and what each wall carries down its height. */
import { sym } from '../base/formula.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { type TableColumn, Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { Distribution } from '../compute/distribution.ts'
import type { LevelWork } from '../compute/level.ts'
import { phi, u0, v0 } from '../compute/symbols.ts'
import { beamColumns, type TiedDistribution, type TiedResult } from '../compute/tied.ts'
import { moved, storeyHeight } from '../compute/tied-formulas.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { diagnose } from '../read/text.ts'
import { casesShown, wallsShown } from './chosen.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail, Request } from './request.ts'
import { residualCheck, residualOnPage } from './residual.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

/** The levels from the top down, each with its continuous walls and with its storey on its own. */
interface Storey {
  readonly level: LevelWork
  readonly tied: TiedDistribution
  readonly alone: Distribution['cases']
}

/** @param level the level whose governing wall and case are shown; the lowest when none is named */
export function explainContinuous(
  sheet: Worksheet,
  level: LevelWork | undefined,
  request: Request,
  context: Context,
): Result<readonly Piece[]> {
  const storeys = storeysOf(sheet, request)
  if (!storeys.ok) return storeys
  const at = level ?? storeys.value.at(-1)?.level
  if (!at) return good([])
  const [walls, cases] = [wallsShown(at, request), casesShown(at, request)]
  if (!walls.ok) return walls
  if (!cases.ok) return cases
  return good(cases.value.flatMap(each => caseOf(storeys.value, each.case.name, walls.value, request.detail, context)))
}

function storeysOf(sheet: Worksheet, { at }: Request): Result<readonly Storey[]> {
  const lines = sheet.levelLines()
  if (!lines.ok) return lines
  if (!sheet.levels.some(level => level.tied())) return bad([notContinuous(at)])
  return all(
    lines.value.flatMap(({ name }): readonly Result<Storey>[] => {
      const level = sheet.levels.find(other => other.name === name)
      if (!level) return []
      const [tied, alone] = [level.tied(), level.alone()]
      if (!tied) return []
      if (!tied.ok) return [tied]
      return [alone.ok ? good({ level, tied: tied.value, alone: alone.value.cases }) : alone]
    }),
  )
}

const notContinuous = (at: Parameters<typeof diagnose>[2]) =>
  diagnose(
    'error',
    'walls-not-continuous',
    at,
    'walls are worked storey by storey',
    'Write walls: continuous in the block levels to have walls of one name worked as one.',
  )

function caseOf(
  storeys: readonly Storey[],
  name: string,
  walls: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const results = storeys.map(({ tied }) => required(tied.cases.find(each => each.case.name === name)))
  const checks = meetingCheck(storeys, context)
  context.check(checks)
  const carried = walls.flatMap(wall => wallPieces(storeys, results, wall, detail, context))
  if (detail === 'result') return [...carried, checks]
  return [movementTable(storeys, results, name, context), ...carried, checks]
}

const meetingCheck = (storeys: readonly Storey[], context: Context) =>
  residualCheck(
    'walls.meeting',
    'Moments of continuous walls above and below each level, largest residual',
    storeys.flatMap(({ tied }) => tied.cases.map(each => each.tied.meeting)),
    'M',
    context,
  )

const levelTable = (storeys: readonly Storey[]): Tabulation =>
  new Tabulation(
    storeys.map(({ level }) => level.name),
    (row, key) => `${row}.${key}`,
    { system: 'US', relative: false },
  )

function movementTable(
  storeys: readonly Storey[],
  results: readonly TiedResult[],
  name: string,
  context: Context,
): Piece {
  const table = levelTable(storeys)
    .take(
      u0,
      results.map(({ u }) => u),
    )
    .take(
      v0,
      results.map(({ v }) => v),
    )
    .take(
      phi,
      results.map(each => each.phi),
    )
    .take(
      moved.x,
      results.map(({ tied }) => tied.moved.x),
    )
    .take(
      moved.y,
      results.map(({ tied }) => tied.moved.y),
    )
    .take(
      moved.turn,
      results.map(({ tied }) => tied.moved.turn),
    )
  const residual = (values: readonly Value[]) => ({
    cells: values.map(value => residualOnPage(value, context)),
    ids: values.map(({ id }) => id),
  })
  for (const { residual, tied } of results) for (const value of [residual.ratio, tied.meeting]) context.root(value)
  return explainTable(
    table,
    {
      id: `walls.movement.${name}`,
      caption: `Drift of each storey at its centre of rigidity, and movement of each level at its centre of mass against the foundation, case ${caseOnPage(name)}: solved for all storeys together. Put back, the walls balance each storey, and their moments meet at each level, to the residuals shown.`,
      rowHead: 'Level',
      columns: ['u_0', 'v_0', 'phi', 'd_x', 'd_y', 'Theta'],
      words: [
        { head: 'Residual, shears', ...residual(results.map(each => each.residual.ratio)) },
        { head: 'Residual, moments', ...residual(results.map(({ tied }) => tied.meeting)) },
      ],
    },
    context,
  )
}

const shearAlone = sym('V_alone', 'V_{\\text{alone}}', 'force')

/** One wall from its head to the foundation; its lowest storey as steps. */
function wallPieces(
  storeys: readonly Storey[],
  results: readonly TiedResult[],
  wall: string,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const run = storeys.flatMap((storey, i) => {
    const result = required(results[i])
    const beams = result.tied.beams
    const table = beams.rows.includes(wall) ? beams : result.tied.springs
    return table.rows.includes(wall) ? [{ storey, result, table, at: table.rows.indexOf(wall) }] : []
  })
  const lowest = run.at(-1)
  if (!lowest) return []
  const through = lowest.result.tied.beams.rows.includes(wall)
  const columns: readonly string[] = through ? beamColumns : ['k', 'delta', 'V']
  const cell = ({ table, at }: (typeof run)[number], column: string) => table.column(column).cell(at)
  const full = through ? ['EI', 'GA', 'Phi', 'a', 'delta', 'V', 'M_t', 'M_b'] : ['k', 'delta', 'V']
  const steps = (detail === 'result' ? ['V', ...(through ? ['M_b'] : [])] : full).map(column => cell(lowest, column))
  const equations = [...(detail === 'result' ? [] : [lowest.storey.tied.height]), ...steps].map(value =>
    explainValue(value, context),
  )
  if (detail === 'result') return equations
  const { name } = lowest.result.case
  const table = levelTable(run.map(({ storey }) => storey)).take(
    storeyHeight,
    run.map(({ storey }) => storey.tied.height),
  )
  for (const column of columns)
    table.take(
      symbolOf(lowest.table.column(column)),
      run.map(each => cell(each, column)),
    )
  table.take(
    shearAlone,
    run.map(({ storey }) => shearOfAlone(storey, name, wall)),
  )
  const told = explainTable(
    table,
    {
      id: `walls.${wall}.${name}`,
      caption: `Wall ${verbatim(wall)} down its height in case ${caseOnPage(name)}. Beside its shear stands the one that it has where each storey is worked on its own.`,
      rowHead: 'Storey',
      columns: ['h_s', ...columns, 'V_alone'],
    },
    context,
  )
  const moments = through ? [momentTable(run, wall, context)] : []
  return detail === 'table' ? [told, ...moments] : [told, ...equations, ...moments]
}

const symbolOf = ({ sym }: TableColumn) => sym

function shearOfAlone({ alone }: Storey, name: string, wall: string): Value {
  const walls = required(alone.find(each => each.case.name === name)).walls
  return walls.column('V').cell(walls.rows.indexOf(wall))
}

/** The moment at the foot of each storey in every case. */
function momentTable(
  run: readonly { readonly storey: Storey; readonly at: number }[],
  wall: string,
  context: Context,
): Piece {
  const cases = required(run[0]).storey.tied.cases
  const table = levelTable(run.map(({ storey }) => storey))
  const names = cases.map(({ case: { name } }, i) => {
    const symbol = sym(`M_${i}`, texAbout('M', caseOnPage(name)), 'moment')
    table.take(
      symbol,
      run.map(({ storey, at }) => required(storey.tied.cases[i]).tied.beams.column('M_b').cell(at)),
    )
    return symbol.name
  })
  const governs = run.map(({ storey, at }) => {
    const size = (each: TiedResult) => Math.abs(each.tied.beams.column('M_b').numbers[at] ?? 0)
    const first = required(storey.tied.cases[0])
    return caseOnPage(storey.tied.cases.reduce((a, b) => (size(b) > size(a) * (1 + 1e-12) ? b : a), first).case.name)
  })
  return explainTable(
    table,
    {
      id: `walls.${wall}.moments`,
      caption: `Overturning moment of wall ${verbatim(wall)} at the foot of each storey in every case, and the case of the largest.`,
      rowHead: 'Storey',
      columns: names,
      words: [{ head: 'Case', cells: governs }],
    },
    context,
  )
}

/** Shears of the walls of one level in one case, from the movements that the solution of all storeys gave. */
export function explainTiedShears(
  level: string,
  { case: { name }, tied, u, v, phi: turn }: TiedResult,
  walls: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const { beams, springs } = tied
  const steps = walls.flatMap(wall => {
    const table = beams.rows.includes(wall) ? beams : springs
    const at = table.rows.indexOf(wall)
    if (at === -1) return []
    const columns = detail === 'result' ? ['V'] : ['delta', 'V']
    return columns.map(column => explainValue(table.column(column).cell(at), context))
  })
  if (detail === 'result') return steps
  const tables = [
    ...(beams.rows.length > 0
      ? [
          explainTable(
            beams,
            {
              id: `${level}.shears.${name}`,
              caption: `Continuous walls of ${verbatim(level)} in case ${caseOnPage(name)}: drift of the storey along each, rotations at its foot and head, shear and moments.`,
              rowHead: 'Wall',
              columns: ['c', 's', 'rho', ...beamColumns],
            },
            context,
          ),
        ]
      : []),
    ...(springs.rows.length > 0
      ? [
          explainTable(
            springs,
            {
              id: `${level}.shears.stated.${name}`,
              caption: `Walls of stated stiffness of ${verbatim(level)} in case ${caseOnPage(name)}.`,
              rowHead: 'Wall',
              columns: ['c', 's', 'rho', 'k', 'delta', 'V'],
            },
            context,
          ),
        ]
      : []),
  ]
  const movement = [u, v, turn].map(value => explainValue(value, context))
  return detail === 'table' ? tables : [...movement, ...steps, ...tables]
}

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a level of continuous walls lacks one of its cases')
  return value
}
