/**
 * Builds `dist`: the command as one file with its code cache, the library, its
 * types, and the assets of a page.
 */
import { execFileSync } from 'node:child_process'
import { chmod, copyFile, mkdir, readFile, rm, writeFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'
import { writeAssets } from './assets.mjs'

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

await Promise.all([
  build({ ...common, entryPoints: [`${root}src/cli.ts`], format: 'cjs', minify: true, outfile: `${dist}/command.cjs` }),
  build({
    ...common,
    entryPoints: [`${root}src/index.ts`],
    format: 'esm',
    packages: 'external',
    outfile: `${dist}/index.js`,
  }),
  writeAssets(`${dist}/assets`),
  copyFile(`${root}src/build/launcher.cjs`, `${dist}/platemark.cjs`),
  copyFile(`${root}src/render/results.schema.json`, `${dist}/results.schema.json`),
])
await chmod(`${dist}/platemark.cjs`, 0o755)
// The cache holds what a build runs, so it is taken after one.
await writeFile(`${dist}/warm.md`, await readFile(`${root}samples/starter.md`, 'utf8'))
execFileSync(
  process.execPath,
  [`${dist}/platemark.cjs`, 'build', `${dist}/warm.md`, '--out', `${dist}/warm`, '--to', 'html,json'],
  { env: { ...process.env, PLATEMARK_WRITE_CACHE: '1' }, stdio: ['ignore', 'ignore', 'inherit'] },
)
await rm(`${dist}/warm.md`)
await rm(`${dist}/warm`, { recursive: true })
