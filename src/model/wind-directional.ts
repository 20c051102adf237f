/** The settings of the directional procedure of ASCE 7 for the main wind-force resisting system. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { type Result, together } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { quantity } from './cell.ts'
import { settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'
import type { WindAround } from './wind.ts'
import { type Edition, type FigureCase, readFigureCases } from './wind-cases.ts'
import { type Roof, readRoof } from './wind-roof.ts'
import { choice, factor, letters, needed, optional, unknown } from './wind-settings.ts'

export type Exposure = 'B' | 'C' | 'D'
export type Enclosure = 'enclosed' | 'partially enclosed'

export interface DirectionalWind {
  readonly kind: 'directional'
  readonly edition: Edition
  readonly V: Value
  readonly exposure: Exposure
  readonly Kd: Value
  readonly Kzt: Value
  /** Ground elevation factor, or the elevation above sea level that it follows from. */
  readonly ground: { readonly Ke: Value } | { readonly elevation: Value }
  readonly enclosure: Enclosure
  readonly G: Value
  readonly roof: Roof
  /** Mean roof height, where it is stated. */
  readonly h?: Value
  /** The cases of the figure that are worked. */
  readonly cases: readonly FigureCase[]
  readonly span: Text['span']
}

export const directionalSettings: readonly string[] = [
  'standard',
  'V',
  'exposure',
  'K_d',
  'K_zt',
  'K_e',
  'ground elevation',
  'enclosure',
  'building',
  'G',
  'roof',
  'slope',
  'ridge',
  'parapet',
  'h',
  'cases',
]

export const exposures: readonly Exposure[] = ['B', 'C', 'D']

export function readDirectional(block: Block, around: WindAround, scope: Scope): Result<DirectionalWind> {
  const faults: readonly Diagnostic[] = [...strangeSettings(block, directionalSettings), ...strangeLines(block)]
  const parts = together({
    edition: editionOf(block, around),
    V: needed(block, 'V', letters.V, 'Write V: 115 mph.', scope),
    exposure: choice(block, 'exposure', exposures),
    Kd: factor(
      block,
      {
        name: 'K_d',
        of: letters.K_d,
        si: 0.85,
        text: 'K_d is 0.85, that of a building.',
        because: 'ASCE 7 Table 26.6-1 (unchecked)',
      },
      scope,
    ),
    Kzt: factor(
      block,
      {
        name: 'K_zt',
        of: letters.K_zt,
        si: 1,
        text: 'No hill, ridge or escarpment speeds the wind up: K_zt is 1.',
        because: 'ASCE 7 26.8 (unchecked)',
      },
      scope,
    ),
    ground: readGround(block, scope),
    enclosure: readEnclosure(block, scope),
    G: readGust(block, scope),
    roof: readRoof(block, scope),
    h: optional(block, 'h', letters.h, scope),
    cases: readFigureCases(block, scope),
  })
  if (faults.length > 0 || !parts.ok) return bad([...faults, ...(parts.ok ? [] : parts.because)])
  const { h, ...rest } = parts.value
  return good({ kind: 'directional', ...rest, ...(h ? { h } : {}), span: block.info })
}

/** The procedure is worked for these editions, and for no other standard: said, not guessed. */
function editionOf(block: Block, { standard }: WindAround): Result<Edition> {
  const own = settingOf(block, 'standard')
  const written = own?.text ?? standard
  const found = /^ASCE(?:\/SEI)? (7-16|7-22)\b/.exec(written)?.[1]
  if (found === '7-16' || found === '7-22') return good(found)
  return bad([
    diagnose(
      'error',
      'wind-standard',
      own?.span ?? block.info,
      written === ''
        ? 'the directional procedure needs a standard, and none is stated'
        : `the directional procedure is worked by ASCE 7-16 and ASCE 7-22, not by ${written}`,
      'Write standard: ASCE 7-22 in the front matter or in this block. For any other standard work its pressures and state them: windward: 0.9 kPa, leeward: 0.5 kPa.',
    ),
  ])
}

/** K_e may always be 1, which is on the safe side above sea level. */
function readGround(block: Block, scope: Scope): Result<DirectionalWind['ground']> {
  const [stated, ground] = [settingOf(block, 'K_e'), settingOf(block, 'ground elevation')]
  if (stated && ground)
    return bad([
      diagnose(
        'error',
        'wind-ground-twice',
        ground.span,
        'K_e is stated, and the ground elevation too',
        'Keep one of them: K_e follows from the elevation.',
        {
          also: [{ span: stated.span, text: 'stated here' }],
        },
      ),
    ])
  if (ground) {
    const elevation = quantity(ground, { id: 'wind.ground', what: 'ground elevation', sym: letters.ground }, scope)
    return elevation.ok ? good({ elevation: elevation.value }) : elevation
  }
  const Ke = factor(
    block,
    {
      name: 'K_e',
      of: letters.K_e,
      si: 1,
      text: 'K_e is 1, as at sea level.',
      because: 'ASCE 7 26.9 permits it at every elevation (unchecked)',
    },
    scope,
  )
  return Ke.ok ? good({ Ke: Ke.value }) : Ke
}

function readEnclosure(block: Block, scope: Scope): Result<Enclosure> {
  const cell = settingOf(block, 'enclosure')
  if (!cell) {
    scope.assume({
      text: 'The building is enclosed. Internal pressure does not change the forces on its storeys.',
      because: 'enclosure is not stated',
    })
    return good('enclosed')
  }
  if (cell.text === 'enclosed') return good('enclosed')
  if (cell.text === 'partially enclosed' || cell.text === 'partly enclosed') return good('partially enclosed')
  const open = cell.text === 'open' || cell.text === 'partially open'
  return bad([
    open
      ? diagnose(
          'error',
          'wind-not-covered',
          cell.span,
          `a building that is ${cell.text} is not covered`,
          'Work its pressures by the chapter that covers it, and state them: windward and leeward.',
        )
      : unknown('enclosure', cell, ['enclosed', 'partially enclosed']),
  ])
}

function readGust(block: Block, scope: Scope): Result<Value> {
  const building = settingOf(block, 'building')
  if (building && building.text !== 'rigid') {
    return bad([
      building.text === 'flexible'
        ? diagnose(
            'error',
            'wind-not-covered',
            building.span,
            'a building that is flexible under wind is not covered',
            'Its gust-effect factor and eccentricity follow from its dynamics (ASCE 7 26.11.5). Work its pressures and state them: windward and leeward.',
          )
        : unknown('building', building, ['rigid']),
    ])
  }
  const rigid = building
    ? { text: 'The gust-effect factor G is 0.85, that of a rigid building.', because: 'ASCE 7 26.11.4 (unchecked)' }
    : {
        text: 'The building is rigid under wind, with a natural frequency of 1 Hz or more, and its gust-effect factor G is 0.85.',
        because: 'ASCE 7 26.11.4 (unchecked)',
      }
  return factor(block, { name: 'G', of: letters.G, si: 0.85, text: rigid.text, because: rigid.because }, scope)
}
