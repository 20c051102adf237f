/** Finds the values of the seismic design that a dotted name asks for. Chapter 5 of the manual lists them. */
import type { Result } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { Value, Word } from '../base/value.ts'
import type { Direction } from '../model/seismic.ts'
import type { Seismic } from './seismic.ts'

type Found = Result<Value | Word> | undefined

/** `seismic.SDS`, `seismic.x.Cs` */
export function seismicValue(seismic: () => Result<Seismic>, id: string): Found {
  const made = seismic()
  if (!made.ok) return made
  const found = made.value.values.get(id)
  return found && good(found)
}

const isDirection = (word: string | undefined): word is Direction => word === 'x' || word === 'y'

/** `roof.Cv.x`, `roof.diaphragm.y` */
export function seismicLevelValue(
  seismic: () => Result<Seismic>,
  level: string,
  [head, direction, ...more]: readonly string[],
): Found {
  if ((head !== 'Cv' && head !== 'diaphragm') || !isDirection(direction) || more.length > 0) return undefined
  const made = seismic()
  if (!made.ok) return made
  const found = head === 'Cv' ? made.value.share(level, direction) : made.value.diaphragm(level, direction)
  return found && good(found)
}

/** Those to offer where a name is nearly one of them. */
export const seismicIds: readonly string[] = [
  'seismic.W',
  'seismic.hn',
  'seismic.SDS',
  'seismic.SD1',
  'seismic.category',
  ...['x', 'y'].flatMap(direction => ['V', 'Cs', 'T', 'R', 'k'].map(key => `seismic.${direction}.${key}`)),
]
