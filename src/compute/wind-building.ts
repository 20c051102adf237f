/** Wind among the rest of the building: what it needs of the levels, its storey shears, and its values by their ids. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import type { LevelLine } from '../model/levels.ts'
import type { Scope } from '../model/scope.ts'
import type { WindGiven } from '../model/wind.ts'
import { diagnose } from '../read/text.ts'
import type { LevelWork } from './level.ts'
import { type Storeys, workStoreys } from './storeys.ts'
import { type Wind, type WindLevel, type WindLoading, workWind } from './wind.ts'

/** Wind needs the height and the plan of every level. */
export function workWindOn(
  given: WindGiven,
  levels: readonly LevelWork[],
  lines: Result<readonly LevelLine[]>,
  scope: Scope,
): Result<Wind> {
  if (!lines.ok) return lines
  const parts = all(
    lines.value.map(({ name, elevation }): Result<WindLevel> => {
      if (!elevation)
        return bad([
          diagnose(
            'error',
            'wind-without-elevations',
            given.span,
            'wind needs the heights of the levels, and none is stated',
            'Give a block levels with a column elevation; a building of one level has one row in it.',
          ),
        ])
      const plan = levels.find(level => level.name === name)?.plan()
      if (!plan) return bad([])
      return plan.ok ? good({ level: name, elevation, plan: plan.value }) : plan
    }),
  )
  if (!parts.ok) return parts
  for (const { text, because } of taken(given)) scope.assume({ text, because })
  const low = roofTooLow(given, parts.value)
  if (low) scope.warn(low)
  const wind = workWind(given, parts.value, scope.display)
  const strange = flatGable(wind)
  if (strange) scope.assume(strange)
  return good(wind)
}

/** A mean roof height below the highest level would make the pressure on leeward walls too small. */
function roofTooLow(given: WindGiven, [highest]: readonly WindLevel[]): Diagnostic | undefined {
  if (given.kind !== 'directional' || !given.h || !highest || given.h.si >= highest.elevation.si - 1e-6)
    return undefined
  const { origin } = given.h
  return diagnose(
    'warning',
    'wind-roof-height',
    origin.kind === 'given' ? origin.span : given.span,
    `the mean roof height is stated below the highest level, ${highest.level}`,
    'It counts as stated. Leave it out to have it follow from the levels and the slope.',
    highest.elevation.origin.kind === 'given'
      ? { also: [{ span: highest.elevation.origin.span, text: `${highest.level} is here` }] }
      : {},
  )
}

/** What the strips take for granted. */
function taken(given: WindGiven) {
  const strips = [
    {
      text: 'The ground stands at the base, from which elevations are measured.',
      because: 'wind is worked from the base up',
    },
    {
      text: 'Each diaphragm takes the wind on half the storey below it and half the one above; the lower half of the lowest storey goes to the ground.',
      because: 'common practice: walls span from diaphragm to diaphragm',
    },
    {
      text: 'The walls of a storey are as wide as the plan of the level on them.',
      because: 'faces are taken as the extent of the plan across the wind',
    },
  ]
  return given.kind === 'stated'
    ? strips
    : [
        ...strips,
        { text: 'Windward pressure on a strip is that at its top.', because: 'on the safe side: it grows with height' },
      ]
}

function flatGable({ worked }: Wind) {
  if (worked.kind !== 'directional' || !worked.roof.flatSlopes) return undefined
  return {
    text: 'The slopes of the roof have no force along the wind.',
    because: 'below 10° both slopes are in suction, and the windward one pulls against the wind',
  }
}

/** Forces and storey shears of wind, level by level. */
export const windStoreys = ({ levels, acting }: Wind, loading: WindLoading, display: Display): Storeys =>
  workStoreys(
    loading,
    levels.map(({ level, elevation }) => ({ level, elevation, force: acting(loading, level).force })),
    display,
  )

type Found = Result<Value> | undefined

/** A value of the building, such as `wind.q_h`. */
export function windValue(
  wind: () => Result<Wind | undefined>,
  given: () => Result<WindGiven | undefined>,
  path: readonly string[],
): Found {
  const id = `wind.${path.join('.')}`
  const stated = given()
  if (!stated.ok) return stated
  if (!stated.value) return undefined
  // What is stated is known before the levels are: a height may be worked from it.
  const typed = givenValues(stated.value).find(value => value.id === id)
  if (typed) return good(typed)
  const worked = wind()
  if (!worked.ok) return worked
  return worked.value && pick(valuesOf(worked.value), id)
}

/** A value of a level, such as `roof.wind.force.x`. */
export function levelWindValue(wind: () => Result<Wind | undefined>, level: string, path: readonly string[]): Found {
  const worked = wind()
  if (!worked.ok) return worked
  return worked.value && pick(levelValues(worked.value, level), [level, 'wind', ...path].join('.'))
}

function pick(values: Iterable<Value>, id: string): Found {
  for (const value of values) if (value.id === id) return good(value)
  return undefined
}

function givenValues(given: WindGiven): readonly Value[] {
  if (given.kind === 'stated') {
    const pressures = given.axes.flatMap(axis => {
      const pair = given.at('', axis)
      return pair ? [pair.windward, pair.leeward] : []
    })
    const share = 'eccentricity' in given.cases ? given.cases.eccentricity : undefined
    return [...pressures, ...(given.parapet ? [given.parapet] : []), ...(share ? [share] : [])]
  }
  const { V, Kd, Kzt, ground, G, h, roof } = given
  const ofRoof = roof.kind === 'gable' ? [roof.slope] : roof.parapet ? [roof.parapet] : []
  return [V, Kd, Kzt, 'Ke' in ground ? ground.Ke : ground.elevation, G, ...(h ? [h] : []), ...ofRoof]
}

function* valuesOf({ worked, share }: Wind): Iterable<Value> {
  if (share) yield share
  for (const { strips } of worked.facing) yield* cellsOf(strips)
  if (worked.kind === 'stated') return
  const { pressure, h, K, q, Cw, internal, least, roof, windward, facing } = worked
  yield* [
    pressure.alpha,
    pressure.zg,
    pressure.zMin,
    pressure.Ke,
    h,
    K,
    q,
    Cw,
    internal.GCpi,
    internal.p,
    least.wall,
    least.roof,
  ]
  if (roof.rise) yield roof.rise
  yield* cellsOf(windward)
  for (const each of facing) yield* [...each.steps, ...each.least.map(({ F }) => F)]
}

function* levelValues({ worked, loads }: Wind, level: string): Iterable<Value> {
  for (const { along } of loads)
    for (const share of [along.x?.get(level), along.y?.get(level)])
      if (share) yield* [share.force, share.at, ...(share.arm ? [share.arm] : []), ...cellsOf(share.parts)]
  if (worked.kind === 'stated') {
    for (const { strips } of worked.facing) yield* cellsOf(strips)
    return
  }
  for (const { leeward } of worked.facing) yield* cellsOf(leeward)
}

function* cellsOf(table: Tabulation): Iterable<Value> {
  for (const { cell } of table.columns) for (let i = 0; i < table.rows.length; i++) yield cell(i)
}
