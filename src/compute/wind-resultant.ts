/** What a level takes of the wind: the sum of its parts, where it acts, and the arm by which it may be moved aside. */
import { type Formula, formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Axis, across, type Loading } from './cases.ts'
import { lettersOf } from './loading.ts'
import type { Plan } from './plan.ts'
import { x1, x2, y1, y2 } from './symbols.ts'

/** A strip of wall, or a parapet or roof, with its force along an axis. */
export interface Part {
  readonly name: string
  /** The level that takes it, and the level whose plan its width follows. */
  readonly level: string
  readonly plan: string
  readonly F: Value
}

export interface Resultant {
  readonly force: Value
  /** Across the force: where it acts, and its arm where it may be moved. */
  readonly at: Value
  readonly arm?: Value
  /** The parts with their places, where these differ. */
  readonly parts: Tabulation
}

export interface Faces {
  readonly planOf: (level: string) => Plan
  /** Share of the width by which the force may be moved aside. */
  readonly share?: Value
  /** Where that share is from. */
  readonly source: string
}

const alpha = sym('alpha_w', '\\alpha_w', 'share')
const B = { x: sym('B_x', 'B_x', 'length'), y: sym('B_y', 'B_y', 'length') }
const ends = { x: [x1, x2], y: [y1, y2] } as const

const made = new Map<string, Formula>()

function once(key: string, make: () => Formula): Formula {
  const known = made.get(key) ?? make()
  made.set(key, known)
  return known
}

/** @param parts at least one, all of one level */
export function resultantOf(
  loading: Loading,
  axis: Axis,
  level: string,
  parts: readonly Part[],
  faces: Faces,
  display: Display,
): Resultant {
  const { F, path } = lettersOf[loading]
  const side = across(axis)
  const own = `${level}.${path}`
  const table = new Tabulation(
    parts.map(({ name }) => name),
    (row, key) => `${own}from.${row}.${key}`,
    display,
  ).take(
    F[axis],
    parts.map(({ F }) => F),
  )
  const force = sumOf(`${own}force.${axis}`, F[axis], level, parts, display)
  if (alike(parts, side, faces)) return { force, ...faceOf(loading, side, level, faces, display), parts: table }
  return { force, ...weighted(table, loading, axis, level, force, parts, faces, display), parts: table }
}

/** The middle of a level's own face across a force, and the arm of its width. */
export function faceOf(
  loading: Loading,
  side: Axis,
  level: string,
  faces: Faces,
  display: Display,
): Pick<Resultant, 'at' | 'arm'> {
  const { path, at } = lettersOf[loading]
  const plan = faces.planOf(level)
  const arm = armOf(`${level}.${path}ea.${side}`, loading, side, plan, faces, display)
  return { at: middleOf(`${level}.${path}at.${side}`, at[side], side, plan, display), ...(arm ? { arm } : {}) }
}

/** The parts of a level are few, so that their sum is told with each of them. */
function sumOf(id: string, gives: Sym, level: string, parts: readonly Part[], display: Display): Value {
  const symbols = parts.map(({ F }, i) => sym(`F_${i + 1}`, F.tex, 'force'))
  const rule = once(`sum ${gives.name} ${symbols.map(({ tex }) => tex).join()}`, () =>
    formula({
      gives,
      body: symbols.map(({ name }) => name).join(' + '),
      of: symbols,
      source: 'statics: the parts that the level takes',
    }),
  )
  return work(id, rule, Object.fromEntries(parts.map(({ F }, i) => [`F_${i + 1}`, F])), display, [level])
}

/** True when the faces of all parts have one middle and one width. */
function alike(parts: readonly Part[], side: Axis, { planOf }: Faces): boolean {
  const spans = parts.map(({ plan }) => extent(planOf(plan), side))
  const [first] = spans
  const same = (a: Value, b: Value) => Math.abs(a.si - b.si) < 1e-6
  return first === undefined || spans.every(span => same(span.low, first.low) && same(span.high, first.high))
}

function extent({ corners }: Plan, side: Axis): { readonly low: Value; readonly high: Value } {
  const places = corners.map(corner => corner[side])
  return { low: places.reduce((a, b) => (b.si < a.si ? b : a)), high: places.reduce((a, b) => (b.si > a.si ? b : a)) }
}

function middleOf(id: string, gives: Sym, side: Axis, plan: Plan, display: Display): Value {
  const [one, two] = ends[side]
  const { low, high } = extent(plan, side)
  const rule = once(`middle ${gives.name}`, () =>
    formula({ gives, body: `(${one.name} + ${two.name})/2`, of: [one, two], source: 'middle of the face' }),
  )
  return work(id, rule, { [one.name]: low, [two.name]: high }, display, [plan.level])
}

function armOf(
  id: string,
  loading: Loading,
  side: Axis,
  { level, size }: Plan,
  { share, source }: Faces,
  display: Display,
) {
  if (!share || loading !== 'wind') return undefined
  const gives = lettersOf[loading].arm[side]
  const rule = once(`arm ${side} ${source}`, () =>
    formula({ gives, body: `alpha_w*${B[side].name}`, of: [alpha, B[side]], source }),
  )
  return work(id, rule, { alpha_w: share, [B[side].name]: size[side] }, display, [level])
}

/** Parts of different faces act each in the middle of its own: their resultant by statics. */
function weighted(
  table: Tabulation,
  loading: Loading,
  axis: Axis,
  level: string,
  force: Value,
  parts: readonly Part[],
  faces: Faces,
  display: Display,
): Pick<Resultant, 'at' | 'arm'> {
  const side = across(axis)
  const letters = lettersOf[loading]
  const own = `${level}.${letters.path}`
  const F = letters.F[axis]
  const resultant = (gives: Sym, values: readonly Value[], key: string): Value => {
    const product = sym(`F_${gives.name}`, `${F.tex}\\,${gives.tex}`, 'moment')
    const sum = sym(`sum_${product.name}`, `\\sum ${product.tex}`, 'moment')
    const times = once(`times ${F.name} ${gives.name}`, () =>
      formula({ gives: product, body: `${F.name}*${gives.name}`, of: [F, gives], source: 'statics' }),
    )
    const mean = once(`mean ${F.name} ${gives.name}`, () =>
      formula({
        gives,
        body: `${sum.name}/${F.name}`,
        of: [sum, F],
        source: 'statics: where the parts of the force act together',
      }),
    )
    table.take(gives, values).work(times, { [F.name]: F.name, [gives.name]: gives.name }, `${key}_F.${side}`)
    const total = table.sum(product.name, sum, `${own}sum.${key}.${side}`)
    return work(`${own}${key}.${side}`, mean, { [sum.name]: total, [F.name]: force }, display, [level])
  }
  const plans = parts.map(({ plan }) => faces.planOf(plan))
  const at = resultant(
    letters.at[side],
    plans.map(plan => middleOf(`${plan.level}.${letters.path}face.${side}`, letters.at[side], side, plan, display)),
    'at',
  )
  const arms = plans.flatMap(
    plan => armOf(`${plan.level}.${letters.path}face.ea.${side}`, loading, side, plan, faces, display) ?? [],
  )
  return { at, ...(arms.length > 0 ? { arm: resultant(letters.arm[side], arms, 'ea') } : {}) }
}
