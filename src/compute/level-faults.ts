/** What can be wrong with a level as a whole, and what its model takes for granted. */

import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { inWords } from '../base/near.ts'
import type { Span } from '../base/span.ts'
import { NO_UNIT, unit, unitText } from '../base/unit.ts'
import { distanceFrom } from '../model/geometry.ts'
import type { LineLoad, PointLoad } from '../model/loads.ts'
import type { Assumption } from '../model/scope.ts'
import type { Wall } from '../model/walls.ts'
import { diagnose } from '../read/text.ts'
import type { Plan } from './plan.ts'
import type { Spring, Unstable } from './rigidity.ts'

/** A wall may stand this far off the edge of its level, in m: its thickness, and the slack of a sketch. */
const OFF_EDGE = 0.3

const lengthPrinter =
  ({ system }: Display) =>
  (metres: number): string => {
    const shown = unit(system === 'US' ? 'ft' : 'm')
    return `${(metres / shown.scale).toFixed(2)} ${unitText(shown)}`
  }

export const topicMissing = (level: string, topic: string, at: Span): Diagnostic =>
  diagnose('error', `${topic}-missing`, at, `level ${level} has no ${topic}`, `Give them in a block ${topic} ${level}.`)

export const forcesTwice = (level: string, at: Span): Diagnostic =>
  diagnose(
    'error',
    'forces-and-seismic',
    at,
    `the forces of ${level} are stated here, and seismic works them too`,
    'Keep the one or the other.',
  )

/** Values of the design and of that level would have one name. */
export const levelCalledSeismic = (at: Span): Diagnostic =>
  diagnose('error', 'name-taken', at, 'a level of the document is called seismic', 'Give the level another name.')

export function wallOutside(
  { name, from, to, place }: Wall,
  { outline, areas }: Plan,
  display: Display,
): readonly Diagnostic[] {
  const ends = [from, to].map(({ x, y }) => ({ x: x.si, y: y.si }))
  const [a, b] = ends
  if (!a || !b) return []
  const off = Math.min(...outline.map(ring => distanceFrom(ring, a, b)))
  if (off <= OFF_EDGE) return []
  const print = lengthPrinter(display)
  const where = `from x = ${print(a.x)}, y = ${print(a.y)} to x = ${print(b.x)}, y = ${print(b.y)}`
  const also = areas.map(({ name, span }) => ({ span, text: `${name} is an area of the level` }))
  return [
    diagnose(
      'error',
      'wall-outside-level',
      place,
      `wall ${name} stands ${print(off)} outside its level`,
      'A diaphragm can only push on walls that it meets.\nMove the wall, or extend an area.',
      { label: where, also: also.slice(0, 3) },
    ),
  ]
}

/** Loads with an end off the plan: they may be meant, as over an eave, so they count and are pointed out. */
export function loadsOutside(
  loads: readonly (LineLoad | PointLoad)[],
  { outline }: Plan,
  display: Display,
): readonly Diagnostic[] {
  const print = lengthPrinter(display)
  return loads.flatMap(load => {
    const ends = ('from' in load ? [load.from, load.to] : [load.at]).map(({ x, y }) => ({ x: x.si, y: y.si }))
    const off = Math.max(...ends.map(end => Math.min(...outline.map(ring => distanceFrom(ring, end, end)))))
    if (off <= OFF_EDGE) return []
    return [
      diagnose(
        'warning',
        'load-outside-level',
        load.span,
        `load ${load.name} reaches ${print(off)} outside its level`,
        'It counts where it is stated. Check its place.',
      ),
    ]
  })
}

export function mixedStiffness(walls: readonly Wall[], springs: readonly Spring[]): Diagnostic | undefined {
  const relative = springs.filter(({ k }) => k.unit === NO_UNIT).map(({ name }) => name)
  const absolute = springs.filter(({ k }) => k.unit !== NO_UNIT).map(({ name }) => name)
  const wall = walls.find(({ name }) => name === relative[0])
  const other = walls.find(({ name }) => name === absolute[0])
  if (!wall || !other) return undefined
  return diagnose(
    'error',
    'stiffness-mixed',
    wall.span,
    `wall ${wall.name} has a stiffness without a unit, and wall ${other.name} has one with a unit`,
    'Give every k of a level a unit, or none.',
    { also: [{ span: other.span, text: `${other.name} has a unit` }] },
  )
}

const unstableHelp: Readonly<Record<Unstable, string>> = {
  'no stiffness along x': 'Add a wall that is not parallel to y.',
  'no stiffness along y': 'Add a wall that is not parallel to x.',
  'all walls are parallel': 'Add a wall in another direction.',
  'all walls meet in one point':
    'Add a wall whose line does not pass through that point: without one nothing resists torsion.',
}

export const unstable = (level: string, because: Unstable, at: Span): Diagnostic =>
  diagnose(
    'error',
    'walls-unstable',
    at,
    `the walls of ${level} cannot hold it: ${because}`,
    `A rigid diaphragm needs stiffness along both axes and against turning. ${unstableHelp[because]}`,
  )

export const storeyByStorey: Assumption = {
  text: 'Each storey is worked on its own: its walls stand on what is below as on a foundation.',
  because: 'walls are worked storey by storey',
}

export const atOneLevel: Assumption = {
  text: 'The forces of wind and all others are at one level, strength or allowable, and are compared as they are.',
  because: 'the design shear is the largest over the cases of both',
}

export const strengthByLength = (level: string): Assumption => ({
  text: `The strength of the walls of ${verbatim(level)} is in proportion to their length.`,
  because: 'strength is not stated for all of them',
})

/** What the model of a floor on springs takes for granted. */
export const rigidAssumptions = (level: string): readonly Assumption[] => [
  { text: `The diaphragm of ${verbatim(level)} is rigid in its plane.`, because: 'no other behaviour is worked' },
  { text: 'Walls resist along their own line only.', because: 'their stiffness across it is left out' },
]

export const driftNotWorked = (level: string, at: Span): Diagnostic =>
  diagnose(
    'warning',
    'drift-not-worked',
    at,
    `displacement of ${level} is not worked`,
    `Its walls have relative stiffness, which fixes ${inWords(['shares of force'], 'and')} but not displacement. Give them a construction, or k with a unit.`,
  )
