/** The seismic design in pieces: ground motion, base shear, forces of the levels, forces of the diaphragms. */
import { sym } from '../base/formula.ts'
import { numeralOnPage, rounded } from '../base/numeral.ts'
import type { Span } from '../base/span.ts'
import { Tabulation } from '../base/tabulation.ts'
import { unitText } from '../base/unit.ts'
import { printed, shown, spansOf } from '../base/value.ts'
import type { DirectionWork, Seismic } from '../compute/seismic.ts'
import { verticalColumns } from '../compute/vertical.ts'
import type { Direction } from '../model/seismic.ts'
import { notCovered, type Said } from '../standards/profile.ts'
import type { Context } from './context.ts'
import { explainValue } from './equation.ts'
import type { Detail, Request, SeismicWant } from './request.ts'
import type { Check, Piece } from './sheet.ts'
import { explainTable } from './table.ts'

export function explainSeismic(
  want: SeismicWant,
  seismic: Seismic,
  { detail, whole, at }: Request,
  context: Context,
): readonly Piece[] {
  switch (want) {
    case 'design spectrum':
      return explainSaid(seismic.ground, context)
    case 'base shear':
      return [
        ...(detail === 'result' ? [] : weights(seismic, context)),
        ...eachWay(seismic, (_, { V, said }) =>
          detail === 'full' ? explainSaid(said, context) : [explainValue(V, context)],
        ),
      ]
    case 'storey forces':
      return eachWay(seismic, (direction, work) => storeyForces(direction, work, detail, context))
    case 'diaphragm forces':
      if (!seismic.directions.x.diaphragms) return [withoutRule(seismic, whole, at)]
      return eachWay(seismic, (direction, { diaphragms }) =>
        diaphragms ? diaphragmForces(direction, diaphragms, detail, context) : [],
      )
  }
}

/** One direction where the other comes to the same, with a note that says so. */
function eachWay(
  { alike, directions }: Seismic,
  explain: (direction: Direction, work: DirectionWork) => readonly Piece[],
): readonly Piece[] {
  const note = (text: string): Piece => ({ kind: 'note', text })
  const x = explain('x', directions.x)
  if (alike) return [note('Along x. Along y the same settings hold and the numbers are the same.'), ...x]
  return [note('Along x.'), ...x, note('Along y.'), ...explain('y', directions.y)]
}

const explainSaid = (said: readonly Said[], context: Context): readonly Piece[] =>
  said.map(one => pieceOf(one, context))

function pieceOf(said: Said, context: Context): Piece {
  switch (said.kind) {
    case 'step':
      return explainValue(said.value, context)
    case 'note':
      return { kind: 'note', text: context.words(said.text) }
    case 'choice':
      return { kind: 'note', text: context.words(said.word.because) }
    case 'criteria':
      return criteriaTable(said.criteria, context)
    case 'check':
      return checkOf(said.check, context)
  }
}

const measure = sym('value', '\\text{Value}', 'number')

function criteriaTable(
  { id, caption, head, rows, decides }: (Said & { kind: 'criteria' })['criteria'],
  context: Context,
): Piece {
  const table = new Tabulation(
    rows.map(({ name }) => name),
    row => `${id}.${row}`,
    { system: context.basis.system, relative: false },
  ).take(
    measure,
    rows.map(({ value }) => value),
  )
  const words = [
    ...(decides ? [{ head: decides.head, cells: rows.map(({ says }) => says ?? '') }] : []),
    { head: 'Clause', cells: rows.map(({ clause }) => clause) },
  ]
  const governs = decides ? { governs: decides.row } : {}
  return explainTable(table, { id, caption, rowHead: head, columns: [measure.name], ...governs, words }, context)
}

function checkOf(
  { id, what, demand, capacity, reference }: (Said & { kind: 'check' })['check'],
  context: Context,
): Piece {
  context.root(demand)
  context.root(capacity)
  const ratio = demand.si / capacity.si
  const check: Check = {
    kind: 'check',
    id,
    what: context.words(what),
    demand: printed(demand, context.language),
    capacity: printed(capacity, context.language),
    numbers: { demand: shown(demand), capacity: shown(capacity), unit: unitText(demand.unit) },
    ratio,
    ratioPrinted: numeralOnPage(rounded(ratio), context.language),
    ok: ratio <= 1,
    reference: context.words(reference),
    sourceLines: context.places(spansOf(demand)),
  }
  context.check(check)
  return check
}

const weights = ({ weights, W }: Seismic, context: Context): readonly Piece[] => [
  explainTable(
    weights,
    {
      id: 'seismic.weights',
      caption: 'Effective seismic weight of each level.',
      rowHead: 'Level',
      columns: ['W'],
      sums: { W },
    },
    context,
  ),
]

function storeyForces(direction: Direction, work: DirectionWork, detail: Detail, context: Context): readonly Piece[] {
  const { shares } = work
  const force = `F_${direction}`
  if (detail === 'result')
    return shares.table.rows.map((_, i) => explainValue(shares.table.column(force).cell(i), context))
  return [
    explainTable(
      shares.table,
      {
        id: `seismic.${direction}.forces`,
        caption: `Base shear along ${direction} shared over the levels: force of each level, and shear of the storey below it.`,
        rowHead: 'Level',
        columns: verticalColumns(shares, direction),
        sums: { [shares.product]: shares.sumProduct, [force]: shares.sumForce },
      },
      context,
    ),
  ]
}

/** What a standard has no rule for is a fault where it is asked for by name, and a remark among all the rest. */
function withoutRule({ profile }: Seismic, whole: boolean, at: Span): Piece {
  const fault = notCovered(profile, 'the design force of diaphragms', at)
  return whole ? { kind: 'note', text: `${fault.message}.` } : { kind: 'fault', diagnostics: [fault] }
}

function diaphragmForces(
  direction: Direction,
  diaphragms: Tabulation,
  detail: Detail,
  context: Context,
): readonly Piece[] {
  if (detail === 'result') return diaphragms.rows.map((_, i) => explainValue(diaphragms.column('F_p').cell(i), context))
  return [
    explainTable(
      diaphragms,
      {
        id: `seismic.${direction}.diaphragms`,
        caption: `Design force of each diaphragm along ${direction}, between its least and its most. The whole weight of a level is taken for its diaphragm.`,
        rowHead: 'Level',
        columns: diaphragms.columns.map(({ sym }) => sym.name),
      },
      context,
    ),
  ]
}
