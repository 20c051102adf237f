/** Text made safe to stand in HTML, in an attribute, in an anchor and in a CSS string. */
import { digitRuns } from '../base/raised.ts'

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}

/** For text and for quoted attribute values alike. */
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, mark => entities[mark] ?? mark)

const shifted = { level: ['', ''], raised: ['<sup>', '</sup>'], lowered: ['<sub>', '</sub>'] } as const

/** Printed text as HTML, its raised and lowered digits in faces that the page carries. */
export const pageText = (text: string): string =>
  digitRuns(text)
    .map(run => shifted[run.set].join(escapeHtml(run.text)))
    .join('')

/** The address of an element of this id on the same page. */
export const fragment = (id: string): string => `#${id.replace(/%/g, '%25').replace(/ /g, '%20')}`

/** A quoted CSS string; every character that is not plain goes in by number, so that `</style>` cannot come about. */
export function cssString(text: string): string {
  const safe = text.replace(/[^A-Za-z0-9 .,;:()-]/gu, mark => `\\${mark.codePointAt(0)?.toString(16) ?? '20'} `)
  return `"${safe}"`
}

const named: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'", nbsp: '\u00a0' }

/** Text out of HTML: character references read. */
export const plainText = (html: string): string =>
  html.replace(/&(?:#x([0-9a-f]+)|#(\d+)|(\w+));/gi, (whole, hex?: string, decimal?: string, name?: string) => {
    if (name !== undefined) return named[name] ?? whole
    return String.fromCodePoint(hex === undefined ? Number(decimal) : Number.parseInt(hex, 16))
  })
