/**
 * The colours of our blocks in an editor: the grammar is put into a Markdown grammar that editors use, and
 * what it says of each place is compared with what our own readers find there.
 */
import { readdirSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { beforeAll, describe, expect, test } from 'vitest'
import oniguruma from 'vscode-oniguruma'
import textmate, { type IGrammar, type StateStack } from 'vscode-textmate'
import { type FunctionName, functions, namesIn } from '../../src/base/expr.ts'
import { lineOf, type Source, type Span, sourceOf } from '../../src/base/span.ts'
import { unitSpellings } from '../../src/base/unit.ts'
import { readEquation } from '../../src/model/equations.ts'
import { isLimit } from '../../src/model/limits.ts'
import { readDocument } from '../../src/read/document.ts'
import { parseMarkdown } from '../../src/read/markdown.ts'
import { topics } from '../../src/read/topics.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const require = createRequire(import.meta.url)
const own = readFileSync(join(root, 'templates/platemark.tmLanguage.json'), 'utf8')
const OWN = 'text.html.markdown.platemark'

let grammar: IGrammar
beforeAll(async () => {
  await oniguruma.loadWASM(readFileSync(require.resolve('vscode-oniguruma/release/onig.wasm')))
  // The Markdown grammar drops front matter where the grammar of YAML is not there.
  const others: Readonly<Record<string, string>> = { 'text.html.markdown': 'markdown', 'source.yaml': 'yaml' }
  const registry = new textmate.Registry({
    onigLib: Promise.resolve({
      createOnigScanner: patterns => new oniguruma.OnigScanner(patterns),
      createOnigString: text => new oniguruma.OnigString(text),
    }),
    loadGrammar: async scope => {
      if (scope === OWN) return textmate.parseRawGrammar(own, 'platemark.json')
      const name = others[scope]
      if (name === undefined) return null
      const file = require.resolve(`tm-grammars/grammars/${name}.json`)
      return textmate.parseRawGrammar(readFileSync(file, 'utf8'), file)
    },
    getInjections: scope => (scope === 'text.html.markdown' ? [OWN] : undefined),
  })
  const loaded = await registry.loadGrammar('text.html.markdown')
  if (!loaded) throw new Error('the Markdown grammar was not found')
  grammar = loaded
})

interface Token {
  readonly start: number
  readonly end: number
  /** The scopes that are ours, without the name of the language. */
  readonly ours: readonly string[]
}

/** The tokens of a text, by their offsets in it. */
function tokensOf(text: string): readonly Token[] {
  const tokens: Token[] = []
  let state: StateStack = textmate.INITIAL
  let offset = 0
  for (const line of text.split('\n')) {
    const { tokens: found, ruleStack } = grammar.tokenizeLine(line, state)
    for (const { startIndex, endIndex, scopes } of found) {
      const ours = scopes.flatMap(scope => (scope.endsWith('.platemark') ? [scope.slice(0, -'.platemark'.length)] : []))
      tokens.push({ start: offset + startIndex, end: offset + Math.min(endIndex, line.length), ours })
    }
    state = ruleStack
    offset += line.length + 1
  }
  return tokens
}

/** The scopes of ours that all of a place has. */
function scopesAt(tokens: readonly Token[], { start, end }: Span): readonly string[] {
  const [first, ...rest] = tokens.filter(token => token.start < end && token.end > start)
  return first?.ours.filter(scope => rest.every(({ ours }) => ours.includes(scope))) ?? []
}

/** The text of each token that has a scope. */
const textsWith = (text: string, scope: string): readonly string[] =>
  tokensOf(text).flatMap(({ start, end, ours }) => (ours.includes(scope) ? [text.slice(start, end)] : []))

const samples = readdirSync(join(root, 'samples'), { recursive: true, encoding: 'utf8' })
  .filter(path => path.endsWith('.md') && !path.endsWith('.worked.md'))
  .sort()

const FENCE = 'markup.fenced_code.block'

describe.each(samples)('%s', path => {
  const text = readFileSync(join(root, 'samples', path), 'utf8')
  const source: Source = sourceOf(path, text)
  const { blocks, quotes } = readDocument(parseMarkdown(text), source)
  let tokens: readonly Token[]
  beforeAll(() => {
    tokens = tokensOf(text)
  })

  test('every line of our blocks is known as ours, and no other line', () => {
    const ours = new Set<number>()
    for (const { position } of blocks.keys())
      for (let line = position?.start.line ?? 0; line <= (position?.end.line ?? 0); line++) ours.add(line)
    const known = new Set(tokens.filter(token => token.ours.includes(FENCE)).map(({ start }) => lineOf(source, start)))
    expect([...known].sort()).toEqual([...ours].sort())
  })

  test('outside them nothing is ours but quotes, each of which is known', () => {
    const outside = tokens.filter(({ ours }) => ours.length > 0 && !ours.includes(FENCE))
    expect(outside.filter(({ ours }) => !ours.includes('meta.quote'))).toEqual([])
    const begun = outside.filter(({ ours }) => ours.includes('punctuation.definition.quote.begin'))
    expect(begun).toHaveLength(quotes.length)
    // A quote whose bar is escaped, within a table, has no place in the text as it is typed.
    for (const { id } of quotes.filter(({ id }) => text.startsWith(id.text, id.span.start)))
      expect(scopesAt(tokens, id.span)).toContain('variable.other')
  })

  test('what our readers take for a topic, a level, an option, a setting, a column, a name is shown as one', () => {
    const wrong: string[] = []
    const shown = (place: Span, scope: string) => {
      if (place.end > place.start && !scopesAt(tokens, place).includes(scope))
        wrong.push(`${text.slice(place.start, place.end)} is not ${scope} but ${scopesAt(tokens, place).join(' ')}`)
    }
    for (const { topic, info, about, options, settings, table, lines } of blocks.values()) {
      shown({ start: info.start, end: info.start + topic.length }, 'storage.type.topic')
      if (about) shown(about.span, about.text.includes(' ') ? FENCE : 'entity.name.type.about')
      for (const { name } of options) shown(name.span, 'entity.other.attribute-name.option')
      for (const { name } of settings) shown(name.span, 'support.type.property-name')
      for (const { name, unit } of table?.header ?? []) {
        shown(name.span, 'entity.name.tag.column')
        if (unit) shown(unit.span, 'keyword.other.unit')
      }
      for (const { line } of table?.rows ?? []) shown(line.span, 'markup.table.row')
      if (topic === 'working') for (const { span } of lines) shown(span, 'keyword.other.request')
      if (topic !== 'equations') continue
      for (const line of lines) {
        const equation = isLimit(line) ? undefined : readEquation(line)
        if (!equation?.ok) continue
        const { name, body } = equation.value
        shown(name.span, 'variable.other.definition')
        for (const place of namesIn(body).values()) shown(place, 'variable.other')
      }
    }
    expect(wrong).toEqual([])
  })

  test('every comment of a block is shown as one, and nothing else', () => {
    const typed = [...blocks.keys()].flatMap(({ value }) =>
      value.split('\n').flatMap(line => (line.startsWith('|') ? [] : (/(?:^|\s)(#.*)$/.exec(line)?.slice(1) ?? []))),
    )
    const begun = tokens.filter(({ ours }) => ours.includes('punctuation.definition.comment'))
    expect(begun).toHaveLength(typed.length)
  })
})

describe('the words of the language', () => {
  test('topics are those that the reader knows', () => {
    const { repository }: { repository: Record<string, { begin?: string }> } = JSON.parse(own)
    const named = Object.values(repository).flatMap(
      ({ begin = '' }) => /\[ \\t\]\*\(([^)]*)\)/.exec(begin)?.[1]?.split('|') ?? [],
    )
    expect(named.filter(word => /^[a-z-]+$/.test(word)).toSorted()).toEqual([...topics].sort())
  })

  test.each(topics)('%s opens a block, and a longer word does not', topic => {
    expect(textsWith(`\`\`\`${topic}\n\`\`\`\n`, 'storage.type.topic')).toEqual([topic])
    expect(textsWith(`~~~ ${topic} roof\n~~~\n`, 'storage.type.topic')).toEqual([topic])
    expect(textsWith(`\`\`\`${topic}x\n\`\`\`\n`, FENCE)).toEqual([])
  })

  const inEquations = (line: string): string => `\`\`\`equations\n${line}\n\`\`\`\n`

  test.each(unitSpellings())('%s is a unit behind a number, and behind an arrow', unit => {
    expect(textsWith(inEquations(`a = 1.5 ${unit} + b`), 'keyword.other.unit')).toEqual([unit])
    expect(textsWith(inEquations(`a = b -> ${unit}`), 'keyword.other.unit')).toEqual([unit])
  })

  test.each(Object.keys(functions) as FunctionName[])(
    '%s is a function before a bracket, and a name elsewhere',
    name => {
      expect(textsWith(inEquations(`a = ${name}(b)`), 'support.function')).toEqual([name])
      expect(textsWith(inEquations(`a = ${name} + 1`), 'support.function')).toEqual([])
    },
  )
})

describe('places that are easily taken for something else', () => {
  const block = (topic: string, ...lines: readonly string[]): string => `\`\`\`${topic}\n${lines.join('\n')}\n\`\`\`\n`

  test('feet and inches are numbers with their marks', () => {
    const text = block('equations', `L = 12'-6 1/2" + 3/8 in + f'm + 6''`)
    expect(textsWith(text, 'keyword.other.unit')).toEqual(["'", '"', 'in', "''"])
    expect(textsWith(text, 'constant.numeric')).toEqual(['12', '6', '1/2', '3/8', '6'])
    expect(textsWith(text, 'variable.other')).toEqual(["f'm"])
  })

  test('a compound unit is one, and an unknown one is none', () => {
    expect(textsWith(block('equations', 'M = 30 kip*ft^2/in + 2 parsec'), 'keyword.other.unit')).toEqual([
      'kip',
      'ft',
      'in',
    ])
  })

  test('the sign of a load case belongs to its name', () => {
    expect(textsWith(block('equations', 'V = roof.wall.W1.V.EX+ + 1 kip'), 'variable.other')).toEqual([
      'roof.wall.W1.V.EX+',
    ])
  })

  test('a # in a row is no comment, and an escaped bar parts no cells', () => {
    const text = block('walls roof', '| wall | note |', '|---|---|', '| W1 | a \\| b # c |')
    expect(textsWith(text, 'comment.line.number-sign')).toEqual([])
    expect(textsWith(text, 'punctuation.definition.table')).toHaveLength(6)
    expect(textsWith(text, 'punctuation.separator.table')).toEqual(['|---|---|'])
  })

  test('a block ends with its own marks only', () => {
    const text = '````equations\na = 1 ft\n```\nb = 2 ft\n````\nwords b = 3 ft\n'
    expect(textsWith(text, 'variable.other.definition')).toEqual(['a', 'b'])
    expect(textsWith('~~~equations\na = 1\n```\nb = 2\n~~~\nc = 3\n', 'variable.other.definition')).toEqual(['a', 'b'])
  })

  test('nothing is ours in foreign fences, in code, in front matter or in a comment of HTML', () => {
    const foreign = [
      '---\ntitle: "{{roof.W}}"\n---\n',
      '````markdown\n```walls\n| a |\n```\n{{roof.W}}\n````\n',
      'Words `{{roof.W}}` words.\n',
      '    ```walls\n',
      '<!-- {{roof.W}} -->\n',
      '```js\n// {{roof.W}}\n```\n',
    ]
    for (const text of foreign) expect(tokensOf(text).filter(({ ours }) => ours.length > 0)).toEqual([])
  })

  test('a quote is known in a heading, a list, a table and stressed words', () => {
    const text = '# The {{roof.W}}\n\n- item {{roof.W | 1 kip}}\n\n| a |\n|---|\n| {{roof.W}} |\n\n**{{roof.W}}**\n'
    expect(textsWith(text, 'punctuation.definition.quote.begin')).toHaveLength(4)
    expect(textsWith(text, 'keyword.other.unit')).toEqual(['kip'])
  })
})
