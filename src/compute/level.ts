/** The work on one level, each part on demand and once. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { inWords, suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { NO_UNIT } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Area, readAreas } from '../model/areas.ts'
import type { Construction } from '../model/construction.ts'
import { type Forces, readForces } from '../model/forces.ts'
import { distanceFrom } from '../model/geometry.ts'
import type { LevelGivens } from '../model/givens.ts'
import type { Grid } from '../model/grid.ts'
import { type LineLoad, type PointLoad, readLineLoads, readPointLoads } from '../model/loads.ts'
import type { Assumption, Scope } from '../model/scope.ts'
import { readStiffness, readWalls, type Wall } from '../model/walls.ts'
import type { Block } from '../read/block.ts'
import { diagnose } from '../read/text.ts'
import { type Displacement, workDisplacement } from './displacement.ts'
import { type Distribution, workDistribution } from './distribution.ts'
import { type Mass, workMass } from './mass.ts'
import { type Plan, workPlan } from './plan.ts'
import { type Rigidity, type Spring, type Unstable, workRigidity } from './rigidity.ts'
import { type Moduli, type WallLine, workLine, workModuli, workStiffness } from './stiffness.ts'
import { type Acting, accidentalArm, type Eccentricity, workEccentricity } from './storey.ts'

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
  readonly line: (name: string) => Result<WallLine> | undefined
  readonly moduli: (construction: string) => Result<Moduli>
  readonly stiffness: (name: string) => Result<Value> | undefined
  readonly springs: () => Result<readonly Spring[]>
  readonly rigidity: () => Result<Rigidity>
  readonly eccentricity: () => Result<Eccentricity>
  readonly forces: () => Result<Forces | undefined>
  readonly acting: () => Result<Acting>
  readonly distribution: () => Result<Distribution>
  readonly displacements: () => Result<readonly Displacement[]>
}

/** A wall may stand this far off the edge of its level, in m: its thickness, and the slack of a sketch. */
const OFF_EDGE = 0.3

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
    return parts.ok ? workMass(parts.value.plan, parts.value.lines, parts.value.points, anchor, scope) : parts
  })

  const walls = once('walls', () => {
    const grid = around.grid()
    if (!grid.ok) return grid
    if (givens.walls.length === 0) return bad(missing('walls'))
    return readWalls(givens.walls, name, grid.value, scope)
  })

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

  const stiffnesses = new Map<string, () => Result<Value>>()
  const stiffnessFor = (wall: Wall): Result<Value> => {
    let known = stiffnesses.get(wall.name)
    if (!known) {
      known = once(`wall.${wall.name}.k`, () => workWallStiffness(wall), wall.span)
      stiffnesses.set(wall.name, known)
    }
    return known()
  }

  const workWallStiffness = (wall: Wall): Result<Value> => {
    if (wall.kind === 'stated') return readStiffness(wall, name, scope)
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
    const parts = together({ construction: read(), moduli: moduli(text) })
    if (!parts.ok) return parts
    return good(workStiffness(wall, lineFor(wall).L, parts.value.construction, parts.value.moduli, name, scope.display))
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

  const distribution = once('storey', (): Result<Distribution> => {
    const above = around.above()
    if (!above.ok) return above
    if (above.value.length > 0) scope.assume(storeyByStorey)
    const actings = all([...above.value.map(level => level.acting()), acting()])
    const parts = together({ rigidity: rigidity(), mass: mass(), display: display(), actings })
    if (!parts.ok) return parts
    return good(workDistribution(parts.value.rigidity, parts.value.actings, parts.value.mass, parts.value.display))
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

  return {
    name,
    givens,
    anchor,
    display,
    areas,
    plan,
    mass,
    walls,
    line: wall => {
      const found = wallOf(wall)
      return found && good(lineFor(found))
    },
    moduli,
    stiffness: wall => {
      const found = wallOf(wall)
      return found && stiffnessFor(found)
    },
    springs,
    rigidity,
    eccentricity,
    forces,
    acting,
    distribution,
    displacements,
  }
}

const topicMissing = (level: string, topic: string, at: Span): Diagnostic =>
  diagnose('error', `${topic}-missing`, at, `level ${level} has no ${topic}`, `Give them in a block ${topic} ${level}.`)

function wallOutside(
  { name, from, to, place }: Wall,
  { outline, areas }: Plan,
  { system }: Display,
): readonly Diagnostic[] {
  const ends = [from, to].map(({ x, y }) => ({ x: x.si, y: y.si }))
  const [a, b] = ends
  if (!a || !b) return []
  const off = Math.min(...outline.map(ring => distanceFrom(ring, a, b)))
  if (off <= OFF_EDGE) return []
  const print = (metres: number) => (system === 'US' ? `${(metres / 0.3048).toFixed(2)} ft` : `${metres.toFixed(2)} m`)
  const where = `from x = ${print(a.x)}, y = ${print(a.y)} to x = ${print(b.x)}, y = ${print(b.y)}`
  const also = areas.map(({ name, span }) => ({ span, text: `${name} is an area of the level` }))
  return [
    diagnose(
      'error',
      'wall-outside-level',
      place,
      `wall ${name} stands ${print(off)} outside its level`,
      'A diaphragm can only push on walls that it meets.\nMove the wall, or extend an area.',
      { label: where, also: also.slice(0, 3) },
    ),
  ]
}

function mixedStiffness(walls: readonly Wall[], springs: readonly Spring[]): Diagnostic | undefined {
  const relative = springs.filter(({ k }) => k.unit === NO_UNIT).map(({ name }) => name)
  const absolute = springs.filter(({ k }) => k.unit !== NO_UNIT).map(({ name }) => name)
  const wall = walls.find(({ name }) => name === relative[0])
  const other = walls.find(({ name }) => name === absolute[0])
  if (!wall || !other) return undefined
  return diagnose(
    'error',
    'stiffness-mixed',
    wall.span,
    `wall ${wall.name} has a stiffness without a unit, and wall ${other.name} has one with a unit`,
    'Give every k of a level a unit, or none.',
    { also: [{ span: other.span, text: `${other.name} has a unit` }] },
  )
}

const unstableHelp: Readonly<Record<Unstable, string>> = {
  'no stiffness along x': 'Add a wall that is not parallel to y.',
  'no stiffness along y': 'Add a wall that is not parallel to x.',
  'all walls are parallel': 'Add a wall in another direction.',
  'all walls meet in one point':
    'Add a wall whose line does not pass through that point: without one nothing resists torsion.',
}

const unstable = (level: string, because: Unstable, at: Span): Diagnostic =>
  diagnose(
    'error',
    'walls-unstable',
    at,
    `the walls of ${level} cannot hold it: ${because}`,
    `A rigid diaphragm needs stiffness along both axes and against turning. ${unstableHelp[because]}`,
  )

const storeyByStorey: Assumption = {
  text: 'Each storey is worked on its own: its walls stand on what is below as on a foundation.',
  because: 'walls are worked storey by storey',
}

/** What the model of a floor on springs takes for granted. */
const rigidAssumptions = (level: string): readonly Assumption[] => [
  { text: `The diaphragm of ${verbatim(level)} is rigid in its plane.`, because: 'no other behaviour is worked' },
  { text: 'Walls resist along their own line only.', because: 'their stiffness across it is left out' },
]

const driftNotWorked = (level: string, at: Span): Diagnostic =>
  diagnose(
    'warning',
    'drift-not-worked',
    at,
    `displacement of ${level} is not worked`,
    `Its walls have relative stiffness, which fixes ${inWords(['shares of force'], 'and')} but not displacement. Give them a construction, or k with a unit.`,
  )
