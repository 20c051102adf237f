/** From hazard to the forces of every level: the standard's own steps, then its vertical distribution. */

import type { Diagnostic } from '../base/diagnostic.ts'
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value, Word } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Scope } from '../model/scope.ts'
import type { Direction, SeismicGiven } from '../model/seismic.ts'
import { diagnose } from '../read/text.ts'
import type { Design, DirectionDesign, Profile, Said } from '../standards/profile.ts'
import { W } from './symbols.ts'
import {
  diaphragmColumn,
  forceColumn,
  type HeavyLevel,
  type VerticalShares,
  workDiaphragms,
  workVertical,
} from './vertical.ts'

export interface DirectionWork extends DirectionDesign {
  readonly shares: VerticalShares
  /** Absent where the profile has no rule for it. */
  readonly diaphragms?: Tabulation
}

export interface Seismic {
  readonly profile: Profile
  readonly given: SeismicGiven
  /** Weight of every level, from the top down, and their sum. */
  readonly weights: Tabulation
  readonly W: Value
  readonly height: Value
  readonly ground: Design['ground']
  readonly directions: Readonly<Record<Direction, DirectionWork>>
  /** True where both directions come to the same numbers. */
  readonly alike: boolean
  /** Force along a direction of one level. */
  readonly force: (level: string, direction: Direction) => Value | undefined
  readonly share: (level: string, direction: Direction) => Value | undefined
  readonly diaphragm: (level: string, direction: Direction) => Value | undefined
  /** What can be asked for under `seismic.`, by its id. */
  readonly values: ReadonlyMap<string, Value | Word>
}

/** A level with its weight; its elevation where the document states it. */
export interface WeighedLevel {
  readonly level: string
  readonly elevation: Value | undefined
  readonly W: Value
}

const hn = sym('h_n', 'h_n', 'length')
const z = sym('z', 'z', 'length')
const highest = formula({ gives: hn, body: 'z', of: [z], source: 'elevation of the highest level above the base' })
const alone = formula({
  gives: z,
  body: 'h_n',
  of: [hn],
  source: 'the only level stands at the height of the structure',
})

/** @param levels from the top down */
export function workSeismic(
  profile: Profile,
  given: SeismicGiven,
  weighed: readonly WeighedLevel[],
  scope: Scope,
): Result<Seismic> {
  const { display } = scope
  const placed = placedLevels(given, weighed, display)
  if (!placed.ok) return placed
  const { levels, height } = placed.value
  const weights = weightTable(levels, display)
  const total = weights.sum('W', W, 'seismic.W')
  const made = profile.design({
    given,
    display,
    W: total,
    height,
    storeys: levels.length,
    assume: scope.assume,
    warn: scope.warn,
  })
  if (!made.ok) return bad(distinct(made.because))
  for (const caution of profile.cautions ?? []) scope.warn(inPart(profile, caution, given))
  const along = (direction: Direction): DirectionWork => {
    const design = made.value.directions[direction]
    const shares = workVertical(levels, design, direction, height, display)
    if (!design.diaphragm) return { ...design, shares }
    return { ...design, shares, diaphragms: workDiaphragms(shares, design.diaphragm, direction, display) }
  }
  const both = { x: along('x'), y: along('y') }
  const cell = (table: Tabulation | undefined, column: string, level: string) => {
    const at = table?.rows.indexOf(level) ?? -1
    return at === -1 ? undefined : table?.column(column).cell(at)
  }
  return good({
    profile,
    given,
    weights,
    W: total,
    height,
    ground: made.value.ground,
    directions: both,
    alike: sayTheSame(both.x.said, both.y.said),
    force: (level, direction) => cell(both[direction].shares.table, forceColumn(direction), level),
    share: (level, direction) => cell(both[direction].shares.table, 'C_v', level),
    diaphragm: (level, direction) => cell(both[direction].diaphragms, diaphragmColumn, level),
    values: valuesOf([total, height], [made.value.ground, both.x.said, both.y.said]),
  })
}

/** Where both directions have one setting at fault it is told once. */
function distinct(faults: readonly Diagnostic[]): readonly Diagnostic[] {
  const keyOf = ({ rule, message, at }: Diagnostic) => `${rule} ${at.span.start} ${message}`
  return [...new Map(faults.map(fault => [keyOf(fault), fault])).values()]
}

const inPart = ({ name }: Profile, caution: string, { at }: SeismicGiven) =>
  diagnose('warning', 'standard-in-part', at, `${name} is worked in part`, `${caution} See to it yourself.`)

/** Elevations as stated; a level that is alone stands at the height that is stated for the structure. */
function placedLevels(
  given: SeismicGiven,
  weighed: readonly WeighedLevel[],
  display: Display,
): Result<{ readonly levels: readonly HeavyLevel[]; readonly height: Value }> {
  const stated = given.number('h_n')
  const [top] = weighed
  if (top?.elevation) {
    const levels = weighed.flatMap(({ elevation, ...rest }) => (elevation ? [{ ...rest, elevation }] : []))
    const height = stated ?? work('seismic.hn', highest, { z: top.elevation }, display)
    if (height.si >= top.elevation.si * (1 - 1e-9)) return good({ levels, height })
    return bad([
      diagnose(
        'error',
        'height-below-level',
        given.text('h_n')?.span ?? given.at,
        `the structure is stated to be lower than its level ${top.level}`,
        'h_n reaches from the base to the highest level. Leave it out where that is right.',
      ),
    ])
  }
  if (top && stated) {
    const elevation = work(`${top.level}.elevation`, alone, { h_n: stated }, display)
    return good({ levels: [{ level: top.level, W: top.W, elevation }], height: stated })
  }
  return bad([
    diagnose(
      'error',
      'elevation-missing',
      given.at,
      'the height of the building is not known',
      'Give its levels and their elevations in a block levels; with one level, h_n is enough, as in h_n: 14 ft.',
    ),
  ])
}

const weightTable = (levels: readonly HeavyLevel[], display: Display): Tabulation =>
  new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.${key}`,
    display,
  ).take(
    W,
    levels.map(each => each.W),
  )

/** True where two directions come to the same numbers by the same formulas. */
function sayTheSame(a: readonly Said[], b: readonly Said[]): boolean {
  return a.length === b.length && a.every((one, i) => tellsOf(one) === tellsOf(b[i]))
}

function tellsOf(said: Said | undefined): string {
  switch (said?.kind) {
    case undefined:
      return ''
    case 'step':
      return `${said.value.tex.replace(/\\text\{[xy]\}/, '')} ${said.value.si}`
    case 'choice':
      return said.word.because
    case 'note':
      return said.text.replace(/^Along [xy]/, '')
    case 'criteria':
      return said.criteria.rows.map(({ value, says = '' }) => `${value.si} ${says}`).join()
    case 'check':
      return `${said.check.what} ${said.check.demand.si} ${said.check.capacity.si}`
  }
}

function valuesOf(own: readonly Value[], said: readonly (readonly Said[])[]): ReadonlyMap<string, Value | Word> {
  const all = [...own, ...said.flat().flatMap(partsOf)]
  return new Map(all.map(one => [one.id, one]))
}

function partsOf(said: Said): readonly (Value | Word)[] {
  switch (said.kind) {
    case 'step':
      return [said.value]
    case 'choice':
      return [said.word]
    case 'check':
      return [said.check.capacity]
    case 'criteria':
      return said.criteria.rows.map(({ value }) => value)
    case 'note':
      return []
  }
}
