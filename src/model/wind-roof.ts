/** The roof that wind meets: flat, perhaps with a parapet, or a gable with its slope and ridge. */
import { verbatim } from '../base/language.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import type { Block } from '../read/block.ts'
import { diagnose } from '../read/text.ts'
import { quantity } from './cell.ts'
import { settingOf } from './columns.ts'
import type { Scope } from './scope.ts'
import { letters, missing, optional, unknown } from './wind-settings.ts'

export type Roof =
  | { readonly kind: 'flat'; readonly parapet?: Value }
  | { readonly kind: 'gable'; readonly slope: Value; readonly ridge: 'x' | 'y' }

/** The steepest roof for which the figure lists coefficients one by one. */
const STEEPEST = Math.PI / 3

export function readRoof(block: Block, scope: Scope): Result<Roof> {
  const cell = settingOf(block, 'roof')
  if (!cell) return bad([missing(block, 'roof', 'Write roof: flat, or roof: gable with slope: and ridge:.')])
  const shapes = ['flat', 'gable']
  if (cell.text === 'hip' || cell.text === 'monoslope' || cell.text === 'mansard')
    return bad([
      diagnose(
        'error',
        'wind-not-covered',
        cell.span,
        `a roof that is ${cell.text} is not covered`,
        'Flat and gable roofs are. Work the pressures of another roof and state them, or add its part to stated forces.',
      ),
    ])
  if (!shapes.includes(cell.text)) return bad([unknown('roof', cell, shapes)])
  const parapet = optional(block, 'parapet', letters.parapet, scope)
  if (cell.text === 'flat') {
    const odd = ['slope', 'ridge'].flatMap(name => block.settings.filter(setting => setting.name.text === name))
    const [first] = odd
    if (first)
      return bad([
        diagnose(
          'error',
          'wind-roof-settings',
          first.name.span,
          `a flat roof has no ${first.name.text}`,
          'Write roof: gable, or leave it out.',
        ),
      ])
    if (!parapet.ok) return parapet
    return good({ kind: 'flat', ...(parapet.value ? { parapet: parapet.value } : {}) })
  }
  const stated = settingOf(block, 'parapet')
  if (stated)
    return bad([
      diagnose(
        'error',
        'wind-roof-settings',
        stated.span,
        'a parapet is worked with a flat roof only',
        'Leave it out here, and add its force to stated ones.',
      ),
    ])
  const parts = together({ slope: readSlope(block, scope), ridge: readRidge(block) })
  return parts.ok ? good({ kind: 'gable', ...parts.value }) : parts
}

function readRidge(block: Block): Result<'x' | 'y'> {
  const cell = settingOf(block, 'ridge')
  if (!cell)
    return bad([missing(block, 'ridge', 'A gable roof needs its direction: ridge: along x or ridge: along y.')])
  const found = /^(?:along )?([xy])$/.exec(cell.text)?.[1]
  if (found === 'x' || found === 'y') return good(found)
  return bad([unknown('ridge', cell, ['along x', 'along y'])])
}

function readSlope(block: Block, scope: Scope): Result<Value> {
  const cell = settingOf(block, 'slope')
  if (!cell) return bad([missing(block, 'slope', 'A gable roof needs its angle: slope: 18.4 deg.')])
  const value = quantity(cell, { id: 'wind.slope', what: 'slope', sym: letters.slope }, scope)
  if (!value.ok) return value
  // A bare number might be an angle in any unit, or a rise over a run.
  if (!/deg|°|rad/.test(cell.text) && value.value.origin.kind === 'given')
    return bad([
      diagnose(
        'error',
        'unit-missing',
        cell.span,
        'slope has no unit; it must be an angle',
        `Write an angle such as 18.4 deg. A rise of 4 in a run of 12 is atan(4/12) * (1 rad).`,
      ),
    ])
  const { si } = value.value
  if (si > 0 && si <= STEEPEST + 1e-9) return value
  return bad([
    diagnose(
      'error',
      'wind-slope-out-of-range',
      cell.span,
      `slope is ${verbatim(cell.text)}; a gable is worked from above 0 to 60 deg`,
      'Write roof: flat where there is none.',
    ),
  ])
}
