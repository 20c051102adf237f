/** The whole building at work: every value by its id, each worked when it is first asked for. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { namesIn } from '../base/expr.ts'
import { all, Ledger, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value, Word } from '../base/value.ts'
import { duplicates } from '../model/columns.ts'
import { type Construction, readConstruction } from '../model/construction.ts'
import { type Equation, readEquations, workEquation } from '../model/equations.ts'
import type { Choices } from '../model/front.ts'
import type { Givens } from '../model/givens.ts'
import { type Grid, readGrid } from '../model/grid.ts'
import { type LevelLine, readLevels, readWallModel } from '../model/levels.ts'
import { type Limit, limitLines, workLimit } from '../model/limits.ts'
import type { Assumption, Scope } from '../model/scope.ts'
import { readSpectrum } from '../model/spectrum.ts'
import type { Block } from '../read/block.ts'
import type { Text } from '../read/text.ts'
import { constructionValue, levelIds, levelValue } from './ids.ts'
import { type LevelWork, levelWork } from './level.ts'
import { topicMissing } from './level-faults.ts'
import { type Spectral, spectralValue, workSpectral } from './spectral.ts'
import { type LoadedLevel, type Storeys, workStoreys } from './storeys.ts'
import type { TiedDistribution } from './tied.ts'
import { tieWalls } from './tying.ts'
import { vibrate, vibratingLevels } from './vibrating.ts'
import { modeValue, shapeValue, type Vibration } from './vibration.ts'

/** A value that a cell works from others, and the place of the cell. */
export interface StatedCell {
  readonly value: Value
  readonly at: Span
}

export interface Worksheet {
  readonly scope: Scope
  readonly grid: () => Result<Grid>
  readonly levels: readonly LevelWork[]
  readonly levelLines: () => Result<readonly LevelLine[]>
  /** Forces and storey shears of every level. */
  readonly storeys: () => Result<Storeys>
  /** Modes of vibration of the building. */
  readonly vibration: () => Result<Vibration>
  /** Response to the stated spectrum; absent where there is none. */
  readonly spectral?: () => Result<Spectral>
  readonly constructions: ReadonlyMap<string, () => Result<Construction>>
  /** The value of each line of the equation blocks, by its place. */
  readonly equation: (line: Text) => Result<Value>
  /** The check of each line that compares two values, by its place. */
  readonly limit: (line: Text) => Result<Limit>
  readonly equationLines: readonly Text[]
  readonly assumptions: () => readonly Assumption[]
  readonly warnings: () => readonly Diagnostic[]
  /** Values that cells of the given blocks work from others. */
  readonly statedCells: () => readonly StatedCell[]
  /** Reads every given block, whether or not a working asks for it, and returns its faults. */
  readonly readAll: () => readonly Diagnostic[]
}

export function worksheet(givens: Givens, { system, assumptions: chosen }: Choices): Worksheet {
  const ledger = new Ledger()
  const warnings: Diagnostic[] = []
  const statedCells = new Map<string, StatedCell>()
  const assumptions = new Map(chosen.map(assumption => [assumption.text, assumption]))
  const scope: Scope = {
    ledger,
    display: { system, relative: false },
    lookup: id => lookup(id),
    ids: () => [...equations.keys(), ...levels.flatMap(levelIds)],
    warn: fault => warnings.push(fault),
    assume: assumption => assumptions.set(assumption.text, assumption),
    stated: (value, at) => statedCells.set(value.id, { value, at }),
  }
  const nowhere = { start: 0, end: 0 }
  const grid = ledger.once('grid', givens.grid[0]?.info ?? nowhere, () => readGrid(givens.grid, scope))
  const onlyName = givens.levels[0]?.name ?? ''
  const levelLines = ledger.once('levels', givens.levelTable[0]?.info ?? nowhere, () =>
    readLevels(givens.levelTable, onlyName, scope),
  )
  const constructions = constructionsOf(givens.constructions, scope)
  const repeated = duplicates(
    givens.constructions.flatMap(({ about }) => about ?? []),
    'construction',
  )

  const levels: readonly LevelWork[] = givens.levels.map(level =>
    levelWork(level, {
      scope,
      grid,
      construction: name => constructions.get(name),
      constructionNames: [...constructions.keys()],
      forceTables: givens.forceTables,
      strays: givens.strays,
      above: () => {
        const lines = levelLines()
        if (!lines.ok) return lines
        const mine = lines.value.findIndex(({ name }) => name === level.name)
        const names = lines.value.slice(0, Math.max(0, mine)).map(({ name }) => name)
        return good(names.flatMap(name => levels.find(other => other.name === name) ?? []))
      },
      tied: name => (readWallModel(givens.levelTable) === 'continuous' ? tiedLevel(name) : undefined),
    }),
  )

  const tied = ledger.once('walls', givens.levelTable[0]?.info ?? nowhere, () => {
    const lines = levelLines()
    return lines.ok ? tieWalls(lines.value, levels, scope) : lines
  })

  const vibration = ledger.once('modes', levels[0]?.anchor ?? nowhere, () => {
    const lines = levelLines()
    return lines.ok ? vibrate(lines.value, levels, scope) : lines
  })

  const [spectrumBlock] = givens.spectrum
  const spectrum = ledger.once('spectrum', spectrumBlock?.info ?? nowhere, () => readSpectrum(givens.spectrum, scope))
  const spectral = spectrumBlock && ledger.once('modal', spectrumBlock.info, workedSpectral)

  function workedSpectral(): Result<Spectral> {
    const lines = levelLines()
    if (!lines.ok) return lines
    const parts = together({
      given: spectrum(),
      vibration: vibration(),
      ready: vibratingLevels(lines.value, levels),
    })
    if (!parts.ok) return parts
    const { given, vibration: made, ready } = parts.value
    return given ? workSpectral(given, made, ready, scope.display) : bad([])
  }

  function tiedLevel(name: string): Result<TiedDistribution> {
    const made = tied()
    if (!made.ok) return made
    const found = made.value.find(({ level }) => level === name)
    return found ? good(found) : bad([])
  }

  const storeys = ledger.once('storeys', levels[0]?.anchor ?? nowhere, (): Result<Storeys> => {
    const stated = levelLines()
    if (!stated.ok) return stated
    const loaded = all(
      stated.value.flatMap(({ name, elevation }): readonly Result<LoadedLevel>[] => {
        const level = levels.find(other => other.name === name)
        if (!level) return []
        const forces = level.forces()
        if (!forces.ok) return [forces]
        if (!forces.value) return [bad(forcesMissing(level))]
        return [good({ level: name, ...(elevation ? { elevation } : {}), force: forces.value })]
      }),
    )
    return loaded.ok ? good(workStoreys(loaded.value, scope.display)) : loaded
  })

  /** A block of forces that found no level is the cause of what this one lacks. */
  function forcesMissing({ name, anchor }: LevelWork): readonly Diagnostic[] {
    const strays = givens.strays('forces')
    return strays.length > 0 ? strays : [topicMissing(name, 'forces', anchor)]
  }

  const lines = readEquations(givens.equations)
  const limits = new Map<Text, () => Result<Limit>>(
    limitLines(givens.equations.flatMap(({ lines }) => lines)).map(([line, ordinal]) => [
      line,
      scope.ledger.once(`check ${line.text}`, line.span, () => workLimit(line, ordinal, scope)),
    ]),
  )
  const equations = new Map<string, () => Result<Value>>()
  const bodies = new Map<string, Equation>()
  for (const read of lines.values()) {
    if (!read.ok) continue
    const { name, span } = read.value
    bodies.set(name.text, read.value)
    equations.set(
      name.text,
      ledger.once(name.text, span, () => workEquation(read.value, scope)),
    )
  }

  /** Equations whose parts were worked before them, or that lead into a ring: nothing is to be put in order there. */
  const settled = new Set<string>()

  /**
   * Works what an equation rests on first, so that a long chain does not nest. A ring is left to the
   * ledger, which tells its path.
   */
  function workInOrder(name: string): Result<Value> | undefined {
    const waiting = settled.has(name) ? [] : [name]
    const opened = new Set<string>()
    const order: string[] = []
    for (let next = waiting.at(-1); next !== undefined; next = waiting.at(-1)) {
      if (opened.has(next)) {
        waiting.pop()
        if (!settled.has(next)) order.push(next)
        settled.add(next)
        continue
      }
      opened.add(next)
      const body = bodies.get(next)
      const rest = body ? [...namesIn(body.body).keys()].filter(other => bodies.has(other) && !settled.has(other)) : []
      if (rest.some(other => opened.has(other))) {
        for (const each of opened) settled.add(each)
        break
      }
      waiting.push(...rest)
    }
    for (const earlier of order) equations.get(earlier)?.()
    return equations.get(name)?.()
  }

  function lookup(id: string): Result<Value | Word> | undefined {
    const [head = '', ...path] = id.split('.')
    if (path.length === 0) return equations.has(id) ? workInOrder(id) : undefined
    const level = levels.find(({ name }) => name === head)
    const [first = '', second = ''] = path
    const responds = (head === 'modal' || head === 'mode') && !level ? true : level !== undefined && first === 'modal'
    if (responds && spectral) {
      const made = spectral()
      const value = made.ok ? spectralValue(made.value, id) : undefined
      if (value) return good(value)
      if (!made.ok && head !== 'mode') return made
    }
    if (head === 'mode' && !level) return ofModes(made => modeValue(made, path))
    if (level && first === 'mode') return ofModes(made => shapeValue(made, head, path.slice(1)))
    if (level && first === 'elevation' && path.length === 1) return elevationOf(head)
    if (level) {
      const found = levelValue(level, path)
      if (found) return found
    }
    if (head === 'grid' && path.length === 1) return gridValue(first)
    if (head === 'constructions' && path.length === 2) {
      const construction = constructions.get(first)
      const user = levels[0]
      return construction && user ? constructionValue(construction, user.moduli(first), second) : undefined
    }
    return undefined
  }

  function ofModes(pick: (made: Vibration) => Value | undefined): Result<Value> | undefined {
    const made = vibration()
    if (!made.ok) return made
    const value = pick(made.value)
    return value && good(value)
  }

  function elevationOf(level: string): Result<Value> | undefined {
    const read = levelLines()
    if (!read.ok) return read
    const line = read.value.find(({ name }) => name === level)
    return line?.elevation && good(line.elevation)
  }

  function gridValue(name: string): Result<Value> | undefined {
    const read = grid()
    if (!read.ok) return read
    const line = [...read.value.x, ...read.value.y].find(other => other.name === name)
    return line && good(line.at)
  }

  return {
    scope,
    grid,
    levels,
    levelLines,
    storeys,
    vibration,
    ...(spectral ? { spectral } : {}),
    constructions,
    equationLines: [...lines.keys()],
    equation: line => {
      const read = lines.get(line)
      if (!read) return bad([])
      return read.ok ? (workInOrder(read.value.name.text) ?? bad([])) : read
    },
    limit: line => limits.get(line)?.() ?? bad([]),
    assumptions: () => [...assumptions.values()],
    warnings: () => warnings,
    statedCells: () => [...statedCells.values()],
    readAll: () => [
      ...givens.faults,
      ...repeated,
      ...faultsOf([...readers(), ...[...lines.keys()].map(line => () => equationFaults(line)), ...limits.values()]),
    ],
  }

  function equationFaults(line: Text): Result<unknown> {
    const read = lines.get(line)
    return read?.ok ? (workInOrder(read.value.name.text) ?? bad([])) : (read ?? bad([]))
  }

  function readers(): readonly (() => Result<unknown>)[] {
    return [
      grid,
      levelLines,
      spectrum,
      ...constructions.values(),
      ...levels.flatMap(({ givens, areas, mass, walls, openings, springs, forces }) => [
        ...(givens.areas.length > 0 ? [areas, mass] : []),
        ...(givens.walls.length > 0 ? [walls, springs] : []),
        ...(givens.openings.length > 0 ? [openings] : []),
        forces,
      ]),
    ]
  }
}

function faultsOf(parts: readonly (() => Result<unknown>)[]): readonly Diagnostic[] {
  return parts.flatMap(part => {
    const result = part()
    return result.ok ? [] : result.because
  })
}

function constructionsOf(blocks: readonly Block[], scope: Scope): ReadonlyMap<string, () => Result<Construction>> {
  const found = new Map<string, () => Result<Construction>>()
  for (const block of blocks) {
    const name = block.about?.text ?? ''
    if (!found.has(name))
      found.set(
        name,
        scope.ledger.once(`constructions.${name}`, block.info, () => readConstruction(block, scope)),
      )
  }
  return found
}
