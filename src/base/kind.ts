/**
 * What a symbol measures. A kind fixes its dimension and, with the document's
 * system of units, how it prints: a length in ft, a thickness in in.
 *
 * The units of one system work together without factors of twelve or a
 * thousand where the trade allows it: Σ k ρ² in kip/in and ft is J in kip·ft²/in, and
 * kN/mm with metres is MN·m.
 */
import type { Dimension } from './dimension.ts'
import { NO_UNIT, type Unit, unit } from './unit.ts'

export type System = 'US' | 'SI'

interface KindUnits {
  readonly US: Unit
  readonly SI: Unit
  /** Unit when the walls' stiffness is relative; the same as above where stiffness plays no part. */
  readonly relative?: { readonly US: Unit; readonly SI: Unit }
}

const both = (text: string) => ({ US: unit(text), SI: unit(text) })
const units = (US: string, SI: string) => ({ US: unit(US), SI: unit(SI) })

const kinds = {
  number: { US: NO_UNIT, SI: NO_UNIT },
  /** A pure number that is worth printing however small, such as a residual. */
  residual: { US: NO_UNIT, SI: NO_UNIT },
  share: both('%'),
  angle: both('deg'),
  rotation: { ...both('rad'), relative: units('kip/ft', 'kN/m') },
  period: both('s'),
  length: units('ft', 'm'),
  thickness: units('in', 'mm'),
  displacement: { ...units('in', 'mm'), relative: units('kip', 'kN') },
  area: units('ft^2', 'm^2'),
  firstMoment: units('ft^3', 'm^3'),
  secondMoment: units('ft^4', 'm^4'),
  speed: units('mph', 'm/s'),
  modulus: units('ksi', 'MPa'),
  strength: units('psi', 'MPa'),
  areaLoad: units('psf', 'kPa'),
  lineLoad: units('plf', 'kN/m'),
  unitShear: units('plf', 'kN/m'),
  force: units('kip', 'kN'),
  moment: units('kip*ft', 'kN*m'),
  weightMoment: units('kip*ft^2', 'kN*m^2'),
  stiffness: { ...units('kip/in', 'kN/mm'), relative: { US: NO_UNIT, SI: NO_UNIT } },
  stiffnessSquared: { ...units('kip^2/in^2', 'kN^2/mm^2'), relative: { US: NO_UNIT, SI: NO_UNIT } },
  stiffnessMoment: { ...units('kip*ft/in', 'MN'), relative: units('ft', 'm') },
  /** G A_v of a section. */
  shearStiffness: units('kip', 'MN'),
  /** E I of a section. */
  bendingStiffness: units('kip*ft^2', 'MN*m^2'),
  torsionalStiffness: { ...units('kip*ft^2/in', 'MN*m'), relative: units('ft^2', 'm^2') },
} satisfies Record<string, KindUnits>

export type Kind = keyof typeof kinds

/** How a document shows its results. */
export interface Display {
  readonly system: System
  /** True when walls carry relative stiffness: their shares are known, displacements are not. */
  readonly relative: boolean
}

export const dimensionOfKind = (kind: Kind): Dimension => kinds[kind].US.dimension

export function unitOfKind(kind: Kind, { system, relative }: Display): Unit {
  const known: KindUnits = kinds[kind]
  return (relative && known.relative ? known.relative : known)[system]
}

/**
 * Below this size, in base SI, a value of the kind is the rounding of its
 * arithmetic and prints as 0: a nanometre, a micronewton.
 */
export function roundingOfKind(kind: Kind): number {
  switch (kind) {
    case 'length':
    case 'displacement':
    case 'thickness':
      return 1e-9
    case 'rotation':
      return 1e-12
    case 'force':
    case 'moment':
      return 1e-5
    case 'residual':
      return 0
    default:
      return 1e-12
  }
}
