/** What the page's own script reads: the trace as JSON, with its formulas set. Without scripts it is not seen. */
import type { Run } from '../explain/letter.ts'
import type { Traced, TracedValue } from '../explain/traced.ts'
import { createPieces, type Piece } from './markup.ts'
import type { Typesetter } from './typeset.ts'

/** Runs of a letter, each after a sign of where it stands: on the line, below, above; a capital for upright. */
export type IslandLetter = readonly string[]

/** Id, letter, printed, kind, lines of the source; then what the kind has more. */
export type IslandValue =
  | readonly [id: string, letter: IslandLetter, printed: string, kind: 'given', lines: readonly number[]]
  | readonly [
      id: string,
      letter: IslandLetter,
      printed: string,
      kind: 'worked',
      lines: readonly number[],
      formula: number,
      inputs: readonly number[],
    ]
  | readonly [
      id: string,
      letter: IslandLetter,
      printed: string,
      kind: 'measured' | 'default',
      lines: readonly number[],
      words: string,
    ]

/** `set` is the formula by the numbers of its pieces; `symbols` are left out where they are the letters of the inputs. */
export type IslandFormula = readonly [
  set: readonly number[],
  text: string,
  reference: string,
  assumes: readonly string[],
  symbols?: readonly IslandLetter[],
]

export interface Island {
  readonly values: readonly IslandValue[]
  readonly formulas: readonly IslandFormula[]
  readonly pieces: readonly Piece[]
  /** Text of the source lines by their numbers. */
  readonly lines: Readonly<Record<number, string>>
}

/**
 * The data and the script.
 * @param script runs as it stands; the page's policy names it by its hash
 */
export function islandHtml(traced: Traced, typesetter: Typesetter, script: string): string {
  return `<script type="application/json" class="trace-data">${inScript(JSON.stringify(islandOf(traced, typesetter)))}</script>
<script>${script}</script>`
}

/** No text within can end the element or open a comment in it. */
const inScript = (json: string): string =>
  json.replace(/[<\u2028\u2029]/g, sign => `\\u${sign.charCodeAt(0).toString(16).padStart(4, '0')}`)

export function islandOf({ values, formulas, lines }: Traced, typesetter: Typesetter): Island {
  const pieces = createPieces()
  return {
    values: values.map(islandValue),
    formulas: formulas.map(({ letters, text, reference, assumes, symbols }): IslandFormula => {
      const set = pieces.pack(typesetter.html(letters, 'display'))
      return symbols ? [set, text, reference, assumes, symbols.map(islandLetter)] : [set, text, reference, assumes]
    }),
    pieces: pieces.all(),
    lines: Object.fromEntries(lines),
  }
}

function islandValue({ value, letter, printed, kind, lines, formula, inputs, words }: TracedValue): IslandValue {
  const { id } = value
  switch (kind) {
    case 'given':
      return [id, islandLetter(letter), printed, kind, lines]
    case 'worked':
      return [id, islandLetter(letter), printed, kind, lines, formula ?? 0, inputs]
    case 'measured':
    case 'default':
      return [id, islandLetter(letter), printed, kind, lines, words]
  }
}

const places = { line: 'l', below: 'b', above: 'a' } as const

const islandLetter = (runs: readonly Run[]): IslandLetter =>
  runs.map(({ at, upright, text }) => (upright ? places[at].toUpperCase() : places[at]) + text)
