import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { Field } from '../../src/draw/field.ts'
import { type Box, box, boxesMeet, cut, sidesOf } from '../../src/draw/geometry.ts'
import { lettering, letteringBox, readableAngle } from '../../src/draw/label.ts'
import { labelSpot, place, placePair } from '../../src/draw/placement.ts'
import { drawScaleBar, roundLength } from '../../src/draw/scalebar.ts'
import { element, formatNumber, serialise } from '../../src/draw/scene.ts'
import { spread } from '../../src/draw/spread.ts'
import { arrangeStems } from '../../src/draw/stems.ts'
import { shorten, textWidth, wrap } from '../../src/draw/textwidth.ts'
import { contains } from '../../src/model/geometry.ts'
import { readXml } from './reading.ts'

const style = { size: 12, weight: 'plain' } as const
const near = (max: number): fc.Arbitrary<number> => fc.double({ min: -max, max, noNaN: true })

describe('the serialiser', () => {
  test('escapes any text and any attribute so that they read back the same', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', minLength: 1 }), text => {
        const back = readXml(serialise(element('text', { class: text }, [text])))
        expect(back).toEqual({ tag: 'text', attributes: { class: text }, children: [text] })
      }),
    )
  })
  test('replaces characters that XML cannot hold', () => {
    expect(serialise('a\u0000b\u001fc\ud800d\uffff\te')).toBe('a\ufffdb\ufffdc\ufffdd\ufffd\te')
  })
  test('rounds numbers to a thousandth and knows no negative zero', () => {
    expect([1 / 3, -0.0004, 12, 1e5 + 0.12345].map(formatNumber)).toEqual(['0.333', '0', '12', '100000.123'])
  })
})

describe('a text', () => {
  test('that fits is left alone, and one that does not fits once shortened', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'grapheme', minLength: 1, maxLength: 64 }),
        fc.integer({ min: 30, max: 200 }),
        (text, room) => {
          const fitted = shorten(text, style, room)
          expect(textWidth(fitted.text, style)).toBeLessThanOrEqual(room)
          expect(fitted.full ?? fitted.text).toBe(text)
        },
      ),
    )
  })
  test('is not cut between a letter and its mark', () => {
    const text = 'e\u0301'.repeat(40)
    expect(shorten(text, style, 60).text).toMatch(/^(e\u0301)+…$/)
  })
  test('breaks into lines that hold all its words', () => {
    const text = 'Stair and lift lobby of the northern water tower'
    const lines = wrap(text, style, 90)
    expect(lines.length).toBeGreaterThan(2)
    expect(lines.join(' ')).toBe(text)
    expect(lines.filter(line => textWidth(line, style) > 90)).toEqual([])
  })
})

describe('boxes', () => {
  const boxes: fc.Arbitrary<Box> = fc
    .record({
      x: near(40),
      y: near(40),
      w: fc.double({ min: 1, max: 60, noNaN: true }),
      h: fc.double({ min: 1, max: 20, noNaN: true }),
      angle: near(4),
    })
    .map(({ x, y, w, h, angle }) => box({ x, y }, w, h, angle))

  test('meet when a point lies in both', () => {
    const holds = (b: Box, x: number, y: number): boolean => {
      const [dx, dy] = [x - b.at.x, y - b.at.y]
      const along = dx * Math.cos(b.angle) + dy * Math.sin(b.angle)
      const across = dy * Math.cos(b.angle) - dx * Math.sin(b.angle)
      return Math.abs(along) < b.halfWidth - 0.01 && Math.abs(across) < b.halfHeight - 0.01
    }
    fc.assert(
      fc.property(boxes, boxes, (a, b) => {
        let shared = false
        for (let x = -80; x <= 80; x += 2)
          for (let y = -80; y <= 80; y += 2) shared ||= holds(a, x, y) && holds(b, x, y)
        expect(boxesMeet(a, b)).toBe(boxesMeet(b, a))
        if (shared) expect(boxesMeet(a, b)).toBe(true)
      }),
      { numRuns: 60 },
    )
  })
  test('the field finds every box that a look at all of them finds', () => {
    fc.assert(
      fc.property(fc.array(boxes, { maxLength: 20 }), boxes, (taken, asked) => {
        const field = new Field(-1000, 1000)
        for (const each of taken) field.addText(each)
        expect(field.price(asked) > 0).toBe(taken.some(each => boxesMeet(each, asked)))
      }),
    )
  })
})

test('labels of things on top of each other never overlap, and are all placed', () => {
  const things = fc.array(fc.record({ x: fc.integer({ min: 30, max: 170 }), y: fc.integer({ min: 0, max: 60 }) }), {
    maxLength: 60,
  })
  fc.assert(
    fc.property(things, points => {
      const field = new Field(0, 200)
      const set: Box[] = []
      for (const at of points) {
        const letters = lettering('wall', 100, 'W12')
        const spot = (p: typeof at): ReturnType<typeof labelSpot> => ({
          ...labelSpot(letters, p, 0, 0),
          draw: () => {
            set.push(letteringBox(letters, p))
            return []
          },
        })
        expect(
          place({ field, groundAt: () => 'paper', farthest: 6000 }, { near: [spot(at)], anchors: [at], free: spot }),
        ).toBeDefined()
      }
      expect(set).toHaveLength(points.length)
      expect(set.filter((a, idx) => set.some((b, other) => other > idx && boxesMeet(a, b)))).toEqual([])
    }),
    { numRuns: 30 },
  )
})

test('a label that would lie on other text is taken off by a leader, and the leader shows', () => {
  const field = new Field(0, 200)
  const at = { x: 100, y: 100 }
  field.addText(box(at, 60, 20))
  const letters = lettering('wall', 100, 'W1')
  const nodes = place(
    { field, groundAt: () => 'paper', farthest: 600 },
    { near: [labelSpot(letters, at, 0, 0)], anchors: [at], free: p => labelSpot(letters, p, 0, 0) },
  )
  expect(nodes?.map(node => (typeof node === 'string' ? node : node.attributes.class))).toContain('pm-leader')
  expect(
    place(
      { field, groundAt: () => 'paper', farthest: 0 },
      { near: [labelSpot(letters, at, 0, 0)], anchors: [at], free: p => labelSpot(letters, p, 0, 0) },
    ),
  ).toBeUndefined()
})

test('two labels of one thing are set so that both stand beside it, though the first would rather have the only place of the second', () => {
  const field = new Field(0, 200)
  const letters = lettering('wall', 100, 'W1')
  const set: string[] = []
  const spot = (name: string, x: number, price: number): ReturnType<typeof labelSpot> => ({
    ...labelSpot(letters, { x, y: 0 }, 0, price),
    draw: () => {
      set.push(`${name} at ${x}`)
      return []
    },
  })
  const placing = (name: string, ...near: ReturnType<typeof labelSpot>[]): Parameters<typeof place>[1] => ({
    near,
    anchors: [{ x: 100, y: 0 }],
    free: ({ x }) => spot(name, x, 0),
  })
  const first = placing('first', spot('first', 60, 0), spot('first', 140, 4))
  placePair({ field, groundAt: () => 'paper', farthest: 0 }, first, placing('second', spot('second', 60, 0)))
  expect(set).toEqual(['first at 140', 'second at 60'])
})

describe('places along a line', () => {
  const wanted = fc
    .array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 1, maxLength: 12 })
    .map(each => [...each].sort((a, b) => a - b))

  test('keep their gaps and their order, and stay where they are when they can', () => {
    fc.assert(
      fc.property(wanted, fc.double({ min: 0, max: 9, noNaN: true }), (places, gap) => {
        const out = spread(
          places,
          places.slice(1).map(() => gap),
          -20,
          120,
        )
        for (const [idx, at] of out.slice(1).entries()) expect(at - (out[idx] ?? 0)).toBeGreaterThanOrEqual(gap - 1e-9)
        expect(Math.min(...out)).toBeGreaterThanOrEqual(-20 - 1e-9)
        expect(Math.max(...out)).toBeLessThanOrEqual(120 + 1e-9)
        const loose = places.every((at, idx) => idx === 0 || at - (places[idx - 1] ?? 0) >= gap)
        if (loose) for (const [idx, at] of out.entries()) expect(at).toBeCloseTo(places[idx] ?? 0, 6)
      }),
    )
  })
  test('move to either side of a crowd alike', () => {
    expect(spread([50, 50, 50], [10, 10], 0, 100)).toEqual([40, 50, 60])
  })
})

test('bubbles of close grid lines take turns in rows, and no stem runs through a bubble', () => {
  const stops = [0, 14, 28, 42, 120].map((at, idx) => ({ at, metres: at, name: `${idx}` }))
  const stems = arrangeStems(stops, { bubble: 21, gaps: [0, 0, 0, 0], low: -20, high: 140 }) ?? []
  expect(stems.map(({ row }) => row)).toEqual([0, 1, 0, 1, 0])
  expect(stems.map(({ place: at }) => Math.round(at))).toEqual([0, 14, 28, 42, 120])
  expect(arrangeStems(stops, { bubble: 21, gaps: [0, 0, 0, 0], low: 0, high: 20 })).toBeDefined()
  const tight = stops.map(stop => ({ ...stop, at: stop.at / 20 }))
  expect(arrangeStems(tight, { bubble: 21, gaps: [0, 0, 0, 0], low: 0, high: 20 })).toBeUndefined()
})

describe('areas', () => {
  const square = [
    { x: 0, y: 0 },
    { x: 10, y: 0 },
    { x: 10, y: 10 },
    { x: 0, y: 10 },
  ]

  test('hold the points within their sides', () => {
    expect(contains(square, { x: 5, y: 5 })).toBe(true)
    expect(contains(square, { x: 15, y: 5 })).toBe(false)
  })
  test('have their sides cut where a neighbour begins and ends', () => {
    const pieces = cut(
      { a: { x: 10, y: 0 }, b: { x: 10, y: 10 } },
      sidesOf([
        { x: 10, y: 2 },
        { x: 14, y: 2 },
        { x: 14, y: 7 },
        { x: 10, y: 7 },
      ]),
    )
    expect(pieces.map(({ a, b }) => [a.y, b.y].map(formatNumber))).toEqual([
      ['0', '2'],
      ['2', '7'],
      ['7', '10'],
    ])
  })
})

describe('the scale bar', () => {
  test('has a length of 1, 2 or 5 times a power of ten', () => {
    expect([0.9, 1, 3, 7.2, 10, 49, 120, 0.034].map(roundLength)).toEqual([0.5, 1, 2, 5, 10, 20, 100, 0.02])
  })
  test('is between 60 and 150 long at any scale', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e4, noNaN: true }), scale => {
        const drawn = drawScaleBar({ x: 0, y: 0 }, scale, '', 'en-GB').width
        expect(drawn).toBeGreaterThan(55)
        expect(drawn).toBeLessThan(190)
      }),
    )
  })
  test('prints its lengths in the language of the document', () => {
    const texts = drawScaleBar({ x: 0, y: 0 }, 1 / 500, 'ft', 'en-US')
      .nodes.map(serialise)
      .join('')
    expect(texts).toContain('>50,000 ft<')
    expect(texts).toContain('>25,000<')
  })
})

test('a text along a line never stands on its head', () => {
  for (let angle = -10; angle < 10; angle += 0.1) {
    const set = readableAngle(angle)
    expect(Math.abs(Math.sin(set - angle))).toBeLessThan(1e-9)
    expect(Math.cos(set)).toBeGreaterThan(Math.cos((105 * Math.PI) / 180) - 1e-9)
  }
  expect(readableAngle(Math.PI / 2)).toBeCloseTo(-Math.PI / 2, 12)
  expect(readableAngle(Math.PI)).toBe(0)
})
