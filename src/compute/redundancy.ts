/** Redundancy of a storey: each of its walls, and each line of several walls, taken away in turn and the rest solved again. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout } from '../base/work.ts'
import { strength as stated } from '../model/walls.ts'
import { shearIn } from './case-shear.ts'
import type { Axis } from './cases.ts'
import type { CaseResult, Distribution } from './distribution.ts'
import type { Plan } from './plan.ts'
import {
  type Fallen,
  isFallen,
  linesOf,
  nothingRemoved,
  type Remainder,
  removals,
  type StoreyToRemoveFrom,
} from './removal.ts'
import type { Rigidity } from './rigidity.ts'
import { h } from './stiffness.ts'
import { c, L, s } from './symbols.ts'

/** A storey without a wall or a line of walls. */
export interface Removed {
  /** The walls taken away, joined by +. */
  readonly name: string
  readonly walls: readonly string[]
  readonly stands: boolean
}

export interface Redundancy {
  readonly level: string
  /** The axes along which a force is stated. */
  readonly axes: readonly Axis[]
  /** Strength of each wall along x and y, and its height over its length where it is known. */
  readonly walls: Tabulation
  readonly sums: Readonly<Record<Axis, Value>>
  /** True where the strength of every wall is stated; else it counts by its length. */
  readonly strengthStated: boolean
  readonly removed: readonly Removed[]
  /** What each removal takes of the strength along x and y. */
  readonly losses: Tabulation
  /** Drifts of the edges and their ratio, first with all walls, then without each that may go. */
  readonly turning: Tabulation
  /** The case of each ratio. */
  readonly cases: Readonly<Record<Axis, readonly string[]>>
}

/** The row of all walls standing. */
export const ALL_STAND = 'none'

const slender = sym('h_L', 'h/L', 'number')
const strong = {
  stated: { x: sym('R_x', 'R_x', 'force'), y: sym('R_y', 'R_y', 'force') },
  byLength: { x: sym('R_x', 'L_x', 'length'), y: sym('R_y', 'L_y', 'length') },
}
const total = {
  stated: { x: sym('sum_R_x', '\\sum R_x', 'force'), y: sym('sum_R_y', '\\sum R_y', 'force') },
  byLength: { x: sym('sum_R_x', '\\sum L_x', 'length'), y: sym('sum_R_y', '\\sum L_y', 'length') },
}
const loss = { x: sym('loss_x', 'r_x', 'share'), y: sym('loss_y', 'r_y', 'share') }
const edge = {
  x: [sym('Delta_x1', '\\Delta_{x,1}', 'displacement'), sym('Delta_x2', '\\Delta_{x,2}', 'displacement')],
  y: [sym('Delta_y1', '\\Delta_{y,1}', 'displacement'), sym('Delta_y2', '\\Delta_{y,2}', 'displacement')],
} as const
const ratio = { x: sym('eta_x', '\\eta_x', 'number'), y: sym('eta_y', '\\eta_y', 'number') }

const ALONG = 'part of the strength that acts along the axis'
const LOST = 'share of the storey’s strength'
const TURN = 'larger drift of two edges over the mean of both'

const slenderness = formula({ gives: slender, body: 'h/L', of: [h, L], source: 'geometry' })

const along = (axis: Axis, kind: 'stated' | 'byLength') => {
  const [whole, direction] = [kind === 'stated' ? stated : L, axis === 'x' ? c : s]
  const body = `${whole.name}*abs(${direction.name})`
  return formula({ gives: strong[kind][axis], body, of: [whole, direction], source: ALONG })
}
const lost = (axis: Axis, kind: 'stated' | 'byLength') => {
  const [gone, all] = [strong[kind][axis], total[kind][axis]]
  return formula({ gives: loss[axis], body: `${gone.name}/${all.name}`, of: [gone, all], source: LOST })
}
const eachAxis = <T>(of: (axis: Axis) => T): Readonly<Record<Axis, T>> => ({ x: of('x'), y: of('y') })
const formulas = {
  stated: { along: eachAxis(axis => along(axis, 'stated')), lost: eachAxis(axis => lost(axis, 'stated')) },
  byLength: { along: eachAxis(axis => along(axis, 'byLength')), lost: eachAxis(axis => lost(axis, 'byLength')) },
  turn: eachAxis(axis => {
    const [one, other] = edge[axis]
    const body = `max(abs(${one.name}), abs(${other.name}))/abs((${one.name} + ${other.name})/2)`
    return formula({ gives: ratio[axis], body, of: [one, other], source: TURN })
  }),
}

/** What each wall has beside its stiffness. */
export interface WallStrength {
  readonly name: string
  readonly strength?: Value
  readonly height?: Value
}

/** @param walls all walls of the level @param alone the storey worked on its own */
export function workRedundancy(
  rigidity: Rigidity,
  walls: readonly WallStrength[],
  alone: Distribution,
  plan: Plan,
  display: Display,
): Redundancy {
  const { level } = rigidity
  const kind = walls.every(({ strength }) => strength) ? 'stated' : 'byLength'
  const table = wallTable(rigidity, walls, kind, display)
  const sums = eachAxis(axis => table.sum(`R_${axis}`, total[kind][axis], `${level}.${keys[kind]}.${axis}`))
  const storey = storeyOf(rigidity, table, alone, plan)
  const groups = groupsOf(storey)
  const made = removals(storey, groups)
  const all = nothingRemoved(storey)
  // A level with a centre of rigidity stands.
  if (!made.ok || isFallen(all)) throw new Error(`${level} does not stand`)
  const names = groups.map(group => group.map(w => table.rows[w] ?? ''))
  const removed = made.value.map(
    (result, i): Removed => ({
      name: names[i]?.join('+') ?? '',
      walls: names[i] ?? [],
      stands: !isFallen(result),
    }),
  )
  const standing = made.value.flatMap((result, i) =>
    isFallen(result) ? [] : [{ name: removed[i]?.name ?? '', result }],
  )
  const axes = (['x', 'y'] as const).filter(axis => all.turning[axis])
  const rows = [{ name: ALL_STAND, result: all }, ...standing]
  return {
    level,
    axes,
    walls: table,
    sums,
    strengthStated: kind === 'stated',
    removed,
    losses: lossTable(level, table, removed, sums, kind, display),
    turning: turningTable(level, rows, axes, alone, display),
    cases: eachAxis(axis => rows.map(({ result }) => caseOf(result, axis, alone))),
  }
}

type Kind = 'stated' | 'byLength'

/** What stands for strength has a name of its own in the ids. */
const keys: Readonly<Record<Kind, string>> = { stated: 'strength', byLength: 'lengths' }

function wallTable(rigidity: Rigidity, walls: readonly WallStrength[], kind: Kind, display: Display): Tabulation {
  const { level, springs, walls: known } = rigidity
  const of = (name: string) => walls.find(other => other.name === name)
  const table = new Tabulation(known.rows, (row, key) => `${level}.wall.${row}.${key}`, display)
    .takeColumn(known.column('c'))
    .takeColumn(known.column('s'))
    .take(
      L,
      springs.map(({ L }) => L),
    )
  const heights = springs.flatMap(({ name }) => of(name)?.height ?? [])
  if (heights.length === springs.length) table.take(h, heights).work(slenderness, { h: 'h', L: 'L' }, 'slenderness')
  if (kind === 'stated')
    table.take(
      stated,
      springs.flatMap(({ name }) => of(name)?.strength ?? []),
    )
  const whole = kind === 'stated' ? stated.name : L.name
  return table
    .work(formulas[kind].along.x, { [whole]: whole, c: 'c' }, `${keys[kind]}.x`)
    .work(formulas[kind].along.y, { [whole]: whole, s: 's' }, `${keys[kind]}.y`)
}

/** The storey about its centre of rigidity, with the edges of the plan across each axis. */
function storeyOf(rigidity: Rigidity, table: Tabulation, alone: Distribution, { corners }: Plan): StoreyToRemoveFrom {
  const number = (column: string, w: number) => rigidity.walls.column(column).numbers[w] ?? Number.NaN
  const strengths = [table.column('R_x').numbers, table.column('R_y').numbers]
  const edges = (of: readonly number[], centre: number): readonly [number, number] => [
    Math.min(...of) - centre,
    Math.max(...of) - centre,
  ]
  return {
    walls: table.rows.map((_, w) => ({
      c: number('c', w),
      s: number('s', w),
      r: number('rho', w),
      k: number('k', w),
      strength: Math.hypot(...strengths.map(all => all[w] ?? Number.NaN)),
    })),
    cases: turningCases(alone).map(result => {
      const { x: Vx, y: Vy } = shearIn(result)
      return { axis: axisOf(result), Vx, Vy, T: result.moment.si }
    }),
    edges: {
      x: edges(
        corners.map(({ y }) => y.si),
        rigidity.y.si,
      ),
      y: edges(
        corners.map(({ x }) => x.si),
        rigidity.x.si,
      ),
    },
  }
}

/** Redundancy is a matter of earthquakes: wind counts where nothing else acts, and then along one axis at a time. */
function turningCases({ cases }: Distribution): readonly CaseResult[] {
  const along = cases.filter(result => result.case.parts.length === 1)
  const seismic = along.filter(result => result.case.loading === 'seismic')
  return seismic.length > 0 ? seismic : along
}

function axisOf({ case: { parts, name } }: CaseResult): Axis {
  const [part] = parts
  if (!part) throw new Error(`case ${name} acts along no axis`)
  return part.axis
}

/** Each wall, and then each line of more than one. */
function groupsOf({ walls }: StoreyToRemoveFrom): readonly (readonly number[])[] {
  return [...walls.map((_, w) => [w]), ...linesOf(walls).filter(({ length }) => length > 1)]
}

function lossTable(
  level: string,
  walls: Tabulation,
  removed: readonly Removed[],
  sums: Redundancy['sums'],
  kind: Kind,
  display: Display,
): Tabulation {
  const idOf = (row: string, key: string) => `${level}.without.${row}.${key}`
  const gone = (axis: Axis) =>
    removed.map((group): Value => {
      const cells = group.walls.map(wall => walls.column(`R_${axis}`).cell(walls.rows.indexOf(wall)))
      const [only, ...more] = cells
      if (only && more.length === 0) return only
      const symbol = strong[kind][axis]
      const id = idOf(group.name, `${keys[kind]}.${axis}`)
      return {
        ...new Tabulation(group.walls, idOf, display).take(symbol, cells).sum(symbol.name, symbol, id),
        tex: texAbout(symbol.tex, group.name),
      }
    })
  return new Tabulation(
    removed.map(({ name }) => name),
    idOf,
    display,
  )
    .take(strong[kind].x, gone('x'))
    .work(formulas[kind].lost.x, { R_x: 'R_x', sum_R_x: sums.x }, 'loss.x')
    .take(strong[kind].y, gone('y'))
    .work(formulas[kind].lost.y, { R_y: 'R_y', sum_R_y: sums.y }, 'loss.y')
}

interface StandingRow {
  readonly name: string
  readonly result: Remainder
}

function turningTable(
  level: string,
  rows: readonly StandingRow[],
  axes: readonly Axis[],
  alone: Distribution,
  display: Display,
): Tabulation {
  const table = new Tabulation(
    rows.map(({ name }) => name),
    (row, key) => `${level}.without.${row}.${key}`,
    display,
  )
  for (const axis of axes) {
    for (const at of [0, 1] as const)
      table.take(
        edge[axis][at],
        rows.map(({ name, result }) =>
          solved(
            `${level}.without.${name}.edge.${axis}.${at + 1}`,
            edge[axis][at],
            result.turning[axis]?.drifts[at] ?? Number.NaN,
            `solved ${name === ALL_STAND ? 'with all walls' : `without ${name}`}, case ${caseOf(result, axis, alone)}`,
            name,
            display,
          ),
        ),
      )
    const [one, other] = edge[axis]
    table.work(formulas.turn[axis], { [one.name]: one.name, [other.name]: other.name }, `ratio.${axis}`)
  }
  return table
}

function solved(id: string, of: Sym, si: number, what: string, about: string, display: Display): Value {
  return {
    id,
    tex: texAbout(of.tex, about),
    si,
    ...shownAs(of, display),
    origin: { kind: 'measured', what, spans: [] },
  }
}

const caseOf = (result: Remainder | Fallen, axis: Axis, alone: Distribution): string =>
  isFallen(result) ? '' : (turningCases(alone)[result.turning[axis]?.caseIdx ?? -1]?.case.name ?? '')
