/** How a document stands, in words; the same in the terminal, the list and the page. */
import type { Move, Moves, Report } from './message.ts'

export function inWords({ state, errors }: Pick<Report, 'state' | 'errors'>): string {
  switch (state) {
    case 'sound':
      return 'sound'
    case 'faulty':
      return counted(errors, 'error')
    case 'waiting':
      return 'waiting for the file'
    case 'broken':
      return 'not worked'
  }
}

export const counted = (n: number, noun: string): string => `${n} ${noun}${n === 1 ? '' : 's'}`

/** Such as `+4.2 %`, with digits enough to tell a change from none. */
export function changeInWords(change: number): string {
  const share = 100 * Math.abs(change)
  const sign = change < 0 ? '−' : '+'
  if (share >= 1000) return `${sign}${Math.round(share)}\u00a0%`
  const digits = share >= 100 ? 0 : share >= 0.095 ? 1 : 3
  const text = share.toFixed(digits)
  return Number(text) === 0 ? `${sign}<0.001\u00a0%` : `${sign}${text}\u00a0%`
}

/** What a save did, on one line: `14 numbers moved, most roof.CR.x +4.2 %`. */
export function movesInWords({ numbers, checks }: Moves): string {
  const moved = numbers.filter(({ was, now }) => was !== undefined && now !== undefined)
  const came = numbers.filter(({ was }) => was === undefined).length
  const gone = numbers.filter(({ now }) => now === undefined).length
  const most = moved.find(({ given }) => !given)
  const turned = checks.filter(({ was, now }) => was && now)
  const parts = [
    moved.length === 0 ? '' : `${counted(moved.length, 'number')} moved${most ? `, most ${mostOf(most)}` : ''}`,
    came === 0 ? '' : `${came} new`,
    gone === 0 ? '' : `${gone} gone`,
    ...turned.map(({ what, now }) => `${what} is now ${now?.ok ? 'OK' : 'NG'}`),
  ].filter(part => part !== '')
  return parts.length === 0 ? 'no number moved' : parts.join('; ')
}

const mostOf = ({ id, change, was, now }: Move): string =>
  change === undefined ? `${id} ${was} → ${now}` : `${id} ${changeInWords(change)}`
