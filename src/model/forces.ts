/** Stated storey forces: what acts at each level, and how far it may be off the centre of mass. */

import { sym } from '../base/formula.ts'
import { unitOfKind } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Unit } from '../base/unit.ts'
import type { Value } from '../base/value.ts'
import { texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { quantity } from './cell.ts'
import { type ColumnRules, filled, recordsOf, settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'

export interface Forces {
  /** Absent when no force is stated along the axis. */
  readonly x?: Value
  readonly y?: Value
  /** Share of the plan's size across the force by which the mass may be off. */
  readonly accidental: Value
}

export const forceColumns: ColumnRules = { needed: ['level'], optional: ['x', 'y'] }
export const forceSettings: readonly string[] = ['x', 'y', 'accidental']
/** Those that stand beside a table of all levels. */
export const forceTableSettings: readonly string[] = ['accidental']

const force = { x: sym('F_x', 'F_x', 'force'), y: sym('F_y', 'F_y', 'force') }
const share = sym('a', '\\alpha', 'share')

/** What holds where the accidental eccentricity is not stated. */
export interface CommonShare {
  readonly share: number
  readonly clause: string
}

/** The share that most standards ask for. */
export const commonShare: CommonShare = { share: 0.05, clause: '5% as in ASCE 7-16 12.8.4.2 and EN 1998-1 4.3.2' }

interface Stated {
  readonly x?: Text
  readonly y?: Text
  readonly unitX?: Unit
  readonly unitY?: Unit
  readonly accidental?: Text
}

export function readForces(
  blocks: readonly Block[],
  tables: readonly Block[],
  level: string,
  common: CommonShare,
  scope: Scope,
): Result<Forces | undefined> {
  const [block, second] = blocks
  const rows = all(tables.map(table => rowFor(table, level)))
  if (!rows.ok) return rows
  const found = rows.value.filter(row => row !== undefined)
  const [row] = found
  const again = second ?? (row ? block : undefined)
  if (again)
    return bad([
      diagnose('error', 'forces-repeated', again.info, `the forces of ${level} are given twice`, 'Keep one of them.'),
    ])
  if (row) return readStated(row, level, common, scope)
  if (!block) return good(undefined)
  const faults = [...block.faults, ...strangeSettings(block, forceSettings), ...strangeLines(block)]
  if (faults.length > 0) return bad(faults)
  const [x, y, accidental] = ['x', 'y', 'accidental'].map(name => settingOf(block, name))
  if (!x && !y)
    return bad([
      diagnose(
        'error',
        'forces-missing',
        block.info,
        `the forces of ${level} are not stated`,
        'Write x: 42 kip, y: 42 kip, or one of them.',
      ),
    ])
  const stated = { ...(x ? { x } : {}), ...(y ? { y } : {}), ...(accidental ? { accidental } : {}) }
  return readStated(stated, level, common, scope)
}

function rowFor(table: Block, level: string): Result<Stated | undefined> {
  const records = recordsOf(table, forceColumns)
  const faults = [...strangeSettings(table, forceTableSettings), ...strangeLines(table)]
  if (!records.ok || faults.length > 0) return bad([...faults, ...(records.ok ? [] : records.because)])
  const record = records.value.find(record => record.cell('level')?.text === level)
  if (!record) return good(undefined)
  const name = filled(record, 'level')
  if (!name.ok) return name
  const [x, y, unitX, unitY] = [record.cell('x'), record.cell('y'), record.unit('x'), record.unit('y')]
  const accidental = settingOf(table, 'accidental')
  return good({
    ...(x ? { x } : {}),
    ...(y ? { y } : {}),
    ...(unitX ? { unitX } : {}),
    ...(unitY ? { unitY } : {}),
    ...(accidental ? { accidental } : {}),
  })
}

function readStated(
  { x, y, unitX, unitY, accidental }: Stated,
  level: string,
  common: CommonShare,
  scope: Scope,
): Result<Forces> {
  const along = (axis: 'x' | 'y', cell: Text | undefined, unit: Unit | undefined) =>
    cell &&
    quantity(
      cell,
      {
        id: `${level}.force.${axis}`,
        what: `the force along ${axis}`,
        sym: force[axis],
        tex: texAbout(`F_{${axis}}`, level),
        ...(unit ? { unit } : {}),
      },
      scope,
    )
  const [inX, inY] = [notZero(along('x', x, unitX), x), notZero(along('y', y, unitY), y)]
  const off = readShare(accidental, level, common, scope)
  const read = all<unknown>([...(inX ? [inX] : []), ...(inY ? [inY] : []), off])
  if (!read.ok) return read
  if (!off.ok) return off
  return good({ ...(inX?.ok ? { x: inX.value } : {}), ...(inY?.ok ? { y: inY.value } : {}), accidental: off.value })
}

/** A case without a force has nothing to share out. */
function notZero(value: Result<Value> | undefined, cell: Text | undefined): Result<Value> | undefined {
  if (!value?.ok || !cell || Math.abs(value.value.si) >= value.value.rounding) return value
  return bad([
    diagnose('error', 'force-zero', cell.span, 'this force is zero', 'Leave it out where nothing acts along an axis.'),
  ])
}

/** @param cell what is stated; the common share holds where nothing is */
export function readShare(cell: Text | undefined, level: string, common: CommonShare, scope: Scope): Result<Value> {
  if (!cell) return good(shareByDefault(level, common, scope))
  const value = quantity(
    cell,
    { id: `${level}.accidental`, what: 'accidental', sym: share, tex: texAbout('\\alpha', level) },
    scope,
  )
  return sharePlausible(value, cell)
}

/** Refuses a share of the plan beyond which the mass would be off it. */
export function sharePlausible(value: Result<Value>, cell: Text): Result<Value> {
  if (!value.ok || (value.value.si >= 0 && value.value.si <= 0.5)) return value
  return bad([
    diagnose(
      'error',
      'accidental-out-of-range',
      cell.span,
      `accidental is ${cell.text}; it is a share of the plan, from 0% to 50%`,
      'Most standards ask for 5%.',
    ),
  ])
}

function shareByDefault(level: string, { share: si, clause }: CommonShare, scope: Scope): Value {
  const text = `The force at ${verbatim(level)} may act off the centre of mass by ${si * 100}% of the plan across it, to either side.`
  scope.assume({ text, because: `accidental is not stated; ${clause}` })
  return {
    id: `${level}.accidental`,
    tex: texAbout('\\alpha', level),
    si,
    unit: shareUnit(scope),
    rounding: 0,
    origin: { kind: 'default', assumption: text },
  }
}

const shareUnit = (scope: Scope): Unit => unitOfKind('share', scope.display)
