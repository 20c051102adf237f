/** How the settings of wind are read: those that must be there, those that may be left out, and words. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { type Sym, sym } from '../base/formula.ts'
import { unitOfKind } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { inWords, suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import { settingOf } from './columns.ts'
import type { Scope } from './scope.ts'

export const letters = {
  V: sym('V', 'V', 'speed'),
  K_d: sym('K_d', 'K_d', 'number'),
  K_zt: sym('K_zt', 'K_{zt}', 'number'),
  K_e: sym('K_e', 'K_e', 'number'),
  G: sym('G', 'G', 'number'),
  h: sym('h', 'h', 'length'),
  ground: sym('z_e', 'z_e', 'length'),
  slope: sym('theta', '\\theta', 'angle'),
  parapet: sym('h_p', 'h_p', 'length'),
} satisfies Record<string, Sym>

export function needed(block: Block, name: keyof typeof letters, of: Sym, help: string, scope: Scope): Result<Value> {
  const found = optional(block, name, of, scope)
  if (!found.ok) return found
  return found.value ? good(found.value) : bad([missing(block, name, help)])
}

export const missing = (block: Block, name: string, help: string): Diagnostic =>
  diagnose('error', 'setting-missing', block.info, `wind has no ${name}`, help)

export function optional(block: Block, name: string, of: Sym, scope: Scope): Result<Value | undefined> {
  const cell = settingOf(block, name)
  if (!cell) return good(undefined)
  const value = quantity(cell, { id: `wind.${name}`, what: name, sym: of }, scope)
  return aboveZero(value, cell.span, name)
}

/** A pure factor, and what it is where it is not stated. */
export interface Factor {
  readonly name: string
  readonly of: Sym
  readonly si: number
  /** The assumption, and what it is taken from. */
  readonly text: string
  readonly because: string
}

export function factor(block: Block, usual: Factor, scope: Scope): Result<Value> {
  const { name, of, si, text, because } = usual
  const stated = optional(block, name, of, scope)
  if (!stated.ok) return stated
  if (stated.value) return good(stated.value)
  scope.assume({ text, because: `${name} is not stated; ${because}` })
  return good({
    id: `wind.${name}`,
    tex: of.tex,
    si,
    unit: unitOfKind(of.kind, scope.display),
    rounding: 0,
    origin: { kind: 'default', assumption: text },
  })
}

export function choice<T extends string>(block: Block, name: string, words: readonly T[]): Result<T> {
  const cell = settingOf(block, name)
  if (!cell) return bad([missing(block, name, `Write ${name}: ${inWords(words, 'or')}.`)])
  const found = words.find(word => word === cell.text)
  return found !== undefined ? good(found) : bad([unknown(name, cell, words)])
}

export const unknown = (name: string, { text, span }: Text, words: readonly string[]): Diagnostic =>
  diagnose('error', 'wind-choice', span, `${name} cannot be ${text}`, suggestion(text, words, name))
