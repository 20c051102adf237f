/** The settings of a block `seismic`: those of every standard that is known here, each told of once. */

import type { SettingRule } from '../model/seismic.ts'
import { directions } from '../model/seismic.ts'
import { profiles } from '../standards/catalogue.ts'
import { commonSettings } from '../standards/profile.ts'
import type { Field, Holds } from './grammar.ts'

const rules: readonly SettingRule[] = [...profiles.flatMap(({ settings }) => settings), ...commonSettings]

export const seismicNames: readonly string[] = [
  ...new Set(rules.flatMap(({ name, each }) => (each ? [name, ...directions.map(way => `${name} ${way}`)] : [name]))),
]

/** Where standards mean different things by a name, all of them are said. */
export const seismicFields = (): Readonly<Record<string, Field>> =>
  Object.fromEntries(seismicNames.map(name => [name, fieldOf(name)]))

function fieldOf(written: string): Field {
  const way = directions.find(direction => written.endsWith(` ${direction}`))
  const mine = rules.filter(({ name, each }) => written === name || (each && way && written === `${name} ${way}`))
  const meanings = [...new Set(mine.map(({ what }) => what))].join('; or ')
  const along = way ? `, along ${way}` : ''
  return { says: `${meanings.charAt(0).toUpperCase()}${meanings.slice(1)}${along}.`, holds: holdsOf(mine[0], way) }
}

function holdsOf(rule: SettingRule | undefined, way: string | undefined): Holds {
  if (!rule?.sym) return { kind: 'text' }
  const about = rule.each ? [way ?? 'x'] : []
  return { kind: 'value', of: rule.sym.kind, id: ['seismic', ...about, rule.key].join('.') }
}
