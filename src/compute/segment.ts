/** Length and midpoint of a straight line between two points of the plan. */
import { formula } from '../base/formula.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { L, x, x1, x2, y, y1, y2 } from './symbols.ts'

const GEOMETRY = 'geometry'

export const segment = {
  L: formula({ gives: L, body: 'sqrt((x_2 - x_1)^2 + (y_2 - y_1)^2)', of: [x1, y1, x2, y2], source: GEOMETRY }),
  x: formula({ gives: x, body: '(x_1 + x_2)/2', of: [x1, x2], source: GEOMETRY }),
  y: formula({ gives: y, body: '(y_1 + y_2)/2', of: [y1, y2], source: GEOMETRY }),
}

/** Coordinates of a point of the plan. */
interface Point {
  readonly x: Value
  readonly y: Value
}

/** Columns x_1, y_1, x_2 and y_2 of a table with one line a row. */
export const takeEnds = (table: Tabulation, from: readonly Point[], to: readonly Point[]): Tabulation =>
  table
    .take(
      x1,
      from.map(({ x }) => x),
    )
    .take(
      y1,
      from.map(({ y }) => y),
    )
    .take(
      x2,
      to.map(({ x }) => x),
    )
    .take(
      y2,
      to.map(({ y }) => y),
    )
