/** The levels, from the top down. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
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
  recordsOf,
  settingOf,
  strangeLines,
  strangeSettings,
} from './columns.ts'
import type { Scope } from './scope.ts'

export interface LevelLine {
  readonly name: string
  /** Height of the diaphragm above the base. */
  readonly elevation?: Value
  readonly span: Span
}

export const levelColumns: ColumnRules = { needed: ['level', 'elevation'], optional: [] }
export const levelSettings: readonly string[] = ['walls']

/** How walls of one name on successive levels stand together. */
export type WallModel = 'storey by storey' | 'continuous'

const wallModels: ReadonlyMap<string, WallModel> = new Map([
  ['storey by storey', 'storey by storey'],
  ['story by story', 'storey by storey'],
  ['continuous', 'continuous'],
])

/** All spellings of the models. */
export const levelWalls: readonly string[] = [...wallModels.keys()]

/** The model that the levels ask for; what cannot be read is told with the levels. */
export function readWallModel([block]: readonly Block[]): WallModel {
  return (block && wallModels.get(settingOf(block, 'walls')?.text ?? '')) ?? 'storey by storey'
}

const elevation = sym('z', 'z', 'length')

/** Sorted from the highest down; one level without an elevation when the document states none. */
export function readLevels(blocks: readonly Block[], onlyName: string, scope: Scope): Result<readonly LevelLine[]> {
  const [block, second] = blocks
  if (!block) return good([{ name: onlyName, span: { start: 0, end: 0 } }])
  if (second)
    return bad([
      diagnose('error', 'levels-repeated', second.info, 'the levels are given twice', 'Put them in one table.', {
        also: [{ span: block.info, text: 'first here' }],
      }),
    ])
  const walls = settingOf(block, 'walls')
  const faults = [...strangeSettings(block, levelSettings), ...strangeLines(block)]
  if (walls && !wallModels.has(walls.text))
    faults.push(
      diagnose(
        'error',
        'unknown-wall-model',
        walls.span,
        `walls cannot be ${walls.text}`,
        'Write walls: storey by storey (each storey on its own) or walls: continuous (walls of one name are one cantilever).',
      ),
    )
  const records = recordsOf(block, levelColumns)
  if (!records.ok || faults.length > 0) return bad([...faults, ...(records.ok ? [] : records.because)])
  const names: Text[] = []
  const lines = records.value.map((record): Result<LevelLine> => {
    const name = nameIn(record, 'level')
    const cell = filled(record, 'elevation')
    if (!name.ok) return name
    if (!cell.ok) return cell
    names.push(name.value)
    const unit = record.unit('elevation')
    const value = quantity(
      cell.value,
      {
        id: `${name.value.text}.elevation`,
        what: 'elevation',
        sym: elevation,
        tex: texAbout('z', name.value.text),
        ...(unit ? { unit } : {}),
      },
      scope,
    )
    const above = aboveZero(value, cell.value.span, `the elevation of ${name.value.text}`)
    return above.ok ? good({ name: name.value.text, elevation: above.value, span: cell.value.span }) : above
  })
  const repeated = duplicates(names, 'level')
  const read = all(lines)
  const level = read.ok ? sameElevation(read.value) : []
  if (!read.ok || repeated.length > 0 || level.length > 0)
    return bad([...repeated, ...level, ...(read.ok ? [] : read.because)])
  return good([...read.value].sort((a, b) => (b.elevation?.si ?? 0) - (a.elevation?.si ?? 0)))
}

/** Two diaphragms at one height have no storey between them, and no order. */
function sameElevation(lines: readonly LevelLine[]): readonly Diagnostic[] {
  return lines.flatMap((line, i) => {
    const before = lines.slice(0, i).find(({ elevation }) => elevation?.si === line.elevation?.si)
    if (!before) return []
    return [
      diagnose(
        'error',
        'levels-at-one-height',
        line.span,
        `levels ${before.name} and ${line.name} have the same elevation`,
        'Areas at one height that move together are one level.',
        { also: [{ span: before.span, text: before.name }] },
      ),
    ]
  })
}
