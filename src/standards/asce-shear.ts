/** ASCE 7, chapter 12: system, period and base shear of one direction. */
import { formula, type Sym, sym } from '../base/formula.ts'
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value, Word } from '../base/value.ts'
import { work } from '../base/work.ts'
import { type Direction, settingMissing } from '../model/seismic.ts'
import { systemFactors } from './asce-factors.ts'
import type { Ground } from './asce-ground.ts'
import { Cs, Cu, hn, Ie, R, S1, SD1, SDS, T, Ta, TL, Tmost, Tstated, V, W } from './asce-letters.ts'
import { exponentByPeriod } from './needed.ts'
import { type Desk, type DirectionDesign, type Said, step } from './profile.ts'
import { interpolated } from './tabled.ts'

/** Equation numbers of 12.8 that differ between the editions. */
export interface Numbering {
  readonly plateau: string
  readonly cap: string
  readonly longCap: string
  readonly least: string
  readonly leastNear: string
}

const of = (sub: string) => sym(`C_s_${sub}`, `C_{s,\\text{${sub}}}`, 'number')
const flat = sym('C_s_flat', 'C_{s,\\text{flat}}', 'number')
const most = of('max')
const least = of('min')
const near = sym('C_s_near', 'C_{s,\\text{min,}S_1}', 'number')

const RAISED = 'raised by half by the exception of 11.4.8, so that the plateau holds up to 1.5 T_S (unchecked)'

const shearFormulas = (edition: string, number: Numbering) => {
  const eq = (clause: string) => `${edition} Eq. ${clause} (number unchecked)`
  const body = `S_D1*(1 s)/(T*(R/I_e))`
  return {
    flat: formula({ gives: flat, body: 'S_DS/(R/I_e)', of: [SDS, R, Ie], source: eq(number.plateau) }),
    cap: formula({ gives: most, body, of: [SD1, T, R, Ie], source: `${eq(number.cap)}, T ≤ T_L` }),
    capRaised: formula({
      gives: most,
      body: `1.5*${body}`,
      of: [SD1, T, R, Ie],
      source: `${eq(number.cap)}, ${RAISED}`,
    }),
    long: formula({
      gives: most,
      body: 'S_D1*T_L*(1 s)/(T^2*(R/I_e))',
      of: [SD1, TL, T, R, Ie],
      source: `${eq(number.longCap)}, T > T_L`,
    }),
    longRaised: formula({
      gives: most,
      body: '1.5*S_D1*T_L*(1 s)/(T^2*(R/I_e))',
      of: [SD1, TL, T, R, Ie],
      source: `${eq(number.longCap)}, T > T_L, ${RAISED}`,
    }),
    least: formula({ gives: least, body: 'max(0.044*S_DS*I_e, 0.01)', of: [SDS, Ie], source: eq(number.least) }),
    near: formula({
      gives: near,
      body: '0.5*S_1/(R/I_e)',
      of: [S1, R, Ie],
      source: `${eq(number.leastNear)}, S_1 ≥ 0.6`,
    }),
    far: formula({
      gives: Cs,
      body: `max(min(${flat.name}, ${most.name}), ${least.name})`,
      of: [flat, most, least],
      source: `${edition} 12.8.1.1`,
    }),
    close: formula({
      gives: Cs,
      body: `max(min(${flat.name}, ${most.name}), ${least.name}, ${near.name})`,
      of: [flat, most, least, near],
      source: `${edition} 12.8.1.1`,
    }),
    V: formula({ gives: V, body: 'C_s*W', of: [Cs, W], source: `${edition} Eq. 12.8-1` }),
  }
}

const periodFormulas = (edition: string) => {
  const clause = `${edition} 12.8.2.1, Table 12.8-2, all other structural systems`
  return {
    US: formula({ gives: Ta, body: '0.02*(h_n/(1 ft))^0.75*(1 s)', of: [hn], source: clause }),
    SI: formula({ gives: Ta, body: '0.0488*(h_n/(1 m))^0.75*(1 s)', of: [hn], source: clause }),
    most: formula({ gives: Tmost, body: 'C_u*T_a', of: [Cu, Ta], source: `${edition} 12.8.2 (unchecked)` }),
    own: formula({ gives: T, body: 'T_a', of: [Ta], source: `${edition} 12.8.2, T_a in place of an analysis` }),
    calc: formula({
      gives: T,
      body: `min(${Tstated.name}, ${Tmost.name})`,
      of: [Tstated, Tmost],
      source: `${edition} 12.8.2 (unchecked)`,
    }),
  }
}

/** Coefficient for the upper limit of the period by S_D1, Table 12.8-1. */
const upper = [
  [0.1, 1.7],
  [0.15, 1.6],
  [0.2, 1.5],
  [0.3, 1.4],
  [0.4, 1.4],
] as const

/** T_L is nowhere mapped below this, in s. */
const SHORTEST_TL = 4

export function directionOf(
  edition: string,
  number: Numbering,
  desk: Desk,
  ground: Ground,
  direction: Direction,
): Result<DirectionDesign> {
  const system = systemFactors(edition, desk, ground, direction)
  if (!system.ok) return system
  const period = periodOf(edition, desk, ground, direction)
  const { display, given } = desk
  const { R: r, said } = system.value
  const id = (key: string) => `seismic.${direction}.${key}`
  const f = shearFormulas(edition, number)
  const about = [direction]
  const { SDS: sds, SD1: sd1, S1: s1, Ie: ie } = ground
  const tl = given.number('T_L')
  if (!tl && period.T.si > SHORTEST_TL)
    return bad([
      settingMissing(given, 'T_L', 'The period may lie beyond it. Write T_L: 8 s, from the map of the standard.'),
    ])
  if (!tl)
    desk.assume({
      text: 'The period of the building is not longer than the long-period transition period T_L.',
      because: `T_L is not stated; no map of the standard has one below ${SHORTEST_TL} s (${edition} 11.4.6, unchecked)`,
    })
  const Cflat = work(id('Cs.flat'), f.flat, { S_DS: sds, R: r, I_e: ie }, display, about)
  const beyond = tl !== undefined && period.T.si > tl.si
  const cap = ground.raised ? (beyond ? f.longRaised : f.capRaised) : beyond ? f.long : f.cap
  const Cmost = work(
    id('Cs.most'),
    cap,
    { S_D1: sd1, T: period.T, R: r, I_e: ie, ...(tl && beyond ? { T_L: tl } : {}) },
    display,
    about,
  )
  const Cleast = work(id('Cs.least'), f.least, { S_DS: sds, I_e: ie }, display, about)
  const Cnear = s1.si >= 0.6 ? work(id('Cs.near'), f.near, { S_1: s1, R: r, I_e: ie }, display, about) : undefined
  const bounds = {
    [flat.name]: Cflat,
    [most.name]: Cmost,
    [least.name]: Cleast,
    ...(Cnear ? { [near.name]: Cnear } : {}),
  }
  const C = work(id('Cs'), Cnear ? f.close : f.far, bounds, display, about)
  const v = work(id('V'), f.V, { C_s: C, W: desk.W }, display, about)
  const exponent = exponentByPeriod(`${edition} 12.8.3`, period.T, desk, direction)
  return good({
    V: v,
    vertical: { k: exponent, source: `${edition} 12.8.3` },
    diaphragm: diaphragmOf(edition, ground),
    said: [
      ...said,
      ...period.said,
      step(Cflat),
      step(Cmost),
      step(Cleast),
      ...(Cnear ? [step(Cnear)] : []),
      step(C),
      { kind: 'choice', word: governing(id('governs'), C, { flat: Cflat, most: Cmost, least: Cleast, near: Cnear }) },
      step(v),
      step(exponent),
    ],
  })
}

function governing(
  id: string,
  C: Value,
  {
    flat,
    most,
    least,
    near,
  }: Readonly<Record<'flat' | 'most' | 'least', Value>> & { readonly near: Value | undefined },
): Word {
  const found = [
    [flat, 'plateau'],
    [most, 'upper limit at the period'],
    [least, 'lower limit'],
    [near, 'lower limit for S_1 ≥ 0.6'],
  ] as const
  const [bound, text] = found.find(([value]) => value?.si === C.si) ?? found[0]
  const clause = bound?.origin.kind === 'worked' ? bound.origin.step.formula.source : ''
  const equation = /Eq\. [\d.-]+/.exec(clause)?.[0] ?? ''
  return { id, text: equation, because: `C_s is the ${text}: ${equation} governs.`, about: C.id }
}

function periodOf(
  edition: string,
  { given, display, height }: Desk,
  { SD1: sd1 }: Ground,
  direction: Direction,
): { readonly T: Value; readonly said: readonly Said[] } {
  const f = periodFormulas(edition)
  const id = (key: string) => `seismic.${direction}.${key}`
  const about = [direction]
  const ta = given.number('T_a', direction) ?? work(id('Ta'), f[display.system], { h_n: height }, display, about)
  const cu = work(
    id('Cu'),
    interpolated(Cu, SD1, sd1.si, upper, `${edition} Table 12.8-1 (unchecked)`),
    { S_D1: sd1 },
    display,
    about,
  )
  const longest = work(id('Tmax'), f.most, { C_u: cu, T_a: ta }, display, about)
  const stated = given.number('T', direction)
  const own = stated
    ? work(id('T'), f.calc, { [Tstated.name]: stated, [Tmost.name]: longest }, display, about)
    : work(id('T'), f.own, { T_a: ta }, display, about)
  return { T: own, said: [ta, cu, longest, ...(stated ? [stated] : []), own].map(step) }
}

const Fleast = sym('F_least', 'F_{p,\\text{min}}', 'force')
const Fmost = sym('F_most', 'F_{p,\\text{max}}', 'force')

function diaphragmOf(edition: string, { SDS: sds, Ie: ie }: Ground) {
  const inputs = { S_DS: sds, I_e: ie }
  const source = `${edition} 12.10.1.1`
  const limits = (gives: Sym, share: string) =>
    formula({ gives, body: `${share}*S_DS*I_e*W`, of: [SDS, Ie, W], source })
  return {
    source,
    least: { formula: limits(Fleast, '0.2'), inputs },
    most: { formula: limits(Fmost, '0.4'), inputs },
  }
}
