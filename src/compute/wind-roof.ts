/** What stands above the highest level: a parapet on a flat roof, or a gable with its slopes and its end walls. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { DirectionalWind } from '../model/wind-directional.ts'
import { type Axis, across } from './cases.ts'
import { lettersOf } from './loading.ts'
import { L } from './symbols.ts'
import type { WindLevel } from './wind.ts'
import { Cl, Cw, figure, gableSlopes, slenderness } from './wind-coefficients.ts'
import { pMin, pRoofMin, type Rules } from './wind-directional.ts'
import { Kd, type Pressure, qh } from './wind-pressure.ts'
import type { Part } from './wind-resultant.ts'
import { B, pl, pw, topOf } from './wind-stated.ts'

/** What the roof needs of the walls below it. */
export interface Below {
  readonly rules: Rules
  readonly pressure: Pressure
  readonly qh: Value
  /** C_p of windward walls. */
  readonly Cw: Value
  readonly leeward: Tabulation
  readonly least: { readonly wall: Value; readonly roof: Value }
}

export interface Beyond {
  readonly parts: readonly Part[]
  readonly least: readonly Part[]
  readonly steps: readonly Value[]
}

export interface RoofWork {
  /** Mean roof height. */
  readonly h: Value
  /** Rise of a gable. */
  readonly rise?: Value
  /** True where the slopes are too flat for a force along the wind. */
  readonly flatSlopes: boolean
  readonly facing: (axis: Axis, below: Below) => Beyond
}

const z = sym('z', 'z', 'length')
const h = sym('h', 'h', 'length')
const span = sym('b', 'b', 'length')
const theta = sym('theta', '\\theta', 'angle')
const rise = sym('h_r', 'h_r', 'length')
const qp = sym('q_p', 'q_p', 'areaLoad')
const qr = sym('q_r', 'q_r', 'areaLoad')
const ridge = sym('z_r', 'z_r', 'length')
const hp = sym('h_p', 'h_p', 'length')

const GEOMETRY = 'geometry of the roof'
/** Up to this slope the figure has no pressure of its own for a windward slope, and the roof height is that of the eave. */
const TEN_DEGREES = (10 * Math.PI) / 180

const none: Beyond = { parts: [], least: [], steps: [] }

export function workRoof(given: DirectionalWind, top: WindLevel, display: Display): RoofWork {
  const { roof, edition } = given
  if (roof.kind === 'flat') {
    const height = given.h ?? plainHeight('the roof is flat', top, edition, display)
    const { parapet } = roof
    return {
      h: height,
      flatSlopes: false,
      facing: (axis, below) => (parapet ? parapetForces(axis, parapet, top, below, display) : none),
    }
  }
  const { slope } = roof
  const acrossRidge = top.plan.size[across(roof.ridge)]
  const height = work(
    'wind.rise',
    formula({
      gives: rise,
      body: 'b*tan(theta)/2',
      of: [span, theta],
      source: GEOMETRY,
      assumes: ['the ridge stands over the middle of the plan, and the eaves at the highest level'],
    }),
    { b: acrossRidge, theta: slope },
    display,
  )
  const flatSlopes = slope.si < TEN_DEGREES - 1e-9
  const mean =
    given.h ??
    (slope.si <= TEN_DEGREES + 1e-9
      ? plainHeight('eave height, since the slope is 10° or less', top, edition, display)
      : meanHeight(top, height, edition, display))
  return {
    h: mean,
    rise: height,
    flatSlopes,
    facing: (axis, below) =>
      axis === roof.ridge
        ? gableEnd(axis, height, top, below, display)
        : slopes(axis, { slope, rise: height, flatSlopes, mean }, top, below, display),
  }
}

const plainHeight = (why: string, { elevation }: WindLevel, edition: string, display: Display): Value =>
  work(
    'wind.h',
    formula({ gives: h, body: 'z', of: [z], source: `ASCE ${edition} 26.2, mean roof height: ${why} (unchecked)` }),
    { z: elevation },
    display,
  )

const meanHeight = ({ elevation }: WindLevel, height: Value, edition: string, display: Display): Value =>
  work(
    'wind.h',
    formula({
      gives: h,
      body: 'z + h_r/2',
      of: [z, rise],
      source: `ASCE ${edition} 26.2, mean roof height (unchecked)`,
    }),
    { z: elevation, h_r: height },
    display,
  )

/** Force of a part of the roof on the highest level. */
function partOf(name: string, { level }: WindLevel, F: Value): Part {
  return { name, level, plan: level, F }
}

interface Area {
  readonly name: string
  /** Projected area, from B and one height. */
  readonly body: string
  readonly of: readonly Sym[]
  readonly inputs: Readonly<Record<string, Value>>
  readonly source: string
}

function forcesOn(
  axis: Axis,
  { name, body, of, inputs, source }: Area,
  pressures: { readonly w: Value; readonly l: Value } | undefined,
  least: { readonly sym: Sym; readonly value: Value },
  top: WindLevel,
  display: Display,
): Pick<Beyond, 'parts' | 'least'> {
  const [F, F0] = [lettersOf.wind.F[axis], lettersOf['least wind'].F[axis]]
  const smallest = work(
    `wind.${name}.F_min.${axis}`,
    formula({
      gives: F0,
      body: `${least.sym.name}*${body}`,
      of: [least.sym, ...of],
      source: `least pressure on ${source}`,
    }),
    { [least.sym.name]: least.value, ...inputs },
    display,
    [name],
  )
  const acts =
    pressures &&
    work(
      `wind.${name}.F_${axis}`,
      formula({ gives: F, body: `(p_w - p_l)*${body}`, of: [pw, pl, ...of], source: `pressures on ${source}` }),
      { p_w: pressures.w, p_l: pressures.l, ...inputs },
      display,
      [name],
    )
  return { parts: acts ? [partOf(name, top, acts)] : [], least: [partOf(name, top, smallest)] }
}

function parapetForces(
  axis: Axis,
  parapet: Value,
  top: WindLevel,
  { rules, pressure, least }: Below,
  display: Display,
): Beyond {
  const height = topOf(top.elevation, parapet, display)
  const { K, q } = pressure.at('p', height)
  const { K_d } = rules.inputs
  const on = (side: 'w' | 'l', gives: Sym, coefficient: string, where: string): Value =>
    work(
      `wind.parapet.p_${side}`,
      formula({
        gives,
        body: `${coefficient}*q_p${K_d ? '*K_d' : ''}`,
        of: [qp, ...(K_d ? [Kd] : [])],
        source: `ASCE ${rules.edition} 27.3.4, ${where} parapet (unchecked)`,
      }),
      { q_p: q, ...(K_d ? { K_d } : {}) },
      display,
      ['parapet'],
    )
  const pressures = { w: on('w', pw, '1.5', 'windward'), l: on('l', pl, '-1.0', 'leeward') }
  const area = {
    name: 'parapet',
    body: 'B*h_p',
    of: [B, hp],
    inputs: { B: top.plan.size[across(axis)], h_p: parapet },
    source: 'the windward and the leeward parapet',
  }
  const forces = forcesOn(axis, area, pressures, { sym: pMin, value: least.wall }, top, display)
  return { ...forces, steps: [height, K, q, pressures.w, pressures.l, ...forces.parts.map(({ F }) => F)] }
}

/** The triangles of the end walls, with wind along the ridge: windward pressure as at the ridge. */
function gableEnd(
  axis: Axis,
  height: Value,
  top: WindLevel,
  { rules, pressure, Cw: C, leeward, least }: Below,
  display: Display,
): Beyond {
  const peak = work(
    'wind.z_r',
    formula({ gives: ridge, body: 'z + h_r', of: [z, rise], source: GEOMETRY }),
    { z: top.elevation, h_r: height },
    display,
  )
  const { K, q } = pressure.at('r', peak)
  const w = work(
    'wind.gables.p_w',
    rules.pressure(pw, qr, Cw, ', windward gable, as at the ridge'),
    { q_r: q, ...rules.inputs, C_pw: C },
    display,
    ['gables'],
  )
  const l = leeward.column('p_l').cell(leeward.rows.indexOf(top.level))
  const area = {
    name: 'gables',
    body: 'B*h_r/2',
    of: [B, rise],
    inputs: { B: top.plan.size[across(axis)], h_r: height },
    source: 'the triangles of the gable walls',
  }
  const forces = forcesOn(axis, area, { w, l }, { sym: pMin, value: least.wall }, top, display)
  return { ...forces, steps: [peak, K, q, w, ...forces.parts.map(({ F }) => F)] }
}

interface Gable {
  readonly slope: Value
  readonly rise: Value
  readonly flatSlopes: boolean
  /** Mean roof height. */
  readonly mean: Value
}

/** The slopes, with wind across the ridge: what their pressures have along the wind acts on the area that the wind sees. */
function slopes(
  axis: Axis,
  { slope, rise: height, flatSlopes, mean }: Gable,
  top: WindLevel,
  { rules, qh: atRoof, least }: Below,
  display: Display,
): Beyond {
  const area = {
    name: 'slopes',
    body: 'B*h_r',
    of: [B, rise],
    inputs: { B: top.plan.size[across(axis)], h_r: height },
    source: 'the slopes as the wind sees them',
  }
  const weight = { sym: pRoofMin, value: least.roof }
  if (flatSlopes) return { ...forcesOn(axis, area, undefined, weight, top, display), steps: [] }
  const s = work(
    'wind.slopes.h_L',
    formula({
      gives: slenderness,
      body: 'h/L',
      of: [h, L],
      source: `${figure(rules.edition)}: mean roof height over the plan along the wind`,
    }),
    { h: mean, L: top.plan.size[axis] },
    display,
  )
  const C = gableSlopes(rules.edition, slope, s, 'wind.slopes', display)
  const on = (side: 'w' | 'l', gives: Sym, of: Sym, value: Value, where: string): Value =>
    work(
      `wind.slopes.p_${side}`,
      rules.pressure(gives, qh, of, `, ${where} slope`),
      { q_h: atRoof, ...rules.inputs, [of.name]: value },
      display,
      ['slopes'],
    )
  const pressures = { w: on('w', pw, Cw, C.windward, 'windward'), l: on('l', pl, Cl, C.leeward, 'leeward') }
  const forces = forcesOn(axis, area, pressures, weight, top, display)
  return {
    ...forces,
    steps: [s, ...C.between, C.windward, C.leeward, pressures.w, pressures.l, ...forces.parts.map(({ F }) => F)],
  }
}
