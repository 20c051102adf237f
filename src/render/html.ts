/** The page: one HTML file that needs nothing beside it. */
import type { Source } from '../base/span.ts'
import type { Sheet, TitleBlock } from '../explain/sheet.ts'
import type { Traced } from '../explain/traced.ts'
import { escapeHtml, pageText } from './escape.ts'
import { bodyBlocks } from './html-body.ts'
import { type Marks, noMarks } from './html-marks.ts'
import type { Setting } from './html-parts.ts'
import { bannerHtml, coverHtml, logoHtml, plateHtml } from './html-plate.ts'
import { contentsHtml, criteriaHtml, revisionsHtml, summaryHtml } from './html-preface.ts'
import { liveStyle, type Styled, styleOf } from './html-style.ts'
import { CAUTION, markOf } from './imprint.ts'
import { type Island, islandHtml, islandOf } from './island.ts'
import type { Medium } from './medium.ts'
import { filled, fillTemplate } from './template.ts'
import { createTypesetter, type ShapeCache } from './typeset.ts'

export interface Page extends Styled {
  /** The text that diagnostics point into. */
  readonly source: Source
  /** Shapes set by earlier pages; without it every shape is set afresh. */
  readonly shapes?: ShapeCache
  /** What the page's panel tells of its numbers; without it the page has no script. */
  readonly trace?: Trace
}

/** Which numbers the page's panel tells of, and what it tells of them. */
export interface Trace {
  readonly marks: Marks
  readonly traced: () => Traced
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

/** A page in parts, to be sent to a browser piece by piece. */
export interface LivePage {
  readonly title: string
  /** The rules of its style element. */
  readonly style: string
  /** What stands in the body around the calculation, which goes where `CALCULATION` stands. */
  readonly around: string
  /** The calculation in order: one element each. */
  readonly blocks: readonly string[]
  /** What the page's panel tells of its numbers; made when it is asked for. */
  readonly island: () => Island
}

/** A comment that no prose can hold, since raw HTML is left out of a page. */
export const CALCULATION = '<!--calculation-->'

export function livePage(page: Page): LivePage {
  const { blocks, title, typesetter, sheetAround } = setPage(page, 'screen')
  return {
    title,
    style: liveStyle(page),
    around: sheetAround('first', CALCULATION),
    blocks,
    island: () => islandOf(page.trace?.traced() ?? { values: [], formulas: [], lines: new Map() }, typesetter),
  }
}

/** Paper has no script: nobody clicks on it. */
export function layOut(page: Page, medium: Medium): LaidOut {
  const { asset, sheet } = page
  const trace = medium === 'screen' ? page.trace : undefined
  const { blocks, title, style, typesetter, sheetAround } = setPage(page, medium)
  const parts = {
    language: sheet.language,
    title,
    generator: escapeHtml(`Platemark ${sheet.version}`),
    scripts: trace ? `'${asset('trace.hash')}'` : "'none'",
    trace: trace ? islandHtml(trace.traced(), typesetter, asset('trace.js')) : '',
    style: style(),
  }
  const pageWith = (place: Place) => (body: string) =>
    fillPage(asset('page.html'), { ...parts, place, sheet: sheetAround(place, body) })
  return { firstPage: pageWith('first'), laterPage: pageWith('later'), blocks }
}

type Place = 'first' | 'later'

/** All that a page is made of, set; its style knows the classes of what has been set when it is asked for. */
function setPage(page: Page, medium: Medium) {
  const { sheet, asset } = page
  const { titleBlock } = sheet
  const typesetter = createTypesetter(page.shapes)
  const marks = medium === 'screen' && page.trace ? page.trace.marks : noMarks
  const setting: Setting = { typesetter, source: page.source, level: 2, marks, medium }
  const blocks = bodyBlocks(page.body, setting)
  const first = {
    ...escaped(titleBlock),
    banner: bannerHtml(sheet),
    logo: logoHtml(sheet),
    plate: plateOf(sheet, setting),
    preface: prefaceOf(sheet, setting),
    mark: escapeHtml(markOf(sheet)),
    caution: CAUTION,
  }
  const around = { first, later: { ...first, banner: '', plate: '', preface: '' } }
  const template = sheet.template.html ?? asset('sheet.html')
  return {
    blocks,
    typesetter,
    title: escapeHtml(documentTitle(titleBlock)),
    style: () => styleOf(page, typesetter.classes(), medium),
    sheetAround: (place: Place, body: string) => fillTemplate(template, { ...around[place], body }),
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
