/** Weight, centre of mass and polar moment of a level, from its areas, lines and points. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, work } from '../base/work.ts'
import { areaLoad, readAreaLoad, type ShareByWord } from '../model/areas.ts'
import { type LineLoad, lineLoad, type PointLoad, pointLoad, readLoad } from '../model/loads.ts'
import type { Scope } from '../model/scope.ts'
import { diagnose } from '../read/text.ts'
import { A, Ip } from './measure.ts'
import type { Plan } from './plan.ts'
import { segment, takeEnds } from './segment.ts'
import { L, W, x, xm, y, ym } from './symbols.ts'

export interface Mass {
  readonly level: string
  readonly W: Value
  readonly x: Value
  readonly y: Value
  /** Polar moment of the weight about the centre of mass. */
  readonly Ip: Value
  /** Present where the level has loads of the kind. */
  readonly areas?: Tabulation
  readonly lines?: Tabulation
  readonly points?: Tabulation
  /** Every part once: W, x, y, W x, W y, and I about the centre of mass; A and w too where all are areas. */
  readonly parts: Tabulation
  readonly sums: { readonly Wx: Value; readonly Wy: Value }
}

const Wx = sym('W_x', 'W\\,x', 'moment')
const Wy = sym('W_y', 'W\\,y', 'moment')
const own = sym('I_o', 'I_o', 'weightMoment')
const polar = sym('I', 'I', 'weightMoment')
const polarSum = sym('I_p', 'I_p', 'weightMoment')
const sumW = sym('sum_W', '\\sum W', 'force')
const sumWx = sym('sum_Wx', '\\sum W\\,x', 'moment')
const sumWy = sym('sum_Wy', '\\sum W\\,y', 'moment')

const STATICS = 'statics'

const area = {
  W: formula({ gives: W, body: 'w*A', of: [areaLoad, A], source: STATICS }),
  own: formula({ gives: own, body: 'w*I_p', of: [areaLoad, Ip], source: STATICS }),
}

const line = {
  W: formula({ gives: W, body: 'w*L', of: [lineLoad, L], source: STATICS }),
  own: formula({ gives: own, body: 'W*L^2/12', of: [W, L], source: STATICS }),
}

/** A point has no extent, so no moment of its own. */
const noExtent = (id: string, display: Display): Value => ({
  id,
  tex: own.tex,
  si: 0,
  ...shownAs(own, display),
  origin: { kind: 'measured', what: 'a point has no extent', spans: [] },
})

const moments = {
  x: formula({ gives: Wx, body: 'W*x', of: [W, x], source: STATICS }),
  y: formula({ gives: Wy, body: 'W*y', of: [W, y], source: STATICS }),
  polar: formula({
    gives: polar,
    body: 'I_o + W*((x - x_m)^2 + (y - y_m)^2)',
    of: [own, W, x, y, xm, ym],
    source: 'statics: parallel axes',
  }),
}

export const centreOfMass = {
  x: formula({ gives: xm, body: 'sum_Wx/sum_W', of: [sumWx, sumW], source: STATICS }),
  y: formula({ gives: ym, body: 'sum_Wy/sum_W', of: [sumWy, sumW], source: STATICS }),
}

export function workMass(
  plan: Plan,
  lines: readonly LineLoad[],
  points: readonly PointLoad[],
  blockSpan: Span,
  shareByWord: ShareByWord,
  scope: Scope,
): Result<Mass> {
  const { level } = plan
  const loads = new Map(plan.areas.map(area => [area.name, readAreaLoad(area, level, shareByWord, scope)]))
  const lineLoads = all(lines.map(line => readLoad(line, level, scope)))
  const pointLoads = all(points.map(point => readLoad(point, level, scope)))
  const areaLoads = all(plan.parts.map(({ area }) => loads.get(area.name) ?? bad([])))
  const read = all<unknown>([areaLoads, lineLoads, pointLoads])
  if (!read.ok || !areaLoads.ok || !lineLoads.ok || !pointLoads.ok) return read.ok ? bad([]) : read
  const tables = {
    ...(plan.parts.length > 0 ? { areas: areaTable(plan, areaLoads.value, scope.display) } : {}),
    ...(lines.length > 0 ? { lines: lineTable(level, lines, lineLoads.value, scope.display) } : {}),
    ...(points.length > 0 ? { points: pointTable(level, points, pointLoads.value, scope.display) } : {}),
  }
  const mass = workCentre(level, tables, scope.display)
  if (mass.W.si > 0) return good(mass)
  return bad([
    diagnose(
      'error',
      'weight-missing',
      blockSpan,
      `level ${level} weighs nothing`,
      'Give at least one area, line or point a load above zero.',
    ),
  ])
}

type Tables = Pick<Mass, 'areas' | 'lines' | 'points'>

function areaTable({ level, parts }: Plan, loads: readonly Value[], display: Display): Tabulation {
  return new Tabulation(
    parts.map(({ name }) => name),
    (row, key) => `${level}.areas.${row}.${key}`,
    display,
  )
    .take(
      A,
      parts.map(({ A }) => A),
    )
    .take(areaLoad, loads)
    .work(area.W, { w: 'w', A: 'A' })
    .take(
      x,
      parts.map(({ x }) => x),
    )
    .take(
      y,
      parts.map(({ y }) => y),
    )
    .take(
      Ip,
      parts.map(({ Ip }) => Ip),
    )
    .work(area.own, { w: 'w', I_p: 'I_p' })
}

function lineTable(level: string, lines: readonly LineLoad[], loads: readonly Value[], display: Display): Tabulation {
  const table = new Tabulation(
    lines.map(({ name }) => name),
    (row, key) => `${level}.lines.${row}.${key}`,
    display,
  )
  const [from, to] = [lines.map(({ from }) => from), lines.map(({ to }) => to)]
  return takeEnds(table, from, to)
    .work(segment.L, { x_1: 'x_1', y_1: 'y_1', x_2: 'x_2', y_2: 'y_2' })
    .take(lineLoad, loads)
    .work(line.W, { w: 'w', L: 'L' })
    .work(segment.x, { x_1: 'x_1', x_2: 'x_2' })
    .work(segment.y, { y_1: 'y_1', y_2: 'y_2' })
    .work(line.own, { W: 'W', L: 'L' })
}

function pointTable(
  level: string,
  points: readonly PointLoad[],
  loads: readonly Value[],
  display: Display,
): Tabulation {
  return new Tabulation(
    points.map(({ name }) => name),
    (row, key) => `${level}.points.${row}.${key}`,
    display,
  )
    .take(pointLoad, loads)
    .take(
      x,
      points.map(({ at }) => at.x),
    )
    .take(
      y,
      points.map(({ at }) => at.y),
    )
    .take(
      own,
      points.map(({ name }) => noExtent(`${level}.points.${name}.I_o`, display)),
    )
}

function workCentre(level: string, tables: Tables, display: Display): Mass {
  const found = [
    ['areas', tables.areas],
    ['lines', tables.lines],
    ['points', tables.points],
  ] as const
  const gathered = (key: string): readonly Value[] =>
    found.flatMap(([, table]) => (table ? table.rows.map((_, i) => table.column(key).cell(i)) : []))
  // An area and a line may have one name.
  const kinds = found.flatMap(([kind, table]) => table?.rows.map(() => kind) ?? [])
  const rows = found.flatMap(([, table]) => table?.rows ?? [])
  const parts = new Tabulation(rows, (row, key, i) => `${level}.${kinds[i]}.${row}.${key}`, display)
    .take(W, gathered('W'))
    .take(x, gathered('x'))
    .take(y, gathered('y'))
    .work(moments.x, { W: 'W', x: 'x' }, 'Wx')
    .work(moments.y, { W: 'W', y: 'y' }, 'Wy')
    .take(own, gathered('I_o'))
  const total = parts.sum('W', W, `${level}.W`)
  const sums = { Wx: parts.sum('W_x', sumWx, `${level}.sum.Wx`), Wy: parts.sum('W_y', sumWy, `${level}.sum.Wy`) }
  const centre = {
    x: work(`${level}.CM.x`, centreOfMass.x, { sum_Wx: sums.Wx, sum_W: total }, display),
    y: work(`${level}.CM.y`, centreOfMass.y, { sum_Wy: sums.Wy, sum_W: total }, display),
  }
  if (tables.areas && !tables.lines && !tables.points) parts.take(A, gathered('A')).take(areaLoad, gathered('w'))
  parts.work(moments.polar, { I_o: 'I_o', W: 'W', x: 'x', y: 'y', x_m: centre.x, y_m: centre.y })
  return { level, W: total, ...centre, Ip: parts.sum('I', polarSum, `${level}.I_p`), ...tables, parts, sums }
}
