/**
 * Times what the project promises to be fast, and prints a table. Whole processes run in turns, so that
 * a machine that slows down slows all of them; trust the ratios within one run, not the times.
 */
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { cpus, tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { setFlagsFromString } from 'node:v8'
import { runInNewContext } from 'node:vm'
import { build } from 'esbuild'
import { Bench } from 'tinybench'
import { longDocument } from './generate.mjs'

const root = fileURLToPath(new URL('../..', import.meta.url))
const command = join(root, 'dist/platemark.cjs')
const folder = mkdtempSync(join(tmpdir(), 'platemark-bench-'))

// Reading extra certificates costs Node more than a short run.
const env = { ...process.env }
delete env.NODE_EXTRA_CA_CERTS

/** @typedef {{ name: string, args: readonly string[], status?: number }} Program the first argument is the program itself */

function onePage() {
  const starter = join(root, 'samples/starter.md')
  // Other names and numbers, and a formula of its own: what a document is that the build has never seen.
  const text = readFileSync(starter, 'utf8')
    .replaceAll('20 ft', '23 ft')
    .replaceAll('14 ft', '17 ft')
    .replace(/^\| ([SNWE]) /gm, '| Wall$1 ')
  const other = write(
    'other.md',
    `${text}\n\`\`\`equations\nw_snow = 25 psf\nS = w_snow * roof.area * (1 + 2 * 0.3) -> kip\n\`\`\`\n`,
  )
  compare('One page to HTML, whole process', 25, [
    bare,
    platemark('starter', starter),
    platemark('another one-page document', other),
    ...pandoc('pandoc --mathml, same content', expanded(starter)),
  ])
}

function longCold() {
  const long = write('long.md', longDocument(200, 2000))
  compare('200 sections, 2,000 equations to HTML, whole process', 5, [
    bare,
    platemark('platemark', long),
    { name: 'the same tidied, nothing written', args: [command, 'tidy', '--check', long], status: 1 },
    ...pandoc('pandoc --mathml, same content', expanded(long)),
  ])
}

/** @param {typeof import('./inside.ts')} inside */
async function equations({ equationsOf, createTypesetter, texSource, unmarked, katex }) {
  const all = equationsOf(longDocument(200, 2000))
  const options = /** @type {const} */ ({
    throwOnError: true,
    trust: false,
    strict: false,
    output: 'html',
    displayMode: true,
  })
  const typesetter = createTypesetter()
  const sample = all.filter((_, i) => i % 7 === 0)
  const unlike = sample.filter(
    tex => typesetter.html(unmarked(tex), 'display') !== katex.renderToString(texSource(tex), options),
  ).length
  const bench = new Bench({ time: 1000, warmupTime: 300 })
  bench.add('all', () => {
    for (const tex of all) typesetter.html(tex, 'display')
  })
  bench.add('katex', () => {
    for (const tex of sample.slice(0, 40)) katex.renderToString(texSource(tex), options)
  })
  await bench.run()
  const [ours, direct] = [latency(bench, 'all'), latency(bench, 'katex')]
  head('Equations typeset, warm')
  row('platemark', [ours.min, ours.median], `${count((1000 * all.length) / ours.median)} a second`)
  row('KaTeX alone, 40 of them', [direct.min, direct.median], `${count((1000 * 40) / direct.median)} a second`)
  line(`bytes unlike KaTeX's own: ${unlike} of ${sample.length}`)
}

/** @param {typeof import('./inside.ts')} inside */
async function walls({ manyWalls, shearsInCases }) {
  const rigidity = manyWalls(1000)
  const bench = new Bench({ time: 1000, warmupTime: 300 })
  bench.add('shears', () => {
    shearsInCases(rigidity, 64)
  })
  await bench.run()
  const { min, median } = latency(bench, 'shears')
  head('Shears of 1,000 walls in 64 cases')
  row('direct, torsional and total', [min, median], `aim 5 ms: ${(median / 5).toFixed(2)}`)
}

/** @param {typeof import('./inside.ts')} inside */
async function towers({ solveTower, vibrateTower, removeWalls, removeWallsAnew }) {
  head('Tall buildings')
  const residual = timed('60 levels x 200 continuous walls x 6 cases, cold', () => solveTower(60, 200))
  const bench = new Bench({ time: 1000, warmupTime: 300 })
  bench.add('solve', () => void solveTower(60, 200))
  bench.add('modes', () => void vibrateTower(60, 200))
  bench.add('remove', () => void removeWalls(6, 200))
  bench.add('anew', () => void removeWallsAnew(6, 200))
  await bench.run()
  const show = (/** @type {string} */ task, /** @type {string} */ name, /** @type {number | undefined} */ aim) => {
    const { min, median } = latency(bench, task)
    row(name, [min, median], aim === undefined ? '' : `aim ${aim} ms: ${(median / aim).toFixed(3)}`)
  }
  show('solve', 'the same, warm, assembled, solved and enveloped', 200)
  show('modes', '60 levels x 200 walls, all 180 modes and their shears', undefined)
  show('remove', 'each of 200 walls on 6 levels taken away', 200)
  show('anew', 'the same, each solved anew', undefined)
  line(`largest residual of a case: ${residual.toExponential(1)}`)
}

/** @param {typeof import('./inside.ts')} inside */
async function drawn({ drawings }) {
  const bench = new Bench({ time: 500, warmupTime: 300 })
  for (const [name, draw] of drawings) bench.add(name, () => void draw())
  await bench.run()
  head('Drawings, warm')
  for (const [name] of drawings) {
    const { min, median } = latency(bench, name)
    row(name, [min, median], '')
  }
}

/** Where the time of a long document goes, in one process, the first time it is done. @param {typeof import('./inside.ts')} inside */
function phases({ parseMarkdown, readDocument, sourceOf, compileTree, publish, worksheet, gather, readChoices }) {
  const text = longDocument(200, 2000)
  head('200 sections, 2,000 equations, phase by phase in one process')
  const tree = timed('read: Markdown to a tree', () => parseMarkdown(text))
  const document = timed('read: blocks and quotes', () => readDocument(tree, sourceOf('long.md', text)))
  timed('work: every given and equation', () =>
    worksheet(gather([...document.blocks.values()]), readChoices(document.front)).readAll(),
  )
  const compiled = timed('read, work and explain, from the tree', () => compileTree(tree, sourceOf('long.md', text)))
  const host = hostOf()
  for (const format of /** @type {const} */ (['html', 'md', 'json']))
    timed(`render: ${format}`, () => publish(compiled, 'long', format, false, host))
}

/** One number changed, again and again, against a build from nothing of the same text. @param {typeof import('./inside.ts')} inside */
function rebuilds({ createRebuilder, compileText, livePageOf, nothingNearby }) {
  const host = hostOf()
  head('One number changed, to the page in the browser, in one process')
  for (const sections of [10, 50, 200]) {
    const rebuilder = createRebuilder('long.md', host)
    const texts = Array.from({ length: 60 }, (_, i) =>
      numberChanged(longDocument(sections, sections * 10), sections, i),
    )
    /** @type {number[]} */
    const again = []
    /** @type {number[]} */
    const anew = []
    for (const [i, text] of texts.entries()) {
      again.push(lasting(() => rebuilder.page(rebuilder.compile(text, nothingNearby), true)))
      if (i % 6 === 5) anew.push(lasting(() => livePageOf(compileText('long.md', text), true, host)))
    }
    // The first few warm it up.
    const ours = again.slice(10)
    const slow = [...ours].sort((a, b) => a - b)[Math.floor(0.95 * ours.length)] ?? 0
    const share = median(ours) / median(anew)
    row(
      `${sections} sections`,
      [Math.min(...ours), median(ours)],
      `95th ${slow.toFixed(1)} ms; ${share.toFixed(3)} of anew`,
    )
    row('  anew', [Math.min(...anew), median(anew)], '')
  }
}

/** What is in use after many rebuilds, of a document that comes back to its beginning. @param {typeof import('./inside.ts')} inside */
function memory({ createRebuilder, nothingNearby }) {
  setFlagsFromString('--expose-gc')
  const collect = runInNewContext('gc')
  const inUse = () => {
    collect()
    return process.memoryUsage().heapUsed / 1048576
  }
  const rebuilder = createRebuilder('long.md', hostOf())
  const text = longDocument(10, 100)
  head('In use after rebuilds of 10 sections, MB')
  let early = 0
  for (let i = 1; i <= 10_000; i++) {
    // Numbers, lines that come and go, and names that are new each time.
    const changed = numberChanged(text, 10, i)
    const next = i % 5 === 0 ? `${changed}\n\`\`\`equations\nnew_${i} = ${i} ft\n\`\`\`\n` : changed
    rebuilder.page(rebuilder.compile(next, nothingNearby), true)
    if (i === 100) early = inUse()
  }
  const late = inUse()
  line(`  after 100: ${early.toFixed(1)}, after 10,000: ${late.toFixed(1)}, ${(late / early).toFixed(2)} ×`)
}

const hostOf = () => ({
  version: '0',
  asset: (/** @type {string} */ name) => readFileSync(join(root, 'dist/assets', name), 'utf8'),
  sha256: (/** @type {string} */ source) => createHash('sha256').update(source).digest('hex'),
  shapes: () => readFileSync(join(root, 'dist/assets/shapes.txt'), 'latin1'),
})

/** A width or a load of one section, which the sums after it rest on. @param {string} text @param {number} sections @param {number} i */
function numberChanged(text, sections, i) {
  const letter = 'bwS'[i % 3]
  const pattern = new RegExp(`^(${letter}_${1 + ((i * 7) % sections)} = )\\d+`, 'm')
  return text.replace(pattern, (_, start) => `${start}${9 + (i % 40)}`)
}

/** @param {() => unknown} work */
function lasting(work) {
  const start = performance.now()
  work()
  return performance.now() - start
}

function manyWalls() {
  const rows = Array.from({ length: 5000 }, (_, i) => {
    const [x, y] = [(i % 100) * 6, Math.floor(i / 100) * 6]
    return `| W${i + 1} | ${x} ft, ${y} ft | ${i % 2 === 0 ? `${x + 5} ft, ${y} ft` : `${x} ft, ${y + 5} ft`} | 10 ft | CMU8 |`
  })
  const starter = readFileSync(join(root, 'samples/starter.md'), 'utf8')
  const text = starter
    .replace(/^\| [SNWE] .*\n/gm, '')
    .replace(/20 ft, 14 ft/g, '600 ft, 300 ft')
    .replace(/^(\|-+\|-+\|-+\|-+\|-+\|\n)/m, `$1${rows.join('\n')}\n`)
  const path = write('walls.md', text)
  compare('5,000 walls to HTML, whole process', 3, [bare, platemark('platemark', path)])
}

function tooLarge() {
  const path = write('large.md', 'Words.\n\n'.repeat(1_310_720))
  compare('10 MB refused, whole process', 10, [bare, { ...platemark('platemark', path), status: 1 }])
}

/** From the compiled document to the bytes of its PDF, with the browser that this machine has. */
async function pdf() {
  const { compileText, host, openPress, paperOf } = await import(pathToFileURL(join(root, 'dist/index.js')).href)
  /** @param {string} text */
  const paperFor = text => paperOf(compileText('bench.md', text), false, host)
  const short = paperFor(twoPages)
  const long = paperFor(longDocument(100, 1000))
  head('PDF through a warm browser')
  const start = performance.now()
  const press = await openPress(process.env.PLATEMARK_BROWSER)
  try {
    await press.print(short)
    row('start of the browser, and the first two sheets', [performance.now() - start], '')
    for (const [name, paper, rounds] of /** @type {const} */ ([
      ['two sheets', short, 15],
      ['100 sections, 1,000 equations, about 200 sheets', long, 3],
    ])) {
      const times = []
      for (let round = 0; round < rounds; round++) {
        const began = performance.now()
        const made = await press.print(paper)
        if (!made.ok) return line(made.because)
        times.push(performance.now() - began)
      }
      row(name, [Math.min(...times), median(times)], '')
    }
  } finally {
    await press.close()
  }
}

const twoPages = `---
title: Two sheets
project: Bait and Tackle Kiosk
---

# Loads

\`\`\`equations
w = 20 psf + 35 psf
A = 12 ft * 18 ft
P = w * A -> kip
M = P * 12 ft / 8 -> kip*ft
S = 5 in * (12 in)^2 / 6
f = M / S -> psi
v = P / (2 * 5 in * 12 in) -> psi
R = P / 2
\`\`\`
`

/** Programs in turns; the first is what the others are measured by. @param {string} title @param {number} rounds @param {readonly Program[]} programs */
function compare(title, rounds, programs) {
  const times = programs.map(() => /** @type {number[]} */ ([]))
  for (let round = 0; round < rounds; round++)
    programs.forEach(({ name, args: [program = '', ...args], status = 0 }, i) => {
      const start = performance.now()
      const done = spawnSync(program, args, { env, stdio: 'ignore' })
      times[i]?.push(performance.now() - start)
      if (done.status !== status) throw new Error(`${name} ended with ${done.status}`)
    })
  head(title)
  const [first = 1] = times.map(median)
  programs.forEach(({ name }, i) => {
    const all = times[i] ?? []
    row(name, [Math.min(...all), median(all)], `${(median(all) / first).toFixed(2)} × bare node`)
  })
}

/** @type {Program} */
const bare = { name: 'node -e 0', args: [process.execPath, '-e', '0'] }

/** @param {string} name @param {string} path @returns {Program} */
function platemark(name, path) {
  return { name, args: [process.execPath, command, 'build', path, '--out', join(folder, 'out')] }
}

/** @param {string} name @param {string} path @returns {readonly Program[]} */
function pandoc(name, path) {
  if (spawnSync('pandoc', ['--version'], { stdio: 'ignore' }).status !== 0) {
    line('pandoc is not installed: not compared')
    return []
  }
  return [{ name, args: ['pandoc', '--mathml', '-s', '-f', 'markdown', '-o', join(folder, 'pandoc.html'), path] }]
}

/** The document as our own Markdown, with its formulas in $$. @param {string} path */
function expanded(path) {
  const out = join(folder, 'expanded')
  mkdirSync(out, { recursive: true })
  spawnSync(process.execPath, [command, 'build', path, '--to', 'md', '--out', out], { env, stdio: 'ignore' })
  return join(out, path.replace(/^.*[/\\]/, ''))
}

/** @param {string} name @param {string} text */
function write(name, text) {
  const path = join(folder, name)
  writeFileSync(path, text)
  return path
}

/** @template T @param {string} name @param {() => T} work @returns {T} */
function timed(name, work) {
  const start = performance.now()
  const result = work()
  row(name, [performance.now() - start], '')
  return result
}

/** @param {Bench} bench @param {string} name */
function latency(bench, name) {
  const result = bench.getTask(name)?.result
  if (result === undefined || !('latency' in result)) throw new Error(`${name} was not timed`)
  return { min: result.latency.min, median: result.latency.p50 }
}

/** @param {readonly number[]} times */
function median(times) {
  return [...times].sort((a, b) => a - b)[times.length >> 1] ?? Number.NaN
}

/** @param {string} title */
const head = title => line(`\n${title.padEnd(58)} min ms  median ms`)
/** @param {string} name @param {readonly number[]} times @param {string} note */
const row = (name, times, note) =>
  line(`  ${name.padEnd(54)}${times.map(time => time.toFixed(1).padStart(9)).join('  ')}   ${note}`)
/** @param {number} n */
const count = n => Math.round(n).toLocaleString('en-US')
/** @param {string} text */
const line = text => process.stdout.write(`${text}\n`)

/** @returns {Promise<typeof import('./inside.ts')>} */
async function loadInside() {
  const outfile = join(folder, 'inside.mjs')
  await build({
    entryPoints: [fileURLToPath(new URL('inside.ts', import.meta.url))],
    bundle: true,
    platform: 'node',
    format: 'esm',
    outfile,
    banner: { js: `import { createRequire } from 'node:module'; const require = createRequire(import.meta.url)` },
  })
  return import(pathToFileURL(outfile).href)
}

try {
  process.stdout.write(
    `${cpus().length} cores, ${cpus()[0]?.model ?? ''}, Node ${process.version}, ${new Date().toISOString().slice(0, 10)}\n`,
  )
  const inside = await loadInside()
  onePage()
  longCold()
  await equations(inside)
  await walls(inside)
  await towers(inside)
  await drawn(inside)
  phases(inside)
  rebuilds(inside)
  memory(inside)
  manyWalls()
  tooLarge()
  await pdf()
} finally {
  rmSync(folder, { recursive: true, force: true })
}
