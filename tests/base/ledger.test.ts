/** Work on demand: each thing once, and a ring said with its whole path. */
import { describe, expect, test } from 'vitest'
import { all, Ledger, type Result, together } from '../../src/base/ledger.ts'
import { bad, good } from '../../src/base/outcome.ts'
import { compileText } from '../../src/compile.ts'
import { reading, resultsOf } from '../support/worked.ts'

const at = (start: number) => ({ start, end: start + 1 })

describe('a ledger', () => {
  test('works each thing once, however often it is asked for', () => {
    const ledger = new Ledger()
    const worked: string[] = []
    const base = ledger.once('base', at(0), () => {
      worked.push('base')
      return good(2)
    })
    const users = [1, 2, 3].map(n =>
      ledger.once(`user ${n}`, at(n), () => {
        worked.push(`user ${n}`)
        const found = base()
        return found.ok ? good(found.value * n) : found
      }),
    )
    expect(worked).toEqual([])
    expect(users.map(user => user())).toEqual([good(2), good(4), good(6)])
    expect(users.map(user => user())).toEqual([good(2), good(4), good(6)])
    expect(worked).toEqual(['user 1', 'base', 'user 2', 'user 3'])
  })

  test('keeps a fault as it keeps a result', () => {
    const ledger = new Ledger()
    let times = 0
    const failing = ledger.once('failing', at(0), (): Result<number> => {
      times++
      return bad([])
    })
    failing()
    failing()
    expect(times).toBe(1)
  })

  test('names every member of a ring, in order, and leaves out what only leads to it', () => {
    const ledger = new Ledger()
    const tasks = new Map<string, () => Result<number>>()
    const rests = (name: string, place: number, on: string) =>
      tasks.set(
        name,
        ledger.once(name, at(place), () => tasks.get(on)?.() ?? good(0)),
      )
    rests('leads in', 0, 'a')
    rests('a', 1, 'b')
    rests('b', 2, 'c')
    rests('c', 3, 'a')
    const found = tasks.get('leads in')?.()
    expect(found?.ok).toBe(false)
    const [fault] = found && !found.ok ? found.because : []
    expect(fault?.message).toBe('a rests on itself: a → b → c → a')
    // It is shown where the ring closes, and the other members are marked too.
    expect(fault?.at).toEqual({ span: at(3), text: 'asks for a again' })
    expect(fault?.also.map(({ span }) => span)).toEqual([at(1), at(2)])
  })

  test('what rests on itself alone is a ring of one', () => {
    const ledger = new Ledger()
    const self: { ask: () => Result<number> } = { ask: () => good(0) }
    self.ask = ledger.once('x', at(0), () => self.ask())
    const found = self.ask()
    expect(!found.ok && found.because[0]?.message).toBe('x rests on itself: x → x')
  })

  test('a fault shared by several parts is told once', () => {
    const fault = {
      rule: 'r',
      severity: 'error',
      message: '',
      at: { span: at(0), text: '' },
      also: [],
      help: '',
    } as const
    const failed: Result<number> = bad([fault])
    expect(together({ a: failed, b: failed, c: good(1) })).toEqual(bad([fault]))
    expect(all([failed, good(1), failed])).toEqual(bad([fault]))
    expect(together({ a: good(1), b: good('two') })).toEqual(good({ a: 1, b: 'two' }))
  })
})

describe('in a document', () => {
  const equations = (...lines: readonly string[]) => `\`\`\`equations\n${lines.join('\n')}\n\`\`\`\n`

  test('definitions may stand in any order', () => {
    const { si } = reading(equations('c = a + b', 'b = 2*a', 'a = 3'))
    expect(si('c')).toBe(9)
  })

  test('a ring of equations is reported with its whole path, once, and the rest is worked', () => {
    const { diagnostics, values } = resultsOf(equations('a = b + 1', 'b = c + 1', 'c = a + 1', 'd = 5', 'e = a + d'))
    const rings = diagnostics.filter(({ rule }) => rule === 'ring-of-definitions')
    expect(rings.map(({ message }) => message)).toEqual(['a rests on itself: a → b → c → a'])
    expect(diagnostics.length).toBe(1)
    expect(values.d?.printed).toBe('5')
  })

  test('a ring through the plan is reported: a load that rests on the weight it makes', () => {
    const text = [
      '```areas roof',
      '| area | from | to | load |',
      '|---|---|---|---|',
      '| Room | 0 ft, 0 ft | 20 ft, 14 ft | 10 psf + roof.W / (400 ft^2) |',
      '```',
      '',
      '```working roof',
      'centre of mass',
      '```',
    ].join('\n')
    const rings = compileText('a.md', text).diagnostics.filter(({ rule }) => rule === 'ring-of-definitions')
    expect(rings.length).toBe(1)
    expect(rings[0]?.message).toBe('roof.W rests on itself: roof.W → roof.areas.Room.w → roof.W')
  })

  test('a chain of 20,000 equations, each resting on the next, is worked without a deep pile', () => {
    const n = 20_000
    const lines = Array.from({ length: n }, (_, i) => `x${i} = ${i === n - 1 ? '1' : `x${i + 1} + 1`}`)
    expect(reading(equations(...lines)).si('x0')).toBe(n)
  })

  test('a ring of 500 equations is named whole', () => {
    const n = 500
    const lines = Array.from({ length: n }, (_, i) => `x${i} = x${(i + 1) % n} + 1`)
    const found = reading(equations(...lines)).sheet.scope.lookup('x0')
    const [fault] = found && !found.ok ? found.because : []
    expect(fault?.rule).toBe('ring-of-definitions')
    expect(fault?.message.split(' → ').length).toBe(n + 1)
  })
})
