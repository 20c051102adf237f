/**
 * A long document goes through the browser in lots, since every sheet costs in proportion to the page it is printed
 * from. Each lot begins a new sheet. What leads from one lot to another is written as an address that
 * no network has, and becomes a link within the document when the lots are joined.
 */
import { escapeHtml, fragment, plainText } from '../render/escape.ts'
import type { Paper, Section } from '../render/paper.ts'

/** A document whose body is shorter than this, in characters, is printed whole. */
const SHORT = 600_000
/** About as much body as a lot takes. */
const LOT = 450_000

/** A box with no height at all would make no sheet. */
const BLANK = '<div style="height:1px;break-after:page"></div>'

/** `.invalid` is reserved and never resolves (RFC 2606). */
export const AWAY = 'https://sheet.invalid/'

export interface Lot {
  /** A whole page. */
  readonly html: string
  /** Its first sheet is blank and falls away: what the style sets apart on a first sheet then touches nothing. */
  readonly led: boolean
}

export interface Title {
  readonly id: string
  readonly level: number
  readonly text: string
}

export interface Lots {
  readonly lots: readonly Lot[]
  /** The headings of the document in order. */
  readonly titles: readonly Title[]
}

/** @param sizes only a test says other than what is usual */
export function lotsOf(paper: Paper, { short, lot }: Sizes = { short: SHORT, lot: LOT }): Lots {
  const { firstPage, laterPage, sections } = paper
  const length = sections.reduce((sum, { html }) => sum + html.length, 0)
  const bodies = length <= short ? [sections] : gathered(sections, lot)
  const pages = bodies.map((each, i) => {
    const body = each.map(({ html }) => html).join('\n')
    return i === 0 ? firstPage(body) : laterPage(`${BLANK}\n${body}`)
  })
  const marked = bodies.length === 1 ? pages : pages.map(withoutFolio)
  return { lots: linked(marked).map((html, i) => ({ html, led: i > 0 })), titles: pages.flatMap(titlesOf) }
}

export interface Sizes {
  readonly short: number
  readonly lot: number
}

/** Sections in runs of about `size`; near the end of a run a heading of a higher level ends it early. */
function gathered(sections: readonly Section[], size: number): readonly (readonly Section[])[] {
  const runs: Section[][] = []
  let length = Number.POSITIVE_INFINITY
  for (const section of sections) {
    const full = length > size || (length > 0.7 * size && section.level === 2)
    if (full || runs.length === 0) {
      runs.push([])
      length = 0
    }
    runs.at(-1)?.push(section)
    length += section.html.length
  }
  return runs
}

const styled = (html: string, rules: string): string => html.replace('</style>', () => `${rules}</style>`)

/** The number of a sheet is laid over it when all lots are joined. */
const withoutFolio = (html: string): string => styled(html, '@page{@bottom-right{content:none!important}}')

/** Clear sheets with nothing in their margins but "sheet n of m". */
export function folioPage({ laterPage }: Paper, sheets: number): string {
  const others = ['top-left', 'top-center', 'top-right', 'bottom-left']
  const body = BLANK.repeat(sheets - 1)
  const rules = others.map(place => `@${place}{content:none!important}`).join('')
  return styled(
    laterPage(`${body}<div style="height:1px"></div>`),
    `@page{${rules}}*{background:none!important}footer{display:none}`,
  )
}

const tags = /<([a-z][a-z0-9]*)((?:"[^"]*"|[^">])*)>/gi
const ids = /\sid="([^"]*)"/
const localLinks = /\shref="#([^"]*)"/

/** Links that leave their lot made addresses of their own, and everything that is linked to made a destination. */
function linked(pages: readonly string[]): readonly string[] {
  const found = pages.map(idsAndLinks)
  const lotOf = new Map(found.flatMap(({ ids }, i) => ids.map(id => [id, i] as const)))
  const wanted = new Set(found.flatMap(({ links }) => links))
  return pages.map((page, i) => {
    const isAway = (link: string) => (lotOf.get(link) ?? i) !== i
    const turned = page.replace(tags, (tag, name: string) =>
      name.toLowerCase() !== 'a'
        ? tag
        : tag.replace(localLinks, (link, address: string) =>
            isAway(idAt(address)) ? ` href="${AWAY}#${address}"` : link,
          ),
    )
    const targets = [...titlesOf(page).map(({ id }) => id), ...(found[i]?.ids.filter(id => wanted.has(id)) ?? [])]
    return beforeEnd(turned, destinations(targets))
  })
}

interface Found {
  readonly ids: readonly string[]
  readonly links: readonly string[]
}

function idsAndLinks(page: string): Found {
  const found = { ids: [] as string[], links: [] as string[] }
  for (const [, , attributes = ''] of page.matchAll(tags)) {
    const id = ids.exec(attributes)?.[1]
    if (id !== undefined) found.ids.push(plainText(id))
    const link = localLinks.exec(attributes)?.[1]
    if (link !== undefined) found.links.push(idAt(link))
  }
  return found
}

/** A browser gives a PDF destinations only for what the page links to, seen or not. */
const destinations = (targets: readonly string[]): string =>
  `<p hidden>${[...new Set(targets)].map(id => `<a href="${escapeHtml(fragment(id))}"></a>`).join('')}</p>`

function beforeEnd(page: string, html: string): string {
  const end = page.lastIndexOf('</body>')
  return end === -1 ? `${page}${html}` : `${page.slice(0, end)}${html}${page.slice(end)}`
}

const headings = /<h([2-6])\s(?:[^>]*\s)?id="([^"]*)"[^>]*>([\s\S]*?)<\/h\1>/g

const titlesOf = (page: string): readonly Title[] =>
  Array.from(page.matchAll(headings), ([, level, id = '', html = '']) => ({
    id: plainText(id),
    level: Number(level),
    text: plainText(html.replace(/<[^>]*>/g, ''))
      .replace(/\s+/g, ' ')
      .trim(),
  }))

/** The id that a link's fragment means. */
export function idAt(address: string): string {
  const text = plainText(address)
  try {
    return decodeURIComponent(text)
  } catch {
    return text
  }
}

const folios = /(<span class="folio" data-for="([^"]*)">)[^<]*(?=<\/span>)/g

export const hasFolios = (html: string): boolean => html.search(folios) !== -1

/** The contents with the number of each heading's sheet. */
export const withFolios = (html: string, sheetOf: ReadonlyMap<string, number>): string =>
  html.replace(folios, (_, open: string, id: string) => `${open}${sheetOf.get(plainText(id)) ?? ''}`)
