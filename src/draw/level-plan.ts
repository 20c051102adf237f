/** The view of a level: what of the building and its results a plan sketch shows. */
import { inLanguage, type Language, verbatim } from '../base/language.ts'
import { asTyped, columnDecimals, fixed, numeralOnPage } from '../base/numeral.ts'
import { unit, unitOnPage, unitText } from '../base/unit.ts'
import { onPage, printed, shown, type Value } from '../base/value.ts'
import { caseOnPage } from '../compute/cases.ts'
import type { CaseResult, Distribution } from '../compute/distribution.ts'
import type { Mass } from '../compute/mass.ts'
import type { Plan } from '../compute/plan.ts'
import type { Rigidity } from '../compute/rigidity.ts'
import type { Corner, Grid } from '../model/grid.ts'
import type { Wall } from '../model/walls.ts'
import type { PlanPoint, PlanPointLoad, PlanView, PlanWall } from './view.ts'

export interface LevelPicture {
  readonly level: string
  readonly language: Language
  readonly system: 'US' | 'SI'
  readonly grid: Grid
  readonly plan: Plan
  readonly walls: readonly Wall[]
  /** Thickness of a construction, where it can be read. */
  readonly thickness?: (construction: string) => Value | undefined
  readonly mass?: Mass
  readonly rigidity?: Rigidity
  readonly distribution?: Distribution
  /** Draws the shears of one case; the design shears when left out. */
  readonly caseName?: string
}

export const planPoint = ({ x, y }: Corner): PlanPoint => ({ x: x.si, y: y.si })

export function planView(picture: LevelPicture): PlanView {
  const { level, language, system, grid, plan, mass, rigidity, distribution, caseName } = picture
  const words = (text: string) => inLanguage(text, language)
  const drawn = distribution?.cases.find(each => each.case.name === caseName)
  const force = drawn && mass && rigidity ? forceOf(drawn, rigidity, mass, language) : undefined
  const scale = system === 'US' ? unit('ft') : unit('m')
  const forceUnit = distribution?.design.column('V').cell(0).unit
  const unitOfShear = forceUnit ? unitOnPage(unitText(forceUnit)) : ''
  const loads = new Map(
    mass?.areas?.rows.map((row, i) => [row, printed(required(mass.areas?.column('w').cell(i)), language)]) ?? [],
  )
  return {
    title: words(`Plan of ${verbatim(level)}`),
    description: words(describe(picture)),
    language,
    areas: plan.areas.map(({ name, outline }) => ({
      name,
      outline: outline.map(planPoint),
      load: loads.get(name) ?? '',
    })),
    openings: plan.openings.map(({ name, outline }) => ({ name, outline: outline.map(planPoint) })),
    pointLoads: pointLoadsOf(mass, language),
    walls: wallsOf(picture, drawn),
    gridX: grid.x.map(({ name, at }) => ({ name, at: at.si })),
    gridY: grid.y.map(({ name, at }) => ({ name, at: at.si })),
    ...(mass ? { centreOfMass: { at: planPoint(mass), printed: pair(mass, language) } } : {}),
    ...(rigidity ? { centreOfRigidity: { at: planPoint(rigidity), printed: pair(rigidity, language) } } : {}),
    ...(force ? { force } : {}),
    ...(grid.north ? { north: grid.north.si } : {}),
    dimension: metres => onPage(asTyped(metres / scale.scale), scale, language),
    scaleUnit: { metres: scale.scale, name: system === 'US' ? 'ft' : 'm' },
    ...(forceUnit ? { forceUnit: { si: forceUnit.scale, name: unitOfShear } } : {}),
    legend: {
      shear: drawn
        ? `shear of a wall in ${caseOnPage(drawn.case.name)}, ${unitOfShear}`
        : `design shear of a wall, ${unitOfShear}`,
      centreOfMass: words('centre of mass'),
      centreOfRigidity: words('centre of rigidity'),
      force: words(hasLevelsAbove(distribution) ? 'storey shear' : 'storey force'),
    },
  }
}

/** A storey below several levels carries more than the force of its own. */
export const hasLevelsAbove = (distribution: Distribution | undefined): boolean =>
  distribution?.loads.some(({ acting }) => acting.length > 1) ?? false

function pointLoadsOf(mass: Mass | undefined, language: Language): readonly PlanPointLoad[] {
  const points = mass?.points
  if (points === undefined) return []
  return points.rows.map((name, i) => {
    const cell = (column: string) => points.column(column).cell(i)
    return { name, at: { x: cell('x').si, y: cell('y').si }, load: printed(cell('W'), language) }
  })
}

/** Both coordinates with one unit: `23.89, 15.76 ft`. */
export function pair({ x, y }: Corner, language: Language): string {
  const decimals = columnDecimals([shown(x), shown(y)])
  const print = (value: Value) => (shown(value) === 0 ? '0' : numeralOnPage(fixed(shown(value), decimals), language))
  return `${print(x)}, ${print(y)} ${unitOnPage(unitText(x.unit))}`
}

function wallsOf(
  { walls, distribution, language, thickness }: LevelPicture,
  drawn: CaseResult | undefined,
): readonly PlanWall[] {
  const column = drawn?.walls.column('V') ?? distribution?.design.column('V')
  const decimals =
    column && distribution ? columnDecimals(distribution.design.rows.map((_, i) => shown(column.cell(i)))) : 0
  return walls.map((wall, i): PlanWall => {
    const { name, from, to } = wall
    const t = wall.kind === 'built' ? thickness?.(wall.construction.text) : undefined
    const placed = {
      name,
      from: planPoint(from),
      to: planPoint(to),
      ...(t ? { thickness: t.si } : {}),
      governs: distribution?.governingWall === i,
    }
    if (!column) return placed
    const value = column.cell(i)
    return {
      ...placed,
      shear: {
        value: value.si,
        printed: numeralOnPage(fixed(Math.abs(shown(value)), Math.min(decimals, 1)), language),
      },
    }
  })
}

/**
 * The storey shear of a case on the line where it acts, which its moment about the centre of rigidity tells: with
 * several levels that is the resultant of their forces. Along its line it is drawn at the centre of mass.
 */
export function forceOf(
  { shear, moment }: CaseResult,
  rigidity: Rigidity,
  mass: Mass,
  language: Language,
): NonNullable<PlanView['force']> | undefined {
  const { x, y } = shear
  const [Fx, Fy] = [x?.si ?? 0, y?.si ?? 0]
  if (Fx === 0 && Fy === 0) return undefined
  const centre = { x: rigidity.x.si, y: rigidity.y.si }
  const told = x && y ? pair({ x, y }, language) : x ? printed(x, language) : y ? printed(y, language) : ''
  return { at: placeOf({ x: Fx, y: Fy }, moment.si, centre, planPoint(mass)), x: Fx, y: Fy, printed: told }
}

/** The point of the line of a force, with its moment about the centre, that is nearest to a point. */
function placeOf(force: PlanPoint, moment: number, centre: PlanPoint, near: PlanPoint): PlanPoint {
  if (force.y === 0) return { x: near.x, y: centre.y - moment / force.x }
  if (force.x === 0) return { x: centre.x + moment / force.y, y: near.y }
  const size = force.x ** 2 + force.y ** 2
  const on = { x: centre.x + (moment * force.y) / size, y: centre.y - (moment * force.x) / size }
  const along = ((near.x - on.x) * force.x + (near.y - on.y) * force.y) / size
  return { x: on.x + along * force.x, y: on.y + along * force.y }
}

function describe({ level, language, plan, walls, mass, rigidity, distribution }: LevelPicture): string {
  const parts = [
    `Plan of ${verbatim(level)} with ${count(plan.areas.length, 'area')}, ${count(plan.openings.length, 'opening')} and ${count(walls.length, 'wall')}.`,
  ]
  if (mass) parts.push(`The centre of mass is at ${pair(mass, language)}.`)
  if (rigidity) parts.push(`The centre of rigidity is at ${pair(rigidity, language)}.`)
  if (distribution) parts.push(`Wall ${verbatim(distribution.design.rows[distribution.governingWall] ?? '')} governs.`)
  return parts.join(' ')
}

const count = (n: number, noun: string): string => `${n === 0 ? 'no' : n} ${noun}${n === 1 ? '' : 's'}`

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a row of the areas has no load')
  return value
}
