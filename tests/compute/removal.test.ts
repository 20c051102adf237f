/** A storey with walls taken away: the quick way against solving again, and against closed forms. */
import { describe, expect, test } from 'vitest'
import {
  isFallen,
  linesOf,
  nothingRemoved,
  type RemovableWall,
  removals,
  type StoreyToRemoveFrom,
  solvedAgain,
  type Turning,
} from '../../src/compute/removal.ts'
import { closeTo } from '../support/agrees.ts'
import { randomFrom } from '../support/random.ts'

const wall = (c: number, s: number, r: number, k = 1e8, strength = 1e5): RemovableWall => ({ c, s, r, k, strength })

/** Two walls each way, `a` from the middle along x and `b` along y. */
const square = (a: number, b: number): StoreyToRemoveFrom => ({
  walls: [wall(1, 0, a), wall(1, 0, -a), wall(0, 1, b), wall(0, 1, -b)],
  cases: [
    { axis: 'x', Vx: 1e5, Vy: 0, T: 0 },
    { axis: 'y', Vx: 0, Vy: 1e5, T: 0 },
  ],
  edges: { x: [-a, a], y: [-b, b] },
})

const only = (storey: StoreyToRemoveFrom, group: readonly number[]) => {
  const made = removals(storey, [group])
  if (!made.ok || !made.value[0]) throw new Error('the storey does not stand')
  return made.value[0]
}

const turned = (turning: Turning | undefined): number => turning?.ratio ?? Number.NaN

describe('a square of four walls', () => {
  test('does not turn while all stand', () => {
    const all = nothingRemoved(square(6, 6))
    expect(all).toMatchObject({ without: [], strength: { x: 1, y: 1 } })
    if (isFallen(all)) throw new Error('it stands')
    closeTo(turned(all.turning.x), 1, 1, 1e-12)
    closeTo(turned(all.turning.y), 1, 1, 1e-12)
  })

  test.each([
    [6, 6],
    [6, 12],
    [9, 4],
  ])('with arms %d and %d turns by (1 + ρ)/(1 + ρ/2), ρ = a²/b², when one wall is gone', (a, b) => {
    // By hand: the wall that stays takes V and moves V/k; the couple of the two others, V a over 2 b, turns the floor by
    // V a/(2 k b²), which adds V a²/(k b²) from one edge to the other.
    const left = only(square(a, b), [0])
    if (isFallen(left)) throw new Error('it stands')
    const rho = (a / b) ** 2
    closeTo(turned(left.turning.x), (1 + rho) / (1 + rho / 2), 1, 1e-10)
    closeTo(turned(left.turning.y), 1, 1, 1e-10)
    closeTo(left.strength.x, 0.5, 1)
    closeTo(left.strength.y, 1, 1)
  })

  test('falls when both walls of one way are gone, and says so', () => {
    expect(only(square(6, 6), [0, 1])).toEqual({ without: [0, 1], strength: { x: 0, y: 1 }, unstable: true })
    expect(only(square(6, 6), [2, 0, 3])).toMatchObject({ unstable: true })
  })

  test('falls when what is left meets in one point', () => {
    const storey = { ...square(6, 6), walls: [wall(1, 0, 3), wall(0, 1, 5), wall(0.6, 0.8, 8)] }
    // The walls along x and y meet at x = 5, y = −3; without the third nothing resists turning about that point.
    expect(only(storey, [2])).toMatchObject({ unstable: true })
    expect(isFallen(solvedAgain(storey, [2]))).toBe(true)
  })

  test('that never stood has no removals', () => {
    expect(removals({ ...square(6, 6), walls: [wall(1, 0, 3), wall(1, 0, -3)] }, [[0]])).toEqual({
      ok: false,
      because: 'unstable',
    })
  })

  test('counts a skewed wall along each axis with its part of that axis', () => {
    const storey = { ...square(6, 6), walls: [...square(6, 6).walls, wall(0.6, 0.8, 1, 1e8, 2e5)] }
    const left = only(storey, [4])
    closeTo(left.strength.x, 2 / 3.2, 1)
    closeTo(left.strength.y, 2 / 3.6, 1)
  })
})

describe('any plan', () => {
  const plan = (seed: number, count: number): StoreyToRemoveFrom => {
    const random = randomFrom(seed)
    const around = (half: number) => half * (2 * random.share() - 1)
    const walls = Array.from({ length: count }, () => {
      const angle = random.share() < 0.6 ? random.pick([0, Math.PI / 2]) : Math.PI * random.share()
      return wall(Math.cos(angle), Math.sin(angle), around(20), 1e8 * (0.1 + 3 * random.share()), 1e5 * random.share())
    })
    const cases = Array.from({ length: 6 }, (_, i) => {
      const axis = i < 3 ? ('x' as const) : ('y' as const)
      return { axis, Vx: axis === 'x' ? 1e5 : 0, Vy: axis === 'y' ? 1e5 : 0, T: around(3e5) }
    })
    return { walls, cases, edges: { x: [-18, 20], y: [-25, 22] } }
  }

  test.each([5, 6, 9, 20, 200])(
    'of %i walls: the quick way and solving again agree for every wall and for pairs',
    count => {
      const storey = plan(count, count)
      const groups = [...storey.walls.map((_, w) => [w]), ...storey.walls.slice(1).map((_, w) => [w, w + 1])]
      const made = removals(storey, groups)
      if (!made.ok) throw new Error('the storey does not stand')
      made.value.forEach((quick, i) => {
        const again = solvedAgain(storey, groups[i] ?? [])
        expect(isFallen(quick)).toBe(isFallen(again))
        if (isFallen(quick) || isFallen(again)) return
        closeTo(1 / turned(quick.turning.x), 1 / turned(again.turning.x), 1, 1e-8)
        closeTo(1 / turned(quick.turning.y), 1 / turned(again.turning.y), 1, 1e-8)
        expect(quick.strength).toEqual(again.strength)
      })
    },
  )
})

describe('lines of walls', () => {
  test('hold walls of one direction and one arm, whichever way they point', () => {
    const walls = [wall(1, 0, 6), wall(0, 1, 4), wall(1, 0, -6), wall(-1, 0, -6), wall(1, 0, 6.001), wall(0, 1, 4.2)]
    expect(linesOf(walls)).toEqual([[0, 3, 4], [1], [2], [5]])
  })
})
