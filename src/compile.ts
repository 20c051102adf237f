/** The whole pipeline: Markdown in, a calculation out, ready to be set in any format. */
import type { Root } from 'mdast'
import type { Diagnostic } from './base/diagnostic.ts'
import { sorted } from './base/report.ts'
import { type Source, sourceOf } from './base/span.ts'
import { worksheet } from './compute/worksheet.ts'
import { sketchPlan } from './draw/sketch.ts'
import { explainBlocks, explainQuotes, faultsIn, itemsOf, nestedBlocks, quoteFaults } from './explain/blocks.ts'
import { Context } from './explain/context.ts'
import { numberItems } from './explain/number.ts'
import type { Check, Sheet } from './explain/sheet.ts'
import { type Choices, readChoices } from './model/front.ts'
import { gather } from './model/givens.ts'
import type { Scope } from './model/scope.ts'
import { readDocument } from './read/document.ts'
import { parseMarkdown } from './read/markdown.ts'
import { type Nearby, nothingNearby } from './read/nearby.ts'
import { type Part, partsOf } from './render/parts.ts'

export interface Compiled {
  readonly source: Source
  /** The files that the document names. */
  readonly nearby: Nearby
  readonly choices: Choices
  readonly parts: readonly Part[]
  readonly context: Context
  /** Every value by its id, printed or not. */
  readonly scope: Scope
  readonly checks: readonly Check[]
  /** In the order of the source, each once. */
  readonly diagnostics: readonly Diagnostic[]
}

export function compileText(path: string, text: string, nearby: Nearby = nothingNearby): Compiled {
  return compileTree(parseMarkdown(text), sourceOf(path, text), nearby)
}

export function compileTree(tree: Root, source: Source, nearby: Nearby = nothingNearby): Compiled {
  const document = readDocument(tree, source)
  const choices = readChoices(document.front)
  const sheet = worksheet(gather([...document.blocks.values()]), choices)
  const given = sheet.readAll()
  const context = new Context(choices.language, source, (level, caseName) =>
    sketchPlan(sheet, level, caseName, choices),
  )
  const worked = explainBlocks(document, sheet, context)
  const quotes = explainQuotes(document, sheet, context)
  const diagnostics = sorted([
    ...document.faults,
    ...nestedBlocks(document),
    ...choices.faults,
    ...given,
    ...[...worked.values()].flatMap(faultsIn),
    ...quoteFaults(quotes),
    ...sheet.warnings(),
  ])
  const { items, headings } = numberItems(itemsOf(document, worked, diagnostics))
  return {
    source,
    nearby,
    choices,
    parts: partsOf(items, headings, quotes),
    context,
    scope: sheet.scope,
    checks: context.checks,
    diagnostics,
  }
}

/** What every page carries around its body. */
export function sheetOf({ choices, diagnostics }: Compiled, version: string, sha256: string, draft: boolean): Sheet {
  return {
    titleBlock: choices.titleBlock,
    language: choices.language,
    sourceMark: `${sha256.slice(0, 4)} ${sha256.slice(4, 8)}`,
    version,
    faults: diagnostics.filter(({ severity }) => severity === 'error'),
    draft,
  }
}
