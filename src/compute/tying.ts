/** Ties the walls of all levels together, where they can be: each stands on the wall of its name below. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { LevelLine } from '../model/levels.ts'
import type { Assumption, Scope } from '../model/scope.ts'
import { diagnose } from '../read/text.ts'
import type { LevelWork } from './level.ts'
import type { Spring } from './rigidity.ts'
import type { WallSection } from './section.ts'
import { type TiedDistribution, type TiedLevel, tieLevels } from './tied.ts'

/** @param lines from the top down */
export function tieWalls(
  lines: readonly LevelLine[],
  levels: readonly LevelWork[],
  scope: Scope,
): Result<readonly TiedDistribution[]> {
  const ready = all(lines.flatMap(line => tiedLevelOf(line, levels)))
  if (!ready.ok) return ready
  const faults = [...unlike(ready.value, levels), ...unloaded(ready.value, levels), ...unfounded(ready.value, levels)]
  if (faults.length > 0) return bad(faults)
  if (ready.value.some(({ sections }) => sections.size > 0)) asCantilevers.forEach(scope.assume)
  if (ready.value.some(({ sections, rigidity }) => sections.size < rigidity.springs.length)) scope.assume(asStated)
  return good(tieLevels(ready.value))
}

function tiedLevelOf({ name, elevation }: LevelLine, levels: readonly LevelWork[]): readonly Result<TiedLevel>[] {
  const level = levels.find(other => other.name === name)
  if (!level || !elevation) return []
  const parts = together({
    mass: level.mass(),
    rigidity: level.rigidity(),
    alone: level.storeyAlone(),
    display: level.display(),
    sections: sectionsOf(level),
  })
  if (!parts.ok) return [parts]
  const { mass, ...rest } = parts.value
  return [good({ level: name, elevation, mass: { x: mass.x, y: mass.y }, ...rest })]
}

export function sectionsOf(level: LevelWork): Result<ReadonlyMap<string, WallSection>> {
  const walls = level.walls()
  if (!walls.ok) return walls
  const found = all(walls.value.map(({ name }) => level.section(name) ?? good(undefined)))
  if (!found.ok) return found
  return good(new Map(walls.value.flatMap(({ name }, i) => (found.value[i] ? [[name, found.value[i]] as const] : []))))
}

/** A number without a unit cannot be set beside an E I. */
function unlike(tied: readonly TiedLevel[], levels: readonly LevelWork[]): readonly Diagnostic[] {
  const relative = tied.find(({ display }) => display.relative)
  const other = tied.find(({ display }) => !display.relative)
  if (!relative || !other) return []
  return [
    diagnose(
      'error',
      'stiffness-mixed',
      placeOf(relative.level, undefined, levels),
      `the walls of ${relative.level} have stiffness without a unit, and those of ${other.level} have not`,
      'Continuous walls are solved together: give every k a unit, or none.',
    ),
  ]
}

/** A case of one storey moves the walls of all, so that every storey has a part in it. */
function unloaded(tied: readonly TiedLevel[], levels: readonly LevelWork[]): readonly Diagnostic[] {
  const lowest = tied.at(-1)
  if (!lowest) return []
  return tied.flatMap(({ level, alone }) => {
    const missing = lowest.alone.cases.find(({ case: { name } }) => !alone.cases.some(each => each.case.name === name))
    if (!missing) return []
    return [
      diagnose(
        'error',
        'forces-not-alike',
        levels.find(({ name }) => name === level)?.givens.forces[0]?.info ?? placeOf(level, undefined, levels),
        `nothing acts on ${level} or above it in case ${missing.case.name}, in which a force acts on ${lowest.level}`,
        'Continuous walls are solved with all storeys together. State forces along the same axes at the highest level too.',
      ),
    ]
  })
}

/** How far a wall may stand off the line of the wall below it, in m, and how far it may turn from it, as a sine. */
const OFF_LINE = 0.05
const TURNED = 0.01

function unfounded(tied: readonly TiedLevel[], levels: readonly LevelWork[]): readonly Diagnostic[] {
  return tied.flatMap((level, i) => {
    const under = tied[i + 1]
    if (!under) return []
    return level.rigidity.springs.flatMap((wall): readonly Diagnostic[] => {
      if (!level.sections.has(wall.name)) return []
      const at = placeOf(level.level, wall.name, levels)
      const foot = under.rigidity.springs.find(({ name }) => name === wall.name)
      if (!foot)
        return [
          diagnose(
            'error',
            'wall-without-foundation',
            at,
            `wall ${wall.name} of ${level.level} has no wall of its name at ${under.level} to stand on`,
            'A continuous wall runs up from the foundation. Add it below, or write walls: storey by storey.',
          ),
        ]
      const also = { also: [{ span: placeOf(under.level, wall.name, levels), text: `${wall.name} of ${under.level}` }] }
      if (!under.sections.has(wall.name))
        return [
          diagnose(
            'error',
            'wall-without-foundation',
            at,
            `wall ${wall.name} of ${level.level} stands on a wall of stated stiffness`,
            'A stated k says nothing of how the wall turns at its head. Give the wall below a construction, or this one a k.',
            also,
          ),
        ]
      if (inLine(wall, foot)) return []
      return [
        diagnose(
          'error',
          'wall-out-of-line',
          at,
          `wall ${wall.name} of ${level.level} is not in line with the wall of its name at ${under.level}`,
          'Walls of one name are one cantilever. Put them in one line, or write walls: storey by storey.',
          also,
        ),
      ]
    })
  })
}

function inLine(wall: Spring, foot: Spring): boolean {
  const turned = wall.c.si * foot.s.si - wall.s.si * foot.c.si
  const off = (wall.x.si - foot.x.si) * foot.s.si - (wall.y.si - foot.y.si) * foot.c.si
  return Math.abs(turned) <= TURNED && Math.abs(off) <= OFF_LINE
}

function placeOf(level: string, wall: string | undefined, levels: readonly LevelWork[]) {
  const found = levels.find(({ name }) => name === level)
  const walls = found?.walls()
  const row = walls?.ok ? walls.value.find(({ name }) => name === wall) : undefined
  return row?.place ?? found?.givens.walls[0]?.info ?? found?.anchor ?? { start: 0, end: 0 }
}

const asCantilevers: readonly Assumption[] = [
  {
    text: 'Walls of one name are one cantilever from the foundation up, held against turning there; the ends of their constructions are not used.',
    because: 'walls are continuous',
  },
  { text: 'Floors tie the walls but do not bend them.', because: 'no coupling by slabs or beams is worked' },
]

const asStated: Assumption = {
  text: 'Walls of stated stiffness resist storey by storey.',
  because: 'a stated k says nothing of how a wall bends through several storeys',
}
