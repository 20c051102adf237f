/** The block `seismic`: settings under the standard's own symbols, each for both directions or for one. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block, Setting } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { quantity } from './cell.ts'
import { settingOf, strangeLines, strangeSettings } from './columns.ts'
import { sharePlausible } from './forces.ts'
import type { Scope } from './scope.ts'

export type Direction = 'x' | 'y'
export const directions: readonly Direction[] = ['x', 'y']

/** A setting that a standard reads. */
export interface SettingRule {
  /** As it is written: `S_DS`, `site class`. */
  readonly name: string
  /** Its part of a value id. */
  readonly key: string
  /** What it is, for messages. */
  readonly what: string
  /** Its letter where it is a number; left out where it is a word. */
  readonly sym?: Sym
  /** True where it may be given for one direction, as `R y`. */
  readonly each?: boolean
  /** True for a share of the plan, which lies between none and half. */
  readonly share?: boolean
}

export interface SeismicGiven {
  /** The first line of the block. */
  readonly at: Span
  /** All settings as they stand. */
  readonly settings: readonly Setting[]
  /** What is written behind a setting. */
  readonly text: (name: string, direction?: Direction) => Text | undefined
  /** The value of a setting that is a number; undefined where it is left out. */
  readonly number: (name: string, direction?: Direction) => Value | undefined
}

export function readSeismic(
  blocks: readonly Block[],
  rules: readonly SettingRule[],
  scope: Scope,
): Result<SeismicGiven> {
  const [block, second] = blocks
  if (!block) throw new Error('seismic is read where there is a block of it')
  if (second) return bad([repeated(block, second)])
  const known = rules.flatMap(({ name, each }) => (each ? [name, `${name} x`, `${name} y`] : [name]))
  const faults = [
    ...block.faults,
    ...(block.about ? [aboutLevel(block.about)] : []),
    ...(block.table ? [holdsTable(block.table.headerLine)] : []),
    ...strangeSettings(block, known),
    ...strangeLines(block),
    ...rules.flatMap(rule => [...givenBothWays(block, rule), ...withoutWord(block, rule)]),
  ]
  if (faults.length > 0) return bad(faults)
  const text = (name: string, direction?: Direction) =>
    (direction && settingOf(block, `${name} ${direction}`)) ?? settingOf(block, name)
  const numbers = new Map<string, Value>()
  const read = all(
    rules.flatMap(rule => {
      const sides = rule.each ? directions : [undefined]
      return sides.flatMap((direction): readonly Result<Value>[] => {
        const cell = text(rule.name, direction)
        if (!cell || !rule.sym) return []
        const value = readNumber(cell, rule, rule.sym, direction, scope)
        if (value.ok) numbers.set(keyOf(rule.name, direction), value.value)
        // A cell that holds for both directions is told once where it is at fault.
        const told = direction === 'y' && cell === text(rule.name, 'x')
        return value.ok || !told ? [value] : []
      })
    }),
  )
  if (!read.ok) return read
  return good({
    at: block.info,
    settings: [...block.settings, ...block.options],
    text,
    number: (name, direction) => numbers.get(keyOf(name, direction)),
  })
}

const keyOf = (name: string, direction: Direction | undefined): string => `${name} ${direction ?? ''}`

function readNumber(
  cell: Text,
  { name, key, what, share }: SettingRule,
  sym: Sym,
  direction: Direction | undefined,
  scope: Scope,
): Result<Value> {
  const about = direction ? [direction] : []
  const id = ['seismic', ...about, key].join('.')
  const value = quantity(cell, { id, what: name, sym, tex: texAbout(sym.tex, ...about) }, scope)
  if (share) return sharePlausible(value, cell)
  if (!value.ok || value.value.si > 0) return value
  const size = value.value.si === 0 ? 'zero' : 'below zero'
  return bad([
    diagnose('error', 'size-not-positive', cell.span, `${name}, ${what}, is ${size}`, 'Give a value above zero.'),
  ])
}

const repeated = (first: Block, { info }: Block): Diagnostic =>
  diagnose('error', 'seismic-repeated', info, 'seismic is given twice', 'Put its settings in one block.', {
    also: [{ span: first.info, text: 'first here' }],
  })

const aboutLevel = ({ text, span }: Text): Diagnostic =>
  diagnose(
    'error',
    'seismic-of-level',
    span,
    `seismic is of the whole building, and this names ${text}`,
    'Leave the name out.',
  )

const holdsTable = ({ span }: Text): Diagnostic =>
  diagnose('error', 'seismic-table', span, 'seismic holds no table', 'Write its settings as name: value.')

/** A word that is left empty says nothing; a number tells so itself. */
function withoutWord({ settings, options }: Block, { name, what, sym }: SettingRule): readonly Diagnostic[] {
  const mine = [name, `${name} x`, `${name} y`]
  return [...settings, ...options]
    .filter(setting => !sym && setting.value.text === '' && mine.includes(setting.name.text))
    .map(setting =>
      diagnose('error', 'setting-missing', setting.name.span, `${setting.name.text} has no value`, `It is ${what}.`),
    )
}

/** `R` beside both `R x` and `R y` would be passed over. */
function givenBothWays(block: Block, { name, each }: SettingRule): readonly Diagnostic[] {
  const [both, x, y] = [name, `${name} x`, `${name} y`].map(one => settingOf(block, one))
  if (!each || !both || !x || !y) return []
  return [
    diagnose(
      'error',
      'setting-repeated',
      both.span,
      `${name} is set for both directions, and for each`,
      `Keep ${name}, or ${name} x and ${name} y.`,
    ),
  ]
}

/** One of the words that a setting may be, however it is capitalised; undefined where it is left out. */
export function chosenWord(
  given: SeismicGiven,
  name: string,
  words: readonly string[],
  direction?: Direction,
): Result<string | undefined> {
  const text = given.text(name, direction)
  if (!text) return good(undefined)
  const found = words.find(word => word.toLowerCase() === text.text.toLowerCase())
  if (found !== undefined) return good(found)
  return bad([
    diagnose(
      'error',
      'setting-unknown-word',
      text.span,
      `${name} cannot be ${text.text}`,
      suggestion(text.text, words, name),
    ),
  ])
}

/** A setting that the standard cannot do without. */
export const settingMissing = ({ at }: SeismicGiven, name: string, why: string): Diagnostic =>
  diagnose('error', 'setting-missing', at, `seismic has no setting ${name}`, why)
