/** What walls are made of. */

import { type Sym, sym } from '../base/formula.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result } from '../base/ledger.ts'
import { inWords, suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import { checkedName, settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'

export type Ends = 'cantilever' | 'fixed'
export type Material = 'section' | 'concrete' | 'concrete masonry' | 'clay masonry'

export interface Construction {
  readonly name: string
  readonly material: Material
  readonly ends: Ends
  /** Thickness. */
  readonly t: Value
  /** Stated modulus of elasticity; worked from the strength when absent. */
  readonly E?: Value
  /** Stated shear modulus. */
  readonly G?: Value
  /** Poisson's ratio, from which G follows when it is not stated. */
  readonly nu?: Value
  /** f'c of concrete or f'm of masonry. */
  readonly strength?: Value
  readonly span: Span
}

const symbols: Readonly<Record<string, Sym>> = {
  t: sym('t', 't', 'thickness'),
  E: sym('E', 'E', 'modulus'),
  G: sym('G', 'G', 'modulus'),
  nu: sym('nu', '\\nu', 'number'),
  "f'c": sym('fc', "f'_{c}", 'strength'),
  "f'm": sym('fm', "f'_{m}", 'strength'),
}

/** What each material needs and may have, besides its name and `ends`. */
export const materials: Readonly<
  Record<Material, { readonly needed: readonly string[]; readonly optional: readonly string[] }>
> = {
  section: { needed: ['E', 't'], optional: ['G', 'nu'] },
  concrete: { needed: ["f'c", 't'], optional: ['E', 'G', 'nu'] },
  'concrete masonry': { needed: ["f'm", 't'], optional: ['E', 'G', 'nu'] },
  'clay masonry': { needed: ["f'm", 't'], optional: ['E', 'G', 'nu'] },
}

/** Settings of a construction of any material. */
export const commonSettings: readonly string[] = ['material', 'ends']
export const endsWords: readonly Ends[] = ['cantilever', 'fixed']

export const isMaterial = (text: string): text is Material => Object.hasOwn(materials, text)

export function readConstruction(block: Block, scope: Scope): Result<Construction> {
  if (block.faults.length > 0) return bad(block.faults)
  if (!block.about)
    return bad([
      diagnose('error', 'name-missing', block.info, 'a construction needs a name', 'Write construction CMU8.'),
    ])
  const name = checkedName(block.about, 'construction')
  if (!name.ok) return name
  const material = settingOf(block, 'material')
  if (!material)
    return bad([
      diagnose(
        'error',
        'setting-missing',
        block.info,
        `construction ${name.value.text} has no material`,
        `Add material: ${inWords(Object.keys(materials), 'or')}.`,
      ),
    ])
  if (!isMaterial(material.text))
    return bad([
      diagnose(
        'error',
        'unknown-material',
        material.span,
        `there is no material ${material.text}`,
        suggestion(material.text, Object.keys(materials), 'material'),
      ),
    ])
  return readSettings(block, name.value, material.text, scope)
}

function readSettings(block: Block, name: Text, material: Material, scope: Scope): Result<Construction> {
  const { needed, optional } = materials[material]
  const faults = [...strangeSettings(block, [...commonSettings, ...needed, ...optional]), ...strangeLines(block)]
  const missing = needed.filter(setting => !settingOf(block, setting))
  if (missing.length > 0 && faults.length === 0)
    faults.push(
      diagnose(
        'error',
        'setting-missing',
        block.info,
        `construction ${name.text} has no ${inWords(missing, 'and')}`,
        `A construction of ${material} has ${inWords(needed, 'and')}.`,
      ),
    )
  const ends = readEnds(block, name, scope)
  const values = new Map<string, Value>()
  const read = all(
    [...needed, ...optional].flatMap(setting => {
      const cell = settingOf(block, setting)
      return cell ? [readSetting(setting, cell, name.text, scope, values)] : []
    }),
  )
  if (faults.length > 0 || !ends.ok || !read.ok)
    return bad([...faults, ...(ends.ok ? [] : ends.because), ...(read.ok ? [] : read.because)])
  const t = values.get('t')
  if (!t) throw new Error('thickness is among the needed settings')
  const [E, G, nu, strength] = [
    values.get('E'),
    values.get('G'),
    values.get('nu'),
    values.get("f'c") ?? values.get("f'm"),
  ]
  return good({
    name: name.text,
    material,
    ends: ends.value,
    t,
    ...(E ? { E } : {}),
    ...(G ? { G } : {}),
    ...(nu ? { nu } : {}),
    ...(strength ? { strength } : {}),
    span: block.info,
  })
}

function readSetting(
  setting: string,
  cell: Text,
  name: string,
  scope: Scope,
  values: Map<string, Value>,
): Result<Value> {
  const symbol = symbols[setting]
  if (!symbol) throw new Error(`setting ${setting} has no symbol`)
  const value = quantity(
    cell,
    { id: `constructions.${name}.${setting}`, what: setting, sym: symbol, tex: texAbout(symbol.tex, name) },
    scope,
  )
  const checked = setting === 'nu' ? poisson(value, cell) : aboveZero(value, cell.span, setting)
  if (checked.ok) values.set(setting, checked.value)
  return checked
}

/** An isotropic solid has 0 ≤ ν < 0.5. */
function poisson(value: Result<Value>, cell: Text): Result<Value> {
  if (!value.ok || (value.value.si >= 0 && value.value.si < 0.5)) return value
  return bad([
    diagnose(
      'error',
      'poisson-out-of-range',
      cell.span,
      `nu is ${cell.text}; it lies from 0 to below 0.5`,
      'Check the value, or state G.',
    ),
  ])
}

function readEnds(block: Block, name: Text, scope: Scope): Result<Ends> {
  const ends = settingOf(block, 'ends')
  if (!ends) {
    scope.assume({
      text: `Walls of ${verbatim(name.text)} are cantilevers: fixed at the foot, free at the head.`,
      because: 'ends is not stated',
    })
    return good('cantilever')
  }
  const found = endsWords.find(word => word === ends.text)
  if (found) return good(found)
  return bad([
    diagnose(
      'error',
      'unknown-ends',
      ends.span,
      `ends cannot be ${ends.text}`,
      'Write ends: cantilever (fixed at the foot, free at the head) or ends: fixed (both ends held).',
    ),
  ])
}
