/** Builds that follow each other: what `watch` and editors ask for again and again. */
import { type Compiled, compileTree, type Memory } from './compile.ts'
import { type Host, livePageOf } from './publish.ts'
import { Rereader } from './read/again.ts'
import type { Nearby } from './read/nearby.ts'
import type { LivePage } from './render/html.ts'

export type { LivePage }

/** Makes builds of one document, each the same as one made from nothing, at the cost of what has changed. */
export interface Rebuilder {
  readonly compile: (text: string, nearby: Nearby) => Compiled
  /** The page of a build; with `draft` a banner and a box at each fault. */
  readonly page: (compiled: Compiled, draft: boolean) => LivePage
}

/** @param path the document's, as messages show it */
export function createRebuilder(path: string, host: Host): Rebuilder {
  let rereader = new Rereader()
  let memory: Memory = {}

  function compile(text: string, nearby: Nearby): Compiled {
    const wasEmpty = memory.works === undefined
    const { tree, source } = rereader.read(path, text)
    const compiled = compileTree(tree, source, nearby, memory)
    // What is cut for its depth depends on where a build came from: such a document is built from nothing.
    if (!memory.works?.sheet.scope.ledger.strained) return compiled
    forget()
    return wasEmpty ? compiled : compile(text, nearby)
  }

  function forget(): void {
    rereader = new Rereader()
    memory = {}
  }

  return {
    compile: (text, nearby) => {
      try {
        return compile(text, nearby)
      } catch (error) {
        // Work that ended half way is no ground for the next build.
        forget()
        throw error
      }
    },
    page: (compiled, draft) => livePageOf(compiled, draft, host),
  }
}
