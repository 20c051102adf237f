/** The whole pipeline: Markdown in, a calculation out, ready to be set in any format. */
import type { Root } from 'mdast'
import type { Diagnostic } from './base/diagnostic.ts'
import { sorted } from './base/report.ts'
import { type Source, sourceOf } from './base/span.ts'
import { type Worksheet, worksheet } from './compute/worksheet.ts'
import { sketchDisplaced, sketchPlan, sketchStoreys } from './draw/sketch.ts'
import { sketchElevation } from './draw/sketch-elevation.ts'
import {
  closingItems,
  type Explainer,
  explainer,
  explainQuotes,
  faultsIn,
  itemsOf,
  nestedBlocks,
  quoteFaults,
} from './explain/blocks.ts'
import { type Account, Context } from './explain/context.ts'
import { numberItems } from './explain/number.ts'
import { closingOf, prefaceOf } from './explain/preface.ts'
import type { Check, Preface, Sheet, Template } from './explain/sheet.ts'
import { type Choices, readChoices } from './model/front.ts'
import { type Givens, gather } from './model/givens.ts'
import type { Scope } from './model/scope.ts'
import { readDocument } from './read/document.ts'
import { parseMarkdown } from './read/markdown.ts'
import { type Nearby, nothingNearby } from './read/nearby.ts'
import type { Pictures } from './read/pictures.ts'
import { readLogo } from './render/logo.ts'
import { type Part, partsOf } from './render/parts.ts'
import { readTemplate } from './render/template.ts'

export interface Compiled {
  readonly source: Source
  /** The files that the document names. */
  readonly nearby: Nearby
  readonly choices: Choices
  readonly preface: Preface
  readonly template: Template
  readonly logo: string | undefined
  readonly parts: readonly Part[]
  readonly pictures: Pictures
  /** What was printed, and what the lists of the document are made of. */
  readonly context: Account
  /** Every value by its id, printed or not. */
  readonly scope: Scope
  readonly checks: readonly Check[]
  /** In the order of the source, each once. */
  readonly diagnostics: readonly Diagnostic[]
}

/** What one build of a document leaves for the next: each part is used again for as long as nothing it rests on changes. */
export interface Memory {
  works?: Works
}

/** The building at work, and what explains it. */
interface Works {
  readonly sheet: Worksheet
  readonly context: Context
  readonly explainer: Explainer
  /** What of the front matter these rest on. */
  readonly basis: string
}

export function compileText(path: string, text: string, nearby: Nearby = nothingNearby): Compiled {
  return compileTree(parseMarkdown(text), sourceOf(path, text), nearby)
}

export function compileTree(tree: Root, source: Source, nearby: Nearby = nothingNearby, memory: Memory = {}): Compiled {
  const document = readDocument(tree, source, nearby)
  const choices = readChoices(document.front)
  const { sheet, context, explainer } = worksFor(gather([...document.blocks.values()]), choices, memory)
  const given = sheet.readAll()
  const { worked, asked, shown } = explainer.explain(document, source)
  const template = readTemplate(choices.template, nearby)
  const logo = readLogo(choices.logo, nearby)
  const { placeOf } = context.account(source, () => [])
  const quotes = explainQuotes(document, sheet, context, id => placeOf(id, shown))
  const diagnostics = sorted(source, [
    ...document.faults,
    ...nestedBlocks(document),
    ...choices.faults,
    ...given,
    ...[...worked.values()].flatMap(faultsIn),
    ...quoteFaults(quotes),
    ...sheet.warnings(),
    ...(template.ok ? [] : template.because),
    ...(logo.ok ? [] : logo.because),
  ])
  const own = itemsOf(document, worked, diagnostics)
  const account = context.account(source, sheet.cells)
  const all = [...own, ...closingItems(closingOf(asked, sheet, context, account), own)]
  const { items, headings, pictures, contents } = numberItems(all, source)
  const preface = prefaceOf(contents, { asked, shown }, choices, sheet, context, account)
  return {
    source,
    nearby,
    choices,
    preface,
    template: template.ok ? template.value : {},
    logo: logo.ok ? logo.value : undefined,
    parts: partsOf(items, headings, pictures, quotes),
    pictures: document.pictures,
    context: account,
    scope: sheet.scope,
    checks: account.checks,
    diagnostics,
  }
}

/** The works of the build before with the givens of this one, or new ones where the building has other parts now. */
function worksFor(givens: Givens, choices: Choices, memory: Memory): Works {
  const { system, language, standard, titleBlock, assumptions } = choices
  const basis = JSON.stringify([system, language, standard, titleBlock.standard, assumptions])
  const { works } = memory
  if (works?.basis === basis && works.sheet.replace(givens)) return works
  const sheet = worksheet(givens, choices)
  const context = new Context(
    language,
    { standard: titleBlock.standard, system },
    {
      plan: (level, caseName) => sketchPlan(sheet, level, caseName, choices),
      elevation: (level, wall, caseName) => sketchElevation(sheet, level, wall, caseName, choices),
      displaced: (level, displacement) => sketchDisplaced(level, displacement, choices),
      storeys: storeys => sketchStoreys(storeys, choices),
    },
    sheet.scope.ledger,
  )
  memory.works = { sheet, context, explainer: explainer(sheet, context), basis }
  return memory.works
}

/** What every page carries around its body. */
export function sheetOf(
  { choices, preface, template, logo, diagnostics }: Compiled,
  version: string,
  sourceMark: string,
  draft: boolean,
): Sheet {
  return {
    titleBlock: choices.titleBlock,
    preface,
    cover: choices.cover,
    paper: choices.paper,
    template,
    logo,
    language: choices.language,
    sourceMark,
    version,
    faults: diagnostics.filter(({ severity }) => severity === 'error'),
    draft,
  }
}
