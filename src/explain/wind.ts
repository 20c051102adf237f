/** Wind: how its pressures follow from the site, and what each level takes of it. */
import { verbatim } from '../base/language.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { type Axis, across } from '../compute/cases.ts'
import type { LevelWork } from '../compute/level.ts'
import { lettersOf } from '../compute/loading.ts'
import type { Wind, WindLoad } from '../compute/wind.ts'
import { windStoreys } from '../compute/wind-building.ts'
import type { DirectionalFacing, DirectionalWork } from '../compute/wind-directional.ts'
import type { Facing } from '../compute/wind-stated.ts'
import type { Strip } from '../compute/wind-strips.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { diagnose } from '../read/text.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Request } from './request.ts'
import type { Piece } from './sheet.ts'
import { storeyPieces } from './storeys.ts'
import { explainTable } from './table.ts'

/** What a working shows once wind is worked, or the reasons why it is not. */
function withWind(sheet: Worksheet, { at }: Request, show: (wind: Wind) => readonly Piece[]): readonly Piece[] {
  const made = sheet.wind()
  if (!made.ok) return [{ kind: 'fault', diagnostics: made.because }]
  if (made.value) return show(made.value)
  const missing = diagnose(
    'error',
    'wind-missing',
    at,
    'this document has no wind',
    'Give it in a block wind: a wind speed for the directional procedure of ASCE 7, or pressures.',
  )
  return [{ kind: 'fault', diagnostics: [missing] }]
}

/** @param level the level whose walls are worked as steps; the highest when none is named */
export function explainWindPressures(
  sheet: Worksheet,
  level: LevelWork | undefined,
  request: Request,
  context: Context,
): readonly Piece[] {
  return withWind(sheet, request, ({ worked, levels }) => {
    if (worked.kind === 'stated') return [{ kind: 'note', text: 'The pressures of wind are stated, not derived here.' }]
    const say = sayIn(context)
    const { q, K, h, pressure, Cw, internal, least, roof } = worked
    if (request.detail === 'result') return say(q)
    const site = [pressure.alpha, pressure.zg, pressure.zMin, pressure.Ke, roof.rise, h, K, q]
    const windward = windwardTable(worked, context)
    const sides = worked.facing.map(each => leewardTable(each, context))
    if (request.detail === 'table') return [...say(h, q), windward, ...sides]
    const at = levels.findIndex(other => other.level === (level?.name ?? levels[0]?.level))
    return [
      ...say(...site.filter(value => value?.origin.kind !== 'default')),
      ...say(Cw),
      windward,
      ...worked.facing.flatMap(({ leeward }, i) => {
        const steps = ['r', 'C_pl', 'p_l'].map(name => leeward.column(name).cell(at))
        return [...sides.slice(i, i + 1), ...say(...steps)]
      }),
      ...say(...roofPressures(worked)),
      ...say(internal.GCpi, internal.p, least.wall, least.roof),
    ]
  })
}

const sayIn =
  (context: Context) =>
  (...values: readonly (Value | undefined)[]): readonly Piece[] =>
    values.flatMap(value => (value ? [explainValue(value, context)] : []))

/** The forces of a parapet or roof are told with the forces. */
const isForce = ({ id }: Value): boolean => /\.F_[xy]$/.test(id)

/** Steps of the roof up to its pressures; those of a parapet are alike along both axes, and are told once. */
const roofPressures = ({ facing }: DirectionalWork): readonly Value[] => [
  ...new Map(
    facing.flatMap(({ steps }) => steps.filter(value => !isForce(value)).map(value => [value.id, value])),
  ).values(),
]

function windwardTable({ windward, strips }: DirectionalWork, context: Context): Piece {
  return explainTable(
    windward,
    {
      id: 'wind.windward',
      caption: 'Velocity pressure and pressure on the windward walls, in strips from the top down, each as at its top.',
      rowHead: 'Strip',
      columns: ['z_1', 'z_2', 'K_z', 'q_z', 'p_w'],
      words: [takenBy(strips)],
    },
    context,
  )
}

const takenBy = (strips: readonly Strip[]) => ({ head: 'Taken by', cells: strips.map(({ level }) => level) })

function leewardTable({ axis, leeward }: DirectionalFacing, context: Context): Piece {
  return explainTable(
    leeward,
    {
      id: `wind.leeward.${axis}`,
      caption: `Leeward walls with wind along ${axis}: the walls below each level. The pressure is negative, since it acts away from the wall.`,
      rowHead: 'Level',
      columns: ['L', 'B', 'r', 'C_pl', 'p_l'],
    },
    context,
  )
}

/** @param level the level whose forces are worked as steps; the highest when none is named */
export function explainWindForces(
  sheet: Worksheet,
  level: LevelWork | undefined,
  request: Request,
  context: Context,
): readonly Piece[] {
  return withWind(sheet, request, wind => {
    const { worked, loads, levels, share } = wind
    const shown = level?.name ?? levels[0]?.level ?? ''
    const say = sayIn(context)
    const steps = loads.flatMap(({ along }) =>
      [along.x, along.y].flatMap(shares => {
        const found = shares?.get(shown)
        return found ? say(found.force, found.at, found.arm) : []
      }),
    )
    const storeys = loads.flatMap(({ loading }) =>
      storeyPieces(
        windStoreys(wind, loading, sheet.scope.display),
        level?.name,
        storeyDetail(request, loading),
        context,
      ),
    )
    if (request.detail === 'result') return storeys
    const tables = worked.facing.map(facing => stripTable(facing, worked.strips, context))
    const beyond = worked.kind === 'directional' ? worked.facing.flatMap(({ steps }) => steps.filter(isForce)) : []
    const places = loads.flatMap(load => placeTables(load, wind, context))
    if (request.detail === 'table') return [...tables, ...places, ...storeys]
    return [...tables, ...say(...beyond, share), ...places, ...steps, ...storeys]
  })
}

/** The least forces have their table; the diagram is that of the wind. */
const storeyDetail = ({ detail }: Request, loading: string) =>
  loading === 'least wind' && detail === 'full' ? 'table' : detail

function stripTable({ axis, strips: table, least }: Facing, strips: readonly Strip[], context: Context): Piece {
  const letters = { wind: lettersOf.wind.F[axis].name, least: lettersOf['least wind'].F[axis].name }
  return explainTable(
    table,
    {
      id: `wind.strips.${axis}`,
      caption: `Force of wind along ${axis} on the strips of wall, from the top down.`,
      rowHead: 'Strip',
      columns: ['z_1', 'z_2', 'B', 'p_w', 'p_l', letters.wind, ...(least.length > 0 ? [letters.least] : [])],
      words: [takenBy(strips)],
    },
    context,
  )
}

/** Where the force of each level acts and how far it may be moved; and, where the faces of a level differ, its parts. */
function placeTables({ loading, along }: WindLoad, { levels }: Wind, context: Context): readonly Piece[] {
  return (['x', 'y'] as const).flatMap(axis => {
    const shares = along[axis]
    if (!shares) return []
    const all = levels.flatMap(({ level }) => shares.get(level) ?? [])
    const letters = lettersOf[loading]
    const side = across(axis)
    const table = new Tabulation(
      levels.map(({ level }) => level),
      (row, key) => `${row}.${letters.path}${key}`,
      { system: 'US', relative: false },
    )
      .take(
        letters.F[axis],
        all.map(({ force }) => force),
      )
      .take(
        letters.at[side],
        all.map(({ at }) => at),
      )
    const arms = all.flatMap(({ arm }) => arm ?? [])
    if (arms.length > 0) table.take(letters.arm[side], arms)
    const kind = loading === 'wind' ? 'Force of wind' : 'Least force of wind'
    const own = explainTable(
      table,
      {
        id: `wind.levels.${axis}${loading === 'wind' ? '' : '.least'}`,
        caption: `${kind} along ${axis} on each level, and where it acts${arms.length > 0 ? ', with the arm by which a case moves it aside' : ''}.`,
        rowHead: 'Level',
        columns: table.columns.map(({ sym }) => sym.name),
      },
      context,
    )
    return [own, ...levels.flatMap(({ level }) => partTable(level, axis, loading, shares.get(level)?.parts, context))]
  })
}

function partTable(
  level: string,
  axis: Axis,
  loading: WindLoad['loading'],
  parts: Tabulation | undefined,
  context: Context,
): readonly Piece[] {
  if (!parts || parts.columns.length === 1) return []
  return [
    explainTable(
      parts,
      {
        id: `${level}.${lettersOf[loading].path}parts.${axis}`,
        caption: `Parts of the force along ${axis} on ${verbatim(level)}, each in the middle of its own face.`,
        rowHead: 'Part',
        columns: parts.columns.map(({ sym }) => sym.name),
      },
      context,
    ),
  ]
}
