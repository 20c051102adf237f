/** Random one-storey buildings as plain data, the ways to turn and move them, and their text. */
import fc from 'fast-check'

export interface Point {
  readonly x: number
  readonly y: number
}

export interface PlanArea {
  readonly name: string
  /** Corners in order, in ft. */
  readonly outline: readonly Point[]
  /** In psf; an opening has none. */
  readonly load?: number
}

export interface PlanWall {
  readonly name: string
  readonly from: Point
  readonly to: Point
  /** In kip/in. */
  readonly k: number
}

export interface Building {
  readonly areas: readonly PlanArea[]
  readonly walls: readonly PlanWall[]
  /** In kip, along x and along y; an axis without a force has none. */
  readonly force: { readonly x?: number; readonly y?: number }
  readonly accidental: number
}

export interface Spelling {
  /** How the document shows its results. */
  readonly units: 'US' | 'SI'
  readonly length: (feet: number) => string
  readonly load: (psf: number) => string
  readonly stiffness: (kipPerInch: number) => string
  readonly force: (kip: number) => string
}

export const american: Spelling = {
  units: 'US',
  length: feet => `${feet} ft`,
  load: psf => `${psf} psf`,
  stiffness: k => `${k} kip/in`,
  force: kip => `${kip} kip`,
}

/** One pound-force in newtons, exact. */
const POUND = 4.4482216152605

export const metric: Spelling = {
  units: 'SI',
  length: feet => `${feet * 304.8} mm`,
  load: psf => `${(psf * POUND) / 0.3048 ** 2} Pa`,
  stiffness: k => `${(k * POUND) / 25.4} kN/mm`,
  force: kip => `${kip * POUND} kN`,
}

export const relative: Spelling = { ...american, stiffness: k => `${k}` }

/** The document that states a building, and works all of it when asked to. */
export function documentOf(building: Building, spelling: Spelling = american, working = ''): string {
  const point = ({ x, y }: Point) => `${spelling.length(x)}, ${spelling.length(y)}`
  const outline = (points: readonly Point[]) => points.map(each => `(${point(each)})`).join(' ')
  return [
    '---',
    `units: ${spelling.units}`,
    '---',
    '',
    '```areas roof',
    '| area | outline | load |',
    '|---|---|---|',
    ...building.areas.map(
      ({ name, outline: points, load }) =>
        `| ${name} | ${outline(points)} | ${load === undefined ? 'opening' : spelling.load(load)} |`,
    ),
    '```',
    '',
    '```walls roof',
    '| wall | from | to | k |',
    '|---|---|---|---|',
    ...building.walls.map(
      ({ name, from, to, k }) => `| ${name} | ${point(from)} | ${point(to)} | ${spelling.stiffness(k)} |`,
    ),
    '```',
    '',
    '```forces roof',
    ...(['x', 'y'] as const).flatMap(axis => {
      const force = building.force[axis]
      return force === undefined ? [] : [`${axis}: ${spelling.force(force)}`]
    }),
    `accidental: ${building.accidental}`,
    '```',
    '',
    ...(working === '' ? [] : ['```working roof', working, '```', '']),
  ].join('\n')
}

/** A building whose every point is moved by one rule. */
export function moved(building: Building, to: (point: Point) => Point): Building {
  return {
    ...building,
    areas: building.areas.map(area => ({ ...area, outline: area.outline.map(to) })),
    walls: building.walls.map(wall => ({ ...wall, from: to(wall.from), to: to(wall.to) })),
  }
}

/** Quarter turns are exact; any other angle goes by sine and cosine. */
export function turn(degrees: number): (point: Point) => Point {
  const quarters = [
    [1, 0],
    [0, 1],
    [-1, 0],
    [0, -1],
  ] as const
  const radians = (degrees * Math.PI) / 180
  const [c, s] = (degrees % 90 === 0 ? quarters[(degrees / 90) % 4] : undefined) ?? [
    Math.cos(radians),
    Math.sin(radians),
  ]
  return ({ x, y }) => ({ x: c * x - s * y, y: s * x + c * y })
}

/** The direction that a wall's shear is positive along: with positive x, or up where it is parallel to y. */
export function directionOf({ from, to }: PlanWall): Point {
  const [dx, dy] = [to.x - from.x, to.y - from.y]
  const length = Math.hypot(dx, dy)
  const sign = dx > 0 || (dx === 0 && dy > 0) ? 1 : -1
  return { x: (sign * dx) / length, y: (sign * dy) / length }
}

export const middleOf = ({ from, to }: PlanWall): Point => ({ x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 })

const tenths = (least: number, most: number) =>
  fc.integer({ min: Math.round(least * 10), max: Math.round(most * 10) }).map(n => n / 10)

/** Four walls near the sides, so that the plan is always stable, and up to six more at any angle. */
const floor = fc
  .record({
    width: tenths(30, 120),
    depth: tenths(20, 90),
    split: fc.double({ min: 0.2, max: 0.8, noNaN: true }),
    step: fc.double({ min: 0.4, max: 1, noNaN: true }),
    loads: fc.tuple(tenths(20, 120), tenths(20, 120)),
    sides: fc.tuple(tenths(50, 900), tenths(50, 900), tenths(50, 900), tenths(50, 900)),
    more: fc.array(
      fc.record({
        at: fc.tuple(fc.double({ min: 0.1, max: 0.9, noNaN: true }), fc.double({ min: 0.1, max: 0.9, noNaN: true })),
        angle: fc.oneof(fc.constantFrom(0, 90), tenths(0, 179)),
        length: tenths(4, 18),
        k: tenths(20, 600),
      }),
      { maxLength: 6 },
    ),
    force: fc.tuple(tenths(10, 300), tenths(10, 300)),
    accidental: fc.constantFrom(0, 0.05, 0.1),
  })
  .map(made => {
    const at = Math.round(made.width * made.split * 10) / 10
    const high = Math.round(made.depth * made.step * 10) / 10
    return { ...made, at, high }
  })

const box = (x1: number, y1: number, x2: number, y2: number): readonly Point[] => [
  { x: x1, y: y1 },
  { x: x2, y: y1 },
  { x: x2, y: y2 },
  { x: x1, y: y2 },
]

/** Two bays of unlike depth and load, side by side, with walls at any angle. */
export const buildings: fc.Arbitrary<Building> = floor.map(
  ({ width, depth, at, high, loads, sides, more, ...rest }) => {
    const wall = (name: string, from: Point, to: Point, k: number): PlanWall => ({ name, from, to, k })
    const [south, north, west, east] = sides
    return {
      areas: [
        { name: 'Hall', outline: box(0, 0, at, depth), load: loads[0] },
        { name: 'Store', outline: box(at, 0, width, high), load: loads[1] },
      ],
      walls: [
        wall('S', { x: 0, y: 0 }, { x: width, y: 0 }, south),
        wall('N', { x: 0, y: depth }, { x: at, y: depth }, north),
        wall('W', { x: 0, y: 0 }, { x: 0, y: depth }, west),
        wall('E', { x: width, y: 0 }, { x: width, y: high }, east),
        ...more.map(({ at: [fx, fy], angle, length, k }, i) => {
          const [x, y] = [fx * width, fy * high]
          const half = turn(angle)({ x: length / 2, y: 0 })
          return wall(`M${i + 1}`, { x: x - half.x, y: y - half.y }, { x: x + half.x, y: y + half.y }, k)
        }),
      ],
      force: { x: rest.force[0], y: rest.force[1] },
      accidental: rest.accidental,
    }
  },
)

/** Only walls along the axes. */
export const orthogonalBuildings = buildings.map(building => ({
  ...building,
  walls: building.walls.filter(({ from, to }) => from.x === to.x || from.y === to.y),
}))
