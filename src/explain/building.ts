/** Workings that tell of the whole building rather than of one level. */
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { diagnose } from '../read/text.ts'
import type { Context } from './context.ts'
import type { BuildingWant, Request } from './request.ts'
import { explainSeismic } from './seismic.ts'
import type { Piece } from './sheet.ts'
import { explainStoreys } from './storeys.ts'
import { explainWindForces, explainWindPressures } from './wind.ts'

const headings: Readonly<Record<BuildingWant, string>> = {
  'storey shears': 'Storey shears',
  'design spectrum': 'Design spectrum',
  'base shear': 'Base shear',
  'storey forces': 'Storey forces',
  'diaphragm forces': 'Diaphragm forces',
  'wind pressures': 'Wind pressures',
  'wind forces': 'Wind forces',
}

/** @param level the level that the working names, if any */
export function explainBuilding(
  want: BuildingWant,
  sheet: Worksheet,
  level: LevelWork | undefined,
  request: Request,
  context: Context,
): readonly Piece[] {
  const head: readonly Piece[] = request.whole ? [{ kind: 'heading', id: '', text: context.words(headings[want]) }] : []
  return [...head, ...piecesOf(want, sheet, level, request, context)]
}

function piecesOf(
  want: BuildingWant,
  sheet: Worksheet,
  level: LevelWork | undefined,
  request: Request,
  context: Context,
): readonly Piece[] {
  switch (want) {
    case 'storey shears':
      return explainStoreys(sheet, level, request, context)
    case 'wind pressures':
      return explainWindPressures(sheet, level, request, context)
    case 'wind forces':
      return explainWindForces(sheet, level, request, context)
    case 'design spectrum':
    case 'base shear':
    case 'storey forces':
    case 'diaphragm forces': {
      const made = sheet.seismic?.()
      if (!made) return [{ kind: 'fault', diagnostics: [noSeismic(request)] }]
      return made.ok
        ? explainSeismic(want, made.value, request, context)
        : [{ kind: 'fault', diagnostics: made.because }]
    }
  }
}

const noSeismic = ({ at }: Request) =>
  diagnose(
    'error',
    'seismic-missing',
    at,
    'this document has no block seismic',
    'Give site, risk and system in a block seismic, and the standard in the front matter.',
  )
