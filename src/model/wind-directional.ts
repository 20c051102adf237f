/** The settings of the directional procedure of ASCE 7 for the main wind-force resisting system. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { type Sym, sym } from '../base/formula.ts'
import { unitOfKind } from '../base/kind.ts'
import { verbatim } from '../base/language.ts'
import { type Result, together } from '../base/ledger.ts'
import { inWords, suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Value } from '../base/value.ts'
import type { Block } from '../read/block.ts'
import { diagnose, type Text } from '../read/text.ts'
import { aboveZero, quantity } from './cell.ts'
import { settingOf, strangeLines, strangeSettings } from './columns.ts'
import type { Scope } from './scope.ts'
import type { WindAround } from './wind.ts'
import { type Edition, type FigureCase, readFigureCases } from './wind-cases.ts'

export type Exposure = 'B' | 'C' | 'D'
export type Enclosure = 'enclosed' | 'partially enclosed'
export type Roof =
  | { readonly kind: 'flat'; readonly parapet?: Value }
  | { readonly kind: 'gable'; readonly slope: Value; readonly ridge: 'x' | 'y' }

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

const exposures: readonly Exposure[] = ['B', 'C', 'D']

const letters = {
  V: sym('V', 'V', 'speed'),
  K_d: sym('K_d', 'K_d', 'number'),
  K_zt: sym('K_zt', 'K_{zt}', 'number'),
  K_e: sym('K_e', 'K_e', 'number'),
  G: sym('G', 'G', 'number'),
  h: sym('h', 'h', 'length'),
  ground: sym('z_e', 'z_e', 'length'),
  slope: sym('theta', '\\theta', 'angle'),
  parapet: sym('h_p', 'h_p', 'length'),
} satisfies Record<string, Sym>

export function readDirectional(block: Block, around: WindAround, scope: Scope): Result<DirectionalWind> {
  const faults: readonly Diagnostic[] = [
    ...strangeSettings(block, [
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
    ]),
    ...strangeLines(block),
  ]
  const parts = together({
    edition: editionOf(block, around),
    V: needed(block, 'V', letters.V, 'Write V: 115 mph.', scope),
    exposure: choice(block, 'exposure', exposures),
    Kd: factor(
      block,
      'K_d',
      letters.K_d,
      0.85,
      'K_d is 0.85, that of a building.',
      'ASCE 7 Table 26.6-1 (unchecked)',
      scope,
    ),
    Kzt: factor(
      block,
      'K_zt',
      letters.K_zt,
      1,
      'No hill, ridge or escarpment speeds the wind up: K_zt is 1.',
      'ASCE 7 26.8 (unchecked)',
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

function needed(block: Block, name: keyof typeof letters, of: Sym, help: string, scope: Scope): Result<Value> {
  const found = optional(block, name, of, scope)
  if (!found.ok) return found
  return found.value ? good(found.value) : bad([missing(block, name, help)])
}

const missing = (block: Block, name: string, help: string): Diagnostic =>
  diagnose('error', 'setting-missing', block.info, `wind has no ${name}`, help)

function optional(block: Block, name: string, of: Sym, scope: Scope, id = name): Result<Value | undefined> {
  const cell = settingOf(block, name)
  if (!cell) return good(undefined)
  const value = quantity(cell, { id: `wind.${id}`, what: name, sym: of }, scope)
  return aboveZero(value, cell.span, name)
}

/** A pure factor, stated or taken. */
function factor(
  block: Block,
  name: string,
  of: Sym,
  usual: number,
  text: string,
  because: string,
  scope: Scope,
): Result<Value> {
  const stated = optional(block, name, of, scope)
  if (!stated.ok) return stated
  return good(stated.value ?? taken(name, of, usual, text, because, scope))
}

function taken(name: string, of: Sym, si: number, text: string, because: string, scope: Scope): Value {
  scope.assume({ text, because: `${name} is not stated; ${because}` })
  return {
    id: `wind.${name}`,
    tex: of.tex,
    si,
    unit: unitOfKind(of.kind, scope.display),
    rounding: 0,
    origin: { kind: 'default', assumption: text },
  }
}

function choice<T extends string>(block: Block, name: string, words: readonly T[]): Result<T> {
  const cell = settingOf(block, name)
  if (!cell) return bad([missing(block, name, `Write ${name}: ${inWords(words, 'or')}.`)])
  const found = words.find(word => word === cell.text)
  return found !== undefined ? good(found) : bad([unknown(name, cell, words)])
}

const unknown = (name: string, { text, span }: Text, words: readonly string[]): Diagnostic =>
  diagnose('error', 'wind-choice', span, `${name} cannot be ${text}`, suggestion(text, words, name))

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
    'K_e',
    letters.K_e,
    1,
    'K_e is 1, as at sea level.',
    'ASCE 7 26.9 permits it at every elevation (unchecked)',
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
  return factor(block, 'G', letters.G, 0.85, rigid.text, rigid.because, scope)
}

/** The steepest roof for which the figure lists coefficients one by one. */
const STEEPEST = Math.PI / 3

function readRoof(block: Block, scope: Scope): Result<Roof> {
  const cell = settingOf(block, 'roof')
  if (!cell) return bad([missing(block, 'roof', 'Write roof: flat, or roof: gable with slope: and ridge:.')])
  const shapes = ['flat', 'gable']
  if (cell.text === 'hip' || cell.text === 'monoslope' || cell.text === 'mansard')
    return bad([
      diagnose(
        'error',
        'wind-not-covered',
        cell.span,
        `a roof that is ${cell.text} is not covered`,
        'Flat and gable roofs are. Work the pressures of another roof and state them, or add its part to stated forces.',
      ),
    ])
  if (!shapes.includes(cell.text)) return bad([unknown('roof', cell, shapes)])
  const parapet = optional(block, 'parapet', letters.parapet, scope)
  if (cell.text === 'flat') {
    const odd = ['slope', 'ridge'].flatMap(name => block.settings.filter(setting => setting.name.text === name))
    const [first] = odd
    if (first)
      return bad([
        diagnose(
          'error',
          'wind-roof-settings',
          first.name.span,
          `a flat roof has no ${first.name.text}`,
          'Write roof: gable, or leave it out.',
        ),
      ])
    if (!parapet.ok) return parapet
    return good({ kind: 'flat', ...(parapet.value ? { parapet: parapet.value } : {}) })
  }
  const stated = settingOf(block, 'parapet')
  if (stated)
    return bad([
      diagnose(
        'error',
        'wind-roof-settings',
        stated.span,
        'a parapet is worked with a flat roof only',
        'Leave it out here, and add its force to stated ones.',
      ),
    ])
  const parts = together({ slope: readSlope(block, scope), ridge: readRidge(block) })
  return parts.ok ? good({ kind: 'gable', ...parts.value }) : parts
}

function readRidge(block: Block): Result<'x' | 'y'> {
  const cell = settingOf(block, 'ridge')
  if (!cell)
    return bad([missing(block, 'ridge', 'A gable roof needs its direction: ridge: along x or ridge: along y.')])
  const found = /^(?:along )?([xy])$/.exec(cell.text)?.[1]
  if (found === 'x' || found === 'y') return good(found)
  return bad([unknown('ridge', cell, ['along x', 'along y'])])
}

function readSlope(block: Block, scope: Scope): Result<Value> {
  const cell = settingOf(block, 'slope')
  if (!cell) return bad([missing(block, 'slope', 'A gable roof needs its angle: slope: 18.4 deg.')])
  const value = quantity(cell, { id: 'wind.slope', what: 'slope', sym: letters.slope }, scope)
  if (!value.ok) return value
  // A bare number might be an angle in any unit, or a rise over a run.
  if (!/deg|°|rad/.test(cell.text) && value.value.origin.kind === 'given')
    return bad([
      diagnose(
        'error',
        'unit-missing',
        cell.span,
        'slope has no unit; it must be an angle',
        `Write an angle such as 18.4 deg. A rise of 4 in a run of 12 is atan(4/12) * (1 rad).`,
      ),
    ])
  const { si } = value.value
  if (si > 0 && si <= STEEPEST + 1e-9) return value
  return bad([
    diagnose(
      'error',
      'wind-slope-out-of-range',
      cell.span,
      `slope is ${verbatim(cell.text)}; a gable is worked from above 0 to 60 deg`,
      'Write roof: flat where there is none.',
    ),
  ])
}
