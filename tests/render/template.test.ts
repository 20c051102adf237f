/** A firm's own page: what it may be, and what it says where it may not. */
import { describe, expect, test } from 'vitest'
import { bad, good } from '../../src/base/outcome.ts'
import { compileText } from '../../src/compile.ts'
import { type Host, publish } from '../../src/publish.ts'
import type { Nearby } from '../../src/read/nearby.ts'
import { asset } from './assets.ts'

const host: Host = { version: '0.0.0', asset, sha256: () => '0'.repeat(64) }

const files = (held: Readonly<Record<string, string>>): Nearby => ({
  read: path =>
    held[path] === undefined ? bad('there is no such file or folder') : good(new TextEncoder().encode(held[path])),
})

const fields = '{{banner}}{{plate}}{{preface}}<main>{{body}}</main><p>{{caution}} {{mark}}</p>'

const built = (front: string, held: Readonly<Record<string, string>>) => {
  const compiled = compileText('calc.md', `---\n${front}\nunits: US\n---\n\nWords.\n`, files(held))
  const [page] = publish(compiled, 'calc', 'html', false, host)
  return { messages: compiled.diagnostics.map(({ message }) => message), page: page?.text ?? '' }
}

const withSheet = (html: string) => built('template: office', { 'office/sheet.html': html })
const withStyle = (css: string) => built('template: office', { 'office/sheet.css': css })

describe('a template', () => {
  test('puts its own sheet and style around the calculation, ours before its own', () => {
    const { messages, page } = built('template: office/\ntitle: Calc', {
      'office/sheet.html': `<p class="firm">{{title}}</p>${fields}`,
      'office/sheet.css': '.firm{color:#123456}',
    })
    expect(messages).toEqual([])
    expect(page).toContain('<p class="firm">Calc</p>')
    expect(page.indexOf('.firm{color:#123456}')).toBeGreaterThan(page.indexOf('.plate{'))
    expect(page).toContain('<p>Words.</p>')
  })

  test('may be a style alone', () => {
    const { messages, page } = withStyle('h1{font-size:40px}')
    expect(messages).toEqual([])
    expect(page).toContain('h1{font-size:40px}')
    expect(page).toContain('<div class="sheet">')
  })

  test('keeps the page’s own policy, whatever it holds', () => {
    expect(withSheet(fields).page).toContain(`default-src 'none'`)
  })

  test.each([
    [fields.replace('{{caution}}', ''), 'leaves out {{caution}}, which every sheet carries'],
    [fields.replace('{{banner}}{{plate}}', ''), 'leaves out {{banner}}, {{plate}}, which every sheet carries'],
    [`${fields}{{titel}}`, 'has no field {{titel}}. Did you mean title?'],
    [`${fields}{{body}}`, 'has {{body}} more than once'],
    [`${fields}<script>alert(1)</script>`, 'holds <script, and a page runs and calls for nothing'],
    [`${fields}<p onclick="alert(1)">`, 'onclick=, and a page runs and calls for nothing'],
    [`${fields}<img src="https://example.org/a.png">`, 'and a page runs and calls for nothing'],
    [`${fields}<a href="javascript:alert(1)">x</a>`, 'javascript:, and a page runs and calls for nothing'],
    [`${fields}<meta http-equiv="refresh" content="0">`, 'holds <meta, and a page runs and calls for nothing'],
    [`${fields}</body><base href="/">`, 'and a page runs and calls for nothing'],
    [fields + 'x'.repeat(200_001), 'has more than 200 kB'],
  ])('is refused where it is not fit: %#', (html, because) => {
    const { messages, page } = withSheet(html)
    expect(messages).toHaveLength(1)
    expect(messages[0]).toContain(`the template's sheet.html `)
    expect(messages[0]).toContain(because)
    expect(page).toContain('<div class="sheet">')
  })

  test.each([
    ['</style><script>alert(1)</script>', 'holds HTML'],
    ['@import "https://example.org/a.css";', 'calls for another file: @import "https://example.org/a.css"'],
    ['body{background:url(https://example.org/a.png)}', 'calls for another file: url(https://example.org/a.png)'],
  ])('has a style that calls for nothing: %s', (css, because) => {
    expect(withStyle(css).messages).toEqual([`the template's sheet.css ${because}`])
  })

  test('may hold pictures in its style as data', () => {
    expect(withStyle('body{background:url(data:image/png;base64,AAAA)}').messages).toEqual([])
  })

  test('puts in what the engineer wrote as text', () => {
    const { page } = built('template: office\ntitle: "<b>{{project}}</b> {{body}}"\nproject: P', {
      'office/sheet.html': `<p class="firm">{{title}}</p>${fields}`,
    })
    expect(page).toContain('<p class="firm">&lt;b&gt;{{project}}&lt;/b&gt; {{body}}</p>')
  })
})

describe('a logo', () => {
  const svg = '<svg xmlns="http://www.w3.org/2000/svg" width="20" height="10"><path d="M0 0H9"/></svg>'

  test('stands in the title block as data', () => {
    const { messages, page } = built('logo: mark.svg', { 'mark.svg': svg })
    expect(messages).toEqual([])
    expect(page).toMatch(/<img class="logo" src="data:image\/svg\+xml;base64,[A-Za-z0-9+/=]+" alt="Mark of the firm">/)
  })

  test.each([
    ['mark.svg', {}, 'the logo mark.svg cannot be shown: there is no such file or folder'],
    [
      'mark.svg',
      { 'mark.svg': svg.replace('<path', '<script>alert(1)</script><path') },
      'the logo mark.svg cannot be shown: ',
    ],
    [
      'mark.svg',
      { 'mark.svg': svg.replace('<path', '<path onclick="alert(1)"') },
      'the logo mark.svg cannot be shown: ',
    ],
    ['mark.png', { 'mark.png': 'plain words' }, 'the logo mark.png cannot be shown: it is not a picture'],
    [
      'mark.svg',
      { 'mark.svg': svg.replace('M0 0H9', 'M0 0H9'.repeat(60_000)) },
      'the logo mark.svg cannot be shown: it has 361 kB',
    ],
  ])('is refused with its reason: %s %#', (name, held, because) => {
    const { messages, page } = built(`logo: ${name}`, held)
    expect(messages).toHaveLength(1)
    expect(messages[0]).toContain(because)
    expect(page).not.toContain('class="logo"')
  })
})
