/**
 * The directional procedure of ASCE 7, chapter 27, for the main wind-force resisting system of an enclosed or
 * partially enclosed rigid building: pressures on walls, parapets and the slopes of a gable, and the forces of the
 * strips that they make. Internal pressure acts alike on the windward and leeward sides and cancels in these.
 */
import { type Formula, formula, type Sym, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { texAbout, work } from '../base/work.ts'
import type { DirectionalWind } from '../model/wind-directional.ts'
import { type Axis, across } from './cases.ts'
import { lettersOf } from './loading.ts'
import { L } from './symbols.ts'
import type { WindLevel } from './wind.ts'
import { Cl, Cw, figure, leewardWallOf, ratio, windwardWall } from './wind-coefficients.ts'
import { Kd, type Pressure, q, qh, stripTable, workPressure } from './wind-pressure.ts'
import { type RoofWork, workRoof } from './wind-roof.ts'
import { B, type Facing, partsOf, pl, pw, widthsOf } from './wind-stated.ts'
import { type Strip, stripsOf, z1, z2 } from './wind-strips.ts'

export interface DirectionalWork {
  readonly kind: 'directional'
  readonly strips: readonly Strip[]
  readonly pressure: Pressure
  /** K_h and q_h at the mean roof height. */
  readonly h: Value
  readonly K: Value
  readonly q: Value
  /** Windward walls: z_1, z_2, K_z, q_z, p_w. */
  readonly windward: Tabulation
  readonly Cw: Value
  readonly internal: { readonly GCpi: Value; readonly p: Value }
  readonly least: { readonly wall: Value; readonly roof: Value }
  readonly roof: RoofWork
  readonly facing: readonly DirectionalFacing[]
}

export interface DirectionalFacing extends Facing {
  /** One row a level: L, B, L/B, C_p and p of the leeward walls of the storey below it. */
  readonly leeward: Tabulation
  /** Steps of the parapet and of the roof. */
  readonly steps: readonly Value[]
}

const G = sym('G', 'G', 'number')
const GCpi = sym('GC_pi', 'GC_{pi}', 'number')
const pi = sym('p_i', 'p_i', 'areaLoad')
export const pMin = sym('p_min', 'p_{\\text{min}}', 'areaLoad')
export const pRoofMin = sym('p_rmin', 'p_{\\text{r,min}}', 'areaLoad')

export interface Rules {
  /** Pressure on a surface: a velocity pressure times its coefficient. */
  readonly pressure: (gives: Sym, of: Sym, C: Sym, where: string) => Formula
  readonly inputs: Readonly<Record<string, Value>>
  readonly edition: DirectionalWind['edition']
}

function rulesOf({ edition, Kd: directionality, G: gust }: DirectionalWind): Rules {
  const late = edition === '7-22'
  return {
    edition,
    inputs: { G: gust, ...(late ? { K_d: directionality } : {}) },
    pressure: (gives, of, C, where) =>
      formula({
        gives,
        body: `${of.name}*${late ? 'K_d*' : ''}G*${C.name}`,
        of: [of, ...(late ? [Kd] : []), G, C],
        source: `ASCE ${edition} Eq. 27.3-1${where} (unchecked)`,
      }),
  }
}

export function workDirectionalWind(
  given: DirectionalWind,
  levels: readonly WindLevel[],
  display: Display,
): DirectionalWork {
  const [highest] = levels
  if (!highest) throw new Error('wind needs a level')
  const { edition } = given
  const rules = rulesOf(given)
  const pressure = workPressure(given, display)
  const roof = workRoof(given, highest, display)
  const { K, q: atRoof } = pressure.at('h', roof.h)
  const strips = stripsOf(levels, pressure.zMin, undefined, display)
  const C = windwardWall(edition, display)
  const windward = pressure
    .along(strips)
    .work(rules.pressure(pw, q, Cw, ', windward walls'), { q_z: 'q_z', ...rules.inputs, C_pw: C })
  const least = leastOf(edition, display)
  const facing = (['x', 'y'] as const).map((axis): DirectionalFacing => {
    const leeward = leewardTable(axis, levels, rules, atRoof, display)
    const table = stripForces(axis, strips, levels, windward, leeward, least.wall, display)
    const beyond = roof.facing(axis, { rules, pressure, qh: atRoof, Cw: C, leeward, least })
    const [F, F0] = [lettersOf.wind.F[axis].name, lettersOf['least wind'].F[axis].name]
    return {
      axis,
      strips: table,
      leeward,
      parts: [...beyond.parts, ...partsOf(strips, table, F)],
      least: [...beyond.least, ...partsOf(strips, table, F0)],
      steps: beyond.steps,
    }
  })
  return {
    kind: 'directional',
    strips,
    pressure,
    h: roof.h,
    K,
    q: atRoof,
    windward,
    Cw: C,
    internal: internalOf(given, rules, atRoof, display),
    least,
    roof,
    facing,
  }
}

/** The leeward walls of every storey: their pressure is that at the mean roof height. */
function leewardTable(
  axis: Axis,
  levels: readonly WindLevel[],
  rules: Rules,
  atRoof: Value,
  display: Display,
): Tabulation {
  const table = new Tabulation(
    levels.map(({ level }) => level),
    (row, key) => `${row}.wind.${key}.${axis}`,
    display,
  )
    .take(
      L,
      levels.map(({ plan }) => plan.size[axis]),
    )
    .take(
      B,
      levels.map(({ plan }) => plan.size[across(axis)]),
    )
    .work(
      formula({
        gives: ratio,
        body: 'L/B',
        of: [L, B],
        source: `${figure(rules.edition)}: plan along the wind over plan across it`,
      }),
      { L: 'L', B: 'B' },
      'L_B',
    )
  return table
    .take(
      Cl,
      levels.map(({ level }, i) => {
        const C = leewardWallOf(`${level}.wind.C_pl.${axis}`, rules.edition, table.column('r').cell(i), display)
        return { ...C, tex: texAbout(C.tex, level, axis) }
      }),
    )
    .work(rules.pressure(pl, qh, Cl, ', leeward walls'), { q_h: atRoof, ...rules.inputs, C_pl: 'C_pl' }, 'p_l', [axis])
}

function stripForces(
  axis: Axis,
  strips: readonly Strip[],
  levels: readonly WindLevel[],
  windward: Tabulation,
  leeward: Tabulation,
  least: Value,
  display: Display,
): Tabulation {
  const at = (level: string) => leeward.column('p_l').cell(leeward.rows.indexOf(level))
  const edges = { B: 'B', z_2: 'z_2', z_1: 'z_1' }
  return stripTable(strips, display)
    .take(B, widthsOf(strips, levels, axis))
    .takeColumn(windward.column('p_w'))
    .take(
      pl,
      strips.map(({ plan }) => at(plan)),
    )
    .work(
      formula({
        gives: lettersOf.wind.F[axis],
        body: '(p_w - p_l)*B*(z_2 - z_1)',
        of: [pw, pl, B, z2, z1],
        source: 'pressures on the strip; internal pressure is alike on both walls and cancels',
      }),
      { p_w: 'p_w', p_l: 'p_l', ...edges },
      `F_${axis}`,
    )
    .work(
      formula({
        gives: lettersOf['least wind'].F[axis],
        body: 'p_min*B*(z_2 - z_1)',
        of: [pMin, B, z2, z1],
        source: 'least pressure on the strip',
      }),
      { p_min: least, ...edges },
      `F_min.${axis}`,
    )
}

/** Worked to be seen: it acts on every wall alike, so it is no part of a storey's force. */
function internalOf(given: DirectionalWind, { inputs, edition }: Rules, atRoof: Value, display: Display) {
  const size = given.enclosure === 'enclosed' ? '0.18' : '0.55'
  const coefficient = work(
    'wind.GC_pi',
    formula({
      gives: GCpi,
      body: size,
      of: [],
      source: `ASCE ${edition} Table 26.13-1, ${given.enclosure}, of either sign (unchecked)`,
    }),
    {},
    display,
  )
  const { K_d } = inputs
  const p = work(
    'wind.p_i',
    formula({
      gives: pi,
      body: `q_h*${K_d ? 'K_d*' : ''}GC_pi`,
      of: [qh, ...(K_d ? [Kd] : []), GCpi],
      source: `ASCE ${edition} Eq. 27.3-1, internal pressure of either sign, with q_i = q_h (unchecked)`,
      assumes: [
        'internal pressure acts alike on the windward and leeward sides, so the force on a storey is without it',
      ],
    }),
    { q_h: atRoof, GC_pi: coefficient, ...(K_d ? { K_d } : {}) },
    display,
  )
  return { GCpi: coefficient, p }
}

function leastOf(edition: DirectionalWind['edition'], display: Display) {
  const of = (id: string, gives: Sym, body: string, where: string): Value =>
    work(id, formula({ gives, body, of: [], source: `ASCE ${edition} 27.1.5, on ${where} (unchecked)` }), {}, display)
  return {
    wall: of('wind.p_min', pMin, '16 psf', 'the projected area of walls'),
    roof: of('wind.p_rmin', pRoofMin, '8 psf', 'the projected area of roofs'),
  }
}
