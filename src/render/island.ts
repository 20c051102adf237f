/** What the page's own script reads: the trace as JSON, with its formulas set. Without scripts it is not seen. */
import type { Traced, TracedValue } from '../explain/traced.ts'
import type { Typesetter } from './typeset.ts'

/** Id, letter in TeX, printed, kind, lines of the source; then what the kind has more. */
export type IslandValue =
  | readonly [id: string, letter: string, printed: string, kind: 'given', lines: readonly number[]]
  | readonly [
      id: string,
      letter: string,
      printed: string,
      kind: 'worked',
      lines: readonly number[],
      formula: number,
      inputs: readonly number[],
    ]
  | readonly [
      id: string,
      letter: string,
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
  symbols?: readonly string[],
]

export interface Island {
  readonly values: readonly IslandValue[]
  readonly formulas: readonly IslandFormula[]
  /** Markup as KaTeX writes it, cut before each tag: formulas are made of the same few tags. */
  readonly pieces: readonly string[]
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
  const pieces = new Map<string, number>()
  const numberOf = (piece: string): number => {
    const known = pieces.get(piece) ?? pieces.size
    pieces.set(piece, known)
    return known
  }
  return {
    values: values.map(islandValue),
    formulas: formulas.map(({ letters, text, reference, assumes, symbols }): IslandFormula => {
      const set = typesetter.html(letters, 'display').split('<').slice(1).map(numberOf)
      return symbols ? [set, text, reference, assumes, symbols] : [set, text, reference, assumes]
    }),
    pieces: [...pieces.keys()],
    lines: Object.fromEntries(lines),
  }
}

function islandValue({ value, printed, kind, lines, formula, inputs, words }: TracedValue): IslandValue {
  const { id } = value
  switch (kind) {
    case 'given':
      return [id, value.tex, printed, kind, lines]
    case 'worked':
      return [id, value.tex, printed, kind, lines, formula ?? 0, inputs]
    case 'measured':
    case 'default':
      return [id, value.tex, printed, kind, lines, words]
  }
}
