/**
 * Reads a fenced block: its info string, then settings, one pipe table, plain
 * lines and comments, in any order. It knows the shape of a block, not its meaning.
 */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Span } from '../base/span.ts'
import { readTable, type Table } from './table.ts'
import { diagnose, part, type Text, trimmed } from './text.ts'

export interface Setting {
  readonly name: Text
  readonly value: Text
  /** What stands behind it after #. */
  readonly comment: string
}

/** A line that is neither a setting nor a row, without its comment. */
export interface Line extends Text {
  readonly comment: string
}

export interface Block {
  readonly topic: string
  /** The first line of the fence, after its marks. */
  readonly info: Span
  /** The level or name it is about. */
  readonly about?: Text
  readonly options: readonly Setting[]
  readonly settings: readonly Setting[]
  readonly table?: Table
  /** Lines that are neither: what a working asks for, the lines of equations. */
  readonly lines: readonly Line[]
  /** Faults of the block's form; its meaning is not looked at when there are any. */
  readonly faults: readonly Diagnostic[]
}

const SETTING = /^([\p{L}][\p{L}\p{N}_' -]*?)\s*:(?:\s+(.*)|)$/su
const COMMENT = /(?:^|\s)#.*$/s

/**
 * @param info the info string with its place
 * @param content the lines inside the fence, each with its place
 */
export function readBlock(info: Text, content: readonly Text[]): Block {
  const faults: Diagnostic[] = []
  const settings: Setting[] = []
  const lines: Line[] = []
  const rows: Text[] = []
  let tableEnded = false
  for (const raw of content) {
    const line = trimmed(raw)
    if (line.text.startsWith('|')) {
      if (tableEnded) faults.push(secondTable(line))
      else rows.push(line)
      continue
    }
    tableEnded ||= rows.length > 0 && line.text === ''
    const remark = COMMENT.exec(line.text)?.[0] ?? ''
    const comment = remark.trim().slice(1).trim()
    const kept = trimmed(part(line, 0, line.text.length - remark.length))
    if (kept.text === '') continue
    const setting = settingOf(kept, comment)
    if (!setting) lines.push({ ...kept, comment })
    else {
      const before = settings.find(({ name }) => name.text === setting.name.text)
      if (before) faults.push(repeated(setting, before))
      else settings.push(setting)
    }
  }
  const table = rows.length > 0 ? readTable(rows) : undefined
  const [topic, about, options] = readInfo(info)
  return {
    topic,
    info: info.span,
    ...(about ? { about } : {}),
    options,
    settings,
    ...(table?.ok ? { table: table.value } : {}),
    lines,
    faults: [...faults, ...(table && !table.ok ? table.because : [])],
  }
}

function settingOf(line: Text, comment: string): Setting | undefined {
  const found = SETTING.exec(line.text)
  if (!found || (line.text.includes('=') === true && line.text.indexOf('=') < line.text.indexOf(':'))) return undefined
  const name = found[1] ?? ''
  return { name: part(line, 0, name.length), value: trimmed(part(line, line.text.indexOf(':') + 1)), comment }
}

function readInfo(info: Text): readonly [string, Text | undefined, readonly Setting[]] {
  const words = [...info.text.matchAll(/\S+/g)].map(found => part(info, found.index, found.index + found[0].length))
  const [topic, ...rest] = words
  const options = rest.filter(({ text }) => text.includes('=')).map(option)
  const about = rest.filter(({ text }) => !text.includes('='))
  const [first] = about
  const last = about.at(-1)
  if (!first || !last) return [topic?.text ?? '', undefined, options]
  const span = { start: first.span.start, end: last.span.end }
  return [topic?.text ?? '', { text: about.map(({ text }) => text).join(' '), span }, options]
}

function option(word: Text): Setting {
  const sign = word.text.indexOf('=')
  return { name: part(word, 0, sign), value: part(word, sign + 1), comment: '' }
}

const secondTable = (line: Text): Diagnostic =>
  diagnose(
    'error',
    'second-table',
    line.span,
    'a second table starts here',
    'A block holds one table. Put this one in a block of its own.',
  )

const repeated = ({ name }: Setting, before: Setting): Diagnostic =>
  diagnose('error', 'setting-repeated', name.span, `${name.text} is set twice`, 'Keep one of them.', {
    also: [{ span: before.name.span, text: 'set here first' }],
  })
