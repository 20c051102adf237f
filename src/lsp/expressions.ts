/** The names in an expression and in a point, each time they stand there and with their places. */
import type { Expr } from '../base/expr.ts'
import { parseExpr } from '../base/parse.ts'
import { formOfPoint, lineOfCoordinate } from '../model/grid.ts'
import { part, type Text, trimmed } from '../read/text.ts'

/** Every use of a name, unlike `namesIn`, which tells of the first; undefined where the text cannot be read. */
export function namesOf({ text, span }: Text): readonly Text[] | undefined {
  const parsed = parseExpr(text, span.start)
  return parsed.ok ? uses(parsed.value, text, span.start) : undefined
}

/** Walks with a list of its own: a chain of a thousand signs is a tree as deep. */
function uses(expr: Expr, text: string, offset: number): readonly Text[] {
  const found: Text[] = []
  const waiting: Expr[] = [expr]
  for (let next = waiting.pop(); next; next = waiting.pop())
    switch (next.kind) {
      case 'number':
      case 'quantity':
        break
      case 'name': {
        // The place of a name in brackets is that of the brackets, which hold nothing else.
        const start = text.indexOf(next.name, next.span.start - offset) + offset
        found.push({ text: next.name, span: { start, end: start + next.name.length } })
        break
      }
      case 'negate':
        waiting.push(next.of)
        break
      case 'binary':
        waiting.push(next.right, next.left)
        break
      case 'call':
        waiting.push(...[...next.args].reverse())
    }
  return found
}

/** True for an id that an expression can hold. */
export function readsAsName(id: string): boolean {
  const read = parseExpr(id)
  return read.ok && read.value.kind === 'name' && read.value.name === id
}

/** Names of the grid lines along each axis. */
export interface LineNames {
  readonly x: readonly { readonly name: string }[]
  readonly y: readonly { readonly name: string }[]
}

/** What a point names. */
export interface PointNames {
  readonly lines: readonly Text[]
  readonly names: readonly Text[]
}

/** What stands in the cell of a point, read as `readPoint` reads it. */
export function inPoint(cell: Text, grid: LineNames): PointNames | undefined {
  const form = formOfPoint(cell)
  switch (form.kind) {
    case 'strange':
      return undefined
    case 'pair': {
      const [x, y] = [inCoordinate(form.x, grid.x), inCoordinate(form.y, grid.y)]
      return x && y && { lines: [...x.lines, ...y.lines], names: [...x.names, ...y.names] }
    }
    case 'crossing': {
      const [crossing, another] = grid.x.flatMap(a =>
        grid.y.flatMap(b => (a.name + b.name === cell.text ? [a.name.length] : [])),
      )
      if (crossing === undefined || another !== undefined) return undefined
      return { lines: [part(cell, 0, crossing), part(cell, crossing)], names: [] }
    }
  }
}

function inCoordinate(cell: Text, lines: LineNames['x']): PointNames | undefined {
  const line = lineOfCoordinate(cell, lines)
  if (!line) {
    const names = namesOf(cell)
    return names && { lines: [], names }
  }
  const name = part(cell, 0, line.name.length)
  const rest = trimmed(part(cell, line.name.length))
  if (rest.text === '') return { lines: [name], names: [] }
  // Read as the model reads it, with a stand-in for the line, which is no name of the document.
  const names = namesOf({ text: `_${rest.text}`, span: { start: rest.span.start - 1, end: rest.span.end } })
  return names && { lines: [name], names: names.filter(({ text }) => text !== '_') }
}
