/** Answers what a working asks for, from the results. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { CaseResult, Distribution } from '../compute/distribution.ts'
import type { LevelWork } from '../compute/level.ts'
import { pierShearsOf } from '../compute/pier-shears.ts'
import type { Wall } from '../model/walls.ts'
import { diagnose } from '../read/text.ts'
import type { Context } from './context.ts'
import { explainMass, explainPolarMoment } from './mass.ts'
import { explainPierShears, explainPierTable } from './piers.ts'
import type { Request, Want } from './request.ts'
import { explainEccentricity, explainRigidity, explainStiffness } from './rigidity.ts'
import {
  equilibriumCheck,
  explainDesignShears,
  explainDisplacement,
  explainEquilibrium,
  explainTorsion,
  explainWallShears,
} from './shears.ts'
import type { Piece } from './sheet.ts'

const headings: Readonly<Record<Want, string>> = {
  plan: 'Plan',
  'centre of mass': 'Centre of mass',
  'polar moment': 'Polar moment of mass',
  'wall stiffness': 'Wall stiffness',
  'centre of rigidity': 'Centre of rigidity',
  eccentricity: 'Eccentricity',
  torsion: 'Torsion',
  'wall shears': 'Wall shears',
  'design shears': 'Design shears',
  elevations: 'Elevations',
  displacement: 'Displacement',
  'displaced shape': 'Displaced shape',
  equilibrium: 'Equilibrium',
}

/** The pieces of one want; a want that cannot be worked becomes a box with its reasons. */
export function explainWant(want: Want, level: LevelWork, request: Request, context: Context): readonly Piece[] {
  const made = answer(want, level, request, context)
  const pieces: readonly Piece[] = made.ok ? made.value : [{ kind: 'fault', diagnostics: made.because }]
  // A part of the whole calculation that this level has nothing of is passed over.
  return request.whole && pieces.length > 0
    ? [{ kind: 'heading', id: '', text: context.words(headings[want]) }, ...pieces]
    : pieces
}

function answer(want: Want, level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
  const { detail } = request
  switch (want) {
    case 'plan':
      return plan(level, request, context)
    case 'centre of mass': {
      const parts = together({ mass: level.mass(), plan: level.plan() })
      return parts.ok ? good(explainMass(parts.value.mass, parts.value.plan, detail, context)) : parts
    }
    case 'polar moment': {
      const mass = level.mass()
      return mass.ok ? good(explainPolarMoment(mass.value, detail, context)) : mass
    }
    case 'wall stiffness': {
      const parts = together({ springs: level.springs(), walls: level.walls() })
      if (!parts.ok) return parts
      const shown = wallsShown(level, request)
      return shown.ok
        ? good(explainStiffness(level, parts.value.springs, parts.value.walls, shown.value, detail, context))
        : shown
    }
    case 'centre of rigidity': {
      const rigidity = level.rigidity()
      return rigidity.ok ? good(explainRigidity(rigidity.value, detail, context)) : rigidity
    }
    case 'eccentricity': {
      const eccentricity = level.eccentricity()
      if (!eccentricity.ok) return eccentricity
      const forces = level.forces()
      if (!forces.ok) return forces
      const acting = forces.value ? level.acting() : undefined
      return good(explainEccentricity(eccentricity.value, acting?.ok ? acting.value : undefined, context))
    }
    case 'elevations':
      return request.whole && level.givens.openings.length === 0 ? good([]) : elevations(level, request, context)
    case 'torsion':
    case 'wall shears':
    case 'design shears':
    case 'displacement':
    case 'displaced shape':
    case 'equilibrium':
      return shears(want, level, request, context)
  }
}

function plan(level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
  if (!request.caseName) return figure(level, undefined, context)
  const cases = casesShown(level, request)
  if (!cases.ok) return cases
  return flatAll(cases.value.map(each => figure(level, each.case.name, context)))
}

/** The pieces of several answers in order, or all their faults. */
function flatAll(parts: readonly Result<readonly Piece[]>[]): Result<readonly Piece[]> {
  const done = all(parts)
  return done.ok ? good(done.value.flat()) : done
}

/** The plan with the design shears, or with those of one case and the force where it acts. */
function figure(level: LevelWork, caseName: string | undefined, context: Context): Result<readonly Piece[]> {
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
  const drawing: Piece = { kind: 'figure', id: context.anchor(id), number: '', caption, ...made.value }
  const missing = notDrawn(level)
  return good(missing.length > 0 ? [drawing, { kind: 'fault', diagnostics: missing }] : [drawing])
}

/** An elevation of each wall asked for, or of each that has openings, with the piers that it names. */
function elevations(level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
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
  return good([
    { kind: 'figure', id: context.anchor(id), number: '', caption: context.words(about + what), ...made.value },
  ])
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
function notDrawn({ givens, mass, rigidity, forces, distribution }: LevelWork): readonly Diagnostic[] {
  const stated = forces()
  const wanted: readonly Result<unknown>[] = [
    mass(),
    ...(givens.walls.length > 0 ? [rigidity()] : []),
    ...(givens.walls.length > 0 && stated.ok && stated.value ? [distribution()] : []),
  ]
  const all = together(Object.fromEntries(wanted.map((result, i) => [i, result])))
  return all.ok ? [] : all.because
}

/** True when forces are stated and shared out. */
function hasShears(level: LevelWork): boolean {
  const forces = level.forces()
  return forces.ok && forces.value !== undefined && level.distribution().ok
}

type ShearWant = 'torsion' | 'wall shears' | 'design shears' | 'displacement' | 'displaced shape' | 'equilibrium'

function shears(want: ShearWant, level: LevelWork, request: Request, context: Context): Result<readonly Piece[]> {
  const { detail } = request
  const parts = together({
    distribution: level.distribution(),
    display: level.display(),
    walls: wallsShown(level, request),
    cases: casesShown(level, request),
  })
  if (!parts.ok) return parts
  const { distribution, display, walls, cases } = parts.value
  // Every working that shows shears answers for their equilibrium.
  context.check(equilibriumCheck(distribution, context))
  switch (want) {
    case 'torsion':
      return good(explainTorsion(distribution, cases, detail, display, context))
    case 'wall shears':
      return wallShears(level, distribution, cases, walls, request, context)
    case 'design shears':
      return designShears(level, distribution, walls, request, context)
    case 'equilibrium':
      return good(explainEquilibrium(distribution, detail, display, context))
    case 'displacement':
    case 'displaced shape':
      return displacement(want, level, cases, request, display, context)
  }
}

/** The design shears, and in full detail what the piers of each wall shown take of its own. */
function designShears(
  level: LevelWork,
  distribution: Distribution,
  walls: readonly string[],
  { detail }: Request,
  context: Context,
): Result<readonly Piece[]> {
  const worked = explainDesignShears(distribution, walls, detail, context)
  if (detail !== 'full') return good(worked)
  const piers = flatAll(
    walls.map(wall => {
      const shears = pierShearsOf(level, wall) ?? good([])
      return shears.ok ? good(explainPierShears(level.name, wall, shears.value, context)) : shears
    }),
  )
  return piers.ok ? good([...worked, ...piers.value]) : piers
}

/** The displacements of the case asked for, or of the one with the largest, and in full detail their sketch. */
function displacement(
  want: 'displacement' | 'displaced shape',
  level: LevelWork,
  cases: readonly CaseResult[],
  { detail, caseName }: Request,
  display: Display,
  context: Context,
): Result<readonly Piece[]> {
  const moved = level.displacements()
  if (!moved.ok) return moved
  const size = (each: Displacement) => Math.abs(each.governing.value.si)
  const worst = moved.value.reduce((a, b) => (size(b) > size(a) ? b : a))
  const shown = caseName ? moved.value.filter(({ result }) => cases.includes(result)) : [worst]
  const worked =
    want === 'displacement' ? explainDisplacement(level.name, moved.value, shown, detail, display, context) : []
  if (want === 'displacement' && detail !== 'full') return good(worked)
  const drawn = flatAll(shown.map(each => displacedFigure(level, each, context)))
  return drawn.ok ? good([...worked, ...drawn.value]) : drawn
}

function displacedFigure(level: LevelWork, displacement: Displacement, context: Context): Result<readonly Piece[]> {
  const made = context.sketch.displaced(level, displacement)
  if (!made.ok) return made
  const { name } = displacement.result.case
  const id = context.anchor(`${level.name}.displaced.${name}`)
  const caption = context.words(
    `Displaced shape of ${verbatim(level.name)} in case ${caseOnPage(name)}, drawn larger by the factor in its key.`,
  )
  return good([{ kind: 'figure', id, number: '', caption, ...made.value }])
}

/** The shears of each case asked for, and in full detail the plan that shows them. */
function wallShears(
  level: LevelWork,
  distribution: Distribution,
  cases: readonly CaseResult[],
  walls: readonly string[],
  { detail }: Request,
  context: Context,
): Result<readonly Piece[]> {
  const pieces = cases.map((each): Result<readonly Piece[]> => {
    const worked = explainWallShears(distribution, each, walls, detail, context)
    if (detail !== 'full') return good(worked)
    const drawn = figure(level, each.case.name, context)
    return drawn.ok ? good([...worked, ...drawn.value]) : drawn
  })
  return flatAll(pieces)
}

/** The walls to work in full: those asked for, or the one that governs, or the stiffest where no force is known. */
function wallsShown(level: LevelWork, { walls }: Request): Result<readonly string[]> {
  const springs = level.springs()
  if (!springs.ok) return springs
  const names = springs.value.map(({ name }) => name)
  const unknown = walls.filter(({ text }) => !names.includes(text))
  if (unknown.length > 0)
    return bad(
      unknown.map(({ text, span }) =>
        diagnose(
          'error',
          'unknown-wall',
          span,
          `there is no wall ${text} at ${level.name}`,
          suggestion(text, names, 'wall'),
        ),
      ),
    )
  if (walls.length > 0) return good(walls.map(({ text }) => text))
  const distribution = hasShears(level) ? level.distribution() : undefined
  if (distribution?.ok) return good([distribution.value.design.rows[distribution.value.governingWall] ?? ''])
  return good([springs.value.reduce((a, b) => (b.k.si > a.k.si ? b : a)).name])
}

/** The case asked for, every case, or the one that governs. */
function casesShown(level: LevelWork, { caseName }: Request): Result<readonly CaseResult[]> {
  const distribution = level.distribution()
  if (!distribution.ok) return distribution
  const { cases, governingCase, governingWall } = distribution.value
  if (caseName?.text === 'all') return good(cases)
  if (caseName) return caseOf(level, caseName)
  return good(cases.filter(each => each.case.name === governingCase(governingWall).text))
}

function caseOf(level: LevelWork, { text, span }: NonNullable<Request['caseName']>): Result<readonly CaseResult[]> {
  const distribution = level.distribution()
  if (!distribution.ok) return distribution
  const { cases } = distribution.value
  const found = cases.filter(each => each.case.name === text)
  return found.length > 0 ? good(found) : bad([unknownCase(text, span, cases)])
}

const unknownCase = (text: string, span: Request['at'], cases: readonly CaseResult[]): Diagnostic =>
  diagnose(
    'error',
    'unknown-case',
    span,
    `there is no case ${text}`,
    `There are: ${cases.map(each => each.case.name).join(', ')}, and all.`,
  )
