/** Shapes of formulas as KaTeX sets them, kept for every later use. */
import katex from 'katex'
import { type Tex, texSource } from '../base/tex.ts'
import { type CutTex, cutOutput, cutTex, placeholdersFor, wholeSource } from './slots.ts'

/** Output of KaTeX for a shape, cut at its slots. A slot may come more than once, and in another order than in the source. */
export interface Shape {
  readonly cuts: readonly string[]
  readonly order: readonly number[]
  /** Class attributes of the output, each once. */
  readonly classes: readonly string[]
  /** Set when KaTeX takes a slot apart, so that only its own output will do. */
  readonly whole: boolean
}

export type Form = 'inline' | 'display' | 'mathml'

export type Shapes = Map<string, Shape>

/** Shapes set so far; one cache may serve any number of pages. */
export interface ShapeCache {
  readonly inline: Shapes
  readonly display: Shapes
  readonly mathml: Shapes
  /** Shapes that were set before this run. */
  readonly prepared: Prepared
  /** What was set of each object, by how it was set. */
  readonly kept: WeakMap<object, Map<string, Kept>>
}

/** Something set, and the shapes in it. */
export interface Kept {
  readonly html: string
  readonly shapes: ReadonlySet<Shape>
}

export type Prepared = (form: Form, key: string) => Shape | undefined

export const createShapeCache = (prepared: Prepared = () => undefined): ShapeCache => ({
  inline: new Map(),
  display: new Map(),
  mathml: new Map(),
  prepared,
  kept: new WeakMap(),
})

/** The formula set through its shape. @param see is told the shape */
export function setFormula(tex: Tex, form: Form, cache: ShapeCache, see: (shape: Shape) => void): string {
  const cut = cutTex(tex)
  const shape = shapeOf(cut, form, cache)
  see(shape)
  if (!shape.whole) return fill(shape, cut.slots)
  const { source, put } = wholeSource(cut)
  return put(outputs[form](texSource(source)))
}

// Our own TeX is at fault if it does not parse, so KaTeX throws; `strict` would only write to the console.
// Marks around values are the one command that is trusted; no name of the engineer's reaches TeX as a command.
const trust = ({ command }: { readonly command: string }): boolean => command === '\\htmlData'
const common = { throwOnError: true, trust, strict: false } as const
const outputs: Readonly<Record<Form, (source: string) => string>> = {
  inline: source => katex.renderToString(source, { ...common, output: 'html', displayMode: false }),
  display: source => katex.renderToString(source, { ...common, output: 'html', displayMode: true }),
  mathml: source => katex.renderToString(source, { ...common, output: 'mathml' }),
}

function shapeOf(cut: CutTex, form: Form, cache: ShapeCache): Shape {
  const known = cache[form].get(cut.key)
  if (known !== undefined) return known
  const made = cache.prepared(form, cut.key) ?? makeShape(cut, form)
  cache[form].set(cut.key, made)
  return made
}

function fill({ cuts, order }: Shape, slots: readonly string[]): string {
  let out = cuts[0] ?? ''
  for (let i = 0; i < order.length; i++) out += (slots[order[i] ?? 0] ?? '') + (cuts[i + 1] ?? '')
  return out
}

function makeShape(cut: CutTex, form: Form): Shape {
  const source = texSource({ parts: cut.parts, slots: placeholdersFor(cut) })
  const { cuts, order } = cutOutput(outputs[form](source))
  // A placeholder that KaTeX took apart (an unbraced exponent, say) is missing; italic digits differ in measure.
  const whole = order.length !== cut.slots.length * (form === 'mathml' ? 2 : 1) || slanted.test(source)
  return { cuts, order, classes: form === 'mathml' ? [] : classesOf(cuts.join('')), whole }
}

const slanted = /\\(?:math(?!bf|rm)|text(?=it|sl|tt|sf)|boldsymbol|it\b)/

function classesOf(html: string): readonly string[] {
  return [...new Set(Array.from(html.matchAll(/class="([^"]*)"/g), match => match[1] ?? ''))]
}
