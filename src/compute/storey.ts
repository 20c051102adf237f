/**
 * What acts on a storey: the forces of the levels at and above it, each where it acts at its own
 * level, and their moment about the storey's centre of rigidity.
 *
 * A force of earthquake acts at the centre of mass, one of wind in the middle of the face; e is that
 * place less CR and M = F_y e_x − F_x e_y, counter-clockwise positive. A case may move a force across its
 * line by an arm: in EX+ toward positive y.
 */
import { type Formula, formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { type ColumnInput, Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
import { type Axis, across, type Case, type CasePart, caseOnPage, casesOf, type Loading } from './cases.ts'
import { type Acting, type Letters, lettersOf } from './loading.ts'
import type { Rigidity } from './rigidity.ts'
import { eax, eay, T, Vx, Vy, xr, yr } from './symbols.ts'

export interface Eccentricity {
  readonly x: Value
  readonly y: Value
}

const alpha = sym('alpha', '\\alpha', 'share')
const B = { x: sym('B_x', 'B_x', 'length'), y: sym('B_y', 'B_y', 'length') }
const Mo = sym('M_o', 'M_o', 'moment')

const STATICS = 'statics'
const ACCIDENTAL = 'accidental eccentricity, mass moved across the force'

export const accidentalArm = {
  x: formula({ gives: eax, body: 'alpha*B_x', of: [alpha, B.x], source: ACCIDENTAL }),
  y: formula({ gives: eay, body: 'alpha*B_y', of: [alpha, B.y], source: ACCIDENTAL }),
}

/** e of a loading: where its force acts less the centre of rigidity; and a storey below one level carries its force. */
interface Statics {
  readonly e: Readonly<Record<Axis, Formula>>
  readonly own: Readonly<Record<Axis, Formula>>
}

const staticsMade = new Map<Loading, Statics>()

function staticsOf(loading: Loading): Statics {
  const known = staticsMade.get(loading)
  if (known) return known
  const { e, at, F, V } = lettersOf[loading]
  const made = {
    e: {
      x: formula({ gives: e.x, body: `${at.x.name} - x_r`, of: [at.x, xr], source: STATICS }),
      y: formula({ gives: e.y, body: `${at.y.name} - y_r`, of: [at.y, yr], source: STATICS }),
    },
    own: {
      x: formula({ gives: V.x, body: F.x.name, of: [F.x], source: STATICS }),
      y: formula({ gives: V.y, body: F.y.name, of: [F.y], source: STATICS }),
    },
  }
  staticsMade.set(loading, made)
  return made
}

interface Moments {
  readonly about: Formula
  readonly origin: Formula
}

const momentsMade = new Map<string, Moments>()
const marks = { '-1': ' - ', '0': '', '1': ' + ' } as const
for (const each of casesOf(['x', 'y'])) momentFormulas(each)

/** M = F_y e_x − F_x e_y, each force with its share and its arm on the side of the case. */
function momentFormulas(each: Case): Moments {
  const key = `${each.loading} ${each.name} ${each.source ?? ''}`
  const known = momentsMade.get(key)
  if (known) return known
  const { loading, parts } = each
  const letters = lettersOf[loading]
  const aside = parts.filter(({ moved }) => moved !== 0).map(({ axis }) => letters.arm[across(axis)])
  const source = each.source ?? (aside.length === 0 ? STATICS : ACCIDENTAL)
  const forces = parts.map(({ axis }) => letters.F[axis])
  const arms = (of: 'e' | 'at') => parts.map(({ axis }) => letters[of][across(axis)])
  const made = {
    about: formula({ gives: T, body: sumOf(parts, letters, 'e'), of: [...forces, ...arms('e'), ...aside], source }),
    origin: formula({ gives: Mo, body: sumOf(parts, letters, 'at'), of: [...forces, ...arms('at'), ...aside], source }),
  }
  momentsMade.set(key, made)
  return made
}

function sumOf(parts: readonly CasePart[], { F, arm, ...of }: Letters, what: 'e' | 'at'): string {
  return parts
    .map(({ axis, share, sense, moved }, i) => {
      const side = across(axis)
      const force = share === 1 ? F[axis].name : `${share}*${F[axis].name}`
      const lever = `(${of[what][side].name}${moved === 0 ? '' : `${marks[moved]}${arm[side].name}`})`
      const negative = (axis === 'x') === (sense === 1)
      const sign = i === 0 ? (negative ? '-' : '') : negative ? ' - ' : ' + '
      return `${sign}${force}*${lever}`
    })
    .join('')
}

export function workEccentricity(
  level: string,
  loading: Loading,
  at: Acting['at'],
  { x, y }: Rigidity,
  display: Display,
): Eccentricity {
  const letters = lettersOf[loading]
  const { e } = staticsOf(loading)
  return {
    x: work(`${level}.${letters.path}e.x`, e.x, { [letters.at.x.name]: at.x, x_r: x }, display),
    y: work(`${level}.${letters.path}e.y`, e.y, { [letters.at.y.name]: at.y, y_r: y }, display),
  }
}

/** The force of the level itself, or the sum from the levels at and above it. */
export function storeyShear(
  level: string,
  axis: Axis,
  loading: Loading,
  acting: readonly Pick<Acting, 'level' | 'force'>[],
  display: Display,
): Value {
  const { F, V, path } = lettersOf[loading]
  const from = acting.flatMap(({ level, force }) => (force[axis] ? [{ level, value: force[axis] }] : []))
  const [only, ...more] = from
  const id = `${level}.${path}storey.${axis}`
  if (only && more.length === 0 && only.level === level)
    return work(id, staticsOf(loading).own[axis], { [F[axis].name]: only.value }, display)
  const table = new Tabulation(
    from.map(({ level }) => level),
    (row, key) => `${row}.${path}force.${key}`,
    display,
  ).take(
    F[axis],
    from.map(({ value }) => value),
  )
  return table.sum(F[axis].name, V[axis], id)
}

const sharesMade = new Map<string, Formula>()

/** The storey shear along an axis in a case: the share of it that the case takes, in its sense. */
export function caseShear(level: string, each: Case, { axis, share, sense }: CasePart, V: Value, display: Display) {
  if (share === 1 && sense === 1) return V
  const of = lettersOf[each.loading].V[axis]
  const key = `${each.source ?? ''} ${sense * share}*${of.name}`
  const made =
    sharesMade.get(key) ??
    formula({
      gives: axis === 'x' ? Vx : Vy,
      body: share === 1 ? `-${of.name}` : `${sense * share}*${of.name}`,
      of: [of],
      source: each.source ?? STATICS,
    })
  sharesMade.set(key, made)
  return work(`${level}.storey.${axis}.${each.name}`, made, { [of.name]: V }, display, [caseOnPage(each.name)])
}

export function workMoment(
  each: Case,
  rigidity: Rigidity,
  acting: readonly Acting[],
  e: Eccentricity,
  display: Display,
): { readonly moment: Value; readonly moments?: Tabulation } {
  const { name } = each
  const { about } = momentFormulas(each)
  const id = `${rigidity.level}.T.${name}`
  const from = actingIn(each, acting)
  const [only, ...more] = from
  if (only && more.length === 0 && only.level === rigidity.level)
    return { moment: work(id, about, inputsOf(each, only, e), display, [caseOnPage(name)]) }
  const moments = momentTable(each, rigidity, from, display)
  return { moment: { ...moments.sum('T', T, id), tex: texAbout(T.tex, caseOnPage(name)) }, moments }
}

/** The levels that have forces along every axis of a case. */
const actingIn = ({ parts }: Case, acting: readonly Acting[]): readonly Acting[] =>
  acting.filter(({ force }) => parts.every(({ axis }) => force[axis]))

/** The values of one level that its moment follows from, by their letters. */
function inputsOf({ loading, parts }: Case, { force, arm }: Acting, e: Eccentricity): Record<string, Value> {
  const letters = lettersOf[loading]
  const inputs: Record<string, Value> = {}
  for (const { axis, moved } of parts) {
    const side = across(axis)
    if (force[axis]) inputs[letters.F[axis].name] = force[axis]
    inputs[letters.e[side].name] = e[side]
    if (moved !== 0 && arm) inputs[letters.arm[side].name] = arm[side]
  }
  return inputs
}

/** Each level's force has its own arm about this storey's centre of rigidity. */
function momentTable(each: Case, rigidity: Rigidity, from: readonly Acting[], display: Display): Tabulation {
  const { loading, parts } = each
  const { e } = staticsOf(loading)
  const r = { x: ['x_r', rigidity.x], y: ['y_r', rigidity.y] } as const
  const letters = lettersOf[loading]
  const table = forceTable(rigidity.level, each, from, display)
  for (const { axis } of parts) {
    const side = across(axis)
    const [name, centre] = r[side]
    table.work(
      e[side],
      { [letters.at[side].name]: letters.at[side].name, [name]: centre },
      `${letters.path}${letters.e[side].name}`,
    )
  }
  takeArms(table, each, from)
  return workTable(table, momentFormulas(each).about, 'T', each)
}

/** The same forces about the origin, which leans on no centre of rigidity. */
export function appliedMoment(level: string, each: Case, acting: readonly Acting[], display: Display): Value {
  const from = actingIn(each, acting)
  const table = forceTable(level, each, from, display)
  takeArms(table, each, from)
  return workTable(table, momentFormulas(each).origin, 'M_o', each).sum('M_o', Mo, `${level}.M_o.${each.name}`)
}

/** The forces of a case and where each acts, one row a level. */
function forceTable(level: string, { loading, parts }: Case, from: readonly Acting[], display: Display): Tabulation {
  const { F, at } = lettersOf[loading]
  const table = new Tabulation(
    from.map(({ level }) => level),
    (row, key) => `${level}.from.${row}.${key}`,
    display,
  )
  for (const { axis } of parts)
    table
      .take(
        F[axis],
        from.flatMap(({ force }) => force[axis] ?? []),
      )
      .take(
        at[across(axis)],
        from.map(acting => acting.at[across(axis)]),
      )
  return table
}

function takeArms(table: Tabulation, { loading, parts }: Case, from: readonly Acting[]): void {
  for (const { axis, moved } of parts)
    if (moved !== 0)
      table.take(
        lettersOf[loading].arm[across(axis)],
        from.flatMap(({ arm }) => arm?.[across(axis)] ?? []),
      )
}

function workTable(table: Tabulation, formula: Formula, key: string, { name }: Case): Tabulation {
  const inputs: Readonly<Record<string, ColumnInput>> = Object.fromEntries(
    [...formula.symbols.keys()].map(symbol => [symbol, symbol]),
  )
  return table.work(formula, inputs, `${key}.${name}`, [caseOnPage(name)])
}
