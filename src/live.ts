/** Builds that follow each other: what `watch` and editors ask for again and again. */
import { type Compiled, compileText } from './compile.ts'
import { type Host, livePageOf } from './publish.ts'
import type { Nearby } from './read/nearby.ts'
import type { LivePage } from './render/html.ts'

export type { LivePage }

/** Makes builds of one document, each the same as one made from nothing. */
export interface Rebuilder {
  readonly compile: (text: string, nearby: Nearby) => Compiled
  /** The page of the last build; with `draft` a banner and a box at each fault. */
  readonly page: (compiled: Compiled, draft: boolean) => LivePage
}

/** @param path the document's, as messages show it */
export function createRebuilder(path: string, host: Host): Rebuilder {
  return {
    compile: (text, nearby) => compileText(path, text, nearby),
    page: (compiled, draft) => livePageOf(compiled, draft, host),
  }
}
