/** The standards whose rules are known here, found by the name that the front matter states. */
import type { Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { diagnose, type Text } from '../read/text.ts'
import { as1170 } from './as1170.ts'
import { asce716 } from './asce7-16.ts'
import { asce722 } from './asce7-22.ts'
import { en1998 } from './en1998.ts'
import { is1893 } from './is1893.ts'
import { nbcc2020 } from './nbcc2020.ts'
import { nzs1170 } from './nzs1170.ts'
import type { Profile } from './profile.ts'

export const profiles: readonly Profile[] = [asce722, asce716, en1998, nzs1170, nbcc2020, is1893, as1170]

/** Capitals, spaces and the length of dashes tell no standards apart. */
const plain = (name: string): string =>
  name
    .toLowerCase()
    .replace(/[‐-―−]/g, '-')
    .replace(/\s+/g, '')

/** What may stand after the name of a standard, such as `, IBC 2024`. */
const MORE = /^(?:[,;+&(]|with|and)/

/** The profile of a standard, or undefined where its rules are not known here. */
export function profileOf(standard: string): Profile | undefined {
  const written = plain(standard)
  return profiles.find(({ name, aliases }) =>
    [name, ...aliases].some(known => {
      const rest = written.startsWith(plain(known)) ? written.slice(plain(known).length) : undefined
      return rest === '' || (rest !== undefined && MORE.test(rest))
    }),
  )
}

/**
 * The profile that a block asks for.
 * @param standard as the front matter states it
 * @param at where a document that states none is told so
 */
export function profileFor(standard: Text | undefined, at: Span): Result<Profile> {
  const names = profiles.map(({ name }) => name)
  if (!standard)
    return bad([
      diagnose(
        'error',
        'standard-missing',
        at,
        'the document does not state its standard',
        `Write standard: ${names[0] ?? ''} in the front matter. ${suggestion('', names, 'standard')}`,
      ),
    ])
  const found = profileOf(standard.text)
  if (found) return good(found)
  return bad([
    diagnose(
      'error',
      'standard-unknown',
      standard.span,
      `the rules of ${standard.text} are not known here`,
      `${suggestion(standard.text, names, 'standard')}\nOr state forces in a block forces.`,
    ),
  ])
}
