/** The page: one HTML file that needs nothing beside it. */
import type { Source } from '../base/span.ts'
import type { Sheet, TitleBlock } from '../explain/sheet.ts'
import type { Traced } from '../explain/traced.ts'
import { escapeHtml, pageText } from './escape.ts'
import { bodyBlocks } from './html-body.ts'
import { marksOf, noMarks } from './html-marks.ts'
import type { Setting } from './html-parts.ts'
import { bannerHtml, coverHtml, logoHtml, plateHtml } from './html-plate.ts'
import { contentsHtml, criteriaHtml, revisionsHtml, summaryHtml } from './html-preface.ts'
import { type Styled, styleOf } from './html-style.ts'
import { CAUTION, markOf } from './imprint.ts'
import { islandHtml } from './island.ts'
import type { Medium } from './medium.ts'
import { filled, fillTemplate } from './template.ts'
import { createTypesetter, type ShapeCache } from './typeset.ts'

export interface Page extends Styled {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Shapes set by earlier pages; without it every shape is set afresh. */
  readonly shapes?: ShapeCache
  /** What the page's panel tells of its numbers; without it the page has no script. */
  readonly traced?: Traced
}

export function renderHtml(page: Page): string {
  const { firstPage, blocks } = layOut(page, 'screen')
  return firstPage(blocks.join('\n'))
}

/** A page before its body is put in. */
export interface LaidOut {
  readonly firstPage: (body: string) => string
  /** The same page without what stands around the body. */
  readonly laterPage: (body: string) => string
  /** The body in order: an element or a list each. */
  readonly blocks: readonly string[]
}

/** Paper has no script: nobody clicks on it. */
export function layOut(page: Page, medium: Medium): LaidOut {
  const { sheet, asset } = page
  const { titleBlock, language } = sheet
  const traced = medium === 'screen' ? page.traced : undefined
  const typesetter = createTypesetter(page.shapes)
  const marks = traced ? marksOf(traced) : noMarks
  const setting: Setting = { typesetter, source: page.source, level: 2, marks, medium }
  const blocks = bodyBlocks(page.body, setting)
  const around = {
    ...escaped(titleBlock),
    banner: bannerHtml(sheet),
    logo: logoHtml(sheet),
    plate: plateOf(sheet, setting),
    preface: prefaceOf(sheet, setting),
    mark: escapeHtml(markOf(sheet)),
    caution: CAUTION,
  }
  const parts = {
    language,
    title: escapeHtml(documentTitle(titleBlock)),
    generator: escapeHtml(`Platemark ${sheet.version}`),
    scripts: traced ? `'${asset('trace.hash')}'` : "'none'",
    trace: traced ? islandHtml(traced, typesetter, asset('trace.js')) : '',
    style: styleOf(page, typesetter.classes(), medium),
  }
  const template = sheet.template.html ?? asset('sheet.html')
  const pageWith = (place: 'first' | 'later', fields: typeof around) => (body: string) =>
    fillPage(asset('page.html'), { ...parts, place, sheet: fillTemplate(template, { ...fields, body }) })
  return {
    firstPage: pageWith('first', around),
    laterPage: pageWith('later', { ...around, banner: '', plate: '', preface: '' }),
    blocks,
  }
}

const prefaceOf = ({ preface, cover }: Sheet, setting: Setting): string =>
  [summaryHtml(preface, setting), contentsHtml(preface), cover ? '' : revisionsHtml(preface)].join('\n')

function plateOf(sheet: Sheet, setting: Setting): string {
  const logo = logoHtml(sheet)
  if (!sheet.cover) return plateHtml(sheet.titleBlock, logo)
  return coverHtml(
    sheet,
    logo,
    criteriaHtml(sheet.preface, setting) + revisionsHtml(sheet.preface),
    CAUTION,
    escapeHtml(markOf(sheet)),
  )
}

const escaped = (block: TitleBlock): TitleBlock => ({
  title: pageText(block.title),
  project: pageText(block.project),
  location: pageText(block.location),
  number: pageText(block.number),
  revision: pageText(block.revision),
  date: pageText(block.date),
  by: pageText(block.by),
  checked: pageText(block.checked),
  standard: pageText(block.standard),
})

/** Puts the parts in place in one pass, so that nothing put in is read as a part again. */
const fillPage = (page: string, parts: Readonly<Record<string, string>>): string =>
  filled(page, (_, name) => {
    const part = parts[name]
    if (part === undefined) throw new Error(`the page asks for an unknown part: ${name}`)
    return part
  })

export const documentTitle = ({ title, project, number }: TitleBlock): string =>
  [title, project, number].filter(part => part !== '').join(' – ') || 'Calculation'
