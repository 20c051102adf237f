/** Laws of the forces that a standard gives: any building, any of the standards. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { auditSteps } from '../../src/explain/audit.ts'
import { profiles } from '../../src/standards/catalogue.ts'
import { buildingUnder, type Storeys } from '../standards/frame.ts'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'

const runs = { numRuns: 12, seed: 1170 }

/** A site and a system of each standard, with numbers of no special kind. */
const sites: Readonly<Record<string, string>> = {
  'ASCE 7-22': 'risk category: III\nS_1: 0.61\nS_MS: 1.37\nS_M1: 0.83\nR x: 5\nR y: 6.5\nT x: 0.9 s',
  'ASCE 7-16': 'site class: C\nrisk category: II\nS_S: 0.93\nS_1: 0.37\nR: 5',
  'EN 1998-1': 'spectrum type: 2\nground type: D\nimportance class: III\na_gR: 0.13\nq x: 1.5\nq y: 3\nT_1 y: 0.47 s',
  'NZS 1170.5': 'soil class: D\nZ: 0.31\nR_u: 1.3\nT_1: 0.63 s\nmu: 2\nS_p: 0.7',
  'NBCC 2020': 'importance: high\nS_02: 0.83\nS_05: 0.57\nS_4: 0.07\nS_Ta: 0.61\nM_v: 1\nR_d: 2\nR_o: 1.5\nT y: 0.9 s',
  'IS 1893-1:2016': 'zone: V\nsoil type: III\nI: 1.2\nR: 4\nd x: 20 m\nd y: 10 m\nA_w y: 1.7 m^2',
  'AS 1170.4': 'sub-soil class: Ce\nZ: 0.09\nk_p: 1.3\nmu: 2\nS_p: 0.77\nT_1 x: 0.8 s',
}

const storeys = fc
  .array(fc.record({ load: fc.integer({ min: 20, max: 120 }), rise: fc.integer({ min: 26, max: 55 }) }), {
    minLength: 1,
    maxLength: 7,
  })
  .map((levels): Storeys => {
    let height = 0
    const elevations = levels.map(({ rise }) => {
      height += rise
      return `${height / 10} m`
    })
    return { loads: levels.map(({ load }) => `${load / 10} kPa`), elevations }
  })

const names = ({ loads }: Storeys): readonly string[] => loads.map((_, i) => `L${i + 1}`)

test('every standard has a site here', () => {
  expect(Object.keys(sites).toSorted()).toEqual(profiles.map(({ name }) => name).toSorted())
})

describe.each(Object.keys(sites))('%s', standard => {
  const text = (building: Storeys) => buildingUnder(standard, sites[standard] ?? '', building)

  test('the forces of the levels add up to the base shear, and every one acts the same way', () => {
    fc.assert(
      fc.property(storeys, building => {
        const { si } = reading(text(building))
        for (const direction of ['x', 'y']) {
          const V = si(`seismic.${direction}.V`)
          const forces = names(building).map(level => si(`${level}.force.${direction}`))
          closeTo(
            forces.reduce((sum, force) => sum + force, 0),
            V,
            V,
          )
          expect(Math.min(...forces)).toBeGreaterThan(0)
        }
      }),
      runs,
    )
  })

  test('twice the load is twice the force', () => {
    fc.assert(
      fc.property(storeys, building => {
        const heavy = { ...building, loads: building.loads.map(load => `2*(${load})`) }
        const [once, twice] = [reading(text(building)), reading(text(heavy))]
        for (const level of names(building)) {
          const force = once.si(`${level}.force.y`)
          closeTo(twice.si(`${level}.force.y`), 2 * force, force)
        }
      }),
      runs,
    )
  })

  test('every line holds to the digits printed', () => {
    fc.assert(
      fc.property(storeys, fc.constantFrom('US', 'SI'), (building, units) => {
        const { context, diagnostics } = compileText('t.md', text(building).replace('units: SI', `units: ${units}`))
        expect(diagnostics.filter(({ severity }) => severity === 'error')).toEqual([])
        expect(auditSteps(context.roots.values()).broken).toEqual([])
      }),
      runs,
    )
  })
})

test('the order of the rows of levels does not matter', () => {
  const building = buildingUnder('ASCE 7-22', sites['ASCE 7-22'] ?? '')
  const rows = building.match(/^\| L\d .*$/gm) ?? []
  expect(rows).toHaveLength(3)
  const turned = building.replace(rows.join('\n'), rows.toReversed().join('\n'))
  expect(turned).not.toBe(building)
  for (const level of ['L1', 'L2', 'L3'])
    expect(reading(turned).si(`${level}.force.x`)).toBe(reading(building).si(`${level}.force.x`))
})
