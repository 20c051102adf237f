/**
 * ASCE 7 Table 12.2-1, the rows of bearing wall systems (A) and building frame systems (B) whose vertical elements
 * are walls. Plain names stand for the table's own.
 */

/** Height limit in ft; NL no limit, NP not permitted. */
export type HeightLimit = number | 'NL' | 'NP'

/** What of a row was compared with a print of the table, that of ASCE 7-05; the rest is from memory. */
type Seen = 'all' | 'factors' | 'R' | 'nothing'

type Row = readonly [
  name: string,
  R: number,
  Omega0: number,
  Cd: number,
  /** In design categories B, C, D, E and F. */
  limits: readonly [HeightLimit, HeightLimit, HeightLimit, HeightLimit, HeightLimit],
  seen: Seen,
  /** The one edition that has the row; both where it is left out. */
  only?: string,
]

// Rows seen: Taly, Design of Reinforced Masonry Structures, p. 484, a print of the table of ASCE 7-05; R of wood panels on a
// page of the Wood Products Council; R of other panels in a thread of the SEAINT archive of 2007.
const bearing: readonly Row[] = [
  ['special reinforced concrete shear walls', 5, 2.5, 5, ['NL', 'NL', 160, 160, 100], 'nothing'],
  ['reinforced concrete ductile coupled walls', 8, 2.5, 8, ['NL', 'NL', 160, 160, 100], 'nothing', 'ASCE 7-22'],
  ['ordinary reinforced concrete shear walls', 4, 2.5, 4, ['NL', 'NL', 'NP', 'NP', 'NP'], 'nothing'],
  ['detailed plain concrete shear walls', 2, 2.5, 2, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['ordinary plain concrete shear walls', 1.5, 2.5, 1.5, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['intermediate precast shear walls', 4, 2.5, 4, ['NL', 'NL', 40, 40, 40], 'nothing'],
  ['ordinary precast shear walls', 3, 2.5, 3, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['special reinforced masonry shear walls', 5, 2.5, 3.5, ['NL', 'NL', 160, 160, 100], 'all'],
  ['intermediate reinforced masonry shear walls', 3.5, 2.5, 2.25, ['NL', 'NL', 'NP', 'NP', 'NP'], 'all'],
  ['ordinary reinforced masonry shear walls', 2, 2.5, 1.75, ['NL', 160, 'NP', 'NP', 'NP'], 'all'],
  ['detailed plain masonry shear walls', 2, 2.5, 1.75, ['NL', 'NP', 'NP', 'NP', 'NP'], 'all'],
  ['ordinary plain masonry shear walls', 1.5, 2.5, 1.25, ['NL', 'NP', 'NP', 'NP', 'NP'], 'all'],
  ['prestressed masonry shear walls', 1.5, 2.5, 1.75, ['NL', 'NP', 'NP', 'NP', 'NP'], 'all'],
  ['ordinary reinforced AAC masonry shear walls', 2, 2.5, 2, ['NL', 35, 'NP', 'NP', 'NP'], 'nothing'],
  ['ordinary plain AAC masonry shear walls', 1.5, 2.5, 1.5, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['light-frame wood walls with wood structural panels', 6.5, 3, 4, ['NL', 'NL', 65, 65, 65], 'R'],
  ['light-frame cold-formed steel walls with structural panels', 6.5, 3, 4, ['NL', 'NL', 65, 65, 65], 'nothing'],
  ['light-frame walls with panels of other materials', 2, 2.5, 2, ['NL', 'NL', 35, 'NP', 'NP'], 'R'],
  ['light-frame cold-formed steel walls with flat strap bracing', 4, 2, 3.5, ['NL', 'NL', 65, 65, 65], 'nothing'],
  ['cross-laminated timber shear walls', 3, 3, 3, [65, 65, 65, 65, 65], 'nothing', 'ASCE 7-22'],
  ['cross-laminated timber shear walls of high aspect ratio', 4, 3, 4, [65, 65, 65, 65, 65], 'nothing', 'ASCE 7-22'],
]

const frame: readonly Row[] = [
  ['special reinforced concrete shear walls', 6, 2.5, 5, ['NL', 'NL', 160, 160, 100], 'nothing'],
  ['ordinary reinforced concrete shear walls', 5, 2.5, 4.5, ['NL', 'NL', 'NP', 'NP', 'NP'], 'nothing'],
  ['detailed plain concrete shear walls', 2, 2.5, 2, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['ordinary plain concrete shear walls', 1.5, 2.5, 1.5, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['intermediate precast shear walls', 5, 2.5, 4.5, ['NL', 'NL', 40, 40, 40], 'nothing'],
  ['ordinary precast shear walls', 4, 2.5, 4, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['special reinforced masonry shear walls', 5.5, 2.5, 4, ['NL', 'NL', 160, 160, 100], 'all'],
  ['intermediate reinforced masonry shear walls', 4, 2.5, 4, ['NL', 'NL', 'NP', 'NP', 'NP'], 'all'],
  ['ordinary reinforced masonry shear walls', 2, 2.5, 2, ['NL', 160, 'NP', 'NP', 'NP'], 'all'],
  ['detailed plain masonry shear walls', 2, 2.5, 2, ['NL', 'NP', 'NP', 'NP', 'NP'], 'all'],
  ['ordinary plain masonry shear walls', 1.5, 2.5, 1.25, ['NL', 'NP', 'NP', 'NP', 'NP'], 'factors'],
  ['prestressed masonry shear walls', 1.5, 2.5, 1.75, ['NL', 'NP', 'NP', 'NP', 'NP'], 'nothing'],
  ['light-frame wood walls with wood structural panels', 7, 2.5, 4.5, ['NL', 'NL', 65, 65, 65], 'nothing'],
  ['light-frame cold-formed steel walls with structural panels', 7, 2.5, 4.5, ['NL', 'NL', 65, 65, 65], 'nothing'],
  ['light-frame walls with panels of other materials', 2.5, 2.5, 2.5, ['NL', 'NL', 35, 'NP', 'NP'], 'nothing'],
]
/** A row of the table. */
export interface System {
  /** `bearing wall, special reinforced masonry shear walls` */
  readonly name: string
  readonly part: 'A' | 'B'
  /** In a sentence: `special reinforced masonry shear walls of a bearing wall system`. */
  readonly words: string
  readonly R: number
  readonly Omega0: number
  readonly Cd: number
  readonly limit: (category: string) => HeightLimit
  /** The table, and how far it was compared. */
  readonly source: (edition: string, of: 'factors' | 'R' | 'height') => string
}

const PARTS = { A: 'bearing wall', B: 'building frame' } as const
const CATEGORIES = 'BCDEF'

const systemOf =
  (part: 'A' | 'B') =>
  ([name, R, Omega0, Cd, limits, seen]: Row): System => ({
    name: `${PARTS[part]}, ${name}`,
    part,
    words: `${name} of a ${PARTS[part]} system`,
    R,
    Omega0,
    Cd,
    limit: category => limits[CATEGORIES.indexOf(category)] ?? 'NP',
    source: (edition, of) => {
      const known = seen === 'all' || (seen === 'factors' && of !== 'height') || (seen === 'R' && of === 'R')
      return `${edition} Table 12.2-1 ${part}, ${name} (${known ? 'as in ASCE 7-05; this edition unchecked' : 'unchecked'})`
    },
  })

/** The systems of an edition, as they may be written after `system:`. */
export const systemsOf = (edition: string): readonly System[] =>
  (['A', 'B'] as const).flatMap(part =>
    (part === 'A' ? bearing : frame)
      .filter(([, , , , , , only]) => only === undefined || only === edition)
      .map(systemOf(part)),
  )
