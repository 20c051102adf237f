/** The same source gives the same bytes, in every format, whatever was compiled before it. */
import fc from 'fast-check'
import { expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { publish, type TextFormat } from '../../src/publish.ts'
import { asset } from '../render/assets.ts'
import { american, buildings, documentOf, metric } from '../support/building.ts'
import { host } from '../support/worked.ts'

const formats: readonly TextFormat[] = ['html', 'md', 'json']

function bytesOf(text: string, path = 'calc.md'): readonly string[] {
  const compiled = compileText(path, text)
  return formats.flatMap(format => publish(compiled, 'calc', format, false, { ...host, asset }).map(file => file.text))
}

test('the same source gives the same bytes', () => {
  const [first, second] = fc.sample(buildings, { numRuns: 2, seed: 88 })
  if (!first || !second) throw new Error('two buildings were asked for')
  const [a, b] = [documentOf(first, american, 'whole calculation'), documentOf(second, metric, 'whole calculation')]
  const before = bytesOf(a)
  const between = bytesOf(b)
  expect(before.length).toBeGreaterThanOrEqual(formats.length)
  expect(before.every(text => text.length > 1000)).toBe(true)
  expect(bytesOf(a)).toEqual(before)
  expect(bytesOf(b)).toEqual(between)
  expect(between).not.toEqual(before)
})

test('a page does not hold the folder that its source lay in', () => {
  const [building] = fc.sample(buildings, { numRuns: 1, seed: 89 })
  if (!building) throw new Error('a building was asked for')
  const text = documentOf(building, american, 'whole calculation')
  const [here, there] = [bytesOf(text, 'calc.md'), bytesOf(text, '/somewhere/else/calc.md')]
  // The results name their source by the path that they were asked for; the pages do not.
  expect(there.slice(0, -1)).toEqual(here.slice(0, -1))
})
