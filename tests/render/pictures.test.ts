/** Pictures of the prose in the page and beside the Markdown. */
import { Buffer } from 'node:buffer'
import { createHash } from 'node:crypto'
import { describe, expect, test } from 'vitest'
import { bad, good } from '../../src/base/outcome.ts'
import { compileText } from '../../src/compile.ts'
import { publish } from '../../src/publish.ts'
import type { Nearby } from '../../src/read/nearby.ts'
import { readers } from '../support/markdown.ts'
import { jpeg, png, svg, utf8 } from '../support/pictures.ts'
import { asset } from './assets.ts'

const files: Readonly<Record<string, Uint8Array>> = {
  'site.png': png(300, 200),
  'pictures/site view.jpg': jpeg(900, 1360),
  'section.svg': utf8(svg('<path d="M0 0"/>', 'viewBox="0 0 200 80"')),
  'half.png': new Uint8Array([...png(3, 2), ...new Uint8Array(1_900_000)]),
}
const nearby: Nearby = {
  read: path => (files[path] ? good(files[path]) : bad('there is no such file')),
}
const host = { version: '0.0.0', asset, sha256: (text: string) => createHash('sha256').update(text).digest('hex') }
const compiled = (text: string) => compileText('calc.md', text, nearby)
const page = (text: string) => publish(compiled(text), 'calc', 'html', false, host)[0]?.text ?? ''
const markdown = (text: string) => publish(compiled(text), 'calc', 'md', false, host)
const images = (html: string) => html.match(/<img[^>]*>/g) ?? []

describe('in the page', () => {
  test('a picture holds its own bytes, its description and its size', () => {
    const [image = ''] = images(page('See ![the site](site.png) here.\n'))
    const data = Buffer.from(files['site.png'] ?? []).toString('base64')
    expect(image).toBe(`<img src="data:image/png;base64,${data}" alt="the site" width="300" height="200">`)
  })

  test('a tall picture is shown no taller than a sheet takes', () => {
    expect(page('![view](<pictures/site view.jpg>)\n')).toContain('width="450" height="680"')
  })

  test('an SVG stands in an img, never in the page itself', () => {
    const html = page('![section](section.svg)\n')
    expect(images(html)).toHaveLength(1)
    expect(html).not.toContain('<svg')
  })

  test('a picture alone with a title is a figure, numbered with the others', () => {
    const plan =
      '```areas roof\n| area | from | to | load |\n|---|---|---|---|\n| A | 0 ft, 0 ft | 9 ft, 9 ft | 50 psf |\n```\n\n```working roof\nplan\n```\n'
    const html = page(
      `![site](site.png "The site")\n\n${plan}\n![section][s]\n\nIn a line ![m](site.png "M").\n\n[s]: section.svg "The section"\n`,
    )
    expect(html).toMatch(
      /<figure class="picture">\s*<p><img [^>]*alt="site"[^>]*><\/p>\s*<figcaption><strong>Figure 1<\/strong> The site<\/figcaption>/,
    )
    expect(html).toContain('<strong>Figure 3</strong> The section')
    expect(html).toContain('<b>Figure 2</b>')
    expect(images(html)).toHaveLength(3)
  })

  test('in lists, tables, links, quotations and footnotes too', () => {
    const text =
      '- ![a](site.png)\n\n| x |\n|---|\n| ![b](site.png) |\n\n[![c](site.png)](https://a.example)\n\n> ![d](site.png)\n\nnote[^1]\n\n[^1]: ![e](site.png)\n'
    expect(images(page(text)).map(image => /alt="(.)"/.exec(image)?.[1])).toEqual(['a', 'b', 'c', 'd', 'e'])
    expect(compiled(text).diagnostics).toEqual([])
  })

  test('where a picture is missing its description stands, and no address is left', () => {
    const html = page(
      '![the quay](quay.png) ![](quay.png) ![x](http://a.example/x.png) ![y](data:image/png;base64,AAAA)\n',
    )
    expect(html).toContain('<em>[Picture left out: the quay]</em>')
    expect(html).toContain('<em>[Picture left out]</em>')
    expect(html.slice(html.indexOf('<main>'))).not.toMatch(/<img|a\.example|AAAA/)
  })

  test('all pictures together have a limit, told at the one that crosses it', () => {
    const { diagnostics, pictures } = compiled('![a](half.png)\n\n'.repeat(6))
    expect(pictures.size).toBe(5)
    expect(diagnostics.map(({ rule }) => rule)).toEqual(['picture-refused'])
    expect(diagnostics[0]?.message).toContain('more than 10.0 MB')
  })
})

describe('beside the Markdown', () => {
  const [report, ...beside] = markdown(
    '![site](site.png "The site")\n\nOnce more ![site](site.png) and ![view][v] and [text][t].\n\n[v]: <pictures/site view.jpg>\n[t]: https://a.example\n',
  )

  test('each picture is copied once, under a name that needs no brackets', () => {
    expect(beside.map(({ name }) => name)).toEqual(['calc.site.png', 'calc.site-view.jpg'])
    expect(beside[1]?.bytes).toEqual(files['pictures/site view.jpg'])
  })

  test('and linked from where the Markdown lies', () => {
    expect(report?.text).toContain('![site](calc.site.png)\n\n**Figure 1.** The site\n')
    expect(report?.text).toContain('![view](calc.site-view.jpg) and [text][t]')
    expect(report?.text).toContain('[t]: https://a.example')
    expect(report?.text).not.toContain('[v]:')
    const { parse, write } = readers.knowing
    expect(write(parse(report?.text ?? ''))).toBe(report?.text)
  })
})
