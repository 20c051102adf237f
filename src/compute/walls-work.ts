/** The work on each wall of a level: its line, its stiffness, its openings and its section, each on demand and once. */
import { type Result, together } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import type { Opening } from '../model/openings.ts'
import { type BuiltWall, readStiffness, type Wall } from '../model/walls.ts'
import { diagnose } from '../read/text.ts'
import type { Surroundings } from './level.ts'
import { drawnOnly } from './opening-faults.ts'
import { type Pierced, workPierced } from './pierced.ts'
import { type WallSection, workSection } from './section.ts'
import { type Moduli, type WallLine, workLine, workModuli, workStiffness } from './stiffness.ts'

/** What is known of a wall is known of it as it was read: read again, it is another. */
export interface WallsWork {
  readonly lineFor: (wall: Wall) => WallLine
  readonly moduli: (construction: string) => Result<Moduli>
  readonly stiffnessFor: (wall: Wall) => Result<Value>
  /** A value of undefined for a wall without openings, or of stated stiffness. */
  readonly piercedFor: (wall: Wall) => Result<Pierced | undefined>
  /** A value of undefined for a wall of stated stiffness. */
  readonly sectionFor: (wall: Wall) => Result<WallSection | undefined>
}

/**
 * @param name the level's
 * @param once work of this level under a name of its own
 * @param anchor where a fault of the level as a whole is shown
 */
export function wallsWork(
  name: string,
  openings: () => Result<readonly Opening[]>,
  { scope, construction, constructionNames }: Pick<Surroundings, 'scope' | 'construction' | 'constructionNames'>,
  once: <T>(what: string, work: () => Result<T>, at?: Span) => () => Result<T>,
  anchor: Span,
): WallsWork {
  const lineOf = new WeakMap<Wall, WallLine>()
  const lineFor = (wall: Wall): WallLine => {
    const known = lineOf.get(wall) ?? workLine(wall, name, scope.display)
    lineOf.set(wall, known)
    return known
  }

  const built = new Map<string, () => Result<Moduli>>()
  const moduli = (of: string): Result<Moduli> => {
    const read = construction(of)
    if (!read) return bad([])
    let known = built.get(of)
    if (!known) {
      known = scope.ledger.once(`constructions.${of}`, anchor, () => {
        const made = read()
        return made.ok ? good(workModuli(made.value, scope.display, scope.assume)) : made
      })
      built.set(of, known)
    }
    return known()
  }

  /** Work on one wall, once for each. */
  const forEachWall = <T>(what: string, work: (wall: Wall) => Result<T>): ((wall: Wall) => Result<T>) => {
    const known = new WeakMap<Wall, () => Result<T>>()
    return wall => {
      const own = known.get(wall) ?? once(`wall.${wall.name}.${what}`, () => work(wall), wall.span)
      known.set(wall, own)
      return own()
    }
  }
  const stiffnessFor = forEachWall('k', wall => workWallStiffness(wall))

  const workWallStiffness = (wall: Wall): Result<Value> => {
    const cut = piercedFor(wall)
    if (!cut.ok) return cut
    if (cut.value) return good(cut.value.k)
    if (wall.kind === 'stated') return readStiffness(wall, name, scope)
    const parts = partsOf(wall)
    if (!parts.ok) return parts
    return good(workStiffness(wall, lineFor(wall).L, parts.value.construction, parts.value.moduli, name, scope.display))
  }

  const piercedFor = forEachWall('openings', wall => workPiercedWall(wall))

  const workPiercedWall = (wall: Wall): Result<Pierced | undefined> => {
    const given = openings()
    if (!given.ok) return given
    const mine = given.value.filter(opening => opening.wall === wall.name)
    if (mine.length === 0) return good(undefined)
    if (wall.kind === 'stated') {
      scope.assume(drawnOnly(wall.name))
      return good(undefined)
    }
    const parts = partsOf(wall)
    if (!parts.ok) return parts
    const { value } = parts
    return workPierced(wall, lineFor(wall).L, mine, value.construction, value.moduli, name, scope.display)
  }

  const partsOf = (wall: BuiltWall) => {
    const { text, span } = wall.construction
    const read = construction(text)
    if (!read)
      return bad([
        diagnose(
          'error',
          'unknown-construction',
          span,
          `there is no construction ${text}`,
          suggestion(text, constructionNames, 'construction'),
        ),
      ])
    return together({ construction: read(), moduli: moduli(text) })
  }

  const sectionFor = forEachWall('EI', (wall): Result<WallSection | undefined> => {
    if (wall.kind === 'stated') return good(undefined)
    const parts = together({ made: partsOf(wall), cut: piercedFor(wall) })
    if (!parts.ok) return parts
    const { made, cut } = parts.value
    return good(workSection(wall, lineFor(wall).L, made.construction, made.moduli, cut?.k, name, scope.display))
  })

  return { lineFor, moduli, stiffnessFor, piercedFor, sectionFor }
}
