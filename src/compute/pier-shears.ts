/** What each pier of a wall takes of the wall's shear. */
import { formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import { type Result, together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import type { LevelWork } from './level.ts'
import { sum } from './pier-formulas.ts'
import type { Pierced } from './pierced.ts'
import { k, V } from './symbols.ts'

const carried = sym('V_s', 'V_s', 'force')

// Taly, p. 7.36: the shear of a pier is that of its strip by the share of its stiffness.
const share = formula({
  gives: V,
  body: 'V_s*k/K',
  of: [carried, k, sum],
  source: 'piers side by side share shear by stiffness: Taly, Design of Reinforced Masonry Structures, p. 7.36',
})

/** V of the parts of each strip, from the shear of the wall: one table a strip, outer ones first. */
export interface PierShears {
  /** The strip; absent where openings of full height part the wall and its parts stand side by side. */
  readonly strip?: string
  readonly K: Value
  /** k, V_s and V of each part. */
  readonly table: Tabulation
  /** The sum of its V, which is what it carries. */
  readonly total: Value
}

/** @param shear the wall's own */
export function workPierShears(pierced: Pierced, shear: Value, level: string, display: Display): readonly PierShears[] {
  const id = `${level}.wall.${pierced.wall}`
  const found: PierShears[] = []
  const shares = (strip: string | undefined, parts: Tabulation, K: Value, V_s: Value): void => {
    const table = new Tabulation(parts.rows, (row, key) => `${id}.pier.${row}.${key}`, display)
      .takeColumn(parts.column('k'))
      .take(
        carried,
        parts.rows.map(() => V_s),
      )
      .work(share, { V_s: 'V_s', k: 'k', K }, 'V', [pierced.wall])
    const total = table.sum('V', V, `${id}.${strip === undefined ? 'across' : `strip.${strip}`}.V`)
    found.push({ ...(strip === undefined ? {} : { strip }), K, table, total })
    for (const each of pierced.strips.filter(({ of }) => parts.rows.includes(of ?? '')))
      shares(each.name, each.parts, each.K, table.column('V').cell(parts.rows.indexOf(each.of ?? '')))
  }
  if (pierced.across) shares(undefined, pierced.across, pierced.k, shear)
  else
    for (const each of pierced.strips.filter(({ of }) => of === undefined)) shares(each.name, each.parts, each.K, shear)
  return found
}

/** Of a wall of a level by name; undefined where it is not worked by piers. */
export function pierShearsOf(level: LevelWork, wall: string): Result<readonly PierShears[]> | undefined {
  const cut = level.pierced(wall)
  if (!cut || (cut.ok && !cut.value)) return undefined
  const parts = together({ cut, distribution: level.distribution(), display: level.display() })
  if (!parts.ok) return parts
  const { cut: pierced, distribution, display } = parts.value
  const { design } = distribution
  const shear = design.column('V').cell(design.rows.indexOf(wall))
  return good(pierced ? workPierShears(pierced, shear, level.name, display) : [])
}
