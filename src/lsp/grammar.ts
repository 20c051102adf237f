/**
 * What stands where in a block, and one sentence about each, for an editor that asks. Which columns and settings there are
 * is the model's to say; `tests/lsp/grammar.test.ts` holds this table to its lists.
 */
import type { Kind } from '../base/kind.ts'
import { casesOf } from '../compute/cases.ts'
import { type AnyWant, details, type WHOLE, type WHOLE_SEISMIC } from '../explain/request.ts'
import { endsWords, materials } from '../model/construction.ts'
import { levelWalls } from '../model/levels.ts'
import { combinations } from '../model/spectrum.ts'
import { exposures } from '../model/wind-directional.ts'
import type { Topic } from '../read/topics.ts'
import { seismicFields } from './seismic-fields.ts'

/** What a cell, or the text behind a setting, is. */
export type Holds =
  /** The name of what its row states. */
  | { readonly kind: 'own' }
  | { readonly kind: 'level' | 'wall' | 'construction' | 'point' | 'points' | 'text' }
  /** Names of grid lines with their positions. */
  | { readonly kind: 'lines' }
  /** Names of walls, separated by commas. */
  | { readonly kind: 'walls' }
  | { readonly kind: 'words'; readonly words: readonly string[] }
  /**
   * An expression. `id` is that of its value, where LEVEL, NAME and WALL stand for the block's level, the name that
   * the row or the block gives, and its cell `wall`. `words` may stand in its place.
   */
  | { readonly kind: 'value'; readonly of: Kind; readonly id: string; readonly words?: readonly string[] }

export interface Field {
  readonly says: string
  readonly holds: Holds
}

type Fields = Readonly<Record<string, Field>>

export interface TopicFields {
  readonly says: string
  readonly columns: Fields
  readonly settings: Fields
}

const field = (holds: Holds, says: string): Field => ({ says, holds })
const value = (of: Kind, id: string, says: string): Field => ({ says, holds: { kind: 'value', of, id } })
const words = (list: readonly string[], says: string): Field => ({ says, holds: { kind: 'words', words: list } })

const note = field({ kind: 'text' }, 'Yours: a note, printed with the row.')
const none: Fields = {}

/** @param of the head of a pressure's id: the level's of a row, or that of the whole building */
function pressures(of: string): Fields {
  const sides = ['windward', 'leeward'].flatMap(side => ['', ' x', ' y'].map(axis => ({ side, axis })))
  return Object.fromEntries(
    sides.map(({ side, axis }) => [
      `${side}${axis}`,
      value(
        'areaLoad',
        `${of}.${side}.${axis.trim() || 'x'}`,
        `Pressure on the ${side} walls${axis && `, wind along${axis}`}.`,
      ),
    ]),
  )
}

export const grammar: Readonly<Record<Topic, TopicFields>> = {
  grid: {
    says: 'The grid lines, by which points of the plan are named.',
    columns: none,
    settings: {
      x: field({ kind: 'lines' }, 'Lines across the plan: name and position, separated by commas.'),
      y: field({ kind: 'lines' }, 'Lines along the plan: name and position, separated by commas.'),
      north: value('angle', 'grid.north', 'Direction of north as an angle from x, for the north point of the sketch.'),
    },
  },
  levels: {
    says: 'The levels and their elevations; needed only where there are several.',
    columns: {
      level: field({ kind: 'own' }, 'Name of the level.'),
      elevation: value('length', 'NAME.elevation', 'Elevation of its diaphragm above the base, which is 0.'),
    },
    settings: { walls: words(levelWalls, 'How walls of one name on successive levels are worked.') },
  },
  areas: {
    says: 'The plan of a level and its loads, and its openings.',
    columns: {
      area: field({ kind: 'own' }, 'Name of the area.'),
      from: field({ kind: 'point' }, 'A corner of a rectangle.'),
      to: field({ kind: 'point' }, 'The corner opposite to from.'),
      outline: field(
        { kind: 'points' },
        'Instead of two corners: three points or more, in either direction of turning.',
      ),
      load: {
        says: 'Weight per area; or the word opening, which takes away whatever plan it covers.',
        holds: { kind: 'value', of: 'areaLoad', id: 'LEVEL.areas.NAME.w', words: ['opening'] },
      },
      variable: value(
        'areaLoad',
        'LEVEL.areas.NAME.variable',
        'Load per area that counts as weight in part: snow, storage, live load.',
      ),
      share: {
        says: 'How much of the variable load counts as weight: a percentage, or a word of the standard.',
        holds: { kind: 'value', of: 'share', id: 'LEVEL.areas.NAME.share', words: ['snow', 'storage', 'live'] },
      },
      note,
    },
    settings: none,
  },
  'line-loads': {
    says: 'Loads along lines of a level, such as walls and parapets.',
    columns: {
      line: field({ kind: 'own' }, 'Name of the line load.'),
      from: field({ kind: 'point' }, 'One end of the line.'),
      to: field({ kind: 'point' }, 'The other end of the line.'),
      load: value('lineLoad', 'LEVEL.lines.NAME.w', 'Weight per length.'),
      note,
    },
    settings: none,
  },
  'point-loads': {
    says: 'Loads at points of a level.',
    columns: {
      point: field({ kind: 'own' }, 'Name of the point load.'),
      at: field({ kind: 'point' }, 'Where it acts.'),
      load: value('force', 'LEVEL.points.NAME.W', 'A weight.'),
      note,
    },
    settings: none,
  },
  construction: {
    says: 'What walls are made of; its own name stands after the topic.',
    columns: none,
    settings: {
      material: words(Object.keys(materials), 'The material, which settles what else is needed.'),
      ends: words(endsWords, 'How its walls are held: cantilever, or fixed for both ends held.'),
      t: value('thickness', 'constructions.NAME.t', 'Thickness.'),
      E: value(
        'modulus',
        'constructions.NAME.E',
        'Modulus of elasticity; worked from the strength where it is left out.',
      ),
      G: value('modulus', 'constructions.NAME.G', 'Shear modulus; it comes before nu.'),
      nu: value('number', 'constructions.NAME.nu', "Poisson's ratio, from 0 to below 0.5."),
      "f'c": value('strength', "constructions.NAME.f'c", 'Strength of the concrete.'),
      "f'm": value('strength', "constructions.NAME.f'm", 'Strength of the masonry.'),
    },
  },
  walls: {
    says: 'The walls below a level: where they stand, how high they are and what gives them their stiffness.',
    columns: {
      wall: field({ kind: 'own' }, 'Name of the wall.'),
      from: field({ kind: 'point' }, 'The start of the wall; it may lie at any angle.'),
      to: field({ kind: 'point' }, 'The other end of the wall.'),
      height: value('length', 'LEVEL.wall.NAME.h', 'Clear height; needed with a construction.'),
      construction: field({ kind: 'construction' }, 'Name of its construction.'),
      k: value(
        'stiffness',
        'LEVEL.wall.NAME.k',
        'Instead of a construction: the stated stiffness of the wall, frame or brace along its own line.',
      ),
      strength: value('force', 'LEVEL.wall.NAME.strength', 'Its nominal strength along its line, for the redundancy.'),
      note,
    },
    settings: none,
  },
  openings: {
    says: 'Doors and windows in the walls of a level.',
    columns: {
      wall: field({ kind: 'wall' }, 'A wall of the level; it must have a height.'),
      opening: field({ kind: 'own' }, 'Name of the opening; two walls may each have a D1.'),
      left: value('length', 'LEVEL.wall.WALL.opening.NAME.left', "From the wall's start to its nearer jamb."),
      sill: value(
        'length',
        'LEVEL.wall.WALL.opening.NAME.sill',
        'From the foot of the wall to its lower edge; 0 for a door.',
      ),
      width: value('length', 'LEVEL.wall.WALL.opening.NAME.width', 'Its width along the wall.'),
      height: value('length', 'LEVEL.wall.WALL.opening.NAME.height', 'From its sill to its head.'),
      note,
    },
    settings: none,
  },
  forces: {
    says: 'The force that acts at a level, or a table of the forces of all levels.',
    columns: {
      level: field({ kind: 'level' }, 'A level.'),
      x: value('force', 'ROW.force.x', 'Force along x at the level.'),
      y: value('force', 'ROW.force.y', 'Force along y at the level.'),
    },
    settings: {
      x: value('force', 'LEVEL.force.x', 'Force along x at the level.'),
      y: value('force', 'LEVEL.force.y', 'Force along y at the level.'),
      accidental: value(
        'share',
        'LEVEL.accidental',
        'Share of the plan across the force by which the mass may be off, to either side.',
      ),
    },
  },
  seismic: {
    says: 'Site, risk and system, from which the forces of every level follow by the standard in the front matter.',
    columns: none,
    settings: seismicFields(),
  },
  wind: {
    says: 'Wind on the building: by the directional procedure of ASCE 7, or as pressures that are stated.',
    columns: { level: field({ kind: 'level' }, 'A level.'), ...pressures('ROW.wind') },
    settings: {
      standard: words(['ASCE 7-22', 'ASCE 7-16'], 'The standard, where it is not that of the front matter.'),
      V: value('speed', 'wind.V', 'Basic wind speed.'),
      exposure: words(exposures, 'The exposure category.'),
      K_d: value('number', 'wind.K_d', 'Directionality factor; 0.85 where it is left out.'),
      K_zt: value('number', 'wind.K_zt', 'Topographic factor; 1 where it is left out.'),
      K_e: value('number', 'wind.K_e', 'Ground elevation factor; 1 where it is left out.'),
      'ground elevation': value('length', 'wind.ground', 'Elevation of the ground above sea level, in place of K_e.'),
      enclosure: words(['enclosed', 'partially enclosed'], 'How the building is enclosed.'),
      building: words(['rigid'], 'That the building is rigid, as the procedure asks.'),
      G: value('number', 'wind.G', 'Gust-effect factor; 0.85 where it is left out.'),
      roof: words(['flat', 'gable'], 'Shape of the roof.'),
      slope: value('angle', 'wind.slope', 'Slope of a gable roof.'),
      ridge: words(['x', 'y'], 'The direction along which the ridge of a gable roof runs.'),
      parapet: value('length', 'wind.parapet', 'Height of the parapet above the roof.'),
      h: value('length', 'wind.h', 'Mean roof height; left out, it follows from the levels and the slope.'),
      cases: field({ kind: 'text' }, 'The wind load cases that are worked, as in 1, 2, 3, 4.'),
      eccentricity: value('share', 'wind.eccentricity', 'Share of the width by which stated wind is moved aside.'),
      ...pressures('wind'),
    },
  },
  spectrum: {
    says: 'Accelerations by period, to which the modes of vibration respond.',
    columns: {
      period: value('period', 'spectrum.NAME.T', 'Period, rising from row to row.'),
      acceleration: value('number', 'spectrum.NAME.S', 'Spectral acceleration, as a multiple of g.'),
    },
    settings: {
      damping: value('share', 'spectrum.damping', 'Damping of the modes; 5% where it is left out.'),
      combination: words(combinations, 'How the responses of the modes are put together.'),
      'static x': value('force', 'spectrum.static.x', 'Static base shear along x, to which the response is raised.'),
      'static y': value('force', 'spectrum.static.y', 'Static base shear along y, to which the response is raised.'),
      share: value('share', 'spectrum.share', 'The share of the static base shear that is asked for.'),
    },
  },
  equations: {
    says: 'Your own formulas, each printed in letters, with values put in, and with its result.',
    columns: none,
    settings: none,
  },
  working: {
    says: 'Asks for a part of the calculation and is replaced by it.',
    columns: none,
    settings: {
      detail: words(details, 'How much is worked: full, table or result.'),
      walls: field({ kind: 'walls' }, 'The walls to work in full, separated by commas.'),
      case: words(
        [...casesOf(['x', 'y']).map(({ name }) => name), 'all'],
        'The load case to show; where it is left out, the one that governs.',
      ),
    },
  },
}

/** What stands in a column or behind a setting; undefined where the topic has none of that name. */
export const columnOf = (topic: Topic, name: string): Field | undefined => own(grammar[topic].columns, name)
export const settingFieldOf = (topic: Topic, name: string): Field | undefined => own(grammar[topic].settings, name)

const own = (fields: Fields, name: string): Field | undefined =>
  Object.hasOwn(fields, name) ? fields[name] : undefined

/** What each part of the calculation is that a working may ask for. */
export const wantSays: Readonly<Record<AnyWant | typeof WHOLE | typeof WHOLE_SEISMIC, string>> = {
  'whole calculation': 'all parts of one level in order',
  plan: 'sketch of the level to scale',
  'centre of mass': 'weight, and where it acts',
  'polar moment': 'polar moment of the weight about the centre of mass',
  'wall stiffness': 'how the stiffness of each wall follows',
  'centre of rigidity': 'stiffness along x and y, its centre, and J',
  eccentricity: 'centre of mass less centre of rigidity',
  torsion: 'moment about the centre of rigidity in each case',
  'wall shears': 'direct and torsional shear of one case',
  'design shears': 'the largest shear of each wall over all cases',
  elevations: 'walls as they are seen, with openings and piers',
  displacement: 'displacement and rotation, and the largest at a corner',
  'displaced shape': 'sketch of the level as it moves',
  equilibrium: 'what acts against what resists, in each case',
  'storey shears': 'forces and shears of all levels',
  'seismic design': 'from ground motion to the forces of levels and diaphragms, in order',
  'design spectrum': 'ground motion, importance and design category',
  'base shear': 'period, coefficient and base shear of each direction',
  'storey forces': 'the base shear shared over the levels',
  'diaphragm forces': 'what the diaphragm of each level is designed for',
  'wind pressures': 'how the pressures of wind follow from its speed',
  'wind forces': 'what each level takes of the wind',
  'continuous walls': 'walls that run through the levels, solved together, down their height',
  'modes of vibration': 'periods, shapes, and the mass that takes part',
  'modal response': 'shears of the modes under the stated spectrum',
  redundancy: 'the storey without each of its walls in turn',
  standard: 'rules of the standard that are known here, with their clauses',
  criteria: 'what the calculation starts from',
  checks: 'every check, the largest ratio first',
  assumptions: 'what was taken because the document does not say',
  references: 'sources of the formulas that are printed',
}
