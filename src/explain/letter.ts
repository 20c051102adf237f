/**
 * The letter of a value as runs of text, for places where no formula is set: a list of many values,
 * a line of the terminal. Reads the TeX that symbols and names are made of, and nothing else.
 */

/** Where a run stands, and whether it slopes as a letter does or stands upright as a word does. */
export interface Run {
  readonly at: 'line' | 'below' | 'above'
  readonly upright: boolean
  readonly text: string
}

/** The runs of a symbol's TeX, in reading order: `k_{\text{W1}}` is k, then W1 below it. */
export function runsOf(tex: string): readonly Run[] {
  const reader: Reader = { tokens: tex.match(/\\[a-zA-Z]+\s?|\\?[\s\S]/gu) ?? [], next: 0, runs: [] }
  while (reader.next < reader.tokens.length) readItem(reader, 'line')
  return reader.runs
}

/** The letter in one line of plain text: `k_W1`, `ΣW`. */
export function letterPlain(tex: string): string {
  let out = ''
  let place: Run['at'] = 'line'
  for (const { at, text } of runsOf(tex)) {
    if (at !== place && at !== 'line') out += at === 'below' ? '_' : '^'
    place = at
    out += text
  }
  return out
}

interface Reader {
  readonly tokens: readonly string[]
  next: number
  readonly runs: Run[]
}

function readItem(reader: Reader, at: Run['at']): void {
  const token = (reader.tokens[reader.next++] ?? '').trimEnd()
  switch (token) {
    case '{':
      while (reader.next < reader.tokens.length && reader.tokens[reader.next] !== '}') readItem(reader, at)
      reader.next++
      return
    case '_':
      readItem(reader, 'below')
      return
    case '^':
      readItem(reader, 'above')
      return
    case '\\text':
      readWords(reader, at)
      return
    case '\\,':
      add(reader, at, true, '\u2009')
      return
    case "'":
      add(reader, at, true, '′')
      return
    default:
      if (token.startsWith('\\')) readCommand(reader, token, at)
      else add(reader, at, !/\p{L}/u.test(token), token)
  }
}

function readCommand(reader: Reader, token: string, at: Run['at']): void {
  const sign = signs[token]
  if (sign === undefined) throw new Error(`the letter of a value holds ${token}, which is not read`)
  add(reader, at, sign === 'Σ', sign)
}

/** The words of `\text{…}`, whose signs are spelt out as `texWords` spells them. */
function readWords(reader: Reader, at: Run['at']): void {
  reader.next++
  let words = ''
  for (; reader.next < reader.tokens.length && reader.tokens[reader.next] !== '}'; reader.next++) {
    const token = reader.tokens[reader.next] ?? ''
    const spelt = spellings[token.trimEnd()]
    if (spelt !== undefined) reader.next += 2
    words += spelt ?? (token.length > 1 && token.startsWith('\\') ? token.slice(1) : token)
  }
  reader.next++
  add(reader, at, true, words)
}

const spellings: Readonly<Record<string, string>> = {
  '\\textbackslash': '\\',
  '\\textasciicircum': '^',
  '\\textasciitilde': '~',
}

function add({ runs }: Reader, at: Run['at'], upright: boolean, text: string): void {
  const last = runs.at(-1)
  if (last?.at === at && last.upright === upright) runs[runs.length - 1] = { ...last, text: last.text + text }
  else runs.push({ at, upright, text })
}

const signs: Readonly<Record<string, string>> = {
  '\\sum': 'Σ',
  '\\ell': 'ℓ',
  '\\alpha': 'α',
  '\\beta': 'β',
  '\\gamma': 'γ',
  '\\delta': 'δ',
  '\\epsilon': 'ϵ',
  '\\zeta': 'ζ',
  '\\eta': 'η',
  '\\theta': 'θ',
  '\\iota': 'ι',
  '\\kappa': 'κ',
  '\\lambda': 'λ',
  '\\mu': 'μ',
  '\\nu': 'ν',
  '\\xi': 'ξ',
  '\\pi': 'π',
  '\\rho': 'ρ',
  '\\sigma': 'σ',
  '\\tau': 'τ',
  '\\upsilon': 'υ',
  '\\phi': 'ϕ',
  '\\varphi': 'φ',
  '\\chi': 'χ',
  '\\psi': 'ψ',
  '\\omega': 'ω',
  '\\Gamma': 'Γ',
  '\\Delta': 'Δ',
  '\\Theta': 'Θ',
  '\\Lambda': 'Λ',
  '\\Xi': 'Ξ',
  '\\Pi': 'Π',
  '\\Sigma': 'Σ',
  '\\Upsilon': 'Υ',
  '\\Phi': 'Φ',
  '\\Psi': 'Ψ',
  '\\Omega': 'Ω',
}
