/** What explaining a working needs besides the results themselves. */
import type { Formula } from '../base/formula.ts'
import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { inLanguage } from '../base/language.ts'
import { channel, type Ledger, type Result } from '../base/ledger.ts'
import { linesAt, type Source, type Span } from '../base/span.ts'
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

/** What explaining tells besides the pieces that it makes. */
const told = {
  root: channel<Value>(),
  beside: channel<Value>(),
  cited: channel<string>(),
  formula: channel<Formula>(),
  check: channel<Check>(),
  table: channel<{ readonly anchor: string; readonly table: Tabulation }>(),
}

/** Words that are kept in the document's spelling. */
const MOST_KNOWN = 1000

/** What explaining a working needs besides the results themselves, and where it tells what the lists of the document are made of. */
export class Context {
  readonly language: Language
  readonly basis: Basis
  readonly sketch: Sketch
  readonly ledger: Ledger
  /** The same few words are told again and again. */
  private readonly known = new Map<string, string>()

  constructor(language: Language, basis: Basis, sketch: Sketch, ledger: Ledger) {
    this.language = language
    this.basis = basis
    this.sketch = sketch
    this.ledger = ledger
  }

  /** Our own words in the document's spelling. */
  words(text: string): string {
    const known = this.known.get(text)
    if (known !== undefined) return known
    const words = inLanguage(text, this.language)
    if (this.known.size >= MOST_KNOWN) this.known.clear()
    this.known.set(text, words)
    return words
  }

  /** A value that is printed: a root of the trace. */
  root(value: Value): void {
    this.ledger.tell(told.root, value)
  }

  /** A value that is printed and can be traced, but is no part of the results: the limit of a check, the subject of a word. */
  beside(value: Value): void {
    this.ledger.tell(told.beside, value)
  }

  /** A line of the engineer's own that says where its formula is from. */
  cite(id: string): void {
    this.ledger.tell(told.cited, id)
  }

  /** A formula that is printed. */
  uses(formula: Formula): void {
    this.ledger.tell(told.formula, formula)
  }

  /** Records a check once, however often it is shown. */
  check(check: Check): void {
    this.ledger.tell(told.check, check)
  }

  tabled(anchor: string, table: Tabulation): void {
    this.ledger.tell(told.table, { anchor, table })
  }

  /** Where some places begin, from which the lines are told once the document is numbered. */
  places(spans: Iterable<Span>): readonly number[] {
    return [...new Set([...spans].map(({ start }) => start))]
  }

  /** What has been told in this build so far; each part is gathered when it is asked for. */
  account(source: Source, cells: () => readonly Value[]): Account {
    const { ledger } = this
    const byId = (values: readonly Value[]) => new Map(values.map(value => [value.id, value]))
    const unnumbered = lazy(() => [...new Map(ledger.told(told.check).map(check => [check.id, check])).values()])
    const parts = {
      roots: lazy(() => byId(ledger.told(told.root))),
      besides: lazy(() => byId(ledger.told(told.beside))),
      cited: lazy(() => new Set(ledger.told(told.cited))),
      formulas: lazy(() => new Set(ledger.told(told.formula))),
      checks: lazy(() => unnumbered().map(check => ({ ...check, sourceLines: linesAt(source, check.sourceLines) }))),
    }
    return {
      language: this.language,
      source,
      get roots() {
        return parts.roots()
      },
      get besides() {
        return parts.besides()
      },
      get cells() {
        return cells()
      },
      get cited() {
        return parts.cited()
      },
      get formulas() {
        return parts.formulas()
      },
      get checks() {
        return parts.checks()
      },
      get unnumbered() {
        return unnumbered()
      },
      words: text => this.words(text),
      lines: spans =>
        linesAt(
          source,
          Array.from(spans, ({ start }) => start),
        ),
      placeOf: (id, shown) =>
        shown.has(id)
          ? id
          : ledger.told(told.table).find(({ anchor, table }) => shown.has(anchor) && table.has(id))?.anchor,
    }
  }
}

function lazy<T>(make: () => T): () => T {
  let made: { readonly value: T } | undefined
  return () => {
    made ??= { value: make() }
    return made.value
  }
}

/** What the lists of a document and its JSON are made of. */
export interface Account {
  readonly language: Language
  readonly source: Source
  /** Every value that was printed: the roots of the trace. */
  readonly roots: ReadonlyMap<string, Value>
  /** Values that are printed and can be traced, but are no part of the results. */
  readonly besides: ReadonlyMap<string, Value>
  /** Values of the cells that were read, whether or not anything rests on them. */
  readonly cells: readonly Value[]
  /** Ids of the engineer's own lines that say where their formula is from. */
  readonly cited: ReadonlySet<string>
  /** Every formula that was printed, in order. */
  readonly formulas: ReadonlySet<Formula>
  readonly checks: readonly Check[]
  /** The same with the places of their inputs in place of lines, as pieces are until they are numbered. */
  readonly unnumbered: readonly Check[]
  /** Our own words in the document's spelling. */
  readonly words: (text: string) => string
  /** Source lines of some places, each once, ascending. */
  readonly lines: (spans: Iterable<Span>) => readonly number[]
  /** Where a value is printed among the ids that the page shows, or undefined when it is not. */
  readonly placeOf: (id: string, shown: ReadonlySet<string>) => string | undefined
}
