/** Sets the formulas of some documents and packs their shapes, so that the command need not set them again. */
import { compileText } from '../compile.ts'
import { type Host, publish, shapesOf } from '../publish.ts'
import { packShapes } from '../render/shape-pack.ts'

/** @param documents texts whose formulas most documents share; each is set in both systems of units */
export function pack(documents: readonly string[], host: Host): string {
  for (const text of documents)
    for (const units of ['US', 'SI'])
      publish(
        compileText('document.md', text.replace(/^units:.*$/m, `units: ${units}`)),
        'document',
        'html',
        true,
        host,
      )
  return packShapes(shapesOf(host))
}
