/** The page for paper, cut at its headings so that a long document can be printed in lots. */
import { documentTitle, layOut, type Page } from './html.ts'

/** What a reader's program shows about the document. */
export interface Properties {
  readonly title: string
  readonly author: string
  readonly subject: string
  readonly keywords: readonly string[]
  readonly creator: string
  /** As the front matter has it. */
  readonly date: string
  readonly language: string
  /** Hex digits that this source and this version alone give. */
  readonly identity: string
}

/** A part of the body that a new sheet may begin with. */
export interface Section {
  readonly html: string
  /** Of the heading that it begins with; 0 where it begins with something else. */
  readonly level: number
}

export interface Paper {
  /** A whole page that holds `body`, with everything that stands before it. */
  readonly firstPage: (body: string) => string
  /** The same page without what stands around the body. */
  readonly laterPage: (body: string) => string
  /** Joined, they are the body. Every heading has an id. */
  readonly sections: readonly Section[]
  readonly properties: Properties
}

export function renderPaper(page: Page, identity: string): Paper {
  const { firstPage, laterPage, blocks } = layOut(page, 'paper')
  return { firstPage, laterPage, sections: sectionsOf(blocks), properties: propertiesOf(page, identity) }
}

function propertiesOf({ sheet }: Page, identity: string): Properties {
  const { titleBlock, language, version } = sheet
  const { by, project, number, revision, standard, date } = titleBlock
  const keywords = [number, revision === '' ? '' : `Rev. ${revision}`, standard, 'lateral calculation', 'shear walls']
  return {
    title: documentTitle(titleBlock),
    author: by,
    subject: project,
    keywords: keywords.filter(word => word !== ''),
    creator: `Platemark ${version}`,
    date,
    language,
    identity,
  }
}

/** Blocks gathered from heading to heading, a block of prose cut where a heading stands in it. */
export function sectionsOf(blocks: readonly string[]): readonly Section[] {
  const sections: { level: number; html: string[] }[] = []
  for (const block of withHeadingIds(blocks).flatMap(cutProse)) {
    const level = Number(/^(?:<div class="prose">|<section[^>]*>\s*)?<h([1-6])/.exec(block)?.[1] ?? 0)
    const last = sections.at(-1)
    if (last === undefined || level > 0) sections.push({ level, html: [block] })
    else last.html.push(block)
  }
  return sections.map(({ level, html }) => ({ level, html: html.join('\n') }))
}

/** Text holds no bare `<` and attributes are in double quotes, so this finds headings and nothing else. */
const headings = /<h([1-6])((?:\s+[\w-]+(?:="[^"]*")?)*)>/g

function withHeadingIds(blocks: readonly string[]): readonly string[] {
  let count = 0
  return blocks.map(block =>
    block.replace(headings, (tag, level: string, attributes: string) => {
      count += 1
      return /\sid="/.test(attributes) ? tag : `<h${level} id="heading-${count}"${attributes}>`
    }),
  )
}

const tags = /<(\/?)([a-z][a-z0-9]*)(?:"[^"]*"|[^">])*>/gi
const childless: ReadonlySet<string> = new Set(['br', 'hr', 'img', 'input', 'wbr'])

/** A block of prose as several, each from one heading to the next; headings within quotations and lists do not cut. */
function cutProse(block: string): readonly string[] {
  const open = '<div class="prose">'
  if (!block.startsWith(open)) return [block]
  const cuts: number[] = []
  let depth = 0
  for (const { 1: slash, 2: name = '', index } of block.matchAll(tags)) {
    if (slash === '/') depth -= 1
    else if (!childless.has(name)) {
      if (depth === 1 && /^h[1-6]$/.test(name) && index > open.length) cuts.push(index)
      depth += 1
    }
  }
  return cuts.length === 0 ? [block] : [0, ...cuts].map((from, i) => pieceOf(block, from, cuts[i], open))
}

function pieceOf(block: string, from: number, to: number | undefined, open: string): string {
  const inner = `${from === 0 ? '' : open}${block.slice(from, to)}`
  return to === undefined ? inner : `${inner.trimEnd()}</div>`
}
