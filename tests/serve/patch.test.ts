/** What goes to a page: the way from one list of blocks to another, and what moved. */
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { createComparison } from '../../src/page/live-pin.ts'
import type { Figure, Verdict } from '../../src/serve/message.ts'
import { movesBetween, type State } from '../../src/serve/moved.ts'
import { applied, changesBetween } from '../../src/serve/patch.ts'
import { changeInWords } from '../../src/serve/words.ts'

const block = (id: string, text: string) => `<div class="eq" id="${id}">${text}</div>`

describe('the changes between two lists of blocks', () => {
  test('lead from any list to any other', () => {
    const blocks = fc.array(
      fc.oneof(
        fc
          .tuple(fc.constantFrom('a', 'b', 'c', 'd', 'e'), fc.constantFrom('1', '2'))
          .map(([id, text]) => block(id, text)),
        fc.constantFrom('<p class="note">x</p>', '<p class="note">y</p>', '<div class="prose">z</div>', ''),
      ),
      { maxLength: 12 },
    )
    fc.assert(
      fc.property(blocks, blocks, (before, after) => {
        expect(applied(before, changesBetween(before, after))).toEqual(after)
      }),
      { numRuns: 2000 },
    )
  })

  test('say nothing of blocks that are the same', () => {
    const same = [block('a', '1'), block('b', '2')]
    expect(changesBetween(same, same)).toEqual([['keep', 2]])
  })

  test('turn a block into the one of its id, though another has come before it', () => {
    const before = [block('a', '1'), block('b', '1'), block('c', '1')]
    const after = [block('a', '1'), block('new', '1'), block('b', '2'), block('c', '1')]
    expect(changesBetween(before, after)).toEqual([
      ['keep', 1],
      ['add', block('new', '1')],
      ['turn', block('b', '2')],
      ['keep', 1],
    ])
  })

  test('keep what a new block has pushed down, though all numbers beside it changed', () => {
    const before = Array.from({ length: 2000 }, (_, i) => block(`e${i}`, `(${i})`))
    const after = [block('first', 'new'), ...before.map((_, i) => block(`e${i}`, `(${i + 1})`))]
    const changes = changesBetween(before, after)
    expect(changes.filter(([kind]) => kind === 'turn')).toHaveLength(2000)
    expect(changes[0]).toEqual(['add', block('first', 'new')])
  })
})

const figure = (id: string, printed: string, si: number, given = false): Figure => ({
  id,
  letter: id,
  printed,
  si,
  given,
})
const verdict = (id: string, ok: boolean): Verdict => ({ id, what: `shear in ${id}`, ratio: ok ? '0.9' : '1.1', ok })
const state = (figures: readonly Figure[], checks: readonly Verdict[] = []): State => ({
  numbers: new Map(figures.map(each => [each.id, each])),
  checks: new Map(checks.map(each => [each.id, each])),
})

describe('what moved', () => {
  test('the largest relative change comes first, what was written last', () => {
    const before = state([figure('a', '10 ft', 10), figure('b', '4 ft', 4), figure('t', '1 ft', 1, true)])
    const after = state([figure('a', '11 ft', 11), figure('b', '5 ft', 5), figure('t', '9 ft', 9, true)])
    expect(movesBetween(before, after).numbers.map(({ id, was, now, change }) => [id, was, now, change])).toEqual([
      ['b', '4 ft', '5 ft', 0.25],
      ['a', '10 ft', '11 ft', 0.1],
      ['t', '1 ft', '9 ft', 8],
    ])
  })

  test('a negative number that grows in size has a negative change', () => {
    const [move] = movesBetween(state([figure('a', '−2 ft', -2)]), state([figure('a', '−3 ft', -3)])).numbers
    expect(move?.change).toBe(-0.5)
  })

  test('a number that prints the same has not moved; one that came or went is told', () => {
    const before = state([figure('a', '10 ft', 10), figure('b', '4 ft', 4)])
    const after = state([figure('a', '10 ft', 10.0000001), figure('c', '5 ft', 5)])
    expect(movesBetween(before, after).numbers.map(({ id, was, now }) => [id, was, now])).toEqual([
      ['c', undefined, '5 ft'],
      ['b', '4 ft', undefined],
    ])
  })

  test('a number from nothing has no share, and stands before all others', () => {
    const before = state([figure('a', '0 ft', 0), figure('b', '4 ft', 4)])
    const after = state([figure('a', '1 ft', 1), figure('b', '40 ft', 40)])
    const [first] = movesBetween(before, after).numbers
    expect([first?.id, first?.change]).toEqual(['a', undefined])
  })

  test('what rounding leaves of a residual is no large change', () => {
    const before = state([figure('r', '1×10⁻¹⁶', 1e-16), figure('b', '4 ft', 4)])
    const after = state([figure('r', '9×10⁻¹⁶', 9e-16), figure('b', '4.1 ft', 4.1)])
    expect(movesBetween(before, after).numbers.map(({ id }) => id)).toEqual(['b', 'r'])
  })

  test('checks that fail now come before those that hold again', () => {
    const before = state([], [verdict('a', false), verdict('b', true), verdict('c', true)])
    const after = state([], [verdict('a', true), verdict('b', false), verdict('c', true)])
    expect(movesBetween(before, after).checks.map(({ id, now }) => [id, now?.ok])).toEqual([
      ['b', false],
      ['a', true],
    ])
  })

  test('after a fault a number is compared with what it was before it', () => {
    const lost = state([figure('a', '10 ft', 10), figure('b', '4 ft', 4)])
    const faulty = { ...state([]), lost }
    const { numbers, back } = movesBetween(faulty, state([figure('a', '10 ft', 10), figure('b', '5 ft', 5)]))
    expect(numbers.map(({ id, was, now }) => [id, was, now])).toEqual([['b', '4 ft', '5 ft']])
    expect(back).toEqual(['a'])
  })

  test('changes are told with digits enough', () => {
    expect([0.0421, -0.5, 11.12, 0.00004, 1e-9].map(changeInWords)).toEqual([
      '+4.2\u00a0%',
      '−50.0\u00a0%',
      '+1112\u00a0%',
      '+0.004\u00a0%',
      '+<0.001\u00a0%',
    ])
  })
})

describe('a state that is held', () => {
  const table = {
    version: 3,
    numbers: [figure('a', '10 ft', 10), figure('b', '4 ft', 4)],
    checks: [verdict('c', true)],
  }
  const save = (before: State, after: State) => movesBetween(before, after)

  test('is compared with each later save, and a number that returns to it is not marked', () => {
    const [first, second, third] = ['11 ft', '12 ft', '10 ft'].map((text, i) =>
      state([figure('a', text, [11, 12, 10][i] ?? 0), figure('b', '4 ft', 4)], [verdict('c', true)]),
    )
    const held = state(table.numbers, table.checks)
    if (!first || !second || !third) throw new Error('three states')
    const comparison = createComparison(undefined, () => undefined)
    comparison.pin(table)
    comparison.saved(4, save(held, first))
    comparison.saved(5, save(first, second))
    expect(comparison.moves().numbers.map(({ was, now }) => [was, now])).toEqual([['10 ft', '12 ft']])
    comparison.saved(6, save(second, third))
    expect(comparison.moves().numbers).toEqual([])
    comparison.release()
    expect(comparison.moves().numbers.map(({ was, now }) => [was, now])).toEqual([['12 ft', '10 ft']])
  })

  test('outlasts a fault that takes every number away for a while', () => {
    const held = state(table.numbers, table.checks)
    const comparison = createComparison(undefined, () => undefined)
    comparison.pin(table)
    const faulty = { ...state([]), lost: held }
    comparison.saved(4, save(held, faulty))
    expect(comparison.moves().numbers).toHaveLength(2)
    comparison.saved(5, save(faulty, state([figure('a', '10 ft', 10), figure('b', '5 ft', 5)], [verdict('c', true)])))
    expect(comparison.moves().numbers.map(({ was, now }) => [was, now])).toEqual([['4 ft', '5 ft']])
    expect(comparison.moves().checks).toEqual([])
  })
})
