/** Makes the levels of a document ready to vibrate. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { all, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { LevelLine } from '../model/levels.ts'
import type { Assumption, Scope } from '../model/scope.ts'
import { diagnose } from '../read/text.ts'
import type { LevelWork } from './level.ts'
import { driftNotWorked } from './level-faults.ts'
import { sectionsOf } from './tying.ts'
import { type VibratingLevel, type Vibration, workVibration } from './vibration.ts'

/** @param lines from the top down */
export function vibrate(lines: readonly LevelLine[], levels: readonly LevelWork[], scope: Scope): Result<Vibration> {
  const ready = vibratingLevels(lines, levels)
  if (!ready.ok) return ready
  scope.assume(masses)
  return good(workVibration(ready.value, scope.display))
}

/** The levels from the top down, as their modes are worked from. */
export function vibratingLevels(
  lines: readonly LevelLine[],
  levels: readonly LevelWork[],
): Result<readonly VibratingLevel[]> {
  return all(
    lines.flatMap(line => {
      const level = levels.find(({ name }) => name === line.name)
      return level ? [vibratingLevel(line, level)] : []
    }),
  )
}

function vibratingLevel({ name, elevation }: LevelLine, level: LevelWork): Result<VibratingLevel> {
  const tied = level.tied()
  const parts = together({
    mass: level.mass(),
    rigidity: level.rigidity(),
    display: level.display(),
    tied: tied ?? good(undefined),
    sections: tied ? sectionsOf(level) : good(new Map()),
  })
  if (!parts.ok) return parts
  const { mass, rigidity, display, sections } = parts.value
  const at = level.givens.walls[0]?.info ?? level.anchor
  if (display.relative) return bad([driftNotWorked(name, at)])
  if (!(mass.Ip.si > 0)) return bad([noExtent(name, level)])
  return good({ level: name, mass, rigidity, sections, ...(elevation ? { elevation } : {}) })
}

const noExtent = (name: string, { anchor }: LevelWork): Diagnostic =>
  diagnose(
    'error',
    'mass-in-one-point',
    anchor,
    `all weight of ${name} is in one point`,
    'It then has no inertia against turning. Give its weight as areas or lines.',
  )

const masses: Assumption = {
  text: 'Each level vibrates as a rigid floor with its weight over standard gravity, 9.80665 m/s², as mass; walls add no mass of their own.',
  because: 'modes of vibration are worked with the weights that are given',
}
