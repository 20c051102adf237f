/** What the signs in the names of cases tell, in words. */
import type { Case } from '../compute/cases.ts'

/** A sentence for each kind of case that has its force moved aside. */
export function casesInWords(cases: readonly Case[]): string {
  const has = (test: (each: Case) => boolean) => cases.some(test)
  const movedAside = ({ parts }: Case) => parts.some(({ moved }) => moved !== 0)
  const wind = cases.filter(({ loading }) => loading === 'wind')
  const [one] = wind.filter(each => each.parts.length === 1 && movedAside(each))
  return [
    ...(has(({ loading }) => loading === 'seismic')
      ? ['In EX+ the mass is moved toward positive y, in EY+ toward positive x.']
      : []),
    ...(one ? [`The force of wind is moved in the same way: in ${one.name.replace('Y', 'X')} toward positive y.`] : []),
    ...(wind.some(({ parts }) => parts.length > 1)
      ? ['In WXY cases wind acts along both axes, and the first sign is the sense of its force along y.']
      : []),
    ...(wind.some(each => each.parts.length > 1 && movedAside(each))
      ? ['A second sign is the sense in which both forces, moved aside, turn the building: + is counter-clockwise.']
      : []),
    ...(has(({ loading }) => loading === 'least wind') ? ['WXm and WYm have the least forces of wind.'] : []),
  ].join(' ')
}
