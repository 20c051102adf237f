/** The pages that the server gives: a document as it stands, and the list of all that are watched. */
import type { Host } from '../publish.ts'
import { escapeHtml } from '../render/escape.ts'
import { CALCULATION } from '../render/html.ts'
import { filled } from '../render/template.ts'
import type { State, WatchedDocument } from './document.ts'
import { inWords } from './words.ts'

/** Stands after the last block; `CALCULATION` stands before the first. */
export const END = '<!--/calculation-->'

/** @param back true where a list of documents stands above this one */
export function documentPage({ page, version }: State, run: string, host: Host, of: string, back: boolean): string {
  const { title, style, paper, around, blocks } = page()
  const [before = '', after = ''] = around.split(CALCULATION)
  const way = back ? '<p class="live-back"><a href="/">All documents</a></p>\n' : ''
  return shell(host, {
    title,
    style,
    paper,
    kind: 'document',
    at: `${run}.${version}`,
    of,
    page: `${way}${before}${CALCULATION}${blocks.join('')}${END}${after}`,
  })
}

/** @param style of a page of ours, so that the list is set in the same faces */
export const listPage = (list: string, style: string, run: string, host: Host): string =>
  shell(host, { title: 'Documents', style, paper: '', kind: 'list', at: run, of: '/', page: list })

export function listOf(documents: ReadonlyMap<string, WatchedDocument>): string {
  const rows = [...documents].map(([key, document]) => rowOf(key, document))
  return `<div class="sheet"><main class="live-list">
<h1>Documents</h1>
<div class="scroll" tabindex="0" role="region" aria-label="Documents"><table>
<thead><tr><th scope="col">document</th><th scope="col">state</th><th scope="col">checks</th><th scope="col">worst check</th><th scope="col" class="r">ratio</th></tr></thead>
<tbody>
${rows.join('\n')}
</tbody></table></div>
</main></div>`
}

function rowOf(key: string, { shown, state, compiled }: WatchedDocument): string {
  const { report, title } = state
  const [worst] = compiled?.preface.checks.length
    ? compiled.preface.checks.map(({ check }) => check)
    : [...(compiled?.checks ?? [])].sort((a, b) => b.ratio - a.ratio)
  const failed = report.failed > 0
  const checks =
    report.checks === 0 ? 'none' : failed ? `${report.failed} of ${report.checks} NG` : `${report.checks} OK`
  const well = report.state === 'sound'
  return `<tr id="row-${key}"><th scope="row"><a href="/d/${key}/">${escapeHtml(title)}</a><span class="u">${escapeHtml(shown)}</span></th>
<td${well ? '' : ' class="live-ng"'}>${escapeHtml(inWords(report))}</td>
<td${failed ? ' class="live-ng"' : ''}>${well || report.state === 'faulty' ? checks : ''}</td>
<td>${worst ? escapeHtml(worst.what) : ''}</td>
<td class="r">${worst ? `${escapeHtml(worst.ratioPrinted)} ${worst.ok ? 'OK' : 'NG'}` : ''}</td></tr>`
}

interface Parts {
  readonly title: string
  readonly style: string
  readonly paper: string
  readonly kind: 'document' | 'list'
  readonly at: string
  /** Where the page is told of. */
  readonly of: string
  readonly page: string
}

function shell(host: Host, { title, style, paper, kind, at, of, page }: Parts): string {
  const parts: Readonly<Record<string, string>> = {
    language: 'en',
    generator: escapeHtml(`Platemark ${host.version}`),
    title,
    style,
    paper,
    kind,
    at,
    of,
    page,
  }
  return filled(host.asset('live.html'), (whole, name) => parts[name] ?? whole)
}
