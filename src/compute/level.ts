/** The work on one level, each part on demand and once. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { NO_UNIT } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Area, readAreas } from '../model/areas.ts'
import type { Construction } from '../model/construction.ts'
import { type Forces, readForces } from '../model/forces.ts'
import type { LevelGivens } from '../model/givens.ts'
import type { Grid } from '../model/grid.ts'
import { type LineLoad, type PointLoad, readLineLoads, readPointLoads } from '../model/loads.ts'
import { type Opening, readOpenings } from '../model/openings.ts'
import type { Scope } from '../model/scope.ts'
import { type BuiltWall, readStiffness, readWalls, type Wall } from '../model/walls.ts'
import type { Block } from '../read/block.ts'
import { diagnose } from '../read/text.ts'
import { type Displacement, workDisplacement } from './displacement.ts'
import { type Distribution, workDistribution } from './distribution.ts'
import {
  driftNotWorked,
  loadsOutside,
  mixedStiffness,
  rigidAssumptions,
  storeyByStorey,
  strengthByLength,
  topicMissing,
  unstable,
  wallOutside,
} from './level-faults.ts'
import { type Mass, workMass } from './mass.ts'
import { drawnOnly } from './opening-faults.ts'
import { type Pierced, workPierced } from './pierced.ts'
import { type Plan, workPlan } from './plan.ts'
import { type Redundancy, workRedundancy } from './redundancy.ts'
import { type Rigidity, type Spring, workRigidity } from './rigidity.ts'
import { type WallSection, workSection } from './section.ts'
import { type Moduli, type WallLine, workLine, workModuli, workStiffness } from './stiffness.ts'
import { type Acting, accidentalArm, type Eccentricity, workEccentricity } from './storey.ts'
import type { TiedDistribution } from './tied.ts'

/** What a level needs from the rest of the building. */
export interface Surroundings {
  readonly scope: Scope
  readonly grid: () => Result<Grid>
  readonly construction: (name: string) => (() => Result<Construction>) | undefined
  readonly constructionNames: readonly string[]
  readonly forceTables: readonly Block[]
  /** Faults of blocks of a topic that found no level. */
  readonly strays: (topic: string) => readonly Diagnostic[]
  /** The levels above this one, the nearest first. */
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
  readonly acting: () => Result<Acting>
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
    return workMass(drawn, along, at, anchor, scope)
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

  const lineOf = new Map<string, WallLine>()
  const lineFor = (wall: Wall): WallLine => {
    const known = lineOf.get(wall.name) ?? workLine(wall, name, scope.display)
    lineOf.set(wall.name, known)
    return known
  }

  const built = new Map<string, () => Result<Moduli>>()
  const moduli = (construction: string): Result<Moduli> => {
    const read = around.construction(construction)
    if (!read) return bad([])
    let known = built.get(construction)
    if (!known) {
      known = scope.ledger.once(`constructions.${construction}`, anchor, () => {
        const made = read()
        return made.ok ? good(workModuli(made.value, scope.display, scope.assume)) : made
      })
      built.set(construction, known)
    }
    return known()
  }

  /** Work on one wall, once for each. */
  const forEachWall = <T>(what: string, work: (wall: Wall) => Result<T>): ((wall: Wall) => Result<T>) => {
    const known = new Map<string, () => Result<T>>()
    return wall => {
      const own = known.get(wall.name) ?? once(`wall.${wall.name}.${what}`, () => work(wall), wall.span)
      known.set(wall.name, own)
      return own()
    }
  }
  const stiffnessFor = forEachWall('k', wall => workWallStiffness(wall))

  const workWallStiffness = (wall: Wall): Result<Value> => {
    const cut = piercedFor(wall)
    if (!cut.ok) return cut
    if (cut.value) return good(cut.value.k)
    if (wall.kind === 'stated') return readStiffness(wall, name, scope)
    const parts = partsOf(wall)
    if (!parts.ok) return parts
    return good(workStiffness(wall, lineFor(wall).L, parts.value.construction, parts.value.moduli, name, scope.display))
  }

  const piercedFor = forEachWall('openings', wall => workPiercedWall(wall))

  const workPiercedWall = (wall: Wall): Result<Pierced | undefined> => {
    const given = openings()
    if (!given.ok) return given
    const mine = given.value.filter(opening => opening.wall === wall.name)
    if (mine.length === 0) return good(undefined)
    if (wall.kind === 'stated') {
      scope.assume(drawnOnly(wall.name))
      return good(undefined)
    }
    const parts = partsOf(wall)
    if (!parts.ok) return parts
    const { construction, moduli } = parts.value
    return workPierced(wall, lineFor(wall).L, mine, construction, moduli, name, scope.display)
  }

  const partsOf = (wall: BuiltWall) => {
    const { text, span } = wall.construction
    const read = around.construction(text)
    if (!read)
      return bad([
        diagnose(
          'error',
          'unknown-construction',
          span,
          `there is no construction ${text}`,
          suggestion(text, around.constructionNames, 'construction'),
        ),
      ])
    return together({ construction: read(), moduli: moduli(text) })
  }

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
    return parts.ok ? good(workEccentricity(name, parts.value.mass, parts.value.rigidity, parts.value.display)) : parts
  })

  const forces = once('force', () => readForces(givens.forces, around.forceTables, name, scope))

  const acting = once('acting', (): Result<Acting> => {
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
      mass: { x: m.x, y: m.y },
      force: { ...(given.x ? { x: given.x } : {}), ...(given.y ? { y: given.y } : {}) },
      arm: { x: arm('x'), y: arm('y') },
    })
  })

  /** @param as the level's name in the ids */
  const workAlone = (as: string): Result<Distribution> => {
    const above = around.above()
    if (!above.ok) return above
    const actings = all([...above.value.map(level => level.acting()), acting()])
    const parts = together({ rigidity: rigidity(), mass: mass(), display: display(), actings })
    if (!parts.ok) return parts
    const { rigidity: own, mass: m, display: shown } = parts.value
    return good(workDistribution({ ...own, level: as }, parts.value.actings, m, shown))
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

  const sectionFor = forEachWall('EI', (wall): Result<WallSection | undefined> => {
    if (wall.kind === 'stated') return good(undefined)
    const parts = together({ made: partsOf(wall), cut: piercedFor(wall) })
    if (!parts.ok) return parts
    const { made, cut } = parts.value
    return good(workSection(wall, lineFor(wall).L, made.construction, made.moduli, cut?.k, name, scope.display))
  })

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
