/** Renaming changes names and nothing else, whatever is renamed. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { type Compiled, compileText } from '../../src/compile.ts'
import { everyValue } from '../../src/explain/trace.ts'
import { nearbyOf } from '../../src/files.ts'
import { keyOf, type Mention } from '../../src/lsp/names.ts'
import { type Opened, opened } from '../../src/lsp/opened.ts'
import { rename, withNames } from '../../src/lsp/rename.ts'
import { building } from './client.ts'

const root = fileURLToPath(new URL('../../samples', import.meta.url))
const samples = readdirSync(root, { recursive: true, encoding: 'utf8' })
  .filter(name => name.endsWith('.md'))
  .sort()

interface Home {
  readonly text: string
  readonly compile: (text: string) => Compiled
  readonly open: (text: string) => Opened
  /** Lets a build go: each holds a whole building. */
  readonly forget: (text: string) => void
}

function homeOf(path: string, text: string): Home {
  const made = new Map<string, Compiled>()
  // The same text is asked for again and again.
  const compile = (text: string) => {
    const known = made.get(text) ?? compileText('sample.md', text, nearbyOf(path))
    made.set(text, known)
    return known
  }
  const rebuilder = { compile, page: () => ({ head: '', parts: [] }) as never }
  const forget = (text: string) => made.delete(text)
  return { text, compile, forget, open: text => opened('sample.md', text, rebuilder, nearbyOf(path)) }
}

const homes = new Map([
  ...samples.map(name => [name, homeOf(join(root, name), readFileSync(join(root, name), 'utf8'))] as const),
  ['a building of two levels', homeOf(root, building)] as const,
  ['the same with lines that end in CR LF', homeOf(root, building.replaceAll('\n', '\r\n'))] as const,
])

const renameable = ({ given, sort }: Mention) =>
  given && ['level', 'wall', 'construction', 'equation', 'line'].includes(sort)

/** Every value that is printed, or that a printed one rests on, by the id that it would have under the old name. */
function values({ context }: Compiled, idBefore: (id: string) => string): ReadonlyMap<string, string> {
  const all = everyValue([...context.besides.values(), ...context.roots.values()])
  return new Map(all.map(({ id, si, unit }) => [idBefore(id), `${si} ${unit.scale}`]))
}

/** No name of any sample holds it, so that it can be put back by its letters. */
const NEW = 'Qx7'

describe.each([...homes.keys()])('in %s', name => {
  const home = homes.get(name)
  if (!home) throw new Error('there is such a document')
  const document = home.open(home.text)
  const before = document.compiled()
  const isContinuous = /^walls: continuous$/m.test(home.text)

  test('every name is where it is said to be, and all can be read', () => {
    const { mentions, unread } = document.names()
    for (const { span, name } of mentions) expect(home.text.slice(span.start, span.end)).toBe(name)
    expect(unread).toEqual([])
    expect(home.text).not.toContain(NEW)
  })

  test('a new name leaves every value as it was, and the old name again the text', () => {
    const things = new Map(
      document
        .names()
        .mentions.filter(renameable)
        .map(each => [keyOf(each), each] as const),
    )
    for (const thing of things.values()) {
      const spans = rename(document, thing.span.start, NEW, home.compile)
      // A wall that runs through the levels is named on each of them: on one alone it would stand on nothing.
      if (thing.sort === 'wall' && isContinuous) {
        expect(spans.ok ? '' : spans.because).toContain(`${thing.name} is not renamed`)
        continue
      }
      if (!spans.ok) throw new Error(`${thing.sort} ${thing.name}: ${spans.because}`)
      const text = withNames(home.text, spans.value, NEW)
      const after = home.open(text)
      const made = after.compiled()
      expect(made.diagnostics.map(({ rule }) => rule)).toEqual(before.diagnostics.map(({ rule }) => rule))
      expect(
        values(made, id =>
          id
            .split('.')
            .map(part => (part === NEW ? thing.name : part))
            .join('.'),
        ),
      ).toEqual(values(before, id => id))
      const again = after.names().mentions.find(each => each.sort === thing.sort && each.name === NEW)
      const back = rename(after, again?.span.start ?? -1, thing.name, home.compile)
      expect(back.ok && withNames(text, back.value, thing.name)).toBe(home.text)
      home.forget(text)
    }
  })
})

test('a wall of one level is renamed apart from that of another', () => {
  const home = homeOf(root, building)
  const document = home.open(building)
  const loft = document.names().mentions.find(each => each.sort === 'wall' && each.of === 'loft' && each.name === 'N1')
  const spans = rename(document, loft?.span.start ?? -1, NEW, home.compile)
  expect(spans.ok && spans.value).toHaveLength(1)
})

test('a name that stands in prose as a plain word is left alone', () => {
  const text = building.replace('weighs', 'of wall N1 weighs')
  const home = homeOf(root, text)
  const document = home.open(text)
  const spans = rename(document, text.indexOf('N1   | D1'), NEW, home.compile)
  expect(spans.ok && withNames(text, spans.value, NEW)).toContain('of wall N1 weighs')
})
