/** Laws of stiffness and of units: what scaling, tilting and other spellings of a building do to its answer. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import {
  american,
  type Building,
  buildings,
  documentOf,
  metric,
  moved,
  orthogonalBuildings,
  relative,
} from '../support/building.ts'
import { reading } from '../support/worked.ts'
import { answer, forceScale } from './answer.ts'

const runs = { numRuns: 20, seed: 6765 }
const cases = ['EX', 'EX+', 'EX-', 'EY', 'EY+', 'EY-'] as const

const scaled = (building: Building, by: number): Building => ({
  ...building,
  walls: building.walls.map(wall => ({ ...wall, k: wall.k * by })),
})

describe('stiffness', () => {
  test('doubling every stiffness halves displacement and moves no force', () => {
    fc.assert(
      fc.property(buildings, building => {
        const [a, b] = [answer(building), answer(scaled(building, 2))]
        for (const name of cases) {
          for (const { name: wall } of building.walls) {
            const id = `roof.wall.${wall}.V.${name}`
            closeTo(a.si(id), b.si(id), forceScale(building))
          }
          const drift = a.si(`roof.drift.${name}`)
          closeTo(b.si(`roof.drift.${name}`), drift / 2, Math.abs(drift))
          closeTo(b.si(`roof.phi.${name}`), a.si(`roof.phi.${name}`) / 2, Math.abs(drift) / 10)
        }
        closeTo(b.cr.x, a.cr.x, 30)
        closeTo(b.cr.y, a.cr.y, 30)
      }),
      runs,
    )
  })

  test('relative stiffness gives the same shears and the same centre as absolute', () => {
    fc.assert(
      fc.property(buildings, building => {
        const [a, b] = [answer(building), answer(building, relative)]
        for (const name of cases)
          for (const { name: wall } of building.walls) {
            const id = `roof.wall.${wall}.V.${name}`
            closeTo(a.si(id), b.si(id), forceScale(building))
          }
        closeTo(b.cr.x, a.cr.x, 30)
        closeTo(b.cr.y, a.cr.y, 30)
      }),
      runs,
    )
  })

  test('relative stiffness fixes no displacement, and the calculation says so', () => {
    fc.assert(
      fc.property(buildings, building => {
        const found = reading(documentOf(building, relative)).sheet.scope.lookup('roof.drift.EX')
        expect(found?.ok).toBe(false)
        expect(found && !found.ok ? found.because.map(({ rule }) => rule) : []).toEqual(['drift-not-worked'])
      }),
      { ...runs, numRuns: 5 },
    )
  })

  test('walls along the axes come to the same by the scalar sums and by the full form', () => {
    fc.assert(
      fc.property(orthogonalBuildings, building => {
        // A skewed wall of a trillionth of the stiffness calls for the full form and changes nothing to the digits compared.
        const trace = { name: 'Trace', from: { x: 1, y: 1 }, to: { x: 8, y: 6 }, k: 1e-9 }
        const [scalar, full] = [answer(building), answer({ ...building, walls: [...building.walls, trace] })]
        expect(scalar.sheet.scope.lookup('roof.K.xy')).toBeUndefined()
        expect(full.value('roof.K.xy')).toBeDefined()
        closeTo(full.cr.x, scalar.cr.x, 30)
        closeTo(full.cr.y, scalar.cr.y, 30)
        closeTo(full.si('roof.J'), scalar.si('roof.J'), scalar.si('roof.J'))
        for (const name of cases) {
          for (const { name: wall } of building.walls) {
            const id = `roof.wall.${wall}.V.${name}`
            closeTo(full.si(id), scalar.si(id), forceScale(building))
          }
          closeTo(
            full.si(`roof.drift.${name}`),
            scalar.si(`roof.drift.${name}`),
            Math.abs(scalar.si(`roof.drift.${name}`)),
          )
        }
      }),
      runs,
    )
  })

  test('a plan tilted by a hair is worked by the full form and answers as the straight one', () => {
    fc.assert(
      fc.property(orthogonalBuildings, building => {
        const hair = 1e-7
        const tilted = moved(building, ({ x, y }) => ({ x: x - hair * y, y: y + hair * x }))
        const [a, b] = [answer(building), answer(tilted)]
        expect(b.sheet.scope.lookup('roof.K.xy')?.ok).toBe(true)
        closeTo(b.cr.x, a.cr.x, 30, 1e-5)
        closeTo(b.cr.y, a.cr.y, 30, 1e-5)
        for (const name of cases)
          a.forces(name).forEach(({ force }, i) => {
            closeTo(b.forces(name)[i]?.force.x ?? Number.NaN, force.x, forceScale(building), 1e-5)
            closeTo(b.forces(name)[i]?.force.y ?? Number.NaN, force.y, forceScale(building), 1e-5)
          })
      }),
      runs,
    )
  })
})

describe('units', () => {
  test('kip and kN describe the same building', () => {
    fc.assert(
      fc.property(buildings, building => {
        const [us, si] = [answer(building, american), answer(building, metric)]
        for (const id of ['roof.W', 'roof.area', 'roof.I_p', 'roof.J', 'roof.K.xx', 'roof.K.yy'])
          closeTo(us.si(id), si.si(id), Math.abs(us.si(id)))
        closeTo(us.cm.x, si.cm.x, 30)
        closeTo(us.cm.y, si.cm.y, 30)
        for (const name of cases) {
          const [a, b] = [us.forces(name), si.forces(name)]
          a.forEach(({ force }, i) => {
            closeTo(force.x, b[i]?.force.x ?? Number.NaN, forceScale(building))
            closeTo(force.y, b[i]?.force.y ?? Number.NaN, forceScale(building))
          })
          const id = `roof.drift.${name}`
          closeTo(us.si(id), si.si(id), Math.abs(us.si(id)))
        }
      }),
      runs,
    )
  })

  test('the units that results are shown in change no result', () => {
    fc.assert(
      fc.property(buildings, building => {
        const [us, si] = [answer(building), answer(building, { ...american, units: 'SI' })]
        for (const name of cases)
          for (const { name: wall } of building.walls) {
            const id = `roof.wall.${wall}.V.${name}`
            expect(si.si(id)).toBe(us.si(id))
          }
      }),
      { ...runs, numRuns: 10 },
    )
  })
})
