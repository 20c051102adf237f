/** The rules of the document's standard that are known here, with their clauses, and those that are not. */
import { profileOf } from '../standards/catalogue.ts'
import { type Profile, type Rules, ruleNames } from '../standards/profile.ts'
import type { Context } from './context.ts'
import type { Piece, Row } from './sheet.ts'

interface Line {
  readonly value: string
  readonly clause: string
}

export function explainStandard(context: Context): Piece {
  const { standard } = context.basis
  const profile = profileOf(standard)
  if (!profile) {
    const text = standard === '' ? 'This document states no standard.' : `The rules of ${standard} are not known here.`
    return { kind: 'note', text }
  }
  const lines = (Object.keys(ruleNames) as readonly (keyof Rules)[]).flatMap(rule => {
    const found = linesOf(profile, rule)
    const told = found.length > 0 ? found : [{ value: 'not covered here', clause: '' }]
    return told.map((line, i): Row => {
      const cells = [i === 0 ? ruleNames[rule] : '', line.value, line.clause].map(cell => context.words(cell))
      return { cells, governs: false }
    })
  })
  return {
    kind: 'table',
    id: 'standard',
    number: '',
    caption: context.words(`Rules of ${profile.name} that are known here, beside those of its static procedure`),
    columns: ['Rule', 'Value', 'Clause'].map(head => ({ head, unit: '', align: 'left' as const })),
    rows: lines,
    formulas: [],
    sourceLines: [],
  }
}

const percent = (share: number): string => `${Number((share * 100).toPrecision(6))}%`

function linesOf({ rules }: Profile, rule: keyof Rules): readonly Line[] {
  switch (rule) {
    case 'accidental': {
      const { accidental } = rules
      return accidental
        ? [{ value: `${percent(accidental.value)} of the plan across the force`, clause: accidental.clause }]
        : []
    }
    case 'share':
      return Object.entries(rules.share ?? {}).map(([word, { clause }]) => ({ value: word, clause }))
    case 'amplification': {
      const { amplification } = rules
      if (!amplification) return []
      const { threshold, most } = amplification.value
      return [{ value: `(δ_max / (${threshold} δ_avg))², from 1 to ${most}`, clause: amplification.clause }]
    }
    case 'torsion': {
      const { torsion } = rules
      if (!torsion) return []
      const { irregular, extreme } = torsion.value
      const more = extreme === undefined ? '' : `; extreme above ${extreme}`
      return [{ value: `irregular above ${irregular}, largest over average${more}`, clause: torsion.clause }]
    }
    case 'drift':
      return (rules.drift ?? []).map(({ value: { of, limit }, clause }) => ({
        value: `${limit} of the storey height: ${of}`,
        clause,
      }))
    case 'combinations':
      return (rules.combinations ?? []).map(({ value, clause }) => ({ value, clause }))
  }
}
