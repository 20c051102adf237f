/** Answers what a working asks for, from the results. */

import type { Display } from '../base/kind.ts'
import { type Result, together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { CaseResult, Distribution } from '../compute/distribution.ts'
import type { LevelWork } from '../compute/level.ts'
import { pierShearsOf } from '../compute/pier-shears.ts'
import { casesShown, wallsShown } from './chosen.ts'
import type { Context } from './context.ts'
import { explainDesignShears } from './design.ts'
import { displacedFigure, elevations, figure, flatAll, plan } from './figures.ts'
import { explainMass, explainPolarMoment } from './mass.ts'
import { explainPierShears } from './piers.ts'
import { explainRedundancy } from './redundancy.ts'
import type { Request, Want } from './request.ts'
import { explainEccentricity, explainRigidity, explainStiffness, explainWindEccentricity } from './rigidity.ts'
import {
  equilibriumCheck,
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
  redundancy: 'Redundancy',
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
      const worked = explainEccentricity(eccentricity.value, acting?.ok ? acting.value : undefined, context)
      const wind = level.hasWind() ? level.distribution() : good(undefined)
      return wind.ok ? good([...worked, ...explainWindEccentricity(wind.value, context)]) : wind
    }
    case 'redundancy': {
      const redundancy = level.redundancy()
      return redundancy.ok ? good(explainRedundancy(redundancy.value, detail, context)) : redundancy
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
