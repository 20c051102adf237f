/** What explaining a working needs besides the results themselves. */
import type { Formula } from '../base/formula.ts'
import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { inLanguage } from '../base/language.ts'
import type { Result } from '../base/ledger.ts'
import { lineOf, type Source, type Span } from '../base/span.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import type { Displacement } from '../compute/displacement.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Storeys } from '../compute/storeys.ts'
import type { Wall } from '../model/walls.ts'
import type { Check, Figure, TitleBlock } from './sheet.ts'

type Drawn = Result<Pick<Figure, 'svg' | 'alternative'>>

/** What draws the figures of a document. */
export interface Sketch {
  /** A level's plan; `caseName` asks for the shears of one case in place of the design shears. */
  readonly plan: (level: LevelWork, caseName: string | undefined) => Drawn
  /** A wall's elevation; `caseName` asks for the shear of one case in place of the design shear. */
  readonly elevation: (level: LevelWork, wall: Wall, caseName: string | undefined) => Drawn
  /** A level as it moves in a case. */
  readonly displaced: (level: LevelWork, displacement: Displacement) => Drawn
  /** Storey forces and shears of the building. */
  readonly storeys: (storeys: Storeys) => Drawn
}

/** What the front matter says of the calculation as a whole. */
export type Basis = Pick<TitleBlock, 'standard'> & { readonly system: System }

/** Gathers, over the whole document, what its lists and its JSON are made of. */
export class Context {
  readonly language: Language
  readonly source: Source
  readonly basis: Basis
  readonly sketch: Sketch
  /** Every value that was printed: the roots of the trace. */
  readonly roots = new Map<string, Value>()
  /** Ids of the engineer's own lines that say where their formula is from. */
  readonly cited = new Set<string>()
  /** Values that are printed and can be traced, but are no part of the results: the limits of checks, the subjects of words. */
  readonly besides = new Map<string, Value>()
  /** Every formula that was printed, in order. */
  readonly formulas = new Set<Formula>()
  private readonly checked = new Map<string, Check>()
  private readonly anchors = new Map<string, number>()
  private readonly tables: { readonly anchor: string; readonly table: Tabulation }[] = []

  constructor(language: Language, source: Source, basis: Basis, sketch: Sketch) {
    this.language = language
    this.source = source
    this.basis = basis
    this.sketch = sketch
  }

  /** Our own words in the document's spelling. */
  words(text: string): string {
    return inLanguage(text, this.language)
  }

  /** An anchor for a value; a second printing of the same value gets a number after it. */
  anchor(id: string): string {
    const times = (this.anchors.get(id) ?? 0) + 1
    this.anchors.set(id, times)
    return times === 1 ? id : `${id}-${times}`
  }

  /** Records a check once, however often it is shown. */
  check(check: Check): void {
    this.checked.set(check.id, check)
  }

  get checks(): readonly Check[] {
    return [...this.checked.values()]
  }

  tabled(anchor: string, table: Tabulation): void {
    this.tables.push({ anchor, table })
  }

  /** Where a value is printed among the ids that the page shows, or undefined when it is not. */
  placeOf(id: string, shown: ReadonlySet<string>): string | undefined {
    if (shown.has(id)) return id
    return this.tables.find(({ anchor, table }) => shown.has(anchor) && table.has(id))?.anchor
  }

  /** Source lines of some places, each once, ascending. */
  lines(spans: Iterable<Span>): readonly number[] {
    return [...new Set([...spans].map(({ start }) => lineOf(this.source, start)))].sort((a, b) => a - b)
  }
}
