import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import katex from 'katex'
import { describe, expect, test } from 'vitest'
import { joinTex, marked, numeral, type Tex, tex, texSource } from '../../src/base/tex.ts'
import { mathFaces, mathRules } from '../../src/render/math-faces.ts'
import { createShapeCache, createTypesetter, withoutDigitGroups } from '../../src/render/typeset.ts'

const options = { throwOnError: true, trust: false, strict: false } as const
const direct = {
  inline: (source: string) => katex.renderToString(source, { ...options, output: 'html', displayMode: false }),
  display: (source: string) => katex.renderToString(source, { ...options, output: 'html', displayMode: true }),
  mathml: (source: string) => katex.renderToString(source, { ...options, output: 'mathml' }),
}

/** Numbers from 0 to 1, the same on every run. */
function sequence(seed: number): () => number {
  let state = seed
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 2 ** 32
  }
}

/** A formula such as the calculation prints, with numerals of every length in every place. */
function formulaFrom(next: () => number, depth: number): Tex {
  const pick = <T>(items: readonly T[]): T => items[Math.floor(next() * items.length)] as T // `next` stays below 1, so the index is within
  const digits = () => {
    const whole = String(Math.floor(10 ** Math.floor(next() * 4) * (1 + 8 * next())))
    return next() < 0.4
      ? `${whole}.${String(Math.floor(next() * 1000)).padStart(1 + Math.floor(next() * 3), '0')}`
      : whole
  }
  const three = () => String(100 + Math.floor(next() * 900))
  const quantity = (): Tex =>
    pick<() => Tex>([
      () => numeral(digits()),
      () => numeral(String(Math.floor(next() * 10))),
      () => joinTex(numeral(digits()), '\\ \\mathrm{kip/in}'),
      () => joinTex(numeral(digits()), '\\,\\text{ft}'),
      () => joinTex(numeral(String(1 + Math.floor(next() * 12))), '{,}', numeral(three())),
      () => joinTex(numeral(String(1 + Math.floor(next() * 12))), '\\,', numeral(`${three()}.5`)),
      () => joinTex(numeral(digits()), ` \\times 10^{${Math.floor(next() * 12) - 4}}`),
      () => joinTex(numeral(digits()), '\\times 10^{-', numeral(String(Math.floor(next() * 12))), '}'),
      () => joinTex('\\mathbf{', next() < 0.3 ? '-' : '', numeral(digits()), '}\\ \\mathrm{ft^{2}}'),
      () => joinTex('\\mathbf{', numeral(String(1 + Math.floor(next() * 9))), '{,}', numeral(three()), '}'),
      () => joinTex('\\mathbf{', numeral(String(Math.floor(next() * 10))), '}'),
      () => joinTex('-', numeral(digits())),
      () => joinTex('f^', numeral(digits())),
      () => joinTex('h_{', numeral(digits()), '}'),
      () => joinTex(numeral(digits()), '^{\\circ}'),
      () => tex(pick(['k_{\\text{W1}}', '\\theta', "f'_m", '\\bar{x}_m', 'L'])),
    ])()
  if (depth === 0) return quantity()
  const inner = () => formulaFrom(next, depth - 1)
  return pick<() => Tex>([
    quantity,
    () => joinTex('\\frac{', inner(), '}{', inner(), '}'),
    () => joinTex('\\left(', inner(), '\\right)^{', numeral(digits()), '}'),
    () => joinTex('{', inner(), '}^{', inner(), '}'),
    () => joinTex('\\sqrt{', inner(), '}'),
    () => joinTex('\\sum ', inner()),
    () => joinTex('\\left|', inner(), '\\right|'),
    () => joinTex('\\max\\left(', inner(), ',\\ ', inner(), '\\right)'),
    () => joinTex(inner(), '+', inner()),
    () => joinTex(inner(), '-\\left(', inner(), '\\right)'),
    () => joinTex('\\left(', inner(), '\\right)\\left(', inner(), '\\right)'),
  ])()
}

describe('the typesetter', () => {
  test('gives, byte for byte, what KaTeX gives for the whole source', () => {
    const typesetter = createTypesetter()
    const next = sequence(26014)
    for (let i = 0; i < 3000; i++) {
      const formula = formulaFrom(next, i % 4)
      const source = texSource(formula)
      const mode = i % 2 === 0 ? 'display' : 'inline'
      expect(typesetter.html(formula, mode), source).toBe(direct[mode](source))
      if (i % 3 === 0) expect(typesetter.mathml(formula), source).toBe(direct.mathml(source))
    }
  })

  test('holds for every digit in the places where KaTeX treats a single digit specially', () => {
    const typesetter = createTypesetter()
    const places: readonly (readonly [string, string])[] = [
      ['', ''],
      ['{', '}'],
      ['\\mathbf{', '}'],
      ['\\mathrm{', '}'],
      ['\\bar{', '}'],
      ['{', '}^{2}'],
      ['{', '}_{2}'],
      ['', '^2'],
      ['x^', ''],
      ['x^{', '}'],
      ['x_{', '}'],
      ['\\frac{', '}{2}'],
      ['\\frac{2}{', '}'],
      ['\\frac ', '2'],
      ['\\frac{a}', '+1'],
      ['\\sqrt ', ''],
      ['\\sqrt{', '}'],
      ['\\mathit{', '}'],
      ['\\mathbf{1{,}', '}'],
      ['\\text{', ' ft}'],
      ['2', ''],
    ]
    for (const [before, after] of places) {
      for (const digits of ['2', '0', '1', '3', '4', '5', '6', '7', '8', '9', '12', '1.5', '.5', '625.25']) {
        const formula = joinTex(before, numeral(digits), after)
        expect(typesetter.html(formula, 'display'), texSource(formula)).toBe(direct.display(texSource(formula)))
        expect(typesetter.mathml(formula), texSource(formula)).toBe(direct.mathml(texSource(formula)))
      }
    }
  })

  test('sets a shape once, whatever its numerals', () => {
    const cache = createShapeCache()
    const typesetter = createTypesetter(cache)
    for (let i = 10; i < 200; i++) typesetter.html(joinTex('k=', numeral(String(i)), '\\ \\mathrm{kip}'), 'display')
    expect(cache.display.size).toBe(1)
    expect(cache.inline.size).toBe(0)
  })

  test('tells the faces of its own page, not of pages set before from the same shapes', () => {
    const cache = createShapeCache()
    const first = createTypesetter(cache)
    first.html(tex('\\mathbf{\\theta}+\\left(\\frac{\\frac{a}{b}}{c}\\right)'), 'display')
    first.html(joinTex('\\mathbf{', numeral('12'), '}'), 'display')
    const second = createTypesetter(cache)
    second.html(joinTex(numeral('12'), 'k'), 'inline')
    expect(mathFaces(second.classes())).toEqual(['KaTeX_Main-Regular', 'KaTeX_Math-Italic'])
    expect(mathFaces(first.classes())).toContain('KaTeX_Main-Bold')
    expect(mathFaces(first.classes())).toContain('KaTeX_Size3-Regular')
    expect(mathFaces(createTypesetter(cache).classes())).toEqual([])
  })

  test('refuses a slot that is not a numeral, since slots are not escaped', () => {
    const typesetter = createTypesetter()
    for (const slot of ['<b>', '1e5', '-1', '', '1,000']) {
      expect(() => typesetter.html({ parts: ['', ''], slots: [slot] }, 'inline')).toThrow(/numeral|empty/)
    }
  })

  test('throws on TeX that does not parse', () => {
    expect(() => createTypesetter().html(tex('\\frac{1'), 'inline')).toThrow()
  })
})

test('a number with digit groups is read out as one number', () => {
  const grouped = joinTex('k=', numeral('1'), '{,}', numeral('013'), '{,}', numeral('625.5'), '\\ \\mathrm{lb}')
  expect(texSource(withoutDigitGroups(grouped))).toBe('k=1013625.5\\ \\mathrm{lb}')
  const product = joinTex(numeral('12'), '\\,', numeral('5'), '+', numeral('3'), '\\,', numeral('625'))
  expect(texSource(withoutDigitGroups(product))).toBe('12\\,5+3625')
})

describe('a stretch that prints a value', () => {
  const trusted = (source: string, displayMode: boolean) =>
    katex.renderToString(source, {
      ...options,
      output: 'html',
      displayMode,
      trust: ({ command }) => command === '\\htmlData',
    })
  const inside: readonly ((digits: string) => Tex)[] = [
    digits => numeral(digits),
    digits => joinTex('-', numeral(digits), '\\ \\mathrm{kip/in}'),
    digits => joinTex('\\mathbf{', numeral(digits), '}\\ \\mathrm{ft^{2}}'),
    digits => joinTex(numeral('1'), '{,}', numeral('234'), '\\times 10^{-4}', numeral(digits)),
  ]
  const around: readonly (readonly [string, string])[] = [
    ['', ''],
    ['x+', '-y'],
    ['\\dfrac{', '}{2}'],
    ['\\dfrac{a}{', '}'],
    ['{', '}^{2}'],
    ['{\\left(', '\\right)}^{3}'],
    ['\\sqrt{', '}'],
    ['4\\,', '+3'],
    ['\\mathit{', '}'],
  ]

  test("is KaTeX's own data attribute, byte for byte, in every place", () => {
    const typesetter = createTypesetter()
    for (const [before, after] of around)
      for (const make of inside)
        for (const digits of ['8', '12', '1.5'])
          for (const id of ['roof.wall.W1.k', "constructions.C8.f'm", 'a']) {
            const formula = joinTex(before, marked(id, make(digits)), after)
            const source = `${before}\\htmlData{v=${id}}{${texSource(make(digits))}}${after}`
            expect(typesetter.html(formula, 'display'), source).toBe(trusted(source, true))
            expect(typesetter.html(formula, 'inline'), source).toBe(trusted(source, false))
            expect(typesetter.mathml(formula)).toBe(direct.mathml(before + texSource(make(digits)) + after))
          }
  })

  test('may be of a value whose id TeX could not hold', () => {
    const id = 'roof.wall.a}{\\b,c=d%#&"<i>\'.k'
    const html = createTypesetter().html(marked(id, numeral('8')), 'inline')
    expect(html).toContain('data-v="roof.wall.a}{\\b,c=d%#&amp;&quot;&lt;i&gt;&#x27;.k"')
    expect(createTypesetter().html(marked(id, joinTex('\\mathit{', numeral('8'), '}')), 'inline')).toContain(
      '&lt;i&gt;',
    )
  })

  test('is no part of the source, and shares its shape with others', () => {
    const cache = createShapeCache()
    const typesetter = createTypesetter(cache)
    for (let i = 10; i < 40; i++) typesetter.html(marked(`v${i}`, numeral(String(i))), 'display')
    expect(cache.display.size).toBe(1)
    expect(texSource(joinTex('k=', marked('a', numeral('12'))))).toBe('k=12')
  })
})

describe("KaTeX's style sheet", () => {
  const sheet = readFileSync(createRequire(import.meta.url).resolve('katex/dist/katex.min.css'), 'utf8')

  test('sets no class in a face that the table of faces does not know', () => {
    const rules = [...sheet.matchAll(/([^{}]+)\{[^{}]*font-family:(KaTeX_\w+)[^{}]*\}/g)].filter(
      ([, selector]) => selector?.startsWith('.katex ') === true,
    )
    expect(rules.length).toBeGreaterThan(15)
    for (const [rule, selectors = '', family = ''] of rules) {
      for (const selector of selectors.split(',')) {
        const classes = new Set([
          [...selector.matchAll(/\.([\w-]+)/g)]
            .map(([, name]) => name)
            .filter(name => name !== 'katex' && name !== 'mult')
            .join(' '),
        ])
        if (/textrm|mainrm/.test(selector)) continue // the regular face, which every formula has
        expect(
          mathFaces(classes).some(face => face.startsWith(`${family}-`)),
          `${selector}: ${rule}`,
        ).toBe(true)
      }
    }
  })

  test('is cut to the rules that the classes can meet', () => {
    const lines =
      '.katex .mord{a:b}\n.katex .sizing.reset-size6.size3,.katex .fontsize-ensurer.reset-size6.size3{c:d}\n.katex .cd-arrow-pad{e:f}\n.katex .accent-body:not(.accent-full){g:h}'
    expect(mathRules(lines, new Set(['katex', 'mord mtight', 'sizing reset-size6 size3', 'accent-body']))).toBe(
      '.katex .mord{a:b}.katex .sizing.reset-size6.size3{c:d}.katex .accent-body:not(.accent-full){g:h}',
    )
    expect(mathRules(lines, new Set())).toBe('')
  })
})
