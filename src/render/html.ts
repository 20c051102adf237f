/** The page: one HTML file that needs nothing beside it. */
import type { Source } from '../base/span.ts'
import type { TitleBlock } from '../explain/sheet.ts'
import type { Traced } from '../explain/traced.ts'
import { escapeHtml } from './escape.ts'
import { bodyHtml } from './html-body.ts'
import { marksOf, noMarks } from './html-marks.ts'
import { bannerHtml, plateHtml } from './html-plate.ts'
import { type Styled, styleOf } from './html-style.ts'
import { CAUTION, markOf } from './imprint.ts'
import { islandHtml } from './island.ts'
import { createTypesetter, type ShapeCache } from './typeset.ts'

export interface Page extends Styled {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Shapes set by earlier pages; without it every shape is set afresh. */
  readonly shapes?: ShapeCache
  /** Where the numbers came from; without it the page has no script. */
  readonly traced?: Traced
}

export function renderHtml(page: Page): string {
  const { sheet, asset, traced } = page
  const { titleBlock, language } = sheet
  const typesetter = createTypesetter(page.shapes)
  const body = bodyHtml(page.body, {
    typesetter,
    source: page.source,
    level: 2,
    marks: traced ? marksOf(traced) : noMarks,
  })
  const trace = traced ? islandHtml(traced, typesetter, asset('trace.js')) : ''
  return fillTemplate(asset('sheet.html'), {
    language,
    title: escapeHtml(documentTitle(titleBlock)),
    generator: escapeHtml(`Platemark ${sheet.version}`),
    style: styleOf(page, typesetter.classes()),
    banner: bannerHtml(sheet),
    plate: plateHtml(titleBlock),
    body,
    scripts: traced ? `'${asset('trace.hash')}'` : "'none'",
    trace,
    mark: escapeHtml(markOf(sheet)),
    caution: CAUTION,
  })
}

/** Puts the fields in place in one pass, so that nothing put in is read as a field again. */
function fillTemplate(template: string, fields: Readonly<Record<string, string>>): string {
  return template.replace(/\{\{(\w+)\}\}/g, (_, name: string) => {
    const value = fields[name]
    if (value === undefined) throw new Error(`the template asks for an unknown field: ${name}`)
    return value
  })
}

const documentTitle = ({ title, project, number }: TitleBlock): string =>
  [title, project, number].filter(part => part !== '').join(' – ') || 'Calculation'
