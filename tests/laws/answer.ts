/** What the laws compare: the answer to a random plan, with wall forces as vectors that do not hang on a wall's direction. */
import {
  american,
  type Building,
  directionOf,
  documentOf,
  middleOf,
  type Point,
  type Spelling,
} from '../support/building.ts'
import { type Reading, reading } from '../support/worked.ts'

export const FOOT = 0.3048
export const KIP = 4448.2216152605

export interface WallForce {
  readonly name: string
  /** Middle of the wall, in m. */
  readonly at: Point
  /** In N. */
  readonly force: Point
}

export interface Answer extends Reading {
  /** Wall forces of a case, sorted by name. */
  readonly forces: (caseName: string) => readonly WallForce[]
  readonly cm: Point
  readonly cr: Point
}

export function answer(building: Building, spelling: Spelling = american): Answer {
  const read = reading(documentOf(building, spelling))
  const forces = (caseName: string) =>
    building.walls
      .map(wall => {
        const V = read.si(`roof.wall.${wall.name}.V.${caseName}`)
        const [along, { x, y }] = [directionOf(wall), middleOf(wall)]
        return { name: wall.name, at: { x: x * FOOT, y: y * FOOT }, force: { x: V * along.x, y: V * along.y } }
      })
      .sort((a, b) => (a.name < b.name ? -1 : 1))
  const point = (id: string) => ({ x: read.si(`roof.${id}.x`), y: read.si(`roof.${id}.y`) })
  return {
    ...read,
    forces,
    get cm() {
      return point('CM')
    },
    get cr() {
      return point('CR')
    },
  }
}

/** The scale on which the wall forces of a building are compared: the larger of its storey shears. */
export const forceScale = ({ force }: Building): number => Math.max(force.x ?? 0, force.y ?? 0) * KIP

export const plus = (a: Point, b: Point): Point => ({ x: a.x + b.x, y: a.y + b.y })
