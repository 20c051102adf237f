/** How the sheet is shared out between the plan, its edges and its margins. */
import { type AxisLayout, besidePlan, layoutAxis } from './axis.ts'
import { besideSheet, type Extents, extentsOf, type Frame, frameOf, type Margins } from './frame.ts'
import type { Stop } from './stems.ts'
import { northReach } from './symbols.ts'
import type { PlanView } from './view.ts'
import { type WallChains, wallChains } from './wallchain.ts'

const narrowestMargin = 44

export interface Layout {
  readonly frame: Frame
  readonly top: AxisLayout
  readonly left: AxisLayout
  /** Chains of the ends of walls, on every edge that needs one. */
  readonly chains: WallChains
}

/** What the edges carry depends on the scale, and the scale on the room they leave: three rounds settle it. */
export function layOut(view: PlanView): Layout {
  const extents = extentsOf(view)
  let layout = layOutAt(view, extents, { left: 90, right: 70 })
  for (let round = 0; round < 2; round++) layout = layOutAt(view, extents, marginsOf(view, layout))
  return layout
}

/** Room for the left edge, for bubbles that reach past the corners, and for the north point. */
function marginsOf(view: PlanView, { frame, top, left, chains }: Layout): Margins {
  const half = top.bubble.along / 2
  const before = Math.max(0, ...top.stems.map(({ place }) => frame.plan.x0 - place + half))
  const chain = chains.right ? besidePlan + chains.right.depth : 0
  const past = Math.max(chain, ...top.stems.map(({ place }) => place + half - frame.plan.x1))
  return {
    left: Math.max(narrowestMargin, left.out.end + besideSheet, before + besideSheet),
    right:
      view.north === undefined ? Math.max(narrowestMargin, past + besideSheet) : past + 2 * northReach + besideSheet,
  }
}

function layOutAt(view: PlanView, { drawn, building }: Extents, margins: Margins): Layout {
  const frame = frameOf(drawn, margins)
  const { plan, toSheet } = frame
  const chains = wallChains(view, building, toSheet)
  const acrossAt = (at: number): number => toSheet({ x: at, y: 0 }).x
  const downAt = (at: number): number => toSheet({ x: 0, y: at }).y
  const top = layoutAxis({
    edge: 'top',
    lines: view.gridX.map(({ name, at }) => ({ name, metres: at, at: acrossAt(at) })),
    ends: [stop(building.x0, acrossAt(building.x0)), stop(building.x1, acrossAt(building.x1))],
    dimension: view.dimension,
    low: plan.x0 - 24,
    high: plan.x1 + 24,
    inner: chains.top?.depth ?? 0,
  })
  const left = layoutAxis({
    edge: 'left',
    lines: view.gridY.map(({ name, at }) => ({ name, metres: at, at: downAt(at) })),
    ends: [stop(building.y1, downAt(building.y1)), stop(building.y0, downAt(building.y0))],
    dimension: view.dimension,
    low: plan.y0 - 12,
    high: plan.y1 + 24,
    inner: chains.left?.depth ?? 0,
  })
  return { frame, top, left, chains }
}

const stop = (metres: number, at: number): Stop => ({ metres, at, name: '' })
