/** The editor's table of what stands where is that of the model. */
import { expect, test } from 'vitest'
import { everyWant, WHOLE, WHOLE_SEISMIC, workingSettings } from '../../src/explain/request.ts'
import { columnOf, grammar, wantSays } from '../../src/lsp/grammar.ts'
import { seismicNames } from '../../src/lsp/seismic-fields.ts'
import { areaColumns } from '../../src/model/areas.ts'
import type { ColumnRules } from '../../src/model/columns.ts'
import { commonSettings, materials } from '../../src/model/construction.ts'
import { forceColumns, forceSettings, forceTableSettings } from '../../src/model/forces.ts'
import { gridSettings } from '../../src/model/grid.ts'
import { levelColumns, levelSettings } from '../../src/model/levels.ts'
import { lineColumns, pointColumns } from '../../src/model/loads.ts'
import { openingColumns } from '../../src/model/openings.ts'
import { spectrumColumns, spectrumSettings } from '../../src/model/spectrum.ts'
import { wallColumns } from '../../src/model/walls.ts'
import { directionalSettings } from '../../src/model/wind-directional.ts'
import { statedWindColumns, statedWindSettings } from '../../src/model/wind-stated.ts'
import { type Topic, topics } from '../../src/read/topics.ts'

const columns: Readonly<Partial<Record<Topic, ColumnRules>>> = {
  levels: levelColumns,
  areas: areaColumns,
  'line-loads': lineColumns,
  'point-loads': pointColumns,
  walls: wallColumns,
  openings: openingColumns,
  forces: forceColumns,
  wind: statedWindColumns,
  spectrum: spectrumColumns,
}
const settings: Readonly<Partial<Record<Topic, readonly string[]>>> = {
  grid: gridSettings,
  levels: levelSettings,
  construction: [...commonSettings, ...Object.values(materials).flatMap(each => [...each.needed, ...each.optional])],
  seismic: seismicNames,
  spectrum: spectrumSettings,
  wind: [...directionalSettings, ...statedWindSettings],
  forces: [...forceSettings, ...forceTableSettings],
  working: workingSettings,
}

test.each(topics)('%s has the columns and settings that the model reads, and a sentence about each', topic => {
  const { says, columns: told, settings: set } = grammar[topic]
  const { needed, optional } = columns[topic] ?? { needed: [], optional: [] }
  expect(Object.keys(told).toSorted()).toEqual([...needed, ...optional].toSorted())
  expect(Object.keys(set).toSorted()).toEqual([...new Set(settings[topic] ?? [])].toSorted())
  for (const sentence of [says, ...Object.values({ ...told, ...set }).map(each => each.says)])
    expect(sentence).toMatch(/^[A-Z].+\.$/)
})

test('every part that a working may ask for is told of', () => {
  expect(Object.keys(wantSays).toSorted()).toEqual([WHOLE, WHOLE_SEISMIC, ...everyWant].toSorted())
})

test('a word that an object has of itself is no column', () => {
  expect(columnOf('walls', 'constructor')).toBeUndefined()
})
