/** Turns what stands in a cell or behind a setting into a value in base SI. */
import { type Dimension, dimensionInWords, isNumber, sameDimension } from '../base/dimension.ts'
import { evaluate } from '../base/evaluate.ts'
import { type Expr, namesIn } from '../base/expr.ts'
import type { Formula, Sym } from '../base/formula.ts'
import { dimensionOfKind, roundingOfKind, unitOfKind } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { dimensionOf, unitCarried } from '../base/measure.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import { type ExprFault, parseExpr } from '../base/parse.ts'
import type { Span } from '../base/span.ts'
import { isUnitName, type Unit } from '../base/unit.ts'
import type { Origin, Value } from '../base/value.ts'
import { diagnose, type Text } from '../read/text.ts'
import { isWord, type Scope } from './scope.ts'

/** What is wanted of a cell. */
export interface Want {
  readonly id: string
  /** What the cell is called in messages, such as `height`. */
  readonly what: string
  readonly sym: Sym
  /** The letter with its subscripts; the symbol's own when left out. */
  readonly tex?: string
  /** The unit of the column's head, which a bare number takes. */
  readonly unit?: Unit
  /** True for a coordinate, which the plan shows. */
  readonly place?: boolean
}

/** A value of the kind that is wanted, in the document's units. */
export function quantity(cell: Text, want: Want, scope: Scope): Result<Value> {
  const parsed = parseExpr(cell.text, cell.span.start)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  // Through the ledger, so that a ring of definitions names this cell.
  return scope.ledger.once(want.id, cell.span, () => quantityOf(parsed.value, cell.span, want, scope))()
}

/** The same from an expression that is already read. */
export function quantityOf(expr: Expr, span: Span, want: Want, scope: Scope): Result<Value> {
  const worked = workExpr(expr, span, scope)
  if (!worked.ok) return worked
  const wanted = dimensionOfKind(want.sym.kind)
  const bare = isNumber(worked.value.dimension) && !isNumber(wanted)
  if (bare && want.unit === undefined) return bad([unitMissing(span, want, wanted)])
  const unit = bare ? want.unit : undefined
  const body = unit ? inUnit(expr, unit, span) : expr
  if (!bare && !sameDimension(worked.value.dimension, wanted))
    return bad([wrongDimension(span, want, worked.value.dimension, wanted)])
  const value: Value = {
    id: want.id,
    tex: want.tex ?? want.sym.tex,
    si: worked.value.si * (unit?.scale ?? 1),
    unit: unitOfKind(want.sym.kind, scope.display),
    rounding: roundingOfKind(want.sym.kind),
    origin:
      worked.value.inputs.size === 0 ? { kind: 'given', span } : stated(body, span, want.sym, worked.value.inputs),
  }
  // A bare name is told by the cell itself, and a coordinate by the plan.
  if (worked.value.inputs.size > 0 && expr.kind !== 'name' && !want.place) scope.stated(value, span)
  scope.read(value)
  return good(value)
}

/** A pure number in the unit that its column's head gives. */
const inUnit = (expr: Expr, unit: Unit, span: Span): Expr => ({
  kind: 'binary',
  op: '*',
  left: expr,
  right: { kind: 'quantity', count: 1, unit, span },
  span,
})

/** A value that the engineer works from others, as a step of its own. */
export function stated(expr: Expr, span: Span, gives: Sym, inputs: ReadonlyMap<string, Value>): Origin {
  const symbols = new Map([...inputs].map(([name, { tex }]) => [name, { name, tex, kind: gives.kind }]))
  const formula: Formula = { gives, body: expr, symbols, source: 'stated', assumes: [] }
  return { kind: 'worked', step: { formula, inputs }, span }
}

export interface WorkedExpr {
  readonly si: number
  readonly dimension: Dimension
  /** The unit that its operands carry. */
  readonly unit: Unit
  readonly inputs: ReadonlyMap<string, Value>
}

/** An expression with its names looked up, its dimension checked and its number worked. */
export function workExpr(expr: Expr, span: Span, scope: Scope): Result<WorkedExpr> {
  const inputs = new Map<string, Value>()
  for (const [name, at] of namesIn(expr)) {
    const found = lookUp(name, at, scope)
    if (!found.ok) return found
    inputs.set(name, found.value)
  }
  const dimension = dimensionOf(expr, name => inputs.get(name)?.unit.dimension)
  if (!dimension.ok) return bad([exprDiagnostic(dimension.because)])
  const si = evaluate(expr, name => inputs.get(name)?.si ?? Number.NaN)
  if (!Number.isFinite(si))
    return bad([
      diagnose(
        'error',
        'no-finite-value',
        span,
        'this expression has no finite value',
        'Look for a division by zero, the root of a negative number, or a power that is too large.',
      ),
    ])
  return good({ si, dimension: dimension.value, unit: unitCarried(expr, name => inputs.get(name)), inputs })
}

function lookUp(name: string, at: Span, scope: Scope): Result<Value> {
  const found = scope.lookup(name)
  if (found === undefined) return bad([unknownName(name, at, scope)])
  if (!found.ok) return found
  if (isWord(found.value))
    return bad([
      diagnose(
        'error',
        'word-in-expression',
        at,
        `${name} is a name, ${found.value.text}, not a number`,
        'Use a value, such as its shear.',
      ),
    ])
  return good(found.value)
}

export function unknownName(name: string, at: Span, scope: Scope) {
  const hint = isUnitName(name)
    ? `${name} is a unit: it follows a number, as in 12 ${name}; within a unit write kip*ft without spaces.`
    : suggestion(name, scope.ids(), 'value').replace(
        /^There (is|are): .*/,
        'The value ids are in the manual; equations give more.',
      )
  return diagnose('error', 'unknown-name', at, `there is no value ${name}`, hint)
}

export const exprDiagnostic = ({ rule, message, span, help }: ExprFault) => diagnose('error', rule, span, message, help)

function unitMissing(span: Span, { what, sym }: Want, wanted: Dimension) {
  const example = { US: 'ft', SI: 'm' }
  const sample = sym.kind === 'length' ? `12 ${example.US} or 3.6 ${example.SI}` : 'its number and unit'
  return diagnose(
    'error',
    'unit-missing',
    span,
    `${what} has no unit; it must be ${dimensionInWords(wanted)}`,
    sym.kind === 'speed'
      ? 'Write 115 mph or 51 m/s.'
      : sym.kind === 'period'
        ? 'Write it as 0.35 s; in a table the head of the column may hold the unit, as in period (s).'
        : `Write ${sample}, or put the unit in the head of the column, as in ${what} (${example.US}).`,
  )
}

function wrongDimension(span: Span, { what }: Want, found: Dimension, wanted: Dimension) {
  return diagnose(
    'error',
    'wrong-dimension',
    span,
    `${what} must be ${dimensionInWords(wanted)}, and this is ${dimensionInWords(found)}`,
    'Check the unit.',
  )
}

/** The unit in the head of a column. */
export function headUnit(text: Text | undefined): Result<Unit | undefined> {
  if (text === undefined) return good(undefined)
  const parsed = parseExpr(`1 ${text.text}`, text.span.start - 2)
  if (parsed.ok && parsed.value.kind === 'quantity') return good(parsed.value.unit)
  const fault = parsed.ok ? undefined : parsed.because
  return bad([
    diagnose(
      'error',
      'unknown-unit',
      text.span,
      `there is no unit ${text.text}`,
      fault?.help ?? 'Put one unit in the brackets, such as ft.',
    ),
  ])
}

/** Refuses a size that is not above zero. */
export function aboveZero(value: Result<Value>, at: Span, what: string): Result<Value> {
  if (!value.ok || value.value.si > 0) return value
  const size = value.value.si === 0 ? 'zero' : 'below zero'
  return bad([diagnose('error', 'size-not-positive', at, `${what} is ${size}`, 'Give a size above zero.')])
}
