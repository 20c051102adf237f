#!/usr/bin/env node
/**
 * Starts the command from one file, with the code that V8 compiled last time: parsing and compiling
 * are most of a short run. A cache of another version of Node is refused by V8 and then not used.
 * What few runs need is in files of its own beside it, loaded the same way when first asked for.
 */
const { closeSync, openSync, readSync, statSync, writeFileSync } = require('node:fs')
const { join } = require('node:path')
const { Script } = require('node:vm')

// Nearly every run ends before code that V8 optimises would pay for itself, so it is asked to wait for what
// is run very often. Measured on Node 20; another V8 may not know the flag, and would say so.
if (process.versions.node.startsWith('20.')) require('node:v8').setFlagsFromString('--interrupt-budget=1000000')

/** @type {Map<string, import('node:vm').Script>} */
const scripts = new Map()

/** Reads a file into the room given. @param {string} file @param {Buffer} room @returns {Buffer} the part that it fills */
function readInto(file, room) {
  const opened = openSync(file, 'r')
  let length = 0
  for (let read = -1; read !== 0; length += read) read = readSync(opened, room, length, room.length - length, null)
  closeSync(opened)
  return room.subarray(0, length)
}

/** @param {string} file @param {Buffer} room @returns {Buffer | undefined} */
function readCache(file, room) {
  try {
    return readInto(file, room)
  } catch {
    return undefined
  }
}

/** @param {string} file @returns {number} 0 when there is none */
const sizeOf = file => statSync(file, { throwIfNoEntry: false })?.size ?? 0

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
  const cache = `${file}.cache`
  // Both are read into the same room, one after the other: fresh memory costs more than reading.
  const room = Buffer.allocUnsafeSlow(Math.max(sizeOf(file), sizeOf(cache)))
  // The file is one function in plain ASCII, which reads fastest as Latin-1.
  const source = readInto(file, room).toString('latin1')
  const cachedData = readCache(cache, room)
  const script = new Script(source, { filename: file, ...(cachedData?.length ? { cachedData } : {}) })
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
