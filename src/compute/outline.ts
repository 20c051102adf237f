/** The outer outline of a level: its named corners, its length, and the size of the plan. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Span } from '../base/span.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, work } from '../base/work.ts'
import type { Corner } from '../model/grid.ts'
import type { Ring } from './clip.ts'
import { segment, takeEnds } from './segment.ts'
import { x, x1, x2, y, y1, y2 } from './symbols.ts'

export interface NamedCorner extends Corner {
  readonly name: string
}

export interface Outline {
  /** Named C1, C2 … counter-clockwise. */
  readonly corners: readonly NamedCorner[]
  readonly perimeter: Value
  readonly size: { readonly x: Value; readonly y: Value }
}

const perimeter = sym('P', 'P', 'length')
const extent = {
  x: formula({ gives: sym('B_x', 'B_x', 'length'), body: 'x_2 - x_1', of: [x2, x1], source: 'extent of the plan' }),
  y: formula({ gives: sym('B_y', 'B_y', 'length'), body: 'y_2 - y_1', of: [y2, y1], source: 'extent of the plan' }),
}

/** @param outer outer rings, counter-clockwise */
export function workOutline(level: string, outer: readonly Ring[], spans: readonly Span[], display: Display): Outline {
  const rings = namedCorners(level, outer, spans, display)
  const corners = rings.flat()
  const next = rings.flatMap(ring => ring.map((corner, i) => ring[(i + 1) % ring.length] ?? corner))
  const table = new Tabulation(
    corners.map(({ name }) => name),
    (row, key) => `${level}.side.${row}.${key}`,
    display,
  )
  const sides = takeEnds(table, corners, next).work(segment.L, { x_1: 'x_1', y_1: 'y_1', x_2: 'x_2', y_2: 'y_2' })
  return {
    corners,
    perimeter: sides.sum('L', perimeter, `${level}.perimeter`),
    size: { x: extentAlong('x', level, corners, display), y: extentAlong('y', level, corners, display) },
  }
}

function extentAlong(axis: 'x' | 'y', level: string, corners: readonly Corner[], display: Display): Value {
  const along = corners.map(corner => corner[axis])
  const least = along.reduce((a, b) => (b.si < a.si ? b : a))
  const most = along.reduce((a, b) => (b.si > a.si ? b : a))
  return work(`${level}.size.${axis}`, extent[axis], { [`${axis}_1`]: least, [`${axis}_2`]: most }, display)
}

/** Starting at the lowest corner of the left-most, so that the names do not hang on the order of the areas. */
function namedCorners(
  level: string,
  outer: readonly Ring[],
  spans: readonly Span[],
  display: Display,
): readonly (readonly NamedCorner[])[] {
  const rings = outer
    .map(fromLowerLeft)
    .sort((a, b) => (a[0]?.x ?? 0) - (b[0]?.x ?? 0) || (a[0]?.y ?? 0) - (b[0]?.y ?? 0))
  let count = 0
  return rings.map(ring =>
    ring.map(point => {
      const name = `C${++count}`
      const at = (axis: 'x' | 'y'): Value => ({
        id: `${level}.corner.${name}.${axis}`,
        tex: `${axis}_{${name}}`,
        si: point[axis],
        ...shownAs(axis === 'x' ? x : y, display),
        origin: { kind: 'measured', what: `corner ${name} of the plan`, spans },
      })
      return { name, x: at('x'), y: at('y') }
    }),
  )
}

function fromLowerLeft(ring: Ring): Ring {
  let first = 0
  ring.forEach((point, i) => {
    const best = ring[first]
    if (best && point.x + point.y < best.x + best.y - 1e-9) first = i
  })
  return [...ring.slice(first), ...ring.slice(0, first)]
}
