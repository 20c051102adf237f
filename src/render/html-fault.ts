/** The box that stands where a result would be: rule, message, places and help, as on the command line. */
import type { Diagnostic, Label } from '../base/diagnostic.ts'
import { lineText, positionOf, type Source } from '../base/span.ts'
import type { Fault } from '../explain/sheet.ts'
import { escapeHtml } from './escape.ts'
import type { Setting } from './html-parts.ts'
import { LETTERS_PHONE } from './prose.ts'

export function faultHtml({ diagnostics }: Fault, { source }: Setting): string {
  return `<section class="fault" role="group" aria-label="Fault">
${diagnostics.map(diagnostic => diagnosticHtml(diagnostic, source)).join('\n')}
</section>`
}

function diagnosticHtml({ rule, severity, message, at, also, help }: Diagnostic, source: Source): string {
  const places = [at, ...also].map(label => placeHtml(label, source))
  return `<div class="${severity}">
<p class="rule">${severity} <span>${escapeHtml(rule)}</span></p>
<p class="message">${escapeHtml(message)}</p>
<ol class="places">${places.join('')}</ol>
${help === '' ? '' : `<p class="help">${escapeHtml(help)}</p>\n`}</div>`
}

/** The line of the source with the place marked in it; a place over several lines is marked on its first. */
function placeHtml({ span, text }: Label, source: Source): string {
  const { line, column } = positionOf(source, span.start)
  const whole = lineText(source, line)
  const end = Math.max(column, Math.min(whole.length, column - 1 + span.end - span.start))
  const [before, marked, after] = [whole.slice(0, column - 1), whole.slice(column - 1, end), whole.slice(end)].map(
    escapeHtml,
  )
  const reach = whole.length > LETTERS_PHONE ? ' tabindex="0"' : ''
  return `<li><span class="place">line ${line}</span><code${reach}>${before}<mark>${marked}</mark>${after}</code>${text === '' ? '' : `<span class="because">${escapeHtml(text)}</span>`}</li>`
}
