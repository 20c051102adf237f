/** Which walls and cases of a level a working shows. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { CaseResult } from '../compute/distribution.ts'
import type { LevelWork } from '../compute/level.ts'
import { diagnose } from '../read/text.ts'
import type { Request } from './request.ts'

/** True when forces act and are shared out. */
export const hasShears = (level: LevelWork): boolean => level.isLoaded() && level.distribution().ok

/** The walls to work in full: those asked for, or the one that governs, or the stiffest where no force is known. */
export function wallsShown(level: LevelWork, { walls }: Request): Result<readonly string[]> {
  const springs = level.springs()
  if (!springs.ok) return springs
  const names = springs.value.map(({ name }) => name)
  const unknown = walls.filter(({ text }) => !names.includes(text))
  if (unknown.length > 0)
    return bad(
      unknown.map(({ text, span }) =>
        diagnose(
          'error',
          'unknown-wall',
          span,
          `there is no wall ${text} at ${level.name}`,
          suggestion(text, names, 'wall'),
        ),
      ),
    )
  if (walls.length > 0) return good(walls.map(({ text }) => text))
  const distribution = hasShears(level) ? level.distribution() : undefined
  if (distribution?.ok) return good([distribution.value.design.rows[distribution.value.governingWall] ?? ''])
  return good([springs.value.reduce((a, b) => (b.k.si > a.k.si ? b : a)).name])
}

/** The case asked for, every case, or the one that governs. */
export function casesShown(level: LevelWork, { caseName }: Request): Result<readonly CaseResult[]> {
  const distribution = level.distribution()
  if (!distribution.ok) return distribution
  const { cases, governingCase, governingWall } = distribution.value
  if (caseName?.text === 'all') return good(cases)
  if (caseName) return caseOf(level, caseName)
  return good(cases.filter(each => each.case.name === governingCase(governingWall).text))
}

function caseOf(level: LevelWork, { text, span }: NonNullable<Request['caseName']>): Result<readonly CaseResult[]> {
  const distribution = level.distribution()
  if (!distribution.ok) return distribution
  const { cases } = distribution.value
  const found = cases.filter(each => each.case.name === text)
  return found.length > 0 ? good(found) : bad([unknownCase(text, span, cases)])
}

const unknownCase = (text: string, span: Request['at'], cases: readonly CaseResult[]): Diagnostic =>
  diagnose(
    'error',
    'unknown-case',
    span,
    `there is no case ${text}`,
    `There are: ${cases.map(each => each.case.name).join(', ')}, and all.`,
  )
