/**
 * Stiffness of a wall with openings, by deflections under one force: the solid wall, less each solid strip
 * that holds openings, plus the piers of that strip side by side. With every deflection as 1/k,
 *
 *     1/k = 1/k_o − 1/k_s + 1/Σk_p
 *
 * where k_o is the solid wall with the ends of its construction, k_s the solid strip and k_p each pier, these
 * held at both ends. A pier that holds openings is worked in the same way from its own outline. Openings of
 * full height leave walls side by side, whose stiffnesses add up.
 *
 * @source Taly, Design of Reinforced Masonry Structures, p. 7.26, Method B: a cantilever less a strip held at both ends
 *   plus piers held at both ends; the same in TI 809-04, Appendix H, example H1. Piers in series and parallel:
 *   Taly, Example 7.7. That a pier with openings is worked as a wall of its own, and that each of
 *   several strips is exchanged for its piers, is the same step again (derived).
 */
import type { Display } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs, work } from '../base/work.ts'
import type { Construction, Ends } from '../model/construction.ts'
import type { Opening } from '../model/openings.ts'
import type { BuiltWall } from '../model/walls.ts'
import { edges, exchange, foot, giving, position, solid, start, strip, sum, sumOf } from './pier-formulas.ts'
import { elastic, type Moduli, stiffnessOf } from './stiffness.ts'
import { type Face, type Hole, layOut, type Part, type Strip } from './strips.ts'
import { k } from './symbols.ts'

/** A pier as drawn and tabulated. */
export interface Pier {
  readonly name: string
  readonly face: Face
  /** The piers that it holds; none where it is solid. */
  readonly holds: readonly string[]
}

export interface StripOfPiers {
  readonly name: string
  /** The pier that it is part of; absent where it is part of the wall itself. */
  readonly of?: string
  /** k of its parts, by their names. */
  readonly parts: Tabulation
  /** Their sum. */
  readonly K: Value
}

export interface Pierced {
  readonly wall: string
  readonly holes: readonly Hole[]
  readonly piers: readonly Pier[]
  /** Solid piers held at both ends: a_1, a_2, L, z_1, z_2, h and k of each. */
  readonly held?: Tabulation
  /** Walls without openings that openings of full height leave, with the ends of the construction. */
  readonly whole?: Tabulation
  /** Piers that hold openings: outlines, with k_o of their solid outline; k of each stands in `steps`. */
  readonly groups: readonly Tabulation[]
  readonly strips: readonly StripOfPiers[]
  /** Outline and k_s of each strip. */
  readonly stripTable?: Tabulation
  /** k_o of the wall, sums of the strips, k of piers that hold openings, and k of the wall: in the order of work. */
  readonly steps: readonly Value[]
  /** Side by side, where openings of full height part the wall. */
  readonly across?: Tabulation
  readonly k: Value
}

export function workPierced(
  wall: BuiltWall,
  length: Value,
  openings: readonly Opening[],
  construction: Construction,
  moduli: Moduli,
  level: string,
  display: Display,
): Result<Pierced> {
  const id = `${level}.wall.${wall.name}`
  const holes = openings.map(opening => holeOf(opening, id, display))
  const origin = (key: string, what: string): Value => ({
    id: `${id}.${key}`,
    tex: key === 'start' ? start.tex : foot.tex,
    si: 0,
    ...shownAs(start, display),
    origin: { kind: 'measured', what, spans: [wall.span] },
  })
  const face = {
    a1: origin('start', 'the start of the wall'),
    a2: length,
    z1: origin('foot', 'the foot of the wall'),
    z2: wall.height,
  }
  const parts = layOut(wall, face, holes, construction.ends === 'cantilever')
  if (!parts.ok) return parts
  return good(new Works(wall, face, holes, parts.value, { construction, moduli, id, display }).all())
}

function holeOf(opening: Opening, id: string, display: Display): Hole {
  const own = `${id}.opening.${opening.name}`
  return {
    opening,
    a1: opening.left,
    a2: work(`${own}.right`, edges.right, { l: opening.left, b: opening.width }, display, [opening.name]),
    z1: opening.sill,
    z2: work(`${own}.head`, edges.head, { s: opening.sill, h: opening.height }, display, [opening.name]),
  }
}

interface Around {
  readonly construction: Construction
  readonly moduli: Moduli
  readonly id: string
  readonly display: Display
}

/** The work on one wall: parts and strips get their names first, then each is worked from what stands in it. */
class Works {
  private readonly names = new Map<Part | Strip, string>()
  private readonly tables = new Map<string, Tabulation>()
  private readonly strips: StripOfPiers[] = []
  private readonly steps: Value[] = []
  private readonly elastic: Readonly<Record<string, Value>>

  constructor(
    private readonly wall: BuiltWall,
    private readonly face: Face,
    private readonly holes: readonly Hole[],
    private readonly parts: readonly Part[],
    private readonly around: Around,
  ) {
    this.elastic = elastic(around.construction, around.moduli)
  }

  all(): Pierced {
    const { wall, parts, around } = this
    const [only, ...more] = parts
    const alone = more.length === 0 ? only : undefined
    const below = parts.flatMap(part => part.strips.flatMap(each => partsIn(each)))
    const named = [...(alone ? [] : parts), ...below]
    this.nameAll('P', named.filter(isSolid))
    this.nameAll(
      'G',
      named.filter(part => !isSolid(part)),
    )
    this.nameAll('S', parts.flatMap(stripsIn))
    const { ends } = around.construction
    const held = this.outlines('pier', below.filter(isSolid), 'fixed')
    const whole = alone ? undefined : this.outlines('pier', parts.filter(isSolid), ends)
    const stripTable = this.outlines('strip', parts.flatMap(stripsIn), 'fixed', strip)
    const groups = [
      this.outlines(
        'group',
        below.filter(part => !isSolid(part)),
        'fixed',
        solid,
      ),
      alone
        ? undefined
        : this.outlines(
            'group',
            parts.filter(part => !isSolid(part)),
            ends,
            solid,
          ),
    ].flatMap(table => table ?? [])
    const across = alone ? undefined : this.sideBySide(parts)
    const total = alone ? this.exchanged(alone, undefined) : sumOf(required(across), k, `${around.id}.k`, [wall.name])
    if (!alone) this.steps.push(total)
    return {
      wall: wall.name,
      holes: this.holes,
      piers: named.map(part => ({ name: this.name(part), face: part.face, holds: this.holds(part) })),
      ...(held ? { held } : {}),
      ...(whole ? { whole } : {}),
      groups,
      strips: this.strips,
      ...(stripTable ? { stripTable } : {}),
      steps: this.steps,
      ...(across ? { across } : {}),
      k: total,
    }
  }

  private name(part: Part | Strip): string {
    return required(this.names.get(part))
  }

  private holds({ strips }: Part): readonly string[] {
    return strips.flatMap(({ parts }) => parts.map(part => this.name(part)))
  }

  /** In reading order of an elevation: from the wall's start on, then from the foot up. */
  private nameAll(letter: string, given: readonly (Part | Strip)[]): void {
    const ordered = [...given].sort((p, q) => p.face.a1.si - q.face.a1.si || p.face.z1.si - q.face.z1.si)
    ordered.forEach((part, i) => {
      this.names.set(part, `${letter}${i + 1}`)
    })
  }

  /** L, h and the stiffness of solid outlines, one row each. */
  private outlines(
    what: 'pier' | 'strip' | 'group',
    given: readonly (Part | Strip)[],
    ends: Ends,
    gives: typeof k = k,
  ): Tabulation | undefined {
    if (given.length === 0) return undefined
    const { id, moduli, display } = this.around
    const about = [this.wall.name]
    const faces = given.map(({ face }) => face)
    const key = what === 'pier' ? 'k' : 'solid'
    const rows = given.map(part => this.name(part))
    const kept = what === 'strip' ? 'strip' : 'pier'
    const table = new Tabulation(rows, (row, key) => `${id}.${kept}.${row}.${key}`, display)
    for (const edge of ['a1', 'a2', 'z1', 'z2'] as const)
      table.take(
        position[edge],
        faces.map(face => face[edge]),
      )
    table
      .work(edges.L, { a_1: 'a_1', a_2: 'a_2' }, 'L', about)
      .work(edges.h, { z_1: 'z_1', z_2: 'z_2' }, 'h', about)
      .work(giving(stiffnessOf(ends, moduli), gives), { ...this.elastic, h: 'h', L: 'L' }, key, about)
    for (const row of rows) this.tables.set(row, table)
    return table
  }

  private cell(part: Part | Strip, column: string): Value {
    const table = required(this.tables.get(this.name(part)))
    return table.column(column).cell(table.rows.indexOf(this.name(part)))
  }

  private sideBySide(parts: readonly Part[]): Tabulation {
    const rows = parts.map(part => this.name(part))
    const { id, display } = this.around
    return new Tabulation(rows, (row, key) => `${id}.pier.${row}.${key}`, display).take(
      k,
      parts.map(part => this.stiffness(part)),
    )
  }

  private stiffness(part: Part): Value {
    return isSolid(part) ? this.cell(part, 'k') : this.exchanged(part, this.name(part))
  }

  /** @param group the name of the part; none for the wall as a whole */
  private exchanged(part: Part, group: string | undefined): Value {
    const { id, display } = this.around
    const inputs: Record<string, Value> = { k_o: group === undefined ? this.wholeWall() : this.cell(part, 'k_o') }
    for (const each of part.strips) {
      inputs[`k_s${this.name(each)}`] = this.cell(each, 'k_s')
      inputs[`K_${this.name(each)}`] = this.piersOf(each, group)
    }
    const about = group === undefined ? [this.wall.name] : [group, this.wall.name]
    const own = group === undefined ? id : `${id}.pier.${group}`
    const value = work(`${own}.k`, exchange(part.strips.map(each => this.name(each))), inputs, display, about)
    this.steps.push(value)
    return value
  }

  private wholeWall(): Value {
    const { id, construction, moduli, display } = this.around
    const formula = giving(stiffnessOf(construction.ends, moduli), solid)
    const inputs = { ...this.elastic, h: this.face.z2, L: this.face.a2 }
    const value = work(`${id}.solid`, formula, inputs, display, [this.wall.name])
    this.steps.push(value)
    return value
  }

  private piersOf(each: Strip, of: string | undefined): Value {
    const name = this.name(each)
    const parts = this.sideBySide(each.parts)
    const K = sumOf(parts, sum, `${this.around.id}.strip.${name}.K`, [name, this.wall.name])
    this.strips.push({ name, ...(of === undefined ? {} : { of }), parts, K })
    this.steps.push(K)
    return K
  }
}

const isSolid = ({ strips }: Part): boolean => strips.length === 0
const partsIn = ({ parts }: Strip): readonly Part[] =>
  parts.flatMap(part => [part, ...part.strips.flatMap(each => partsIn(each))])
const stripsIn = ({ strips }: Part): readonly Strip[] =>
  strips.flatMap(each => [each, ...each.parts.flatMap(part => stripsIn(part))])

function required<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('a part of a wall is asked for before it is named or worked')
  return value
}
