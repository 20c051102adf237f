/**
 * Prepares what a page carries inside itself: its template, its style, and each
 * face as a ready `@font-face` rule, so that rendering only joins texts.
 */
import { createHash } from 'node:crypto'
import { mkdir, readFile, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'

const root = fileURLToPath(new URL('../..', import.meta.url))
const require = createRequire(import.meta.url)

/** Folder of an installed package. @param {string} name @returns {string} */
const packageFolder = name => dirname(require.resolve(`${name}/package.json`))

/** @typedef {{ name: string, family: 'text' | 'label', style: 'normal' | 'italic', ranges: [number, number][] }} Face */

/**
 * The assets by name, as the renderer asks for them.
 * @returns {Promise<Map<string, string>>}
 */
export async function prepareAssets() {
  const katex = await katexAssets()
  const script = await pageScript('main')
  const live = await pageScript('live')
  const screen = [
    ...(await textFaces('@fontsource-variable/source-serif-4', variable, 'text', 'Source Serif 4')),
    ...(await textFaces('@fontsource-variable/source-sans-3', variable, 'label', 'Source Sans 3')),
  ]
  const paper = [
    ...(await textFaces('@fontsource/source-serif-4', fixed, 'text', 'Source Serif 4')),
    ...(await textFaces('@fontsource/source-sans-3', fixed, 'label', 'Source Sans 3')),
  ]
  return new Map([
    ['page.html', await readFile(join(root, 'templates/page.html'), 'utf8')],
    ['sheet.html', await readFile(join(root, 'templates/sheet.html'), 'utf8')],
    ['sheet.css', minified(await readFile(join(root, 'templates/sheet.css'), 'utf8'))],
    ['trace.css', minified(await readFile(join(root, 'templates/trace.css'), 'utf8'))],
    ['live.html', await readFile(join(root, 'templates/live.html'), 'utf8')],
    ['live.css', minified(await readFile(join(root, 'templates/live.css'), 'utf8'))],
    ['live.js', live],
    ['trace.js', script],
    // What the page's policy names the script by, so that no other can run.
    ['trace.hash', `sha256-${createHash('sha256').update(script).digest('base64')}`],
    ['faces.screen.json', JSON.stringify(screen.map(({ face }) => face))],
    ['faces.paper.json', JSON.stringify(paper.map(({ face }) => face))],
    .../** @type {[string, string][]} */ (
      [...screen, ...paper].map(({ face, rule }) => [`faces/${face.name}.css`, rule])
    ),
    ...katex,
  ])
}

/**
 * A script for the browser, in one piece that nothing within can end.
 * @param {'main' | 'live'} name of the page itself, or of the page that follows the saves
 */
async function pageScript(name) {
  const { outputFiles } = await build({
    entryPoints: [join(root, `src/page/${name}.ts`)],
    bundle: true,
    minify: true,
    write: false,
    format: 'iife',
    target: ['chrome109', 'firefox115', 'safari16'],
    charset: 'ascii',
    legalComments: 'none',
    tsconfigRaw: {},
  })
  const script = outputFiles[0]?.text.trim() ?? ''
  if (/<\/script|<!--/i.test(script)) throw new Error('the script of the page would end itself')
  return script
}

/**
 * Writes the assets under a folder.
 * @param {string} outDir
 */
export async function writeAssets(outDir) {
  for (const [name, text] of await prepareAssets()) {
    const path = join(outDir, name)
    await mkdir(dirname(path), { recursive: true })
    await writeFile(path, text)
  }
}

/** Style sheets of the packages: one face of every weight for the screen; one face a weight for paper, where a variable one would be drawn as shapes. */
const variable = ['wght.css', 'wght-italic.css']
const fixed = ['400.css', '400-italic.css', '600.css', '600-italic.css']

/**
 * The faces of a text family, one for each style and range of characters.
 * @param {string} packageName
 * @param {readonly string[]} sheetNames
 * @param {'text' | 'label'} family
 * @param {string} familyName
 * @returns {Promise<{ face: Face, rule: string }[]>}
 */
async function textFaces(packageName, sheetNames, family, familyName) {
  const folder = packageFolder(packageName)
  const sheets = await Promise.all(sheetNames.map(name => readFile(join(folder, name), 'utf8')))
  const rules = sheets.join('\n').match(/@font-face\s*\{[^}]*\}/g) ?? []
  return Promise.all(rules.map(rule => textFace(rule, folder, family, familyName)))
}

/**
 * @param {string} rule
 * @param {string} folder
 * @param {'text' | 'label'} family
 * @param {string} familyName
 */
async function textFace(rule, folder, family, familyName) {
  const weight = found(/font-weight:\s*([^;]+)/, rule).trim()
  const file = found(/url\(\.\/(files\/[^)]+)\)/, rule)
  const style = /** @type {'normal' | 'italic'} */ (found(/font-style:\s*(\w+)/, rule))
  const range = found(/unicode-range:\s*([^;]+)/, rule).trim()
  const name = found(/files\/(.+)\.woff2/, file)
  const src = await dataUrl(join(folder, file))
  return {
    face: { name, family, style, ranges: rangesOf(range) },
    rule: `@font-face{font-family:"${familyName}";font-style:${style};font-weight:${weight};src:${src};unicode-range:${range}}`,
  }
}

/** `U+0000-00FF,U+0131` as numbers. @param {string} range @returns {[number, number][]} */
function rangesOf(range) {
  return range.split(',').map(part => {
    const [first = '', last = first] = part.trim().replace('U+', '').split('-')
    return [Number.parseInt(first, 16), Number.parseInt(last, 16)]
  })
}

/**
 * KaTeX's faces, and its style sheet with one rule a line and without what a page never sets.
 * @returns {Promise<[string, string][]>}
 */
async function katexAssets() {
  const dist = join(packageFolder('katex'), 'dist')
  const sheet = await readFile(join(dist, 'katex.min.css'), 'utf8')
  const faces = (sheet.match(/@font-face\{[^}]*\}/g) ?? []).map(rule => katexFace(rule, dist))
  const rules = sheet.replace(/@font-face\{[^}]*\}/g, '').match(/[^{}]+\{[^}]*\}/g) ?? []
  // Rules that name no class of KaTeX's would reach the rest of the page.
  const kept = rules.filter(
    rule => rule.startsWith('.katex') && !rule.includes('katex-mathml') && !rule.includes('-version'),
  )
  return [['katex.css', kept.join('\n')], ...(await Promise.all(faces))]
}

/**
 * @param {string} rule
 * @param {string} dist
 * @returns {Promise<[string, string]>}
 */
async function katexFace(rule, dist) {
  const name = found(/fonts\/([\w-]+)\.woff2/, rule)
  const src = await dataUrl(join(dist, 'fonts', `${name}.woff2`))
  return [`faces/${name}.css`, rule.replace(/src:[^;}]+/, `src:${src}`)]
}

/** @param {string} path */
async function dataUrl(path) {
  return `url(data:font/woff2;base64,${(await readFile(path)).toString('base64')}) format("woff2")`
}

/** A style sheet without comments and slack. @param {string} css */
function minified(css) {
  return css
    .replace(/\/\*[\s\S]*?\*\//g, '')
    .replace(/\s+/g, ' ')
    .replace(/ ?([{};,]) ?/g, '$1')
    .replace(/: /g, ':')
    .replace(/;}/g, '}')
    .trim()
}

/** @param {RegExp} pattern @param {string} text @returns {string} */
function found(pattern, text) {
  const match = pattern.exec(text)?.[1]
  if (match === undefined) throw new Error(`expected ${pattern} in: ${text.slice(0, 200)}`)
  return match
}
