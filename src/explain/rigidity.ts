/** Wall stiffness, centre of rigidity and eccentricity. */

import { sym } from '../base/formula.ts'
import { verbatim } from '../base/language.ts'
import type { Result } from '../base/ledger.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import type { Distribution } from '../compute/distribution.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Movable } from '../compute/loading.ts'
import type { Rigidity, Spring } from '../compute/rigidity.ts'
import type { Eccentricity } from '../compute/storey.ts'
import { k, L } from '../compute/symbols.ts'
import type { Wall } from '../model/walls.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import { explainPierced } from './piers.ts'
import type { Detail } from './request.ts'
import type { Piece } from './sheet.ts'
import { explainTable } from './table.ts'

const h = sym('h', 'h', 'length')

/** One wall or more worked in full, and all in a table. */
export function explainStiffness(
  level: LevelWork,
  springs: readonly Spring[],
  walls: readonly Wall[],
  shown: readonly string[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const worked = shown.flatMap(name => stiffnessSteps(level, name, springs, walls, detail, context))
  if (detail === 'result') return worked
  // The table rests on the same formulas, with what they assume, whether or not a wall is worked in full.
  for (const { k } of springs) if (k.origin.kind === 'worked') context.uses(k.origin.step.formula)
  const heights = walls.flatMap(({ height }) => height ?? [])
  const table = new Tabulation(
    springs.map(({ name }) => name),
    (row, key) => `${level.name}.wall.${row}.${key}`,
    displayOf(level),
  )
    .take(
      L,
      springs.map(({ L }) => L),
    )
    .take(
      k,
      springs.map(({ k }) => k),
    )
  const high = heights.length === walls.length
  if (high) table.take(h, heights)
  const made = walls.map(wall => (wall.kind === 'built' ? wall.construction.text : 'stated'))
  const want = {
    id: `${level.name}.stiffness`,
    caption: `Stiffness of the walls of ${verbatim(level.name)}.`,
    rowHead: 'Wall',
    columns: high ? ['L', 'h', 'k'] : ['L', 'k'],
    words: [{ head: 'Construction', cells: made }],
  }
  return [...(detail === 'full' ? worked : []), explainTable(table, want, context)]
}

function displayOf(level: LevelWork) {
  const display = level.display()
  if (!display.ok) throw new Error('a level with springs has a display')
  return display.value
}

function stiffnessSteps(
  level: LevelWork,
  name: string,
  springs: readonly Spring[],
  walls: readonly Wall[],
  detail: Detail,
  context: Context,
): readonly Piece[] {
  const spring = springs.find(spring => spring.name === name)
  const wall = walls.find(wall => wall.name === name)
  if (!spring || !wall) return []
  if (detail === 'result' || wall.kind === 'stated') return [explainValue(spring.k, context)]
  const before = [spring.L, ...moduliOf(level.moduli(wall.construction.text))].map(value =>
    explainValue(value, context),
  )
  const cut = level.pierced(name)
  return cut?.ok && cut.value
    ? [...before, ...explainPierced(level.name, cut.value, context)]
    : [...before, explainValue(spring.k, context)]
}

/** The moduli that were worked; stated ones stand in their given block. */
function moduliOf(
  moduli: Result<{ readonly E: Value; readonly G: Value; readonly commonShear: boolean }>,
): readonly Value[] {
  if (!moduli.ok) return []
  const { E, G, commonShear } = moduli.value
  return [E, ...(commonShear ? [] : [G])].filter(({ origin }) => origin.kind === 'worked')
}

export function explainRigidity(rigidity: Rigidity, detail: Detail, context: Context): readonly Piece[] {
  const { level, orthogonal, K, D, x, y, J, angle, walls, sums } = rigidity
  const say = (...values: readonly (Value | undefined)[]) =>
    values.flatMap(value => (value ? [explainValue(value, context)] : []))
  if (detail === 'result') return say(x, y, J)
  const [first, second] = sums
  const tables = orthogonal
    ? [
        explainTable(
          walls,
          {
            id: `${level}.rigidity`,
            caption: `Stiffness of the walls of ${verbatim(level)} along x and y; every wall lies along an axis.`,
            rowHead: 'Wall',
            columns: ['k', 'c', 's', 'k_x', 'k_y', 'x', 'y', 'k_y_x', 'k_x_y'],
            sums: sumsOf({ k_x: K.xx, k_y: K.yy, k_y_x: second, k_x_y: first }),
          },
          context,
        ),
      ]
    : [
        explainTable(
          walls,
          {
            id: `${level}.wall-lines`,
            caption: `Walls of ${verbatim(level)}: stiffness, direction cosine and sine, midpoint, and arm about the origin.`,
            rowHead: 'Wall',
            columns: ['k', 'c', 's', 'x', 'y', 'r'],
          },
          context,
        ),
        explainTable(
          walls,
          {
            id: `${level}.rigidity`,
            caption: `Plan stiffness of the walls of ${verbatim(level)}.`,
            rowHead: 'Wall',
            columns: ['k_x', 'k_y', 'k_xy', 'k_xr', 'k_yr'],
            sums: sumsOf({ k_x: K.xx, k_y: K.yy, k_xy: K.xy, k_xr: first, k_yr: second }),
          },
          context,
        ),
      ]
  const arms = explainTable(
    walls,
    {
      id: `${level}.arms`,
      caption: `Arm of each wall about the centre of rigidity, positive where its shear turns the diaphragm counter-clockwise.`,
      rowHead: 'Wall',
      columns: ['k', 'rho', 'k_rho2'],
      sums: { k_rho2: J },
    },
    context,
  )
  if (detail === 'table') return [...tables, ...say(x, y), arms, ...say(J)]
  const axes: readonly Piece[] = orthogonal
    ? [{ kind: 'note', text: 'Every wall lies along x or y, so these are the principal axes.' }]
    : []
  const centre = say(K.xx, K.yy, K.xy, ...(orthogonal ? [] : sums), D, x, y, angle)
  return [...tables, ...axes, ...centre, arms, ...say(J)]
}

const sumsOf = (sums: Readonly<Record<string, Value | undefined>>): Readonly<Record<string, Value>> =>
  Object.fromEntries(Object.entries(sums).flatMap(([name, value]) => (value ? [[name, value]] : [])))

export function explainEccentricity(
  { x, y }: Eccentricity,
  acting: Movable | undefined,
  context: Context,
): readonly Piece[] {
  return [x, y, ...(acting ? [acting.arm.x, acting.arm.y] : [])].map(value => explainValue(value, context))
}

/** Where the forces of wind act on the level's own diaphragm, off its centre of rigidity. */
export function explainWindEccentricity(distribution: Distribution | undefined, context: Context): readonly Piece[] {
  const ofWind = distribution?.loads.filter(({ loading }) => loading !== 'seismic') ?? []
  return ofWind.flatMap(({ eccentricity, acting }) => {
    const arm = acting.at(-1)?.arm
    return [eccentricity.x, eccentricity.y, ...(arm ? [arm.x, arm.y] : [])].map(value => explainValue(value, context))
  })
}
