/**
 * Builds `dist`: the command in a few files with their code caches, the library, and the
 * assets of a page.
 */
import { execFileSync, spawnSync } from 'node:child_process'
import { chmod, copyFile, mkdir, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { build } from 'esbuild'
import { prepareAssets, writeAssets } from './assets.mjs'

const root = fileURLToPath(new URL('../..', import.meta.url))
const dist = `${root}dist`
const { version } = JSON.parse(await readFile(`${root}package.json`, 'utf8'))

await rm(dist, { recursive: true, force: true })
await mkdir(`${dist}/assets`, { recursive: true })

/** @type {import('esbuild').BuildOptions} */
const common = {
  bundle: true,
  platform: 'node',
  target: 'node20',
  legalComments: 'none',
  charset: 'ascii',
  define: { PLATEMARK_VERSION: JSON.stringify(version) },
}

/**
 * What few runs need, by the functions that are called of it: KaTeX for a formula whose shape was not
 * packed, YAML for front matter that is more than plain lines, and the width of text that is not plain ASCII.
 * @type {Readonly<Record<string, readonly string[]>>}
 */
const apart = {
  katex: ['renderToString'],
  yaml: ['isMap', 'isScalar', 'isSeq', 'parseDocument'],
  'string-width': ['default'],
}

/**
 * Keeps those packages in files of their own, which are loaded when one of the functions is first called.
 * @type {import('esbuild').Plugin}
 */
const packagesApart = {
  name: 'packages-apart',
  setup(build) {
    const filter = new RegExp(`^(?:${Object.keys(apart).join('|')})$`)
    build.onResolve({ filter }, ({ path }) => ({ path, namespace: 'apart' }))
    build.onResolve({ filter: /^\.\/[\w-]+\.cjs$/, namespace: 'apart' }, ({ path }) => ({ path, external: true }))
    build.onResolve({ filter: /^\.\.?\/pdf\/press\.ts$/ }, () => ({ path: './pdf.cjs', external: true }))
    build.onResolve({ filter: /^\.\/(?:lsp|serve)\/command\.ts$/ }, ({ path }) => ({
      path: path.replace('/command.ts', '.cjs'),
      external: true,
    }))
    build.onLoad({ filter: /.*/, namespace: 'apart' }, ({ path }) => ({
      contents: (apart[path] ?? [])
        .map(name => {
          // What a module of type CommonJS exports as a whole is the default of those that import it.
          const exported = name === 'default' ? 'module.exports' : `exports.${name}`
          return `${exported} = (...args) => require('./${path}.cjs').${name}(...args)`
        })
        .join('\n'),
    }))
  },
}

/** The launcher calls each file as one function, which spares it a copy of the text. @type {import('esbuild').BuildOptions} */
const loaded = {
  ...common,
  format: 'cjs',
  minify: true,
  // The launcher's files have no `import`; a file that is asked for late is required late.
  supported: { 'dynamic-import': false },
  banner: { js: '(function (require, module, exports, __dirname) {' },
  footer: { js: '})' },
}

await Promise.all([
  build({ ...loaded, entryPoints: [`${root}src/cli.ts`], outfile: `${dist}/command.cjs`, plugins: [packagesApart] }),
  build({ ...loaded, entryPoints: [`${root}src/pdf/press.ts`], outfile: `${dist}/pdf.cjs` }),
  ...['lsp', 'serve'].map(name =>
    build({
      ...loaded,
      entryPoints: [`${root}src/${name}/command.ts`],
      outfile: `${dist}/${name}.cjs`,
      plugins: [packagesApart],
    }),
  ),
  ...Object.keys(apart).map(name =>
    build({
      ...loaded,
      stdin: { contents: `module.exports = require('${name}')`, resolveDir: root },
      outfile: `${dist}/${name}.cjs`,
    }),
  ),
  build({
    ...common,
    entryPoints: { index: `${root}src/index.ts` },
    format: 'esm',
    packages: 'external',
    // What prints a PDF is in a file of its own.
    splitting: true,
    outdir: dist,
  }),
  build({
    ...common,
    entryPoints: [`${root}src/build/pack.ts`],
    format: 'esm',
    packages: 'external',
    outfile: `${dist}/pack.mjs`,
  }),
  writeAssets(`${dist}/assets`),
  copyFile(`${root}src/build/launcher.cjs`, `${dist}/platemark.cjs`),
  copyFile(`${root}src/render/results.schema.json`, `${dist}/results.schema.json`),
])
await Promise.all(
  ['command', 'pdf', 'lsp', 'serve', ...Object.keys(apart)].map(name => spellOut(`${dist}/${name}.cjs`)),
)
await chmod(`${dist}/platemark.cjs`, 0o755)
await writeFile(`${dist}/assets/shapes.txt`, await packedShapes())
await rm(`${dist}/pack.mjs`)
await writeCodeCaches()

/**
 * The launcher reads a file as Latin-1, which is right for plain ASCII only, and patterns keep their
 * signs through `charset`.
 * @param {string} file
 */
async function spellOut(file) {
  const code = await readFile(file, 'utf8')
  const spelt = (/** @type {string} */ unit) => `\\u${unit.charCodeAt(0).toString(16).padStart(4, '0')}`
  await writeFile(file, code.replace(/[^\0-\x7f]/g, spelt))
}

/** The shapes of the samples' formulas, which nearly all are formulas of every document. */
async function packedShapes() {
  const { pack } = await import(pathToFileURL(`${dist}/pack.mjs`).href)
  const assets = await prepareAssets()
  const names = (await readdir(`${root}samples`, { recursive: true })).filter(name => name.endsWith('.md')).sort()
  const documents = await Promise.all(names.map(name => readFile(`${root}samples/${name}`, 'utf8')))
  return pack(documents, { version, asset: (/** @type {string} */ name) => assets.get(name) ?? '', sha256: () => '' })
}

/** A cache holds what a run used, so it is taken after one, of a document that needs every file. */
async function writeCodeCaches() {
  const starter = await readFile(`${root}samples/starter.md`, 'utf8')
  const formulas = 'warm_one = 2 ft + sqrt(9 ft^2)\nwarm_two = (warm_one / 3)^2 - 4 ft^2\nwarm_three = 7 kip * warm_one'
  const front = starter.replace('---\n', '---\nby: "warm: up" # not plain\n')
  await writeFile(`${dist}/warm.md`, `${front}\n\`\`\`equations\n${formulas}\n\`\`\`\n`)
  // No browser is needed to load what drives one: naming one that is not there loads it and ends.
  spawnSync(
    process.execPath,
    [
      `${dist}/platemark.cjs`,
      'build',
      `${dist}/warm.md`,
      '--out',
      `${dist}/warm`,
      '--to',
      'pdf',
      '--browser',
      './none',
    ],
    { env: { ...process.env, PLATEMARK_WRITE_CACHE: '1' }, stdio: 'ignore' },
  )
  execFileSync(
    process.execPath,
    [`${dist}/platemark.cjs`, 'build', `${dist}/warm.md`, '--out', `${dist}/warm`, '--to', 'html,json'],
    { env: { ...process.env, PLATEMARK_WRITE_CACHE: '1' }, stdio: ['ignore', 'ignore', 'inherit'] },
  )
  await rm(`${dist}/warm.md`)
  await rm(`${dist}/warm`, { recursive: true })
}
