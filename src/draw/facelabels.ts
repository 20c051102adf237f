/** Names of openings and piers on the face of a wall: where each would like to be. */
import type { Bounds, Point } from './geometry.ts'
import { type Lettering, lettering } from './label.ts'
import { labelSpot, type Placing, type Spot } from './placement.ts'

const quarterTurn = Math.PI / 2
const widestName = 130

const middleOf = ({ x0, y0, x1, y1 }: Bounds): Point => ({ x: (x0 + x1) / 2, y: (y0 + y1) / 2 })

/** Name over size, level or turned, in the opening if either fits, else above or below it, else the name alone. */
export function openingPlacing(name: string, size: string, bounds: Bounds): Placing {
  const both = lettering('area', widestName, name, size)
  const room = Math.max(18, Math.min(widestName, Math.max(bounds.x1 - bounds.x0, bounds.y1 - bounds.y0) - 8))
  const narrow = lettering('area', room, name, size)
  const inside = [
    ...spotsIn(both, bounds, 0, 0),
    ...spotsIn(both, bounds, -quarterTurn, 1),
    ...(whole(narrow, size) ? [...spotsIn(narrow, bounds, 0, 2), ...spotsIn(narrow, bounds, -quarterTurn, 3)] : []),
  ]
  // The chains tell the size again, so a name alone will do where both find no room.
  const alone = lettering('area', room, name)
  const short = [...spotsIn(alone, bounds, 0, 8), ...spotsIn(alone, bounds, -quarterTurn, 9)]
  const free = (at: Point): Spot => labelSpot(lettering('area', widestName, name, size), at, 0, 0)
  return { near: [...inside, ...beside(both, bounds, 6), ...short], anchors: [middleOf(bounds)], free }
}

/** Above the rectangle and below it. */
function beside(letters: Lettering, bounds: Bounds, price: number): readonly Spot[] {
  const { x } = middleOf(bounds)
  const away = letters.height / 2 + 1
  return [bounds.y0 - away, bounds.y1 + away].map((y, idx) => labelSpot(letters, { x, y }, 0, price + idx))
}

/** The size of an opening is never cut short; its name may be. */
const whole = ({ lines }: Lettering, size: string): boolean => lines.at(-1)?.text === size

/** The name of a pier, about its middle; turned where it is too narrow. */
export function pierPlacing(name: string, bounds: Bounds): Placing {
  const letters = lettering('wall', widestName, name)
  const near = [
    ...spotsIn(letters, bounds, 0, 0),
    ...spotsIn(letters, bounds, -quarterTurn, 2),
    ...beside(letters, bounds, 4),
  ]
  return { near, anchors: [middleOf(bounds)], free: at => labelSpot(letters, at, 0, 0) }
}

const stations = [0.5, 0.35, 0.65, 0.2, 0.8] as const

/** At stations up the middle of the rectangle, nearest its middle first; none where it does not fit. */
function spotsIn(letters: Lettering, { x0, y0, x1, y1 }: Bounds, angle: number, price: number): readonly Spot[] {
  const [wide, high] = angle === 0 ? [letters.width, letters.height] : [letters.height, letters.width]
  if (wide > x1 - x0 - 2 || high > y1 - y0 - 2) return []
  return stations.map((station, idx) => {
    const y = Math.max(y0 + high / 2 + 1, Math.min(y1 - high / 2 - 1, y0 + station * (y1 - y0)))
    return labelSpot(letters, { x: (x0 + x1) / 2, y }, angle, price + idx)
  })
}
