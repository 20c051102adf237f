/** The page: one HTML file that needs nothing beside it. */
import type { Source } from '../base/span.ts'
import type { TitleBlock } from '../explain/sheet.ts'
import { escapeHtml } from './escape.ts'
import { bodyBlocks } from './html-body.ts'
import { bannerHtml, plateHtml } from './html-plate.ts'
import { type Styled, styleOf } from './html-style.ts'
import { CAUTION, markOf } from './imprint.ts'
import type { Medium } from './medium.ts'
import { createTypesetter, type ShapeCache } from './typeset.ts'

export interface Page extends Styled {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Shapes set by earlier pages; without it every shape is set afresh. */
  readonly shapes?: ShapeCache
}

export function renderHtml(page: Page): string {
  const { template, fields, blocks } = layOut(page, 'screen')
  return fillTemplate(template, { ...fields, body: blocks.join('\n') })
}

/** A page before its body is put in. */
export interface LaidOut {
  readonly template: string
  /** Every field of the template but the body. */
  readonly fields: Readonly<Record<string, string>>
  /** The body in order: an element or a list each. */
  readonly blocks: readonly string[]
}

export function layOut(page: Page, medium: Medium): LaidOut {
  const { sheet, asset } = page
  const { titleBlock, language } = sheet
  const typesetter = createTypesetter(page.shapes)
  const blocks = bodyBlocks(page.body, { typesetter, source: page.source, level: 2, medium })
  const fields = {
    language,
    title: escapeHtml(documentTitle(titleBlock)),
    generator: escapeHtml(`Platemark ${sheet.version}`),
    style: styleOf(page, typesetter.classes(), medium),
    banner: bannerHtml(sheet),
    plate: plateHtml(titleBlock),
    mark: escapeHtml(markOf(sheet)),
    caution: CAUTION,
  }
  return { template: asset('sheet.html'), fields, blocks }
}

/** Puts the fields in place in one pass, so that nothing put in is read as a field again. */
export function fillTemplate(template: string, fields: Readonly<Record<string, string>>): string {
  return template.replace(/\{\{(\w+)\}\}/g, (_, name: string) => {
    const value = fields[name]
    if (value === undefined) throw new Error(`the template asks for an unknown field: ${name}`)
    return value
  })
}

export const documentTitle = ({ title, project, number }: TitleBlock): string =>
  [title, project, number].filter(part => part !== '').join(' – ') || 'Calculation'
