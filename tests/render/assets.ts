/** The prepared assets, made from the installed packages as the compile step does. */
import { prepareAssets } from '../../src/build/assets.mjs'

const prepared = await prepareAssets()

export function asset(name: string): string {
  const text = prepared.get(name)
  if (text === undefined) throw new Error(`no asset ${name}`)
  return text
}
