/** The direction of the house: an import points up the list of stages, never down. */
import { readdirSync, readFileSync } from 'node:fs'
import { dirname, join, relative, sep } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'

const root = fileURLToPath(new URL('../src', import.meta.url))

/** Earlier stages first; the files of one entry may use one another. */
const order: readonly (readonly string[])[] = [
  ['base'],
  ['read'],
  ['model'],
  ['standards'],
  ['compute'],
  ['explain'],
  ['draw'],
  ['render'],
  ['compile.ts'],
  ['publish.ts'],
  ['live.ts'],
  ['tidy'],
  ['pdf'],
  ['host.ts', 'index.ts', 'files.ts', 'help.ts'],
  ['serve', 'lsp', 'tidy-command.ts'],
  ['cli.ts'],
  ['page'],
]

interface SourceFile {
  /** Path from src, with forward slashes. */
  readonly path: string
  readonly text: string
}

interface Import {
  readonly from: string
  readonly to: string
}

const files: readonly SourceFile[] = readdirSync(root, { recursive: true, encoding: 'utf8' })
  .filter(path => /\.(ts|mjs|cjs)$/.test(path))
  .map(path => ({ path: path.split(sep).join('/'), text: readFileSync(join(root, path), 'utf8') }))
  .sort((a, b) => (a.path < b.path ? -1 : 1))

const SPECIFIER = /\b(?:import|export)\b[^'"`;]*?\bfrom\s*['"]([^'"]+)['"]|\bimport\s*\(?\s*['"]([^'"]+)['"]/g

/** What a file imports: a path from src, `..` and further for a file outside it, or a package. */
function importsOf({ path, text }: SourceFile): readonly Import[] {
  return [...text.matchAll(SPECIFIER)].map(([, named, bare]) => {
    const specifier = named ?? bare ?? ''
    const to = specifier.startsWith('.')
      ? relative(root, join(root, dirname(path), specifier))
          .split(sep)
          .join('/')
      : specifier
    return { from: path, to }
  })
}

const stageOf = (path: string): number =>
  order.findIndex(stages => stages.some(stage => path === stage || path.startsWith(`${stage}/`)))

const isBuild = (path: string): boolean => path.startsWith('build/')
const isPackage = ({ to }: Import, paths: ReadonlySet<string>): boolean => !paths.has(to) && !to.startsWith('..')

/** Every import that breaks the order of the house, as a line to read. */
function wrongTurns(sources: readonly SourceFile[]): readonly string[] {
  const paths = new Set(sources.map(({ path }) => path))
  return sources
    .filter(({ path }) => !isBuild(path))
    .flatMap(importsOf)
    .filter(each => !isPackage(each, paths) && !each.to.startsWith('..') && !each.to.endsWith('.json'))
    .filter(({ from, to }) => stageOf(to) > stageOf(from) || isBuild(to) || drawExplains(from, to))
    .map(({ from, to }) => `${from} imports ${to}`)
}

const drawExplains = (from: string, to: string): boolean => from.startsWith('draw/') && to.startsWith('explain/')

describe('the order of the house', () => {
  test('every file under src has its place in the order', () => {
    const lost = files.filter(({ path }) => stageOf(path) === -1 && !isBuild(path)).map(({ path }) => path)
    expect(lost).toEqual([])
    expect(files.length).toBeGreaterThan(60)
  })

  test('imports go from later stages to earlier ones, and the sketch does not lean on the explanation', () => {
    expect(wrongTurns(files)).toEqual([])
  })

  test('imports are found in every form that they take', () => {
    const text = [
      `import type { A } from '../explain/sheet.ts'`,
      `import {\n  b,\n  type C,\n} from '../render/html.ts'`,
      `export { d } from '../compile.ts'`,
      `import '../cli.ts'`,
      `const e = await import('../publish.ts')`,
    ].join('\n')
    expect(importsOf({ path: 'base/unit.ts', text }).map(({ to }) => to)).toEqual([
      'explain/sheet.ts',
      'render/html.ts',
      'compile.ts',
      'cli.ts',
      'publish.ts',
    ])
  })

  test('an import that turns round is named', () => {
    const add = (path: string, line: string) => [...files.filter(file => file.path !== path), { path, text: line }]
    expect(wrongTurns(add('base/near.ts', `import { x } from '../compute/mass.ts'`))).toEqual([
      'base/near.ts imports compute/mass.ts',
    ])
    expect(wrongTurns(add('draw/style.ts', `import { x } from '../explain/sheet.ts'`))).toEqual([
      'draw/style.ts imports explain/sheet.ts',
    ])
    expect(wrongTurns(add('compile.ts', `import { x } from './publish.ts'`))).toEqual(['compile.ts imports publish.ts'])
  })
})

/** The command line, the two files that it reaches the machine through, and what starts a browser. */
const touches = (path: string): boolean =>
  ['cli.ts', 'files.ts', 'host.ts'].includes(path) || /^(?:pdf|serve|lsp)\//.test(path)

describe('what the stages may reach', () => {
  const paths = new Set(files.map(({ path }) => path))
  const foreign = files.flatMap(importsOf).filter(each => isPackage(each, paths))

  test('base imports nothing but base', () => {
    expect(foreign.filter(({ from }) => from.startsWith('base/'))).toEqual([])
  })

  test('only the command line, the press and the build touch files, network, clock and process', () => {
    // The library asks where its own package lies, and touches nothing there itself.
    const mayAsk = ({ from, to }: Import) => touches(from) || (from === 'index.ts' && to === 'node:url')
    const reaching = foreign.filter(each => each.to.startsWith('node:') && !mayAsk(each) && !isBuild(each.from))
    expect(reaching).toEqual([])
  })

  test('nothing but the command line asks for the time, the environment or a random number', () => {
    const asks = /\bDate\.now\b|\bnew Date\b|\bMath\.random\b|\bprocess\.|\bfetch\(|\btoLocale\w+\(|\bIntl\./
    // A page that follows the saves asks the server that it came from.
    const follows = (path: string) => path.startsWith('page/live')
    const asking = files.filter(
      ({ path, text }) => !touches(path) && !follows(path) && !isBuild(path) && asks.test(withoutComments(text)),
    )
    expect(asking.map(({ path }) => path)).toEqual([])
  })
})

const withoutComments = (text: string): string => text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/^\s*\/\/.*$/gm, '')

describe('the size of a file', () => {
  test('no file is over 400 lines', () => {
    const long = files
      .map(({ path, text }) => ({ path, lines: text.split('\n').length - 1 }))
      .filter(({ lines }) => lines > 400)
    expect(long).toEqual([])
  })
})
