/**
 * External pressure coefficients of ASCE 7 Fig. 27.3-1 for walls and for the slopes of a gable roof, with the
 * interpolation that the figure asks for as a step of its own.
 */
import { type Formula, formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Edition } from '../model/wind-cases.ts'

/** A coefficient against what it depends on, rising. */
type Curve = readonly (readonly [at: number, value: number])[]

// Fig. 27.4-1 of ASCE 7-10, p. 263, read from a scan; that Fig. 27.3-1 of 7-16 and 7-22 has the same is from memory.
const leewardWall: Curve = [
  [1, -0.5],
  [2, -0.3],
  [4, -0.2],
]

/** Coefficients over the slope in degrees, for the ratios h/L of the figure. From 45 deg on the windward one is 0.01 θ at 60 deg. */
interface Slopes {
  readonly ratio: number
  /** The value that pushes along the wind: the upper of the two listed. */
  readonly windward: Curve
  readonly leeward: Curve
}

const roofs: readonly [Slopes, Slopes, Slopes] = [
  {
    ratio: 0.25,
    windward: [
      [10, -0.18],
      [15, 0],
      [20, 0.2],
      [25, 0.3],
      [30, 0.3],
      [35, 0.4],
      [45, 0.4],
      [60, 0.6],
    ],
    leeward: [
      [10, -0.3],
      [15, -0.5],
      [20, -0.6],
    ],
  },
  {
    ratio: 0.5,
    windward: [
      [10, -0.18],
      [15, -0.18],
      [20, 0],
      [25, 0.2],
      [30, 0.2],
      [35, 0.3],
      [45, 0.4],
      [60, 0.6],
    ],
    leeward: [
      [10, -0.5],
      [15, -0.5],
      [20, -0.6],
    ],
  },
  {
    ratio: 1,
    windward: [
      [10, -0.18],
      [15, -0.18],
      [20, -0.18],
      [25, 0],
      [30, 0.2],
      [35, 0.2],
      [45, 0.3],
      [60, 0.6],
    ],
    leeward: [
      [10, -0.7],
      [15, -0.6],
      [20, -0.6],
    ],
  },
]

export const figure = (edition: Edition): string => `ASCE ${edition} Fig. 27.3-1`
const MARK = '(as in ASCE 7-10 Fig. 27.4-1; this edition unchecked)'

export const Cw = sym('C_pw', 'C_{p,w}', 'number')
export const Cl = sym('C_pl', 'C_{p,l}', 'number')
export const ratio = sym('r', '(L/B)', 'number')
export const slenderness = sym('s', '(h/L)', 'number')
const theta = sym('theta', '\\theta', 'angle')

const rules = new Map<string, Formula>()

function rule(key: string, make: () => Formula): Formula {
  const known = rules.get(key) ?? make()
  rules.set(key, known)
  return known
}

export function windwardWall(edition: Edition, display: Display): Value {
  const source = `${figure(edition)}, windward wall ${MARK}`
  return work(
    'wind.C_pw',
    rule(source, () => formula({ gives: Cw, body: '0.8', of: [], source })),
    {},
    display,
  )
}

/** @param r L/B: the plan along the wind over the plan across it */
export function leewardWallOf(id: string, edition: Edition, r: Value, display: Display): Value {
  const source = `${figure(edition)}, leeward wall`
  return along(
    id,
    Cl,
    leewardWall,
    { sym: ratio, value: r, number: r.si, written: 'r', told: range => `L/B ${range}` },
    source,
    display,
  )
}

/**
 * The coefficients of the slopes of a gable with wind across the ridge, and the interpolations that lead to them.
 * @param angle from 10 deg on
 * @param s h/L
 */
export function gableSlopes(
  edition: Edition,
  angle: Value,
  s: Value,
  id: string,
  display: Display,
): { readonly windward: Value; readonly leeward: Value; readonly between: readonly Value[] } {
  const [low, high] = nearest(s.si)
  const between: Value[] = []
  const of = (side: 'windward' | 'leeward', gives: Sym): Value => {
    const name = `${id}.${gives.name}`
    const what = side === 'windward' ? 'windward slope, the upper of two values' : 'leeward slope'
    const source = (ratio: string) => `${figure(edition)}, ${what}, h/L ${ratio}`
    const degrees = {
      sym: theta,
      value: angle,
      number: (angle.si * 180) / Math.PI,
      written: 'theta/(1 deg)',
      told: (range: string) => `slope in degrees ${range}`,
    }
    const at = (slopes: Slopes, key: string, letter: Sym, ratio = inWords(slopes.ratio)) =>
      along(key, letter, slopes[side], degrees, source(ratio), display)
    if (low === high) return at(low, name, gives)
    const letters = [1, 2].map(end => sym(`${gives.name}${end}`, `${gives.tex.slice(0, -1)},${end}}`, 'number'))
    const [one, two] = letters
    if (!one || !two) throw new Error('there are two ends')
    const ends = [at(low, `${name}.1`, one), at(high, `${name}.2`, two)] as const
    // Where both ratios list the same there is nothing to interpolate.
    if (ends[0].si === ends[1].si) return at(low, name, gives, `${low.ratio} to ${high.ratio}`)
    between.push(...ends)
    const body = `${one.name} + (${two.name} - ${one.name})*(s - ${low.ratio})/${high.ratio - low.ratio}`
    const mixed = rule(`${edition} ${side} ${body}`, () =>
      formula({
        gives,
        body,
        of: [one, two, slenderness],
        source: `${figure(edition)}, interpolated between h/L of ${low.ratio} and ${high.ratio}`,
      }),
    )
    return work(name, mixed, { [one.name]: ends[0], [two.name]: ends[1], s }, display)
  }
  return { windward: of('windward', Cw), leeward: of('leeward', Cl), between }
}

const inWords = (ratio: number): string => (ratio === 0.25 ? 'up to 0.25' : ratio === 1 ? 'from 1.0 on' : `${ratio}`)

/** The listed ratios on either side of one; one and the same where it is listed or lies beyond them. */
function nearest(s: number): readonly [Slopes, Slopes] {
  const [flat, middle, tall] = roofs
  if (s <= flat.ratio) return [flat, flat]
  if (s >= tall.ratio) return [tall, tall]
  if (s === middle.ratio) return [middle, middle]
  return s < middle.ratio ? [flat, middle] : [middle, tall]
}

interface Against {
  readonly sym: Sym
  readonly value: Value
  /** In the unit of the curve, and how a formula has it there. */
  readonly number: number
  readonly written: string
  /** A range of it in words. */
  readonly told: (range: string) => string
}

/** The value of a curve: listed, the end where it lies beyond, or on the straight line between two. */
function along(id: string, gives: Sym, curve: Curve, against: Against, source: string, display: Display): Value {
  const { sym: of, value, written, told } = against
  // An angle that was typed in degrees comes back from radians within a few bits of what is listed.
  const number = curve.find(([at]) => Math.abs(at - against.number) < 1e-9)?.[0] ?? against.number
  const [first] = curve
  const last = curve.at(-1)
  if (!first || !last) throw new Error('a curve has points')
  const constant = (C: number, where: string): Value => {
    const full = `${source}, ${told(where)} ${MARK}`
    return work(
      id,
      rule(`${gives.name} ${full} ${C}`, () => formula({ gives, body: `${C}`, of: [], source: full })),
      {},
      display,
    )
  }
  if (number <= first[0]) return constant(first[1], number === first[0] ? `${first[0]}` : `up to ${first[0]}`)
  if (number >= last[0]) return constant(last[1], `${last[0]} or more`)
  const next = curve.findIndex(([at]) => at > number)
  const [from, to] = [curve[next - 1], curve[next]]
  if (!from || !to) throw new Error('a number within a curve lies between two of its points')
  if (number === from[0]) return constant(from[1], `${from[0]}`)
  if (from[1] === to[1]) return constant(from[1], `${from[0]} to ${to[0]}`)
  const rise = Number((to[1] - from[1]).toFixed(6))
  const run = to[0] - from[0]
  const body = `${from[1]} ${rise < 0 ? '-' : '+'} ${Math.abs(rise)}*(${written} - ${from[0]})${run === 1 ? '' : `/${run}`}`
  const where = `${source}, interpolated: ${told(`${from[0]} to ${to[0]}`)} ${MARK}`
  return work(
    id,
    rule(`${gives.name} ${where} ${body}`, () => formula({ gives, body, of: [of], source: where })),
    { [of.name]: value },
    display,
  )
}
