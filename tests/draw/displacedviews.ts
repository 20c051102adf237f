/** Levels of invented buildings as they move, each hard to draw in its own way. */
import type { DisplacedView } from '../../src/draw/displacedview.ts'
import type { PlanPoint } from '../../src/draw/view.ts'

const at = (x: number, y: number): PlanPoint => ({ x, y })
const rectangle = (x: number, y: number) => [at(0, 0), at(x, 0), at(x, y), at(0, y)]
const millimetres = (...metres: readonly number[]): string =>
  `${metres.map(each => (each * 1000).toFixed(3).replace('-', '−')).join(', ')} mm`

type Wanted = Pick<DisplacedView, 'outline' | 'walls' | 'centre'> &
  Partial<Pick<DisplacedView, 'force'>> & {
    readonly title: string
    readonly mass: PlanPoint
    readonly corner: PlanPoint
  }

function view({ mass, corner, centre, ...rest }: Wanted): DisplacedView {
  const moved = (name: string, p: PlanPoint) => {
    const dx = centre.u - centre.phi * (p.y - centre.at.y)
    const dy = centre.v + centre.phi * (p.x - centre.at.x)
    return { name, at: p, dx, dy, printed: millimetres(dx, dy) }
  }
  return {
    ...rest,
    description: `${rest.title}, described.`,
    language: 'en-GB',
    centre,
    printed: { centre: millimetres(centre.u, centre.v), rotation: `${centre.phi.toExponential(2)} rad` },
    mass: moved('CM', mass),
    corner: moved('C2', corner),
    displacementUnit: { si: 0.001, name: 'mm' },
    scaleUnit: { metres: 1, name: 'm' },
    forceWords: 'storey force',
  }
}

const box = [
  { name: 'N', from: at(2, 12), to: at(14, 12) },
  { name: 'S', from: at(0, 0), to: at(18, 0) },
  { name: 'W', from: at(0, 0), to: at(0, 12) },
  { name: 'E', from: at(18, 2), to: at(18, 9) },
]

const long = 'Retaining wall along the northern boundary with the old mill and its race '.repeat(6).slice(0, 400)

export const displacedBuildings: Readonly<Record<string, DisplacedView>> = {
  both: view({
    title: 'Displaced mill',
    outline: [rectangle(18, 12)],
    walls: box,
    centre: { at: at(6, 4), u: 0.0011, v: 0.0002, phi: 0.00005 },
    mass: at(9, 6),
    corner: at(18, 12),
    force: { at: at(9, 7), x: 120000, y: 0, printed: '120 kN' },
  }),
  turning: view({
    title: 'A mill that only turns',
    outline: [rectangle(18, 12)],
    walls: box,
    centre: { at: at(9, 6), u: 0, v: 0, phi: -0.0004 },
    mass: at(9, 6),
    corner: at(18, 0),
    force: { at: at(12, 6), x: 0, y: -1e5, printed: '100 kN' },
  }),
  tiny: view({
    title: 'A mill of rock',
    outline: [rectangle(18, 12)],
    walls: box,
    centre: { at: at(6, 4), u: 3e-11, v: 0, phi: 0 },
    mass: at(9, 6),
    corner: at(18, 12),
  }),
  still: view({
    title: 'A mill at rest',
    outline: [rectangle(18, 12)],
    walls: box,
    centre: { at: at(6, 4), u: 0, v: 0, phi: 0 },
    mass: at(9, 6),
    corner: at(18, 12),
  }),
  soft: view({
    title: 'A tent',
    outline: [rectangle(6, 4)],
    walls: [{ name: 'P', from: at(1, 0), to: at(1.4, 0) }],
    centre: { at: at(3, 2), u: 2.5, v: -1, phi: 0.3 },
    mass: at(3, 2),
    corner: at(6, 4),
    force: { at: at(3, 2), x: 5e3, y: 0, printed: '5 kN' },
  }),
  skew: view({
    title: 'A lighthouse with a court',
    outline: [
      [at(0, 0), at(20, 3), at(26, 16), at(9, 22), at(-4, 11)],
      [at(8, 8), at(8, 13), at(13, 13), at(13, 8)],
    ],
    walls: [
      { name: 'قاعة', from: at(1, 0.3), to: at(15, 2.2) },
      { name: 'קיר מזרחי', from: at(21, 5), to: at(25, 14) },
      { name: long, from: at(10, 21.7), to: at(22, 17.5) },
      { name: 'a'.repeat(400), from: at(-3, 12), to: at(7, 20.5) },
      { name: '<b>&"', from: at(-3.6, 10), to: at(-0.4, 1) },
    ],
    centre: { at: at(10, 9), u: -0.004, v: 0.009, phi: 0.0006 },
    mass: at(10.4, 10.1),
    corner: at(26, 16),
    force: { at: at(10.4, 10.1), x: 0, y: 8e5, printed: '800 kN' },
  }),
  far: view({
    title: 'A mill turned from afar',
    outline: [rectangle(18, 12)],
    walls: box,
    centre: { at: at(-140, 400), u: 0.0001, v: 0.0002, phi: 0.00002 },
    mass: at(9, 6),
    corner: at(18, 12),
  }),
}
