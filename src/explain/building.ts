/** Workings that tell of the whole building rather than of one level. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { bad } from '../base/outcome.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import { diagnose } from '../read/text.ts'
import type { Context } from './context.ts'
import { explainContinuous } from './continuous.ts'
import { explainModes } from './modes.ts'
import type { BuildingWant, Request } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainSpectral } from './spectral.ts'
import { explainStoreys } from './storeys.ts'

const headings: Readonly<Record<BuildingWant, string>> = {
  'storey shears': 'Storey shears',
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
  switch (want) {
    case 'storey shears':
      return [...head, ...explainStoreys(sheet, level, request, context)]
    case 'continuous walls': {
      const made = explainContinuous(sheet, level, request, context)
      return [...head, ...(made.ok ? made.value : faultBox(made.because))]
    }
    case 'modes of vibration': {
      const made = sheet.vibration()
      return [...head, ...(made.ok ? explainModes(made.value, request.detail, context) : faultBox(made.because))]
    }
    case 'modal response': {
      const made = sheet.spectral?.() ?? bad([noSpectrum(request)])
      return [...head, ...(made.ok ? explainSpectral(made.value, request.detail, context) : faultBox(made.because))]
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
