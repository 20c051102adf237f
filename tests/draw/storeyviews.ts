/** Storeys of invented buildings, each hard to draw in its own way. */
import type { Axis } from '../../src/compute/cases.ts'
import type { StoreyLevel, StoreyView } from '../../src/draw/storeyview.ts'

/** A level with forces in kN; the shears are their sums from the top. */
interface Loaded {
  readonly name: string
  readonly metres?: number
  readonly x?: number
  readonly y?: number
}

const kilonewtons = (value: number) => ({
  value: value * 1000,
  printed: `${value.toFixed(1).replace('-', '−')} kN`,
})

export function storeysOf(axes: readonly Axis[], levels: readonly Loaded[], title = 'Storey forces'): StoreyView {
  const sums = { x: 0, y: 0 }
  return {
    title,
    description: `${levels.length} levels`,
    language: 'en-GB',
    axes,
    forceUnit: { si: 1000, name: 'kN' },
    levels: levels.map(({ name, metres, ...force }): StoreyLevel => {
      const along = Object.fromEntries(
        axes.map(axis => {
          sums[axis] += force[axis] ?? 0
          return [axis, { force: kilonewtons(force[axis] ?? 0), shear: kilonewtons(sums[axis]) }]
        }),
      )
      return {
        name,
        ...(metres === undefined ? {} : { elevation: { metres, printed: `${metres.toFixed(2)} m` } }),
        along,
      }
    }),
  }
}

const manyLevels = (count: number, height: number): readonly Loaded[] =>
  Array.from({ length: count }, (_, idx) => {
    const at = count - idx
    return { name: `Level ${at}`, metres: at * height, x: at * 3.1, y: at * 2.2 }
  })

export const storeyBuildings: Readonly<Record<string, StoreyView>> = {
  threeLevels: storeysOf(
    ['x', 'y'],
    [
      { name: 'Roof', metres: 10.4, x: 120, y: 96 },
      { name: 'Second floor', metres: 7.1, x: 180.5, y: 150 },
      { name: 'First floor', metres: 3.8, x: 95, y: 88 },
    ],
  ),
  oneLevel: storeysOf(['x', 'y'], [{ name: 'deck', x: 42, y: 42 }], 'One level without elevation'),
  oneAxis: storeysOf(['y'], [{ name: 'roof', metres: 4, y: -42 }], 'One axis'),
  thirtyLevels: storeysOf(['x', 'y'], manyLevels(30, 3.2), 'Thirty levels'),
  ninetyLevels: storeysOf(['x', 'y'], manyLevels(90, 3.5), 'Ninety levels'),
  mezzanines: storeysOf(
    ['x', 'y'],
    [
      { name: 'Roof of the lantern, with the long gallery', metres: 31, x: 14, y: 12 },
      { name: 'Roof', metres: 30.2, x: 220, y: 200 },
      { name: 'Plant deck', metres: 29.9, x: 4, y: 300 },
      { name: 'קומה ראשונה', metres: 4.1, x: 180, y: 170 },
      { name: 'a'.repeat(400), metres: 3.9, x: 90, y: 70 },
      { name: 'Pit', metres: 0.05, x: 9, y: 7 },
    ],
    'Levels that crowd',
  ),
  mixedSigns: storeysOf(
    ['x', 'y'],
    [
      { name: 'D', metres: 12, x: 100, y: -100 },
      { name: 'C', metres: 9, x: -240, y: 0 },
      { name: 'B', metres: 6, x: 0.02, y: 99.9 },
      { name: 'A', metres: 3, x: 180, y: 2000 },
    ],
    'Forces of either sign',
  ),
  nothing: storeysOf(['x'], [{ name: 'roof', metres: 3, x: 0 }], 'No force'),
}
