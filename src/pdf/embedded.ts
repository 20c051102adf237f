/** The browser that comes as a package: unpacked once, with the libraries and faces that it needs beside it. */
import { lstatSync, statSync } from 'node:fs'
import { mkdir, mkdtemp, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { homedir, tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { promisify } from 'node:util'
import { brotliDecompress } from 'node:zlib'
import { bad, good, type Outcome } from '../base/outcome.ts'
import { escapeHtml } from '../render/escape.ts'
import type { Machine } from './places.ts'
import { filesInTar } from './tar.ts'

const PACKAGE = '@sparticuz/chromium'

export interface Embedded {
  readonly program: string
  readonly environment: Readonly<Record<string, string>>
}

/**
 * @param near a folder from which the package can be found
 * @returns the program, unpacked if it was not; or why there is none here
 */
export async function embeddedBrowser(near: string, machine: Machine): Promise<Outcome<Embedded>> {
  const { platform, arch } = machine
  if (platform !== 'linux' || arch !== 'x64')
    return bad(`the embedded browser is for Linux on x86-64, and this is ${platform} on ${arch}`)
  const packed = packageFolder(near)
  if (packed === undefined) return bad(`the package ${PACKAGE}, which holds the embedded browser, is not installed`)
  try {
    const { version } = JSON.parse(await readFile(join(packed, 'package.json'), 'utf8')) as { readonly version: string }
    return good(placesIn(await unpackedAt(packed, `chromium-${version}-faces`, machine)))
  } catch (error) {
    return bad(`the embedded browser cannot be unpacked: ${error instanceof Error ? error.message : String(error)}`)
  }
}

function packageFolder(near: string): string | undefined {
  try {
    // Its main file lies at build/cjs/index.cjs.
    return dirname(dirname(dirname(createRequire(join(near, 'here.cjs')).resolve(PACKAGE))))
  } catch {
    return undefined
  }
}

const placesIn = (folder: string): Embedded => ({
  program: join(folder, 'chromium'),
  environment: { LD_LIBRARY_PATH: join(folder, 'lib'), FONTCONFIG_PATH: folder },
})

/** A folder that is there is whole: it is filled under another name and then renamed. */
async function unpackedAt(packed: string, name: string, machine: Machine): Promise<string> {
  const shelf = await shelfFolder(machine)
  const folder = join(shelf, name)
  if (isThere(join(folder, 'chromium'))) return folder
  const workshop = await mkdtemp(join(shelf, '.unpacking-'))
  try {
    await unpack(join(packed, 'bin'), workshop, folder)
    await rename(workshop, folder)
  } catch (error) {
    // Another process may have been quicker.
    if (!isThere(join(folder, 'chromium'))) throw error
  } finally {
    await rm(workshop, { recursive: true, force: true })
  }
  return folder
}

const isThere = (path: string): boolean => statSync(path, { throwIfNoEntry: false }) !== undefined

/** Where unpacked programs are kept: the user's cache, or where there is none a folder of the user's own among the temporary ones. */
async function shelfFolder({ environment }: Machine): Promise<string> {
  const cache = environment.XDG_CACHE_HOME || join(homedir(), '.cache')
  try {
    const shelf = join(cache, 'platemark')
    await mkdir(shelf, { recursive: true, mode: 0o700 })
    await rm(await mkdtemp(join(shelf, '.trying-')), { recursive: true })
    return shelf
  } catch {
    const user = process.getuid?.() ?? 0
    const shelf = join(tmpdir(), `platemark-${user}`)
    await mkdir(shelf, { recursive: true, mode: 0o700 })
    // What another user laid there must not be run.
    const { uid, mode } = lstatSync(shelf)
    if (uid !== user || (mode & 0o022) !== 0) throw new Error(`${shelf} belongs to someone else`)
    return shelf
  }
}

const decompress = promisify(brotliDecompress)

/** The faces of the package first, then those of the machine, for scripts that the package lacks. */
const fontSettings = (folder: string) => `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "urn:fontconfig:fonts.dtd">
<fontconfig><dir prefix="relative">fonts</dir><dir>/usr/share/fonts</dir><cachedir>${escapeHtml(join(folder, 'fonts-cache'))}</cachedir></fontconfig>
`

/** @param home where the folder will stand: a cache of faces named relative to it would land where the command runs */
async function unpack(packed: string, folder: string, home: string): Promise<void> {
  const open = async (name: string) => decompress(await readFile(join(packed, name)))
  const program = async () => writeFile(join(folder, 'chromium'), await open('chromium.br'), { mode: 0o755 })
  const archive = async (name: string) => {
    for (const { name: path, mode, bytes } of filesInTar(await open(name))) {
      if (path.split('/').includes('..')) throw new Error(`${name} holds a path that leads out of it: ${path}`)
      await mkdir(dirname(join(folder, path)), { recursive: true })
      await writeFile(join(folder, path), bytes, { mode })
    }
  }
  await Promise.all([program(), archive('al2023.tar.br'), archive('fonts.tar.br')])
  await writeFile(join(folder, 'fonts.conf'), fontSettings(home))
}
