/** Random plans: of any size, anywhere, with any names. */
import fc from 'fast-check'
import type { PlanView } from '../../src/draw/view.ts'
import { bare } from './views.ts'

const share = fc.double({ min: 0, max: 1, noNaN: true })
const point = fc.record({ x: share, y: share })
const name = fc.oneof(
  fc.string({ maxLength: 8 }),
  fc.string({ unit: 'binary', maxLength: 64 }),
  fc.constantFrom(
    'W1',
    '<script>',
    '"&\'>',
    'שלום',
    'مخزن ٣',
    '耐力壁',
    '',
    'Wall along the old mill race, upper half',
  ),
)
const printed = fc.integer({ min: -9999, max: 9999 }).map(value => (value / 10).toFixed(1))
const rectangle = fc.tuple(point, point).map(([a, b]) => [a, { x: b.x, y: a.y }, b, { x: a.x, y: b.y }])
const outline = fc.oneof(rectangle, fc.array(point, { minLength: 0, maxLength: 7 }))
const wall = fc.record(
  {
    name,
    from: point,
    to: point,
    shear: fc.record({ value: fc.double({ min: -1e6, max: 1e6, noNaN: true }), printed }),
    governs: fc.boolean(),
  },
  { requiredKeys: ['name', 'from', 'to', 'governs'] },
)
const lines = fc.array(fc.record({ name: fc.string({ maxLength: 5 }), at: share }), { maxLength: 14 })
const centre = fc.record({ at: fc.record({ x: share.map(v => v * 2 - 0.5), y: share.map(v => v * 2 - 0.5) }), printed })

const unitPlan = fc.record(
  {
    areas: fc.array(fc.record({ name, outline, load: printed }), { maxLength: 4 }),
    openings: fc.array(fc.record({ name, outline }), { maxLength: 3 }),
    walls: fc.array(wall, { maxLength: 24 }),
    gridX: lines,
    gridY: lines,
    centreOfMass: centre,
    centreOfRigidity: centre,
    force: fc.record({ at: point, x: share, y: share.map(v => -v), printed }),
    north: share.map(v => v * 7),
  },
  { requiredKeys: ['areas', 'openings', 'walls', 'gridX', 'gridY'] },
)

export const plans: fc.Arbitrary<PlanView> = fc
  .record({
    plan: unitPlan,
    long: fc.constantFrom(0, 1, 12, 80, 500),
    high: fc.constantFrom(0, 1, 9, 40, 500),
    away: fc.constantFrom(0, -30, 1e5),
  })
  .map(({ plan, long, high, away }) => stretched({ ...bare, ...plan }, long, high, away))

function stretched(view: PlanView, long: number, high: number, away: number): PlanView {
  const x = (value: number): number => value * long + away
  const y = (value: number): number => value * high - away
  const to = (p: { readonly x: number; readonly y: number }): { x: number; y: number } => ({ x: x(p.x), y: y(p.y) })
  const { centreOfMass, centreOfRigidity, force } = view
  return {
    ...view,
    areas: view.areas.map(area => ({ ...area, outline: area.outline.map(to) })),
    openings: view.openings.map(opening => ({ ...opening, outline: opening.outline.map(to) })),
    walls: view.walls.map(each => ({ ...each, from: to(each.from), to: to(each.to) })),
    gridX: view.gridX.map(line => ({ ...line, at: x(line.at) })),
    gridY: view.gridY.map(line => ({ ...line, at: y(line.at) })),
    ...(centreOfMass ? { centreOfMass: { ...centreOfMass, at: to(centreOfMass.at) } } : {}),
    ...(centreOfRigidity ? { centreOfRigidity: { ...centreOfRigidity, at: to(centreOfRigidity.at) } } : {}),
    ...(force ? { force: { ...force, at: to(force.at) } } : {}),
  }
}
