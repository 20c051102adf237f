/** Laws of the plan: what turning, mirroring and moving a building does to its answer. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { type Building, buildings, moved, type Point, turn } from '../support/building.ts'
import { answer, FOOT, forceScale, plus, type WallForce } from './answer.ts'

const runs = { numRuns: 20, seed: 1907 }

function sameForces(a: readonly WallForce[], b: readonly WallForce[], scale: number): void {
  expect(a.map(({ name }) => name)).toEqual(b.map(({ name }) => name))
  a.forEach(({ force }, i) => {
    closeTo(force.x, b[i]?.force.x ?? Number.NaN, scale)
    closeTo(force.y, b[i]?.force.y ?? Number.NaN, scale)
  })
}

const changed = (forces: readonly WallForce[], by: (force: Point) => Point): readonly WallForce[] =>
  forces.map(each => ({ ...each, force: by(each.force) }))

const samePoint = (a: Point, b: Point): void => {
  closeTo(a.x, b.x, 30)
  closeTo(a.y, b.y, 30)
}

const withForce = (building: Building, { x, y }: Point): Building => ({
  ...building,
  force: { ...(x === 0 ? {} : { x }), ...(y === 0 ? {} : { y }) },
})

/** Forces of the cases without accidental moment, all axes that have a force taken together. */
function together(building: Building): readonly WallForce[] {
  const { forces } = answer(building)
  const cases = (['x', 'y'] as const).filter(axis => building.force[axis]).map(axis => forces(`E${axis.toUpperCase()}`))
  const [first = [], second] = cases
  return second ? first.map((each, i) => ({ ...each, force: plus(each.force, second[i]?.force ?? each.force) })) : first
}

describe('turning the plan turns the answer', () => {
  test.each([17, 90, 180, 270])('by %i degrees, with a force along x', degrees => {
    fc.assert(
      fc.property(buildings, building => {
        const by = turn(degrees)
        const along = withForce(building, { x: building.force.x ?? 0, y: 0 })
        const turned = withForce(moved(building, by), by({ x: building.force.x ?? 0, y: 0 }))
        const [before, after] = [answer(along), answer(turned)]
        samePoint(after.cm, by(before.cm))
        samePoint(after.cr, by(before.cr))
        const [J, W] = [before.si('roof.J'), before.si('roof.W')]
        closeTo(after.si('roof.J'), J, J)
        closeTo(after.si('roof.W'), W, W)
        closeTo(after.si('roof.I_p'), before.si('roof.I_p'), before.si('roof.I_p'))
        sameForces(together(turned), changed(before.forces('EX'), by), forceScale(building))
      }),
      runs,
    )
  })

  test('a quarter turn takes the accidental cases with it: a mass moved toward y is then moved toward -x', () => {
    fc.assert(
      fc.property(buildings, building => {
        const by = turn(90)
        const { x = 0, y = 0 } = building.force
        const [before, after] = [answer(building), answer({ ...moved(building, by), force: { x: y, y: x } })]
        sameForces(after.forces('EY-'), changed(before.forces('EX+'), by), forceScale(building))
        sameForces(after.forces('EY+'), changed(before.forces('EX-'), by), forceScale(building))
        // The force along y has turned to -x, and in the document it is stated along +x.
        const back = (force: Point) => ({ x: -by(force).x, y: -by(force).y })
        sameForces(after.forces('EX+'), changed(before.forces('EY+'), back), forceScale(building))
      }),
      runs,
    )
  })

  test('the stiffer principal axis turns with the plan', () => {
    fc.assert(
      fc.property(buildings, building => {
        const [before, after] = [answer(moved(building, turn(5))), answer(moved(building, turn(17)))]
        const axes = (angle: number) => ({ x: Math.cos(2 * angle), y: Math.sin(2 * angle) })
        const [xx, yy, xy] = ['xx', 'yy', 'xy'].map(key => before.si(`roof.K.${key}`)) as [number, number, number]
        // Without a stiffer axis there is nothing to turn.
        fc.pre(Math.hypot(xx - yy, 2 * xy) > 1e-3 * (xx + yy))
        const expected = axes(before.si('roof.alpha') + (12 * Math.PI) / 180)
        const found = axes(after.si('roof.alpha'))
        closeTo(found.x, expected.x, 1, 1e-7)
        closeTo(found.y, expected.y, 1, 1e-7)
      }),
      runs,
    )
  })
})

test('mirroring the plan mirrors the answer', () => {
  fc.assert(
    fc.property(buildings, building => {
      const across = ({ x, y }: Point) => ({ x: -x, y })
      const [before, after] = [answer(building), answer(moved(building, across))]
      samePoint(after.cm, across(before.cm))
      samePoint(after.cr, across(before.cr))
      closeTo(after.si('roof.J'), before.si('roof.J'), before.si('roof.J'))
      // The force along x is stated along +x in both, so its mirror image is the opposite force.
      const opposite = ({ x, y }: Point) => ({ x, y: -y })
      sameForces(after.forces('EX+'), changed(before.forces('EX+'), opposite), forceScale(building))
      sameForces(after.forces('EY-'), changed(before.forces('EY+'), across), forceScale(building))
      sameForces(after.forces('EY+'), changed(before.forces('EY-'), across), forceScale(building))
    }),
    runs,
  )
})

test('moving the plan moves its centres and changes no shear', () => {
  const far = fc.integer({ min: -2000, max: 2000 })
  fc.assert(
    fc.property(buildings, far, far, (building, dx, dy) => {
      const by = ({ x, y }: Point) => ({ x: x + dx, y: y + dy })
      const [before, after] = [answer(building), answer(moved(building, by))]
      const shift = { x: dx * FOOT, y: dy * FOOT }
      samePoint(after.cm, plus(before.cm, shift))
      samePoint(after.cr, plus(before.cr, shift))
      const J = before.si('roof.J')
      closeTo(after.si('roof.J'), J, J)
      closeTo(after.si('roof.I_p'), before.si('roof.I_p'), before.si('roof.I_p'), 1e-7)
      for (const name of ['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'])
        sameForces(after.forces(name), before.forces(name), forceScale(building))
    }),
    runs,
  )
})

describe('how the plan is written down does not matter', () => {
  const names = ['EX+', 'EY-'] as const

  test('the order of walls does not matter', () => {
    fc.assert(
      fc.property(buildings, fc.integer({ min: 1, max: 9 }), (building, shift) => {
        const { walls } = building
        const other = {
          ...building,
          walls: [...walls.slice(shift % walls.length), ...walls.slice(0, shift % walls.length)].reverse(),
        }
        const [a, b] = [answer(building), answer(other)]
        for (const name of names) sameForces(a.forces(name), b.forces(name), forceScale(building))
      }),
      runs,
    )
  })

  test('which end of a wall is written first does not matter, not even to the sign of its shear', () => {
    fc.assert(
      fc.property(buildings, building => {
        const swapped = { ...building, walls: building.walls.map(wall => ({ ...wall, from: wall.to, to: wall.from })) }
        const [a, b] = [answer(building), answer(swapped)]
        for (const { name } of building.walls)
          for (const caseName of names) {
            const id = `roof.wall.${name}.V.${caseName}`
            closeTo(a.si(id), b.si(id), forceScale(building))
          }
      }),
      runs,
    )
  })

  test('an outline may run either way round and start at any corner', () => {
    fc.assert(
      fc.property(buildings, building => {
        const other = {
          ...building,
          areas: building.areas.map(({ outline: [first, ...rest], ...area }) => ({
            ...area,
            outline: first ? [...rest, first].reverse() : [],
          })),
        }
        const [a, b] = [answer(building), answer(other)]
        samePoint(a.cm, b.cm)
        closeTo(a.si('roof.W'), b.si('roof.W'), a.si('roof.W'))
        closeTo(a.si('roof.area'), b.si('roof.area'), a.si('roof.area'))
        closeTo(a.si('roof.I_p'), b.si('roof.I_p'), a.si('roof.I_p'))
      }),
      runs,
    )
  })

  test('splitting an area in two changes nothing', () => {
    fc.assert(
      fc.property(buildings, fc.double({ min: 0.1, max: 0.9, noNaN: true }), (building, share) => {
        const [hall, store] = building.areas
        fc.pre(hall !== undefined && store !== undefined)
        if (!hall || !store) return
        const right = Math.max(...hall.outline.map(({ x }) => x))
        const depth = Math.max(...hall.outline.map(({ y }) => y))
        const at = right * share
        const half = (name: string, x1: number, x2: number) => ({
          ...hall,
          name,
          outline: [
            { x: x1, y: 0 },
            { x: x2, y: 0 },
            { x: x2, y: depth },
            { x: x1, y: depth },
          ],
        })
        const split = { ...building, areas: [half('H1', 0, at), half('H2', at, right), store] }
        const [a, b] = [answer(building), answer(split)]
        samePoint(a.cm, b.cm)
        for (const id of ['roof.W', 'roof.area', 'roof.perimeter', 'roof.I_p', 'roof.size.x', 'roof.size.y'])
          closeTo(a.si(id), b.si(id), a.si(id))
        for (const name of names) sameForces(a.forces(name), b.forces(name), forceScale(building))
      }),
      runs,
    )
  })

  test('an opening equals the floor drawn without it', () => {
    const shares = fc.tuple(
      fc.double({ min: 0.1, max: 0.4, noNaN: true }),
      fc.double({ min: 0.5, max: 0.9, noNaN: true }),
      fc.double({ min: 0.3, max: 0.8, noNaN: true }),
    )
    fc.assert(
      fc.property(buildings, shares, (building, [left, right, low]) => {
        const [hall, ...rest] = building.areas
        if (!hall) throw new Error('a building has a hall')
        const [X, Y] = [Math.max(...hall.outline.map(({ x }) => x)), Math.max(...hall.outline.map(({ y }) => y))]
        const [x1, x2, y1] = [X * left, X * right, Y * low]
        const notch = [
          { x: x1, y: y1 },
          { x: x2, y: y1 },
          { x: x2, y: Y },
          { x: x1, y: Y },
        ]
        const [a, b] = [
          answer({ ...building, areas: [...building.areas, { name: 'Well', outline: notch }] }),
          answer({
            ...building,
            areas: [
              {
                ...hall,
                outline: [
                  { x: 0, y: 0 },
                  { x: X, y: 0 },
                  { x: X, y: Y },
                  { x: x2, y: Y },
                  { x: x2, y: y1 },
                  { x: x1, y: y1 },
                  { x: x1, y: Y },
                  { x: 0, y: Y },
                ],
              },
              ...rest,
            ],
          }),
        ]
        samePoint(a.cm, b.cm)
        for (const id of ['roof.W', 'roof.area', 'roof.I_p']) closeTo(a.si(id), b.si(id), a.si(id))
        for (const name of names) sameForces(a.forces(name), b.forces(name), forceScale(building))
      }),
      runs,
    )
  })
})
