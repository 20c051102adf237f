/** Tells when files may have changed. It may tell too often, and in the end it misses nothing. */
import { statSync } from 'node:fs'
import { basename, resolve } from 'node:path'
import { type FSWatcher, watch } from 'chokidar'

export interface Watching {
  /** Watches a file from now on, whether or not it is there. */
  readonly addFile: (path: string) => void
  readonly close: () => Promise<void>
}

export interface Heard {
  /** A watched file may have changed, come or gone. */
  readonly file: (path: string) => void
  /** Something in a watched folder may have come or gone. */
  readonly folder: () => void
}

/**
 * How often each file is looked at besides. The system's own messages come within a few milliseconds, but some are
 * held back when saves follow each other closely, and none come from a folder that was deleted and restored or
 * from some network drives.
 */
const SWEEP = 400

/** A second look at a file that was heard of: a message within this time of the first may have been held back. */
const AFTERWARDS = 70

/** @param folders watched whole, with the folders in them @param leftOut folders in them that are not */
export function startWatching(folders: readonly string[], leftOut: readonly string[], heard: Heard): Watching {
  const files = new Map<string, string>()
  const later = new Set<NodeJS.Timeout>()
  const watcher = watch([], { ignoreInitial: true, persistent: true, atomic: false })
  const look = (path: string): void => {
    const now = signatureOf(path)
    if (files.get(path) === now) return
    files.set(path, now)
    heard.file(path)
  }
  const soon = (act: () => void): void => {
    const timer = setTimeout(() => {
      later.delete(timer)
      act()
    }, AFTERWARDS)
    later.add(timer)
  }
  const hear = (path: string): void => {
    const file = resolve(path)
    if (!files.has(file)) return
    look(file)
    soon(() => look(file))
  }
  for (const event of ['add', 'change', 'unlink'] as const) watcher.on(event, hear)
  // A watch that fails, as when a folder goes, is made up for by the sweep.
  watcher.on('error', () => undefined)
  const watchFolder = (folder: string): FSWatcher => {
    const within = watch(folder, {
      ignoreInitial: true,
      ignored: (path, stats) =>
        path !== folder &&
        (isHidden(path) || leftOut.includes(resolve(path)) || (stats?.isFile() === true && !path.endsWith('.md'))),
    })
    within.on('change', hear)
    within.on('ready', heard.folder)
    within.on('error', () => undefined)
    for (const event of ['add', 'unlink', 'addDir', 'unlinkDir'] as const)
      within.on(event, path => {
        hear(path)
        heard.folder()
        soon(heard.folder)
      })
    return within
  }
  const within = new Map(folders.map(folder => [folder, watchFolder(folder)]))
  const standing = new Map(folders.map(folder => [folder, signatureOf(folder) !== '']))
  const sweep = setInterval(() => {
    for (const path of files.keys()) look(path)
    for (const [folder, stood] of standing) {
      const stands = signatureOf(folder) !== ''
      standing.set(folder, stands)
      if (stands === stood) continue
      // A watch does not outlive its folder.
      void within.get(folder)?.close()
      if (stands) within.set(folder, watchFolder(folder))
      heard.folder()
    }
  }, SWEEP)
  return {
    addFile: path => {
      const file = resolve(path)
      if (files.has(file)) return
      files.set(file, signatureOf(file))
      watcher.add(file)
    },
    close: async () => {
      clearInterval(sweep)
      for (const timer of later) clearTimeout(timer)
      await Promise.all([watcher, ...within.values()].map(each => each.close()))
    },
  }
}

/** Hidden files and folders, and what editors leave beside a file while it is open. */
export const isHidden = (path: string): boolean => /^(?:\..|#.*#$|node_modules$)|~$/.test(basename(path))

/** Another one for another file of the same name, or other contents; empty where there is none. */
function signatureOf(path: string): string {
  try {
    const { mtimeNs, size, ino, ctimeNs } = statSync(path, { bigint: true })
    return `${mtimeNs} ${ctimeNs} ${size} ${ino}`
  } catch {
    return ''
  }
}
