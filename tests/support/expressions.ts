/** Random expressions as text: pure numbers of any form, and quantities whose dimension is known beforehand. */
import type { Random } from './random.ts'

const oneArgument = ['sqrt', 'abs', 'sin', 'cos', 'tan', 'asin', 'acos', 'atan', 'exp', 'ln'] as const

function numberText(random: Random): string {
  switch (random.whole(0, 6)) {
    case 0:
      return String(random.whole(0, 9))
    case 1:
      return `${random.whole(0, 99)}.${random.whole(0, 999)}`
    case 2:
      return `.${random.whole(1, 99)}`
    case 3:
      return `${random.whole(1, 9)}e${random.whole(-3, 2)}`
    case 4:
      return `${random.whole(1, 9)}.${random.whole(0, 99)}E+${random.whole(0, 2)}`
    case 5:
      return String(random.whole(10, 4000))
    default:
      return `0.${random.whole(1, 99999)}`
  }
}

/** An expression of pure numbers and, where there are names, of them; brackets stand where chance puts them. */
export function numberExpression(random: Random, depth: number, names: readonly string[] = []): string {
  const inner = () => numberExpression(random, depth - 1, names)
  if (depth <= 0) return names.length > 0 && random.share() < 0.6 ? random.pick(names) : numberText(random)
  const space = random.share() < 0.5 ? ' ' : ''
  switch (random.whole(0, 11)) {
    case 0:
    case 1:
      return `${inner()}${space}+${space}${inner()}`
    case 2:
    case 3:
      return `${inner()}${space}-${space}${inner()}`
    case 4:
    case 5:
      return `${inner()}${space}*${space}${inner()}`
    case 6:
      return `${inner()}${space}/${space}${inner()}`
    case 7:
      return `${inner()}^${random.pick(['2', '3', '-1', '0.5', '-2^2', '(1 + 1)'])}`
    case 8:
      return `-${inner()}`
    case 9:
      return `(${inner()})`
    case 10:
      return `${random.pick(oneArgument)}(${inner()})`
    default: {
      const fn = random.pick(['min', 'max', 'sum', 'atan2'])
      return fn !== 'atan2' && random.share() < 0.3
        ? `${fn}(${inner()}, ${inner()}, ${inner()})`
        : `${fn}(${inner()},${space}${inner()})`
    }
  }
}

/** Powers of force and of length. */
export interface Measure {
  readonly force: number
  readonly length: number
}

const simpleUnits: Readonly<Record<string, readonly string[]>> = {
  '0,1': ['ft', 'in', 'm', 'mm'],
  '0,2': ['ft^2', 'in^2', 'm^2'],
  '1,0': ['lb', 'kip', 'N', 'kN'],
  '1,-1': ['plf', 'klf', 'kip/in', 'kN/m', 'N/mm'],
  '1,-2': ['psf', 'psi', 'ksi', 'Pa', 'kPa', 'MPa'],
  '1,-3': ['pcf', 'kN/m^3'],
  '1,1': ['kip*ft', 'kN*m', 'lb*in'],
}

const measures: readonly Measure[] = Object.keys(simpleUnits).map(key => {
  const [force = 0, length = 0] = key.split(',').map(Number)
  return { force, length }
})

/** A quantity in brackets: `(30 kip*ft)`. Bare where nothing can attach to its unit: a product reads on into a unit. */
function quantityText(random: Random, { force, length }: Measure): string {
  const number = random.share() < 0.5 ? String(random.whole(1, 500)) : `${random.whole(0, 99)}.${random.whole(1, 99)}`
  return `(${number} ${random.pick(simpleUnits[`${force},${length}`] ?? [])})`
}

/** An expression of the given measure; a pure number enters it only as a factor. */
export function quantityExpression(random: Random, measure: Measure, depth: number): string {
  const { force, length } = measure
  const same = () => quantityExpression(random, measure, depth - 1)
  const known = simpleUnits[`${force},${length}`] !== undefined
  if (known && (depth <= 0 || random.share() < 0.15)) return quantityText(random, measure)
  if (depth <= -4) throw new Error(`no unit measures force ${force}, length ${length}`)
  switch (known ? random.whole(0, 9) : 9) {
    case 0:
    case 1:
      return `(${same()} + ${same()})`
    case 2:
      return `(${same()} - ${same()})`
    case 3:
      return `-${same()}`
    case 4:
      return `${random.pick(['max', 'min', 'sum'])}(${same()}, ${same()})`
    case 5:
      return `abs(${same()})`
    case 6:
      return `(${numberText(random)}*${same()})`
    case 7:
      return `(${same()}/${random.whole(2, 40)})`
    case 8:
      return force % 2 === 0 && length % 2 === 0
        ? `(${quantityExpression(random, { force: force / 2, length: length / 2 }, depth - 1)})^2`
        : `sqrt((${same()})^2)`
    default:
      return compound(random, measure, depth)
  }
}

/** A product or a quotient of two measures that are both known. */
function compound(random: Random, measure: Measure, depth: number): string {
  const pairs = measures.flatMap(left =>
    [1, -1].flatMap(sign => {
      const right = {
        force: sign * (measure.force - left.force),
        length: sign * (measure.length - left.length),
      }
      return simpleUnits[`${right.force},${right.length}`] ? [{ left, right, sign }] : []
    }),
  )
  const { left, right, sign } = random.pick(pairs)
  const [a, b] = [quantityExpression(random, left, depth - 1), quantityExpression(random, right, depth - 1)]
  return `(${a}${sign === 1 ? '*' : '/'}${b})`
}

export const anyMeasure = (random: Random): Measure => random.pick(measures)
