/** Sorts the blocks of a document by what they are about. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Cell, Ledger } from '../base/ledger.ts'
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
  readonly wind: readonly Block[]
  readonly equations: readonly Block[]
  readonly seismic: readonly Block[]
  readonly spectrum: readonly Block[]
  /** `forces` that name no level and hold a table of them. */
  readonly forceTables: readonly Block[]
  readonly faults: readonly Diagnostic[]
  /** Faults of blocks that found no level: what their level then lacks follows from them. */
  readonly strays: (topic: string) => readonly Diagnostic[]
}

/** Topics of which a block is about one level. */
export const perLevel = ['areas', 'line-loads', 'point-loads', 'walls', 'openings', 'forces'] as const
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
    wind: of('wind'),
    equations: of('equations'),
    seismic: of('seismic'),
    spectrum: of('spectrum'),
    forceTables: of('forces').filter(isForceTable),
    faults,
    strays: topic => strays.get(topic) ?? [],
  }
}

const isForceTable = (block: Block): boolean =>
  block.topic === 'forces' && block.about === undefined && block.table !== undefined

/** Givens whose blocks may be replaced by others of the same topic, level and place. */
export interface LiveGivens extends Givens {
  /** A block of `constructions`, without a look at the others. */
  readonly constructionAt: (index: number) => Block | undefined
  /** @returns false when the building has other parts than before, so that its worksheet must be laid out anew */
  readonly replace: (next: Givens) => boolean
}

/** What reads a block of these givens is worked again when it is replaced. */
export function liveGivens(first: Givens, ledger: Ledger): LiveGivens {
  let now = first
  const cellOf = (blocks: readonly Block[]) => ledger.cell(blocks, sameItems)
  const shared = sharedParts.map(part => [part, cellOf(first[part])] as const)
  const constructions = first.constructions.map(block => ledger.cell(block))
  const levels = first.levels.map(level => levelParts.map(part => [part, cellOf(level[part])] as const))
  const constructionAt = (index: number) => constructions[index]?.get()
  const others = {
    levels: levels.map((parts, i) => withParts({ name: first.levels[i]?.name ?? '' }, parts)),
    get constructions() {
      return constructions.flatMap((_, i) => constructionAt(i) ?? [])
    },
    constructionAt,
    // Equations are taken line by line, and of a building with faults nothing is kept.
    get equations() {
      return now.equations
    },
    get faults() {
      return now.faults
    },
    strays: (topic: string) => now.strays(topic),
    replace: (next: Givens) => {
      if (next.faults.length > 0 || structureOf(next) !== structureOf(now)) return false
      now = next
      for (const [part, cell] of shared) cell.set(next[part])
      for (const [i, cell] of constructions.entries()) {
        const block = next.constructions[i]
        if (block) cell.set(block)
      }
      for (const [i, parts] of levels.entries())
        for (const [part, cell] of parts) cell.set(next.levels[i]?.[part] ?? [])
      return true
    },
  }
  return withParts(others, shared)
}

const sharedParts = ['grid', 'levelTable', 'forceTables', 'seismic', 'wind', 'spectrum'] as const
const levelParts = ['areas', 'lineLoads', 'pointLoads', 'walls', 'openings', 'forces'] as const

/** The same object with each part as a property that reads its cell. */
function withParts<O extends object, P extends string, T>(
  object: O,
  parts: readonly (readonly [P, Cell<T>])[],
): O & { readonly [K in P]: T } {
  const properties = parts.map(([part, { get }]) => [part, { get, enumerable: true }] as const)
  // Each part is defined as a property of its cell's type.
  return Object.defineProperties(object, Object.fromEntries(properties)) as O & { readonly [K in P]: T }
}

const sameItems = <T>(a: readonly T[], b: readonly T[]): boolean =>
  a.length === b.length && a.every((item, i) => item === b[i])

/** What a worksheet is laid out by: the levels, and the topic, place and name of each block. */
function structureOf({ levels, constructions, faults, ...givens }: Givens): string {
  const heads = (blocks: readonly Block[]) => blocks.map(({ about, info }) => [about?.text ?? '', info.start, info.end])
  return JSON.stringify([
    levels.map(level => [level.name, ...levelParts.map(part => heads(level[part]))]),
    sharedParts.map(part => heads(givens[part])),
    heads(constructions),
    faults.length,
  ])
}

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
