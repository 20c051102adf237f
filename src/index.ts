/** The package as a library: the compiler, and a plugin for any unified pipeline. */

import { fileURLToPath } from 'node:url'
import type { Root, RootContent } from 'mdast'
import type { Processor } from 'unified'
import type { VFile } from 'vfile'
import { positionOf, sourceOf } from './base/span.ts'
import { type Compiled, compileText, compileTree } from './compile.ts'
import { hostAt } from './host.ts'
import type { Press } from './pdf/press.ts'
import type { Host } from './publish.ts'
import { leftAlone } from './read/nearby.ts'
import { bodyNodes } from './render/markdown-body.ts'
import { markdownSettings } from './render/math-nodes.ts'

export type { Diagnostic } from './base/diagnostic.ts'
export { longForm, oneLine } from './base/report.ts'
export type { Press } from './pdf/press.ts'
export { type Format, type Host, type OutputFile, paperOf, publish, type TextFormat } from './publish.ts'

/** The host that `publish` needs, with the assets of this package. */
export const host: Host = hostAt(fileURLToPath(new URL('./assets/', import.meta.url)))
export { type Compiled, compileText, compileTree }

/**
 * Prints PDFs through a browser that stays warm: `press.print(paperOf(compiled, false, host))` for each document, then
 * `press.close()`.
 *
 * @param browser a program of Chrome, Chromium or Edge; left out, an installed one is looked for, then the embedded one
 */
export async function openPress(browser?: string): Promise<Press> {
  const press = await import('./pdf/press.ts')
  const named = browser === undefined ? undefined : { program: browser, namedBy: 'openPress' }
  return press.openPress({ named, near: fileURLToPath(new URL('.', import.meta.url)), patience: press.PATIENCE })
}

/**
 * A remark plugin. It replaces Platemark's fenced blocks by the worked calculation
 * as Markdown nodes and puts quoted results into the prose; every diagnostic
 * becomes a message of the file. Formulas are nodes of type `math` and
 * `inlineMath`, as other math plugins have them; figures are `html` nodes that hold
 * an SVG. Front matter is read where the pipeline parses it to a `yaml` node.
 */
export function remarkPlatemark(this: Processor): (tree: Root, file: VFile) => Root {
  const data = this.data()
  const held: unknown = Reflect.get(data, 'toMarkdownExtensions')
  const extensions: unknown[] = Array.isArray(held) ? held : []
  extensions.push(markdownSettings)
  Reflect.set(data, 'toMarkdownExtensions', extensions)
  return (tree, file) => {
    const compiled = compileTree(tree, sourceOf(file.path ?? 'document.md', String(file)), leftAlone)
    report(compiled, file)
    return { type: 'root', children: nodesOf(compiled) }
  }
}

const nodesOf = ({ parts, source }: Compiled): RootContent[] => [...bodyNodes(parts, 0, { source })]

function report({ source, diagnostics }: Compiled, file: VFile): void {
  for (const { rule, severity, message, help, at } of diagnostics) {
    const [start, end] = [positionOf(source, at.span.start), positionOf(source, at.span.end)]
    const made = file.message(message, { place: { start, end }, ruleId: rule, source: 'platemark' })
    made.fatal = severity === 'error'
    made.note = help
  }
}
