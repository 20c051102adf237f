/** Letters of ASCE 7, chapters 11 and 12, and the settings that carry them. */
import { sym } from '../base/formula.ts'
import type { SettingRule } from '../model/seismic.ts'

export const SS = sym('S_S', 'S_S', 'number')
export const S1 = sym('S_1', 'S_1', 'number')
export const Fa = sym('F_a', 'F_a', 'number')
export const Fv = sym('F_v', 'F_v', 'number')
export const SMS = sym('S_MS', 'S_{MS}', 'number')
export const SM1 = sym('S_M1', 'S_{M1}', 'number')
export const SDS = sym('S_DS', 'S_{DS}', 'number')
export const SD1 = sym('S_D1', 'S_{D1}', 'number')
export const T0 = sym('T_0', 'T_0', 'period')
export const TS = sym('T_S', 'T_S', 'period')
export const TL = sym('T_L', 'T_L', 'period')
export const Ie = sym('I_e', 'I_e', 'number')
export const R = sym('R', 'R', 'number')
export const Omega0 = sym('Omega_0', '\\Omega_0', 'number')
export const Cd = sym('C_d', 'C_d', 'number')
export const rho = sym('rho', '\\rho', 'number')
export const hn = sym('h_n', 'h_n', 'length')
export const Ta = sym('T_a', 'T_a', 'period')
export const Cu = sym('C_u', 'C_u', 'number')
export const Tmost = sym('T_most', 'T_{\\text{max}}', 'period')
export const Tstated = sym('T_calc', 'T_{\\text{calc}}', 'period')
export const T = sym('T', 'T', 'period')
export const Cs = sym('C_s', 'C_s', 'number')
export const k = sym('k', 'k', 'number')
export const V = sym('V', 'V', 'force')
export const W = sym('W', 'W', 'force')

/** Settings of both editions, in the order in which they are told. */
export const asceSettings: readonly SettingRule[] = [
  { name: 'site class', key: 'site', what: 'the site class' },
  { name: 'risk category', key: 'risk', what: 'the risk category of the building, I to IV' },
  { name: 'S_S', key: 'SS', what: 'the mapped short-period acceleration in g', sym: SS },
  { name: 'S_1', key: 'S1', what: 'the mapped acceleration at 1 s in g', sym: S1 },
  { name: 'S_MS', key: 'SMS', what: 'the short-period acceleration for the site class in g', sym: SMS },
  { name: 'S_M1', key: 'SM1', what: 'the acceleration at 1 s for the site class in g', sym: SM1 },
  { name: 'S_DS', key: 'SDS', what: 'the design short-period acceleration in g', sym: SDS },
  { name: 'S_D1', key: 'SD1', what: 'the design acceleration at 1 s in g', sym: SD1 },
  { name: 'T_L', key: 'TL', what: 'the long-period transition period', sym: TL },
  { name: 'h_n', key: 'hn', what: 'the structural height', sym: hn },
  { name: 'system', key: 'system', what: 'the seismic force-resisting system', each: true },
  { name: 'R', key: 'R', what: 'the response modification coefficient', sym: R, each: true },
  { name: 'Omega_0', key: 'Omega0', what: 'the overstrength factor', sym: Omega0, each: true },
  { name: 'C_d', key: 'Cd', what: 'the deflection amplification factor', sym: Cd, each: true },
  { name: 'rho', key: 'rho', what: 'the redundancy factor', sym: rho, each: true },
  { name: 'T_a', key: 'Ta', what: 'the approximate period by another formula of 12.8.2.1', sym: Ta, each: true },
  { name: 'T', key: 'Tcalc', what: 'the period from a substantiated analysis', sym: Tstated, each: true },
  { name: 'k', key: 'k', what: 'the exponent of the vertical distribution', sym: k, each: true },
]
