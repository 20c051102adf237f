/** Names of openings and piers on the face of a wall: where each would like to be. */
import type { Bounds, Point } from './geometry.ts'
import { type Lettering, lettering } from './label.ts'
import { labelSpot, type Placing, type Spot } from './placement.ts'

const quarterTurn = Math.PI / 2
const widestName = 130

const middleOf = ({ x0, y0, x1, y1 }: Bounds): Point => ({ x: (x0 + x1) / 2, y: (y0 + y1) / 2 })

/** Name over size, level or turned, in the opening if either fits, else beside it or at the end of a leader. */
export function openingPlacing(name: string, size: string, bounds: Bounds): Placing {
  const both = lettering('area', widestName, name, size)
  const room = Math.max(18, Math.min(widestName, Math.max(bounds.x1 - bounds.x0, bounds.y1 - bounds.y0) - 8))
  const narrow = lettering('area', room, name, size)
  const inside = [
    ...spotsIn(both, bounds, 0, 0),
    ...spotsIn(both, bounds, -quarterTurn, 1),
    ...(whole(narrow, size) ? [...spotsIn(narrow, bounds, 0, 2), ...spotsIn(narrow, bounds, -quarterTurn, 3)] : []),
  ]
  const at = middleOf(bounds)
  const beside = [
    { x: at.x, y: bounds.y0 - both.height / 2 - 1 },
    { x: at.x, y: bounds.y1 + both.height / 2 + 1 },
  ].map((spot, idx) => labelSpot(both, spot, 0, 6 + idx))
  return { near: [...inside, ...beside], anchors: [at], free: spot => labelSpot(both, spot, 0, 0) }
}

/** The size of an opening is never cut short; its name may be. */
const whole = ({ lines }: Lettering, size: string): boolean => lines.at(-1)?.text === size

/** The name of a pier, about its middle; turned where it is too narrow. */
export function pierPlacing(name: string, bounds: Bounds): Placing {
  const letters = lettering('wall', widestName, name)
  const near = [...spotsIn(letters, bounds, 0, 0), ...spotsIn(letters, bounds, -quarterTurn, 2)]
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
