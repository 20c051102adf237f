import katex from 'katex'
import { expect, test } from 'vitest'
import { joinTex, numeral, type Tex, texSource } from '../../src/base/tex.ts'
import { nameTex, texWords } from '../../src/base/typeset.ts'
import { texAbout } from '../../src/base/work.ts'
import { packShapes, unpackShapes } from '../../src/render/shape-pack.ts'
import { createShapeCache, setFormula } from '../../src/render/shapes.ts'
import { createTypesetter } from '../../src/render/typeset.ts'

const options = { throwOnError: true, trust: false, strict: false } as const
const direct = {
  inline: (source: string) => katex.renderToString(source, { ...options, output: 'html', displayMode: false }),
  display: (source: string) => katex.renderToString(source, { ...options, output: 'html', displayMode: true }),
  mathml: (source: string) => katex.renderToString(source, { ...options, output: 'mathml' }),
}

const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789'
const words = [
  ...letters,
  ...Array.from(letters, letter => `x${letter}`),
  ...['W1', 'EX+', 'EY-', 'a--b', 'a---b', 'W1,2', ',', '.', '-', '+', 'x-', 'x.', 'x,', 'x+', 'a b', "a'", 'roof'],
  ...[
    'CMU8',
    'Ärger',
    'Ω',
    'total',
    'xpx',
    'ace',
    'fi',
    'ff',
    'VAWA',
    '<b>',
    'a&b',
    'znxzn',
    '91735',
    'Qg',
    't1',
    'it',
  ],
]

/** The places in which the calculation sets a word, and some besides. */
const places: readonly ((word: string) => Tex)[] = [
  word => joinTex(texAbout('k', word)),
  word => joinTex(texAbout('V_{d}', word), '=', numeral('12')),
  word => joinTex(texAbout("f'_m", word, 'W1')),
  word => joinTex('{', nameTex(word), '}_{', texWords(word), '}'),
  word => joinTex('\\frac{', texWords(word), '^{', numeral('2'), '}}{', texAbout('V', word), '}'),
  word => joinTex('\\left|', texAbout('V', word), '\\right|+\\sqrt{', texWords(word), '}'),
  word => joinTex('\\left(', texWords(word), '_{', texWords(word), '}\\right)^{', numeral('3'), '}'),
  word => joinTex('\\bar{', texWords(word), '}\\,\\mathbf{', texWords(word), '}'),
  word => joinTex('{', texWords(word), '}^{', texWords(word), '}', numeral('8')),
]

test('a name in a formula is set byte for byte as KaTeX sets it, whatever other names came before', () => {
  const typesetter = createTypesetter()
  for (const place of places)
    for (const word of words) {
      const formula = place(word)
      const source = texSource(formula)
      expect(typesetter.html(formula, 'display'), source).toBe(direct.display(source))
      expect(typesetter.html(formula, 'inline'), source).toBe(direct.inline(source))
      expect(typesetter.mathml(formula), source).toBe(direct.mathml(source))
    }
})

test('names alike in height share a shape', () => {
  const cache = createShapeCache()
  const typesetter = createTypesetter(cache)
  for (const name of ['W1', 'W2', 'S', 'N10', 'E']) typesetter.html(joinTex(texAbout('k', name)), 'display')
  expect(cache.display.size).toBe(1)
})

test('a packed shape sets what the shape it was made from sets', () => {
  const first = createShapeCache()
  for (const place of places)
    for (const form of ['inline', 'display', 'mathml'] as const) setFormula(place('W1'), form, first, () => {})
  const pack = packShapes(first)
  expect(Buffer.byteLength(pack)).toBe(pack.length)
  const second = createShapeCache(unpackShapes(pack))
  for (const place of places)
    for (const form of ['inline', 'display', 'mathml'] as const) {
      const formula = place('W2')
      expect(second.prepared(form, [...first[form].keys()][0] ?? '')).toBeDefined()
      expect(setFormula(formula, form, second, () => {})).toBe(direct[form](texSource(formula)))
    }
  expect([...second.display.keys()].every(key => first.display.has(key))).toBe(true)
})
