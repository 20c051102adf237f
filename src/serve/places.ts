/** From a number or a block of the page to its place in the source, and back. */
import type { RootContent } from 'mdast'
import { offsetOf, type Position, positionAt, positionOf, type Source, type Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import type { Compiled } from '../compile.ts'
import type { Piece } from '../explain/sheet.ts'
import { everyValue } from '../explain/trace.ts'
import { ownSpans } from '../explain/traced.ts'
import { isWord } from '../model/scope.ts'
import type { Place } from './message.ts'

/** Where the source says what a place of the page shows; undefined where it cannot be told. */
export function positionFor(compiled: Compiled, { id, line, block, part }: Place): Position | undefined {
  const { source } = compiled
  if (id !== undefined) {
    const span = spanOf(valueById(compiled, id))
    if (span) return positionOf(source, span.start)
  }
  if (line !== undefined && Number.isInteger(line) && line >= 1 && line <= source.lineStarts.length)
    return { line, column: 1 }
  const start = block === undefined ? undefined : startsOf(compiled)[block]?.(part ?? 0)
  return start === undefined ? undefined : positionAt(source, start)
}

function valueById({ context, scope }: Compiled, id: string): Value | undefined {
  const known = context.roots.get(id) ?? context.besides.get(id)
  if (known) return known
  const looked = scope.lookup(id)
  if (looked?.ok && !isWord(looked.value)) return looked.value
  return everyValue([...context.besides.values(), ...context.roots.values()]).find(value => value.id === id)
}

/** Where the engineer wrote it, or else the nearest value that it rests on. */
function spanOf(value: Value | undefined): Span | undefined {
  const seen = new Set<Value>()
  let ring = value ? [value] : []
  while (ring.length > 0) {
    const next: Value[] = []
    for (const { origin } of ring) {
      const [own] = ownSpans(origin)
      if (own) return own
      if (origin.kind !== 'worked') continue
      for (const input of origin.step.inputs.values()) {
        if (!seen.has(input)) next.push(input)
        seen.add(input)
      }
    }
    ring = next
  }
  return undefined
}

/** The block of the page that a line of the source became: the last that begins at or before it. */
export function blockAt(compiled: Compiled, line: number, blocks: number): number | undefined {
  const starts = startsOf(compiled)
  // The page and this list are made apart; where they do not agree nothing is pointed at.
  if (starts.length !== blocks) return undefined
  const end = lineEnd(compiled.source, line)
  let found: number | undefined
  let nearest = -1
  starts.forEach((startOf, i) => {
    const start = startOf(0)
    if (start !== undefined && start < end && start >= nearest) {
      nearest = start
      found = i
    }
  })
  return found
}

const lineEnd = ({ text, lineStarts }: Source, line: number): number => lineStarts[line] ?? text.length + 1

/** Offset in the source of each block of the page, and of a part of it. */
type Start = (part: number) => number | undefined

/** One for each block, as the page sets them: checks that follow each other share one. */
function startsOf(compiled: Compiled): readonly Start[] {
  const { parts, source } = compiled
  const starts: Start[] = []
  let inChecks = false
  for (const part of parts) {
    if (part.kind === 'prose') {
      inChecks = false
      const shown = part.nodes.filter(isShown)
      starts.push(at => {
        const place = (shown[at] ?? shown[0])?.position?.start.offset
        return place === undefined ? undefined : offsetOf(source, place)
      })
      continue
    }
    for (const piece of part.pieces) {
      if (piece.kind === 'check' && inChecks) continue
      inChecks = piece.kind === 'check'
      starts.push(() => startOfPiece(piece, compiled))
    }
  }
  return starts
}

const isShown = ({ type }: RootContent): boolean =>
  type !== 'definition' && type !== 'footnoteDefinition' && type !== 'yaml' && type !== 'html'

function startOfPiece(piece: Piece, { context, source }: Compiled): number | undefined {
  const offset = (span: Span | undefined) => span && offsetOf(source, span.start)
  if (piece.kind === 'fault') return offset(piece.diagnostics[0]?.at.span)
  if (piece.kind === 'table') {
    // What was given tells the line of its block; any other table tells the lines that it rests on.
    const [line] = piece.id.startsWith('given.') ? piece.sourceLines : []
    return line === undefined
      ? firstPlace(piece.rows.flatMap(({ places }) => places?.map(place => offsetOf(source, place.start)) ?? []))
      : source.lineStarts[line - 1]
  }
  const value = 'id' in piece ? context.roots.get(piece.id) : undefined
  return value && offset(ownSpans(value.origin)[0])
}

const firstPlace = (offsets: readonly number[]): number | undefined =>
  offsets.length === 0 ? undefined : Math.min(...offsets)
