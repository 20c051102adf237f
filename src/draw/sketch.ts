/** Draws a level, or the whole building, with what of its results can be worked. */

import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { type Result, together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import { unit } from '../base/unit.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Storeys } from '../compute/storeys.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { drawDisplaced } from './displaced.ts'
import { displacedView } from './displacedview.ts'
import { planView } from './level-plan.ts'
import { drawPlan } from './plan.ts'
import { drawStoreys } from './storeys.ts'
import { storeyView } from './storeyview.ts'

interface Printing {
  readonly language: Language
  readonly system: System
}

/** A drawing, and the words that stand for it. */
export interface Drawn {
  readonly svg: string
  readonly alternative: string
}

/** @param caseName asks for the shears and the force of one case in place of the design shears */
export function sketchPlan(
  sheet: Worksheet,
  level: LevelWork,
  caseName: string | undefined,
  { language, system }: Printing,
): Result<Drawn> {
  const hasWalls = level.givens.walls.length > 0
  const parts = together({ grid: sheet.grid(), plan: level.plan(), walls: hasWalls ? level.walls() : good([]) })
  if (!parts.ok) return parts
  const [mass, rigidity] = [level.mass(), hasWalls ? level.rigidity() : undefined]
  const distribution = level.isLoaded() ? level.distribution() : undefined
  const view = planView({
    level: level.name,
    language,
    system,
    ...parts.value,
    thickness: name => {
      const read = sheet.constructions.get(name)?.()
      return read?.ok ? read.value.t : undefined
    },
    ...(mass.ok ? { mass: mass.value } : {}),
    ...(rigidity?.ok ? { rigidity: rigidity.value } : {}),
    ...(distribution?.ok ? { distribution: distribution.value } : {}),
    ...(caseName ? { caseName } : {}),
  })
  return good({ svg: drawPlan(view), alternative: view.description })
}

/** A level as it moves in a case. */
export function sketchDisplaced(
  level: LevelWork,
  displacement: Displacement,
  { language, system }: Printing,
): Result<Drawn> {
  const parts = together({
    plan: level.plan(),
    walls: level.walls(),
    mass: level.mass(),
    rigidity: level.rigidity(),
    distribution: level.distribution(),
  })
  if (!parts.ok) return parts
  const view = displacedView(
    { level: level.name, language, ...parts.value, scaleUnit: scaleUnitOf(system) },
    displacement,
  )
  return good({ svg: drawDisplaced(view), alternative: view.description })
}

export function sketchStoreys(storeys: Storeys, { language }: Printing): Result<Drawn> {
  const view = storeyView(storeys, language)
  return good({ svg: drawStoreys(view), alternative: view.description })
}

const scaleUnitOf = (system: System) => ({
  metres: unit(system === 'US' ? 'ft' : 'm').scale,
  name: system === 'US' ? 'ft' : 'm',
})
