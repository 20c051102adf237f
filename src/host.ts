/** What the pipeline gets from the machine: prepared assets, a hash, the version. */
import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Host } from './publish.ts'

/** Put in when the program is built. */
declare const PLATEMARK_VERSION: string

/** @param assets the folder that the build wrote */
export const hostAt = (assets: string): Host => ({
  version: PLATEMARK_VERSION,
  asset: name => readFileSync(join(assets, name), 'utf8'),
  sha256: text => createHash('sha256').update(text).digest('hex'),
  // The pack is plain ASCII, which reads fastest as Latin-1.
  shapes: () => readFileSync(join(assets, 'shapes.txt'), 'latin1'),
})
