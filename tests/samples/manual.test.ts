/** The samples compile clean, and the manual keeps up with the program that it describes. */
import { createHash } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { functions } from '../../src/base/expr.ts'
import { inLanguage } from '../../src/base/language.ts'
import { longForm, oneLine } from '../../src/base/report.ts'
import { unitSpellings } from '../../src/base/unit.ts'
import { compileText } from '../../src/compile.ts'
import { buildingWants, documentWants, wants } from '../../src/explain/request.ts'
import { nearbyOf } from '../../src/files.ts'
import { readChoices } from '../../src/model/front.ts'
import { type Host, publish } from '../../src/publish.ts'
import { noFrontMatter } from '../../src/read/front.ts'
import { laterTopics, topics } from '../../src/read/topics.ts'
import { profiles } from '../../src/standards/catalogue.ts'
import { windy } from '../support/windy.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const read = (path: string): string => readFileSync(join(root, path), 'utf8')

const filesIn = (folder: string, ending: string): readonly string[] =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter(path => path.endsWith(ending))
    .map(path => join(folder, path))
    .sort()

const samples = filesIn('samples', '.md').filter(path => !path.endsWith('.worked.md'))
const chapters = filesIn('samples/manual', '.md')
const chapter = (name: string): string => read(`samples/manual/${name}.md`)
const manual = chapters.map(read).join('\n')

/** Names that the manual sets in code; a name with a fence of its own counts too. */
const inCode = new Set([...manual.matchAll(/`([^`\n]+)`/g)].map(([, code]) => code ?? ''))
const untold = (names: readonly string[]): readonly string[] => names.filter(name => !inCode.has(name))

describe('samples', () => {
  test('there are the samples and the seven chapters', () => {
    expect(samples.map(path => relative('samples', path))).toEqual(
      expect.arrayContaining(['boatyard.md', 'millrace.md', 'observatory.md', 'starter.md']),
    )
    expect(chapters).toHaveLength(7)
  })

  test.each(samples)('%s compiles without errors or warnings', path => {
    const { source, diagnostics, checks } = compileText(path, read(path), nearbyOf(join(root, path)))
    expect(diagnostics.map(diagnostic => longForm(source, diagnostic))).toEqual([])
    expect(checks.filter(({ ok }) => !ok)).toEqual([])
  })

  test('the starter is one page of source', () => {
    expect(read('samples/starter.md').split('\n').length).toBeLessThan(60)
  })

  test('the main sample is as irregular as it is meant to be', () => {
    const { context } = compileText('boatyard.md', read('samples/boatyard.md'))
    const ids = [...context.roots.keys()]
    const walls = new Set(ids.flatMap(id => /^roof\.wall\.([^.]+)\.k$/.exec(id)?.[1] ?? []))
    const areas = new Set(ids.flatMap(id => /^roof\.areas\.([^.]+)\.A$/.exec(id)?.[1] ?? []))
    expect(walls.size).toBeGreaterThanOrEqual(8)
    expect(areas.size).toBeGreaterThanOrEqual(4)
    expect(ids).toContain('roof.K.xy')
  })
})

describe('the manual tells of', () => {
  test('every topic, and those kept for later', () => {
    expect(untold([...topics, ...laterTopics])).toEqual([])
  })

  test('everything that a working may ask for, with a section of its own', () => {
    const headings = [...chapter('04-workings').matchAll(/^## (.+)$/gm)].map(([, text]) => text ?? '')
    const lists = chapter('04-workings').split('## The lists of the document')[1] ?? ''
    expect(
      [...wants, ...buildingWants].map(want => inLanguage(want, 'en-US')).filter(want => !headings.includes(want)),
    ).toEqual([])
    expect(documentWants.filter(want => !lists.includes(`- \`${want}\`:`))).toEqual([])
  })

  test('every spelling of every unit', () => {
    expect(untold(unitSpellings())).toEqual([])
  })

  test('every function', () => {
    const table = chapter('02-expressions')
    expect(Object.keys(functions).filter(name => !table.includes(`\`${name}(`))).toEqual([])
  })

  test('every entry of the front matter, and no other', () => {
    const section = chapter('01-documents').split('## Front matter')[1]?.split('\n## ')[0] ?? ''
    const told = [...section.matchAll(/^\| `([a-z]+)` /gm)].map(([, name]) => name ?? '')
    const entries = new Map(told.map(name => [name, { text: 'US', span: { start: 0, end: 1 } }]))
    const unknown = readChoices({ ...noFrontMatter, entries }).faults.filter(
      ({ rule }) => rule === 'front-matter-unknown',
    )
    expect(unknown.map(({ message }) => message)).toEqual([])
    expect(told.toSorted()).toEqual(entryNames().toSorted())
  })

  test('every column and setting that a block may have', () => {
    const building = filesIn('src/model', '.ts').map(read).join('\n')
    const lists = [
      ...building.matchAll(/(?:needed|optional): \[([^\]]*)\]|Settings(?:: readonly string\[\])? = \[([^\]]*)\]/g),
    ]
    const names = lists.flatMap(([, columns, settings]) =>
      [...(columns ?? settings ?? '').matchAll(/'([^']+)'|"([^"]+)"/g)].map(([, one, other]) => one ?? other ?? ''),
    )
    expect(names.length).toBeGreaterThan(20)
    expect(untold([...new Set(names)])).toEqual([])
  })

  test('every setting of every standard', () => {
    const settings = profiles.flatMap(({ settings }) => settings.map(({ name }) => name))
    expect(settings.length).toBeGreaterThan(60)
    expect(untold([...new Set(settings)])).toEqual([])
    const told = [...chapter('03-building').matchAll(/^\*\*(.+?)\*\*/gm)].flatMap(([, names]) =>
      (names ?? '').split(', '),
    )
    expect(profiles.map(({ name }) => name).filter(name => !told.includes(name))).toEqual([])
  })

  test('every rule of a message', () => {
    const told = new Set(
      [...chapter('07-messages').matchAll(/^\| `([a-z0-9-]+)` +\| (?:error|warning) /gm)].map(r => r[1]),
    )
    const rules = rulesIn(filesIn('src', '.ts').map(read).join('\n'))
    expect(rules.length).toBeGreaterThan(60)
    expect(rules.filter(rule => !told.has(rule))).toEqual([])
    expect([...told].filter(rule => !rules.includes(rule ?? ''))).toEqual([])
  })
})

/** The names that the front matter is read by, as the program offers them. */
function entryNames(): readonly string[] {
  const source = read('src/model/front.ts')
  const lists = [...source.matchAll(/const (?:printedKeys|listKeys|keys)[^=]*= \[([^\]]*)\]/g)].map(
    ([, list]) => list ?? '',
  )
  return lists.join().match(/(?<=')[a-z]+(?=')/g) ?? []
}

/** Rules by the calls that make a diagnostic; those of the choices and the three missing givens are composed. */
function rulesIn(source: string): readonly string[] {
  const calls = [
    /'(?:error|warning)',\s*'([a-z]+(?:-[a-z0-9]+)+)'/g,
    /(?:fault|stop)\(\s*'([a-z]+(?:-[a-z0-9]+)+)'/g,
    /rule: '([a-z]+(?:-[a-z0-9]+)+)'/g,
  ].flatMap(pattern => [...source.matchAll(pattern)].map(([, rule]) => rule ?? ''))
  const composed = [
    ...['units', 'language', 'paper', 'cover', 'contents'].map(key => `${key}-unknown`),
    'areas-missing',
    'walls-missing',
    'forces-missing',
  ]
  return [...new Set([...calls, ...composed])]
}

describe('value ids', () => {
  const source = chapter('05-values')
  const [quotable = '', rest = ''] = source.split('## Values of the JSON only')
  const jsonOnly = rest.split('\n## ')[0] ?? ''
  const patterns = idsOfTable(quotable)

  test('the tables list what the ids of the design need', () => {
    expect(patterns.length).toBeGreaterThan(80)
  })

  test('every id of the tables resolves in a building that has it', () => {
    const missing = homes.map(
      home =>
        new Set(
          unresolved(
            patterns.map(pattern => filledIn(pattern, home.names)),
            home,
          ),
        ),
    )
    const nowhere = patterns.filter(pattern =>
      homes.every((home, i) => missing[i]?.has(filledIn(pattern, home.names)) ?? true),
    )
    expect(nowhere).toEqual([])
  })

  test.each(['US', 'SI'])('values print in the %s unit that the tables tell', system => {
    const units = unitsTold(quotable, system)
    expect(units.size).toBeGreaterThan(80)
    const wrong = homes.flatMap(home => {
      const found = printedQuotes([...units.keys()], home, system)
      return [...found].flatMap(([pattern, printed]) =>
        unitIn(printed) === units.get(pattern) ? [] : [`${pattern}: ${printed}`],
      )
    })
    expect(wrong).toEqual([])
  })

  test('every name that the program takes in an id is in the tables', () => {
    const taken = [...read('src/compute/ids.ts').matchAll(/case '([^']+)'/g)].map(([, name]) => name ?? '')
    const parts = new Set(patterns.flatMap(pattern => pattern.split('.')))
    expect(taken.length).toBeGreaterThan(30)
    expect(taken.filter(name => !parts.has(name))).toEqual([])
  })

  test('an id that is not in the tables does not resolve', () => {
    const [home] = homes
    if (!home) throw new Error('there is a building')
    expect(unresolved(['roof.weight', 'roof.W'], home)).toEqual(['roof.weight'])
  })

  test.each([
    'samples/boatyard.md',
    'samples/observatory.md',
    'samples/millrace.md',
    'samples/quay-hostel.md',
    'samples/manual/03-building.md',
  ])('every value in the JSON of %s is told of', path => {
    const known = [...patterns, ...idsOfTable(jsonOnly)].map(patternOf)
    const strange = Object.keys(jsonOf(path).values).filter(id => !known.some(pattern => pattern.test(id)))
    expect(strange).toEqual([])
  })

  test('what is listed for the JSON only is in a JSON', () => {
    const ids = [
      'samples/boatyard.md',
      'samples/observatory.md',
      'samples/millrace.md',
      'samples/quay-hostel.md',
      'samples/manual/02-expressions.md',
      'samples/manual/03-building.md',
    ].flatMap(path => Object.keys(jsonOf(path).values))
    expect(idsOfTable(jsonOnly).filter(pattern => !ids.some(id => patternOf(pattern).test(id)))).toEqual([])
  })
})

/** Ids in code in the first cell of each row: a dotted pattern, or a single word in capitals that stands for one. */
function idsOfTable(text: string): readonly string[] {
  return text
    .split('\n')
    .filter(line => line.startsWith('|'))
    .flatMap(line => [...(line.split('|')[1] ?? '').matchAll(/`([^`]+)`/g)].map(([, id]) => id ?? ''))
    .filter(id => id.includes('.') || id === 'EQUATION')
    .filter((id, i, all) => all.indexOf(id) === i)
}

type Names = Readonly<Record<string, string>>

interface Home {
  readonly text: string
  readonly names: Names
}

/** A building with a skewed wall and every kind of load, and one whose walls lie along the axes. */
const homes: readonly Home[] = [
  {
    text: chapter('05-values'),
    names: {
      LEVEL: 'roof',
      AREA: 'Main',
      LINE: 'Front',
      POINT: 'Fan',
      WALL: 'K1',
      CORNER: 'C2',
      CASE: 'EX+',
      GRID: 'B',
      NAME: 'CMU8',
      EQUATION: 'V_b',
    },
  },
  {
    text: chapter('05-values'),
    names: {
      LEVEL: 'roof',
      NAME: 'CONC',
      AREA: 'Shaft',
      WALL: 'N1',
      CASE: 'EY-',
      CORNER: 'C1',
      OPENING: 'D1',
      PIER: 'G1',
      STRIP: 'S1',
    },
  },
  { text: chapter('04-workings'), names: { LEVEL: 'roof', AREA: 'Porch', WALL: 'P', CASE: 'EY', NAME: 'CMU8' } },
  { text: read('samples/millrace.md'), names: { LEVEL: 'roof', AREA: 'West', WALL: 'A1', CASE: 'EX' } },
  { text: chapter('03-building'), names: { LEVEL: 'loft', BAND: 'S1', CASE: 'WXY4-+' } },
  ...[
    'V: 115 mph\nexposure: C\nroof: flat\nparapet: 3 ft',
    'windward: 18 psf\nleeward: 12 psf\neccentricity: 10%\nparapet: 3 ft',
    '| level | windward | leeward |\n|---|---|---|\n| roof | 20 psf | 12 psf |',
  ].map(wind => ({
    text: `${windy([{ name: 'roof', at: 20, size: [60, 40] }], wind)}\n\n\`\`\`forces roof\nx: 9 kip\ny: 9 kip\n\`\`\``,
    names: { LEVEL: 'roof', BAND: 'S1', CASE: 'WX' },
  })),
  {
    text: read('samples/quay-hostel.md').replace('units: SI', 'units: US'),
    names: { LEVEL: 'second', WALL: 'L1', CASE: 'EY+', NAME: 'RC200', MODE: '2' },
  },
]

const filledIn = (pattern: string, names: Names): string => pattern.replace(/[A-Z]{4,}/g, word => names[word] ?? word)

/** Of some ids, those that a quote at the end of the document does not find. */
function unresolved(ids: readonly string[], { text }: Home): readonly string[] {
  const quotes = ids.map(id => `{{${id}}}\n`).join('\n')
  const { source, diagnostics } = compileText('quotes.md', `${text}\n\n${quotes}`)
  expect(diagnostics.filter(({ rule }) => rule !== 'unknown-name')).toEqual([])
  return diagnostics.map(({ at }) => source.text.slice(at.span.start, at.span.end))
}

/** The unit of each id, from the column of its system; names have none and are left out. */
function unitsTold(text: string, system: string): ReadonlyMap<string, string> {
  const column = system === 'US' ? 3 : 4
  const rows = text.split('\n').map(line => line.split('|').map(cell => cell.trim()))
  return new Map(
    rows.flatMap(cells => {
      const [id] = idsOfTable(`|${cells[1] ?? ''}|`)
      const plain = id === undefined || id === 'EQUATION' || cells[2]?.endsWith('a name')
      return plain ? [] : [[id, cells[column] ?? ''] as const]
    }),
  )
}

/** What quotes of the ids print in a building, by their patterns; those that it does not have are left out. */
function printedQuotes(
  patterns: readonly string[],
  { text, names }: Home,
  system: string,
): ReadonlyMap<string, string> {
  const ids = new Map(patterns.map(pattern => [filledIn(pattern, names), pattern]))
  const missing = unresolved([...ids.keys()], { text, names })
  const there = [...ids].filter(([id]) => !missing.includes(id))
  const quotes = there.map(([id]) => `\`${id}\` {{${id}}}\n`).join('\n')
  const source = `${text.replace('units: US', `units: ${system}`)}\n\n## Quotes\n\n${quotes}`
  const [page] = publish(compileText('quotes.md', source), 'quotes', 'md', false, host)
  const lines = [...(page?.text.split(' Quotes\n')[1] ?? '').matchAll(/^`([^`]+)` \[?([^[\]\n]+?)(?:\]\(#[^)]*\))?$/gm)]
  expect(lines).toHaveLength(there.length)
  return new Map(lines.map(([, id = '', printed = '']) => [ids.get(id) ?? id, printed]))
}

/** What follows the number. */
const unitIn = (printed: string): string =>
  printed.replace(/^−?[\d.,\u202f]+(?:×10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)?\s*/, '').replace('°', 'deg')

function patternOf(pattern: string): RegExp {
  const body = pattern
    .replaceAll('.', '\\.')
    .replace(/[A-Z]{4,}/g, '[^.]+')
    .replace(/(?<=[a-z])N(?=\\|$)/g, '\\d+')
  return new RegExp(`^${body}$`)
}

interface Results {
  readonly values: Readonly<Record<string, unknown>>
}

const host: Host = {
  version: '0.0.0',
  asset: () => '',
  sha256: text => createHash('sha256').update(text).digest('hex'),
  shapes: () => '',
}

function jsonOf(path: string): Results {
  const [file] = publish(compileText(path, read(path)), 'results', 'json', false, host)
  // The form of the results is checked against its schema by the tests of render.
  return JSON.parse(file?.text ?? '{}') as Results
}

describe('messages', () => {
  test('the messages that the manual shows are those that its example gives', () => {
    const [example = '', long = '', list = ''] = [
      ...chapter('07-messages').matchAll(/^````(?:markdown|text)\n([\s\S]*?)\n````$/gm),
    ].map(([, text]) => text)
    const { source, diagnostics } = compileText('kiln.md', `${example}\n`)
    expect(diagnostics.map(diagnostic => longForm(source, diagnostic)).join('\n\n')).toBe(long)
    expect(diagnostics.map(diagnostic => oneLine(source, diagnostic)).join('\n')).toBe(list)
  })
})
