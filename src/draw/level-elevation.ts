/** What of a wall and its results an elevation shows. */
import { inLanguage, type Language, verbatim } from '../base/language.ts'
import { inWords } from '../base/near.ts'
import { asTyped } from '../base/numeral.ts'
import { unit } from '../base/unit.ts'
import { onPage, printed, type Value } from '../base/value.ts'
import type { Pierced } from '../compute/pierced.ts'
import type { WallLine } from '../compute/stiffness.ts'
import type { Grid } from '../model/grid.ts'
import type { Opening } from '../model/openings.ts'
import type { Wall } from '../model/walls.ts'
import type { ElevationView } from './elevation-view.ts'

export interface WallPicture {
  readonly level: string
  readonly language: Language
  readonly system: 'US' | 'SI'
  readonly wall: Wall
  /** Of the wall, where it has one. */
  readonly height: Value
  readonly line: WallLine
  readonly grid: Grid
  readonly openings: readonly Opening[]
  /** Thickness of a built wall. */
  readonly thickness?: Value
  readonly pierced?: Pierced
  /** Elevation of its own level and of what it stands on, where levels are given. */
  readonly elevations?: { readonly own: Value; readonly below: { readonly name: string; readonly at?: Value } }
  /** Shear of the wall: of a case with its sign along the wall's own direction, or the design shear. */
  readonly shear?: { readonly value: Value; readonly caseName?: string; readonly governs: boolean }
}

export function elevationView(picture: WallPicture): ElevationView {
  const { level, language, system, wall, height, line, openings, pierced } = picture
  const words = (text: string) => inLanguage(text, language)
  const scale = system === 'US' ? unit('ft') : unit('m')
  // Nothing finer than a millimetre, or a thousandth of a foot, is dimensioned.
  const dimension = (metres: number) => onPage(asTyped(Number((metres / scale.scale).toFixed(3))), scale, language)
  return {
    title: words(`Elevation of wall ${verbatim(wall.name)} of ${verbatim(level)}`),
    description: words(describe(picture, dimension)),
    language,
    length: line.L.si,
    height: height.si,
    openings: openings.map(each => ({
      name: each.name,
      ...boxOf(each),
      size: `${dimension(each.width.si)} × ${dimension(each.height.si)}`,
    })),
    piers: (pierced?.piers ?? [])
      .filter(({ holds }) => holds.length === 0)
      .map(({ name, face }) => ({
        name,
        left: face.a1.si,
        right: face.a2.si,
        low: face.z1.si,
        high: face.z2.si,
      })),
    grid: gridOn(picture),
    levels: levelsOf(picture),
    ...shearOf(picture),
    name: words(`Wall ${verbatim(wall.name)}`),
    notes: [words(madeOf(picture)), words(seenFrom(picture))],
    dimension,
    scaleUnit: { metres: scale.scale, name: system === 'US' ? 'ft' : 'm' },
  }
}

const boxOf = ({ left, sill, width, height }: Opening) => ({
  left: left.si,
  right: left.si + width.si,
  low: sill.si,
  high: sill.si + height.si,
})

/** A grid line that a wall meets may stand this far past its end, in m. */
const SLACK = 1e-3
/** A wall this nearly parallel to a grid line does not meet it. */
const PARALLEL = 1e-6

/** Grid lines across the wall, by their distance from its start. */
function gridOn({ wall, line, grid }: WallPicture): ElevationView['grid'] {
  const [c, s] = [line.c.si, line.s.si]
  const meet = (from: Value, along: number, lines: Grid['x']) =>
    Math.abs(along) < PARALLEL ? [] : lines.map(({ name, at }) => ({ name, at: (at.si - from.si) / along }))
  const length = line.L.si
  return [...meet(wall.from.x, c, grid.x), ...meet(wall.from.y, s, grid.y)]
    .filter(({ at }) => at >= -SLACK && at <= length + SLACK)
    .map(({ name, at }) => ({ name, at: wall.reversed ? length - at : at }))
}

/** Its own level at its elevation, or at the head where elevations are not known; what it stands on at the foot. */
function levelsOf({ level, language, height, elevations }: WallPicture): ElevationView['levels'] {
  if (!elevations) return [{ name: level, elevation: '', at: height.si }]
  const { own, below } = elevations
  const rise = own.si - (below.at?.si ?? 0)
  const zero = onPage(asTyped(0), own.unit, language)
  return [
    { name: level, elevation: `+${printed(own, language)}`, at: Math.max(rise, 0) },
    { name: below.name, elevation: below.at ? `+${printed(below.at, language)}` : `±${zero}`, at: 0 },
  ]
}

function shearOf({ shear, wall, language }: WallPicture): Pick<ElevationView, 'shear'> {
  if (!shear) return {}
  const { value, caseName, governs } = shear
  const text = `V = ${printed({ ...value, si: Math.abs(value.si) }, language)}`
  if (caseName === undefined) return { shear: { printed: text, governs } }
  const forward = value.si >= 0 !== wall.reversed
  return { shear: { printed: text, governs, toward: forward ? 'end' : 'start' } }
}

function madeOf({ wall, thickness, language }: WallPicture): string {
  if (wall.kind === 'stated') return 'Stiffness as stated.'
  const name = verbatim(wall.construction.text)
  return thickness ? `Construction ${name}, ${printed(thickness, language)} thick.` : `Construction ${name}.`
}

function seenFrom({ shear, pierced, wall }: WallPicture): string {
  const start = 'Seen with the wall’s start on the left.'
  const force = !shear
    ? ''
    : shear.caseName === undefined
      ? ' V is the design shear, which may act either way.'
      : ` V is the shear of case ${shear.caseName.replace('-', '−')}.`
  const piers = pierced || wall.kind === 'stated' ? '' : ' It has no openings.'
  return `${start}${force}${piers}`
}

const TOLD = 12

function describe(picture: WallPicture, dimension: (metres: number) => string): string {
  const { wall, height, line, openings, pierced, shear, language } = picture
  const told = openings
    .slice(0, TOLD)
    .map(
      ({ name, left, sill, width, height: high }) =>
        `${verbatim(name)}, ${dimension(width.si)} wide and ${dimension(high.si)} high, ${dimension(left.si)} from the start with its sill at ${dimension(sill.si)}`,
    )
  const rest = openings.length - told.length
  const parts = [
    `Elevation of wall ${verbatim(wall.name)}, ${dimension(line.L.si)} long and ${dimension(height.si)} high, with ${openings.length === 0 ? 'no openings' : openings.length === 1 ? '1 opening' : `${openings.length} openings`}.`,
    ...(told.length > 0 ? [`Openings: ${told.join('; ')}${rest > 0 ? `; and ${rest} more` : ''}.`] : []),
  ]
  const piers = pierced?.piers.filter(({ holds }) => holds.length === 0).map(({ name }) => name) ?? []
  if (piers.length > 0) parts.push(`Piers from the start on: ${inWords(piers, 'and')}.`)
  if (shear)
    parts.push(
      `Its ${shear.caseName === undefined ? 'design shear' : `shear in case ${shear.caseName}`} is ${printed(shear.value, language)}.`,
    )
  return parts.join(' ')
}
