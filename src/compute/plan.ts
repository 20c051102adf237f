/**
 * The plan of a level: its parts with their areas and centroids, what the
 * openings take away, its outline, corners and size.
 */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { Display } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import { inWords } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Span } from '../base/span.ts'
import { Tabulation } from '../base/tabulation.ts'
import type { Value } from '../base/value.ts'
import { shownAs } from '../base/work.ts'
import type { Area } from '../model/areas.ts'
import type { Corner } from '../model/grid.ts'
import { diagnose } from '../read/text.ts'
import { areaOf, common, outlineOf, type Ring } from './clip.ts'
import { A, type Measured, measure } from './measure.ts'
import { type Outline, workOutline } from './outline.ts'
import { x, y } from './symbols.ts'

/** An area, or what an opening takes from one: its area is then negative. */
export interface Part extends Measured {
  readonly name: string
  /** The area that it is part of, or is cut from. */
  readonly area: Area
  readonly outline: readonly Corner[]
  readonly span: Span
}

export interface Plan extends Outline {
  readonly level: string
  readonly areas: readonly Area[]
  readonly openings: readonly Area[]
  readonly parts: readonly Part[]
  /** Net plan area. */
  readonly area: Value
  readonly outline: readonly Ring[]
  readonly warnings: readonly Diagnostic[]
}

const pointsOf = (outline: readonly Corner[]): Ring => outline.map(({ x, y }) => ({ x: x.si, y: y.si }))

export function workPlan(level: string, given: readonly Area[], display: Display): Result<Plan> {
  const areas = given.filter(({ load }) => load)
  const openings = given.filter(({ load }) => !load)
  const cuts = cutOpenings(areas, openings)
  if (!cuts.ok) return cuts
  const parts = [
    ...areas.map(area => ({
      name: area.name,
      area,
      outline: area.outline,
      rectangle: area.rectangle,
      span: area.span,
    })),
    ...cuts.value.parts.map(cut => ({
      ...cut,
      outline: cut.own ?? corners(level, cut),
      rectangle: cut.own !== undefined && cut.rectangle,
    })),
  ].map(part => ({
    ...part,
    ...measure(level, part.name, part.outline, part.rectangle, part.area.name !== part.name, display),
  }))
  const spans = given.map(({ span }) => span)
  const outline = outlineOf(areas.map(({ outline }) => pointsOf(outline)))
  const outer = outline.filter(ring => areaOf([ring]) > 0)
  const table = new Tabulation(
    parts.map(({ name }) => name),
    (row, key) => `${level}.areas.${row}.${key}`,
    display,
  ).take(
    A,
    parts.map(part => part.A),
  )
  return good({
    level,
    areas,
    openings,
    parts,
    area: table.sum('A', A, `${level}.area`),
    outline,
    ...workOutline(level, outer, spans, display),
    warnings: [...cuts.value.warnings, ...overlaps(areas)],
  })

  function corners(level: string, cut: Cut): readonly Corner[] {
    return cut.ring.map((point, i) => {
      const at = (axis: 'x' | 'y', of: typeof x): Value => ({
        id: `${level}.areas.${cut.name}.${axis}${i + 1}`,
        tex: `${axis}_{${i + 1}}`,
        si: point[axis],
        ...shownAs(of, display),
        origin: { kind: 'measured', what: `corner of ${cut.name}`, spans: [cut.span] },
      })
      return { x: at('x', x), y: at('y', y) }
    })
  }
}

interface Cut {
  readonly name: string
  readonly area: Area
  /** Corners of the opening itself, when it lies wholly in one area. */
  readonly own?: readonly Corner[]
  readonly rectangle: boolean
  /** Clockwise where it takes away. */
  readonly ring: Ring
  readonly span: Span
}

/** A cut smaller than this share of its opening is the rounding of shared edges. */
const SLIVER = 1e-6

function cutOpenings(
  areas: readonly Area[],
  openings: readonly Area[],
): Result<{ readonly parts: readonly Cut[]; readonly warnings: readonly Diagnostic[] }> {
  const faults: Diagnostic[] = []
  const warnings: Diagnostic[] = []
  const parts: Cut[] = []
  openings.forEach((opening, i) => {
    const ring = pointsOf(opening.outline)
    const whole = areaOf([ring])
    const before = openings.slice(0, i).map(({ outline }) => pointsOf(outline))
    const found = areas
      .map(area => ({ area, rings: common(pointsOf(area.outline), ring, before) }))
      .filter(({ rings }) => areaOf(rings) > SLIVER * whole)
    const cut = found.reduce((total, { rings }) => total + areaOf(rings), 0)
    const [first] = found
    if (!first) faults.push(outside(opening, areas))
    else if (cut < (1 - SLIVER) * whole) warnings.push(partlyOutside(opening, cut / whole))
    const wholly = found.length === 1 && Math.abs(cut - whole) <= SLIVER * whole
    for (const { area, rings } of found)
      rings.forEach((piece, n) => {
        const name =
          found.length === 1 && rings.length === 1
            ? opening.name
            : `${opening.name} in ${area.name}${rings.length === 1 ? '' : ` (${n + 1})`}`
        parts.push({
          name,
          area,
          ring: [...piece].reverse(),
          rectangle: opening.rectangle,
          span: opening.span,
          ...(wholly ? { own: opening.outline } : {}),
        })
      })
  })
  return faults.length > 0 ? bad(faults) : good({ parts, warnings })
}

const outside = ({ name, span }: Area, areas: readonly Area[]): Diagnostic =>
  diagnose(
    'error',
    'opening-outside-plan',
    span,
    `opening ${name} lies outside every area, or within other openings`,
    `An opening takes away plan that is there: ${inWords(
      areas.map(({ name }) => name),
      'and',
    )}.`,
  )

const partlyOutside = ({ name, span }: Area, share: number): Diagnostic =>
  diagnose(
    'warning',
    'opening-partly-outside',
    span,
    `only ${(share * 100).toFixed(1)}% of opening ${name} lies on the plan and outside other openings`,
    'Only that part is taken away.',
  )

/** Areas that cover the same plan: both loads count there. */
function overlaps(areas: readonly Area[]): readonly Diagnostic[] {
  return areas.flatMap((area, i) =>
    areas.slice(0, i).flatMap(other => {
      const [a, b] = [pointsOf(area.outline), pointsOf(other.outline)]
      if (!boxesMeet(a, b)) return []
      const both = areaOf(common(a, b, []))
      const least = Math.min(areaOf([a]), areaOf([b]))
      if (both <= SLIVER * least) return []
      const share = ((100 * both) / least).toFixed(1)
      return [
        diagnose(
          'warning',
          'areas-overlap',
          area.span,
          `areas ${other.name} and ${area.name} overlap over ${share}% of the smaller`,
          'Both loads count there, and the plan area counts twice.',
          { also: [{ span: other.span, text: `${other.name} is here` }] },
        ),
      ]
    }),
  )
}

function boxesMeet(a: Ring, b: Ring): boolean {
  const apart = (axis: 'x' | 'y') =>
    Math.max(...a.map(p => p[axis])) <= Math.min(...b.map(p => p[axis])) ||
    Math.max(...b.map(p => p[axis])) <= Math.min(...a.map(p => p[axis]))
  return !apart('x') && !apart('y')
}
