/** What of a level's results the sketch shows, and where. */
import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { planView } from '../../src/draw/level-plan.ts'
import { reading } from '../support/worked.ts'

const twoLevels = readFileSync(new URL('../golden/two-levels/input.md', import.meta.url), 'utf8')

const worked = <T>(result: { readonly ok: true; readonly value: T } | { readonly ok: false }): T => {
  if (!result.ok) throw new Error('the building can be worked')
  return result.value
}

test('the storey shear is drawn on the line of the resultant of all forces above', () => {
  const { sheet } = reading(twoLevels)
  const [floor, roof] = ['floor', 'roof'].map(name => sheet.levels.find(level => level.name === name))
  if (!floor || !roof) throw new Error('there are two levels')
  const picture = {
    level: 'floor',
    language: 'en-US',
    system: 'US',
    grid: worked(sheet.grid()),
    plan: worked(floor.plan()),
    walls: worked(floor.walls()),
    mass: worked(floor.mass()),
    rigidity: worked(floor.rigidity()),
    distribution: worked(floor.distribution()),
  } as const
  const acting = [floor, roof].map(level => worked(level.acting()))
  for (const [caseName, moved] of [
    ['EY', 0],
    ['EY+', 1],
    ['EY-', -1],
  ] as const) {
    const { force } = planView({ ...picture, caseName })
    const total = acting.reduce((sum, { force }) => sum + (force.y?.si ?? 0), 0)
    const about = acting.reduce((sum, { force, at, arm }) => sum + (force.y?.si ?? 0) * (at.x.si + moved * arm.x.si), 0)
    expect(force?.y).toBeCloseTo(total, 6)
    expect(force?.at.x, caseName).toBeCloseTo(about / total, 9)
  }
})
