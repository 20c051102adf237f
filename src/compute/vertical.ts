/**
 * The base shear of one direction shared over the levels, in proportion to W h^k, and the force that the
 * diaphragm of each level is designed for. From the top down.
 */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { type ColumnInput, Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs } from '../base/work.ts'
import type { Direction } from '../model/seismic.ts'
import type { DiaphragmRule, DirectionDesign, Vertical } from '../standards/profile.ts'
import { storeyShear } from './storey.ts'
import { Fx, Fy, V, Vx, Vy, W } from './symbols.ts'

/** A level with what it weighs. */
export interface HeavyLevel {
  readonly level: string
  readonly elevation: Value
  readonly W: Value
}

export interface VerticalShares {
  /** W, h, W h^k, C_v, F and V of every level, F_t where the top has a force of its own. */
  readonly table: Tabulation
  /** Name of the column of W h^k. */
  readonly product: string
  readonly sumProduct: Value
  readonly sumForce: Value
}

const h = sym('h', 'h', 'length')
const top = sym('h_n', 'h_n', 'length')
const k = sym('k', 'k', 'number')
const Cv = sym('C_v', 'C_v', 'number')
const Ft = sym('F_t', 'F_t', 'force')
const Ftop = sym('F_top', 'F_{t,\\text{top}}', 'force')

const forceOf = { x: Fx, y: Fy } as const
const shearOf = { x: Vx, y: Vy } as const

/** W h, W h² or W (h/h_n)^k: h_n cancels, and keeps a power that is no whole number free of units. */
const products = {
  first: product('W*h', sym('W_h', 'W\\,h', 'moment'), sym('sum_W_h', '\\sum W\\,h', 'moment'), [W, h]),
  second: product('W*h^2', sym('W_h2', 'W\\,h^2', 'weightMoment'), sym('sum_W_h2', '\\sum W\\,h^2', 'weightMoment'), [
    W,
    h,
  ]),
  other: product('W*(h/h_n)^k', sym('W_hk', 'W\\,h^k', 'force'), sym('sum_W_hk', '\\sum W\\,h^k', 'force'), [
    W,
    h,
    top,
    k,
  ]),
}

function product(body: string, gives: Sym, sum: Sym, of: readonly Sym[]) {
  return {
    gives,
    sum,
    work: (source: string) => formula({ gives, body, of, source }),
    share: (source: string) => formula({ gives: Cv, body: `${gives.name}/${sum.name}`, of: [gives, sum], source }),
  }
}

const none = (id: string, of: Sym, display: Display): Value => ({
  id,
  tex: of.tex,
  si: 0,
  ...shownAs(of, display),
  origin: { kind: 'measured', what: 'only the highest level has a force of its own', spans: [] },
})

/** @param levels from the top down */
export function workVertical(
  levels: readonly HeavyLevel[],
  { V: base, vertical }: Pick<DirectionDesign, 'V' | 'vertical'>,
  direction: Direction,
  height: Value,
  display: Display,
): VerticalShares {
  const kind = vertical.k.si === 1 ? products.first : vertical.k.si === 2 ? products.second : products.other
  const { source } = vertical
  const F = forceOf[direction]
  const table = new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.${key}`,
    display,
  )
    .take(
      W,
      levels.map(each => each.W),
    )
    .take(
      h,
      levels.map(({ elevation }) => elevation),
    )
  const raised: Readonly<Record<string, ColumnInput>> =
    kind === products.other ? { W: 'W', h: 'h', h_n: height, k: vertical.k } : { W: 'W', h: 'h' }
  table.work(kind.work(source), raised, `Wh.${direction}`, [direction])
  const sumProduct = table.sum(kind.gives.name, kind.sum, `seismic.${direction}.Wh`)
  table.work(kind.share(source), { [kind.gives.name]: kind.gives.name, [kind.sum.name]: sumProduct }, `Cv.${direction}`)
  takeForces(table, levels, F, { base, vertical, direction, display })
  const forces = levels.map(({ level }, i) => ({ level, force: { [direction]: table.column(F.name).cell(i) } }))
  table.take(
    shearOf[direction],
    levels.map(({ level }, i) => storeyShear(level, direction, 'seismic', forces.slice(0, i + 1), display)),
  )
  const sumForce = table.sum(F.name, F, `seismic.${direction}.sum.F`)
  return { table, product: kind.gives.name, sumProduct, sumForce }
}

function takeForces(
  table: Tabulation,
  levels: readonly HeavyLevel[],
  F: Sym,
  {
    base,
    vertical,
    direction,
    display,
  }: { readonly base: Value; readonly vertical: Vertical; readonly direction: Direction; readonly display: Display },
): void {
  const { top, source } = vertical
  const key = `force.${direction}`
  if (!top) {
    table.work(formula({ gives: F, body: 'C_v*V', of: [Cv, V], source }), { C_v: 'C_v', V: base }, key)
    return
  }
  table.take(
    Ft,
    levels.map(({ level }, i) => (i === 0 ? top : none(`${level}.Ft.${direction}`, Ft, display))),
  )
  table.work(
    formula({ gives: F, body: `F_t + C_v*(V - ${Ftop.name})`, of: [Ft, Cv, V, Ftop], source }),
    { F_t: 'F_t', C_v: 'C_v', V: base, [Ftop.name]: top },
    key,
  )
}

const above = { F: sym('sum_F', '\\sum F', 'force'), W: sym('sum_W', '\\sum W', 'force') }
const raw = sym('F_raw', 'F_{p,0}', 'force')
const Fp = sym('F_p', 'F_p', 'force')

/** Force on the diaphragm of each level: its weight times what the levels at and above it have in force over weight. */
export function workDiaphragms(
  { table: known }: VerticalShares,
  { source, least, most }: DiaphragmRule,
  direction: Direction,
  display: Display,
): Tabulation {
  const { rows } = known
  const table = new Tabulation(rows, (row, key) => `${row}.diaphragm.${key}`, display)
    .takeColumn(known.column('W'))
    .takeColumn(known.column(shearOf[direction].name), above.F)
    .take(
      above.W,
      rows.map((row, i) => weightAbove(known, row, i, display)),
    )
  const [low, high] = [least.formula.gives, most.formula.gives]
  return table
    .work(
      formula({ gives: raw, body: 'sum_F/sum_W*W', of: [above.F, above.W, W], source }),
      { sum_F: 'sum_F', sum_W: 'sum_W', W: 'W' },
      `raw.${direction}`,
    )
    .work(least.formula, { ...least.inputs, W: 'W' }, `least.${direction}`)
    .work(most.formula, { ...most.inputs, W: 'W' }, `most.${direction}`)
    .work(
      formula({ gives: Fp, body: `max(min(${raw.name}, ${high.name}), ${low.name})`, of: [raw, high, low], source }),
      { [raw.name]: raw.name, [high.name]: high.name, [low.name]: low.name },
      direction,
    )
}

function weightAbove(known: Tabulation, row: string, rowIdx: number, display: Display): Value {
  const upTo = Array.from({ length: rowIdx + 1 }, (_, i) => known.column('W').cell(i))
  return new Tabulation(known.rows.slice(0, rowIdx + 1), (level, key) => `${level}.${key}`, display)
    .take(W, upTo)
    .sum('W', above.W, `${row}.diaphragm.W`)
}

/** Names of the columns of both tables, in the order in which they are shown. */
export const verticalColumns = ({ table, product }: VerticalShares, direction: Direction): readonly string[] => [
  'W',
  'h',
  product,
  'C_v',
  ...(table.columns.some(({ sym }) => sym === Ft) ? ['F_t'] : []),
  forceOf[direction].name,
  shearOf[direction].name,
]

export const forceColumn = (direction: Direction): string => forceOf[direction].name
export const diaphragmColumn = Fp.name
