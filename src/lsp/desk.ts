/** The documents that an editor has open: what was read of each, kept until its text changes. */
import { basename } from 'node:path'
import { fileURLToPath } from 'node:url'
import type { TextDocument } from 'vscode-languageserver-textdocument'
import { type Compiled, compileText } from '../compile.ts'
import { nearbyOf, sizeFault } from '../files.ts'
import { createRebuilder, type Rebuilder } from '../live.ts'
import type { Host } from '../publish.ts'
import { type Nearby, nothingNearby } from '../read/nearby.ts'
import { type Opened, opened } from './opened.ts'

interface Held {
  readonly path: string
  readonly nearby: Nearby
  readonly rebuilder: Rebuilder
  version?: number
  opened?: Opened
}

export interface Desk {
  /** Undefined for a text too large to be read. */
  readonly read: (document: TextDocument) => Opened | undefined
  /** A build of another text in the place of a document, from nothing. */
  readonly tryOut: (document: TextDocument, text: string) => Compiled
  readonly close: (document: TextDocument) => void
}

export function createDesk(host: Host): Desk {
  const held = new Map<string, Held>()
  const of = ({ uri }: TextDocument): Held => {
    const known = held.get(uri) ?? holdFor(uri, host)
    held.set(uri, known)
    return known
  }
  return {
    read: document => {
      const text = document.getText()
      if (sizeFault(Buffer.byteLength(text))) return undefined
      const mine = of(document)
      if (mine.version !== document.version || !mine.opened) {
        mine.version = document.version
        mine.opened = opened(mine.path, text, mine.rebuilder, mine.nearby)
      }
      return mine.opened
    },
    tryOut: (document, text) => {
      const { path, nearby } = of(document)
      return compileText(path, text, nearby)
    },
    close: ({ uri }) => held.delete(uri),
  }
}

function holdFor(uri: string, host: Host): Held {
  const file = fileOf(uri)
  const path = file === undefined ? 'untitled.md' : basename(file)
  return { path, nearby: file === undefined ? nothingNearby : nearbyOf(file), rebuilder: createRebuilder(path, host) }
}

/** Undefined for a text that is not on a disk of this machine. */
function fileOf(uri: string): string | undefined {
  try {
    return uri.startsWith('file:') ? fileURLToPath(uri) : undefined
  } catch {
    return undefined
  }
}
