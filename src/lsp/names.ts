/** Every name of a document that others lean on: where it is given and where it is used. */
import type { Span } from '../base/span.ts'
import { pointsOf } from '../model/areas.ts'
import { settingOf } from '../model/columns.ts'
import { readEquation } from '../model/equations.ts'
import { levelNameOf, perLevel } from '../model/givens.ts'
import { namedLines } from '../model/grid.ts'
import { isLimit, SIGN } from '../model/limits.ts'
import type { Block } from '../read/block.ts'
import { part, splitAt, type Text, trimmed } from '../read/text.ts'
import { isTopic } from '../read/topics.ts'
import { inPoint, type LineNames, namesOf } from './expressions.ts'
import { columnOf, type Field, settingFieldOf } from './grammar.ts'

export type Sort =
  | 'level'
  | 'wall'
  | 'construction'
  | 'equation'
  | 'line'
  | 'area'
  | 'line load'
  | 'point load'
  | 'opening'

/** One thing with a name. Walls and what else a level holds are told apart by their level, openings by their wall too. */
export interface Named {
  readonly sort: Sort
  readonly name: string
  /** Level, or level and wall with a dot between; empty for what the whole document shares. */
  readonly of: string
}

export interface Mention extends Named {
  readonly span: Span
  readonly given: boolean
  /** What the name stands in, which settles how it may be spelt. */
  readonly within: 'info' | 'cell' | 'list' | 'expression' | 'quote' | 'equation' | 'grid' | 'point'
}

/** A dotted name in an expression or a quote. */
export interface IdPlace {
  readonly id: string
  readonly span: Span
  readonly within: 'expression' | 'quote'
}

export interface Names {
  readonly mentions: readonly Mention[]
  readonly ids: readonly IdPlace[]
  /** What cannot be read, so that names in it are not known. */
  readonly unread: readonly Span[]
  readonly levels: readonly string[]
  readonly lines: LineNames
}

/** What a dotted name and a point are read by. */
interface Given {
  readonly levels: readonly string[]
  readonly lines: LineNames
}

/**
 * @param levels names of the levels, as the model tells them
 * @param quotes each quote's id with its place; undefined where its place is not sure
 */
export function namesIn(
  blocks: readonly Block[],
  levels: readonly string[],
  quotes: readonly { readonly id: Text; readonly sure: boolean }[],
): Names {
  const lines = linesOf(blocks)
  const gatherer = new Gatherer({ levels, lines })
  for (const block of blocks) gatherer.block(block)
  for (const { id, sure } of quotes)
    if (sure) gatherer.id(id, 'quote')
    else gatherer.unread.push(id.span)
  return { mentions: withFirstGiven(gatherer.mentions), ids: gatherer.ids, unread: gatherer.unread, levels, lines }
}

function linesOf(blocks: readonly Block[]): LineNames {
  const along = (axis: string) =>
    blocks
      .filter(({ topic }) => topic === 'grid')
      .flatMap(block => {
        const setting = settingOf(block, axis)
        return setting ? namedLines(setting).map(({ name }) => ({ name: name.text })) : []
      })
  return { x: along('x'), y: along('y') }
}

/** Where no table lists the levels, a level is given where it is first named. */
function withFirstGiven(mentions: readonly Mention[]): readonly Mention[] {
  const given = new Set(mentions.filter(each => each.given).map(keyOf))
  return mentions.map(each => {
    const key = keyOf(each)
    if (each.sort !== 'level' || each.within !== 'info' || given.has(key)) return each
    given.add(key)
    return { ...each, given: true }
  })
}

/** Tells things apart. */
export const keyOf = ({ sort, of, name }: Named): string => `${sort}\n${of}\n${name}`

const rowSorts: Readonly<Record<string, Sort>> = {
  levels: 'level',
  areas: 'area',
  'line-loads': 'line load',
  'point-loads': 'point load',
  walls: 'wall',
  openings: 'opening',
}

class Gatherer {
  readonly mentions: Mention[] = []
  readonly ids: IdPlace[] = []
  readonly unread: Span[] = []
  private readonly given: Given

  constructor(given: Given) {
    this.given = given
  }

  block(block: Block): void {
    if (block.faults.length > 0) this.unread.push(wholeOf(block))
    const level = levelNameOf(block, this.given.levels) ?? ''
    if (block.about) this.about(block, block.about)
    for (const { name, value } of [...block.settings, ...block.options]) {
      const field = isTopic(block.topic) ? settingFieldOf(block.topic, name.text) : undefined
      if (field) this.field(field, value, level)
    }
    if (block.topic === 'equations') for (const line of block.lines) this.equation(line)
    this.rows(block, level)
  }

  private about({ topic }: Block, about: Text): void {
    if (topic !== 'construction' && topic !== 'working' && !perLevel.some(each => each === topic)) return
    const sort = topic === 'construction' ? 'construction' : 'level'
    this.mention({ sort, name: about.text, of: '', span: about.span, given: sort === 'construction', within: 'info' })
  }

  private rows({ topic, table }: Block, level: string): void {
    if (!table || !isTopic(topic)) return
    const wallColumn = table.header.findIndex(({ name }) => name.text === 'wall')
    for (const { cells } of table.rows)
      for (const [i, { name }] of table.header.entries()) {
        const [field, cell] = [columnOf(topic, name.text), cells[i]]
        if (!field || !cell || cell.text === '') continue
        // A bar that was written \| leaves the text shorter than its place.
        if (cell.text.length !== cell.span.end - cell.span.start) this.unread.push(cell.span)
        else if (field.holds.kind === 'own') this.own(topic, cell, level, cells[wallColumn]?.text ?? '')
        else this.field(field, cell, level)
      }
  }

  private own(topic: string, cell: Text, level: string, wall: string): void {
    const sort = rowSorts[topic]
    if (!sort) return
    const of = sort === 'level' ? '' : sort === 'opening' ? `${level}.${wall}` : level
    this.mention({ sort, name: cell.text, of, span: cell.span, given: true, within: 'cell' })
  }

  private field({ holds }: Field, text: Text, level: string): void {
    switch (holds.kind) {
      case 'own':
      case 'text':
      case 'words':
        return
      case 'level':
      case 'wall':
      case 'construction':
        this.mention({
          sort: holds.kind,
          name: text.text,
          of: holds.kind === 'wall' ? level : '',
          span: text.span,
          given: false,
          within: 'cell',
        })
        return
      case 'walls':
        for (const name of splitAt(text, /,/).filter(({ text }) => text !== ''))
          this.mention({ sort: 'wall', name: name.text, of: level, span: name.span, given: false, within: 'list' })
        return
      case 'lines':
        for (const { name, at } of namedLines(text)) {
          this.mention({ sort: 'line', name: name.text, of: '', span: name.span, given: true, within: 'grid' })
          if (at) this.expression(at)
        }
        return
      case 'point':
        this.point(text)
        return
      case 'points':
        for (const point of pointsOf(text)) this.point(point)
        return
      case 'value':
        if (!holds.words?.includes(text.text.toLowerCase())) this.expression(text)
    }
  }

  private point(cell: Text): void {
    const found = inPoint(cell, this.given.lines)
    if (!found) {
      this.unread.push(cell.span)
      return
    }
    for (const line of found.lines)
      this.mention({ sort: 'line', name: line.text, of: '', span: line.span, given: false, within: 'point' })
    for (const name of found.names) this.id(name, 'expression')
  }

  private equation(line: Text): void {
    if (isLimit(line)) {
      const [sign = ''] = SIGN.exec(line.text) ?? []
      const at = line.text.indexOf(sign)
      this.expression(trimmed(part(line, 0, at)))
      this.expression(trimmed(part(line, at + sign.length)))
      return
    }
    const read = readEquation(line)
    if (!read.ok) {
      this.unread.push(line.span)
      return
    }
    const { name, span } = read.value
    this.mention({ sort: 'equation', name: name.text, of: '', span: name.span, given: true, within: 'equation' })
    this.expression(part(line, span.start - line.span.start, span.end - line.span.start))
  }

  private expression(text: Text): void {
    const names = namesOf(text)
    if (!names) this.unread.push(text.span)
    for (const name of names ?? []) this.id(name, 'expression')
  }

  /** The names that a dotted name is made of, found as the worksheet looks it up. */
  id({ text, span }: Text, within: 'expression' | 'quote'): void {
    this.ids.push({ id: text, span, within })
    const [head, second, ...rest] = dotted({ text, span })
    const use = (sort: Sort, name: Text | undefined, of = '') => {
      if (name) this.mention({ sort, name: name.text, of, span: name.span, given: false, within })
    }
    if (!second) {
      use('equation', head)
      return
    }
    if (head && this.given.levels.includes(head.text)) {
      const level = head.text
      use('level', head)
      // `roof.alone.wall.N.V.EX` is of the same wall as `roof.wall.N.V.EX`.
      const [kind, name, key, below] = second.text === 'alone' ? rest : [second, ...rest]
      if (kind?.text === 'wall') use('wall', name, level)
      if (kind?.text === 'wall' && key?.text === 'opening') use('opening', below, `${level}.${name?.text ?? ''}`)
      if (kind?.text === 'without' && name) for (const wall of splitAt(name, /\+/)) use('wall', wall, level)
      if (kind?.text === 'areas') use('area', name, level)
      if (kind?.text === 'lines') use('line load', name, level)
      if (kind?.text === 'points') use('point load', name, level)
      return
    }
    if (head?.text === 'grid') use('line', second)
    if (head?.text === 'constructions') use('construction', second)
  }

  private mention(mention: Mention): void {
    this.mentions.push(mention)
  }
}

/** The parts of a dotted name, with their places. */
function dotted(id: Text): readonly Text[] {
  let at = 0
  return id.text.split('.').map(({ length }) => {
    const found = part(id, at, at + length)
    at += length + 1
    return found
  })
}

function wholeOf({ info, faults }: Block): Span {
  return { start: info.start, end: Math.max(info.end, ...faults.map(({ at }) => at.span.end)) }
}
