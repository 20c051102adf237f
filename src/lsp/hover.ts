/** What is told of the place that a reader points at. */
import { inText, type Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import { everyValue } from '../explain/trace.ts'
import { ownSpans } from '../explain/traced.ts'
import { cellAt, within } from './cells.ts'
import type { Mention } from './names.ts'
import type { Opened } from './opened.ts'
import { mentionAt } from './rename.ts'
import { inFull, inShort } from './tell.ts'

export interface Told {
  readonly span: Span
  /** A sentence of prose, where there is one. */
  readonly says: string
  /** Lines to be set as they are. */
  readonly lines: readonly string[]
}

/** Undefined where there is nothing of ours to tell of. */
export function toldAt(document: Opened, offset: number): Told | undefined {
  const cell = cellAt(document, offset)
  if (cell?.kind === 'word') return { span: cell.span, says: cell.says, lines: [] }
  const id = document.names().ids.find(({ span }) => within(span, offset))
  if (id) {
    const lines = valueLines(document, id.id)
    if (lines) return { span: id.span, says: '', lines }
  }
  const mention = mentionAt(document.names(), offset)
  const about = mention && linesAbout(document, mention)
  if (mention && about) return { span: mention.span, says: '', lines: about }
  if (cell) {
    const lines = cell.id === undefined ? undefined : valueLines(document, cell.id)
    return { span: cell.text.span, says: cell.field.says, lines: lines ?? writtenAt(document, offset) }
  }
  return undefined
}

function valueLines(document: Opened, id: string): readonly string[] | undefined {
  const compiled = document.compiled()
  const found = compiled.scope.lookup(id)
  return found && inFull(id, found, compiled)
}

/** The value whose own place is the shortest around an offset, among those that are printed and what they rest on. */
function writtenAt(document: Opened, offset: number): readonly string[] {
  const compiled = document.compiled()
  const { context, source } = compiled
  let best: { readonly value: Value; readonly length: number } | undefined
  for (const value of everyValue([...context.besides.values(), ...context.roots.values()]))
    for (const span of ownSpans(value.origin).map(own => inText(source, own)))
      if (within(span, offset) && span.end - span.start < (best?.length ?? Number.POSITIVE_INFINITY))
        best = { value, length: span.end - span.start }
  return best ? inFull(best.value.id, { ok: true, value: best.value }, compiled) : []
}

const ofWall = ['k', 'L', 'h', 'V', 'v', 'case']
const ofLevel = [
  'elevation',
  'W',
  'area',
  'CM.x',
  'CM.y',
  'CR.x',
  'CR.y',
  'J',
  'force.x',
  'force.y',
  'governing.wall',
  'governing.V',
]
const ofConstruction = ['t', 'E', 'G', 'nu', "f'c", "f'm"]

/** The main values of a named thing, those that are there; undefined for a thing that has none. */
function linesAbout(document: Opened, { sort, name, of }: Mention): readonly string[] | undefined {
  switch (sort) {
    case 'equation':
      return valueLines(document, name)
    case 'line':
      return valueLines(document, `grid.${name}`)
    case 'wall':
      return known(
        document,
        ofWall.map(key => `${of}.wall.${name}.${key}`),
      )
    case 'level':
      return known(
        document,
        ofLevel.map(key => `${name}.${key}`),
      )
    case 'construction':
      return known(
        document,
        ofConstruction.map(key => `constructions.${name}.${key}`),
      )
    case 'area':
      return known(
        document,
        ['w', 'A', 'W', 'x', 'y'].map(key => `${of}.areas.${name}.${key}`),
      )
    case 'line load':
      return known(
        document,
        ['w', 'L', 'W'].map(key => `${of}.lines.${name}.${key}`),
      )
    case 'point load':
      return known(document, [`${of}.points.${name}.W`])
    case 'opening': {
      const [level = '', wall = ''] = of.split('.')
      return known(
        document,
        ['left', 'sill', 'width', 'height'].map(key => `${level}.wall.${wall}.opening.${name}.${key}`),
      )
    }
  }
}

/** A value that cannot be worked is left out: its own place says why. */
function known(document: Opened, ids: readonly string[]): readonly string[] | undefined {
  const compiled = document.compiled()
  const lines = ids.flatMap(id => {
    const found = compiled.scope.lookup(id)
    return found?.ok ? [`${id} = ${inShort(found, compiled)}`] : []
  })
  return lines.length > 0 ? lines : undefined
}
