/** Draws the elevation of a wall with what of its results can be worked. */
import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Wall } from '../model/walls.ts'
import { diagnose } from '../read/text.ts'
import { drawElevation } from './elevation.ts'
import { elevationView, type WallPicture } from './level-elevation.ts'

/** @param caseName asks for the shear of one case in place of the design shear */
export function sketchElevation(
  sheet: Worksheet,
  level: LevelWork,
  wall: Wall,
  caseName: string | undefined,
  { language, system }: { readonly language: Language; readonly system: System },
): Result<{ readonly svg: string; readonly alternative: string }> {
  const { height } = wall
  if (!height)
    return bad([
      diagnose(
        'error',
        'height-missing',
        wall.span,
        `wall ${wall.name} is to be drawn and has no height`,
        'Give its height, or name other walls.',
      ),
    ])
  const line = level.line(wall.name)
  const cut = level.pierced(wall.name)
  if (!line || !cut) throw new Error(`${wall.name} is no wall of ${level.name}`)
  const parts = together({ grid: sheet.grid(), line, cut, openings: level.openings(), levels: sheet.levelLines() })
  if (!parts.ok) return parts
  const { cut: pierced, openings, levels, ...rest } = parts.value
  const construction = wall.kind === 'built' ? sheet.constructions.get(wall.construction.text)?.() : undefined
  const view = elevationView({
    level: level.name,
    language,
    system,
    wall,
    height,
    ...rest,
    openings: openings.filter(opening => opening.wall === wall.name),
    ...(construction?.ok ? { thickness: construction.value.t } : {}),
    ...(pierced ? { pierced } : {}),
    ...elevationsOf(level.name, levels),
    ...shearOf(level, wall.name, caseName),
  })
  return good({ svg: drawElevation(view), alternative: view.description })
}

type Levels = ReturnType<Worksheet['levelLines']> extends Result<infer L> ? L : never

/** Levels come from the highest down; the lowest stands on the base. */
function elevationsOf(level: string, levels: Levels): Pick<WallPicture, 'elevations'> {
  const mine = levels.findIndex(({ name }) => name === level)
  const own = levels[mine]?.elevation
  if (!own) return {}
  const under = levels[mine + 1]
  return {
    elevations: {
      own,
      below: under ? { name: under.name, ...(under.elevation ? { at: under.elevation } : {}) } : { name: 'base' },
    },
  }
}

function shearOf(level: LevelWork, wall: string, caseName: string | undefined): Pick<WallPicture, 'shear'> {
  const distribution = level.isLoaded() ? level.distribution() : undefined
  if (!distribution?.ok) return {}
  const { design, cases, governingWall } = distribution.value
  const table = caseName === undefined ? design : cases.find(each => each.case.name === caseName)?.walls
  const at = design.rows.indexOf(wall)
  if (!table || at === -1) return {}
  return {
    shear: {
      value: table.column('V').cell(at),
      ...(caseName === undefined ? {} : { caseName }),
      governs: governingWall === at,
    },
  }
}
