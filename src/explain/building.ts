/** Workings that tell of the whole building rather than of one level. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { diagnose } from '../read/text.ts'
import type { Context } from './context.ts'
import { explainContinuous } from './continuous.ts'
import { explainModes } from './modes.ts'
import type { BuildingWant, Request } from './request.ts'
import { explainSeismic } from './seismic.ts'
import type { Piece } from './sheet.ts'
import { explainSpectral } from './spectral.ts'
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
  'continuous walls': 'Continuous walls',
  'modes of vibration': 'Modes of vibration',
  'modal response': 'Modal response',
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
      if (!made) return faultBox([noSeismic(request)])
      return made.ok ? explainSeismic(want, made.value, request, context) : faultBox(made.because)
    }
    case 'continuous walls': {
      const made = explainContinuous(sheet, level, request, context)
      return made.ok ? made.value : faultBox(made.because)
    }
    case 'modes of vibration': {
      const made = sheet.vibration()
      return made.ok ? explainModes(made.value, request.detail, context) : faultBox(made.because)
    }
    case 'modal response': {
      const made = sheet.spectral?.()
      if (!made) return faultBox([noSpectrum(request)])
      return made.ok ? explainSpectral(made.value, request.detail, context) : faultBox(made.because)
    }
  }
}

const faultBox = (diagnostics: readonly Diagnostic[]): readonly Piece[] => [{ kind: 'fault', diagnostics }]

const noSpectrum = ({ at }: Request): Diagnostic =>
  diagnose(
    'error',
    'spectrum-missing',
    at,
    'this document has no block spectrum',
    'Give periods and accelerations in a block spectrum.',
  )

const noSeismic = ({ at }: Request) =>
  diagnose(
    'error',
    'seismic-missing',
    at,
    'this document has no block seismic',
    'Give site, risk and system in a block seismic, and the standard in the front matter.',
  )
