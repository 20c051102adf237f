/** The trace of a document as data, and what the page carries of it. */
import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import { type Compiled, compileText } from '../../src/compile.ts'
import { letterPlain, runsOf } from '../../src/explain/letter.ts'
import { everyValue } from '../../src/explain/trace.ts'
import { type Traced, traced } from '../../src/explain/traced.ts'
import { readData } from '../../src/page/data.ts'
import { publish } from '../../src/publish.ts'
import { type Island, islandOf } from '../../src/render/island.ts'
import { createTypesetter } from '../../src/render/typeset.ts'
import { asset } from '../render/assets.ts'
import { host } from '../support/worked.ts'

const folder = fileURLToPath(new URL('../../samples/', import.meta.url))
const samples = readdirSync(folder)
  .filter(name => name.endsWith('.md'))
  .map(name => ({ name, compiled: compileText(name, readFileSync(`${folder}${name}`, 'utf8')) }))

const pageOf = (compiled: Compiled): string =>
  publish(compiled, 'page', 'html', false, { ...host, asset })[0]?.text ?? ''
const islandIn = (page: string): Island =>
  JSON.parse(/<script type="application\/json" class="trace-data">([\s\S]*?)<\/script>/.exec(page)?.[1] ?? '') as Island // what `islandOf` wrote
const decoded = (text: string): string =>
  text.replace(
    /&(?:#x27|#39|amp|lt|gt|quot);/g,
    sign => ({ '&amp;': '&', '&lt;': '<', '&gt;': '>', '&quot;': '"' })[sign] ?? "'",
  )
const marksIn = (page: string): readonly string[] =>
  Array.from(page.matchAll(/ data-v="([^"]*)"/g), ([, id = '']) => decoded(id))

describe.each(samples)('in $name', ({ compiled }) => {
  const told: Traced = traced(compiled.context)
  const island = islandOf(told, createTypesetter())
  const data = readData(island)

  test('every marked number of the page has its entry', () => {
    const page = pageOf(compiled)
    const marks = new Set(marksIn(page))
    expect(marks.size).toBeGreaterThan(50)
    expect([...marks].filter(id => data.find(id) === undefined)).toEqual([])
    expect(islandIn(page)).toEqual(JSON.parse(JSON.stringify(island)))
  })

  test('every value is told with the inputs of its step, in the order of the formula', () => {
    const { besides, roots, cells } = compiled.context
    const all = everyValue([...besides.values(), ...roots.values(), ...cells])
    expect(told.values.map(({ value }) => value.id)).toEqual(all.map(({ id }) => id))
    for (const value of all) {
      const found = data.find(value.id)
      if (value.origin.kind !== 'worked' || !found) continue
      const { formula, inputs } = value.origin.step
      expect(data.inputs(found).map(input => input.value[0])).toEqual(
        [...formula.symbols.keys()].map(name => inputs.get(name)?.id),
      )
      expect(data.inputs(found).map(input => input.letter)).toEqual([...formula.symbols.values()].map(({ tex }) => tex))
    }
  })

  test('uses are the inputs turned round', () => {
    const down = island.values.flatMap(value => data.inputs(value).map(input => `${value[0]} on ${input.value[0]}`))
    const up = island.values.flatMap(value => data.uses(value[0]).map(use => `${use[0]} on ${value[0]}`))
    expect([...new Set(up)].sort()).toEqual([...new Set(down)].sort())
  })

  test('a given value comes with the line that it was written in', () => {
    const given = told.values.filter(({ kind }) => kind === 'given')
    expect(given.length).toBeGreaterThan(10)
    for (const { lines, value } of given) {
      const [line] = lines
      const { origin } = value
      if (line === undefined || origin.kind !== 'given') throw new Error(`${value.id} has no line`)
      const written = compiled.source.text.slice(origin.span.start, origin.span.end).replace(/\s+/g, ' ')
      expect(data.line(line)).toContain(written)
    }
  })

  // The MathML that KaTeX writes of the same TeX holds the same signs.
  test('the letter of every value reads as KaTeX reads it', () => {
    for (const { value } of told.values) {
      const math = katex.renderToString(value.tex, { output: 'mathml', strict: false })
      const signs = decoded(math.replace(/<annotation[\s\S]*?<\/annotation>/, '').replace(/<[^>]*>/g, ''))
      const own = runsOf(value.tex).map(({ text }) => text)
      // A prime and a subscript stand beside each other, and either may come first.
      const sorted = (text: string) => [...text.replace(/\s/g, '').replace('Σ', '∑').replace('−', '-')].sort().join('')
      expect(sorted(own.join(''))).toBe(sorted(signs))
    }
  })
})

test('a letter is told in plain text with what stands below and above it', () => {
  expect(letterPlain("f'_{\\text{c}{,}\\text{CON10}}")).toBe('f′_c,CON10')
  expect(letterPlain('k\\,{\\rho}^{2}')).toBe('k\u2009ρ^2')
  expect(letterPlain('V_{\\text{50\\% a\\_b \\textbackslash{}c}}')).toBe('V_50% a_b \\c')
})

test('no text of the document ends the data or opens a comment in it', () => {
  const text = `\`\`\`equations
a = 2 ft # </script><!-- <script>
\`\`\`
`
  const page = pageOf(compileText('a.md', text))
  expect(page.match(/<\/script/gi)).toHaveLength(2)
  expect(Object.values(islandIn(page).lines)).toEqual(['a = 2 ft # </script><!-- <script>'])
})

test('a page of very many values carries those nearest to what it prints', () => {
  const [sample] = samples
  if (!sample) throw new Error('there is no sample')
  const few = traced(sample.compiled.context, 60)
  const data = readData(islandOf(few, createTypesetter()))
  expect(few.values).toHaveLength(60)
  const cut = few.values.filter(({ value }) => {
    const found = data.find(value.id)
    return found !== undefined && data.missing(found) > 0
  })
  expect(cut.length).toBeGreaterThan(0)
})
