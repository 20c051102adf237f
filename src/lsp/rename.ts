/**
 * Gives a thing another name everywhere. The renamed text is compiled before it is handed out, and must come to the same
 * values under the renamed ids: a name that this reading overlooks, or one that comes to mean something else, is then found.
 */
import { bad, good, type Outcome } from '../base/outcome.ts'
import { lineOf, type Span } from '../base/span.ts'
import type { Compiled } from '../compile.ts'
import { everyValue } from '../explain/trace.ts'
import { checkedName } from '../model/columns.ts'
import { NAME } from '../model/equations.ts'
import { readsAsName } from './expressions.ts'
import { keyOf, type Mention, type Named, type Names, type Sort } from './names.ts'
import type { Opened } from './opened.ts'

const whats = {
  level: 'level',
  wall: 'wall',
  construction: 'construction',
  equation: 'equation',
  line: 'grid line',
} as const satisfies Partial<Record<Sort, string>>

type Renameable = Mention & { readonly sort: keyof typeof whats }

const isRenameable = (mention: Mention): mention is Renameable => Object.hasOwn(whats, mention.sort)

/** The mention that a place is in, or at the end of: in a crossing one name starts where the other ends. */
export const mentionAt = ({ mentions }: Names, offset: number): Mention | undefined =>
  mentions.find(({ span }) => span.start <= offset && offset < span.end) ??
  mentions.find(({ span }) => offset === span.end)

/** What stands at a place and can be renamed, or why nothing can. */
export function renameable(document: Opened, offset: number): Outcome<Renameable> {
  const names = document.names()
  const found = mentionAt(names, offset)
  if (!found) return bad('There is no name here that can be changed.')
  if (!isRenameable(found)) return bad(`The name of this ${found.sort} is changed by hand.`)
  if (!usesOf(names, found).some(({ given }) => given))
    return bad(`There is no ${whats[found.sort]} ${found.name} in this document.`)
  return good(found)
}

/** Every mention of what a mention names. */
export function usesOf({ mentions }: Names, named: Named): readonly Mention[] {
  const key = keyOf(named)
  return mentions.filter(each => keyOf(each) === key)
}

/**
 * @param compile makes a build of a text that is not the one opened
 * @returns the places that take the new name, or why it is refused
 */
export function rename(
  document: Opened,
  offset: number,
  name: string,
  compile: (text: string) => Compiled,
): Outcome<readonly Span[]> {
  const found = renameable(document, offset)
  if (!found.ok) return found
  if (name === found.value.name) return good([])
  const names = document.names()
  const spans = usesOf(names, found.value).map(({ span }) => span)
  const refusal = refused(found.value, name, names) ?? unreadUse(found.value, document)
  if (refusal !== undefined) return bad(refusal)
  const after = compile(withNames(document.source.text, spans, name))
  const changed = firstChange(document.compiled(), after, renamedId(found.value, name))
  return changed === undefined ? good(spans) : bad(`${found.value.name} is not renamed: called ${name}, ${changed}.`)
}

/** The text with a name put in some places. */
export function withNames(text: string, spans: readonly Span[], name: string): string {
  let out = ''
  let from = 0
  for (const { start, end } of spans.toSorted((a, b) => a.start - b.start)) {
    out += text.slice(from, start) + name
    from = end
  }
  return out + text.slice(from)
}

function refused(found: Renameable, name: string, names: Names): string | undefined {
  const what = whats[found.sort]
  const checked = checkedName({ text: name, span: found.span }, what)
  if (!checked.ok) return checked.because.map(({ message, help }) => `${message}. ${help}`).join(' ')
  if (found.sort === 'equation' && !NAME.test(name))
    return `${name} is not a name. A name is a letter, then letters, digits and _.`
  if (names.mentions.some(each => each.given && keyOf(each) === keyOf({ ...found, name })))
    return `There is ${what === 'equation' ? 'an' : 'a'} ${what} ${name} already.`
  const uses = usesOf(names, found)
  const strange = uses.find(use => !standsIn(use.within, name))
  if (strange) return `${name} cannot be the name of this ${what}: ${places[strange.within]}`
  const broken = names.ids.find(
    ({ within, span, id }) =>
      within === 'expression' &&
      uses.some(use => use.span.start >= span.start && use.span.end <= span.end) &&
      !readsAsName(
        id
          .split('.')
          .map(part => (part === found.name ? name : part))
          .join('.'),
      ),
  )
  return (
    broken &&
    `${name} cannot be the name of this ${what}: it stands in an expression, as ${broken.id}, and must be one word of letters, digits and _ there.`
  )
}

const places: Readonly<Record<Mention['within'], string>> = {
  info: 'on the first line of a block a name holds no = and no grave accent, and one space between its words.',
  cell: 'in a table a name has no space at its ends.',
  list: 'in a list a name holds no comma, no # and no bracket.',
  expression: 'in an expression a name is one word of letters, digits and _.',
  quote: 'in a quote a name has no space at its ends.',
  equation: 'a name is a letter, then letters, digits and _.',
  grid: 'the name of a grid line has no space, comma, slash or bracket in it.',
  point: 'the name of a grid line has no space, comma, slash or bracket in it.',
}

function standsIn(within: Mention['within'], name: string): boolean {
  if (name !== name.trim()) return false
  switch (within) {
    case 'info':
      return /^\S+(?: \S+)*$/.test(name) && !/[=`]/.test(name)
    case 'list':
      return !/[,#():]/.test(name)
    case 'grid':
    case 'point':
      return !/[\s,/()#:=]/.test(name)
    case 'equation':
      return NAME.test(name)
    case 'cell':
    case 'quote':
    case 'expression':
      return true
  }
}

/** A name in a line that cannot be read may be a use of it. */
function unreadUse({ name, sort }: Renameable, { source, names }: Opened): string | undefined {
  const escaped = name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')
  const pattern =
    sort === 'line' ? new RegExp(escaped) : new RegExp(`(?<![\\p{L}\\p{N}_])${escaped}(?![\\p{L}\\p{N}_])`, 'u')
  const span = names().unread.find(({ start, end }) => pattern.test(source.text.slice(start, end)))
  return (
    span &&
    `Line ${lineOf(source, span.start)} cannot be read and may hold ${name}. Mend it first, so that no use is left behind.`
  )
}

/** What becomes of an id. */
export function renamedId({ sort, of, name: old }: Named, name: string): (id: string) => string {
  return id => {
    const parts = id.split('.')
    const swap = (at: number) => parts.map((part, i) => (i === at && part === old ? name : part)).join('.')
    switch (sort) {
      case 'equation':
        return swap(0)
      case 'level':
        return parts.length === 1 ? id : levelId(parts, old, name)
      case 'wall':
        return parts[0] === of ? wallId(parts, old, name) : id
      case 'construction':
        return parts[0] === 'constructions' ? swap(1) : id
      case 'line':
        return parts[0] === 'grid' ? swap(1) : id
      case 'area':
      case 'line load':
      case 'point load':
      case 'opening':
        return id
    }
  }
}

/** `roof.from.loft.T.EX`: what one level's force does to another; `roof.alone.from.loft.T.EX`, where walls are continuous. */
function levelId(parts: readonly string[], old: string, name: string): string {
  const from = afterAlone(parts)
  const other = parts[from] === 'from' ? from + 1 : 0
  return parts.map((part, i) => ((i === 0 || i === other) && part === old ? name : part)).join('.')
}

/** `roof.wall.N.k`, `roof.alone.wall.N.V.EX`, and of the storey without some walls `roof.without.N+S.loss.x`. */
function wallId(parts: readonly string[], old: string, name: string): string {
  const at = afterAlone(parts)
  const head = parts[at]
  if (head !== 'wall' && head !== 'without') return parts.join('.')
  const swapped = (part: string) =>
    (head === 'without' ? part.split('+') : [part]).map(wall => (wall === old ? name : wall)).join('+')
  return parts.map((part, i) => (i === at + 1 ? swapped(part) : part)).join('.')
}

/** Where an id goes on after its level. */
const afterAlone = (parts: readonly string[]): number => (parts[1] === 'alone' ? 2 : 1)

/** The first thing that is not the same in two builds but for some ids; undefined where nothing is. */
export function firstChange(before: Compiled, after: Compiled, idAfter: (id: string) => string): string | undefined {
  const [first] = after.diagnostics.filter(({ rule }, i) => rule !== before.diagnostics[i]?.rule)
  if (first) return `the document would say: ${first.message}`
  if (after.diagnostics.length !== before.diagnostics.length) return 'a message of the document would go away'
  const values = new Map(valuesOf(after).map(value => [value.id, value.si]))
  const known = valuesOf(before)
  const lost = known.find(({ id, si }) => !Object.is(values.get(idAfter(id)), si))
  if (lost) return `${lost.id} would no longer be what it is`
  return values.size === known.length ? undefined : 'other values would be printed'
}

const valuesOf = ({ context }: Compiled) => everyValue([...context.besides.values(), ...context.roots.values()])
