/** The view of a level that moves in a case: what a sketch of its displaced shape shows, already worked and printed. */
import { inLanguage, verbatim } from '../base/language.ts'
import { inWords } from '../base/near.ts'
import { unitOnPage, unitText } from '../base/unit.ts'
import { printed } from '../base/value.ts'
import { caseOnPage } from '../compute/cases.ts'
import { CENTRE_OF_MASS, type Displacement } from '../compute/displacement.ts'
import type { Rigidity } from '../compute/rigidity.ts'
import type { FigureUnit } from './arrowkey.ts'
import { forceOf, hasLevelsAbove, type LevelPicture, pair, planPoint } from './level-plan.ts'
import type { Described } from './svg.ts'
import type { Outline, PlanPoint, PlanView } from './view.ts'

/** A point that moves, and how far, in metres and as printed. */
export interface MovedPoint {
  readonly name: string
  readonly at: PlanPoint
  readonly dx: number
  readonly dy: number
  readonly printed: string
}

export interface DisplacedView extends Described {
  /** Rings of the slab where it stands at rest. */
  readonly outline: readonly Outline[]
  readonly walls: readonly { readonly name: string; readonly from: PlanPoint; readonly to: PlanPoint }[]
  /** The centre of rigidity, its movement in metres, and the rotation in radians, counter-clockwise. */
  readonly centre: { readonly at: PlanPoint; readonly u: number; readonly v: number; readonly phi: number }
  readonly printed: { readonly centre: string; readonly rotation: string }
  readonly mass: MovedPoint
  readonly corner: MovedPoint
  readonly force?: NonNullable<PlanView['force']>
  readonly displacementUnit: FigureUnit
  readonly scaleUnit: PlanView['scaleUnit']
  /** Words of the legend for the force. */
  readonly forceWords: string
}

/** What the view is made of beside the displacement. */
export type DisplacedPicture = Pick<LevelPicture, 'level' | 'language' | 'plan' | 'walls' | 'distribution'> & {
  readonly mass: NonNullable<LevelPicture['mass']>
  readonly rigidity: Rigidity
  readonly scaleUnit: PlanView['scaleUnit']
}

export function displacedView(picture: DisplacedPicture, displacement: Displacement): DisplacedView {
  const { level, language, plan, walls, mass, rigidity, scaleUnit, distribution } = picture
  const { result, points, governing } = displacement
  const words = (text: string): string => inLanguage(text, language)
  const moved = (name: string): MovedPoint => {
    const at = points.rows.indexOf(name)
    const cell = (column: string) => points.column(column).cell(at)
    const [dx, dy] = [cell('delta_x'), cell('delta_y')]
    return {
      name,
      at: { x: cell('x').si, y: cell('y').si },
      dx: dx.si,
      dy: dy.si,
      printed: pair({ x: dx, y: dy }, language),
    }
  }
  const [ofMass, ofCorner] = [moved(CENTRE_OF_MASS), moved(governing.corner)]
  const { unit } = result.u
  const centre = pair({ x: result.u, y: result.v }, language)
  const rotation = printed(result.phi, language)
  const force = forceOf(result, rigidity, mass, language)
  return {
    title: words(`Displaced shape of ${verbatim(level)} in case ${caseOnPage(result.case.name)}`),
    description: words(
      describe(level, displacement, { centre, rotation, mass: ofMass, corner: ofCorner, force: force?.printed }),
    ),
    language,
    outline: plan.outline,
    walls: walls.map(({ name, from, to }) => ({ name, from: planPoint(from), to: planPoint(to) })),
    centre: { at: planPoint(rigidity), u: result.u.si, v: result.v.si, phi: result.phi.si },
    printed: { centre, rotation },
    mass: ofMass,
    corner: ofCorner,
    ...(force ? { force } : {}),
    displacementUnit: { si: unit.scale, name: unitOnPage(unitText(unit)) },
    scaleUnit,
    forceWords: words(hasLevelsAbove(distribution) ? 'storey shear' : 'storey force'),
  }
}

interface Told {
  readonly centre: string
  readonly rotation: string
  readonly mass: MovedPoint
  readonly corner: MovedPoint
  readonly force: string | undefined
}

/** Every figure of the sketch in words. */
function describe(level: string, { result }: Displacement, told: Told): string {
  const { name, parts } = result.case
  const under = told.force
    ? ` under ${told.force} along ${inWords(
        parts.map(({ axis }) => axis),
        'and',
      )}`
    : ''
  return [
    `Plan of ${verbatim(level)} at rest and displaced in case ${caseOnPage(name)}${under}.`,
    `The centre of rigidity moves ${told.centre} along x and y, and the slab turns ${told.rotation}, counter-clockwise positive.`,
    `The centre of mass moves ${told.mass.printed}; corner ${verbatim(told.corner.name)}, which moves farthest along the force, ${told.corner.printed}.`,
  ].join(' ')
}
