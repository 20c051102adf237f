/** Plans of invented buildings, each hard to draw in its own way. */
import type { PlanArea, PlanOpening, PlanPoint, PlanView, PlanWall } from '../../src/draw/view.ts'

const foot = 0.3048

const feet = (metres: number): string => `${Math.round((metres / foot) * 100) / 100} ft`
const inMetres = (metres: number): string => `${metres.toFixed(metres % 1 === 0 ? 1 : 2)} m`

const at = (x: number, y: number): PlanPoint => ({ x, y })
const rectangle = (x0: number, y0: number, x1: number, y1: number): readonly PlanPoint[] => [
  at(x0, y0),
  at(x1, y0),
  at(x1, y1),
  at(x0, y1),
]
const area = (name: string, load: string, outline: readonly PlanPoint[]): PlanArea => ({ name, load, outline })
const opening = (name: string, outline: readonly PlanPoint[]): PlanOpening => ({ name, outline })

export function wall(name: string, from: PlanPoint, to: PlanPoint, kilonewtons?: number, governs = 'no'): PlanWall {
  const shear =
    kilonewtons === undefined
      ? {}
      : { shear: { value: kilonewtons * 1000, printed: kilonewtons.toFixed(1).replace('-', '−') } }
  return { name, from, to, governs: governs === 'governs', ...shear }
}

const american = {
  language: 'en-US',
  dimension: feet,
  scaleUnit: { metres: foot, name: 'ft' },
  legend: {
    shear: 'design shear of a wall, kip',
    centreOfMass: 'center of mass',
    centreOfRigidity: 'center of rigidity',
    force: 'story force, case EY+',
  },
} as const

const metric = {
  language: 'en-GB',
  dimension: inMetres,
  scaleUnit: { metres: 1, name: 'm' },
  legend: {
    shear: 'design shear of a wall, kN',
    centreOfMass: 'centre of mass',
    centreOfRigidity: 'centre of rigidity',
    force: 'storey force, case EX',
  },
} as const

export const bare: PlanView = {
  ...metric,
  title: 'Plan',
  description: 'A plan.',
  areas: [],
  openings: [],
  walls: [],
  gridX: [],
  gridY: [],
}

function scaled(points: readonly PlanPoint[]): readonly PlanPoint[] {
  return points.map(({ x, y }) => at(x * foot, y * foot))
}

const ft = (x: number, y: number): PlanPoint => at(x * foot, y * foot)

const ropewalk: PlanView = {
  ...american,
  title: 'Plan of the ropewalk roof',
  description: 'An L with a hatch and one skewed wall; W3 governs.',
  areas: [
    area('Shop', '68 psf', scaled([at(0, 0), at(60, 0), at(60, 12), at(54, 18), at(0, 18)])),
    area('Loft', '68 psf', scaled(rectangle(0, 18, 24, 40))),
  ],
  openings: [opening('Hatch', scaled(rectangle(30, 4, 36, 10)))],
  walls: [
    wall('W1', ft(0, 6), ft(0, 34), 36.5),
    wall('W2', ft(24, 24), ft(24, 36), 10.2),
    wall('W3', ft(60, 1), ft(60, 11), 19.8, 'governs'),
    wall('N1', ft(3, 40), ft(19, 40), 15.7),
    wall('N2', ft(34, 18), ft(50, 18), 17.5),
    wall('D1', ft(54.7, 17.3), ft(59.3, 12.7), -6.4),
    wall('S1', ft(4, 0), ft(22, 0), 17.2),
    wall('S2', ft(40, 0), ft(54, 0), 13.9),
  ],
  gridX: [
    { name: 'A', at: 0 },
    { name: 'B', at: 24 * foot },
    { name: 'C', at: 60 * foot },
  ],
  gridY: [
    { name: '1', at: 0 },
    { name: '2', at: 18 * foot },
    { name: '3', at: 40 * foot },
  ],
  centreOfMass: { at: ft(23.89, 15.76), printed: '23.89, 15.76 ft' },
  centreOfRigidity: { at: ft(15.78, 13.92), printed: '15.78, 13.92 ft' },
  force: { at: ft(23.89, 15.76), x: 0, y: 250000, printed: '56.1 kip' },
  north: Math.PI / 2,
}

/** Long and thin, with stalls too close for their bubbles and dimensions. */
const stables: PlanView = {
  ...metric,
  title: 'Plan of the stables',
  description: 'A long range of stalls.',
  areas: [area('Stalls', '4.2 kPa', rectangle(0, 0, 62, 5)), area('Tack room', '5.0 kPa', rectangle(62, 0, 72, 5))],
  openings: [],
  walls: [
    wall('West gable', at(0, 0), at(0, 5), 41.2),
    wall('East gable', at(72, 0), at(72, 5), 44.9, 'governs'),
    wall('P1', at(24, 0), at(24, 4), 30.1),
    wall('P2', at(48, 1), at(48, 5), -28.4),
    ...[2, 11, 26, 35, 50, 63].map((x, idx) => wall(`N${idx + 1}`, at(x, 5), at(x + 6, 5), 12 + idx)),
    ...[4, 15, 30, 52].map((x, idx) => wall(`S${idx + 1}`, at(x, 0), at(x + 5, 0), 9 + idx)),
  ],
  gridX: [0, 2.4, 4.8, 7.2, 9.6, 12, 14.4, 24, 36, 48, 62, 63, 72].map((x, idx) => ({ name: `${idx + 1}`, at: x })),
  gridY: [
    { name: 'A', at: 0 },
    { name: 'B', at: 5 },
  ],
  centreOfMass: { at: at(36.71, 2.5), printed: '36.71, 2.50 m' },
  centreOfRigidity: { at: at(37.9, 2.31), printed: '37.90, 2.31 m' },
  force: { at: at(36.71, 2.5), x: 180000, y: 0, printed: '180 kN' },
  north: 2.1,
}

const granary: PlanView = {
  ...metric,
  title: 'Plan of the granary floor',
  description: 'Square; its centres coincide.',
  areas: [area('Bin floor', '9.6 kPa', rectangle(0, 0, 18, 18))],
  openings: [opening('Hoist', rectangle(12, 12, 15.5, 15.5))],
  walls: [
    wall('N', at(3, 18), at(15, 18), 120, 'governs'),
    wall('S', at(3, 0), at(15, 0), 120),
    wall('W', at(0, 3), at(0, 15), 0),
    wall('E', at(18, 3), at(18, 15), 0),
  ],
  gridX: [0, 6, 12, 18].map((x, idx) => ({ name: `${idx + 1}`, at: x })),
  gridY: [0, 9, 18].map((y, idx) => ({ name: 'ABC'[idx] ?? '', at: y })),
  centreOfMass: { at: at(9, 9), printed: '9.00, 9.00 m' },
  centreOfRigidity: { at: at(9, 9), printed: '9.00, 9.00 m' },
  force: { at: at(9, 9), x: 240000, y: 0, printed: '240 kN' },
}

const nearlyCentred: PlanView = {
  ...granary,
  title: 'Plan of the granary loft',
  centreOfRigidity: { at: at(9.35, 8.8), printed: '9.35, 8.80 m' },
  force: { at: at(9.9, 9), x: 0, y: -240000, printed: '240 kN' },
  north: Math.PI / 2 - 0.5,
}

const denseWalls: readonly PlanWall[] = Array.from({ length: 40 }, (_, idx) => {
  const x = 1 + (idx % 8) * 4.2
  const y = 1 + Math.floor(idx / 8) * 4.4
  const shear = Math.round(Math.sin(idx * 1.7) * 240) / 10
  if (idx % 3 === 0) return wall(`${100 + idx}`, at(x, y), at(x, y + 2.8), shear, idx === 21 ? 'governs' : 'no')
  if (idx % 3 === 1) return wall(`${100 + idx}`, at(x, y), at(x + 2.8, y), shear)
  return wall(`${100 + idx}`, at(x, y), at(x + 2.2, y + 1.9), shear)
})

const hostel: PlanView = {
  ...metric,
  title: 'Plan of the hostel',
  description: 'Forty walls.',
  areas: [
    area('North wing', '6.1 kPa', rectangle(0, 11, 34, 24)),
    area('South wing', '6.1 kPa', rectangle(0, 0, 34, 11)),
  ],
  openings: [opening('Stair', rectangle(15.4, 9.4, 18, 13))],
  walls: denseWalls,
  gridX: Array.from({ length: 17 }, (_, idx) => ({ name: `${idx + 1}`, at: idx * 2.125 })),
  gridY: Array.from({ length: 13 }, (_, idx) => ({ name: 'ABCDEFGHJKLMN'[idx] ?? '', at: idx * 2 })),
  centreOfMass: { at: at(17, 12.4), printed: '17.00, 12.40 m' },
  centreOfRigidity: { at: at(14.1, 13.2), printed: '14.10, 13.20 m' },
  force: { at: at(17, 12.4), x: 900000, y: 0, printed: '900 kN' },
  north: Math.PI / 2,
}

const boathouse: PlanView = {
  ...american,
  title: 'Plan of the boathouse',
  description: 'No grid; skewed walls at every angle.',
  areas: [area('Slip', '55 psf', scaled([at(0, 10), at(22, 0), at(58, 8), at(64, 34), at(30, 46), at(6, 36)]))],
  openings: [opening('Well', scaled([at(26, 18), at(40, 16), at(44, 26), at(34, 32), at(24, 28)]))],
  walls: [
    wall('SW', ft(2, 9.1), ft(18, 1.8), 8.4),
    wall('S', ft(26, 0.9), ft(50, 6.2), -12.1),
    wall('E', ft(59, 12.3), ft(63, 29.7), 15, 'governs'),
    wall('NE', ft(58, 36.1), ft(36, 43.9), 3.3),
    wall('NW', ft(26, 44.3), ft(10, 37.7), 9.7),
    wall('W', ft(0.9, 14), ft(5, 31.7), -11.2),
  ],
  gridX: [],
  gridY: [],
  centreOfMass: { at: ft(33, 22.4), printed: '33.0, 22.4 ft' },
  centreOfRigidity: { at: ft(38.1, 14.2), printed: '38.1, 14.2 ft' },
  force: { at: ft(36, 22.4), x: 30000, y: 60000, printed: '15.1 kip' },
  north: 1.2,
}

const tower: PlanView = {
  ...metric,
  title: 'Plan of the water tower stair',
  description: 'Tall and narrow, with long names.',
  areas: [
    area(
      'Stair and lift lobby of the northern water tower, upper landing',
      '5.0 kPa',
      rectangle(1e6, 2e6, 1e6 + 4, 2e6 + 26),
    ),
  ],
  openings: [opening('Lift', rectangle(1e6 + 1, 2e6 + 10, 1e6 + 3, 2e6 + 13))],
  walls: [
    wall('Retaining wall along the northern boundary with the old mill', at(1e6, 2e6 + 2), at(1e6, 2e6 + 24), 210.4),
    wall('קיר מזרחי', at(1e6 + 4, 2e6 + 2), at(1e6 + 4, 2e6 + 18), -188, 'governs'),
    wall('<script>alert(1)</script>', at(1e6, 2e6), at(1e6 + 4, 2e6), 17.3),
    wall('<script>alert(1)</script>', at(1e6, 2e6 + 26), at(1e6 + 4, 2e6 + 26), 16.8),
  ],
  gridX: [
    { name: 'X & Y', at: 1e6 },
    { name: 'Line-27b', at: 1e6 + 4 },
  ],
  gridY: [0, 6, 12, 19, 26].map((y, idx) => ({ name: `${idx + 1}`, at: 2e6 + y })),
  centreOfMass: { at: at(1e6 + 2, 2e6 + 13.4), printed: '2.00, 13.40 m' },
  centreOfRigidity: { at: at(1e6 + 1.1, 2e6 + 16), printed: '1.10, 16.00 m' },
}

/** Grid lines that crowd at both ends of both axes, with long names, on a small plan. */
const forge: PlanView = {
  ...metric,
  title: 'Plan of the forge',
  description: 'Crowded grid lines, areas in a chequer, an opening with three sides.',
  areas: [
    area('Hearth', '7.5 kPa', rectangle(0, 0, 0.6, 0.5)),
    area('Anvil', '7.5 kPa', rectangle(0.6, 0, 1.2, 0.5)),
    area('Coal', '9.0 kPa', rectangle(0, 0.5, 1.2, 0.9)),
  ],
  openings: [opening('Flue', [at(0.7, 0.55), at(1.1, 0.55), at(0.9, 0.85)])],
  walls: [
    wall('F1', at(0, 0), at(0, 0.9), 3.1),
    wall('F2', at(0, 0), at(1.2, 0), 2.2),
    wall('F3', at(1.2, 0), at(1.2, 0.9), 3.4, 'governs'),
    wall('F4', at(0, 0.9), at(1.2, 0.9), -2.4),
  ],
  gridX: [0, 0.01, 0.03, 0.6, 1.16, 1.18, 1.2].map((x, idx) => ({
    name: ['A', 'A.1', 'A.2', 'B', 'C', 'C.1', 'C.2'][idx] ?? '',
    at: x,
  })),
  gridY: [0, 0.02, 0.02, 0.5, 0.86, 0.9].map((y, idx) => ({ name: `Row ${idx + 1}`, at: y })),
  centreOfMass: { at: at(0.6, 0.44), printed: '0.600, 0.440 m' },
  centreOfRigidity: { at: at(0.75, 0.46), printed: '0.750, 0.460 m' },
  force: { at: at(0.6, 0.44), x: -4000, y: -3000, printed: '5.0 kN' },
  north: -Math.PI / 2,
}

export const buildings: Readonly<Record<string, PlanView>> = {
  ropewalk,
  stables,
  granary,
  nearlyCentred,
  hostel,
  boathouse,
  tower,
  forge,
  oneWall: { ...bare, title: 'Plan of one wall', walls: [wall('W1', at(0, 0), at(3, 0), 4)] },
}

/** A great hall with more walls than any sheet can name. */
export const hangar: PlanView = {
  ...bare,
  title: 'Plan of the great hangar',
  areas: [area('Hall', '2.0 kPa', rectangle(0, 0, 500, 400))],
  walls: Array.from({ length: 1000 }, (_, idx) => {
    const x = 4 + (idx % 40) * 12.4
    const y = 4 + Math.floor(idx / 40) * 16
    return wall(`W${idx + 1}`, at(x, y), idx % 2 === 0 ? at(x + 9, y) : at(x, y + 12), 1 + (idx % 17))
  }),
  gridX: Array.from({ length: 90 }, (_, idx) => ({ name: `${idx + 1}`, at: idx * 5.6 })),
  gridY: Array.from({ length: 40 }, (_, idx) => ({ name: `${idx + 1}`, at: idx * 10 })),
}
