/** Modes of vibration of the building as values of the page: periods, the mass that takes part, and shapes. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'
import type { Axis } from './cases.ts'
import type { Mass } from './mass.ts'
import { type FloorMass, type Mode, modesFor, modesOf } from './modal.ts'
import { stackOf } from './stack.ts'
import { axisOf, type StackAxis, tiesOf, type WalledLevel } from './ties.ts'

/** A level with its walls and its weight. */
export interface VibratingLevel extends WalledLevel {
  readonly level: string
  readonly mass: Mass
}

export interface Vibration {
  /** T, Γ along x and y, the shares of the mass along x and y and their sums: the modes that are shown. */
  readonly modes: Tabulation
  /** The same of every mode. */
  readonly every: Tabulation
  /** u, v and turn times radius of gyration of each level, from the top down, one table a mode. */
  readonly shapes: readonly Tabulation[]
  /** Of every mode. */
  readonly residuals: readonly Value[]
  /** The number of modes whose masses reach the share below along both axes, and of all modes. */
  readonly enough: number
  readonly all: number
  /** What the responses are worked from: all modes, the floors from the lowest up, and the axis of the stack. */
  readonly raw: { readonly modes: readonly Mode[]; readonly floors: readonly FloorMass[]; readonly axis: StackAxis }
}

/** Share of the mass along each axis that the modes shown take along, as ASCE 7 12.9.1.1 and EN 1998-1 4.3.3.3.1 ask (unchecked). */
export const ENOUGH = 0.9
/** At least so many are shown where there are as many: the first along each axis and in turning, as a rule. */
const AT_LEAST = 3
/** Standard gravity in m/s², exact. */
export const GRAVITY = 9.80665

const period = sym('T', 'T', 'period')
const factor = { x: sym('Gamma_x', '\\Gamma_x', 'number'), y: sym('Gamma_y', '\\Gamma_y', 'number') }
const share = { x: sym('m_x', 'm_x', 'share'), y: sym('m_y', 'm_y', 'share') }
const sum = { x: sym('s_x', '\\sum m_x', 'share'), y: sym('s_y', '\\sum m_y', 'share') }
const before = { x: sym('b_x', '\\sum m_{x,b}', 'share'), y: sym('b_y', '\\sum m_{y,b}', 'share') }
const residual = sym('R', 'R', 'residual')
const shape = {
  u: sym('u', 'u', 'number'),
  v: sym('v', 'v', 'number'),
  turn: sym('theta_i', '\\theta\\,i', 'number'),
}

const SUMMED = 'modes so far'
const sums = {
  x: formula({ gives: sum.x, body: 'b_x + m_x', of: [before.x, share.x], source: SUMMED }),
  y: formula({ gives: sum.y, body: 'b_y + m_y', of: [before.y, share.y], source: SUMMED }),
}

/** @param levels from the top down, each with a mass that extends in plan */
export function workVibration(levels: readonly VibratingLevel[], display: Display): Vibration {
  const rising = [...levels].reverse()
  const axis = axisOf(rising)
  const made = stackOf(
    rising.length,
    tiesOf(rising, axis).map(({ tie }) => tie),
  )
  // Each level has a centre of rigidity, so that its walls hold it.
  if (!made.ok) throw new Error(`storey ${made.because.storey} is loose`)
  const floors = rising.map(
    ({ mass }): FloorMass => ({
      mass: mass.W.si / GRAVITY,
      polar: mass.Ip.si / GRAVITY,
      x: mass.x.si - axis.x,
      y: mass.y.si - axis.y,
    }),
  )
  const modes = modesOf(made.value, floors)
  const enough = modesFor(ENOUGH, modes)
  const named = modes.map((mode, m) => ({ mode, name: String(m + 1) }))
  const shown = named.slice(0, Math.max(enough, AT_LEAST))
  const whole = floors.reduce((total, { mass }) => total + mass, 0)
  return {
    modes: modeTable(shown, floors, whole, display),
    every: modeTable(named, floors, whole, display),
    shapes: shown.map(each => shapeTable(each, levels, floors, display)),
    residuals: named.map(({ mode, name }) => solved(`mode.${name}.residual`, residual, mode.residual, name, display)),
    enough,
    all: modes.length,
    raw: { modes, floors, axis },
  }
}

interface NamedMode {
  readonly mode: Mode
  readonly name: string
}

/** A number that the solution for all modes gives. */
const solved = (id: string, of: Sym, si: number, name: string, display: Display): Value => ({
  id,
  tex: texAbout(of.tex, name),
  si,
  ...shownAs(of, display),
  origin: { kind: 'measured', what: `mode ${name}, solved for all levels together`, spans: [] },
})

function modeTable(
  shown: readonly NamedMode[],
  floors: readonly FloorMass[],
  whole: number,
  display: Display,
): Tabulation {
  const table = new Tabulation(
    shown.map(({ name }) => name),
    (row, key) => `mode.${row}.${key}`,
    display,
  )
  const column = (key: string, of: Sym, number: (mode: Mode) => number) =>
    table.take(
      of,
      shown.map(({ mode, name }) => solved(`mode.${name}.${key}`, of, number(mode), name, display)),
    )
  column('T', period, mode => mode.period)
  for (const axis of ['x', 'y'] as const)
    column(`participation.${axis}`, factor[axis], mode => mode.participation[axis] * largest(mode, floors))
  for (const axis of ['x', 'y'] as const) {
    column(`share.${axis}`, share[axis], mode => mode.mass[axis] / whole)
    table.take(sum[axis], summed(table, axis, display))
  }
  return table
}

function summed(table: Tabulation, axis: Axis, display: Display): readonly Value[] {
  let so: Value = {
    id: `mode.0.sum.${axis}`,
    tex: before[axis].tex,
    si: 0,
    ...shownAs(before[axis], display),
    origin: { kind: 'measured', what: 'no mode comes before the first', spans: [] },
  }
  return table.rows.map((name, m) => {
    const inputs = { [before[axis].name]: so, [share[axis].name]: table.column(share[axis].name).cell(m) }
    so = work(`mode.${name}.sum.${axis}`, sums[axis], inputs, display, [name])
    return so
  })
}

/** Radius of gyration of a level about its centre of mass, in m. */
const gyration = ({ mass, polar }: FloorMass): number => Math.sqrt(polar / mass)

/** The largest part of a shape: along x, along y, or from turning at the radius of gyration. */
function largest({ shape: parts }: Mode, floors: readonly FloorMass[]): number {
  return parts.reduce((most, value, i) => {
    const floor = floors[Math.floor(i / 3)]
    return Math.max(most, Math.abs(value) * (i % 3 === 2 && floor ? gyration(floor) : 1))
  }, 0)
}

function shapeTable(
  { mode, name }: NamedMode,
  levels: readonly VibratingLevel[],
  floors: readonly FloorMass[],
  display: Display,
): Tabulation {
  const scale = 1 / largest(mode, floors)
  const part = (key: 'u' | 'v' | 'turn', at: 0 | 1 | 2) =>
    levels.map(({ level }, fromTop) => {
      const i = levels.length - 1 - fromTop
      const floor = floors[i]
      const arm = at === 2 && floor ? gyration(floor) : 1
      const si = (mode.shape[3 * i + at] ?? Number.NaN) * arm * scale
      return solved(`${level}.mode.${name}.${key}`, shape[key], si, name, display)
    })
  return new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.mode.${name}.${key}`,
    display,
  )
    .take(shape.u, part('u', 0))
    .take(shape.v, part('v', 1))
    .take(shape.turn, part('turn', 2))
}

/** Columns by what their ids end in. */
const keysOfMode: ReadonlyMap<string, string> = new Map([
  ['T', 'T'],
  ['participation.x', 'Gamma_x'],
  ['participation.y', 'Gamma_y'],
  ['share.x', 'm_x'],
  ['share.y', 'm_y'],
  ['sum.x', 's_x'],
  ['sum.y', 's_y'],
])
const keysOfShape: ReadonlyMap<string, string> = new Map([
  ['u', 'u'],
  ['v', 'v'],
  ['turn', 'theta_i'],
])

/** A value of a mode by the rest of its id, such as `1.T`. */
export function modeValue({ every, residuals }: Vibration, [name = '', ...key]: readonly string[]): Value | undefined {
  const at = every.rows.indexOf(name)
  if (key.join('.') === 'residual') return residuals[at]
  const column = keysOfMode.get(key.join('.'))
  return at === -1 || column === undefined ? undefined : every.column(column).cell(at)
}

/** A value of a mode's shape at a level. */
export function shapeValue(
  { shapes }: Vibration,
  level: string,
  [name = '', key = '', ...more]: readonly string[],
): Value | undefined {
  const table = shapes[Number(name) - 1]
  const [at, column] = [table?.rows.indexOf(level) ?? -1, keysOfShape.get(key)]
  return at === -1 || column === undefined || more.length > 0 ? undefined : table?.column(column).cell(at)
}
