/** Workings that tell of the whole building rather than of one level. */
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Context } from './context.ts'
import { explainContinuous } from './continuous.ts'
import { explainModes } from './modes.ts'
import type { BuildingWant, Request } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainStoreys } from './storeys.ts'

const headings: Readonly<Record<BuildingWant, string>> = {
  'storey shears': 'Storey shears',
  'continuous walls': 'Continuous walls',
  'modes of vibration': 'Modes of vibration',
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
      return [...head, ...(made.ok ? made.value : [{ kind: 'fault', diagnostics: made.because } as const])]
    }
    case 'modes of vibration': {
      const made = sheet.vibration()
      return [
        ...head,
        ...(made.ok
          ? explainModes(made.value, request.detail, context)
          : [{ kind: 'fault', diagnostics: made.because } as const]),
      ]
    }
  }
}
