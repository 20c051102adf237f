/** The page's own sheet or a firm's: a piece of HTML with named fields, and a style after ours. */

import type { Result } from '../base/ledger.ts'
import { suggestion } from '../base/near.ts'
import { bad, good } from '../base/outcome.ts'
import type { Template } from '../explain/sheet.ts'
import type { Nearby } from '../read/nearby.ts'
import { diagnose, type Text } from '../read/text.ts'

/** Fields of a sheet, by whether it can do without them. */
const needed = ['banner', 'plate', 'preface', 'body', 'caution', 'mark'] as const
const optional = [
  'logo',
  'title',
  'project',
  'location',
  'number',
  'revision',
  'date',
  'by',
  'checked',
  'standard',
] as const

export type Field = (typeof needed)[number] | (typeof optional)[number]
export type Fields = Readonly<Record<Field, string>>

const fieldNames: readonly string[] = [...needed, ...optional]
const isField = (name: string): name is Field => fieldNames.includes(name)

const FIELD = /\{\{(\w+)\}\}/g

/** Puts the fields in place in one pass, so that nothing put in is read as a field again. */
export const fillTemplate = (html: string, fields: Fields): string =>
  filled(html, (whole, name) => (isField(name) ? fields[name] : whole))

/**
 * Puts a text in the place of each `{{name}}`. Texts are laid end to end by `+`, which copies none of them until
 * the whole is written; `replace` would copy a page once for each template that it goes through.
 */
export function filled(html: string, textOf: (whole: string, name: string) => string): string {
  let made = ''
  let at = 0
  for (const { 0: whole, 1: name = '', index } of html.matchAll(FIELD)) {
    made += html.slice(at, index) + textOf(whole, name)
    at = index + whole.length
  }
  return made + html.slice(at)
}

/** Why a sheet cannot be used, in words that follow its name; undefined when it can. */
export function faultOfSheet(html: string): string | undefined {
  const found = [...html.matchAll(FIELD)].map(([, name = '']) => name)
  const strange = found.find(name => !isField(name))
  if (strange !== undefined) return `has no field {{${strange}}}. ${suggestion(strange, fieldNames, 'field')}`
  const missing = needed.filter(name => !found.includes(name))
  if (missing.length > 0)
    return `leaves out ${missing.map(name => `{{${name}}}`).join(', ')}, which every sheet carries`
  const doubled = (['plate', 'preface', 'body'] as const).find(name => found.filter(other => other === name).length > 1)
  if (doubled) return `has {{${doubled}}} more than once`
  const active = ACTIVE.exec(html)
  return active ? `holds ${active[0].trim()}, and a page runs and calls for nothing` : undefined
}

/** Elements and attributes that act or fetch; the page's own policy would stop them in silence. */
const ACTIVE =
  /<\s*(?:script|iframe|object|embed|link|meta|base|form|frame|applet|style|title|html|head|body)\b|\son\w+\s*=|javascript:|(?:src|srcset|poster|background)\s*=\s*["']?\s*(?!data:image\/)[^\s"'>]+/i

/** Why a style cannot be used, in words that follow its name; undefined when it can. */
export function faultOfStyle(css: string): string | undefined {
  if (/<\s*\/?\s*style|<!--/i.test(css)) return 'holds HTML'
  const far = /@import[^;]*|url\(\s*(?!["']?\s*data:)[^)]*\)/i.exec(css)
  return far ? `calls for another file: ${far[0]}` : undefined
}

const NONE: Template = {}

/** Larger than this is no sheet. */
const LARGEST = 200_000

/**
 * The firm's own page from the folder that `template:` names: `sheet.html`, `sheet.css` or both.
 *
 * @param entry the folder, relative to the document; ours when left out
 */
export function readTemplate(entry: Text | undefined, nearby: Nearby): Result<Template> {
  if (!entry) return good(NONE)
  const fault = (rule: string, message: string, help: string): Result<Template> =>
    bad([diagnose('error', rule, entry.span, message, help)])
  const folder = entry.text.replace(/[\\/]+$/, '')
  const [html, css] = ['sheet.html', 'sheet.css'].map(name => nearby.read(`${folder}/${name}`))
  if (!html?.ok && !css?.ok)
    return fault(
      'template-missing',
      `there is no template ${entry.text}: neither ${folder}/sheet.html nor ${folder}/sheet.css can be read (${html?.because ?? ''})`,
      'Name the folder that holds one of them, relative to this document.',
    )
  const found = [html, css].map(file => (file?.ok ? new TextDecoder().decode(file.value) : undefined))
  const [sheet, style] = found
  const faults = [
    sheet === undefined ? undefined : named('sheet.html', sheet.length > LARGEST ? TOO_LARGE : faultOfSheet(sheet)),
    style === undefined ? undefined : named('sheet.css', style.length > LARGEST ? TOO_LARGE : faultOfStyle(style)),
  ].filter(fault => fault !== undefined)
  if (faults[0] !== undefined)
    return fault('template-unfit', `the template's ${faults[0]}`, 'The manual lists the fields of a sheet.')
  return good({ ...(sheet === undefined ? {} : { html: sheet }), ...(style === undefined ? {} : { css: style }) })
}

const TOO_LARGE = `has more than ${LARGEST / 1000} kB`

const named = (file: string, fault: string | undefined): string | undefined => fault && `${file} ${fault}`
