/** Draws a level with what of its results can be worked. */

import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { type Result, together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { planView } from './level-plan.ts'
import { drawPlan } from './plan.ts'

/** @param caseName asks for the shears and the force of one case in place of the design shears */
export function sketchPlan(
  sheet: Worksheet,
  level: LevelWork,
  caseName: string | undefined,
  { language, system }: { readonly language: Language; readonly system: System },
): Result<{ readonly svg: string; readonly alternative: string }> {
  const hasWalls = level.givens.walls.length > 0
  const parts = together({ grid: sheet.grid(), plan: level.plan(), walls: hasWalls ? level.walls() : good([]) })
  if (!parts.ok) return parts
  const [mass, rigidity, forces] = [level.mass(), hasWalls ? level.rigidity() : undefined, level.forces()]
  const distribution = forces.ok && forces.value ? level.distribution() : undefined
  const view = planView({
    level: level.name,
    language,
    system,
    ...parts.value,
    ...(mass.ok ? { mass: mass.value } : {}),
    ...(rigidity?.ok ? { rigidity: rigidity.value } : {}),
    ...(distribution?.ok ? { distribution: distribution.value } : {}),
    ...(caseName ? { caseName } : {}),
  })
  return good({ svg: drawPlan(view), alternative: view.description })
}
