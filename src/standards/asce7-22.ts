/** ASCE/SEI 7-22. Its ground motion comes for the site class from a database; it has no site coefficients. */
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import { chosenWord, settingMissing } from '../model/seismic.ts'
import { asceProfile } from './asce.ts'
import { type Mapped, statedMapped } from './asce-ground.ts'
import { asceSettings } from './asce-letters.ts'
import { asceRules } from './asce-rules.ts'
import type { Desk } from './profile.ts'

const NAME = 'ASCE 7-22'

function mapped(desk: Desk): Result<Mapped> {
  const site = chosenWord(desk.given, 'site class', ['A', 'B', 'BC', 'C', 'CD', 'D', 'DE', 'E', 'F', 'default'])
  if (!site.ok) return site
  const stated = statedMapped(desk)
  if (!stated.ok) return stated
  if (stated.value) return good(stated.value)
  return bad([
    settingMissing(
      desk.given,
      'S_DS',
      `${NAME} has no site coefficients. State S_MS and S_M1, or S_DS and S_D1, from its database for the site class.`,
    ),
  ])
}

export const asce722 = asceProfile({
  name: NAME,
  aliases: ['ASCE/SEI 7-22'],
  numbering: { plateau: '12.8-3', cap: '12.8-4', longCap: '12.8-5', least: '12.8-6', leastNear: '12.8-7' },
  motion: { mapped },
  settings: asceSettings.filter(({ name }) => name !== 'S_S'),
  rules: asceRules(NAME),
})
