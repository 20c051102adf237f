/** What a document carries before and after its own text, unless it places it itself. */
import type { Worksheet } from '../compute/worksheet.ts'
import type { Choices } from '../model/front.ts'
import type { Explained } from './blocks.ts'
import type { Account, Context } from './context.ts'
import { explainCriteria } from './criteria.ts'
import type { ContentsEntry } from './number.ts'
import { explainRegister, worstFirst } from './registers.ts'
import type { DocumentWant } from './request.ts'
import type { Preface, Register } from './sheet.ts'

/** Fewer sections than this are seen at a glance. */
const FEW = 4

export function prefaceOf(
  contents: readonly ContentsEntry[],
  { asked, shown }: Pick<Explained, 'asked' | 'shown'>,
  choices: Choices,
  sheet: Worksheet,
  context: Context,
  account: Account,
): Preface {
  const { cover, revisions } = choices
  const isListed = choices.contents ?? (cover || contents.length >= FEW)
  return {
    contents: isListed ? contents : [],
    checks: asked.has('checks')
      ? []
      : worstFirst(account.checks).map(check => ({ check, place: account.placeOf(check.id, shown) })),
    criteria: cover && !asked.has('criteria') ? explainCriteria(sheet, context, account) : undefined,
    revisions,
  }
}

/** What was assumed and what was relied on is always told: a document that leaves the lists out has them at its end. */
export const closingOf = (
  asked: ReadonlySet<DocumentWant>,
  sheet: Worksheet,
  context: Context,
  account: Account,
): readonly Register[] =>
  (['assumptions', 'references'] as const)
    .filter(want => !asked.has(want))
    .flatMap(want => explainRegister(want, sheet, context, account))
    .filter(piece => piece.kind === 'register')
