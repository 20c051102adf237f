import { expect } from 'vitest'

/** Half a unit in the last digit of a figure as its source prints it: `8.14` is good to 0.005, `1.06185e-4` to 5e-10. */
export function halfUnitOf(printed: string): number {
  const found = /^-?\d+(?:\.(\d+))?(?:e([+-]?\d+))?$/.exec(printed)
  if (!found) throw new Error(`${printed} is not a printed figure`)
  return 0.5 * 10 ** (Number(found[2] ?? 0) - (found[1]?.length ?? 0))
}

/** Numbers typed in decimal and divided by a unit differ in their last bits; this much may stand on the edge of a rounding. */
const BITS = 1e-9

/** The value rounds to the printed figure: it lies within half a unit in its last digit. */
export function agrees(value: number, printed: string): void {
  const [figure, half] = [Number(printed), halfUnitOf(printed)]
  expect(
    Math.abs(value - figure) <= half + BITS * Math.abs(figure),
    `${value} is not within ${half} of the printed ${printed}`,
  ).toBe(true)
}

/** A printed figure that the calculation does not meet: both are kept, so that a change on either side shows. */
export function disagrees(value: number, printed: string, ours: string): void {
  expect(Math.abs(value - Number(printed)), `${value} now meets the printed ${printed}`).toBeGreaterThan(
    halfUnitOf(printed),
  )
  agrees(value, ours)
}

/** Two ways to one number, apart by no more than the rounding of their arithmetic on the named scale. */
export function closeTo(a: number, b: number, scale: number, share = 1e-9): void {
  expect(Math.abs(a - b) <= share * scale, `${a} and ${b} differ by ${Math.abs(a - b)} on a scale of ${scale}`).toBe(
    true,
  )
}
