/** Openings in the walls of a level: where they lie on the face of their wall, each inside it and clear of the others. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { all, type Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { unit, unitText } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import {
  type ColumnRules,
  duplicates,
  filled,
  nameIn,
  type RowOf,
  recordsOf,
  strangeLines,
  strangeSettings,
} from './columns.ts'
import type { Scope } from './scope.ts'
import type { Wall } from './walls.ts'

export interface Opening {
  readonly name: string
  readonly wall: string
  /** From the wall's start, the end of it that is written first. */
  readonly left: Value
  /** From the foot of the wall. */
  readonly sill: Value
  readonly width: Value
  readonly height: Value
  readonly span: Span
}

/** Lengths nearer than this, in m, are one length that was written in two ways. */
export const SAME = 1e-4

export const openingColumns: ColumnRules = {
  needed: ['wall', 'opening', 'left', 'sill', 'width', 'height'],
  optional: ['note'],
}

const symbols = {
  left: sym('l', '\\ell', 'length'),
  sill: sym('s', 's', 'length'),
  width: sym('b', 'b', 'length'),
  height: sym('h', 'h', 'length'),
} as const

type Column = keyof typeof symbols

interface Row {
  readonly name: Text
  readonly opening: Opening
  readonly wall: Wall
}

export function readOpenings(
  blocks: readonly Block[],
  level: string,
  walls: readonly Wall[],
  scope: Scope,
): Result<readonly Opening[]> {
  const read = blocks.flatMap(block => rowsOf(block).map(record => readRow(record, level, walls, scope)))
  const rows = read.flatMap(row => (row.ok ? [row.value] : []))
  const faults = walls.flatMap(wall => {
    const mine = rows.filter(row => row.wall === wall)
    const repeated = duplicates(
      mine.map(({ name }) => name),
      'opening',
    )
    const openings = mine.map(({ opening }) => opening)
    return [...repeated, ...openings.flatMap((one, i) => overlaps(one, openings.slice(0, i)))]
  })
  const done = all(read)
  if (!done.ok || faults.length > 0) return bad([...(done.ok ? [] : done.because), ...faults])
  return good(rows.map(({ opening }) => opening))
}

function rowsOf(block: Block): readonly Result<RowOf>[] {
  const records = recordsOf(block, openingColumns)
  const faults = [...strangeSettings(block, []), ...strangeLines(block), ...(records.ok ? [] : records.because)]
  if (faults.length > 0) return [bad(faults)]
  return records.ok ? records.value.map(record => good(record)) : []
}

function readRow(record: Result<RowOf>, level: string, walls: readonly Wall[], scope: Scope): Result<Row> {
  if (!record.ok) return record
  const [wall, name] = [wallOf(record.value, level, walls), nameIn(record.value, 'opening')]
  if (!wall.ok || !name.ok) return bad([...(wall.ok ? [] : wall.because), ...(name.ok ? [] : name.because)])
  const opening = readOpening(record.value, name.value.text, wall.value, level, scope)
  if (!opening.ok) return opening
  const outside = outsideWall(opening.value, wall.value, scope.display)
  return outside ? bad([outside]) : good({ name: name.value, opening: opening.value, wall: wall.value })
}

function wallOf(record: RowOf, level: string, walls: readonly Wall[]): Result<Wall> {
  const cell = filled(record, 'wall')
  if (!cell.ok) return cell
  const { text, span } = cell.value
  const found = walls.find(({ name }) => name === text)
  const names = walls.map(({ name }) => name)
  if (!found)
    return bad([
      diagnose('error', 'unknown-wall', span, `there is no wall ${text} at ${level}`, suggestion(text, names, 'wall')),
    ])
  if (!found.height)
    return bad([
      diagnose(
        'error',
        'height-missing',
        found.span,
        `wall ${text} has openings but no height`,
        'Give its height, so that they can be placed in it.',
        { also: [{ span, text: 'an opening of it' }] },
      ),
    ])
  return good(found)
}

function readOpening(record: RowOf, name: string, wall: Wall, level: string, scope: Scope): Result<Opening> {
  const about = `opening ${name} of wall ${wall.name}`
  const read = (column: Column): Result<Value> => {
    const cell = filled(record, column)
    if (!cell.ok) return cell
    const unit = record.unit(column)
    const value = quantity(
      cell.value,
      {
        id: `${level}.wall.${wall.name}.opening.${name}.${column}`,
        what: column,
        sym: symbols[column],
        tex: texAbout(symbols[column].tex, name),
        ...(unit ? { unit } : {}),
      },
      scope,
    )
    return column === 'left' || column === 'sill'
      ? value
      : aboveZero(value, cell.value.span, `the ${column} of ${about}`)
  }
  const [left, sill, width, height] = [read('left'), read('sill'), read('width'), read('height')]
  if (left.ok && sill.ok && width.ok && height.ok)
    return good({
      name,
      wall: wall.name,
      left: left.value,
      sill: sill.value,
      width: width.value,
      height: height.value,
      span: record.line.span,
    })
  return bad([left, sill, width, height].flatMap(part => (part.ok ? [] : part.because)))
}

/** The first way in which an opening leaves its wall. */
function outsideWall(opening: Opening, wall: Wall, display: Display): Diagnostic | undefined {
  const { left, sill, width, height } = opening
  const length = Math.hypot(wall.to.x.si - wall.from.x.si, wall.to.y.si - wall.from.y.si)
  const high = wall.height?.si ?? 0
  const print = (metres: number) => lengthText(metres, display)
  const [right, head] = [left.si + width.si, sill.si + height.si]
  const ways: readonly (readonly [boolean, string])[] = [
    [left.si < -SAME, `starts ${print(-left.si)} before wall ${wall.name}`],
    [right > length + SAME, `ends at ${print(right)}, and wall ${wall.name} is ${print(length)} long`],
    [sill.si < -SAME, `starts ${print(-sill.si)} below the foot of wall ${wall.name}`],
    [head > high + SAME, `has its head at ${print(head)}, and wall ${wall.name} is ${print(high)} high`],
  ]
  const found = ways.find(([is]) => is)
  return (
    found &&
    diagnose(
      'error',
      'opening-outside-wall',
      opening.span,
      `opening ${opening.name} ${found[1]}`,
      'An opening lies within its wall: left is measured from the wall’s start, and sill from its foot.',
      { also: [{ span: wall.span, text: wall.name }] },
    )
  )
}

function overlaps(one: Opening, before: readonly Opening[]): readonly Diagnostic[] {
  const other = before.find(
    each =>
      each.name !== one.name &&
      overlap(one.left.si, one.width.si, each.left.si, each.width.si) &&
      overlap(one.sill.si, one.height.si, each.sill.si, each.height.si),
  )
  if (!other) return []
  return [
    diagnose(
      'error',
      'openings-overlap',
      one.span,
      `openings ${other.name} and ${one.name} of wall ${one.wall} overlap`,
      'Move one of them, or state one opening for both.',
      { also: [{ span: other.span, text: other.name }] },
    ),
  ]
}

const overlap = (a: number, width: number, b: number, other: number): boolean =>
  Math.min(a + width, b + other) - Math.max(a, b) > SAME

function lengthText(metres: number, { system }: Display): string {
  const shown = unit(system === 'US' ? 'ft' : 'm')
  return `${(metres / shown.scale).toFixed(2)} ${unitText(shown)}`
}
