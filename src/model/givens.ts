/** Sorts the blocks of a document by what they are about. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { suggestion } from '../base/near.ts'
import type { Block } from '../read/block.ts'
import { diagnose } from '../read/text.ts'
import { checkedName } from './columns.ts'

export interface LevelGivens {
  readonly name: string
  readonly areas: readonly Block[]
  readonly lineLoads: readonly Block[]
  readonly pointLoads: readonly Block[]
  readonly walls: readonly Block[]
  readonly openings: readonly Block[]
  readonly forces: readonly Block[]
}

export interface Givens {
  readonly levels: readonly LevelGivens[]
  readonly grid: readonly Block[]
  readonly levelTable: readonly Block[]
  readonly constructions: readonly Block[]
  readonly equations: readonly Block[]
  readonly spectrum: readonly Block[]
  /** `forces` that name no level and hold a table of them. */
  readonly forceTables: readonly Block[]
  readonly faults: readonly Diagnostic[]
  /** Faults of blocks that found no level: what their level then lacks follows from them. */
  readonly strays: (topic: string) => readonly Diagnostic[]
}

const perLevel = ['areas', 'line-loads', 'point-loads', 'walls', 'openings', 'forces'] as const
const ONLY_LEVEL = 'level'

export function gather(blocks: readonly Block[]): Givens {
  const of = (topic: string) => blocks.filter(block => block.topic === topic)
  const faults = blocks.flatMap(({ faults }) => faults)
  const levelTable = of('levels')
  const about = (block: Block) => perLevel.some(topic => topic === block.topic) && !isForceTable(block)
  const named = blocks.filter(about)
  const listed = levelNames(levelTable)
  // Where the list of levels has faults of its own, they are the cause, not the blocks that name levels.
  const used = [...new Set(blocks.filter(about).flatMap(({ about }) => about?.text ?? []))]
  const names = levelTable.length === 0 ? [firstName(named, blocks)] : listed.length > 0 ? listed : used
  const strays = new Map<string, readonly Diagnostic[]>()
  for (const block of blocks.filter(block => about(block) || block.topic === 'working')) {
    const strange = strangeLevel(block, names)
    faults.push(...strange)
    strays.set(block.topic, [...(strays.get(block.topic) ?? []), ...strange])
  }
  const levels = names.map((name): LevelGivens => {
    const mine = named.filter(block => levelNameOf(block, names) === name)
    const on = (topic: string) => mine.filter(block => block.topic === topic)
    return {
      name,
      areas: on('areas'),
      lineLoads: on('line-loads'),
      pointLoads: on('point-loads'),
      walls: on('walls'),
      openings: on('openings'),
      forces: on('forces'),
    }
  })
  return {
    levels,
    grid: of('grid'),
    levelTable,
    constructions: of('construction'),
    equations: of('equations'),
    spectrum: of('spectrum'),
    forceTables: of('forces').filter(isForceTable),
    faults,
    strays: topic => strays.get(topic) ?? [],
  }
}

const isForceTable = (block: Block): boolean =>
  block.topic === 'forces' && block.about === undefined && block.table !== undefined

/** The level that a block is about: the one it names, or the only one there is. */
export function levelNameOf(block: Block, names: readonly string[]): string | undefined {
  if (block.about) return block.about.text
  return names.length === 1 ? names[0] : undefined
}

function firstName(named: readonly Block[], blocks: readonly Block[]): string {
  const first = named.find(({ about }) => about) ?? blocks.find(({ topic, about }) => topic === 'working' && about)
  return first?.about?.text ?? ONLY_LEVEL
}

function levelNames(levelTable: readonly Block[]): readonly string[] {
  const names = levelTable.flatMap(({ table }) => {
    const column = table?.header.findIndex(({ name }) => name.text === 'level') ?? -1
    return table?.rows.map(({ cells }) => cells[column]?.text ?? '') ?? []
  })
  return [...new Set(names.filter(name => name !== ''))]
}

function strangeLevel(block: Block, names: readonly string[]): readonly Diagnostic[] {
  const { about, info, topic } = block
  if (!about) {
    if (names.length <= 1 || topic === 'working') return []
    return [
      diagnose(
        'error',
        'level-missing',
        info,
        `${topic} does not say which level it is about`,
        `Write ${topic} ${names[0] ?? ''}. ${suggestion('', names, 'level')}`,
      ),
    ]
  }
  const checked = checkedName(about, 'level')
  if (!checked.ok) return checked.because
  if (names.includes(about.text)) return []
  return [
    diagnose(
      'error',
      'unknown-level',
      about.span,
      `there is no level ${about.text}`,
      suggestion(about.text, names, 'level'),
    ),
  ]
}
