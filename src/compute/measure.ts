/** Area, centroid and polar second moment of a part of the plan. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { work } from '../base/work.ts'
import type { Corner } from '../model/grid.ts'
import { segment, takeEnds } from './segment.ts'
import { x, x1, x2, y, y1, y2 } from './symbols.ts'

export interface Measured {
  readonly A: Value
  readonly x: Value
  readonly y: Value
  /** Polar second moment of area about the part's own centroid, with the sign of A. */
  readonly Ip: Value
  /** The sides of the outline, for a part that is no rectangle. */
  readonly sides?: Tabulation
}

export const A = sym('A', 'A', 'area')
export const Ip = sym('I_p', 'I_p', 'secondMoment')

const rectangle = {
  A: formula({ gives: A, body: '(x_2 - x_1)*(y_2 - y_1)', of: [x1, x2, y1, y2], source: 'geometry' }),
  cutA: formula({
    gives: A,
    body: '-(x_2 - x_1)*(y_2 - y_1)',
    of: [x1, x2, y1, y2],
    source: 'geometry; an opening counts as negative area',
  }),
  Ip: formula({ gives: Ip, body: 'A*((x_2 - x_1)^2 + (y_2 - y_1)^2)/12', of: [A, x1, x2, y1, y2], source: 'geometry' }),
}

const cross = sym('a', 'a', 'area')
const sx = sym('a_x', 'a_x', 'firstMoment')
const sy = sym('a_y', 'a_y', 'firstMoment')
const so = sym('a_o', 'a_o', 'secondMoment')

const SHOELACE = 'geometry: Green’s theorem around the outline'

/** Each side from (x₁, y₁) to (x₂, y₂) counts with the triangle that it makes with the origin. */
const side = {
  cross: formula({ gives: cross, body: 'x_1*y_2 - x_2*y_1', of: [x1, x2, y1, y2], source: SHOELACE }),
  sx: formula({ gives: sx, body: '(x_1 + x_2)*a', of: [x1, x2, cross], source: SHOELACE }),
  sy: formula({ gives: sy, body: '(y_1 + y_2)*a', of: [y1, y2, cross], source: SHOELACE }),
  so: formula({
    gives: so,
    body: '(x_1^2 + x_1*x_2 + x_2^2 + y_1^2 + y_1*y_2 + y_2^2)*a',
    of: [x1, x2, y1, y2, cross],
    source: SHOELACE,
  }),
}

const sumCross = sym('sum_a', '\\sum a', 'area')
const sumSx = sym('sum_a_x', '\\sum a_x', 'firstMoment')
const sumSy = sym('sum_a_y', '\\sum a_y', 'firstMoment')
const sumSo = sym('sum_a_o', '\\sum a_o', 'secondMoment')

const polygon = {
  A: formula({ gives: A, body: 'sum_a/2', of: [sumCross], source: SHOELACE }),
  x: formula({ gives: x, body: 'sum_a_x/(6*A)', of: [sumSx, A], source: SHOELACE }),
  y: formula({ gives: y, body: 'sum_a_y/(6*A)', of: [sumSy, A], source: SHOELACE }),
  Ip: formula({ gives: Ip, body: 'sum_a_o/12 - A*(x^2 + y^2)', of: [sumSo, A, x, y], source: SHOELACE }),
}

/**
 * @param outline counter-clockwise for an area, clockwise for a cut; a rectangle starts at its lower left corner
 * @param cut true for what an opening takes away
 */
export function measure(
  level: string,
  name: string,
  outline: readonly Corner[],
  isRectangle: boolean,
  cut: boolean,
  display: Display,
): Measured {
  const id = `${level}.areas.${name}`
  return isRectangle
    ? measureRectangle(id, name, outline, cut, display)
    : measurePolygon(id, name, cut && isCounterClockwise(outline) ? [...outline].reverse() : outline, display)
}

function measureRectangle(
  id: string,
  name: string,
  outline: readonly Corner[],
  cut: boolean,
  display: Display,
): Measured {
  const [lowerLeft, , upperRight] = outline
  if (!lowerLeft || !upperRight) throw new Error(`${id} is a rectangle without corners`)
  const inputs = { x_1: lowerLeft.x, y_1: lowerLeft.y, x_2: upperRight.x, y_2: upperRight.y }
  const of = { x: { x_1: inputs.x_1, x_2: inputs.x_2 }, y: { y_1: inputs.y_1, y_2: inputs.y_2 } }
  const area = work(`${id}.A`, cut ? rectangle.cutA : rectangle.A, inputs, display, [name])
  return {
    A: area,
    x: work(`${id}.x`, segment.x, of.x, display, [name]),
    y: work(`${id}.y`, segment.y, of.y, display, [name]),
    Ip: work(`${id}.I_p`, rectangle.Ip, { ...inputs, A: area }, display, [name]),
  }
}

function measurePolygon(id: string, name: string, outline: readonly Corner[], display: Display): Measured {
  const next = outline.map((corner, i) => outline[(i + 1) % outline.length] ?? corner)
  const table = new Tabulation(
    outline.map((_, i) => String(i + 1)),
    (row, key) => `${id}.side${row}.${key}`,
    display,
  )
  const sides = takeEnds(table, outline, next)
  const ends = { x_1: 'x_1', y_1: 'y_1', x_2: 'x_2', y_2: 'y_2' }
  sides.work(side.cross, ends)
  for (const formula of [side.sx, side.sy, side.so]) sides.work(formula, { ...ends, a: 'a' })
  const area = work(`${id}.A`, polygon.A, { sum_a: sides.sum('a', sumCross, `${id}.sum.a`) }, display, [name])
  const centroid = {
    x: work(`${id}.x`, polygon.x, { sum_a_x: sides.sum('a_x', sumSx, `${id}.sum.a_x`), A: area }, display, [name]),
    y: work(`${id}.y`, polygon.y, { sum_a_y: sides.sum('a_y', sumSy, `${id}.sum.a_y`), A: area }, display, [name]),
  }
  const polar = work(
    `${id}.I_p`,
    polygon.Ip,
    { sum_a_o: sides.sum('a_o', sumSo, `${id}.sum.a_o`), A: area, ...centroid },
    display,
    [name],
  )
  return { A: area, ...centroid, Ip: polar, sides }
}

function isCounterClockwise(outline: readonly Corner[]): boolean {
  let twice = 0
  outline.forEach((a, i) => {
    const b = outline[(i + 1) % outline.length] ?? a
    twice += a.x.si * b.y.si - b.x.si * a.y.si
  })
  return twice > 0
}
