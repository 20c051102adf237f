/** What may stand where someone is writing. */
import { dimensionInWords, sameDimension } from '../base/dimension.ts'
import { dimensionOfKind, type Kind, unitOfKind } from '../base/kind.ts'
import type { Span } from '../base/span.ts'
import { isUnitName, type Unit, unit, unitSpellings, unitText } from '../base/unit.ts'
import { everyWant, WHOLE, WHOLE_SEISMIC } from '../explain/request.ts'
import { commonSettings, isMaterial, materials } from '../model/construction.ts'
import { forceTableSettings } from '../model/forces.ts'
import { perLevel } from '../model/givens.ts'
import { isWord } from '../model/scope.ts'
import { part, type Text } from '../read/text.ts'
import { isTopic, type Topic, topics } from '../read/topics.ts'
import { readsAsName } from './expressions.ts'
import { columnOf, type Field, grammar, settingFieldOf, wantSays } from './grammar.ts'
import type { Sort } from './names.ts'
import type { Opened } from './opened.ts'
import { type Inside, type Place, placeAt } from './place.ts'
import { inShort } from './tell.ts'

export type OfferKind = 'topic' | 'field' | 'name' | 'value' | 'unit' | 'word'

export interface Offer {
  readonly kind: OfferKind
  readonly text: string
  readonly detail: string
  /** What it takes the place of. */
  readonly replaces: Span
}

/** In the order in which they are best shown; none outside our fences and quotes. */
export function offersAt(document: Opened, offset: number): readonly Offer[] {
  const place = placeAt(document, offset)
  return place ? offersFor(place, document) : []
}

function offersFor(place: Place, document: Opened): readonly Offer[] {
  switch (place.kind) {
    case 'info':
      return inInfo(place, document)
    case 'head':
      return inHead(place, document)
    case 'cell': {
      const field = columnOf(place.inside.topic, place.column)
      return field ? inField(field, place.typed, levelOf(place.inside, document), document) : []
    }
    case 'setting': {
      const field = settingFieldOf(place.inside.topic, place.name)
      return field ? inField(field, place.typed, levelOf(place.inside, document), document) : []
    }
    case 'line':
      return inLine(place, document)
    case 'quote':
      return inQuote(place.typed, document)
  }
}

type At<K extends Place['kind']> = Extract<Place, { readonly kind: K }>

const words = (document: Opened, text: string): string => document.compiled().context.words(text)

function inInfo({ words: before, typed }: At<'info'>, document: Opened): readonly Offer[] {
  const [topic] = before
  if (topic === undefined)
    return topics.map(text => ({
      kind: 'topic',
      text,
      detail: words(document, grammar[text].says),
      replaces: typed.span,
    }))
  if (!isTopic(topic)) return []
  const option = /^([^=]+)=(.*)$/s.exec(typed.text)
  const inside: Inside = {
    topic,
    about: before
      .slice(1)
      .filter(word => !word.includes('='))
      .join(' '),
    others: [],
  }
  if (option) {
    const field = settingFieldOf(topic, option[1] ?? '')
    const value = part(typed, (option[1] ?? '').length + 1)
    return field ? inField(field, value, levelOf(inside, document), document) : []
  }
  const aboutLevel = topic === 'working' || perLevel.some(each => each === topic)
  const levels = aboutLevel && inside.about === '' ? named('level', '', typed.span, document) : []
  const fields = topic === 'construction' ? [] : settingNames(inside)
  return [
    ...levels,
    ...fields.map(
      (text): Offer => ({
        kind: 'field',
        text: `${text}=`,
        detail: saysOf(topic, text, document),
        replaces: typed.span,
      }),
    ),
  ]
}

const saysOf = (topic: Topic, setting: string, document: Opened): string =>
  words(document, settingFieldOf(topic, setting)?.says ?? '')

function levelOf({ about }: Inside, document: Opened): string {
  const [only, second] = document.levels()
  return about !== '' ? about : second === undefined ? (only ?? '') : ''
}

function inHead({ inside, columns, inUnit, typed }: At<'head'>, document: Opened): readonly Offer[] {
  if (inUnit) return unitOffers(undefined, typed.span, document)
  return Object.entries(grammar[inside.topic].columns)
    .filter(([name]) => name === typed.text.trim() || !columns.includes(name))
    .map(([text, { says }]) => ({ kind: 'field', text, detail: words(document, says), replaces: typed.span }))
}

/** The settings that a block of its kind may have and does not have yet. */
function settingNames({ topic, others }: Inside): readonly string[] {
  const has = (name: string) => others.some(line => line.trimStart().startsWith(`${name}:`))
  const all = Object.keys(grammar[topic].settings)
  const possible =
    topic === 'construction'
      ? ofMaterial(others)
      : topic === 'forces' && others.some(line => line.trim().startsWith('|'))
        ? forceTableSettings
        : all
  return possible.filter(name => !has(name))
}

function ofMaterial(lines: readonly string[]): readonly string[] {
  const written = lines.flatMap(line => /^\s*material:\s*(.*?)\s*(?:#.*)?$/.exec(line)?.[1] ?? [])
  const [material = ''] = written
  if (!isMaterial(material))
    return [...commonSettings, ...new Set(Object.values(materials).flatMap(each => each.needed))]
  const { needed, optional } = materials[material]
  return [...commonSettings, ...needed, ...optional]
}

function inLine({ inside, typed }: At<'line'>, document: Opened): readonly Offer[] {
  if (inside.topic === 'equations') return inEquation(typed, document)
  const settings = settingNames(inside).map(
    (text): Offer => ({
      kind: 'field',
      text: `${text}: `,
      detail: saysOf(inside.topic, text, document),
      replaces: typed.span,
    }),
  )
  if (inside.topic !== 'working') return /[^\p{L}\p{N}_' -]/u.test(typed.text) ? [] : settings
  const last = /[^,;]*$/.exec(typed.text)?.[0].trimStart() ?? ''
  const replaces = { start: typed.span.end - last.length, end: typed.span.end }
  const wants = [WHOLE, WHOLE_SEISMIC, ...everyWant].map(
    (want): Offer => ({
      kind: 'word',
      text: words(document, want),
      detail: words(document, wantSays[want]),
      replaces,
    }),
  )
  return last === typed.text ? [...wants, ...settings] : wants
}

function inEquation(typed: Text, document: Opened): readonly Offer[] {
  const arrow = typed.text.lastIndexOf('->')
  if (arrow !== -1) {
    const unitTyped = part(typed, arrow + 2)
    return unitOffers(undefined, endOf(unitTyped, /[\p{L}°%]*$/u).span, document)
  }
  const sign = /=|≤|</.exec(typed.text)
  if (!sign) return []
  const own = typed.text.slice(0, sign.index).trim()
  return inExpression(part(typed, sign.index + sign[0].length), undefined, document).filter(({ text }) => text !== own)
}

function inField({ holds }: Field, typed: Text, level: string, document: Opened): readonly Offer[] {
  switch (holds.kind) {
    case 'own':
    case 'text':
      return []
    case 'words':
      return holds.words.map(text => ({
        kind: 'word',
        text,
        detail: 'one of the words that it may be',
        replaces: typed.span,
      }))
    case 'level':
    case 'construction':
      return named(holds.kind, '', typed.span, document)
    case 'wall':
      return named('wall', level, typed.span, document)
    case 'walls': {
      const before = typed.text
        .split(',')
        .slice(0, -1)
        .map(name => name.trim())
      const offers = named('wall', level, endOf(typed, /[^,\s][^,]*$|$/).span, document)
      return offers.filter(({ text }) => !before.includes(text))
    }
    case 'lines': {
      const piece = endOf(typed, /[^,]*$/)
      return /^\s*\S*$/.test(piece.text) ? [] : inExpression(endOf(piece, /\S.*$|$/), 'length', document)
    }
    case 'point':
    case 'points':
      return inPoint(typed, document)
    case 'value':
      return [
        ...(/^\p{L}*$/u.test(typed.text) ? (holds.words ?? []) : []).map(
          (text): Offer => ({ kind: 'word', text, detail: 'in place of a value', replaces: typed.span }),
        ),
        ...inExpression(typed, holds.of, document),
      ]
  }
}

/** The end of a piece that a pattern finds. */
function endOf(typed: Text, pattern: RegExp): Text {
  const found = pattern.exec(typed.text)
  return part(typed, found?.index ?? typed.text.length)
}

/** Crossings where a point begins, grid lines along y for its second half. */
function inPoint(typed: Text, document: Opened): readonly Offer[] {
  const { x, y } = document.names().lines
  const compiled = document.compiled()
  const at = (name: string) => {
    const found = compiled.scope.lookup(`grid.${name}`)
    return found ? inShort(found, compiled) : ''
  }
  const second = /[,/]\s*([^,/()]*)$/.exec(typed.text)
  if (second) {
    const replaces = { start: typed.span.end - (second[1] ?? '').length, end: typed.span.end }
    return y.map(({ name }) => ({ kind: 'name', text: name, detail: `y = ${at(name)}`, replaces }))
  }
  const { span: replaces } = endOf(typed, /[^\s(]*$/)
  return x
    .slice(0, MOST_LINES)
    .flatMap(a =>
      y
        .slice(0, MOST_LINES)
        .map((b): Offer => ({ kind: 'name', text: a.name + b.name, detail: `${at(a.name)}, ${at(b.name)}`, replaces })),
    )
}

/** Crossings of more lines than this are no list to choose from. */
const MOST_LINES = 40

/** A number without its unit at the end of what is written, the unit's factors so far, and the one under way. */
const UNIT = /(?:^|[\s(+*/^,-])(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)? ?((?:[\p{L}°]+(?:\^\d+)?[*/])*)([\p{L}°%]*)$/u
const NAME = /[\p{L}_][\p{L}\p{N}_.']*[+-]?$/u

function inExpression(typed: Text, of: Kind | undefined, document: Opened): readonly Offer[] {
  const number = UNIT.exec(typed.text)
  if (number) {
    const started = number[2] ?? ''
    const replaces = { start: typed.span.end - started.length, end: typed.span.end }
    return unitOffers(number[1] === '' ? of : undefined, replaces, document)
  }
  return idOffers(endOf(typed, NAME).span, document, true)
}

/** Units of what is wanted first. */
function unitOffers(of: Kind | undefined, replaces: Span, document: Opened): readonly Offer[] {
  const { system } = document.compiled().choices
  const usual = of && unitText(unitOfKind(of, { system, relative: false }))
  const wanted = of && dimensionOfKind(of)
  const single = unitSpellings().filter(isOwnName)
  const fits = (name: string) => wanted !== undefined && sameDimension(unit(name).dimension, wanted)
  const all = [...(usual ? [usual] : []), ...single.filter(fits), ...single.filter(name => !fits(name))]
  return [...new Set(all)].map(text => ({
    kind: 'unit',
    text,
    detail: dimensionInWords(unit(text).dimension),
    replaces,
  }))
}

/** Of several spellings the one that is printed. */
const isOwnName = (name: string): boolean => isUnitName(name) && unitText(unit(name)) === name

function named(sort: Sort, of: string, replaces: Span, document: Opened): readonly Offer[] {
  const given = document.names().mentions.filter(each => each.given && each.sort === sort && each.of === of)
  return [...new Set(given.map(({ name }) => name))].map(text => ({
    kind: 'name',
    text,
    detail: detailOf(sort, of, text, document),
    replaces,
  }))
}

const mainValues: Readonly<Partial<Record<Sort, (of: string, name: string) => string>>> = {
  level: (_, name) => `${name}.W`,
  wall: (of, name) => `${of}.wall.${name}.L`,
  construction: (_, name) => `constructions.${name}.E`,
}

function detailOf(sort: Sort, of: string, name: string, document: Opened): string {
  const id = mainValues[sort]?.(of, name)
  const compiled = document.compiled()
  const found = id === undefined ? undefined : compiled.scope.lookup(id)
  return found?.ok ? `${id?.split('.').at(-1)} = ${inShort(found, compiled)}` : sort
}

/** Values by their ids: those that the manual tells of, and whatever else is printed and can be asked for. */
function idOffers(replaces: Span, document: Opened, inExpression: boolean): readonly Offer[] {
  const compiled = document.compiled()
  const { scope, context } = compiled
  const { lines, mentions } = document.names()
  const constructions = mentions.filter(({ sort, given }) => given && sort === 'construction')
  const ids = new Set([
    ...scope.ids(),
    ...[...lines.x, ...lines.y].map(({ name }) => `grid.${name}`),
    ...constructions.flatMap(({ name }) => ['t', 'E', 'G'].map(key => `constructions.${name}.${key}`)),
    ...context.roots.keys(),
  ])
  return [...ids].flatMap((id): readonly Offer[] => {
    if (inExpression && !readsAsName(id)) return []
    const found = scope.lookup(id)
    if (!found?.ok || (inExpression && isWord(found.value))) return []
    return [{ kind: 'value', text: id, detail: inShort(found, compiled), replaces }]
  })
}

function inQuote(typed: Text, document: Opened): readonly Offer[] {
  if (document.fences().length === 0) return []
  const bar = typed.text.indexOf('|')
  if (bar === -1) return idOffers(typed.span, document, false)
  const found = document.compiled().scope.lookup(typed.text.slice(0, bar).replace(/\\$/, '').trim())
  if (!found?.ok || isWord(found.value)) return []
  return stepOffers(found.value.unit, endOf(part(typed, bar + 1), /\S.*$|$/).span)
}

/** Steps to round to: in the unit that the value prints in, and in the others of its kind. */
function stepOffers(own: Unit, replaces: Span): readonly Offer[] {
  const alike = unitSpellings().filter(name => isOwnName(name) && sameDimension(unit(name).dimension, own.dimension))
  const names = [...new Set([unitText(own), ...alike])].filter(name => name !== '')
  return names.flatMap(name =>
    ['1', '0.1', '0.01'].map(
      (step): Offer => ({ kind: 'unit', text: `${step} ${name}`, detail: `rounded to ${step} ${name}`, replaces }),
    ),
  )
}
