/** What the calculation starts from, gathered for a reader who has only the first sheet: no new numbers. */
import { verbatim } from '../base/language.ts'
import { linesInWords, type Span } from '../base/span.ts'
import type { Tabulation } from '../base/tabulation.ts'
import { printed, spansOf, type Value } from '../base/value.ts'
import type { LevelWork } from '../compute/level.ts'
import type { Worksheet } from '../compute/worksheet.ts'
import type { Construction } from '../model/construction.ts'
import type { Account, Context } from './context.ts'
import type { Row, Table } from './sheet.ts'

interface Criterion {
  readonly name: string
  readonly value: string
  readonly spans: readonly Span[]
}

/** Standard, loads, forces and materials in one table. What was not given, or cannot be worked, has no line. */
export function explainCriteria(sheet: Worksheet, context: Context, account: Account): Table {
  const { basis } = context
  const criteria = [
    ...(basis.standard === '' ? [] : [{ name: 'Standard', value: verbatim(basis.standard), spans: [] }]),
    { name: 'Results shown in', value: `${basis.system} units`, spans: [] },
    ...sheet.levels.flatMap(level => [...loadsOf(level, context), ...(sheet.seismic ? [] : forcesOf(level, context))]),
    ...seismicOf(sheet),
    ...windOf(sheet, context),
    ...materialsOf(sheet, context),
  ]
  return {
    kind: 'table',
    id: 'criteria',
    number: '',
    caption: context.words('Criteria: what the calculation starts from, as given'),
    columns: ['Criterion', 'As given', 'Source'].map(head => ({ head, unit: '', align: 'left' as const })),
    rows: criteria.map(
      ({ name, value, spans }): Row => ({
        cells: [context.words(name), context.words(value), linesInWords(account.lines(spans))],
        governs: false,
      }),
    ),
    formulas: [],
    sourceLines: [],
  }
}

function loadsOf(level: LevelWork, { language }: Context): readonly Criterion[] {
  const mass = level.givens.areas.length > 0 ? level.mass() : undefined
  if (!mass?.ok) return []
  const { areas, lines, points } = mass.value
  const read = level.areas()
  const openings = new Set(read.ok ? read.value.filter(area => !area.load).map(({ name }) => name) : [])
  const none = new Set<string>()
  const kinds: readonly (readonly [string, Tabulation | undefined, string])[] = [
    ['Loads', areas, 'w'],
    ['Line loads', lines, 'w'],
    ['Point loads', points, 'W'],
  ]
  return kinds.flatMap(([name, table, column]) =>
    table
      ? [
          {
            name: `${name} of ${verbatim(level.name)}`,
            ...grouped(table, column, table === areas ? openings : none, language),
          },
        ]
      : [],
  )
}

/** Each load once, with the names of what carries it; openings are bare. */
function grouped(
  table: Tabulation,
  column: string,
  bare: ReadonlySet<string>,
  language: Context['language'],
): Omit<Criterion, 'name'> {
  const byLoad = new Map<string, string[]>()
  const carried = table.rows.flatMap((name, i) =>
    bare.has(name) ? [] : [{ name, value: table.column(column).cell(i) }],
  )
  for (const { name, value } of carried) {
    const load = printed(value, language)
    byLoad.set(load, [...(byLoad.get(load) ?? []), name])
  }
  return {
    value: [...byLoad].map(([load, names]) => `${load} (${names.map(verbatim).join(', ')})`).join('; '),
    spans: carried.flatMap(({ value }) => spansOf(value)),
  }
}

function forcesOf(level: LevelWork, { language }: Context): readonly Criterion[] {
  const forces = level.forces()
  if (!forces.ok || !forces.value) return []
  const { x, y, accidental } = forces.value
  const parts = [
    ...(x ? [`${printed(x, language)} along x`] : []),
    ...(y ? [`${printed(y, language)} along y`] : []),
    `accidental eccentricity ${printed(accidental, language)} of the plan across the force`,
  ]
  const stated = [x, y, accidental].flatMap(value => (value ? spansOf(value) : []))
  return [{ name: `Force at ${verbatim(level.name)}`, value: parts.join('; '), spans: stated }]
}

/** What the forces are worked from, in place of the forces themselves. */
function seismicOf({ seismic }: Worksheet): readonly Criterion[] {
  const made = seismic?.()
  if (!made?.ok) return []
  const { settings } = made.value.given
  const value = settings.map(({ name, value }) => verbatim(`${name.text} ${value.text}`)).join('; ')
  return [{ name: 'Seismic', value, spans: settings.map(({ value }) => value.span) }]
}

function windOf(sheet: Worksheet, { language }: Context): readonly Criterion[] {
  const wind = sheet.wind()
  if (!wind.ok || !wind.value) return []
  const { given } = wind.value
  if (given.kind === 'stated') return [{ name: 'Wind', value: 'pressures as stated', spans: [given.span] }]
  const { V, exposure, Kd, Kzt, G, enclosure, roof, edition } = given
  const factors = [
    ['K_d', Kd],
    ['K_zt', Kzt],
    ['G', G],
  ] as const
  const value = [
    `ASCE ${edition}, directional procedure`,
    `V ${printed(V, language)}`,
    `exposure ${exposure}`,
    ...factors.map(([letter, value]) => `${letter} ${printed(value, language)}`),
    enclosure,
    roof.kind === 'gable' ? `gable roof of ${printed(roof.slope, language)} along ${roof.ridge}` : 'flat roof',
  ]
  return [{ name: 'Wind', value: value.join('; '), spans: [given.span] }]
}

function materialsOf({ constructions }: Worksheet, context: Context): readonly Criterion[] {
  return [...constructions.values()].flatMap(read => {
    const construction = read()
    return construction.ok ? [materialOf(construction.value, context)] : []
  })
}

function materialOf({ name, material, ends, span, ...held }: Construction, { language }: Context): Criterion {
  const stated: readonly (readonly [string, Value | undefined])[] = [
    [material === 'concrete' ? "f'c" : "f'm", held.strength],
    ['t', held.t],
    ['E', held.E],
    ['G', held.G],
    ['ν', held.nu],
  ]
  const parts = stated.flatMap(([letter, value]) => (value ? [`${letter} ${printed(value, language)}`] : []))
  return {
    name: `Construction ${verbatim(name)}`,
    value: [material, ...parts, ends === 'fixed' ? 'both ends fixed' : 'cantilever'].join('; '),
    spans: [span],
  }
}
