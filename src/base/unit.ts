/**
 * Units, and how they are written. A unit is a product of named atoms, so that
 * `kip*ft^2/in` stays what the engineer wrote and is never turned into another.
 */
import {
  type Dimension,
  dimension,
  isNumber,
  NUMBER,
  raiseDimension,
  sameDimension,
  timesDimension,
} from './dimension.ts'

/** One named unit; `scale` is its size in base SI (N, m, s). */
export interface UnitAtom {
  readonly name: string
  readonly scale: number
  readonly dimension: Dimension
  /** The simpler atoms that make it up, when it is a name for a compound. */
  readonly parts: readonly UnitFactor[]
}

export interface UnitFactor {
  readonly atom: UnitAtom
  readonly power: number
}

export interface Unit {
  readonly factors: readonly UnitFactor[]
  readonly scale: number
  readonly dimension: Dimension
}

// Exact by international agreement: 1 ft = 0.3048 m; 1 lb = 0.45359237 kg at standard
// gravity 9.80665 m/s² (NIST SP 811, appendix B).
const FOOT = 0.3048
const POUND = 0.45359237 * 9.80665

const atoms = new Map<string, UnitAtom>()

function atom(names: string, scale: number, dim: Dimension, parts: readonly UnitFactor[] = []): UnitAtom {
  const [name = '', ...aliases] = names.split(' ')
  const made: UnitAtom = { name, scale, dimension: dim, parts }
  for (const spelling of [name, ...aliases]) atoms.set(spelling, made)
  return made
}

function compound(names: string, top: UnitAtom, bottom: UnitAtom, power = 1): UnitAtom {
  const parts = [
    { atom: top, power: 1 },
    { atom: bottom, power: -power },
  ]
  const made = unitOf(parts)
  return atom(names, made.scale, made.dimension, parts)
}

const LENGTH = dimension(0, 1)
const FORCE = dimension(1, 0)
const TIME = dimension(0, 0, 1)

const ft = atom('ft feet foot', FOOT, LENGTH)
const inch = atom('in inch inches', FOOT / 12, LENGTH)
atom('yd yard yards', FOOT * 3, LENGTH)
atom('mi mile miles', FOOT * 5280, LENGTH)
const m = atom('m metre metres meter meters', 1, LENGTH)
atom('cm', 0.01, LENGTH)
const mm = atom('mm', 0.001, LENGTH)
atom('km', 1000, LENGTH)
const lb = atom('lb lbs lbf', POUND, FORCE)
const kip = atom('kip kips', POUND * 1000, FORCE)
const N = atom('N', 1, FORCE)
const kN = atom('kN', 1000, FORCE)
atom('MN', 1e6, FORCE)
const s = atom('s sec', 1, TIME)
atom('min', 60, TIME)
atom('Hz', 1, dimension(0, 0, -1), [{ atom: s, power: -1 }])
compound('plf', lb, ft)
compound('klf', kip, ft)
compound('psf', lb, ft, 2)
compound('ksf', kip, ft, 2)
compound('psi', lb, inch, 2)
compound('ksi', kip, inch, 2)
compound('pcf', lb, ft, 3)
compound('kPa', kN, m, 2)
compound('MPa', N, mm, 2)
compound('GPa', kN, mm, 2)
compound('Pa', N, m, 2)
atom('kg', 1, dimension(1, -1, 2))
atom('tonne tonnes', 1000, dimension(1, -1, 2))
atom('mph', (FOOT * 5280) / 3600, dimension(0, 1, -1))
atom('rad', 1, NUMBER)
atom('deg °', Math.PI / 180, NUMBER)
const percentAtom = atom('% percent', 0.01, NUMBER)

/** Every spelling that is a unit. */
export const unitSpellings = (): readonly string[] => [...atoms.keys()]

export const isUnitName = (name: string): boolean => atoms.has(name)

export function unitOf(factors: readonly UnitFactor[]): Unit {
  let scale = 1
  let dim = NUMBER
  for (const factor of factors) {
    scale *= factor.atom.scale ** factor.power
    dim = timesDimension(dim, raiseDimension(factor.atom.dimension, factor.power))
  }
  return { factors, scale, dimension: dim }
}

export const NO_UNIT: Unit = unitOf([])
export const isPercent = ({ factors }: Unit): boolean => factors[0]?.atom === percentAtom

/** The unit of one name and power, or undefined when there is no such unit. */
export function unitFactor(name: string, power: number): UnitFactor | undefined {
  const found = atoms.get(name)
  return found && { atom: found, power }
}

const cache = new Map<string, Unit>()

/**
 * A unit of our own code, as `kip*ft^2/in`.
 * @throws when the text names no unit: that is a bug of ours, never of the document
 */
export function unit(text: string): Unit {
  const known = cache.get(text)
  if (known) return known
  const factors: UnitFactor[] = []
  let sign = 1
  for (const piece of text.split(/([*/])/)) {
    if (piece === '*' || piece === '') continue
    if (piece === '/') {
      sign = -1
      continue
    }
    const [name = '', power = '1'] = piece.split('^')
    const factor = unitFactor(name, sign * Number(power))
    if (!factor) throw new Error(`there is no unit ${name} in ${text}`)
    factors.push(factor)
    sign = 1
  }
  const made = unitOf(factors)
  cache.set(text, made)
  return made
}

/** The unit in plain text that reads back as itself: `kip*ft`, `kip/in`, `1/ft`. */
export function unitText({ factors }: Unit): string {
  const name = ({ atom: { name }, power }: UnitFactor) => {
    const size = Math.abs(power)
    return size === 1 ? name : `${name}^${size}`
  }
  const top = factors.filter(f => f.power > 0).map(name)
  const bottom = factors.filter(f => f.power < 0).map(name)
  if (top.length === 0 && bottom.length === 0) return ''
  return [top.join('*') || '1', ...bottom].join('/')
}

/** The unit as a page prints it: `kip·ft²/in`. */
export function unitOnPage(plain: string): string {
  return plain
    .replaceAll('*', '·')
    .replace(/\^2(?!\d)/g, '²')
    .replace(/\^3(?!\d)/g, '³')
    .replace(/\^4(?!\d)/g, '⁴')
}

/** The unit in TeX, upright, without the space before it. */
export function unitTex(unit: Unit): string {
  const plain = unitText(unit).replaceAll('%', '\\%').replaceAll('°', '^\\circ ')
  if (plain === '') return ''
  const body = plain.replace(/\^([\d.]+)/g, '^{$1}').replaceAll('*', '{\\cdot}')
  return `\\mathrm{${body}}`
}

const simple = ({ atom, power }: UnitFactor): readonly UnitFactor[] =>
  atom.parts.length === 0 ? [{ atom, power }] : atom.parts.map(part => ({ atom: part.atom, power: part.power * power }))

/**
 * Product of units by the names that the operands carry. Names cancel; two names
 * of one dimension become the first met; and a product that has a trade name
 * (lb/ft² is psf) takes it. Nothing else is renamed: kip·ft stays kip·ft.
 */
export function multiplyUnits(a: Unit, b: Unit, powerOfB: number): Unit {
  const raised = b.factors.map(({ atom, power }) => ({ atom, power: power * powerOfB }))
  if (a.factors.length === 0) return named(unitOf(raised.filter(f => f.power !== 0)))
  if (raised.length === 0) return a
  const merged: UnitFactor[] = []
  for (const factor of [...a.factors.flatMap(simple), ...raised.flatMap(simple)]) {
    const at = merged.findIndex(({ atom }) => sameDimension(atom.dimension, factor.atom.dimension))
    const held = merged[at]
    if (held === undefined || isNumber(factor.atom.dimension)) {
      if (!isNumber(factor.atom.dimension)) merged.push(factor)
    } else merged[at] = { atom: held.atom, power: held.power + factor.power }
  }
  return named(unitOf(merged.filter(f => Math.abs(f.power) > 1e-9)))
}

const tradeNames = ['plf', 'klf', 'psf', 'ksf', 'psi', 'ksi', 'pcf', 'kPa', 'MPa', 'GPa', 'Pa'].map(unit)

function named(made: Unit): Unit {
  const trade = tradeNames.find(
    ({ factors: [name] }) => name !== undefined && sameFactors(name.atom.parts, made.factors),
  )
  return trade ?? made
}

function sameFactors(a: readonly UnitFactor[], b: readonly UnitFactor[]): boolean {
  return a.length === b.length && a.every(x => b.some(y => x.atom === y.atom && x.power === y.power))
}
