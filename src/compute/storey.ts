/**
 * What acts on a storey: the forces of the levels at and above it, each at its own
 * centre of mass, and their moment about the storey's centre of rigidity.
 *
 * e = CM − CR and M = F_y e_x − F_x e_y, counter-clockwise positive. A case moves the mass
 * across its force by the accidental arm: in EX+ toward positive y.
 */
import { type Formula, formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { type ColumnInput, Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
import { type Axis, type Case, caseOnPage, casesOf } from './cases.ts'
import type { Rigidity } from './rigidity.ts'
import { eax, eay, ex, ey, Fx, Fy, T, Vx, Vy, xm, xr, ym, yr } from './symbols.ts'

/** What acts on a storey from one level: its forces, at its centre of mass. */
export interface Acting {
  readonly level: string
  readonly mass: { readonly x: Value; readonly y: Value }
  readonly force: { readonly x?: Value; readonly y?: Value }
  /** Accidental arms: along y for a force along x, and the reverse. */
  readonly arm: { readonly x: Value; readonly y: Value }
}

export interface Eccentricity {
  readonly x: Value
  readonly y: Value
}

const alpha = sym('alpha', '\\alpha', 'share')
const B = { x: sym('B_x', 'B_x', 'length'), y: sym('B_y', 'B_y', 'length') }
const Mo = sym('M_o', 'M_o', 'moment')

const STATICS = 'statics'
const ACCIDENTAL = 'accidental eccentricity, mass moved across the force'

export const eccentricity = {
  x: formula({ gives: ex, body: 'x_m - x_r', of: [xm, xr], source: STATICS }),
  y: formula({ gives: ey, body: 'y_m - y_r', of: [ym, yr], source: STATICS }),
}

export const accidentalArm = {
  x: formula({ gives: eax, body: 'alpha*B_x', of: [alpha, B.x], source: ACCIDENTAL }),
  y: formula({ gives: eay, body: 'alpha*B_y', of: [alpha, B.y], source: ACCIDENTAL }),
}

const marks = { '-1': ' - ', '0': '', '1': ' + ' } as const

/** M = F_y e_x − F_x e_y, with the accidental arm on the side of the case. */
const momentFormulas = new Map<string, { readonly about: Formula; readonly origin: Formula }>(
  casesOf(['x', 'y']).map(({ name, axis, moved }) => {
    const [off, at, F, sign] = axis === 'x' ? ([eay, ym, Fx, '-'] as const) : ([eax, xm, Fy, ''] as const)
    const e = axis === 'x' ? ey : ex
    const aside = moved === 0 ? '' : `${marks[moved]}${off.name}`
    const of = moved === 0 ? [] : [off]
    const source = moved === 0 ? STATICS : ACCIDENTAL
    return [
      name,
      {
        about: formula({ gives: T, body: `${sign}${F.name}*(${e.name}${aside})`, of: [F, e, ...of], source }),
        origin: formula({
          gives: Mo,
          body: `${sign}${F.name}*(${at.name}${aside})`,
          of: [F, at, ...of],
          source,
        }),
      },
    ] as const
  }),
)

export function workEccentricity(
  level: string,
  mass: Acting['mass'],
  { x, y }: Rigidity,
  display: Display,
): Eccentricity {
  return {
    x: work(`${level}.e.x`, eccentricity.x, { x_m: mass.x, x_r: x }, display),
    y: work(`${level}.e.y`, eccentricity.y, { y_m: mass.y, y_r: y }, display),
  }
}

const forces = { x: Fx, y: Fy }
const storeyShears = { x: Vx, y: Vy }

/** A storey below one level carries the force of that level, under a name of its own. */
const ownForce = {
  x: formula({ gives: Vx, body: 'F_x', of: [Fx], source: STATICS }),
  y: formula({ gives: Vy, body: 'F_y', of: [Fy], source: STATICS }),
}

/** The force of the level itself, or the sum from the levels at and above it. */
export function storeyShear(
  level: string,
  axis: Axis,
  acting: readonly Pick<Acting, 'level' | 'force'>[],
  display: Display,
): Value {
  const from = acting.flatMap(({ level, force }) => (force[axis] ? [{ level, value: force[axis] }] : []))
  const [only, ...more] = from
  const id = `${level}.storey.${axis}`
  if (only && more.length === 0 && only.level === level)
    return work(id, ownForce[axis], { [forces[axis].name]: only.value }, display)
  const table = new Tabulation(
    from.map(({ level }) => level),
    (row, key) => `${row}.force.${key}`,
    display,
  ).take(
    forces[axis],
    from.map(({ value }) => value),
  )
  return table.sum(forces[axis].name, storeyShears[axis], id)
}

function momentFormula({ name }: Case) {
  const found = momentFormulas.get(name)
  if (!found) throw new Error(`case ${name} has no moment`)
  return found
}

export function workMoment(
  each: Case,
  rigidity: Rigidity,
  acting: readonly Acting[],
  e: Eccentricity,
  display: Display,
): { readonly moment: Value; readonly moments?: Tabulation } {
  const { axis, name, moved } = each
  const { about } = momentFormula(each)
  const id = `${rigidity.level}.T.${name}`
  const from = acting.filter(({ force }) => force[axis])
  const [only, ...more] = from
  const force = only?.force[axis]
  if (only && force && more.length === 0 && only.level === rigidity.level) {
    const inputs: Record<string, Value> = axis === 'x' ? { F_x: force, e_y: e.y } : { F_y: force, e_x: e.x }
    if (moved !== 0) inputs[axis === 'x' ? 'e_ay' : 'e_ax'] = axis === 'x' ? only.arm.y : only.arm.x
    return { moment: work(id, about, inputs, display, [caseOnPage(name)]) }
  }
  const moments = momentTable(each, rigidity, from, display)
  return { moment: { ...moments.sum('T', T, id), tex: texAbout(T.tex, caseOnPage(name)) }, moments }
}

/** Each level's force has its own arm about this storey's centre of rigidity. */
function momentTable(
  each: Case,
  { level, x: x_r, y: y_r }: Rigidity,
  from: readonly Acting[],
  display: Display,
): Tabulation {
  const { axis, moved, name } = each
  const present = from.flatMap(({ force }) => force[axis] ?? [])
  const table = new Tabulation(
    from.map(({ level }) => level),
    (row, key) => `${level}.from.${row}.${key}`,
    display,
  ).take(forces[axis], present)
  const inputs: Record<string, ColumnInput> = {}
  if (axis === 'x')
    table
      .take(
        ym,
        from.map(({ mass }) => mass.y),
      )
      .work(eccentricity.y, { y_m: 'y_m', y_r }, 'e_y')
  else
    table
      .take(
        xm,
        from.map(({ mass }) => mass.x),
      )
      .work(eccentricity.x, { x_m: 'x_m', x_r }, 'e_x')
  for (const symbol of momentFormula(each).about.symbols.keys()) inputs[symbol] = symbol
  if (moved !== 0)
    table.take(
      axis === 'x' ? eay : eax,
      from.map(({ arm }) => (axis === 'x' ? arm.y : arm.x)),
    )
  return table.work(momentFormula(each).about, inputs, `T.${name}`, [caseOnPage(name)])
}

/** The same forces about the origin, which leans on no centre of rigidity. */
export function appliedMoment(level: string, each: Case, acting: readonly Acting[], display: Display): Value {
  const { axis, moved, name } = each
  const from = acting.filter(({ force }) => force[axis])
  const { origin } = momentFormula(each)
  const table = new Tabulation(
    from.map(({ level }) => level),
    (row, key) => `${level}.from.${row}.${key}`,
    display,
  )
    .take(
      forces[axis],
      from.flatMap(({ force }) => force[axis] ?? []),
    )
    .take(
      axis === 'x' ? ym : xm,
      from.map(({ mass }) => (axis === 'x' ? mass.y : mass.x)),
    )
  if (moved !== 0)
    table.take(
      axis === 'x' ? eay : eax,
      from.map(({ arm }) => (axis === 'x' ? arm.y : arm.x)),
    )
  const inputs = Object.fromEntries([...origin.symbols.keys()].map(symbol => [symbol, symbol]))
  return table.work(origin, inputs, `M_o.${name}`, [caseOnPage(name)]).sum('M_o', Mo, `${level}.M_o.${name}`)
}
