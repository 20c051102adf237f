/** Laws of the wall shears: equilibrium and superposition. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { buildings, documentOf } from '../support/building.ts'
import { reading } from '../support/worked.ts'
import { answer, FOOT, forceScale, KIP } from './answer.ts'

const runs = { numRuns: 20, seed: 4181 }
const cases = ['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'] as const

const sumOf = (numbers: readonly number[]): number => numbers.reduce((total, one) => total + one, 0)

describe('equilibrium', () => {
  const coordinate = fc.integer({ min: -300, max: 300 })

  test('wall forces add up to the storey shear and to the torsion about any point', () => {
    fc.assert(
      fc.property(buildings, coordinate, coordinate, (building, px, py) => {
        const read = answer(building)
        const about = { x: px * FOOT, y: py * FOOT }
        for (const caseName of cases) {
          const walls = read.forces(caseName)
          const axis = caseName[1] === 'X' ? 'x' : 'y'
          const F = (building.force[axis] ?? 0) * KIP
          const applied = { x: axis === 'x' ? F : 0, y: axis === 'y' ? F : 0 }
          const side = caseName.endsWith('+') ? 1 : caseName.endsWith('-') ? -1 : 0
          // The mass is moved across the force by the accidental share of the plan.
          const off = (across: 'x' | 'y') => side * building.accidental * read.si(`roof.size.${across}`)
          const at = { x: read.cm.x + (axis === 'y' ? off('x') : 0), y: read.cm.y + (axis === 'x' ? off('y') : 0) }
          const moment = (force: typeof applied, point: typeof at) =>
            (point.x - about.x) * force.y - (point.y - about.y) * force.x
          closeTo(sumOf(walls.map(({ force }) => force.x)), applied.x, F)
          closeTo(sumOf(walls.map(({ force }) => force.y)), applied.y, F)
          closeTo(sumOf(walls.map(({ force, at }) => moment(force, at))), moment(applied, at), F * 130)
        }
      }),
      runs,
    )
  })

  test('the residual that the page prints is below 1e-9 of the storey shear', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { si } = reading(documentOf(building))
        for (const name of cases) expect(si(`roof.residual.ratio.${name}`)).toBeLessThan(1e-9)
      }),
      runs,
    )
  })

  test('a force through the centre of rigidity moves the floor without turning it', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { cr } = answer(building)
        const [x, y] = [cr.x / FOOT, cr.y / FOOT]
        // One square floor, centred on the centre of rigidity and large enough to meet every wall.
        const outline = [
          { x: x - 200, y: y - 200 },
          { x: x + 200, y: y - 200 },
          { x: x + 200, y: y + 200 },
          { x: x - 200, y: y + 200 },
        ]
        const centred = answer({ ...building, areas: [{ name: 'Floor', outline, load: 50 }] })
        for (const name of ['EX', 'EY']) {
          const movement = Math.hypot(centred.si(`roof.u.${name}`), centred.si(`roof.v.${name}`))
          closeTo(centred.si(`roof.phi.${name}`) * 200 * FOOT, 0, movement)
          for (const wall of building.walls)
            closeTo(centred.si(`roof.wall.${wall.name}.Vt.${name}`), 0, forceScale(building))
        }
      }),
      runs,
    )
  })
})

describe('superposition', () => {
  test('the two accidental sides lie as far from the case without, one on either side', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { si } = answer(building)
        for (const axis of ['EX', 'EY'])
          for (const { name } of building.walls) {
            const [none, plus, minus] = ['', '+', '-'].map(side => si(`roof.wall.${name}.V.${axis}${side}`)) as [
              number,
              number,
              number,
            ]
            closeTo(plus + minus, 2 * none, forceScale(building))
          }
      }),
      runs,
    )
  })

  test('three times the force is three times every shear and every displacement', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { x = 0, y = 0 } = building.force
        const [a, b] = [answer(building), answer({ ...building, force: { x: 3 * x, y: 3 * y } })]
        for (const name of cases) {
          for (const { name: wall } of building.walls) {
            const id = `roof.wall.${wall}.V.${name}`
            closeTo(3 * a.si(id), b.si(id), 3 * forceScale(building))
          }
          closeTo(b.si(`roof.drift.${name}`), 3 * a.si(`roof.drift.${name}`), Math.abs(b.si(`roof.drift.${name}`)))
        }
      }),
      runs,
    )
  })

  test('a shear is its direct and its torsional part, and the design shear is the largest of the cases', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { si } = answer(building)
        for (const { name } of building.walls) {
          const id = `roof.wall.${name}`
          for (const each of cases)
            closeTo(si(`${id}.V.${each}`), si(`${id}.Vd.${each}`) + si(`${id}.Vt.${each}`), forceScale(building))
          expect(si(`${id}.V`)).toBe(Math.max(...cases.map(each => Math.abs(si(`${id}.V.${each}`)))))
          closeTo(si(`${id}.v`) * si(`${id}.L`), si(`${id}.V`), forceScale(building))
        }
      }),
      runs,
    )
  })

  test('the force of a wall is its stiffness times its movement along its own line', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { si, cr } = answer(building)
        for (const each of cases)
          for (const { name } of building.walls) {
            const id = `roof.wall.${name}`
            const [u, v, phi] = ['u', 'v', 'phi'].map(key => si(`roof.${key}.${each}`)) as [number, number, number]
            const [x, y, c, s, k] = ['x', 'y', 'c', 's', 'k'].map(key => si(`${id}.${key}`)) as [
              number,
              number,
              number,
              number,
              number,
            ]
            const along = c * (u - phi * (y - cr.y)) + s * (v + phi * (x - cr.x))
            closeTo(si(`${id}.V.${each}`), k * along, forceScale(building))
          }
      }),
      runs,
    )
  })

  test('the plan displaced as a rigid body carries its corners with it, and drift is the farthest', () => {
    fc.assert(
      fc.property(buildings, building => {
        const { si, cr, sheet } = answer(building)
        const corners = [1, 2, 3, 4, 5, 6, 7, 8].filter(n => sheet.scope.lookup(`roof.corner.C${n}.x`))
        expect(corners.length).toBeGreaterThanOrEqual(4)
        for (const [each, axis] of [
          ['EX+', 'x'],
          ['EY-', 'y'],
        ] as const) {
          const phi = si(`roof.phi.${each}`)
          const moves = corners.map(n => {
            const [x, y] = [si(`roof.corner.C${n}.x`) - cr.x, si(`roof.corner.C${n}.y`) - cr.y]
            const move = axis === 'x' ? si(`roof.u.${each}`) - phi * y : si(`roof.v.${each}`) + phi * x
            closeTo(si(`roof.displacement.C${n}.${axis}.${each}`), move, Math.abs(move))
            return Math.abs(move)
          })
          closeTo(Math.abs(si(`roof.drift.${each}`)), Math.max(...moves), Math.max(...moves))
        }
      }),
      runs,
    )
  })
})
