/** The lists of the whole document: what was assumed, what was relied on, what was checked. */
import type { Assumption } from '../model/scope.ts'
import type { Context } from './context.ts'
import type { DocumentWant } from './request.ts'
import { shownCheck } from './shears.ts'
import type { Piece } from './sheet.ts'

/** Worked after everything else, since they list what the rest did. */
export function explainRegister(
  want: DocumentWant,
  assumptions: readonly Assumption[],
  context: Context,
): readonly Piece[] {
  switch (want) {
    case 'assumptions':
      return [register('assumptions', 'Assumptions', assumptionItems(assumptions, context), context)]
    case 'references':
      return [register('references', 'References', referenceItems(context), context)]
    case 'checks':
      return context.checks.length > 0
        ? [...context.checks].sort((a, b) => b.ratio - a.ratio).map(check => shownCheck(check, context))
        : [{ kind: 'note', text: 'No check is made in this document.' }]
  }
}

type Items = readonly { readonly text: string; readonly detail: string }[]

const register = (id: string, title: string, items: Items, context: Context): Piece =>
  items.length > 0
    ? { kind: 'register', id: context.anchor(id), title: context.words(title), items }
    : { kind: 'note', text: context.words(`This document has no ${title.toLowerCase()} to list.`) }

/** What was taken by default, then what the formulas take for granted. */
function assumptionItems(assumptions: readonly Assumption[], context: Context): Items {
  const byFormula = new Map<string, Set<string>>()
  for (const { assumes, source } of context.formulas)
    for (const text of assumes) byFormula.set(text, (byFormula.get(text) ?? new Set()).add(source))
  return [
    ...assumptions.map(({ text, because }) => ({ text: context.words(text), detail: context.words(because) })),
    ...[...byFormula].map(([text, sources]) => ({
      text: context.words(sentence(text)),
      detail: context.words([...sources].join('; ')),
    })),
  ]
}

const sentence = (text: string): string =>
  `${/^[a-z] /i.test(text) ? text : text.charAt(0).toUpperCase() + text.slice(1)}.`

/** Each source once, in the order of its first use. */
function referenceItems(context: Context): Items {
  const sources = new Set([...context.formulas].map(({ source }) => source))
  return [...sources]
    .filter(source => !ownWords.includes(source))
    .map(source => ({ text: context.words(source), detail: '' }))
}

/** What a step says of itself when it leans on nothing outside the document. */
const ownWords: readonly string[] = ['stated', 'sum of the column']
