/** Openings that leave no piers, or none that the strips can tell: the wall's stiffness is then for the engineer to state. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { verbatim } from '../base/language.ts'
import { inWords } from '../base/near.ts'
import type { Opening } from '../model/openings.ts'
import type { Assumption } from '../model/scope.ts'
import type { Wall } from '../model/walls.ts'
import { diagnose } from '../read/text.ts'

type Holes = readonly { readonly opening: Opening }[]

const STATE = 'state k of the wall in place of its construction'

/** The fault stands at the wall, with its openings pointed out. */
function fault(rule: string, { span }: Wall, openings: readonly Opening[], message: string, help: string): Diagnostic {
  const also = openings.slice(0, 4).map(({ name, span }) => ({ span, text: `opening ${name}` }))
  return diagnose('error', rule, span, message, help, { also })
}

/** Each opening once, as they stand in the source. */
const openingsIn = (holes: Holes): readonly Opening[] =>
  [...new Set(holes.map(({ opening }) => opening))].sort((a, b) => a.span.start - b.span.start)

const named = (openings: readonly Opening[]): string =>
  `${openings.length === 1 ? 'opening' : 'openings'} ${inWords(
    openings.map(({ name }) => name),
    'and',
  )}`

export function noPier(wall: Wall, holes: Holes): Diagnostic {
  const openings = openingsIn(holes)
  return fault(
    'openings-without-pier',
    wall,
    openings,
    `${named(openings)} ${openings.length === 1 ? 'leaves' : 'leave'} no pier in wall ${wall.name}`,
    `Shear has no way down past them. Leave a pier, or ${STATE}.`,
  )
}

export function noSpandrel(wall: Wall, holes: Holes): Diagnostic {
  const openings = openingsIn(holes)
  return fault(
    'openings-without-spandrel',
    wall,
    openings,
    `${named(openings)} ${openings.length === 1 ? 'reaches' : 'reach'} the head of wall ${wall.name}, which is free to turn`,
    `Piers are worked as held at both ends, and here nothing above the opening holds them. Lower its head, give the wall a construction with ends: fixed if what it carries holds it, or ${STATE}.`,
  )
}

export function staggered(wall: Wall, holes: Holes): Diagnostic {
  const openings = openingsIn(holes)
  return fault(
    'openings-staggered',
    wall,
    openings,
    `${named(openings)} of wall ${wall.name} are staggered: no opening takes the whole height of the strip that they share`,
    `The wall is worked by strips, and these cannot be cut into strips with piers between. Bring their sills or heads in line, or ${STATE}.`,
  )
}

export const drawnOnly = (wall: string): Assumption => ({
  text: `The stiffness of ${verbatim(wall)} is as stated, with its openings; they are drawn only.`,
  because: 'k is stated',
})
