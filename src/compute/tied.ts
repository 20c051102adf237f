/**
 * Walls that run through several levels, tied by rigid floors and solved with all storeys at once.
 *
 * Each storey's shears and torsion are those of the storey-by-storey work. The drifts of all storeys and the rotations of
 * all walls are solved together (`stack.ts`), and put back: wall shears follow from them by the slope-deflection
 * formulas printed, must balance the storey, and the moments of a wall must meet at each level.
 */
import type { Formula, Sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'
import { shearIn } from './case-shear.ts'
import { type Case, caseOnPage } from './cases.ts'
import { type CaseResult, type Distribution, designed } from './distribution.ts'
import { residualOf } from './equilibrium.ts'
import type { Acting } from './loading.ts'
import type { Rigidity } from './rigidity.ts'
import { bending, shearing, type WallSection } from './section.ts'
import { drifts, type Stack, stackOf, wallForces } from './stack.ts'
import { c, k, phi, rho, s, u0, V, v0 } from './symbols.ts'
import { apart, axisMoved, foot, greatest, head, moved, tiedFormulas } from './tied-formulas.ts'
import { axisOf, type NamedTie, type StackAxis, tiesOf } from './ties.ts'

/** A level as the continuous model takes it. */
export interface TiedLevel {
  readonly level: string
  readonly elevation: Value
  readonly mass: { readonly x: Value; readonly y: Value }
  readonly rigidity: Rigidity
  /** Worked on its own: its storey shears and torsions are taken. */
  readonly alone: Distribution
  /** Of its walls with a construction; one of stated stiffness has none and resists storey by storey. */
  readonly sections: ReadonlyMap<string, WallSection>
  readonly display: Display
}

/** What a case adds to a storey when walls are continuous. */
export interface TiedCase {
  /** Walls that run through: E I, G A_v, a, the drift along each, rotations, V and moments. */
  readonly beams: Tabulation
  /** Walls of stated stiffness. */
  readonly springs: Tabulation
  /** Movement of the centre of mass and turn of the level against the foundation. */
  readonly moved: { readonly x: Value; readonly y: Value; readonly turn: Value }
  /** Where the moments of a wall differ most at this level, over its largest moment. */
  readonly meeting: Value
}

export interface TiedResult extends CaseResult {
  readonly tied: TiedCase
}

/** True for a case of walls that run through the levels. */
export const isTied = (result: CaseResult): result is TiedResult => 'tied' in result

export interface TiedDistribution extends Distribution {
  readonly cases: readonly TiedResult[]
  /** Height of the storey. */
  readonly height: Value
}

/** The columns of a table of walls that run through, in the order in which they are worked. */
export const beamColumns = ['EI', 'GA', 'a', 'delta', 'theta_b', 'theta_t', 'V', 'M_t', 'M_b'] as const

/** @param levels from the top down, each standing on the next; walls with a section stand from the lowest level up */
export function tieLevels(levels: readonly TiedLevel[]): readonly TiedDistribution[] {
  const rising = [...levels].reverse()
  const heights = rising.map((each, i) => heightOf(each, rising[i - 1]))
  const axis = axisOf(rising)
  const ties = tiesOf(rising, axis)
  const made = stackOf(
    rising.length,
    ties.map(({ tie }) => tie),
  )
  // Walls that hold each storey on its own hold all of them together.
  if (!made.ok) throw new Error(`storey ${made.because.storey} is loose`)
  const cases = (rising[0]?.alone.cases ?? []).map(({ case: each }) => solveCase(each, rising, made.value, ties, axis))
  return rising
    .map((each, i): TiedDistribution => {
      const height = heights[i]
      if (!height) throw new Error(`${each.level} has no height`)
      const results = cases.map(solved => resultOf(each, i, height, solved))
      return { ...each.alone, cases: results, ...designed(each.rigidity, results, each.display), height }
    })
    .reverse()
}

function heightOf({ level, elevation, display }: TiedLevel, under: TiedLevel | undefined): Value {
  const id = `${level}.height`
  return under
    ? work(id, tiedFormulas.height, { z: elevation, z_b: under.elevation }, display, [level])
    : work(id, tiedFormulas.lowest, { z: elevation }, display, [level])
}

/** The answer to one case: drifts of each storey at its centre of rigidity, and rotations of each wall, from the lowest up. */
interface Solved {
  readonly case: Case
  readonly drifts: readonly { readonly u: Value; readonly v: Value; readonly phi: Value }[]
  /** Rotation of each wall at the head of each storey. */
  readonly turned: ReadonlyMap<string, readonly Value[]>
  readonly moved: readonly TiedCase['moved'][]
  /** Largest moment of each wall, to compare with, in N·m. */
  readonly moments: ReadonlyMap<string, Float64Array>
}

function solveCase(
  each: Case,
  rising: readonly TiedLevel[],
  stack: Stack,
  ties: readonly NamedTie[],
  axis: StackAxis,
): Solved {
  const shears = new Float64Array(3 * rising.length)
  rising.forEach(({ alone }, i) => {
    const { x: Vx, y: Vy, origin } = actingOn(alone, each)
    shears.set([Vx, Vy, origin - axis.x * Vy + axis.y * Vx], 3 * i)
  })
  const drift = drifts(stack, shears)
  const what = `solved with all storeys together, case ${caseOnPage(each.name)}`
  const about = caseOnPage(each.name)
  const moves = rising.map(({ level, rigidity, display }, i) => {
    const [u = 0, v = 0, turn = 0] = drift.subarray(3 * i, 3 * i + 3)
    const value = (key: 'u' | 'v' | 'phi', of: Sym, si: number) =>
      answer(`${level}.${key}.${each.name}`, of, si, what, display, about)
    return {
      u: value('u', u0, u - turn * (rigidity.y.si - axis.y)),
      v: value('v', v0, v + turn * (rigidity.x.si - axis.x)),
      phi: value('phi', phi, turn),
    }
  })
  const turned = new Map<string, readonly Value[]>()
  const moments = new Map<string, Float64Array>()
  for (const { name, tie } of ties) {
    const forces = wallForces(tie, drift)
    if (!forces.turned) continue
    moments.set(name, forces.M)
    turned.set(
      name,
      rising.slice(0, forces.turned.length).map(({ level, display }, i) => {
        const id = `${level}.wall.${name}.theta.${each.name}`
        return answer(id, head, forces.turned?.[i] ?? Number.NaN, what, display, name, about)
      }),
    )
  }
  return { case: each, drifts: moves, turned, moved: movements(each, rising, moves), moments }
}

/** Shears of a storey in N and their moment about the origin in N·m. */
function actingOn({ cases, level }: Distribution, { name }: Case): StackAxis & { readonly origin: number } {
  const found = cases.find(each => each.case.name === name)
  if (!found) throw new Error(`${level} has no case ${name}`)
  return { ...shearIn(found), origin: found.residual.appliedMoment.si }
}

/** A number that the solution of many equations gives. */
function answer(id: string, of: Sym, si: number, what: string, display: Display, ...about: readonly string[]): Value {
  return {
    id,
    tex: texAbout(of.tex, ...about),
    si,
    ...shownAs(of, display),
    origin: { kind: 'measured', what, spans: [] },
  }
}

/** Levels against the foundation: the drifts of all storeys up to them, at the origin and from there at their centre of mass. */
function movements(
  { name }: Case,
  rising: readonly TiedLevel[],
  moves: Solved['drifts'],
): readonly TiedCase['moved'][] {
  const about = caseOnPage(name)
  const still = (of: Sym, level: string, display: Display): Value =>
    answer(`${level}.${of.name}.${name}`, of, 0, 'the foundation stands still', display, about)
  const first = rising[0]
  if (!first) return []
  let [X, Y, turn] = [
    still(axisMoved.x, 'foundation', first.display),
    still(axisMoved.y, 'foundation', first.display),
    still(moved.turn, 'foundation', first.display),
  ]
  return rising.map(({ level, mass, rigidity, display }, i) => {
    const move = moves[i]
    if (!move) throw new Error(`${level} does not move`)
    const { u, v, phi: turns } = move
    const step = (key: string, rule: Formula, inputs: Readonly<Record<string, Value>>) =>
      work(`${level}.${key}.${name}`, rule, inputs, display, [level, about])
    X = step('moved.origin.x', tiedFormulas.movedX, { D_xb: X, u_0: u, phi: turns, y_r: rigidity.y })
    Y = step('moved.origin.y', tiedFormulas.movedY, { D_yb: Y, v_0: v, phi: turns, x_r: rigidity.x })
    turn = step('moved.turn', tiedFormulas.turned, { Theta_b: turn, phi: turns })
    return {
      x: step('moved.x', tiedFormulas.massX, { D_x: X, Theta: turn, y_m: mass.y }),
      y: step('moved.y', tiedFormulas.massY, { D_y: Y, Theta: turn, x_m: mass.x }),
      turn,
    }
  })
}

function resultOf(at: TiedLevel, storey: number, height: Value, solved: Solved): TiedResult {
  const { level, alone, display } = at
  const { case: each } = solved
  const [own, move, moves] = [
    alone.cases.find(other => other.case.name === each.name),
    solved.drifts[storey],
    solved.moved[storey],
  ]
  if (!own || !move || !moves) throw new Error(`${level} was not solved for ${each.name}`)
  const beams = beamTable(at, storey, height, solved, move)
  const springs = springTable(at, each, move)
  const walls = wallTable(at, beams, springs)
  return {
    ...own,
    ...move,
    walls,
    residual: residualOf(level, each, walls, actingIn(alone, each), own.shear, display),
    tied: { beams, springs, moved: moves, meeting: meetingOf(at, storey, solved, beams) },
  }
}

/** The forces of the loading that a case is of. */
function actingIn({ loads, level }: Distribution, { loading }: Case): readonly Acting[] {
  const found = loads.find(each => each.loading === loading)
  if (!found) throw new Error(`${level} has no ${loading}`)
  return found.acting
}

/** The rows of a level's table of walls, and a column of some of them as values. */
function rowsOf({ level, rigidity, sections, display }: TiedLevel, built: boolean) {
  const rows = rigidity.walls.rows.filter(name => sections.has(name) === built)
  const picked = (column: string): readonly Value[] =>
    rows.map(name => rigidity.walls.column(column).cell(rigidity.walls.rows.indexOf(name)))
  const table = new Tabulation(rows, (row, key) => `${level}.wall.${row}.${key}`, display)
  for (const [of, column] of [
    [c, 'c'],
    [s, 's'],
    [rho, 'rho'],
  ] as const)
    table.take(of, picked(column))
  return { rows, table, picked }
}

type Move = Solved['drifts'][number]

function beamTable(at: TiedLevel, storey: number, h_s: Value, { case: each, turned }: Solved, move: Move): Tabulation {
  const { rows, table } = rowsOf(at, true)
  const section = (row: string) => required(at.sections.get(row))
  const name = each.name
  const about = [caseOnPage(name)]
  const held = (row: string): Value =>
    answer(`${at.level}.wall.${row}.held`, foot, 0, 'held by the foundation', at.display, row)
  return table
    .take(
      bending,
      rows.map(row => section(row).EI),
    )
    .take(
      shearing,
      rows.map(row => section(row).GA),
    )
    .work(tiedFormulas.shape, { EI: 'EI', GA: 'GA', h_s }, 'Phi')
    .work(tiedFormulas.sway, { EI: 'EI', h_s, Phi: 'Phi' }, 'a')
    .work(
      tiedFormulas.along,
      { c: 'c', u_0: move.u, s: 's', v_0: move.v, rho: 'rho', phi: move.phi },
      `delta.${name}`,
      about,
    )
    .take(
      foot,
      rows.map(row => (storey === 0 ? held(row) : required(turned.get(row)?.[storey - 1]))),
    )
    .take(
      head,
      rows.map(row => required(turned.get(row)?.[storey])),
    )
    .work(
      tiedFormulas.shear,
      { a: 'a', delta: 'delta', h_s, theta_b: 'theta_b', theta_t: 'theta_t' },
      `V.${name}`,
      about,
    )
    .work(tiedFormulas.head, { EI: 'EI', theta_t: 'theta_t', theta_b: 'theta_b', h_s, V: 'V' }, `Mt.${name}`, about)
    .work(tiedFormulas.foot, { M_t: 'M_t', V: 'V', h_s }, `M.${name}`, about)
}

function springTable(at: TiedLevel, { name }: Case, move: Move): Tabulation {
  const { table, picked } = rowsOf(at, false)
  const about = [caseOnPage(name)]
  return table
    .take(k, picked('k'))
    .work(
      tiedFormulas.along,
      { c: 'c', u_0: move.u, s: 's', v_0: move.v, rho: 'rho', phi: move.phi },
      `delta.${name}`,
      about,
    )
    .work(tiedFormulas.stated, { k: 'k', delta: 'delta' }, `V.${name}`, about)
}

/** All walls of the level in their order, with the shear that each was found to have. */
function wallTable({ level, rigidity, display }: TiedLevel, beams: Tabulation, springs: Tabulation): Tabulation {
  const walls = new Tabulation(rigidity.walls.rows, (row, key) => `${level}.wall.${row}.${key}`, display)
  for (const name of ['k', 'c', 's', 'rho', 'x', 'y']) walls.takeColumn(rigidity.walls.column(name))
  const shearOf = (name: string): Value => {
    const table = beams.rows.includes(name) ? beams : springs
    return table.column('V').cell(table.rows.indexOf(name))
  }
  return walls.take(V, rigidity.walls.rows.map(shearOf))
}

/** The moments of the storey below and of the storey above at this level, as the curvatures of each give them. */
function meetingOf(at: TiedLevel, storey: number, { case: each, moments }: Solved, beams: Tabulation): Value {
  const { level, display } = at
  const heads = beams.column('M_t').numbers
  let [most, size] = [0, 0]
  beams.rows.forEach((row, i) => {
    const own = moments.get(row)
    most = Math.max(most, Math.abs((heads[i] ?? 0) - (own?.[storey + 1] ?? 0)))
    size = Math.max(size, ...(own ?? []).map(Math.abs))
  })
  const about = caseOnPage(each.name)
  const value = (id: string, of: Sym, si: number, what: string) =>
    answer(`${level}.${id}.${each.name}`, of, si, what, display, level, about)
  return work(
    `${level}.meeting.${each.name}`,
    tiedFormulas.meeting,
    {
      Delta_M: value(
        'meeting.apart',
        apart,
        most,
        'largest difference of the moments of a wall above and below the level',
      ),
      // Where no wall runs through there is no moment to compare with.
      M_max: value('meeting.largest', greatest, size || 1, 'largest moment of these walls'),
    },
    display,
    [level, about],
  )
}

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a continuous wall was asked for a storey that it does not have')
  return value
}
