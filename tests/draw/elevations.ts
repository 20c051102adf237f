/** Elevations that try the drawing: of invented walls, in metres. */
import type { ElevationView, FaceBox } from '../../src/draw/elevation-view.ts'

const dimension = (metres: number): string => `${Number(metres.toFixed(4))} m`

const box = (name: string, left: number, low: number, width: number, height: number): FaceBox => ({
  name,
  left,
  right: left + width,
  low,
  high: low + height,
})

const opening = (name: string, left: number, sill: number, width: number, height: number) => ({
  ...box(name, left, sill, width, height),
  size: `${dimension(width)} × ${dimension(height)}`,
})

/** Piers between openings that stand in a row. */
function piersOf(length: number, openings: readonly FaceBox[]): readonly FaceBox[] {
  const edges = [0, ...openings.flatMap(({ left, right }) => [left, right]), length]
  const [first] = openings
  if (!first) return []
  return Array.from({ length: openings.length + 1 }, (_, i) => ({
    name: `P${i + 1}`,
    left: edges[2 * i] ?? 0,
    right: edges[2 * i + 1] ?? length,
    low: first.low,
    high: first.high,
  }))
}

function wall(length: number, height: number, openings: ElevationView['openings'], more: Partial<ElevationView> = {}) {
  return {
    title: 'Elevation of wall W1 of roof',
    description: 'Elevation of wall W1.',
    language: 'en-GB',
    length,
    height,
    openings,
    piers: piersOf(length, openings),
    grid: [
      { name: 'A', at: 0 },
      { name: 'C', at: length },
    ],
    levels: [
      { name: 'roof', elevation: '+3.4 m', at: height },
      { name: 'base', elevation: '±0 m', at: 0 },
    ],
    shear: { printed: 'V = 131.4 kN', governs: true },
    name: 'Wall W1',
    notes: ['Construction BRICK, 200 mm thick.', 'Seen with the wall’s start on the left.'],
    dimension,
    scaleUnit: { metres: 1, name: 'm' },
    ...more,
  } satisfies ElevationView
}

const row = (count: number, from: number, step: number, sill: number, width: number, height: number) =>
  Array.from({ length: count }, (_, i) => opening(`V${i + 1}`, from + i * step, sill, width, height))

const long = 'North wall of the rope store, between the old capstan and the sail loft stair'

export const elevations: Readonly<Record<string, ElevationView>> = {
  'a wall without openings': wall(6, 3, []),
  'one window': wall(8, 3.2, [opening('V1', 3, 0.9, 1.8, 1.4)]),
  'a door and two windows': wall(12, 3.6, [
    opening('D1', 1, 0, 1.1, 2.4),
    opening('V1', 4, 0.9, 1.5, 1.5),
    opening('V2', 8, 0.9, 1.5, 1.5),
  ]),
  'twelve windows': wall(30, 3.4, row(12, 0.8, 2.4, 0.9, 1.375, 1.225)),
  'forty slots': wall(60, 4, row(40, 0.4, 1.48, 1.3, 0.335, 1.125)),
  'very long and low': wall(140, 2.2, row(9, 4, 15, 0.8, 2.25, 0.95)),
  'very tall and narrow': wall(
    1.9,
    26,
    [opening('V1', 0.55, 11.25, 0.725, 1.35), opening('V2', 0.55, 19, 0.725, 1.35)],
    {
      piers: [],
    },
  ),
  'a tiny opening': wall(18, 4, [opening('Pipe', 7.125, 2.25, 0.06, 0.06)]),
  'openings at every height': wall(
    14,
    5,
    Array.from({ length: 11 }, (_, i) => opening(`V${i + 1}`, 0.5 + 1.2 * i, 0.35 + 0.31 * i, 0.7, 0.8)),
    { piers: [] },
  ),
  'long names': wall(9, 3, [opening(long, 2, 0, 1, 2.1), opening(`${long}, second`, 5, 0.9, 0.4, 0.4)], {
    name: `Wall ${long}`,
    grid: [
      { name: 'Quay face line', at: 0 },
      { name: 'Quay face line, inner', at: 0.6 },
      { name: 'Yard', at: 9 },
    ],
    levels: [
      { name: long, elevation: '+7.6 m', at: 3.2 },
      { name: long, elevation: '±0 m', at: 0 },
    ],
  }),
  'names from right to left': wall(9, 3, [opening('חלון מזרחי', 2, 0.9, 1.6, 1.2), opening('باب ٣', 6, 0, 1, 2.1)], {
    name: 'Wall קיר צפוני',
    levels: [{ name: 'גג', elevation: '+3.4 m', at: 3 }],
    grid: [{ name: 'א', at: 0 }],
    piers: [box('P1', 0, 0, 2, 2.1)],
  }),
  'many grid lines': wall(24, 3, [opening('V1', 3, 0.9, 2, 1.2)], {
    grid: Array.from({ length: 33 }, (_, i) => ({ name: `${i + 1}`, at: 0.75 * i })),
  }),
  'a shear toward the start': wall(5, 3, [opening('D1', 2, 0, 1, 3)], {
    shear: { printed: 'V = 48.21 kN', toward: 'start', governs: false },
    levels: [
      { name: 'loft', elevation: '+7.25 m', at: 3.3 },
      { name: 'floor', elevation: '+3.95 m', at: 0 },
    ],
  }),
}
