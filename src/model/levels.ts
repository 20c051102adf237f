/** The levels, from the top down. */
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { quantity } from './cell.ts'
import { duplicates, filled, nameIn, recordsOf, settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'

export interface LevelLine {
  readonly name: string
  /** Height of the diaphragm above the base. */
  readonly elevation?: Value
}

const elevation = sym('z', 'z', 'length')

/** Sorted from the highest down; one level without an elevation when the document states none. */
export function readLevels(blocks: readonly Block[], onlyName: string, scope: Scope): Result<readonly LevelLine[]> {
  const [block, second] = blocks
  if (!block) return good([{ name: onlyName }])
  if (second)
    return bad([
      diagnose('error', 'levels-repeated', second.info, 'the levels are given twice', 'Put them in one table.', {
        also: [{ span: block.info, text: 'first here' }],
      }),
    ])
  const walls = settingOf(block, 'walls')
  const faults = [...strangeSettings(block, ['walls']), ...strangeLines(block)]
  if (walls && walls.text !== 'storey by storey' && walls.text !== 'story by story')
    faults.push(
      diagnose(
        'error',
        'walls-continuous',
        walls.span,
        `walls ${walls.text} are not worked by this version`,
        'Walls are worked storey by storey.',
      ),
    )
  const records = recordsOf(block, { needed: ['level', 'elevation'], optional: [] })
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
    return value.ok ? good({ name: name.value.text, elevation: value.value }) : value
  })
  const repeated = duplicates(names, 'level')
  const read = all(lines)
  if (!read.ok || repeated.length > 0) return bad([...repeated, ...(read.ok ? [] : read.because)])
  return good([...read.value].sort((a, b) => (b.elevation?.si ?? 0) - (a.elevation?.si ?? 0)))
}
