/** The drawings that workings bring. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { LevelWork } from '../compute/level.ts'
import { pierShearsOf } from '../compute/pier-shears.ts'
import type { Wall } from '../model/walls.ts'
import { casesShown, hasShears, wallsShown } from './chosen.ts'
import type { Context } from './context.ts'
import { explainPierTable } from './piers.ts'
import type { Request } from './request.ts'
import type { Piece } from './sheet.ts'

export function plan(level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
  if (!request.caseName) return figure(level, undefined, context)
  const cases = casesShown(level, request)
  if (!cases.ok) return cases
  return flatAll(cases.value.map(each => figure(level, each.case.name, context)))
}

/** The plan with the design shears, or with those of one case and the force where it acts. */
export function figure(level: LevelWork, caseName: string | undefined, context: Context): Result<readonly Piece[]> {
  const made = context.sketch.plan(level, caseName)
  if (!made.ok) return made
  const shears = hasShears(level)
  const what = !shears
    ? ''
    : caseName
      ? ` Shears of case ${caseOnPage(caseName)}, and the storey shear where it acts.`
      : ' Design shears.'
  const id = caseName ? `${level.name}.plan.${caseName}` : `${level.name}.plan`
  const caption = context.words(`Plan of ${verbatim(level.name)}.${what}`)
  const drawing: Piece = { kind: 'figure', id: id, number: '', caption, ...made.value }
  const missing = notDrawn(level)
  return good(missing.length > 0 ? [drawing, { kind: 'fault', diagnostics: missing }] : [drawing])
}

/** An elevation of each wall asked for, or of each that has openings, with the piers that it names. */
export function elevations(level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
  const parts = together({ walls: level.walls(), openings: level.openings(), display: level.display() })
  if (!parts.ok) return parts
  const { walls, openings, display } = parts.value
  const open = walls.filter(({ name }) => openings.some(({ wall }) => wall === name)).map(({ name }) => name)
  const shown = request.walls.length > 0 || open.length === 0 ? wallsShown(level, request) : good(open)
  const cases = request.caseName ? casesShown(level, request) : good([undefined])
  if (!shown.ok) return shown
  if (!cases.ok) return cases
  const pieces = shown.value.flatMap(name => {
    const wall = walls.find(wall => wall.name === name)
    if (!wall) return []
    const drawn = cases.value.map(each => elevation(level, wall, each?.case.name, context))
    const answers = request.detail === 'full' ? [...drawn, pierTable(level, name, display, context)] : drawn
    // A wall that cannot be drawn does not keep the others from their place.
    return answers.flatMap((made): readonly Piece[] =>
      made.ok ? made.value : [{ kind: 'fault', diagnostics: made.because }],
    )
  })
  return good(pieces)
}

function elevation(
  level: LevelWork,
  wall: Wall,
  caseName: string | undefined,
  context: Context,
): Result<readonly Piece[]> {
  const made = context.sketch.elevation(level, wall, caseName)
  if (!made.ok) return made
  const about = `Elevation of wall ${verbatim(wall.name)} of ${verbatim(level.name)}.`
  const what = !hasShears(level) ? '' : caseName ? ` Shear of case ${caseOnPage(caseName)}.` : ' Design shear.'
  const id = `${level.name}.elevation.${wall.name}${caseName ? `.${caseName}` : ''}`
  return good([{ kind: 'figure', id: id, number: '', caption: context.words(about + what), ...made.value }])
}

function pierTable(level: LevelWork, wall: string, display: Display, context: Context): Result<readonly Piece[]> {
  const cut = level.pierced(wall) ?? good(undefined)
  if (!cut.ok) return cut
  if (!cut.value) return good([])
  const shears = hasShears(level) ? (pierShearsOf(level, wall) ?? good([])) : good([])
  if (!shears.ok) return shears
  return good([explainPierTable(level.name, cut.value, shears.value, display, context)])
}

/** Why a sketch lacks a centre or the shears, where what they follow from was given. */
function notDrawn({ givens, mass, rigidity, isLoaded, distribution }: LevelWork): readonly Diagnostic[] {
  const wanted: readonly Result<unknown>[] = [
    mass(),
    ...(givens.walls.length > 0 ? [rigidity()] : []),
    ...(givens.walls.length > 0 && isLoaded() ? [distribution()] : []),
  ]
  const all = together(Object.fromEntries(wanted.map((result, i) => [i, result])))
  return all.ok ? [] : all.because
}

export function displacedFigure(
  level: LevelWork,
  displacement: Displacement,
  context: Context,
): Result<readonly Piece[]> {
  const made = context.sketch.displaced(level, displacement)
  if (!made.ok) return made
  const { name } = displacement.result.case
  const id = `${level.name}.displaced.${name}`
  const caption = context.words(
    `Displaced shape of ${verbatim(level.name)} in case ${caseOnPage(name)}, drawn larger by the factor in its key.`,
  )
  return good([{ kind: 'figure', id, number: '', caption, ...made.value }])
}

/** The pieces of several answers in order, or all their faults. */
export function flatAll(parts: readonly Result<readonly Piece[]>[]): Result<readonly Piece[]> {
  const done = all(parts)
  return done.ok ? good(done.value.flat()) : done
}
