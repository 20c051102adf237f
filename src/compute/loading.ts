/** The letters and ids of each loading, so that wind stands beside earthquake in one calculation. */
import { type Sym, sym } from '../base/formula.ts'
import type { Value } from '../base/value.ts'
import type { Axis, Loading } from './cases.ts'
import { eax, eay, ex, ey, Fx, Fy, Vx, Vy, xm, ym } from './symbols.ts'

type Pair = Readonly<Record<Axis, Sym>>

export interface Letters {
  /** Force of a level, and shear of a storey. */
  readonly F: Pair
  readonly V: Pair
  /** Where the force acts. */
  readonly at: Pair
  readonly e: Pair
  /** How far it is moved aside. */
  readonly arm: Pair
  /** Stands between the level and the rest of an id. */
  readonly path: string
}

/** What acts on a storey from one level: its forces, and where. */
export interface Acting {
  readonly level: string
  readonly at: { readonly x: Value; readonly y: Value }
  readonly force: { readonly x?: Value; readonly y?: Value }
  /** Arms by which a force is moved aside: along y for a force along x, and the reverse. */
  readonly arm?: { readonly x: Value; readonly y: Value }
}

/** One whose force may be moved aside. */
export type Movable = Acting & Required<Pick<Acting, 'arm'>>

const pair = (name: string, tex: string, kind: Sym['kind']): Pair => ({
  x: sym(`${name}x`, `${tex},x}`, kind),
  y: sym(`${name}y`, `${tex},y}`, kind),
})

/** Where a force of wind acts has its axis as the letter. */
const places = (below: string, tex: string): Pair => ({
  x: sym(`x_${below}`, `x_${tex}`, 'length'),
  y: sym(`y_${below}`, `y_${tex}`, 'length'),
})

export const lettersOf: Readonly<Record<Loading, Letters>> = {
  seismic: {
    F: { x: Fx, y: Fy },
    V: { x: Vx, y: Vy },
    at: { x: xm, y: ym },
    e: { x: ex, y: ey },
    arm: { x: eax, y: eay },
    path: '',
  },
  wind: {
    F: pair('F_w', 'F_{w', 'force'),
    V: pair('V_w', 'V_{w', 'force'),
    at: places('w', 'w'),
    e: pair('e_w', 'e_{w', 'length'),
    arm: pair('e_aw', 'e_{a,w', 'length'),
    path: 'wind.',
  },
  'least wind': {
    F: pair('F_min', 'F_{\\text{min}', 'force'),
    V: pair('V_min', 'V_{\\text{min}', 'force'),
    at: places('wmin', '{w,\\text{min}}'),
    e: pair('e_min', 'e_{\\text{min}', 'length'),
    arm: pair('e_amin', 'e_{a,\\text{min}', 'length'),
    path: 'wind.least.',
  },
}
