/**
 * Sets an expression in TeX, in letters or with values put in. Both go through
 * one rule for brackets: a part is bracketed when it binds less tightly than its
 * place asks, or when it would run into the factor before it (3 and 12 must not
 * read as 312).
 */
import type { Expr, FunctionName } from './expr.ts'
import type { Language } from './language.ts'
import { asTyped, type Numeral, numeralTex } from './numeral.ts'
import { joinTex, type Tex } from './tex.ts'
import { NO_UNIT, type Unit, unitTex } from './unit.ts'

/** How tightly a piece of TeX holds together. */
const SUM = 1
const PRODUCT = 2
const POWER = 3
const WHOLE = 4

/** A piece of TeX and what its neighbours must know of it. */
export interface Piece {
  readonly tex: Tex
  readonly binding: number
  readonly startsWithDigit: boolean
  readonly startsWithMinus: boolean
}

/** Sets the leaves: a name becomes its letter, or its value with unit. */
export type SetName = (name: string) => Piece

const whole = (piece: Tex | string): Piece => ({
  tex: joinTex(piece),
  binding: WHOLE,
  startsWithDigit: false,
  startsWithMinus: false,
})

/** A name by its letter. */
export const letter = (source: string): Piece => whole(source)

/** A number with its unit. A unit makes a product of it: it is bracketed as a factor, and bare in a sum. */
export function valueSet(numeral: Numeral, unit: Unit, language: Language): Piece {
  const units = unitTex(unit)
  const size = numeralTex(numeral, language)
  const spaced = units === '' || units === '\\mathrm{\\%}' || units === '\\mathrm{deg}' ? units : `\\ ${units}`
  // A power of ten has its exponent already, so the sign of degrees is raised on its own.
  const degrees = numeral.exponent === 0 ? '^{\\circ}' : '{}^{\\circ}'
  const shown = units === '\\mathrm{deg}' ? degrees : spaced
  const product = units !== '' || numeral.exponent !== 0
  return {
    tex: joinTex(numeral.negative ? '-' : '', size, shown),
    binding: numeral.negative ? SUM : product ? PRODUCT : WHOLE,
    startsWithDigit: true,
    startsWithMinus: numeral.negative,
  }
}

export function typeset(expr: Expr, setName: SetName, language: Language): Tex {
  return set(expr, setName, language).tex
}

const NONE = NO_UNIT

function set(expr: Expr, setName: SetName, language: Language): Piece {
  switch (expr.kind) {
    case 'number':
      return valueSet(typedNumeral(expr.text, expr.value), NONE, language)
    case 'quantity':
      return valueSet(asTyped(expr.count), expr.unit, language)
    case 'name':
      return setName(expr.name)
    case 'negate': {
      const of = set(expr.of, setName, language)
      return {
        tex: joinTex('-', bracketedBelow(PRODUCT, of)),
        binding: SUM,
        startsWithDigit: false,
        startsWithMinus: true,
      }
    }
    case 'binary':
      return setBinary(expr, setName, language)
    case 'call':
      return setCall(
        expr.fn,
        expr.args.map(arg => set(arg, setName, language)),
      )
  }
}

/** A plain decimal keeps the digits that were typed, so 0.40 stays 0.40. */
function typedNumeral(text: string, value: number): Numeral {
  return /^\d+(\.\d+)?$/.test(text) ? { negative: false, digits: text, exponent: 0 } : asTyped(value)
}

function setBinary(expr: Expr & { kind: 'binary' }, setName: SetName, language: Language): Piece {
  switch (expr.op) {
    case '+':
    case '-': {
      const left = set(expr.left, setName, language)
      const right = set(expr.right, setName, language)
      const tight = expr.op === '-' ? PRODUCT : right.startsWithMinus ? WHOLE : SUM
      return { ...left, tex: joinTex(left.tex, expr.op, bracketedBelow(tight, right)), binding: SUM }
    }
    case '*':
      return setProduct(factorsOf(expr).map(factor => set(factor, setName, language)))
    case '/': {
      const top = set(expr.left, setName, language)
      const bottom = set(expr.right, setName, language)
      return {
        // Full size at any depth: a value with its unit must stay legible inside a fraction.
        ...whole(joinTex('\\dfrac{', top.tex, '}{', bottom.tex, '}')),
        binding: PRODUCT + 0.5,
        startsWithDigit: top.startsWithDigit,
      }
    }
    case '^': {
      const base = set(expr.left, setName, language)
      const power = set(expr.right, setName, language)
      const held = base.binding < WHOLE ? bracketed(base.tex) : base.tex
      return {
        ...whole(joinTex('{', held, '}^{', small(power.tex), '}')),
        binding: POWER,
        startsWithDigit: base.startsWithDigit && base.binding === WHOLE,
      }
    }
  }
}

/** Fractions of a power shrink with it. */
const small = ({ parts, slots }: Tex): Tex => ({
  parts: parts.map(part => part.replaceAll('\\dfrac', '\\frac')),
  slots,
})

/** The factors of a chain of products, which needs no brackets of its own. */
function factorsOf(expr: Expr): readonly Expr[] {
  return expr.kind === 'binary' && expr.op === '*' ? [...factorsOf(expr.left), ...factorsOf(expr.right)] : [expr]
}

function setProduct(factors: readonly Piece[]): Piece {
  const pieces: (Tex | string)[] = []
  let afterBracket = true
  for (const factor of factors) {
    const first = pieces.length === 0
    const bracket = factor.binding <= PRODUCT || (!first && factor.startsWithDigit)
    if (!bracket && !afterBracket) pieces.push('\\,')
    pieces.push(bracket ? bracketed(factor.tex) : factor.tex)
    afterBracket = bracket
  }
  const [first] = factors
  const bare = first !== undefined && first.binding > PRODUCT
  return {
    tex: joinTex(...pieces),
    binding: PRODUCT,
    startsWithDigit: bare && first.startsWithDigit,
    startsWithMinus: false,
  }
}

function setCall(fn: FunctionName, args: readonly Piece[]): Piece {
  const list = joinTex(...args.flatMap((arg, i) => (i === 0 ? [arg.tex] : [',\\ ', arg.tex])))
  const [first = whole('')] = args
  switch (fn) {
    case 'sqrt':
      return whole(joinTex('\\sqrt{', list, '}'))
    case 'abs':
      return whole(joinTex('\\left|', list, '\\right|'))
    case 'exp':
      return { ...whole(joinTex('e^{', list, '}')), binding: POWER }
    case 'sum':
      return setSum(args, first)
    case 'atan2':
      return whole(joinTex('\\operatorname{atan2}', bracketed(list)))
    case 'min':
    case 'max':
    case 'sin':
    case 'cos':
    case 'tan':
      return { ...whole(joinTex(`\\${fn}`, bracketed(list))), binding: POWER }
    case 'asin':
    case 'acos':
    case 'atan':
      return { ...whole(joinTex(`\\arc${fn.slice(1)}`, bracketed(list))), binding: POWER }
    case 'ln':
      return { ...whole(joinTex('\\ln', bracketed(list))), binding: POWER }
  }
}

/** A sum over a column is Σ of its letter; a sum of many values is their chain. */
function setSum(args: readonly Piece[], first: Piece): Piece {
  if (args.length === 1) return { ...whole(joinTex('\\sum ', bracketedBelow(PRODUCT, first))), binding: PRODUCT }
  const chain = args.flatMap((arg, i) =>
    i === 0 ? [arg.tex] : ['+', arg.startsWithMinus ? bracketed(arg.tex) : arg.tex],
  )
  return {
    tex: joinTex(...chain),
    binding: SUM,
    startsWithDigit: first.startsWithDigit,
    startsWithMinus: first.startsWithMinus,
  }
}

const bracketed = (inner: Tex): Tex => joinTex('\\left(', inner, '\\right)')

const bracketedBelow = (least: number, { tex: inner, binding }: Piece): Tex =>
  binding < least ? bracketed(inner) : inner

const greek: ReadonlySet<string> = new Set([
  'alpha',
  'beta',
  'gamma',
  'delta',
  'epsilon',
  'zeta',
  'eta',
  'theta',
  'iota',
  'kappa',
  'lambda',
  'mu',
  'nu',
  'xi',
  'pi',
  'rho',
  'sigma',
  'tau',
  'upsilon',
  'phi',
  'chi',
  'psi',
  'omega',
  'Gamma',
  'Delta',
  'Theta',
  'Lambda',
  'Xi',
  'Pi',
  'Sigma',
  'Upsilon',
  'Phi',
  'Psi',
  'Omega',
])

/** Words inside TeX, with every sign that TeX gives a meaning to made plain. */
export function texWords(words: string): string {
  const plain = words.replace(/[\\{}$&#^_%~]/g, sign => {
    if (sign === '\\') return '\\textbackslash{}'
    if (sign === '^') return '\\textasciicircum{}'
    if (sign === '~') return '\\textasciitilde{}'
    return `\\${sign}`
  })
  return `\\text{${plain}}`
}

/**
 * A name as a letter with a subscript: `w_deck` is w with deck below it, `alpha`
 * is α, `V_base` is V with base; a word of several letters is set upright.
 */
export function nameTex(name: string): string {
  const primed = /^(\p{L})'(\p{L}.*)$/u.exec(name)
  if (primed) return `${primed[1]}'_{${texWords(primed[2] ?? '')}}`
  const [head = '', ...rest] = name.split(/[_.]/)
  const digits = /^(\p{L})(\d+)$/u.exec(head)
  const stem = digits?.[1] ?? head
  const below = [...(digits?.[2] === undefined ? [] : [digits[2]]), ...rest]
  const letters = greek.has(stem)
    ? `\\${stem}`
    : [...stem].length === 1
      ? stem.replace(/[\\{}$&#^%~]/g, '')
      : texWords(stem)
  return below.length === 0 ? letters : `${letters}_{${texWords(below.join(','))}}`
}
