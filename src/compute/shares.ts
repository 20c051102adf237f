/** Shares of variable loads that count as seismic weight, by the words of a table of areas. */
import type { Display } from '../base/kind.ts'
import { bad, good } from '../base/outcome.ts'
import { work } from '../base/work.ts'
import { type ShareByWord, shareOfLoad } from '../model/areas.ts'
import type { Text } from '../read/text.ts'
import { profileFor } from '../standards/catalogue.ts'
import { notCovered, type VariableLoad } from '../standards/profile.ts'
import { tabled } from '../standards/tabled.ts'

const words: Readonly<Record<VariableLoad, string>> = {
  snow: 'the share of snow in the seismic weight',
  storage: 'the share of storage load in the seismic weight',
  live: 'the share of live load in the seismic weight',
}

const isWord = (text: string): text is VariableLoad => Object.hasOwn(words, text)

/** @param standard as the front matter states it; without one a word is not understood */
export const shareByWord =
  (standard: Text | undefined, display: Display): ShareByWord =>
  ({ text, span }, { id, area, value }) => {
    const word = text.toLowerCase()
    if (!isWord(word)) return undefined
    const profile = profileFor(standard, span)
    if (!profile.ok) return profile
    const rule = profile.value.rules.share?.[word]
    if (!rule) return bad([notCovered(profile.value, words[word], span)])
    return good(work(id, tabled(shareOfLoad, rule.value(value.si), rule.clause), {}, display, [area]))
  }
