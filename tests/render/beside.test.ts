import { describe, expect, test } from 'vitest'
import { besideNames } from '../../src/render/beside.ts'

describe('a file beside the Markdown', () => {
  test('has a name of its own, though capitals and strange signs do not count', () => {
    const nameOf = besideNames('calc')
    const ids = ['roof.plan.EX+', 'roof.plan.EX-', 'Roof.plan.EX+', 'a/b', 'a:b', 'a-b', 'a b']
    expect(ids.map(id => nameOf(id, 'svg'))).toEqual([
      'calc.roof.plan.EX+.svg',
      'calc.roof.plan.EX-.svg',
      'calc.Roof.plan.EX+-2.svg',
      'calc.a-b.svg',
      'calc.a-b-2.svg',
      'calc.a-b-3.svg',
      'calc.a-b-4.svg',
    ])
  })

  test('has one that every file system takes, however long the id', () => {
    const nameOf = besideNames('calc')
    for (const id of ['W'.repeat(400), '\u5357'.repeat(400), '\ud83d\ude00', '..', '']) {
      const name = nameOf(`${id}.plan`, 'svg')
      expect(new TextEncoder().encode(name).length).toBeLessThan(200)
      expect(name).toMatch(/^calc\.[\p{L}\p{N}.+-]*\.svg$/u)
    }
  })
})
