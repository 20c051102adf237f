/** The engineer's own formulas: lines `name = expression -> unit`. */
import { dimensionInWords, sameDimension } from '../base/dimension.ts'
import { type Expr, namesIn } from '../base/expr.ts'
import { sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { parseExpr } from '../base/parse.ts'
import type { Span } from '../base/span.ts'
import { nameTex } from '../base/typeset.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import type { Block } from '../read/block.ts'
import { diagnose, part, type Text, trimmed } from '../read/text.ts'
import { exprDiagnostic, headUnit, stated, workExpr } from './cell.ts'
import { isLimit } from './limits.ts'
import type { Scope } from './scope.ts'

export interface Equation {
  readonly name: Text
  readonly body: Expr
  readonly span: Span
  /** The unit asked for after the arrow. */
  readonly unit?: Unit
}

/** How an equation may be called. */
export const NAME = /^[\p{L}][\p{L}\p{N}_]*(?:'[\p{L}\p{N}_]+)?$/u

/** A line is read once, however many builds it stands in. */
const known = new WeakMap<Text, Result<Equation>>()

/** One line; the names in it are looked up later. */
export function readEquation(line: Text): Result<Equation> {
  const read = known.get(line) ?? readAnew(line)
  known.set(line, read)
  return read
}

function readAnew(line: Text): Result<Equation> {
  const sign = line.text.indexOf('=')
  if (sign === -1)
    return bad([
      diagnose(
        'error',
        'equation-without-sign',
        line.span,
        'this line has no = sign',
        'Write name = expression, with -> unit after it if you wish.',
      ),
    ])
  const name = trimmed(part(line, 0, sign))
  if (!NAME.test(name.text))
    return bad([
      diagnose(
        'error',
        'equation-name',
        name.text === '' ? line.span : name.span,
        `${name.text === '' ? 'nothing' : name.text} is not a name`,
        'A name is a letter, then letters, digits and _.',
      ),
    ])
  const arrow = line.text.indexOf('->', sign)
  const body = trimmed(part(line, sign + 1, arrow === -1 ? line.text.length : arrow))
  const parsed = parseExpr(body.text, body.span.start)
  if (!parsed.ok) return bad([exprDiagnostic(parsed.because)])
  const unit = arrow === -1 ? good(undefined) : headUnit(trimmed(part(line, arrow + 2)))
  if (!unit.ok) return unit
  return good({ name, body: parsed.value, span: body.span, ...(unit.value ? { unit: unit.value } : {}) })
}

/** The lines of all equation blocks; a name that stands twice is refused where it stands again. */
export function readEquations(blocks: readonly Block[]): ReadonlyMap<Text, Result<Equation>> {
  const first = new Map<string, Text>()
  const read = new Map<Text, Result<Equation>>()
  for (const block of blocks)
    for (const line of block.lines) {
      if (isLimit(line)) continue
      const equation = readEquation(line)
      const before = equation.ok ? first.get(equation.value.name.text) : undefined
      if (equation.ok && !before) first.set(equation.value.name.text, equation.value.name)
      read.set(line, equation.ok && before ? bad([repeated(equation.value.name, before)]) : equation)
    }
  return read
}

const repeated = (name: Text, before: Text) =>
  diagnose('error', 'name-repeated', name.span, `${name.text} is defined twice`, 'Give each its own name.', {
    also: [{ span: before.span, text: 'first here' }],
  })

/** The value of an equation, in the unit asked for or the one its operands carry. */
export function workEquation({ name, body, span, unit }: Equation, scope: Scope): Result<Value> {
  const worked = workExpr(body, span, scope)
  if (!worked.ok) return worked
  const { si, dimension, inputs } = worked.value
  if (unit && !sameDimension(unit.dimension, dimension))
    return bad([
      diagnose(
        'error',
        'wrong-dimension',
        span,
        `${name.text} is ${dimensionInWords(dimension)}, and the unit asked for is ${dimensionInWords(unit.dimension)}`,
        'Check the unit after the arrow.',
      ),
    ])
  const given = namesIn(body).size === 0 && (body.kind === 'quantity' || body.kind === 'number')
  return good({
    id: name.text,
    tex: nameTex(name.text),
    si,
    unit: unit ?? (body.kind === 'quantity' ? body.unit : worked.value.unit),
    rounding: 0,
    origin: given ? { kind: 'given', span } : stated(body, span, sym(name.text, nameTex(name.text), 'number'), inputs),
  })
}
