/** Response of the building to a spectrum: base shear of each mode, and storey shears put together from all of them. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout, work } from '../base/work.ts'
import {
  accelerationOf,
  type GivenSpectrum,
  periodOf,
  type SpectrumPoint,
  shareOf,
  staticOf,
} from '../model/spectrum.ts'
import { diagnose } from '../read/text.ts'
import type { Axis } from './cases.ts'
import { combine, quadratic, responseOf, sumOfSquares } from './response.ts'
import { T, Vx, Vy, W } from './symbols.ts'
import { GRAVITY, type VibratingLevel, type Vibration } from './vibration.ts'

/** The ground moving along one axis. */
export interface SpectralAxis {
  readonly axis: Axis
  /** T, S_a, the share of the mass and the base shear of each mode that is shown; all of them are combined. */
  readonly modes: Tabulation
  /** The combined base shear along the axis, its static counterpart where it is stated, and the factor that follows. */
  readonly base: Value
  readonly factor?: Value
  /** Combined shears along x and y and torsion about the centre of rigidity of each storey, from the top down, raised by the factor. */
  readonly storeys: Tabulation
}

export interface Spectral {
  readonly given: GivenSpectrum
  readonly axes: readonly SpectralAxis[]
}

const lower = { T: sym('T_1', 'T_1', 'period'), S: sym('S_1', 'S_1', 'number') }
const upper = { T: sym('T_2', 'T_2', 'period'), S: sym('S_2', 'S_2', 'number') }
const weight = sym('sum_W', '\\sum W', 'force')
const modeShear = sym('V_m', 'V_m', 'force')
const raise = sym('f', 'f', 'number')
const raised = {
  Vx: sym('f_Vx', 'f\\,V_x', 'force'),
  Vy: sym('f_Vy', 'f\\,V_y', 'force'),
  T: sym('f_T', 'f\\,T', 'moment'),
}
const taking = { x: sym('m_x', 'm_x', 'share'), y: sym('m_y', 'm_y', 'share') }
const along = { x: Vx, y: Vy }

const eachAxis = <U>(of: (axis: Axis) => U): Readonly<Record<Axis, U>> => ({ x: of('x'), y: of('y') })
const SPECTRAL = 'response spectrum analysis'
const formulas = {
  acceleration: formula({
    gives: accelerationOf,
    body: 'S_1 + (S_2 - S_1)*(T - T_1)/(T_2 - T_1)',
    of: [lower.S, upper.S, periodOf, lower.T, upper.T],
    source: 'straight line between the points of the spectrum',
  }),
  base: eachAxis(axis =>
    formula({
      gives: modeShear,
      body: `${taking[axis].name}*sum_W*S_a`,
      of: [taking[axis], weight, accelerationOf],
      source: SPECTRAL,
    }),
  ),
  factor: eachAxis(axis =>
    formula({
      gives: raise,
      body: `max(1, p*${staticOf[axis].name}/${along[axis].name})`,
      of: [shareOf, staticOf[axis], along[axis]],
      source: 'raised to its share of the static base shear',
    }),
  ),
  Vx: formula({ gives: raised.Vx, body: 'f*V_x', of: [raise, Vx], source: SPECTRAL }),
  Vy: formula({ gives: raised.Vy, body: 'f*V_y', of: [raise, Vy], source: SPECTRAL }),
  T: formula({ gives: raised.T, body: 'f*T', of: [raise, T], source: SPECTRAL }),
}

/** @param levels from the top down, as the modes were worked from */
export function workSpectral(
  given: GivenSpectrum,
  vibration: Vibration,
  levels: readonly VibratingLevel[],
  display: Display,
): Result<Spectral> {
  const { every } = vibration
  const accelerations = every.rows.map((row, m) => accelerationAt(given, row, every.column('T').cell(m), display))
  const outside = accelerations.find(found => !found.ok)
  if (outside && !outside.ok) return outside
  const S = accelerations.flatMap(found => (found.ok ? [found.value] : []))
  const total = new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.${key}`,
    display,
  )
    .take(
      W,
      levels.map(({ mass }) => mass.W),
    )
    .sum('W', weight, 'modal.W')
  return good({
    given,
    axes: (['x', 'y'] as const).map(axis => workAxis(axis, given, vibration, levels, S, total, display)),
  })
}

/** Acceleration at a mode's period. */
function accelerationAt({ points, block }: GivenSpectrum, mode: string, T: Value, display: Display): Result<Value> {
  const at = points.findIndex(point => point.T.si >= T.si)
  const [a, b] = at === 0 ? [points[0], points[1]] : [points[at - 1], points[at]]
  const covered = a && b && T.si >= a.T.si && T.si <= b.T.si
  if (!covered) return bad([outOfSpectrum(mode, T, points, block)])
  const inputs = { S_1: a.S, S_2: b.S, T, T_1: a.T, T_2: b.T }
  return good(work(`mode.${mode}.Sa`, formulas.acceleration, inputs, display, [mode]))
}

const outOfSpectrum = (
  mode: string,
  T: Value,
  points: readonly SpectrumPoint[],
  { table, info }: GivenSpectrum['block'],
) =>
  diagnose(
    'error',
    'period-outside-spectrum',
    table?.headerLine.span ?? info,
    `mode ${mode} has a period of ${T.si.toPrecision(4)} s, and the spectrum runs from ${points[0]?.T.si} s to ${points.at(-1)?.T.si} s`,
    'Add points to the spectrum; a stiff mode wants one at 0 s.',
  )

function workAxis(
  axis: Axis,
  given: GivenSpectrum,
  { modes, raw }: Vibration,
  levels: readonly VibratingLevel[],
  S: readonly Value[],
  total: Value,
  display: Display,
): SpectralAxis {
  const table = new Tabulation(modes.rows, (row, key) => `mode.${row}.${key}`, display)
    .takeColumn(modes.column('T'))
    .take(accelerationOf, S.slice(0, modes.rows.length))
    .takeColumn(modes.column(`m_${axis}`))
    .work(formulas.base[axis], { [taking[axis].name]: taking[axis].name, sum_W: total, S_a: 'S_a' }, `V.${axis}`)
  const rho = given.combination === 'CQC' ? quadratic(raw.modes, given.damping.si) : sumOfSquares(raw.modes)
  const rising = [...levels].reverse()
  const shears = raw.modes.map((mode, m) => {
    const acceleration = (S[m]?.si ?? Number.NaN) * GRAVITY
    const response = responseOf(mode, raw.floors, axis, () => acceleration)
    return aboutRigidity(response.shears, rising, raw.axis)
  })
  const combined = combine(shears, rho)
  const value = (id: string, of: Sym, at: number, about: string) =>
    answer(
      id,
      of,
      combined[at] ?? Number.NaN,
      `${given.combination} of all ${raw.modes.length} modes, ground along ${axis}`,
      about,
      display,
    )
  const base = value(`modal.${axis}.V`, along[axis], axis === 'x' ? 0 : 1, 'base')
  const stated = given.static[axis]
  const factor =
    stated &&
    work(
      `modal.${axis}.factor`,
      formulas.factor[axis],
      { p: given.share, [staticOf[axis].name]: stated, [along[axis].name]: base },
      display,
      [axis],
    )
  const column = (of: Sym, key: string, part: 0 | 1 | 2) =>
    levels.map(({ level }, fromTop) => {
      const i = levels.length - 1 - fromTop
      return value(`${level}.modal.${axis}.${key}`, of, 3 * i + part, `${level}, ${axis}`)
    })
  const storeys = new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.modal.${axis}.${key}`,
    display,
  )
    .take(Vx, column(Vx, 'Vx', 0))
    .take(Vy, column(Vy, 'Vy', 1))
    .take(T, column(T, 'T', 2))
  if (factor)
    storeys
      .work(formulas.Vx, { f: factor, V_x: 'V_x' }, 'raised.Vx')
      .work(formulas.Vy, { f: factor, V_y: 'V_y' }, 'raised.Vy')
      .work(formulas.T, { f: factor, T: 'T' }, 'raised.T')
  return { axis, modes: table, base, ...(factor ? { factor } : {}), storeys }
}

/** Storey shears with their torsion about each storey's own centre of rigidity, while the signs of the mode are still known. */
function aboutRigidity(
  shears: Readonly<Float64Array>,
  rising: readonly VibratingLevel[],
  axis: Vibration['raw']['axis'],
): Float64Array {
  const moved = Float64Array.from(shears)
  rising.forEach(({ rigidity }, i) => {
    const [X, Y, about] = [0, 1, 2].map(part => shears[3 * i + part] ?? Number.NaN) as [number, number, number]
    moved[3 * i + 2] = about - (rigidity.x.si - axis.x) * Y + (rigidity.y.si - axis.y) * X
  })
  return moved
}

const answer = (id: string, of: Sym, si: number, what: string, about: string, display: Display): Value => ({
  id,
  tex: texAbout(of.tex, about),
  si,
  ...shownAs(of, display),
  origin: { kind: 'measured', what, spans: [] },
})

/** A value of the response by the rest of its id: `x.V` and `x.factor`, or `modal.x.Vx` of a level. */
export function spectralValue({ axes }: Spectral, id: string): Value | undefined {
  for (const { base, factor, storeys, modes } of axes) {
    for (const value of [base, factor]) if (value?.id === id) return value
    for (const table of [storeys, modes])
      for (const { idOf, cell } of table.columns) {
        const at = table.rows.findIndex((_, i) => idOf(i) === id)
        if (at !== -1) return cell(at)
      }
  }
  return undefined
}
