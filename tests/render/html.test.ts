import { describe, expect, test } from 'vitest'
import type { Diagnostic } from '../../src/base/diagnostic.ts'
import { linesInWords, sourceOf } from '../../src/base/span.ts'
import { numeral, tex } from '../../src/base/tex.ts'
import type { Sheet } from '../../src/explain/sheet.ts'
import type { BodyPart } from '../../src/render/body.ts'
import { cssString, fragment, pageText } from '../../src/render/escape.ts'
import { renderHtml } from '../../src/render/html.ts'
import { createShapeCache } from '../../src/render/typeset.ts'
import { asset } from './assets.ts'
import { body, sheet, source } from './fixture.ts'

const page = renderHtml({ sheet, body, source, asset })
const [, markup = ''] = page.split(/<body[^>]*>/)
const rendered = (parts: readonly BodyPart[], over: Partial<Sheet> = {}) =>
  renderHtml({ sheet: { ...sheet, draft: false, ...over }, body: parts, source, asset })
const prose = (html: string): BodyPart => ({ kind: 'prose', html })
const occurrences = (text: string, pattern: RegExp) => text.match(new RegExp(pattern, 'g'))?.length ?? 0

describe('the page', () => {
  test('has one first heading, a language, a title, and no skipped level', () => {
    expect(occurrences(page, /<h1[ >]/)).toBe(1)
    expect(page).toMatch(/^<!doctype html>\n<html lang="en-US">/)
    expect(page).toContain('<title>Lateral calculation – Saltmarsh Rope Works – 26-031</title>')
    const levels = [...markup.matchAll(/<h([1-6])/g)].map(match => Number(match[1]))
    levels.slice(1).forEach((level, i) => {
      expect(level - (levels[i] ?? 0)).toBeLessThanOrEqual(1)
    })
  })

  test('moves headings of prose below the title, whatever level they start at', () => {
    expect(rendered([prose('<h1 id="a">3.2 Loads</h1><h2>Wind</h2>')])).toContain(
      '<h2 id="a"><span class="hn">3.2</span> Loads</h2><h3>Wind</h3>',
    )
    expect(rendered([prose('<h3>Loads</h3>'), { kind: 'heading', id: '', text: 'Roof' }])).toContain(
      '<h3 class="part">Roof</h3>',
    )
  })

  test('needs nothing beside itself', () => {
    const attributes = [...page.matchAll(/\s(?:href|src|srcset|action|data)="([^"]*)"/g)].map(match => match[1] ?? '')
    const urls = [...page.matchAll(/url\(["']?([^)"']*)/g)].map(match => match[1] ?? '')
    const links = [...attributes, ...urls].map(link => link.slice(0, 30))
    expect(links.length).toBeGreaterThan(5)
    expect(links.filter(link => !link.startsWith('#') && !link.startsWith('data:'))).toEqual([])
    expect(
      page.replaceAll('http://www.w3.org/1998/Math/MathML', '').replaceAll('http://www.w3.org/2000/svg', ''),
    ).not.toMatch(/https?:\/\//)
    expect(page).not.toMatch(/<script|<link|@import/)
    expect(page).toContain(`content="default-src 'none'; style-src 'unsafe-inline'; font-src data:; img-src data:;`)
  })

  test('leads every quote to a place on the page', () => {
    const ids = new Set([...page.matchAll(/ id="([^"]*)"/g)].map(match => match[1]))
    const quotes = [...page.matchAll(/href="#([^"]*)"/g)].map(match => match[1])
    expect(quotes).toHaveLength(3)
    for (const quote of quotes) expect(ids).toContain(quote)
  })

  test('gives each equation one reading in MathML, and hides its lines from readers by ear', () => {
    const equations = markup
      .split('<div class="eq')
      .slice(1)
      .map(part => part.split('<div class="eq')[0] ?? '')
    expect(equations).toHaveLength(body.filter(part => part.kind === 'equation').length)
    const [first = ''] = equations
    const reading = first.slice(0, first.indexOf('<div class="lines" aria-hidden="true">'))
    expect(occurrences(reading, /<math /)).toBe(1)
    expect(occurrences(reading, /<mo>=<\/mo>/)).toBe(3)
    expect(reading).toContain('<mn>1800</mn>')
  })

  test('names the columns and rows of each table as heads, and marks the row that governs in words', () => {
    const [, table = ''] = markup.split('id="roof.wall"')
    expect(occurrences(table.split('</table>')[0] ?? '', /<th scope="col"/)).toBe(12)
    expect(occurrences(table.split('</table>')[0] ?? '', /<th scope="row"/)).toBe(5)
    expect(table).toContain('<tr class="governs"><th scope="row">W1 <span class="mark">governs</span></th>')
    expect(table).toContain('<span class="u">kip·ft²/in</span>')
  })

  test('says OK or NG in words, with the sign that goes with it', () => {
    expect(markup).toMatch(
      /<li class="check ng" id="roof.drift.EY">[\s\S]*?0\.61 in<\/span><span class="sign">&gt;<\/span>[\s\S]*?1\.05<\/span><span class="verdict">NG<\/span>/,
    )
    expect(markup).toMatch(
      /<li class="check ok" id="roof.wall.W1.V">[\s\S]*?<span class="sign">≤<\/span>[\s\S]*?<span class="verdict">OK<\/span>/,
    )
    expect(occurrences(markup, /<ul class="checks">/)).toBe(1)
  })

  test('draws the bar of a check in proportion, and within its track', () => {
    const bar = (ratio: number) =>
      /width:([\d.]+)%/.exec(
        rendered([
          {
            kind: 'check',
            id: 'c',
            what: 'w',
            demand: 'd',
            capacity: 'c',
            ratio,
            numbers: { demand: 1, capacity: 1, unit: '' },
            ratioPrinted: 'r',
            ok: true,
            reference: '',
            sourceLines: [],
          },
        ]).split(/<body[^>]*>/)[1] ?? '',
      )?.[1]
    expect([0.5, 1, 9, Number.POSITIVE_INFINITY, Number.NaN, -1].map(bar)).toEqual([
      '40.0',
      '80.0',
      '100.0',
      '100.0',
      '0.0',
      '0.0',
    ])
  })

  test('shows a fault with its rule, message, line, marked place and help', () => {
    const [, fault = ''] = markup.split('<section class="fault"')
    for (const shown of [
      'wall-outside-level',
      'wall W7 stands 10.00 ft outside level roof',
      'line 31',
      '<mark>82 ft, 4 ft</mark>',
      'roof ends at grid D',
      'Move W7 to x ≤ 72.00 ft',
    ]) {
      expect(fault).toContain(shown)
    }
  })

  test('counts the faults of a draft on screen and on every printed sheet, and is silent otherwise', () => {
    expect(markup).toContain('<b>Draft</b> 1 fault in this document.')
    expect(page).toContain('@top-center{content:"DRAFT \\b7  1 fault in this document. Not for issue."')
    expect(rendered(body)).not.toContain('DRAFT')
  })

  test('carries the caution, the mark of its source and the version', () => {
    expect(markup).toContain('To be reviewed by the engineer of record; local codes govern.')
    expect(markup).toContain('Platemark 0.1.0 · source 8f2c 41d0')
    expect(page).toMatch(/@bottom-left\{content:"[^"]*To be reviewed by the engineer of record; local codes govern\./)
  })

  test('takes the paper that the sheet asks for', () => {
    expect(page).toContain('@page{size:letter')
    expect(rendered([], { paper: 'A4' })).toContain('@page{size:A4')
  })

  test('leaves out a field of the plate that was not given, except those that are signed', () => {
    const empty = {
      title: '',
      project: '',
      location: '',
      number: '',
      revision: '',
      date: '',
      by: '',
      checked: '',
      standard: '',
    }
    const bare = rendered([], { titleBlock: empty })
    expect(bare).not.toContain('<dt>Revision</dt>')
    expect(bare).toContain('<dt>Checked</dt>')
    expect(bare).toContain('<h1 class="unseen">Calculation</h1>')
  })

  test('is the same, byte for byte, whatever was rendered before it', () => {
    const shapes = createShapeCache()
    renderHtml({ sheet, body: [...body].reverse(), source, asset, shapes })
    expect(renderHtml({ sheet, body, source, asset, shapes })).toBe(page)
  })
})

describe('the faces of a page', () => {
  const faces = (html: string) =>
    [...html.matchAll(/@font-face\{[^}]*?font-family:"?([^;"]+)"?;[^}]*?font-style:(\w+)/g)].map(
      match => `${match[1]} ${match[2]}`,
    )

  test('are only those that it uses', () => {
    const plain = rendered([prose('<p>Plain words.</p>')])
    expect(faces(plain)).toEqual(['Source Serif 4 normal', 'Source Sans 3 normal', 'KaTeX_Main normal'])
    expect(plain).not.toContain('.katex .vlist')
    expect(page).toContain('.katex .vlist')
    expect(faces(page)).not.toContain('KaTeX_Fraktur normal')
    expect(page.length).toBeLessThan(500_000)
  })

  test('grow with slanted words, with code, and with other alphabets', () => {
    expect(faces(rendered([prose('<p><em>y</em></p>')]))).toContain('Source Serif 4 italic')
    expect(faces(rendered([prose('<table><tr><td><em>y</em></td></tr></table>')]))).toContain('Source Sans 3 italic')
    expect(faces(rendered([prose('<p><code>z</code></p>')]))).toContain('KaTeX_Typewriter normal')
    const greek = rendered([prose('<p>Δ</p>')])
    expect(faces(greek).filter(face => face === 'Source Serif 4 normal')).toHaveLength(2)
    expect(faces(greek).filter(face => face === 'Source Sans 3 normal')).toHaveLength(1)
  })
})

describe('the colours of the sheet', () => {
  /** Relative luminance of `#rrggbb`, as WCAG 2.2 defines it. */
  const luminance = (colour: string) => {
    const [r = 0, g = 0, b = 0] = [1, 3, 5].map(at => {
      const share = Number.parseInt(colour.slice(at, at + 2), 16) / 255
      return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
    })
    return 0.2126 * r + 0.7152 * g + 0.0722 * b
  }
  const contrast = (one: string, other: string) => {
    const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b)
    return (light + 0.05) / (dark + 0.05)
  }
  const schemes = [...asset('sheet.css').matchAll(/:root\{([^}]*)\}/g)].map(
    ([, rules = '']) =>
      new Map(
        [...rules.matchAll(/--(\w+):(#[0-9a-f]{3,6})/g)].map(([, name = '', value = '']) => [
          name,
          value.length === 4 ? value.replace(/[0-9a-f]/g, '$&$&') : value,
        ]),
      ),
  )

  test('keep every text readable on paper and on a wash, in light, in dark and in print', () => {
    expect(schemes).toHaveLength(3)
    for (const scheme of schemes) {
      for (const ink of ['ink', 'soft', 'copper', 'red']) {
        for (const ground of ['paper', 'wash']) {
          expect(
            contrast(scheme.get(ink) ?? '', scheme.get(ground) ?? ''),
            `${ink} on ${ground}`,
          ).toBeGreaterThanOrEqual(4.5)
        }
      }
    }
  })
})

describe('text from the document', () => {
  const hostile = `zz"zz<zz>zz'zz&zz{{body}}</style>`
  const raw = /zz"zz|zz<zz|zz>zz|zz'zz|zz&zz|\{\{body\}\}<\/style>/
  const diagnostic: Diagnostic = {
    rule: hostile,
    severity: 'error',
    message: hostile,
    at: { span: { start: 0, end: 5 }, text: hostile },
    also: [],
    help: hostile,
  }
  const row = { cells: [hostile, hostile], governs: true }
  const parts: readonly BodyPart[] = [
    {
      kind: 'equation',
      id: hostile,
      number: hostile,
      symbol: tex('k'),
      lines: [tex('\\text{zz"zz<zz>zz\'zz\\&zz}')],
      result: numeral('12'),
      reference: hostile,
      assumes: [hostile],
      sourceLines: [1],
    },
    {
      kind: 'table',
      id: hostile,
      number: hostile,
      caption: hostile,
      columns: [
        { head: hostile, unit: hostile, align: 'left' },
        { head: tex('k'), unit: hostile, align: 'right' },
      ],
      rows: [row],
      foot: row,
      formulas: [{ symbol: tex('k'), formula: tex('2'), reference: hostile }],
      sourceLines: [],
    },
    { kind: 'figure', id: hostile, number: hostile, caption: hostile, svg: '<svg></svg>', alternative: hostile },
    {
      kind: 'check',
      id: hostile,
      what: hostile,
      demand: hostile,
      capacity: hostile,
      ratio: 1,
      numbers: { demand: 1, capacity: 1, unit: '' },
      ratioPrinted: hostile,
      ok: true,
      reference: hostile,
      sourceLines: [],
    },
    { kind: 'note', text: hostile },
    { kind: 'heading', id: '', text: hostile },
    { kind: 'register', id: hostile, title: hostile, items: [{ text: hostile, detail: hostile }] },
    { kind: 'fault', diagnostics: [diagnostic] },
  ]

  test('is escaped in every field of every piece and of the title block', () => {
    const titleBlock = {
      title: hostile,
      project: hostile,
      location: hostile,
      number: hostile,
      revision: hostile,
      date: hostile,
      by: hostile,
      checked: hostile,
      standard: hostile,
    }
    const hostileSheet: Sheet = {
      ...sheet,
      titleBlock,
      preface: {
        contents: [{ id: hostile, number: hostile, text: hostile, depth: 0 }],
        checks: [],
        criteria: undefined,
        revisions: [{ revision: hostile, date: hostile, by: hostile, checked: hostile, note: hostile }],
      },
      language: 'en-US',
      sourceMark: hostile,
      version: hostile,
      faults: [diagnostic],
      draft: true,
    }
    const html = renderHtml({ sheet: hostileSheet, body: parts, source: sourceOf('x', hostile), asset })
    expect(html).not.toMatch(raw)
    expect(occurrences(html, /zz&quot;zz&lt;zz&gt;zz&#39;zz&amp;zz/)).toBeGreaterThan(40)
    expect(occurrences(html, /<\/style>/)).toBe(1)
    expect(occurrences(html, /<main>/)).toBe(1)
  })

  test('is made safe in the address of a place, whose id may hold any sign', () => {
    expect(fragment('roof.wall.W1.V.EX+')).toBe('#roof.wall.W1.V.EX+')
    expect(fragment('a b%20')).toBe('#a%20b%2520')
  })

  test('keeps tags inside attributes of prose as they are', () => {
    expect(rendered([prose('<p title="<h1>a</h1><table>">b</p>')])).toContain('<p title="<h1>a</h1><table>">b</p>')
  })

  test('prints raised digits that the faces lack as superscripts', () => {
    expect(pageText('6.54×10⁻⁵ ft²')).toBe('6.54×10<sup>−5</sup> ft²')
  })

  test('cannot end a CSS string or the style sheet', () => {
    expect(cssString('a"b\\c</style>\n')).toBe('"a\\22 b\\5c c\\3c \\2f style\\3e \\a "')
  })
})

test('source lines are named in words, runs gathered', () => {
  expect([[], [31], [31, 44], [12, 13, 14, 15, 20], [1, 2]].map(linesInWords)).toEqual([
    '',
    'line 31',
    'lines 31, 44',
    'lines 12–15, 20',
    'lines 1, 2',
  ])
})
