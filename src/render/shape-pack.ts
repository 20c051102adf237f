/**
 * Shapes of formulas as one text, which a later run reads in place of setting them. Formulas are made
 * of the same few tags, so each distinct piece of markup is kept once; a shape is unpacked when asked for.
 */
import type { Form, Prepared, Shape, ShapeCache, Shapes } from './shapes.ts'

interface Pack {
  readonly pieces: readonly string[]
  /** Where each shape stands in the body, by form and key. */
  readonly places: Readonly<Record<Form, Readonly<Record<string, readonly [start: number, end: number]>>>>
}

/** A shape whose texts are lists of pieces, by their numbers. */
interface Packed {
  readonly cuts: readonly (readonly number[])[]
  readonly order: readonly number[]
  readonly classes: readonly number[]
  readonly whole: boolean
}

/** All shapes of a cache in ASCII: the pack on the first line, the body after it. */
export function packShapes({ inline, display, mathml }: ShapeCache): string {
  const pieces = new Map<string, number>()
  const numberOf = (piece: string): number => {
    const known = pieces.get(piece) ?? pieces.size
    pieces.set(piece, known)
    return known
  }
  let body = ''
  const place = ({ cuts, order, classes, whole }: Shape): readonly [number, number] => {
    const packed: Packed = {
      cuts: cuts.map(cut => cut.split(/(?=<)/).map(numberOf)),
      order,
      classes: classes.map(numberOf),
      whole,
    }
    const start = body.length
    body += JSON.stringify(packed)
    return [start, body.length]
  }
  const placed = (shapes: Shapes) => Object.fromEntries(Array.from(shapes, ([key, shape]) => [key, place(shape)]))
  const places = { inline: placed(inline), display: placed(display), mathml: placed(mathml) }
  const pack: Pack = { pieces: [...pieces.keys()], places }
  return `${ascii(JSON.stringify(pack))}\n${body}`
}

const ascii = (json: string): string =>
  json.replace(/[\u0080-\uffff]/g, unit => `\\u${unit.charCodeAt(0).toString(16).padStart(4, '0')}`)

/** @param text what `packShapes` of this same build gave */
export function unpackShapes(text: string): Prepared {
  const bodyStart = text.indexOf('\n') + 1
  const { pieces, places } = JSON.parse(text.slice(0, bodyStart)) as Pack
  const piece = (number: number): string => pieces[number] ?? ''
  return (form, key) => {
    const place = Object.hasOwn(places[form], key) ? places[form][key] : undefined
    if (place === undefined) return undefined
    const packed = JSON.parse(text.slice(bodyStart + place[0], bodyStart + place[1])) as Packed
    return {
      ...packed,
      cuts: packed.cuts.map(cut => cut.map(piece).join('')),
      classes: packed.classes.map(piece),
    }
  }
}
