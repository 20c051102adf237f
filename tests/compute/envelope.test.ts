/** The largest force of each wall over the load cases, and the case that brings it. */
import { expect, test } from 'vitest'
import { envelopeOf, solveCase } from '../../src/compute/envelope.ts'
import { stackOf, type Tie } from '../../src/compute/stack.ts'
import { cantilever } from '../../src/compute/upright.ts'

const wall = cantilever([
  { h: 3, EI: 1e10, GA: 1e9 },
  { h: 3, EI: 1e10, GA: 1e9 },
])
const ties: readonly Tie[] = [
  { kind: 'continuous', wall, c: 1, s: 0, r: 6 },
  { kind: 'continuous', wall, c: 1, s: 0, r: -6 },
  { kind: 'continuous', wall, c: 0, s: 1, r: 6 },
  { kind: 'continuous', wall, c: 0, s: 1, r: -6 },
]
const made = stackOf(2, ties)
if (!made.ok) throw new Error('it stands')
const stack = made.value
/** 100 N at each level along x, and a moment that pushes the first wall along with it or against it. */
const caseOf = (force: number, moment: number) => solveCase(stack, Float64Array.of(force, 0, moment, force, 0, moment))

test('the case of the largest size governs, with its sign', () => {
  const [first, second] = envelopeOf(stack, [caseOf(100, 0), caseOf(100, 240), caseOf(-150, 0)])
  // Four walls 6 m away: 240 N·m a level is 10 N a level in each.
  expect(first?.V[1]).toBeCloseTo(-75, 9)
  expect([...(first?.caseOfV ?? [])]).toEqual([2, 2])
  expect(second?.V[0]).toBeCloseTo(-150, 9)
  const [one, other] = envelopeOf(stack, [caseOf(100, 0), caseOf(100, 240), caseOf(100, -240)])
  expect(one?.V[0]).toBeCloseTo(120, 9)
  expect(other?.V[0]).toBeCloseTo(120, 9)
  expect([one?.caseOfV[0], other?.caseOfV[0]]).toEqual([1, 2])
  // The moment at the foot: 60 N at 3 m and at 6 m.
  expect(one?.M[0]).toBeCloseTo(60 * 9, 6)
  expect(one?.caseOfM[0]).toBe(1)
})

test('of two cases that are as large the first governs', () => {
  const [one] = envelopeOf(stack, [caseOf(100, 0), caseOf(-100, 0), caseOf(100, 0)])
  expect([...(one?.caseOfV ?? []), ...(one?.caseOfM ?? [])]).toEqual([0, 0, 0, 0])
})

test('what acts is balanced in every case', () => {
  for (const each of [caseOf(100, 0), caseOf(1e7, -3e8)]) expect(each.residual).toBeLessThan(1e-13)
  expect(caseOf(0, 0).residual).toBe(0)
})
