#!/usr/bin/env node
/**
 * Starts the command from one file, with the code that V8 compiled last time: parsing and compiling
 * are most of a short run. A cache of another version of Node is refused by V8 and then not used.
 * What few runs need is in files of its own beside it, loaded the same way when first asked for.
 */
const { readFileSync, writeFileSync } = require('node:fs')
const { join } = require('node:path')
const { setFlagsFromString } = require('node:v8')
const { Script } = require('node:vm')

// Functions are optimised once they have run about five times as long as usual. Most of what V8 would
// optimise in so short a program is not run often enough to pay for it, and on a busy machine it takes turns
// with the program itself. V8 reads this whenever a function is about to be optimised, so it may change at any
// time; it was measured on Node 20, and another V8 may not know it.
if (process.versions.v8.startsWith('11.')) setFlagsFromString('--interrupt-budget=600000')

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

const command = /** @type {{ run: (args: readonly string[]) => number }} */ (load('./command.cjs'))
process.exitCode = command.run(process.argv.slice(2))
if (process.env.PLATEMARK_WRITE_CACHE === '1')
  for (const [file, script] of scripts) writeFileSync(`${file}.cache`, script.createCachedData())
