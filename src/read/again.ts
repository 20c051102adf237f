/**
 * Reads a text again and again: what stands in it as before is not read anew. Each piece keeps its address
 * wherever it moves, so that all that was worked from it still tells where it stands.
 */
import type { Root, RootContent } from 'mdast'
import { type Source, type Stretch, sourceOf } from '../base/span.ts'
import { nodesOf, parseMarkdown } from './markdown.ts'
import { type Piece, piecesOf } from './pieces.ts'

export interface Read {
  readonly tree: Root
  readonly source: Source
}

/** A piece as it was read. */
interface Held {
  readonly kind: Piece['kind']
  readonly text: string
  readonly address: number
  /** Addresses set aside for it, so that it may grow where it is. */
  readonly room: number
  readonly nodes: readonly RootContent[]
}

/** The first piece has the addresses from 0, as places that are nowhere do; all others follow it. */
const FIRST_ROOM = 2 ** 32

export class Rereader {
  private held: readonly Held[] = []
  private free = FIRST_ROOM
  /** Address and line of each stretch of the last text. */
  private lines: readonly number[] = []
  private onLines = {}

  read(path: string, text: string): Read {
    const pieces = piecesOf(text)
    if (pieces === undefined) {
      this.held = []
      return { tree: parseMarkdown(text), source: sourceOf(path, text) }
    }
    const texts = pieces.map(({ start, end }) => text.slice(start, end))
    const before = partners(this.held, pieces, texts)
    this.held = pieces.map((piece, i) => this.hold(piece, text, texts[i] ?? '', i === 0, before[i]))
    const all = this.held.map(({ address }, i): Stretch => ({ address, offset: pieces[i]?.start ?? 0 }))
    const lines = this.held.flatMap(({ address }, i) => [address, pieces[i]?.line ?? 0])
    if (!sameNumbers(lines, this.lines)) this.onLines = {}
    this.lines = lines
    // What stands nowhere stands at the very beginning.
    all.push({ address: 0, offset: 0 })
    all.sort((a, b) => a.address - b.address || b.offset - a.offset)
    return {
      tree: { type: 'root', children: this.held.flatMap(({ nodes }) => nodes) },
      source: sourceOf(path, text, { all, onLines: this.onLines }),
    }
  }

  /** @param before what stood in its place: the piece itself, or one whose addresses it may take over */
  private hold(piece: Piece, whole: string, text: string, isFirst: boolean, before: Held | undefined): Held {
    const { kind } = piece
    const mayStay = before !== undefined && (before.address === 0) === isFirst
    if (mayStay && before.text === text && before.kind === kind) return before
    const fits = mayStay && text.length < before.room
    const room = isFirst ? FIRST_ROOM : fits ? before.room : 2 * text.length + 4096
    const address = isFirst ? 0 : fits ? before.address : this.free
    if (address === this.free) this.free += room
    return { kind, text, address, room, nodes: nodesOf(piece, whole, address) }
  }
}

const sameNumbers = (a: readonly number[], b: readonly number[]): boolean =>
  a.length === b.length && a.every((each, i) => each === b[i])

/**
 * For each piece the one before that it is, or else one that stood there and is no more. A piece that was
 * moved is found by its text.
 */
function partners(
  held: readonly Held[],
  pieces: readonly Piece[],
  texts: readonly string[],
): readonly (Held | undefined)[] {
  const isSame = (i: number, j: number) => held[i]?.text === texts[j] && held[i]?.kind === pieces[j]?.kind
  const most = Math.min(held.length, texts.length)
  let head = 0
  while (head < most && isSame(head, head)) head++
  let tail = 0
  while (tail < most - head && isSame(held.length - 1 - tail, texts.length - 1 - tail)) tail++
  const gone = new Set(held.slice(head, held.length - tail))
  const middle = texts.slice(head, texts.length - tail).map((text, i) => {
    const moved = [...gone].find(each => each.text === text && each.kind === pieces[head + i]?.kind)
    if (moved) gone.delete(moved)
    return moved
  })
  const left = [...gone]
  const replaced = middle.map((moved, i) => {
    if (moved) return moved
    const kind = pieces[head + i]?.kind
    const at = left.findIndex(each => each.kind === kind)
    return at === -1 ? undefined : left.splice(at, 1)[0]
  })
  return [...held.slice(0, head), ...replaced, ...held.slice(held.length - tail)]
}
