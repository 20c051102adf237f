/** What stands at a place of a block that can be read: a word of its form, or a cell with what it holds. */
import type { Span } from '../base/span.ts'
import { levelNameOf } from '../model/givens.ts'
import type { Block } from '../read/block.ts'
import type { Text } from '../read/text.ts'
import { isTopic, type Topic } from '../read/topics.ts'
import { columnOf, type Field, grammar, settingFieldOf } from './grammar.ts'
import type { Fence, Opened } from './opened.ts'

export type Cell =
  /** A topic, the name of a column or of a setting. */
  | { readonly kind: 'word'; readonly says: string; readonly name: string; readonly span: Span }
  | { readonly kind: 'field'; readonly field: Field; readonly text: Text; readonly id: string | undefined }

export const within = ({ start, end }: Span, offset: number): boolean => start <= offset && offset <= end

export const fenceAt = (document: Opened, offset: number): Fence | undefined =>
  document.fences().find(({ span }) => within(span, offset))

/** Undefined outside our fences and in what is neither a name of their form nor a cell. */
export function cellAt(document: Opened, offset: number): Cell | undefined {
  const block = fenceAt(document, offset)?.block
  if (!block || !isTopic(block.topic)) return undefined
  const level = levelNameOf(block, document.levels()) ?? ''
  return (
    topicAt(block, block.topic, offset) ??
    settingAt(block, block.topic, level, offset) ??
    inTable(block, block.topic, level, offset)
  )
}

function topicAt({ info }: Block, topic: Topic, offset: number): Cell | undefined {
  const span = { start: info.start, end: info.start + topic.length }
  return within(span, offset) ? { kind: 'word', says: grammar[topic].says, name: topic, span } : undefined
}

function settingAt(block: Block, topic: Topic, level: string, offset: number): Cell | undefined {
  for (const { name, value } of [...block.settings, ...block.options]) {
    const field = settingFieldOf(topic, name.text)
    if (!field) continue
    if (within(name.span, offset)) return { kind: 'word', says: field.says, name: name.text, span: name.span }
    if (within(value.span, offset))
      return {
        kind: 'field',
        field,
        text: value,
        id: idOf(field, { level, name: block.about?.text ?? '', wall: '', row: '' }),
      }
  }
  return undefined
}

function inTable({ table }: Block, topic: Topic, level: string, offset: number): Cell | undefined {
  if (!table) return undefined
  for (const { name } of table.header) {
    const field = columnOf(topic, name.text)
    if (field && within(name.span, offset)) return { kind: 'word', says: field.says, name: name.text, span: name.span }
  }
  const row = table.rows.find(({ line }) => within(line.span, offset))
  if (!row) return undefined
  const cellOf = (wanted: (field: Field, name: string) => boolean) =>
    row.cells[
      table.header.findIndex(({ name }) => {
        const field = columnOf(topic, name.text)
        return field !== undefined && wanted(field, name.text)
      })
    ]?.text ?? ''
  const at = row.cells.findIndex(({ text, span }) => text !== '' && within(span, offset))
  const [text, head] = [row.cells[at], table.header[at]]
  const field = head && columnOf(topic, head.name.text)
  if (!text || !field) return undefined
  const named = {
    level,
    name: cellOf(({ holds }) => holds.kind === 'own'),
    wall: cellOf((_, name) => name === 'wall'),
    row: cellOf((_, name) => name === 'level'),
  }
  return { kind: 'field', field, text, id: idOf(field, named) }
}

interface RowNames {
  readonly level: string
  /** What the row or the block states. */
  readonly name: string
  readonly wall: string
  /** The level that a row of forces is about. */
  readonly row: string
}

function idOf({ holds }: Field, { level, name, wall, row }: RowNames): string | undefined {
  if (holds.kind !== 'value') return undefined
  const words: Readonly<Record<string, string>> = { LEVEL: level, NAME: name, WALL: wall, ROW: row }
  return holds.id
    .split('.')
    .map(part => words[part] ?? part)
    .join('.')
}
