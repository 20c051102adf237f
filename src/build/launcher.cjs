#!/usr/bin/env node
/**
 * Starts the command from one file, with the code that V8 compiled last time: parsing and compiling
 * are most of a short run. A cache of another version of Node is refused by V8 and then not used.
 * What few runs need is in files of its own beside it, loaded the same way when first asked for.
 */
const { readFileSync, writeFileSync } = require('node:fs')
const { join } = require('node:path')
const { Script } = require('node:vm')

// Nearly every run ends before code that V8 optimises would pay for itself, so it is asked to wait for what
// is run very often. Measured on Node 20; another V8 may not know the flag, and would say so.
if (process.versions.node.startsWith('20.')) require('node:v8').setFlagsFromString('--interrupt-budget=1000000')

/** @type {Map<string, import('node:vm').Script>} */
const scripts = new Map()

/** @param {string} cacheFile @returns {Buffer | undefined} */
function readCache(cacheFile) {
  try {
    return readFileSync(cacheFile)
  } catch {
    return undefined
  }
}

/** @type {Map<string, unknown>} */
const loaded = new Map()

/** A file of ours by `./name`; anything else as Node finds it. @param {string} name */
function load(name) {
  if (!name.startsWith('./')) return require(name)
  if (!loaded.has(name)) loaded.set(name, run(join(__dirname, name)))
  return loaded.get(name)
}

/** @param {string} file */
function run(file) {
  const cachedData = readCache(`${file}.cache`)
  // The file is one function in plain ASCII, which reads fastest as Latin-1.
  const script = new Script(readFileSync(file, 'latin1'), { filename: file, ...(cachedData ? { cachedData } : {}) })
  scripts.set(file, script)
  const made = { exports: {} }
  script.runInThisContext()(load, made, made.exports, __dirname)
  return made.exports
}

/** @typedef {{ run: (args: readonly string[]) => number | Promise<number>, stillPrinting: () => boolean }} Command */
const command = /** @type {Command} */ (load('./command.cjs'))

/** @param {number} code */
function end(code) {
  process.exitCode = code
  if (process.env.PLATEMARK_WRITE_CACHE === '1')
    for (const [file, script] of scripts) writeFileSync(`${file}.cache`, script.createCachedData())
}

const ended = command.run(process.argv.slice(2))
if (typeof ended === 'number') {
  end(ended)
  // All is written: Node would only take down piece by piece what the system takes at once.
  if (!command.stillPrinting()) process.exit()
} else ended.then(end)
