/** What a working asks for: words, a level, and options. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { toBritish } from '../base/language.ts'
import type { Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import { settingOf, strangeSettings } from '../model/columns.ts'
import type { Block } from '../read/block.ts'
import { diagnose, splitAt, type Text } from '../read/text.ts'

export const wants = [
  'plan',
  'centre of mass',
  'polar moment',
  'wall stiffness',
  'centre of rigidity',
  'eccentricity',
  'torsion',
  'wall shears',
  'design shears',
  'elevations',
  'displacement',
  'displaced shape',
  'equilibrium',
  'redundancy',
] as const

export type Want = (typeof wants)[number]

/** What tells of all levels at once; a level, where one is named, is worked in full. */
export const seismicWants = ['design spectrum', 'base shear', 'storey forces', 'diaphragm forces'] as const
export type SeismicWant = (typeof seismicWants)[number]
export const buildingWants = [
  'storey shears',
  ...seismicWants,
  'wind pressures',
  'wind forces',
  'continuous walls',
  'modes of vibration',
  'modal response',
] as const
export type BuildingWant = (typeof buildingWants)[number]

/** Lists of the whole document rather than of a level. */
export const documentWants = ['criteria', 'standard', 'checks', 'assumptions', 'references'] as const
export type DocumentWant = (typeof documentWants)[number]

/** All of a level in order; the displaced shape comes with the displacement, and redundancy is asked for by itself. */
export const WHOLE = 'whole calculation' as const
/** From hazard to forces, likewise. */
export const WHOLE_SEISMIC = 'seismic design' as const
const parts: readonly Want[] = wants.filter(want => want !== 'displaced shape' && want !== 'redundancy')

export type AnyWant = Want | BuildingWant | DocumentWant
export const everyWant: readonly AnyWant[] = [...wants, ...buildingWants, ...documentWants]

export const workingSettings: readonly string[] = ['detail', 'walls', 'case']
export const details = ['full', 'table', 'result'] as const
export type Detail = (typeof details)[number]

export interface Request {
  readonly wants: readonly AnyWant[]
  /** True when the parts need headings to tell them apart. */
  readonly whole: boolean
  readonly detail: Detail
  /** Walls to work in full; the governing one when left out. */
  readonly walls: readonly Text[]
  readonly caseName?: Text
  readonly at: Block['info']
}

export function readRequest(block: Block): Result<Request> {
  if (block.faults.length > 0) return bad(block.faults)
  const faults: Diagnostic[] = [...strangeSettings(block, workingSettings)]
  const found = block.lines.flatMap(line => splitAt(line, /[,;]/)).map(line => wantOf(line, faults))
  if (block.lines.length === 0)
    faults.push(
      diagnose(
        'error',
        'working-empty',
        block.info,
        'this working asks for nothing',
        `Name what it shows: ${[WHOLE, WHOLE_SEISMIC, ...everyWant].join(', ')}.`,
      ),
    )
  if (block.table)
    faults.push(
      diagnose(
        'error',
        'working-table',
        block.table.headerLine.span,
        'a working holds no table',
        'Put it in a given block.',
      ),
    )
  const detail = readDetail(settingOf(block, 'detail'), faults)
  const walls = settingOf(block, 'walls')
  const caseName = settingOf(block, 'case')
  if (faults.length > 0) return bad(faults)
  return good({
    wants: found.flat(),
    whole: found.some(({ length }) => length > 1),
    detail,
    walls: walls ? splitAt(walls, /,/).filter(({ text }) => text !== '') : [],
    ...(caseName ? { caseName } : {}),
    at: block.info,
  })
}

function wantOf(line: Text, faults: Diagnostic[]): readonly AnyWant[] {
  const words = toBritish(line.text.toLowerCase()).replace(/\s+/g, ' ')
  if (words === WHOLE) return parts
  if (words === WHOLE_SEISMIC) return seismicWants
  const known = everyWant.find(want => want === words)
  if (known) return [known]
  faults.push(
    diagnose(
      'error',
      'unknown-working',
      line.span,
      `${line.text} is not something that can be shown`,
      suggestion(words, [WHOLE, WHOLE_SEISMIC, ...everyWant], 'working'),
    ),
  )
  return []
}

function readDetail(setting: Text | undefined, faults: Diagnostic[]): Detail {
  if (!setting) return 'full'
  const found = details.find(detail => detail === setting.text)
  if (!found)
    faults.push(
      diagnose(
        'error',
        'unknown-detail',
        setting.span,
        `detail cannot be ${setting.text}`,
        `Write detail: ${details.join(' or detail: ')}.`,
      ),
    )
  return found ?? 'full'
}

export const isBuildingWant = (want: AnyWant): want is BuildingWant => buildingWants.some(other => other === want)

export const isDocumentWant = (want: AnyWant): want is DocumentWant => documentWants.some(other => other === want)
