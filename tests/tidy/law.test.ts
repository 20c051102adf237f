/** What holds of tidying any text: it says the same as before, line for line, and is said once. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { lineOf, type Span } from '../../src/base/span.ts'
import { type Compiled, compileText } from '../../src/compile.ts'
import { nearbyOf } from '../../src/files.ts'
import { publish, type TextFormat } from '../../src/publish.ts'
import { parseMarkdown } from '../../src/read/markdown.ts'
import { isTopic } from '../../src/read/topics.ts'
import { tidy } from '../../src/tidy/tidy.ts'
import { longDocument } from '../bench/generate.mjs'
import { asset } from '../render/assets.ts'
import { randomFrom } from '../support/random.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const documents: readonly string[] = ['samples', 'tests/golden', 'tests/tidy/pairs'].flatMap(folder =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter(path => path.endsWith('.md') && !path.endsWith('report.md'))
    .map(path => join(folder, path))
    .sort(),
)
const read = (path: string): string => readFileSync(join(root, path), 'utf8')

/** The mark of the source is left out of what is compared. */
const host = { version: '0.0.0', asset, sha256: () => 'the same' }

/** All that a document says: its messages with their lines, its values, its pages. */
function said(text: string, path: string, formats: readonly TextFormat[]) {
  const compiled = compileText('calc.md', text, nearbyOf(join(root, path)))
  return {
    messages: compiled.diagnostics.map(({ rule, severity, message, help, at, also }) => ({
      rule,
      severity,
      message,
      help,
      lines: [at, ...also].map(({ span, text }) => [lineIn(compiled, span), text]),
    })),
    pages: formats.flatMap(format => publish(compiled, 'calc', format, true, host).map(page => compared(page.text))),
  }
}

const lineIn = ({ source }: Compiled, { start }: Span): number => lineOf(source, start)
/** A page without the columns of its messages and without the source that it shows. */
const compared = (page: string): string =>
  page
    .replace(/"column":\s*\d+/g, '"column":0')
    .replace(/(<span class="place">line \d+<\/span>)<code.*?<\/code>/gs, '$1')
    .replace(/^((?:> ?)+line \d+)[^\n]*/gm, '$1')
    .replace(/(?<=class="trace-data">).*?(?=<\/script>)/s, data => JSON.stringify(withoutLines(JSON.parse(data))))

/** The panel of a page shows each line of the source as it is typed; which lines it shows stays. */
const withoutLines = (trace: { readonly lines: Readonly<Record<string, string>> }) => ({
  ...trace,
  lines: Object.keys(trace.lines),
})

/** The text with our fences at the margin taken out, and how many lines each has. */
function around(text: string) {
  const parts: (string | number)[] = []
  let from = 0
  for (const node of parseMarkdown(text).children) {
    if (node.type !== 'code' || !isTopic(node.lang ?? '') || node.position?.start.column !== 1) continue
    const [start, end] = [node.position.start.offset ?? 0, node.position.end.offset ?? 0]
    parts.push(text.slice(from, start), text.slice(start, end).split('\n').length)
    from = end
  }
  return [...parts, text.slice(from)]
}

describe('every document of the house, tidied,', () => {
  test.each(documents)('%s says the same', path => {
    const text = read(path)
    const tidied = tidy(text)
    expect(tidy(tidied)).toBe(tidied)
    expect(around(tidied)).toEqual(around(text))
    expect(said(tidied, path, ['html', 'md', 'json'])).toEqual(said(text, path, ['html', 'md', 'json']))
  })

  test('a long one says the same', () => {
    const text = longDocument(12, 120)
    expect(tidy(text)).not.toBe(text)
    expect(said(tidy(text), 'calc.md', ['md', 'json'])).toEqual(said(text, 'calc.md', ['md', 'json']))
  })
})

/** Signs that mean something to a reader of Markdown, of blocks or of expressions, and some that mean nothing. */
const signs = [
  ...' |\\`~#=:-+*/()<>≤"\'_.,x1\n\t\r\0',
  '\r\n',
  '\n\n',
  '\u00a0',
  '\u2028',
  '\ufeff',
  '->',
  '<=',
  '```',
  '~~~',
  '```walls\n',
  '\n```\n',
  '# ',
  '\n    ```\n',
  '界',
  'e\u0301',
  '👷🏽',
  '|---|',
  ' # note',
  '   # more\n',
]

/** A text with signs put in, lines taken out, doubled and set in. */
function hurt(text: string, seed: number): string {
  const random = randomFrom(seed)
  let out = text
  for (let left = random.whole(1, 12); left > 0; left--) {
    const at = random.whole(0, out.length)
    const line = out.indexOf('\n', at) + 1
    const kind = random.whole(0, 9)
    if (kind < 6) out = out.slice(0, at) + random.pick(signs) + out.slice(at)
    else if (kind < 8) out = out.slice(0, at) + out.slice(at + random.whole(1, 9))
    else if (kind === 8) out = out.slice(0, line) + random.pick(['  ', '    ', '> ', '- ', '\t']) + out.slice(line)
    else out = out.slice(0, line) + out.slice(at, line) + out.slice(line)
  }
  return out
}

const hurtDocuments = fc.record({ path: fc.constantFrom(...documents), seed: fc.nat() })
const small = documents.filter(path => read(path).length < 2500)

test('any text is tidied once, in its fences only, and no line is added or taken away', () => {
  fc.assert(
    fc.property(hurtDocuments, ({ path, seed }) => {
      const text = hurt(read(path), seed)
      const tidied = tidy(text)
      expect(tidy(tidied)).toBe(tidied)
      expect(around(tidied)).toEqual(around(text))
      expect(tidied.split('\n').length).toBe(text.split('\n').length)
    }),
    { numRuns: 250, seed: 71 },
  )
})

test('any text says the same when it is tidied, line for line', () => {
  fc.assert(
    fc.property(fc.constantFrom(...small), fc.nat(), (path, seed) => {
      const text = hurt(read(path), seed)
      expect(said(tidy(text), path, ['md', 'json'])).toEqual(said(text, path, ['md', 'json']))
    }),
    { numRuns: 120, seed: 72 },
  )
})

test('signs alone are no text that it stumbles over', () => {
  fc.assert(
    fc.property(
      fc.array(fc.constantFrom(...signs, '```equations\n', '```areas roof\n| a |\n'), { maxLength: 60 }),
      parts => {
        const text = parts.join('')
        expect(tidy(tidy(text))).toBe(tidy(text))
        expect(around(tidy(text))).toEqual(around(text))
      },
    ),
    { numRuns: 1500, seed: 73 },
  )
})

/** Space put where it means nothing. */
function spread(text: string, seed: number): string {
  const random = randomFrom(seed)
  const space = () => ' '.repeat(random.whole(0, 3))
  let inside = false
  return text
    .split('\n')
    .map(line => {
      if (line.startsWith('```')) {
        inside = !inside && isTopic(/^```(\S*)/.exec(line)?.[1] ?? '')
        return line.replaceAll(' ', () => ` ${space()}`)
      }
      if (!inside) return line
      if (/^\|[-|]+\|$/.test(line))
        return `|${line
          .split('|')
          .slice(1, -1)
          .map(() => `${space()}-${space()}|`)
          .join('')}`
      if (line.startsWith('|')) return line.replace(/ *\| */g, () => `${space()}|${space()}`)
      return line.replace(/^(\w+) = | -> | <= |^([\w' ]+): | {3}(?=#)/g, found =>
        found.replaceAll(' ', () => ` ${space()}`),
      )
    })
    .map(line => (inside || line.startsWith('```') ? line + space() : line))
    .join('\n')
}

test('however the same block is spaced, it comes out the same', () => {
  const starter = tidy(read('samples/starter.md'))
  const boatyard = tidy(read('samples/boatyard.md'))
  for (let seed = 0; seed < 20; seed++)
    for (const text of [starter, boatyard]) {
      const spaced = spread(text, seed)
      expect(spaced).not.toBe(text)
      expect(tidy(spaced).replace(/ +$/gm, '')).toBe(text)
    }
})
