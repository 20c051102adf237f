/** Files recognised as pictures, and refused as ones. */
import { Buffer } from 'node:buffer'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { dataAddress, LARGEST_PICTURE, pictureOf } from '../../src/read/picture.ts'
import { jpeg, png, svg, utf8 } from '../support/pictures.ts'

// The smallest file of each kind, written by ImageMagick 6.9 from a picture of 3 × 2 pixels.
const files = {
  gif: 'R0lGODlhAwACAPAAAP8AAAAAACH5BAAAAAAALAAAAAADAAIAAAIChF8AOw==',
  webp: 'UklGRjwAAABXRUJQVlA4IDAAAADQAQCdASoDAAIAAgA0JaACdLoB+AADsAD+8MQL/yC5YXXI1/8gP+QH/ID/+PIAAAA=',
} as const
const bytes = (base64: string) => new Uint8Array(Buffer.from(base64, 'base64'))

const sizeOf = (file: Uint8Array) => {
  const read = pictureOf(file)
  return read.ok ? read.value.size : read.because
}
const because = (file: Uint8Array) => {
  const read = pictureOf(file)
  return read.ok ? '' : read.because
}

describe('a picture is known by what it holds', () => {
  test.each(['gif', 'webp'] as const)('%s', kind => {
    const read = pictureOf(bytes(files[kind]))
    expect(read).toMatchObject({ ok: true, value: { kind, mime: `image/${kind}`, size: { width: 3, height: 2 } } })
  })

  test('PNG and JPEG, with their size', () => {
    expect(pictureOf(png(30, 20))).toMatchObject({ ok: true, value: { kind: 'png', size: { width: 30, height: 20 } } })
    expect(pictureOf(jpeg(30, 20))).toMatchObject({
      ok: true,
      value: { kind: 'jpeg', size: { width: 30, height: 20 } },
    })
  })

  test('a JPEG taken with the camera on its side has the size that it is shown in', () => {
    expect(sizeOf(jpeg(30, 20, 6))).toEqual({ width: 20, height: 30 })
    expect(sizeOf(jpeg(30, 20, 3))).toEqual({ width: 30, height: 20 })
  })

  test('its address holds the file, byte for byte', () => {
    const file = png(300, 200)
    const read = pictureOf(file)
    const address = read.ok ? dataAddress(read.value) : ''
    expect(address).toMatch(/^data:image\/png;base64,/)
    expect(new Uint8Array(Buffer.from(address.slice(address.indexOf(',') + 1), 'base64'))).toEqual(file)
  })

  test('any bytes at all are answered, and never by an exception', () => {
    const starts = [png(3, 2), jpeg(3, 2, 6), bytes(files.gif), bytes(files.webp), utf8(svg('<path d="M0 0"/>'))]
    fc.assert(
      fc.property(
        fc.constantFrom(...starts),
        fc.nat(),
        fc.array(fc.record({ at: fc.nat(), value: fc.nat(255) }), { maxLength: 4 }),
        (start, length, changes) => {
          const file = start.slice(0, length % (start.length + 1))
          for (const { at, value } of changes) if (file.length > 0) file[at % file.length] = value
          const read = pictureOf(file)
          if (read.ok && read.value.size) expect(read.value.size.width * read.value.size.height).toBeGreaterThan(0)
        },
      ),
      { seed: 3, numRuns: 3000 },
    )
  })
})

describe('no picture', () => {
  test.each([
    ['an empty file', new Uint8Array(), 'it is empty'],
    ['text', utf8('# A document\n'), 'it is not a picture: PNG, JPEG, GIF, WebP and SVG are read'],
    ['a page', utf8('<!doctype html><p>'), 'it is not a picture: PNG, JPEG, GIF, WebP and SVG are read'],
    ['a PNG cut short', png(30, 20).slice(0, -8), 'it starts like a PNG and is cut short or damaged'],
    ['a JPEG cut short', jpeg(30, 20).slice(0, -4), 'it starts like a JPEG and is cut short or damaged'],
    ['a PNG of no width', png(0, 20), 'it is a PNG without width or height'],
    [
      'a PNG of a width that no browser shows',
      png(60000, 60000),
      'it has 60000 × 60000 pixels, more than a browser can be asked to show',
    ],
    ['a picture of 3 MB', new Uint8Array(3 * 1024 * 1024), 'it has 3.0 MB; a picture may have 2.0 MB'],
  ])('%s', (_, file, reason) => expect(because(file)).toBe(reason))

  test('the limit itself is met', () => expect(because(new Uint8Array(LARGEST_PICTURE))).not.toContain('may have'))
})

describe('an SVG', () => {
  // Source of the units: CSS Values and Units, section 6.2.
  test.each([
    ['width="2in" height="50.8mm"', { width: 192, height: 192 }],
    ['viewBox="0 0 200 80"', { width: 200, height: 80 }],
    ['width="100%" viewBox="0 0 200 80"', { width: 200, height: 80 }],
    ['width="100" viewBox="0, 0, 200, 80"', { width: 100, height: 40 }],
    ['', undefined],
  ])('has a size from %j', (attributes, size) => expect(sizeOf(utf8(svg('', attributes)))).toEqual(size))

  test('is taken with what drawing programs write around and into it', () => {
    const text = `\ufeff<?xml version="1.0"?>\n<!DOCTYPE svg PUBLIC "-//W3C//DTD SVG 1.1//EN" "http://www.w3.org/Graphics/SVG/1.1/DTD/svg11.dtd">\n<!-- a > b -->\n${svg(
      '<style><![CDATA[ .a { fill: url(#g); } ]]></style><linearGradient id="g"/><g id="p" label="C:\\\\a\\\\image (1)"><path d="M0 0"/></g><use xlink:href="#p"/><image href="data:image/png;base64,AA=="/><text>1 &lt; 2 &amp; 3</text>',
      'xmlns:xlink="http://www.w3.org/1999/xlink"',
    )}\n`
    expect(because(utf8(text))).toBe('')
  })

  test.each([
    ['<script>x()</script>', 'an element script'],
    ['<s:script xmlns:s="http://www.w3.org/2000/svg"/>', 'an element script'],
    ['<foreignObject><p/></foreignObject>', 'an element foreignObject'],
    ['<rect onclick="x()"/>', 'an event handler onclick'],
    ['<rect ONLOAD = "x()"/>', 'an event handler ONLOAD'],
    ['<image href="https://a.example/x.png"/>', 'a reference to https://a.example/x.png'],
    ['<image href="other.png"/>', 'a reference to other.png'],
    ['<use href="data:image/svg+xml,x#a"/>', 'a reference to data:image/svg+xml,x#a'],
    ['<a href="&#106;avascript:x()"><path d="M0 0"/></a>', 'a reference to javascript:x()'],
    ['<set attributeName="href" to="javascript:x()"/>', 'a script in to'],
    ['<rect fill="url(https://a.example/f.svg#a)"/>', 'a reference to https://a.example/f.svg#a'],
    ['<style>@import "x.css";</style>', 'a style sheet from elsewhere'],
    ['<style>a { fill: \\75rl(x) }</style>', 'letters by number in a style'],
    ['<rect style="background: url(\'x.png\')"/>', 'a reference to x.png'],
    ['<g xml:base="https://a.example/"/>', 'a base address'],
  ])('is refused for %s', (content, reason) => expect(because(utf8(svg(content)))).toBe(`it is an SVG with ${reason}`))

  test.each([
    ['<g>', 'g is not closed'],
    ['</g>', 'g is closed and svg is open'],
    ['<rect width=3/>', 'no sense can be made of <rect width=3/></svg>'],
    ['<rect x="1" x="2"/>', 'an attribute of rect stands twice'],
    ['a < b', 'no sense can be made of < b</svg>'],
    ['<g>'.repeat(300), 'its elements stand more than 200 deep'],
  ])('is refused where it is not well formed: %s', (content, reason) => {
    const found = because(utf8(svg(content)))
    expect(found).toBe(
      `it is an SVG that cannot be read: ${content === '<g>' ? 'svg is closed and g is open' : reason}`,
    )
  })

  test('is refused with a document type that declares, a style sheet, or no name of its own', () => {
    expect(because(utf8(`<!DOCTYPE svg [<!ENTITY a "b">]>${svg('')}`))).toContain(
      'its document type declares something',
    )
    expect(because(utf8(`<?xml-stylesheet href="x.css"?>${svg('')}`))).toContain('it asks for a style sheet')
    expect(because(utf8('<svg><path d="M0 0"/></svg>'))).toContain('a browser does not show')
  })

  test('is refused when its parts show one another without end, or ten times over at each of ten steps', () => {
    const ring = '<g id="a"><use href="#b"/></g><g id="b"><use href="#a"/></g>'
    const tenfold = Array.from({ length: 10 }, (_, i) => `<g id="s${i + 1}">${`<use href="#s${i}"/>`.repeat(10)}</g>`)
    for (const content of [ring, `<g id="s0"><path d="M0 0"/></g>${tenfold.join('')}`])
      expect(because(utf8(svg(content)))).toBe('it is an SVG whose parts repeat one another without end, or nearly')
  })

  test('of two megabytes is read in little time, whatever it repeats', () => {
    for (const content of [
      '<!-- -'.repeat(300_000),
      '<'.repeat(1_900_000),
      `<g a="${'x'.repeat(1_900_000)}"/>`,
      'a="b" '.repeat(300_000),
    ])
      expect(typeof because(utf8(svg(content)))).toBe('string')
  }, 120_000)
})
