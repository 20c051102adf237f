/** The first words of the fences that are ours. */
export const topics = [
  'grid',
  'levels',
  'areas',
  'line-loads',
  'point-loads',
  'construction',
  'walls',
  'openings',
  'forces',
  'seismic',
  'wind',
  'spectrum',
  'equations',
  'working',
] as const

export type Topic = (typeof topics)[number]

/** Words of the language that this version does not work: said, never passed over. */
export const laterTopics: readonly string[] = ['diaphragm']

export const isTopic = (word: string): word is Topic => topics.some(topic => topic === word)
