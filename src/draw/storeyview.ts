/** What a diagram of storey forces and shears shows, already worked and already printed. */
import { inLanguage, type Language, verbatim } from '../base/language.ts'
import { columnDecimals, fixed, numeralOnPage } from '../base/numeral.ts'
import { unitOnPage, unitText } from '../base/unit.ts'
import { printed, shown, type Value } from '../base/value.ts'
import type { Axis } from '../compute/cases.ts'
import { lettersOf } from '../compute/loading.ts'
import { elevationOf, type Storeys } from '../compute/storeys.ts'
import type { FigureUnit } from './arrowkey.ts'
import type { Described } from './svg.ts'

/** A force in newtons, and how it prints. */
export interface Figured {
  readonly value: number
  readonly printed: string
}

export interface StoreyLevel {
  readonly name: string
  /** Metres above the base, and how it prints; none where no elevation is stated. */
  readonly elevation?: { readonly metres: number; readonly printed: string }
  /** Force of the level and shear of the storey below it, along each axis drawn. */
  readonly along: Readonly<Partial<Record<Axis, { readonly force: Figured; readonly shear: Figured }>>>
}

export interface StoreyView extends Described {
  readonly axes: readonly Axis[]
  /** From the top down. */
  readonly levels: readonly StoreyLevel[]
  readonly forceUnit: FigureUnit
}

export function storeyView({ loading, axes, table, stated }: Storeys, language: Language): StoreyView {
  const words = (text: string): string => inLanguage(text, language)
  const columns = axes.map(axis => ({
    axis,
    F: table.column(lettersOf[loading].F[axis].name),
    V: table.column(lettersOf[loading].V[axis].name),
  }))
  const cells = columns.flatMap(({ F, V }) => table.rows.flatMap((_, i) => [F.cell(i), V.cell(i)]))
  const decimals = columnDecimals(cells.map(shown))
  const unit = cells[0]?.unit
  const name = unit ? unitOnPage(unitText(unit)) : ''
  // The same digits as in the table of the same numbers.
  const figured = (value: Value): Figured => ({
    value: value.si,
    printed: `${numeralOnPage(fixed(shown(value), decimals), language)} ${name}`,
  })
  const levels = table.rows.map((level, i): StoreyLevel => {
    const elevation = stated ? table.column(elevationOf.name).cell(i) : undefined
    return {
      name: level,
      ...(elevation ? { elevation: { metres: elevation.si, printed: printed(elevation, language) } } : {}),
      along: Object.fromEntries(
        columns.map(({ axis, F, V }) => [axis, { force: figured(F.cell(i)), shear: figured(V.cell(i)) }]),
      ),
    }
  })
  return {
    title: words('Storey forces and storey shears'),
    description: words(describe(axes, levels)),
    language,
    axes,
    levels,
    forceUnit: { si: unit?.scale ?? 1, name },
  }
}

/** Every figure of the diagram in words, from the top down. */
function describe(axes: readonly Axis[], levels: readonly StoreyLevel[]): string {
  const told = levels.map(({ name, elevation, along }) => {
    const where = elevation ? ` at ${elevation.printed}` : ''
    const figures = axes.flatMap(axis => {
      const figure = along[axis]
      return figure ? [`force ${figure.force.printed} and shear ${figure.shear.printed} along ${axis}`] : []
    })
    return `${verbatim(name)}${where}: ${figures.join(', ')}.`
  })
  return ['Force of each level and shear of the storey below it, from the top down.', ...told].join(' ')
}
