/**
 * What a plan sketch shows, already worked and already printed.
 *
 * Coordinates are plan coordinates in metres, x to the right and y up; angles
 * are radians, counter-clockwise from +x. Every text is ready to be set.
 */
import type { Language } from '../base/language.ts'
import type { FigureUnit } from './arrowkey.ts'

export interface PlanPoint {
  readonly x: number
  readonly y: number
}

/** A closed outline without the repeated last point, either winding. */
export type Outline = readonly PlanPoint[]

export interface PlanArea {
  readonly name: string
  readonly outline: Outline
  /** The load as printed, such as `68 psf`. */
  readonly load: string
}

/** A load that acts at a point. */
export interface PlanPointLoad {
  readonly name: string
  readonly at: PlanPoint
  readonly load: string
}

export interface PlanOpening {
  readonly name: string
  readonly outline: Outline
}

export interface PlanWall {
  readonly name: string
  readonly from: PlanPoint
  readonly to: PlanPoint
  /** In metres, about the line from end to end; none where the wall is but a stated stiffness. */
  readonly thickness?: number
  /** Shear that the wall takes in the case drawn, in newtons, positive from `from` to `to`; none before shears are worked. */
  readonly shear?: { readonly value: number; readonly printed: string }
  readonly governs: boolean
}

export interface GridLine {
  readonly name: string
  readonly at: number
}

export interface PlanView {
  /** One line for readers who cannot see the sketch, and a longer description. */
  readonly title: string
  readonly description: string
  readonly language: Language
  readonly areas: readonly PlanArea[]
  readonly openings: readonly PlanOpening[]
  readonly pointLoads?: readonly PlanPointLoad[]
  readonly walls: readonly PlanWall[]
  readonly gridX: readonly GridLine[]
  readonly gridY: readonly GridLine[]
  readonly centreOfMass?: { readonly at: PlanPoint; readonly printed: string }
  readonly centreOfRigidity?: { readonly at: PlanPoint; readonly printed: string }
  /** The storey force of the case drawn, in newtons along x and y, acting at `at`. */
  readonly force?: { readonly at: PlanPoint; readonly x: number; readonly y: number; readonly printed: string }
  /** Direction of north, radians counter-clockwise from +x; none leaves the north point out. */
  readonly north?: number
  /** Prints a length as a dimension, such as `24 ft` or `7.315 m`. */
  readonly dimension: (metres: number) => string
  /** Metres in one unit of the scale bar, and that unit's name. */
  readonly scaleUnit: { readonly metres: number; readonly name: string }
  /** The unit of the shears, for the key of their arrows. */
  readonly forceUnit?: FigureUnit
  /** Words of the legend, such as `design shear of a wall, kip`. */
  readonly legend: {
    readonly shear: string
    readonly centreOfMass: string
    readonly centreOfRigidity: string
    readonly force: string
  }
}
