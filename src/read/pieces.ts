/**
 * Where a Markdown text may be cut so that its pieces, read apart, give what the whole gives.
 *
 * A heading or a fence at the margin, after an empty line, ends every list, quotation and table before
 * it. What reaches over such a line is an open fence at the margin, which is followed here, and raw HTML,
 * definitions of links and footnotes, and fences that are indented: a text that may hold one of these is not cut.
 */

export type Piece =
  | { readonly kind: 'text'; readonly start: number; readonly end: number; readonly line: number }
  /** A whole fence at the margin. */
  | {
      readonly kind: 'fence'
      readonly start: number
      readonly end: number
      readonly line: number
      readonly lastLine: number
      readonly info: string
      readonly content: string
    }

/** Shorter pieces cost more than they save. */
const LEAST = 1000

const DEFINITION = /\]:/
const OPEN_HTML = /^[ \t]*<(?:script|pre|style|textarea|!--(?!.*-->)|\?|!\[CDATA\[|![a-z])/im
const FENCE = /^(`{3,}|~{3,})(.*)$/s
const STRANGE = /[\r\0\ufeff]/

/** @returns the pieces in order, which leave out nothing but empty lines; undefined when the text must be read whole */
export function piecesOf(text: string): readonly Piece[] | undefined {
  if (STRANGE.test(text) || DEFINITION.test(text) || OPEN_HTML.test(text)) return undefined
  const start = frontMatterEnd(text)
  // An open start of front matter makes the reader look at all that follows in another way.
  if (start === 0 && text.startsWith('---')) return undefined
  const cutter = new Cutter(text)
  let line = start === 0 ? 1 : text.slice(0, start).split('\n').length
  for (let at = start; at < text.length; line++) {
    const newline = text.indexOf('\n', at)
    const end = newline === -1 ? text.length : newline
    if (!cutter.see(at, end, line)) return undefined
    at = end + 1
  }
  return cutter.finish()
}

/** Offset after the front matter, within which nothing is looked at. */
function frontMatterEnd(text: string): number {
  return /^---[ \t]*\n(?:[\s\S]*?\n)??---[ \t]*(?:\n|$)/.exec(text)?.[0].length ?? 0
}

interface Open {
  readonly mark: string
  readonly start: number
  readonly line: number
  readonly contentStart: number
  readonly info: string
  /** False when something stands right above it, so that it stays part of a larger piece. */
  readonly apart: boolean
}

/** Goes through the lines and remembers what is open. */
class Cutter {
  private readonly pieces: Piece[] = []
  private from = { start: 0, line: 1 }
  private open: Open | undefined
  private closed: Extract<Piece, { kind: 'fence' }> | undefined
  /** Nothing stands right above but an empty line. */
  private free = true
  private readonly text: string

  constructor(text: string) {
    this.text = text
  }

  /** Takes the next line. @returns false when the text must be read whole */
  see(start: number, end: number, line: number): boolean {
    if (this.open) this.within(this.open, start, end, line)
    else {
      const empty = this.text.slice(start, end).trim() === ''
      if (empty) this.takeClosed(start, line)
      this.closed = undefined
      const sign = this.text[start]
      if (/.(?:```|~~~)/.test(this.text.slice(start, end)) && !FENCE.test(this.text.slice(start, end))) return false
      if (sign === '`' || sign === '~') this.fence(start, end, line)
      if (sign === '#' && this.free && start - this.from.start > LEAST && this.isHeading(start, end))
        this.cut(start, line)
      this.free = empty
    }
    return true
  }

  finish(): readonly Piece[] {
    this.takeClosed(this.text.length, 0)
    this.cut(this.text.length, 0)
    return this.pieces
  }

  private isHeading(start: number, end: number): boolean {
    return /^#{1,6}(?:[ \t]|$)/.test(this.text.slice(start, end))
  }

  private fence(start: number, end: number, line: number): void {
    const found = FENCE.exec(this.text.slice(start, end))
    const [, mark = '', after = ''] = found ?? []
    if (!found || (mark.startsWith('`') && after.includes('`'))) return
    // The reader decodes escapes and entities, and keeps space at the end of an info string that has two words.
    const plain = !/[\\&]|[ \t]$/.test(after)
    this.open = {
      mark,
      start,
      line,
      contentStart: end + 1,
      info: after.replace(/^[ \t]+/, ''),
      apart: this.free && plain,
    }
  }

  private within({ mark, ...open }: Open, start: number, end: number, line: number): void {
    const closing = /^ {0,3}(`{3,}|~{3,})[ \t]*$/.exec(this.text.slice(start, end))?.[1]
    if (closing === undefined || !closing.startsWith(mark)) return
    this.open = undefined
    this.free = false
    if (!open.apart) return
    const content = this.text.slice(open.contentStart, Math.max(open.contentStart, start - 1))
    const { info } = open
    this.closed = { kind: 'fence', start: open.start, end, line: open.line, lastLine: line, info, content }
  }

  /** A fence becomes a piece once nothing stands right below it either. */
  private takeClosed(next: number, line: number): void {
    if (!this.closed) return
    this.cut(this.closed.start, this.closed.line)
    this.pieces.push(this.closed)
    this.from = { start: next, line }
    this.closed = undefined
  }

  /** Ends a piece of text. */
  private cut(end: number, line: number): void {
    const { start } = this.from
    if (this.text.slice(start, end).trim() !== '') this.pieces.push({ kind: 'text', end, ...this.from })
    this.from = { start: end, line }
  }
}
