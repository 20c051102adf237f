/** The engineer's own checks: lines `demand <= capacity` among their equations. */
import { dimensionInWords, sameDimension } from '../base/dimension.ts'
import type { Expr } from '../base/expr.ts'
import { type Formula, sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { parseExpr } from '../base/parse.ts'
import { NO_UNIT } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { diagnose, part, type Text, trimmed } from '../read/text.ts'
import { exprDiagnostic, workExpr } from './cell.ts'
import type { Scope } from './scope.ts'

/** A sign of comparison; the head of an arrow `->` is none. */
export const SIGN = /<=|>=|≤|≥|<|(?<!-)>/

export const isLimit = ({ text }: Text): boolean => SIGN.test(text)

export interface Limit {
  /** Tells this check from others of the same demand; ids of its own begin with it. */
  readonly id: string
  readonly demand: Value
  readonly capacity: Value
  /** Demand over capacity. */
  readonly ratio: Value
}

const FORM = 'Write demand <= capacity, each the name of a value or a quantity, and say what is checked in a comment.'

/**
 * @param line one for which `isLimit` holds
 * @param ordinal 1 for the first check of its demand, 2 for the next
 */
export function workLimit(line: Text, ordinal: number, scope: Scope): Result<Limit> {
  const [sign = ''] = SIGN.exec(line.text) ?? []
  const at = line.text.indexOf(sign)
  if (sign !== '<=' && sign !== '≤') {
    const span = { start: line.span.start + at, end: line.span.start + at + sign.length }
    return bad([diagnose('error', 'limit-sign', span, `a check is not written with ${sign}`, FORM)])
  }
  const [left, right] = [trimmed(part(line, 0, at)), trimmed(part(line, at + sign.length))]
  const id = ordinal === 1 ? left.text : `${left.text}.${ordinal}`
  const sides = together({
    demand: sideOf(left, `${id}.demand`, scope),
    capacity: sideOf(right, `${id}.limit`, scope),
  })
  if (!sides.ok) return sides
  return compared(line, id, sides.value.demand, sides.value.capacity)
}

/** The checks among some lines, each with how many of its demand come up to it. */
export function limitLines<T extends Text>(lines: readonly T[]): readonly (readonly [T, number])[] {
  const seen = new Map<string, number>()
  return lines.filter(isLimit).map(line => {
    const demand = trimmed(part(line, 0, line.text.search(SIGN))).text
    const ordinal = (seen.get(demand) ?? 0) + 1
    seen.set(demand, ordinal)
    return [line, ordinal]
  })
}

/** A value by its name, or a quantity as it stands. */
function sideOf(side: Text, id: string, scope: Scope): Result<Value> {
  const parsed = parseExpr(side.text, side.span.start)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  const { value: expr } = parsed
  const worked = workExpr(expr, side.span, scope)
  if (!worked.ok) return worked
  if (expr.kind === 'name') {
    const [named] = worked.value.inputs.values()
    if (named) return good(named)
  }
  if (!isPlain(expr))
    return bad([
      diagnose(
        'error',
        'limit-side',
        side.span,
        `${side.text} is worked within a check`,
        'Give it a name on a line of its own, so that its working is shown, and compare the name.',
      ),
    ])
  const unit = expr.kind === 'quantity' ? expr.unit : NO_UNIT
  return good({ id, tex: '', si: worked.value.si, unit, rounding: 0, origin: { kind: 'given', span: side.span } })
}

const isPlain = ({ kind }: Expr): boolean => kind === 'quantity' || kind === 'number'

function compared({ span }: Text, id: string, demand: Value, capacity: Value): Result<Limit> {
  if (!sameDimension(demand.unit.dimension, capacity.unit.dimension)) {
    const [one, other] = [demand, capacity].map(({ unit }) => dimensionInWords(unit.dimension))
    return bad([
      diagnose(
        'error',
        'wrong-dimension',
        span,
        `the demand is ${one} and the capacity is ${other}`,
        'Check the units.',
      ),
    ])
  }
  const negative = demand.si < 0 ? 'demand' : capacity.si <= 0 ? 'capacity' : undefined
  if (negative)
    return bad([
      diagnose(
        'error',
        'limit-negative',
        span,
        `the ${negative} is ${negative === 'demand' || capacity.si < 0 ? 'below zero' : 'zero'}`,
        'A check compares sizes: take abs(…) of a value that has a sign, on a line of its own.',
      ),
    ])
  return good({ id, demand, capacity, ratio: ratioOf(`${id}.ratio`, demand, capacity) })
}

const RATIO = sym('r', 'D/C', 'number')
const over = parseExpr('D/C')

function ratioOf(id: string, demand: Value, capacity: Value): Value {
  if (!over.ok) throw new Error('the ratio of a check does not parse')
  const symbols = new Map([
    ['D', sym('D', demand.tex || 'D', 'number')],
    ['C', sym('C', capacity.tex || 'C', 'number')],
  ])
  const formula: Formula = { gives: RATIO, body: over.value, symbols, source: 'demand over capacity', assumes: [] }
  const inputs = new Map([
    ['D', demand],
    ['C', capacity],
  ])
  return {
    id,
    tex: RATIO.tex,
    si: demand.si / capacity.si,
    unit: NO_UNIT,
    rounding: 0,
    origin: { kind: 'worked', step: { formula, inputs } },
  }
}
