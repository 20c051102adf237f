/** The lists of the whole document: what was assumed, what was relied on, what was checked. */
import type { Worksheet } from '../compute/worksheet.ts'
import type { Assumption } from '../model/scope.ts'
import type { Account, Context } from './context.ts'
import { explainCriteria } from './criteria.ts'
import type { DocumentWant } from './request.ts'
import type { Check, Piece } from './sheet.ts'
import { explainStandard } from './standard.ts'

/** Worked after everything else, since they list what the rest did. */
export function explainRegister(
  want: DocumentWant,
  sheet: Worksheet,
  context: Context,
  account: Account,
): readonly Piece[] {
  switch (want) {
    case 'criteria':
      return [explainCriteria(sheet, context, account)]
    case 'standard':
      return [explainStandard(context)]
    case 'assumptions':
      return [register('assumptions', 'Assumptions', assumptionItems(sheet.assumptions(), account), context)]
    case 'references':
      return [register('references', 'References', referenceItems(account), context)]
    case 'checks':
      return account.unnumbered.length > 0
        ? worstFirst(account.unnumbered)
        : [{ kind: 'note', text: 'No check is made in this document.' }]
  }
}

/** A ratio that is no number stands for the worst. */
export const worstFirst = (checks: readonly Check[]): readonly Check[] =>
  [...checks].sort((a, b) => rank(b) - rank(a) || (a.id < b.id ? -1 : 1))

const rank = ({ ratio }: Check): number => (Number.isFinite(ratio) ? ratio : Number.MAX_VALUE)

type Items = readonly { readonly text: string; readonly detail: string }[]

const register = (id: string, title: string, items: Items, context: Context): Piece =>
  items.length > 0
    ? { kind: 'register', id: id, title: context.words(title), items }
    : { kind: 'note', text: context.words(`This document has no ${title.toLowerCase()} to list.`) }

/** What was taken by default, then what the formulas take for granted. */
function assumptionItems(assumptions: readonly Assumption[], account: Account): Items {
  const byFormula = new Map<string, Set<string>>()
  for (const { assumes, source } of account.formulas)
    for (const text of assumes) byFormula.set(text, (byFormula.get(text) ?? new Set()).add(source))
  return [
    ...assumptions.map(({ text, because }) => ({ text: account.words(text), detail: account.words(because) })),
    ...[...byFormula].map(([text, sources]) => ({
      text: account.words(sentence(text)),
      detail: account.words([...sources].join('; ')),
    })),
  ]
}

const sentence = (text: string): string =>
  `${/^[a-z] /i.test(text) ? text : text.charAt(0).toUpperCase() + text.slice(1)}.`

/** Each source once, in the order of its first use: of formulas, then of the limits of checks. */
function referenceItems(account: Account): Items {
  const formulas = [...account.formulas].map(({ source }) => account.words(source))
  const limits = account.checks.map(({ reference }) => reference)
  return [...new Set([...formulas, ...limits])]
    .filter(source => source !== '' && !ownWords.includes(source))
    .map(source => ({ text: source, detail: '' }))
}

/** What a step says of itself when it leans on nothing outside the document. */
const ownWords: readonly string[] = ['stated', 'sum of the column', 'limit of the arithmetic']
