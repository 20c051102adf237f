/** Wind: stated as a hazard for the directional procedure of ASCE 7, or as pressures for any other standard. */
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Block } from '../read/block.ts'
import { diagnose } from '../read/text.ts'
import { settingOf } from './columns.ts'
import type { Scope } from './scope.ts'
import { type DirectionalWind, readDirectional } from './wind-directional.ts'
import { readStatedWind, type StatedWind } from './wind-stated.ts'

export type WindGiven = DirectionalWind | StatedWind

/** What a block of wind may ask of the document around it. */
export interface WindAround {
  /** The standard of the document, as its front matter states it. */
  readonly standard: string
  readonly levels: readonly string[]
}

/** A value of undefined where the document has no wind. */
export function readWind(blocks: readonly Block[], around: WindAround, scope: Scope): Result<WindGiven | undefined> {
  const [block, second] = blocks
  if (!block) return good(undefined)
  if (second)
    return bad([
      diagnose('error', 'wind-repeated', second.info, 'wind is given twice', 'Keep one block of it.', {
        also: [{ span: block.info, text: 'first here' }],
      }),
    ])
  if (block.faults.length > 0) return bad(block.faults)
  if (block.about)
    return bad([
      diagnose(
        'error',
        'wind-about',
        block.about.span,
        'wind is given for the building, not for a level',
        'Leave the name out. Pressures that differ by level stand in a table with a column level.',
      ),
    ])
  const isStated = block.table !== undefined || block.settings.some(({ name }) => /^(?:wind|lee)ward\b/.test(name.text))
  if (isStated) return readStatedWind(block, around, scope)
  if (settingOf(block, 'V')) return readDirectional(block, around, scope)
  return bad([
    diagnose(
      'error',
      'setting-missing',
      block.info,
      'wind has neither a wind speed nor pressures',
      'Write V: 115 mph for the directional procedure of ASCE 7, or windward and leeward pressures worked elsewhere.',
    ),
  ])
}
