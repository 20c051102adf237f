/** A stated spectrum: accelerations by period, and how the modes are put together and scaled. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { sym } from '../base/formula.ts'
import { all, type Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import { shownAs, texAbout } from '../base/work.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import { type ColumnRules, filled, type RowOf, recordsOf, settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'

export interface SpectrumPoint {
  readonly T: Value
  /** In multiples of standard gravity. */
  readonly S: Value
}

export const combinations = ['CQC', 'SRSS'] as const
export type Combination = (typeof combinations)[number]

export interface GivenSpectrum {
  /** By rising period, two at least. */
  readonly points: readonly SpectrumPoint[]
  readonly damping: Value
  readonly combination: Combination
  /** Base shears of a static calculation, to which the modal ones are raised. */
  readonly static: { readonly x?: Value; readonly y?: Value }
  /** The share of them that is asked for. */
  readonly share: Value
  readonly block: Block
}

export const periodOf = sym('T', 'T', 'period')
export const accelerationOf = sym('S_a', 'S_a', 'number')
const damping = sym('zeta', '\\zeta', 'share')
export const shareOf = sym('p', 'p', 'share')
export const staticOf = { x: sym('V_sx', 'V_{s,x}', 'force'), y: sym('V_sy', 'V_{s,y}', 'force') }

export const spectrumColumns: ColumnRules = { needed: ['period', 'acceleration'], optional: [] }
export const spectrumSettings: readonly string[] = ['damping', 'combination', 'static x', 'static y', 'share']

export function readSpectrum([block, second]: readonly Block[], scope: Scope): Result<GivenSpectrum | undefined> {
  if (!block) return good(undefined)
  if (second)
    return bad([
      diagnose('error', 'spectrum-repeated', second.info, 'the spectrum is given twice', 'Put it in one table.', {
        also: [{ span: block.info, text: 'first here' }],
      }),
    ])
  const strange = [...strangeSettings(block, spectrumSettings), ...strangeLines(block)]
  const records = recordsOf(block, spectrumColumns)
  if (!records.ok || strange.length > 0) return bad([...strange, ...(records.ok ? [] : records.because)])
  const points = all(records.value.map((record, i) => readPoint(record, i, scope)))
  const statics = all((['x', 'y'] as const).flatMap(axis => readStatic(block, axis, scope)))
  // Without a static base shear no share of it is taken, and nothing is to be said of it.
  const quiet: Scope = statics.ok && statics.value.length > 0 ? scope : { ...scope, assume: () => {} }
  const shares = all([
    readShare(block, 'damping', 'spectrum.damping', 0.05, 'a damping of 5%, as most standards have it', scope),
    readShare(
      block,
      'share',
      'spectrum.share',
      1,
      'all of the static base shear, as ASCE 7-16 12.9.1.4 asks (unchecked)',
      quiet,
    ),
  ])
  const combination = readCombination(settingOf(block, 'combination'))
  const order = points.ok ? risingFault(points.value, block) : []
  const faults = [points, shares, statics, combination].flatMap(part => (part.ok ? [] : part.because))
  if (!points.ok || !shares.ok || !statics.ok || !combination.ok || order.length > 0) return bad([...order, ...faults])
  const [zeta, share] = shares.value
  if (!zeta || !share) throw new Error('a spectrum has a damping and a share')
  const [x, y] = (['x', 'y'] as const).map(axis => statics.value.find(({ id }) => id === `spectrum.static.${axis}`))
  return good({
    points: points.value,
    damping: zeta,
    combination: combination.value,
    static: { ...(x ? { x } : {}), ...(y ? { y } : {}) },
    share,
    block,
  })
}

function readPoint(record: RowOf, i: number, scope: Scope): Result<SpectrumPoint> {
  const [period, acceleration] = [filled(record, 'period'), filled(record, 'acceleration')]
  if (!period.ok) return period
  if (!acceleration.ok) return acceleration
  const at = String(i + 1)
  const unit = record.unit('period')
  const T = quantity(
    period.value,
    { id: `spectrum.${at}.T`, what: 'period', sym: periodOf, tex: texAbout('T', at), ...(unit ? { unit } : {}) },
    scope,
  )
  const S = quantity(
    acceleration.value,
    { id: `spectrum.${at}.S`, what: 'acceleration', sym: accelerationOf, tex: texAbout('S', at) },
    scope,
  )
  const [okT, okS] = [
    notBelowZero(T, period.value, 'a period'),
    aboveZero(S, acceleration.value.span, 'an acceleration'),
  ]
  if (!okT.ok) return okT
  return okS.ok ? good({ T: okT.value, S: okS.value }) : okS
}

function notBelowZero(value: Result<Value>, cell: Text, what: string): Result<Value> {
  if (!value.ok || value.value.si >= 0) return value
  return bad([diagnose('error', 'size-not-positive', cell.span, `${what} is below zero`, 'Start at 0 s.')])
}

function risingFault(points: readonly SpectrumPoint[], block: Block): readonly Diagnostic[] {
  const rises = points.every(({ T }, i) => i === 0 || T.si > (points[i - 1]?.T.si ?? 0))
  if (rises && points.length > 1) return []
  return [
    diagnose(
      'error',
      'spectrum-order',
      block.table?.headerLine.span ?? block.info,
      'the periods of a spectrum rise from row to row, and there are two at least',
      'Put the rows in the order of their periods, each period once.',
    ),
  ]
}

function readShare(
  block: Block,
  name: string,
  id: string,
  usual: number,
  because: string,
  scope: Scope,
): Result<Value> {
  const cell = settingOf(block, name)
  const of = name === 'damping' ? damping : shareOf
  if (!cell) {
    const text = `The modal response takes ${because}.`
    scope.assume({ text, because: `${name} is not stated in the block spectrum` })
    return good({
      id,
      tex: of.tex,
      si: usual,
      ...shownAs(of, scope.display),
      origin: { kind: 'default', assumption: text },
    })
  }
  const value = aboveZero(quantity(cell, { id, what: name, sym: of }, scope), cell.span, name)
  if (!value.ok || value.value.si <= 1) return value
  return bad([
    diagnose(
      'error',
      'share-out-of-range',
      cell.span,
      `${name} is ${cell.text}; it is a share up to 100%`,
      'Write 5%, not 5.',
    ),
  ])
}

function readStatic(block: Block, axis: 'x' | 'y', scope: Scope): readonly Result<Value>[] {
  const cell = settingOf(block, `static ${axis}`)
  if (!cell) return []
  const want = { id: `spectrum.static.${axis}`, what: `static ${axis}`, sym: staticOf[axis] }
  return [aboveZero(quantity(cell, want, scope), cell.span, `the static base shear along ${axis}`)]
}

function readCombination(cell: Text | undefined): Result<Combination> {
  if (!cell) return good('CQC')
  if (cell.text === 'CQC' || cell.text === 'SRSS') return good(cell.text)
  return bad([
    diagnose(
      'error',
      'unknown-combination',
      cell.span,
      `combination cannot be ${cell.text}`,
      'Write combination: CQC (complete quadratic) or combination: SRSS (root of the sum of squares, for periods far apart).',
    ),
  ])
}
