/** The work on one level, each part on demand and once. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { NO_UNIT } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Area, readAreas, type ShareByWord } from '../model/areas.ts'
import type { Construction } from '../model/construction.ts'
import { type CommonShare, type Forces, readForces } from '../model/forces.ts'
import type { LevelGivens } from '../model/givens.ts'
import type { Grid } from '../model/grid.ts'
import { type LineLoad, type PointLoad, readLineLoads, readPointLoads } from '../model/loads.ts'
import { type Opening, readOpenings } from '../model/openings.ts'
import type { Scope } from '../model/scope.ts'
import { readWalls, type Wall } from '../model/walls.ts'
import type { Block } from '../read/block.ts'
import { casesOf } from './cases.ts'
import { type Displacement, workDisplacement } from './displacement.ts'
import { type Distribution, type Load, workDistribution } from './distribution.ts'
import {
  atOneLevel,
  driftNotWorked,
  forcesTwice,
  loadsOutside,
  mixedStiffness,
  rigidAssumptions,
  storeyByStorey,
  strengthByLength,
  topicMissing,
  unstable,
  wallOutside,
} from './level-faults.ts'
import type { Movable } from './loading.ts'
import { type Mass, workMass } from './mass.ts'
import type { Pierced } from './pierced.ts'
import { type Plan, workPlan } from './plan.ts'
import { type Redundancy, workRedundancy } from './redundancy.ts'
import { type Rigidity, type Spring, workRigidity } from './rigidity.ts'
import type { WallSection } from './section.ts'
import type { Moduli, WallLine } from './stiffness.ts'
import { accidentalArm, type Eccentricity, workEccentricity } from './storey.ts'
import type { TiedDistribution } from './tied.ts'
import { wallsWork } from './walls-work.ts'
import { type Wind, windLoads } from './wind.ts'
import { levelWindValue } from './wind-building.ts'

/** What a level needs from the rest of the building. */
export interface Surroundings {
  readonly scope: Scope
  readonly grid: () => Result<Grid>
  readonly construction: (name: string) => (() => Result<Construction>) | undefined
  readonly constructionNames: readonly string[]
  readonly forceTables: () => readonly Block[]
  /** Share of a variable load that counts as weight, by a word of the standard. */
  readonly shareByWord: ShareByWord
  /** Share of accidental eccentricity where none is stated. */
  readonly commonShare: CommonShare
  /** Forces of a level as its standard has them; absent where the document does not ask for them. */
  readonly seismicForces: ((level: string) => Result<Forces>) | undefined
  /** Faults of blocks of a topic that found no level. */
  readonly strays: (topic: string) => readonly Diagnostic[]
  /** Wind on the building, where the document has it. */
  readonly wind: () => Result<Wind | undefined>
  /** True where forces are stated for any level, or what states them has faults. */
  readonly forcesStated: () => boolean
  /** The levels above this one, from the top down. */
  readonly above: () => Result<readonly LevelWork[]>
  /** The distribution of a level whose walls run through the levels; absent where each storey is worked on its own. */
  readonly tied: (level: string) => Result<TiedDistribution> | undefined
}

export interface LevelWork {
  readonly name: string
  readonly givens: LevelGivens
  /** Where a fault of the level as a whole is shown. */
  readonly anchor: Span
  readonly display: () => Result<Display>
  readonly areas: () => Result<readonly Area[]>
  readonly plan: () => Result<Plan>
  readonly mass: () => Result<Mass>
  readonly walls: () => Result<readonly Wall[]>
  readonly openings: () => Result<readonly Opening[]>
  readonly line: (name: string) => Result<WallLine> | undefined
  readonly moduli: (construction: string) => Result<Moduli>
  readonly stiffness: (name: string) => Result<Value> | undefined
  /** Strips and piers of a built wall with openings; a value of undefined for any other wall. */
  readonly pierced: (name: string) => Result<Pierced | undefined> | undefined
  readonly springs: () => Result<readonly Spring[]>
  readonly rigidity: () => Result<Rigidity>
  readonly eccentricity: () => Result<Eccentricity>
  readonly forces: () => Result<Forces | undefined>
  readonly acting: () => Result<Movable>
  /** A value of the wind on the level, by the rest of its id. */
  readonly windValue: (path: readonly string[]) => Result<Value> | undefined
  /** True where wind acts on the level, and where any force does. */
  readonly hasWind: () => boolean
  readonly isLoaded: () => boolean
  readonly distribution: () => Result<Distribution>
  /** The storey worked on its own, whatever its walls do above and below. */
  readonly storeyAlone: () => Result<Distribution>
  /** The same under ids of its own, `L.alone.…`, to stand beside the distribution of continuous walls. */
  readonly alone: () => Result<Distribution>
  /** Present where walls run through the levels. */
  readonly tied: () => Result<TiedDistribution> | undefined
  /** E I and G A_v of a built wall; a value of undefined for a wall of stated stiffness. */
  readonly section: (name: string) => Result<WallSection | undefined> | undefined
  readonly displacements: () => Result<readonly Displacement[]>
  /** The storey without each of its walls. */
  readonly redundancy: () => Result<Redundancy>
}

export function levelWork(givens: LevelGivens, around: Surroundings): LevelWork {
  const { name } = givens
  const { scope } = around
  const blocks = [...givens.areas, ...givens.walls, ...givens.forces, ...givens.lineLoads, ...givens.pointLoads]
  const anchor = blocks[0]?.info ?? { start: 0, end: 0 }
  const once = <T>(what: string, work: () => Result<T>, at: Span = anchor) =>
    scope.ledger.once(`${name}.${what}`, at, work)

  /** A block that found no level is the cause of what this one lacks. */
  const missing = (topic: string): readonly Diagnostic[] => {
    const strays = around.strays(topic)
    return strays.length > 0 ? strays : [topicMissing(name, topic, anchor)]
  }

  const areas = once('areas', () => {
    const grid = around.grid()
    if (!grid.ok) return grid
    if (givens.areas.length === 0) return bad(missing('areas'))
    return readAreas(givens.areas, name, grid.value, scope)
  })

  const plan = once('area', () => {
    const given = areas()
    if (!given.ok) return given
    const made = workPlan(name, given.value, scope.display)
    if (made.ok) made.value.warnings.forEach(scope.warn)
    return made
  })

  const lines = once('line-loads', (): Result<readonly LineLoad[]> => {
    const grid = around.grid()
    return grid.ok ? readLineLoads(givens.lineLoads, name, grid.value, scope) : grid
  })

  const points = once('point-loads', (): Result<readonly PointLoad[]> => {
    const grid = around.grid()
    return grid.ok ? readPointLoads(givens.pointLoads, name, grid.value, scope) : grid
  })

  const mass = once('W', () => {
    const parts = together({ plan: plan(), lines: lines(), points: points() })
    if (!parts.ok) return parts
    const { plan: drawn, lines: along, points: at } = parts.value
    loadsOutside([...along, ...at], drawn, scope.display).forEach(scope.warn)
    return workMass(drawn, along, at, anchor, around.shareByWord, scope)
  })

  const walls = once('walls', () => {
    const grid = around.grid()
    if (!grid.ok) return grid
    if (givens.walls.length === 0) return bad(missing('walls'))
    return readWalls(givens.walls, name, grid.value, scope)
  })

  const readAllOpenings = (): Result<readonly Opening[]> => {
    const given = givens.openings.length > 0 ? walls() : good([])
    return given.ok ? readOpenings(givens.openings, name, given.value, scope) : given
  }
  const openings = once('openings', readAllOpenings, givens.openings[0]?.info)

  const wallOf = (wall: string) => {
    const all = walls()
    return all.ok ? all.value.find(({ name }) => name === wall) : undefined
  }

  const { lineFor, moduli, stiffnessFor, piercedFor, sectionFor } = wallsWork(name, openings, around, once, anchor)

  const springs = once('walls.k', (): Result<readonly Spring[]> => {
    const given = walls()
    if (!given.ok) return given
    const outside = plan()
    const faults = outside.ok ? given.value.flatMap(wall => wallOutside(wall, outside.value, scope.display)) : []
    const made = all(
      given.value.map((wall): Result<Spring> => {
        const k = stiffnessFor(wall)
        return k.ok ? good({ name: wall.name, ...lineFor(wall), k: k.value }) : k
      }),
    )
    if (faults.length > 0) return bad([...faults, ...(made.ok ? [] : made.because)])
    if (!made.ok) return made
    const mixed = mixedStiffness(given.value, made.value)
    return mixed ? bad([mixed]) : made
  })

  const display = once('stiffness', (): Result<Display> => {
    const made = springs()
    return made.ok ? good({ ...scope.display, relative: made.value.some(({ k }) => k.unit === NO_UNIT) }) : made
  })

  const rigidity = once('CR', (): Result<Rigidity> => {
    const parts = together({ springs: springs(), display: display() })
    if (!parts.ok) return parts
    const made = workRigidity(name, parts.value.springs, parts.value.display)
    for (const assumption of rigidAssumptions(name)) scope.assume(assumption)
    return made.ok ? made : bad([unstable(name, made.because, givens.walls[0]?.info ?? anchor)])
  })

  const eccentricity = once('e', (): Result<Eccentricity> => {
    const parts = together({ mass: mass(), rigidity: rigidity(), display: display() })
    return parts.ok
      ? good(workEccentricity(name, 'seismic', parts.value.mass, parts.value.rigidity, parts.value.display))
      : parts
  })

  const forces = once('force', (): Result<Forces | undefined> => {
    const stated = readForces(givens.forces, around.forceTables(), name, around.commonShare, scope)
    if (!around.seismicForces || !stated.ok) return stated
    const block = givens.forces[0] ?? around.forceTables()[0]
    return stated.value && block ? bad([forcesTwice(name, block.info)]) : around.seismicForces(name)
  })

  const acting = once('acting', (): Result<Movable> => {
    const parts = together({ forces: forces(), mass: mass(), plan: plan() })
    if (!parts.ok) return parts
    const { forces: given, mass: m, plan: p } = parts.value
    if (!given) return bad(missing('forces'))
    const arm = (axis: 'x' | 'y') =>
      work(
        `${name}.ea.${axis}`,
        accidentalArm[axis],
        { alpha: given.accidental, [`B_${axis}`]: p.size[axis] },
        scope.display,
      )
    return good({
      level: name,
      at: { x: m.x, y: m.y },
      force: { ...(given.x ? { x: given.x } : {}), ...(given.y ? { y: given.y } : {}) },
      arm: { x: arm('x'), y: arm('y') },
    })
  })

  /** What acts on the storey: the forces of this level and those above it, and wind where the document has it. */
  const loads = once('loads', (): Result<readonly Load[]> => {
    const parts = together({ above: around.above(), wind: around.wind() })
    if (!parts.ok) return parts
    const { above, wind } = parts.value
    const ofWind = wind ? windLoads(wind, [...above.map(({ name }) => name), name]) : []
    if (wind && !around.forcesStated()) return good(ofWind)
    const acts = all([...above.map(level => level.acting()), acting()])
    if (!acts.ok) return acts
    if (wind) scope.assume(atOneLevel)
    const axes = (['x', 'y'] as const).filter(axis => acts.value.some(({ force }) => force[axis]))
    return good([{ loading: 'seismic', cases: casesOf(axes), acting: acts.value }, ...ofWind])
  })

  /** @param as the level's name in the ids */
  const workAlone = (as: string): Result<Distribution> => {
    const parts = together({ rigidity: rigidity(), display: display(), loads: loads() })
    if (!parts.ok) return parts
    const { rigidity: own, display: shown } = parts.value
    return good(workDistribution({ ...own, level: as }, parts.value.loads, shown))
  }
  const storeyAlone = once('storey', () => workAlone(name))
  const alone = once('alone', () => workAlone(`${name}.alone`))

  const distribution = once('shears', (): Result<Distribution> => {
    const tied = around.tied(name)
    if (tied) return tied
    const above = around.above()
    if (above.ok && above.value.length > 0) scope.assume(storeyByStorey)
    return storeyAlone()
  })

  /** Where nothing is stated of the forces and of wind, there is nothing to share out; a fault in them is told where it shows. */
  const isLoaded = (): boolean => {
    const given = forces()
    return hasWind() || (given.ok && given.value !== undefined)
  }

  const hasWind = (): boolean => {
    const wind = around.wind()
    return wind.ok && wind.value !== undefined
  }

  const displacements = once('displacement', (): Result<readonly Displacement[]> => {
    const parts = together({
      plan: plan(),
      mass: mass(),
      rigidity: rigidity(),
      distribution: distribution(),
      display: display(),
    })
    if (!parts.ok) return parts
    const { plan: p, mass: m, rigidity: r, distribution: d, display: shown } = parts.value
    if (shown.relative) return bad([driftNotWorked(name, givens.walls[0]?.info ?? anchor)])
    return good(d.cases.map(each => workDisplacement(p, m, r, each, shown)))
  })

  const redundancy = once('redundancy', (): Result<Redundancy> => {
    const parts = together({
      rigidity: rigidity(),
      walls: walls(),
      alone: storeyAlone(),
      plan: plan(),
      display: display(),
    })
    if (!parts.ok) return parts
    const { rigidity: r, walls: given, alone: storey, plan: p, display: shown } = parts.value
    if (given.some(({ strength }) => !strength)) scope.assume(strengthByLength(name))
    return good(workRedundancy(r, given, storey, p, shown))
  })

  return {
    name,
    givens,
    anchor,
    display,
    areas,
    plan,
    mass,
    walls,
    openings,
    line: wall => {
      const found = wallOf(wall)
      return found && good(lineFor(found))
    },
    moduli,
    stiffness: wall => {
      const found = wallOf(wall)
      return found && stiffnessFor(found)
    },
    pierced: wall => {
      const found = wallOf(wall)
      return found && piercedFor(found)
    },
    springs,
    rigidity,
    eccentricity,
    forces,
    acting,
    windValue: path => levelWindValue(around.wind, name, path),
    hasWind,
    isLoaded,
    distribution,
    storeyAlone,
    alone,
    tied: () => around.tied(name),
    section: wall => {
      const found = wallOf(wall)
      return found && sectionFor(found)
    },
    displacements,
    redundancy,
  }
}
