/** The page's own style sheet: only the faces and rules that this page uses. */
import type { Sheet } from '../explain/sheet.ts'
import type { BodyPart } from './body.ts'
import { cssString } from './escape.ts'
import { type Face, facesFor, needsOf } from './faces.ts'
import { CAUTION, draftWords, markOf } from './imprint.ts'
import { allMathFaces, mathFaces, mathRules } from './math-faces.ts'
import type { Medium } from './medium.ts'

export interface Styled {
  readonly sheet: Sheet
  readonly body: readonly BodyPart[]
  /** Text of a prepared asset, such as `sheet.css`. */
  readonly asset: (name: string) => string
}

/** A PDF takes one face a weight: a variable face would be drawn as shapes. */
export function styleOf({ sheet, body, asset }: Styled, classes: ReadonlySet<string>, medium: Medium): string {
  const faceList = JSON.parse(asset(`faces.${medium}.json`)) as readonly Face[]
  const text = facesFor(faceList, needsOf(sheet, body)).map(({ name }) => name)
  // KaTeX's roman also stands in for signs that the text faces lack, such as ≤ or →.
  const math = new Set([
    ...mathFaces(classes),
    'KaTeX_Main-Regular',
    ...(hasCode(body) ? ['KaTeX_Typewriter-Regular'] : []),
  ])
  const faces = [...text, ...[...math].sort()].map(name => asset(`faces/${name}.css`))
  return [
    ...faces,
    mathRules(asset('katex.css'), classes),
    asset('sheet.css'),
    medium === 'screen' ? asset('trace.css') : '',
    sheet.template.css ?? '',
    paperRules(sheet),
  ].join('\n')
}

/**
 * The style of a page that changes while it is looked at: all faces and rules, and nothing that tells of this
 * build, so that it stays the same for as long as the firm's own style does.
 */
export function liveStyle({ sheet, asset }: Styled): string {
  const before = liveBefore.get(asset)
  const css = sheet.template.css ?? ''
  if (before?.css === css && before.paper === sheet.paper) return before.style
  const faceList = JSON.parse(asset('faces.screen.json')) as readonly Face[]
  const faces = [...faceList.map(({ name }) => name), ...allMathFaces]
  const style = [
    ...faces.map(name => asset(`faces/${name}.css`)),
    asset('katex.css'),
    asset('sheet.css'),
    asset('trace.css'),
    css,
    `@page{size:${sheet.paper}}`,
  ].join('\n')
  liveBefore.set(asset, { css, paper: sheet.paper, style })
  return style
}

/** The style of a host's last live page. */
const liveBefore = new WeakMap<
  Styled['asset'],
  { readonly css: string; readonly paper: string; readonly style: string }
>()

const hasCode = (body: readonly BodyPart[]): boolean =>
  body.some(part => part.kind === 'fault' || (part.kind === 'prose' && /<(?:code|pre|kbd|samp)[\s>]/.test(part.html)))

/** What each printed sheet carries in its margins. The first sheet has the plate, and does without a head. */
function paperRules(sheet: Sheet): string {
  const { project, title, number, revision, date, by, checked } = sheet.titleBlock
  const joined = (mark: string, ...parts: readonly string[]) => parts.filter(part => part !== '').join(mark)
  const issue = joined(' · ', number, revision === '' ? '' : `Rev. ${revision}`, date)
  const people = joined(', ', by === '' ? '' : `by ${by}`, checked === '' ? '' : `checked ${checked}`)
  const boxes: Readonly<Record<string, string>> = {
    'top-left': cssString(joined(', ', project, title)),
    'top-right': cssString(issue),
    'bottom-left': cssString(joined('\n', people, `${CAUTION} ${markOf(sheet)}`)),
  }
  const rules = Object.entries(boxes).map(([box, content]) => `@${box}{content:${content}}`)
  const draft = sheet.draft
    ? `@page{@top-center{content:${cssString(`DRAFT · ${draftWords(sheet)}`)};box-sizing:border-box;width:76mm;height:7mm;margin:9mm auto 5mm;padding:0;border:1pt solid #000;vertical-align:middle;text-align:center;font-weight:600}}`
    : ''
  return `@page{size:${sheet.paper};${rules.join('')}}@page:first{@top-left{content:none}@top-right{content:none}}${draft}`
}
