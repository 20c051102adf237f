/** Wind on the building: its parts along each axis, what each level takes, and the cases made of it. */

import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { WindGiven } from '../model/wind.ts'
import type { Edition, FigureCase } from '../model/wind-cases.ts'
import type { Axis, Case } from './cases.ts'
import type { Load } from './distribution.ts'
import type { Acting } from './loading.ts'
import type { Plan } from './plan.ts'
import { figureCases, leastCases, plainCases } from './wind-cases.ts'
import { type DirectionalWork, workDirectionalWind } from './wind-directional.ts'
import { type Faces, faceOf, type Part, type Resultant, resultantOf } from './wind-resultant.ts'
import { type StatedWork, workStatedWind } from './wind-stated.ts'

/** A level of the building as wind finds it. */
export interface WindLevel {
  readonly level: string
  readonly elevation: Value
  readonly plan: Plan
}

/** What each level takes of the wind along an axis, by its name. */
export type Shares = ReadonlyMap<string, Resultant>

export type WindLoading = 'wind' | 'least wind'

/** The forces of one kind on all levels, and their cases. */
export interface WindLoad {
  readonly loading: WindLoading
  readonly cases: readonly Case[]
  readonly along: { readonly [A in Axis]?: Shares }
}

export interface Wind {
  readonly given: WindGiven
  /** From the top down. */
  readonly levels: readonly WindLevel[]
  readonly worked: DirectionalWork | StatedWork
  /** Share of the width by which the force is moved aside, where it is. */
  readonly share?: Value
  readonly loads: readonly WindLoad[]
  readonly acting: (loading: WindLoading, level: string) => Acting
}

/** @param levels from the top down, at least one */
export function workWind(given: WindGiven, levels: readonly WindLevel[], display: Display): Wind {
  const planOf = (level: string): Plan => {
    const found = levels.find(other => other.level === level)
    if (!found) throw new Error(`wind has no plan of ${level}`)
    return found.plan
  }
  const worked =
    given.kind === 'directional' ? workDirectionalWind(given, levels, display) : workStatedWind(given, levels, display)
  const { cases, faces } = casesAndFaces(given, planOf, display)
  const shares = (loading: WindLoading, parts: readonly Part[], axis: Axis): Shares =>
    new Map(
      levels.map(({ level }) => [
        level,
        resultantOf(
          loading,
          axis,
          level,
          parts.filter(part => part.level === level),
          faces,
          display,
        ),
      ]),
    )
  const load = (loading: WindLoading, cases: readonly Case[], of: 'parts' | 'least'): WindLoad => ({
    loading,
    cases,
    along: Object.fromEntries(worked.facing.map(facing => [facing.axis, shares(loading, facing[of], facing.axis)])),
  })
  const loads = [
    load('wind', cases, 'parts'),
    ...(given.kind === 'directional' ? [load('least wind', leastCases(`ASCE ${given.edition}`), 'least')] : []),
  ]
  return {
    given,
    levels,
    worked,
    ...(faces.share ? { share: faces.share } : {}),
    loads,
    acting: (loading, level) => actingOn(loads, loading, level, faces, display),
  }
}

/** The cases of the figure that a document works, and the edition that they are of. */
function figureOf(given: WindGiven): { readonly listed: readonly FigureCase[]; readonly edition: Edition } | undefined {
  if (given.kind === 'directional') return { listed: given.cases, edition: given.edition }
  return 'figure' in given.cases ? { listed: given.cases.figure, edition: given.cases.edition } : undefined
}

function casesAndFaces(
  given: WindGiven,
  planOf: Faces['planOf'],
  display: Display,
): { readonly cases: readonly Case[]; readonly faces: Faces } {
  const figure = figureOf(given)
  if (figure) {
    const name = `ASCE ${figure.edition} Fig. 27.3-8`
    const source = `${name}, eccentricity of cases 2 and 4 (as in ASCE 7-10 Fig. 27.4-8; this edition unchecked)`
    const rule = formula({ gives: sym('alpha_w', '\\alpha_w', 'share'), body: '0.15', of: [], source })
    const share = work('wind.eccentricity', rule, {}, display)
    return { cases: figureCases(figure.listed, name), faces: { planOf, share, source } }
  }
  const share = given.kind === 'stated' && 'eccentricity' in given.cases ? given.cases.eccentricity : undefined
  const axes = given.kind === 'stated' ? given.axes : (['x', 'y'] as const)
  return {
    cases: plainCases(axes, share !== undefined),
    faces: { planOf, ...(share ? { share } : {}), source: 'eccentricity as stated' },
  }
}

function actingOn(
  loads: readonly WindLoad[],
  loading: WindLoading,
  level: string,
  faces: Faces,
  display: Display,
): Acting {
  const along = loads.find(load => load.loading === loading)?.along ?? {}
  const [ofX, ofY] = [along.x?.get(level), along.y?.get(level)]
  // Along an axis without wind its force would act in the middle of the face.
  const { at: x, arm: armX } = ofY ?? faceOf(loading, 'x', level, faces, display)
  const { at: y, arm: armY } = ofX ?? faceOf(loading, 'y', level, faces, display)
  return {
    level,
    at: { x, y },
    force: { ...(ofX ? { x: ofX.force } : {}), ...(ofY ? { y: ofY.force } : {}) },
    ...(armX && armY ? { arm: { x: armX, y: armY } } : {}),
  }
}

/** What acts on a storey, of each kind. @param names the levels above it and its own, from the top down */
export const windLoads = ({ loads, acting }: Wind, names: readonly string[]): readonly Load[] =>
  loads.map(({ loading, cases }) => ({ loading, cases, acting: names.map(name => acting(loading, name)) }))
