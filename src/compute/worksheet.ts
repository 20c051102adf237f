/** The whole building at work: every value by its id, each worked when it is first asked for. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { all, channel, Ledger, type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value, Word } from '../base/value.ts'
import { duplicates } from '../model/columns.ts'
import { type Construction, readConstruction } from '../model/construction.ts'
import { commonShare, type Forces, readShare } from '../model/forces.ts'
import type { Choices } from '../model/front.ts'
import { type Givens, type LiveGivens, liveGivens } from '../model/givens.ts'
import { type Grid, readGrid } from '../model/grid.ts'
import { type LevelLine, readLevels, readWallModel } from '../model/levels.ts'
import type { Limit } from '../model/limits.ts'
import type { Assumption, Scope } from '../model/scope.ts'
import { readSeismic } from '../model/seismic.ts'
import { readSpectrum } from '../model/spectrum.ts'
import { readWind } from '../model/wind.ts'
import type { Text } from '../read/text.ts'
import { profileFor, profileOf } from '../standards/catalogue.ts'
import { commonSettings } from '../standards/profile.ts'
import { equationLines } from './equation-lines.ts'
import { constructionValue, levelIds, levelValue } from './ids.ts'
import { type LevelWork, levelWork } from './level.ts'
import { levelCalledSeismic, topicMissing } from './level-faults.ts'
import { type Seismic, type WeighedLevel, workSeismic } from './seismic.ts'
import { seismicIds, seismicLevelValue, seismicValue } from './seismic-ids.ts'
import { shareByWord } from './shares.ts'
import { type Spectral, spectralValue, workSpectral } from './spectral.ts'
import { type LoadedLevel, type Storeys, workStoreys } from './storeys.ts'
import type { TiedDistribution } from './tied.ts'
import { tieWalls } from './tying.ts'
import { vibrate, vibratingLevels } from './vibrating.ts'
import { modeValue, shapeValue, type Vibration } from './vibration.ts'
import type { Wind } from './wind.ts'
import { windStoreys, windValue, workWindOn } from './wind-building.ts'

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
  /** Wind on the building; a value of undefined where the document has none. */
  readonly wind: () => Result<Wind | undefined>
  /** Forces and storey shears of every level: those stated, or those of wind where there are no others. */
  readonly storeys: () => Result<Storeys>
  /** Present where the document has a block `seismic`. */
  readonly seismic?: () => Result<Seismic>
  /** Modes of vibration of the building. */
  readonly vibration: () => Result<Vibration>
  /** Response to the stated spectrum; absent where there is none. */
  readonly spectral?: () => Result<Spectral>
  readonly constructions: ReadonlyMap<string, () => Result<Construction>>
  /** The value of each line of the equation blocks, by its place. */
  readonly equation: (line: Text) => Result<Value>
  /** The check of each line that compares two values, by its place. */
  readonly limit: (line: Text) => Result<Limit>
  readonly assumptions: () => readonly Assumption[]
  readonly warnings: () => readonly Diagnostic[]
  /** Values that cells of the given blocks work from others. */
  readonly statedCells: () => readonly StatedCell[]
  /** Values of the cells of the given blocks that were read. */
  readonly cells: () => readonly Value[]
  /** Reads every given block, whether or not a working asks for it, and returns its faults. */
  readonly readAll: () => readonly Diagnostic[]
  /**
   * Takes the givens of the next build. What they change is worked again, all else is kept.
   * @returns false when the building has other parts than before: a new worksheet is then to be made
   */
  readonly replace: (next: Givens) => boolean
}

export function worksheet(first: Givens, { system, standard, titleBlock, assumptions: chosen }: Choices): Worksheet {
  const ledger = new Ledger()
  const givens = liveGivens(first, ledger)
  const [warned, assumed, cellsStated, cellsRead] = [
    channel<Diagnostic>(),
    channel<Assumption>(),
    channel<StatedCell>(),
    channel<Value>(),
  ]
  const scope: Scope = {
    ledger,
    display: { system, relative: false },
    lookup: id => lookup(id),
    ids: () => [...lines.names(), ...levels.flatMap(levelIds), ...(seismic ? seismicIds : [])],
    warn: fault => ledger.tell(warned, fault),
    assume: assumption => ledger.tell(assumed, assumption),
    stated: (value, at) => ledger.tell(cellsStated, { value, at }),
    read: value => ledger.tell(cellsRead, value),
  }
  const nowhere = { start: 0, end: 0 }
  const grid = ledger.once('grid', givens.grid[0]?.info ?? nowhere, () => readGrid(givens.grid, scope))
  const onlyName = givens.levels[0]?.name ?? ''
  const levelLines = ledger.once('levels', givens.levelTable[0]?.info ?? nowhere, () =>
    readLevels(givens.levelTable, onlyName, scope),
  )
  const constructions = constructionsOf(givens, scope)
  const repeated = duplicates(
    givens.constructions.flatMap(({ about }) => about ?? []),
    'construction',
  )

  const accidental = standard && profileOf(standard.text)?.rules.accidental
  const share = accidental ? { share: accidental.value, clause: accidental.clause } : commonShare

  const [seismicBlock] = first.seismic
  const seismic = seismicBlock && ledger.once('seismic', seismicBlock.info, () => workedSeismic(seismicBlock.info))

  function workedSeismic(info: Span): Result<Seismic> {
    if (levels.some(({ name }) => name === 'seismic')) return bad([levelCalledSeismic(info)])
    const profile = profileFor(standard, info)
    if (!profile.ok) return profile
    const given = readSeismic(givens.seismic, [...profile.value.settings, ...commonSettings], scope)
    const lines = levelLines()
    const weighed = lines.ok ? all(lines.value.flatMap(weighedLevel)) : lines
    if (!given.ok || !weighed.ok)
      return bad([...(given.ok ? [] : given.because), ...(weighed.ok ? [] : weighed.because)])
    return workSeismic(profile.value, given.value, weighed.value, scope)
  }

  function weighedLevel({ name, elevation, span }: LevelLine): readonly Result<WeighedLevel>[] {
    const level = levels.find(other => other.name === name)
    if (!level) return []
    const nothing = level.givens.areas.length === 0 && elevation && givens.strays('areas').length === 0
    const mass = nothing ? bad([topicMissing(name, 'areas', span)]) : level.mass()
    return [mass.ok ? good({ level: name, elevation, W: mass.value.W }) : mass]
  }

  function seismicForces(level: string): Result<Forces> {
    const made = seismic?.() ?? bad([])
    if (!made.ok) return made
    const [x, y] = [made.value.force(level, 'x'), made.value.force(level, 'y')]
    const off = readShare(made.value.given.text('accidental'), level, share, scope)
    return off.ok ? good({ ...(x ? { x } : {}), ...(y ? { y } : {}), accidental: off.value }) : off
  }

  const levels: readonly LevelWork[] = givens.levels.map(level =>
    levelWork(level, {
      scope,
      grid,
      construction: name => constructions.get(name),
      constructionNames: [...constructions.keys()],
      forceTables: () => givens.forceTables,
      commonShare: share,
      shareByWord: shareByWord(standard, scope.display),
      seismicForces: seismic && seismicForces,
      strays: givens.strays,
      wind: () => wind(),
      forcesStated: () => forcesStated(),
      above: () => {
        const lines = levelLines()
        if (!lines.ok) return lines
        const mine = lines.value.findIndex(({ name }) => name === level.name)
        const names = lines.value.slice(0, Math.max(0, mine)).map(({ name }) => name)
        return good(names.flatMap(name => levels.find(other => other.name === name) ?? []))
      },
      tied: name => {
        const model = wallModel()
        return model.ok && model.value === 'continuous' ? tiedLevel(name) : undefined
      },
    }),
  )

  /** True where any level has forces, or what states them has faults. */
  const forcesStated = (): boolean =>
    levels.some(({ forces }) => {
      const stated = forces()
      return !stated.ok || stated.value !== undefined
    })

  const windGiven = ledger.once('wind', givens.wind[0]?.info ?? nowhere, () =>
    readWind(givens.wind, { standard: titleBlock.standard, levels: givens.levels.map(({ name }) => name) }, scope),
  )
  const wind = ledger.once('wind.force', givens.wind[0]?.info ?? nowhere, (): Result<Wind | undefined> => {
    const given = windGiven()
    if (!given.ok) return given
    return given.value ? workWindOn(given.value, levels, levelLines(), scope) : good(undefined)
  })

  const wallModel = ledger.once('walls.model', givens.levelTable[0]?.info ?? nowhere, () =>
    good(readWallModel(givens.levelTable)),
  )
  const tied = ledger.once('walls', givens.levelTable[0]?.info ?? nowhere, () => {
    const lines = levelLines()
    return lines.ok ? tieWalls(lines.value, levels, scope) : lines
  })

  const vibration = ledger.once('modes', levels[0]?.anchor ?? nowhere, () => {
    const lines = levelLines()
    return lines.ok ? vibrate(lines.value, levels, scope) : lines
  })

  const [spectrumBlock] = first.spectrum
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
    const blown = wind()
    if (!forcesStated()) {
      if (!blown.ok) return blown
      if (blown.value) return good(windStoreys(blown.value, 'wind', scope.display))
    }
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
    return loaded.ok ? good(workStoreys('seismic', loaded.value, scope.display)) : loaded
  })

  /** A block of forces that found no level is the cause of what this one lacks. */
  function forcesMissing({ name, anchor }: LevelWork): readonly Diagnostic[] {
    const strays = givens.strays('forces')
    return strays.length > 0 ? strays : [topicMissing(name, 'forces', anchor)]
  }

  const lines = equationLines(scope)
  lines.replace(first.equations)

  function lookup(id: string): Result<Value | Word> | undefined {
    const [head = '', ...path] = id.split('.')
    if (path.length === 0) return lines.value(id)
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
      const found = levelValue(level, path) ?? (seismic && seismicLevelValue(seismic, head, path))
      if (found) return found
    }
    if (head === 'seismic' && seismic) return seismicValue(seismic, id)
    if (head === 'wind') return windValue(wind, windGiven, path)
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
    wind,
    storeys,
    ...(seismic ? { seismic } : {}),
    vibration,
    ...(spectral ? { spectral } : {}),
    constructions,
    equation: line => lines.equation(line),
    limit: line => lines.limit(line),
    assumptions: () => {
      const all = [...chosen, ...ledger.told(assumed)]
      return [...new Map(all.map(assumption => [assumption.text, assumption])).values()]
    },
    warnings: () => ledger.told(warned),
    statedCells: () => [...new Map(ledger.told(cellsStated).map(cell => [cell.value.id, cell])).values()],
    cells: () => ledger.told(cellsRead),
    readAll: () => [...givens.faults, ...repeated, ...faultsOf([...readers(), ...lines.readers()])],
    replace: next => {
      ledger.next()
      if (!givens.replace(next)) return false
      lines.replace(next.equations)
      return true
    },
  }

  function readers(): readonly (() => Result<unknown>)[] {
    return [
      grid,
      levelLines,
      ...(seismic ? [seismic] : []),
      wind,
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

function constructionsOf(
  { constructions, constructionAt }: LiveGivens,
  scope: Scope,
): ReadonlyMap<string, () => Result<Construction>> {
  const found = new Map<string, () => Result<Construction>>()
  for (const [i, { about, info }] of constructions.entries()) {
    const name = about?.text ?? ''
    const read = () => {
      const block = constructionAt(i)
      return block ? readConstruction(block, scope) : bad([])
    }
    if (!found.has(name)) found.set(name, scope.ledger.once(`constructions.${name}`, info, read))
  }
  return found
}
