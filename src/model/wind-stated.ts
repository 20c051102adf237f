/** Pressures of wind that are stated, for any standard: on the windward and on the leeward walls, each as a size. */
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import {
  type ColumnRules,
  duplicates,
  filled,
  nameIn,
  type RowOf,
  recordsOf,
  settingOf,
  strangeLines,
  strangeSettings,
} from './columns.ts'
import type { Scope } from './scope.ts'
import type { WindAround } from './wind.ts'
import { type Edition, type FigureCase, readFigureCases } from './wind-cases.ts'

type Axis = 'x' | 'y'
const axes: readonly Axis[] = ['x', 'y']

/** Sizes: the windward one pushes, the leeward one pulls, both along the wind. */
export interface Pressures {
  readonly windward: Value
  readonly leeward: Value
}

export interface StatedWind {
  readonly kind: 'stated'
  /** The pressures at a level along an axis; undefined along an axis for which none are stated. */
  readonly at: (level: string, axis: Axis) => Pressures | undefined
  readonly axes: readonly Axis[]
  readonly parapet?: Value
  /** The cases of the figure of ASCE 7 where the document asks for them, or the force moved aside by a share of the width. */
  readonly cases:
    | { readonly figure: readonly FigureCase[]; readonly edition: Edition }
    | { readonly eccentricity: Value | undefined }
  readonly span: Text['span']
}

const p = { windward: sym('p_w', 'p_w', 'areaLoad'), leeward: sym('p_l', 'p_l', 'areaLoad') }
const sides = ['windward', 'leeward'] as const
type Side = (typeof sides)[number]

const pressureNames = ['windward', 'leeward', 'windward x', 'leeward x', 'windward y', 'leeward y']
export const statedWindColumns: ColumnRules = { needed: ['level'], optional: pressureNames }
export const statedWindSettings: readonly string[] = [...pressureNames, 'parapet', 'eccentricity', 'cases']

export function readStatedWind(block: Block, { levels, standard }: WindAround, scope: Scope): Result<StatedWind> {
  const faults = [...strangeSettings(block, statedWindSettings), ...strangeLines(block)]
  const read = block.table ? fromTable(block, levels, scope) : fromSettings(block, scope)
  const parapet = readParapet(block, scope)
  const cases = readCases(block, standard, scope)
  const parts = all<unknown>([read, parapet, cases])
  if (faults.length > 0 || !parts.ok || !read.ok || !parapet.ok || !cases.ok)
    return bad([...faults, ...(parts.ok ? [] : parts.because)])
  if ('figure' in cases.value && read.value.axes.length < axes.length)
    return bad([
      diagnose(
        'error',
        'wind-cases',
        settingOf(block, 'cases')?.span ?? block.info,
        'cases 3 and 4 have wind along both axes, and pressures are stated along one',
        'State pressures along x and y, or leave the cases out.',
      ),
    ])
  return good({
    kind: 'stated',
    ...read.value,
    ...(parapet.value ? { parapet: parapet.value } : {}),
    cases: cases.value,
    span: block.info,
  })
}

type Read = Pick<StatedWind, 'at' | 'axes'>

/** One pair for all levels: of each axis, or of both. */
function fromSettings(block: Block, scope: Scope): Result<Read> {
  const found = axes.map((axis): Result<Pressures | undefined> => {
    const cells = (side: Side) => settingOf(block, `${side} ${axis}`) ?? settingOf(block, side)
    return pairOf(cells, axis, '', () => undefined, block.info, scope)
  })
  const made = all(found)
  if (!made.ok) return made
  const [x, y] = made.value
  return good({ axes: axes.filter((_, i) => made.value[i]), at: (_, axis) => (axis === 'x' ? x : y) })
}

/** A pair for each level. */
function fromTable(block: Block, levels: readonly string[], scope: Scope): Result<Read> {
  const records = recordsOf(block, statedWindColumns)
  const beside = block.settings.find(({ name }) => /^(?:wind|lee)ward\b/.test(name.text))
  if (beside)
    return bad([
      diagnose(
        'error',
        'wind-pressures-twice',
        beside.name.span,
        'pressures stand in the table, and in a setting too',
        'Keep one of them.',
      ),
    ])
  if (!records.ok) return records
  const names: Text[] = []
  const rows = new Map<string, Readonly<Record<Axis, Pressures | undefined>>>()
  const made = all(
    records.value.map((record): Result<unknown> => {
      const name = nameIn(record, 'level')
      if (!name.ok) return name
      names.push(name.value)
      const { text, span } = name.value
      if (!levels.includes(text))
        return bad([
          diagnose('error', 'unknown-level', span, `there is no level ${text}`, suggestion(text, levels, 'level')),
        ])
      return rowOf(record, text, scope, rows)
    }),
  )
  const repeated = duplicates(names, 'level')
  if (!made.ok || repeated.length > 0) return bad([...repeated, ...(made.ok ? [] : made.because)])
  const without = levels.filter(level => !rows.has(level))
  if (without.length > 0)
    return bad([
      diagnose(
        'error',
        'wind-level-missing',
        block.table?.headerLine.span ?? block.info,
        `no pressure is stated for ${without.join(', ')}`,
        'Give every level a row.',
      ),
    ])
  const present = axes.filter(axis => [...rows.values()].some(row => row[axis]))
  const gap = [...rows].find(([, row]) => present.some(axis => !row[axis]))
  const line = records.value.find(record => record.cell('level')?.text === gap?.[0])
  if (gap && line) {
    const lacks = filled(line, `windward ${present.find(axis => !gap[1][axis]) ?? 'x'}`)
    if (!lacks.ok) return lacks
  }
  return good({ axes: present, at: (level, axis) => rows.get(level)?.[axis] })
}

function rowOf(
  record: RowOf,
  level: string,
  scope: Scope,
  rows: Map<string, Readonly<Record<Axis, Pressures | undefined>>>,
): Result<unknown> {
  const [x, y] = axes.map(axis => {
    const column = (side: Side) => (record.cell(`${side} ${axis}`) ? `${side} ${axis}` : side)
    return pairOf(
      side => record.cell(column(side)),
      axis,
      level,
      side => record.unit(column(side)),
      record.line.span,
      scope,
    )
  })
  if (!x || !y) throw new Error('there are two axes')
  if (!x.ok || !y.ok) return x.ok ? y : x
  rows.set(level, { x: x.value, y: y.value })
  return good(undefined)
}

function pairOf(
  cell: (side: Side) => Text | undefined,
  axis: Axis,
  level: string,
  unit: (side: Side) => Unit | undefined,
  at: Text['span'],
  scope: Scope,
): Result<Pressures | undefined> {
  const [windward, leeward] = sides.map(cell)
  if (!windward && !leeward) return good(undefined)
  const lacking = windward ? 'leeward' : 'windward'
  if (!windward || !leeward)
    return bad([
      diagnose(
        'error',
        'setting-missing',
        at,
        `wind along ${axis} has no ${lacking} pressure`,
        'Give the pressures on both walls, each as a size. Where one figure is for both, state it as windward and 0 psf as leeward.',
      ),
    ])
  const made = all(
    ([windward, leeward] as const).map((text, i): Result<Value> => {
      const side = sides[i] ?? 'windward'
      const given = unit(side)
      const id = `${level === '' ? 'wind' : `${level}.wind`}.${side}.${axis}`
      const value = quantity(
        text,
        { id, what: side, sym: p[side], tex: texAbout(p[side].tex, axis), ...(given ? { unit: given } : {}) },
        scope,
      )
      return side === 'leeward' ? notNegative(value, text) : aboveZero(value, text.span, side)
    }),
  )
  if (!made.ok) return made
  const [pushes, pulls] = made.value
  if (!pushes || !pulls) throw new Error('there are two sides')
  return good({ windward: pushes, leeward: pulls })
}

/** A suction stated with its sign would be taken from the windward pressure instead of added to it. */
function notNegative(value: Result<Value>, { span }: Text): Result<Value> {
  if (!value.ok || value.value.si >= 0) return value
  return bad([
    diagnose(
      'error',
      'size-not-positive',
      span,
      'leeward is below zero',
      'Give its size: suction on the leeward wall acts along the wind, and is added.',
    ),
  ])
}

function readParapet(block: Block, scope: Scope): Result<Value | undefined> {
  const cell = settingOf(block, 'parapet')
  if (!cell) return good(undefined)
  const of = sym('h_p', 'h_p', 'length')
  return aboveZero(quantity(cell, { id: 'wind.parapet', what: 'parapet', sym: of }, scope), cell.span, 'parapet')
}

function readCases(block: Block, standard: string, scope: Scope): Result<StatedWind['cases']> {
  const [share, listed] = [settingOf(block, 'eccentricity'), settingOf(block, 'cases')]
  if (share && listed)
    return bad([
      diagnose(
        'error',
        'wind-cases',
        listed.span,
        'cases are listed, and an eccentricity is stated too',
        'The listed cases are those of ASCE 7 with an eccentricity of 15%. Keep one of them.',
      ),
    ])
  if (listed) {
    const figure = readFigureCases(block, scope)
    return figure.ok ? good({ figure: figure.value, edition: /\b7-16\b/.test(standard) ? '7-16' : '7-22' }) : figure
  }
  if (!share) {
    scope.assume({
      text: 'The force of wind acts in the middle of the face, with no eccentricity.',
      because: 'eccentricity is not stated',
    })
    return good({ eccentricity: undefined })
  }
  const of = sym('alpha', '\\alpha', 'share')
  const value = quantity(share, { id: 'wind.eccentricity', what: 'eccentricity', sym: of, tex: '\\alpha_w' }, scope)
  if (!value.ok || (value.value.si > 0 && value.value.si <= 0.5))
    return value.ok ? good({ eccentricity: value.value }) : value
  return bad([
    diagnose(
      'error',
      'wind-eccentricity-out-of-range',
      share.span,
      `eccentricity is ${share.text}; it is a share of the width, above 0% and up to 50%`,
      'Leave it out where there is none.',
    ),
  ])
}
