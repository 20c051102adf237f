#!/usr/bin/env node
/**
 * Starts the command from one file, with the code that V8 compiled last time: parsing and compiling
 * are most of a short run. A cache of another version of Node is refused by V8 and then not used.
 */
const { readFileSync, writeFileSync } = require('node:fs')
const { join } = require('node:path')
const { Script } = require('node:vm')

const file = join(__dirname, 'command.cjs')
const cacheFile = `${file}.cache`
// The bundle is plain ASCII, which reads fastest as Latin-1.
const code = readFileSync(file, 'latin1')

/** @returns {Buffer | undefined} */
function readCache() {
  try {
    return readFileSync(cacheFile)
  } catch {
    return undefined
  }
}

const cachedData = readCache()
const script = new Script(`(function (require, module, exports, __dirname) {${code}\n})`, {
  filename: file,
  ...(cachedData ? { cachedData } : {}),
})
const made = { exports: { run: (/** @type {readonly string[]} */ _args) => 0 } }
script.runInThisContext()(require, made, made.exports, __dirname)
process.exitCode = made.exports.run(process.argv.slice(2))
if (process.env.PLATEMARK_WRITE_CACHE === '1') writeFileSync(cacheFile, script.createCachedData())
