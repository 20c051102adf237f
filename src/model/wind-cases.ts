/** Which of the wind load cases of ASCE 7 a document works. */
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Block } from '../read/block.ts'
import { diagnose, splitAt } from '../read/text.ts'
import { settingOf } from './columns.ts'
import type { Scope } from './scope.ts'

export type Edition = '7-16' | '7-22'
export type FigureCase = 1 | 2 | 3 | 4

export const figureCases: readonly FigureCase[] = [1, 2, 3, 4]

/** `cases: 1, 3`; all four where it is left out. Cases 1 and 3 are always there. */
export function readFigureCases(block: Block, scope: Scope): Result<readonly FigureCase[]> {
  const cell = settingOf(block, 'cases')
  if (!cell) return good(figureCases)
  const stated = splitAt(cell, /,/)
  const strange = stated.find(({ text }) => !figureCases.some(each => `${each}` === text))
  if (strange)
    return bad([
      diagnose(
        'error',
        'wind-cases',
        strange.span,
        `there is no wind load case ${strange.text}`,
        'Write cases: 1, 2, 3, 4, or cases: 1, 3 where the torsional ones are waived.',
      ),
    ])
  const found = figureCases.filter(each => stated.some(({ text }) => text === `${each}`))
  if (!found.includes(1) || !found.includes(3))
    return bad([
      diagnose(
        'error',
        'wind-cases',
        cell.span,
        'cases 1 and 3 apply to every building',
        'Write cases: 1, 3 where the torsional cases 2 and 4 are waived, or leave it out.',
      ),
    ])
  if (found.length < figureCases.length)
    scope.assume({
      text: `Of the wind load cases, ${found.join(' and ')} are worked: the building is one for which the torsional cases are waived.`,
      because:
        'cases is stated; ASCE 7 Appendix D, D.1 (unchecked): one storey of at most 30 ft, or at most two storeys of light frame or with flexible diaphragms',
    })
  return good(found)
}
