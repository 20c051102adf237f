/** From the page to the source: a place of the page, and the editor or the words that lead to its line. */
import type { Opened, Place } from '../serve/message.ts'
import { idOf, MARK } from './places.ts'

/** What the source is asked for at an element; undefined where nothing there has a line. */
export function placeAt(target: Element, blocks: readonly Element[]): Place | undefined {
  const mark = target.closest(MARK)
  if (mark) return { id: idOf(mark) }
  const source = target.closest('.src, .place, .trace-source')?.textContent
  const line = source ? Number(/\d+/.exec(source)?.[0]) : Number.NaN
  if (line >= 1) return { line }
  const result = target.closest('.eq')?.querySelector(`.result ${MARK}`)
  if (result) return { id: idOf(result) }
  const block = blocks.findIndex(each => each.contains(target))
  const around = blocks[block]
  if (!around) return undefined
  const part = [...around.children].findIndex(each => each.contains(target))
  return { block, part: Math.max(0, part) }
}

/** Asks the server to open a place. @returns what came of it, in words */
export async function openPlace(of: string, place: Place, token: string): Promise<Told> {
  try {
    const answer = await fetch(`${of}open`, {
      method: 'POST',
      headers: { 'x-platemark': token },
      body: JSON.stringify(place),
    })
    if (!answer.ok) return { words: 'The source line of this place is not known.' }
    // The answer is the server's own.
    const { path, line, address, started, because } = (await answer.json()) as Opened
    const where = `${path}:${line}`
    if (address !== undefined) {
      location.href = address
      return { words: `Opened ${where}` }
    }
    if (started) return { words: `Opened ${where}` }
    return { words: because === undefined ? where : `${where} (${because})`, copy: where }
  } catch {
    return { words: 'Not connected.' }
  }
}

export interface Told {
  readonly words: string
  /** Where no editor is known, what can be copied. */
  readonly copy?: string
}
