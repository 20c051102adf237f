/** Diagnostics as an editor takes them. */
import { DiagnosticSeverity, type Diagnostic as Shown } from 'vscode-languageserver/node'
import type { TextDocument } from 'vscode-languageserver-textdocument'
import type { Diagnostic, Label } from '../base/diagnostic.ts'
import { inText, type Source, type Span } from '../base/span.ts'
import { sizeFault } from '../files.ts'
import { mayBeOurs, type Opened } from './opened.ts'
import { rangeOf } from './ranges.ts'

const SOURCE = 'platemark'

/** @param related true for an editor that shows the other places of a diagnostic itself */
export function faultsOf(document: TextDocument, read: Opened | undefined, related: boolean): Shown[] {
  if (!read) return [ofWhole(document)]
  const { diagnostics, source } = read.compiled()
  // Of Markdown without a block of ours only a misspelt topic is our business.
  const ours = mayBeOurs(document.getText()) ? diagnostics : diagnostics.filter(({ rule }) => rule.startsWith('topic-'))
  return ours.map(each => shownAs(placed(each, source), document, related))
}

/** A diagnostic by offsets, which an editor goes by. */
function placed(diagnostic: Diagnostic, source: Source): Diagnostic {
  const inPlace = (label: Label): Label => ({ ...label, span: inText(source, label.span) })
  return { ...diagnostic, at: inPlace(diagnostic.at), also: diagnostic.also.map(inPlace) }
}

function shownAs(
  { rule, severity, message, help, at, also }: Diagnostic,
  document: TextDocument,
  related: boolean,
): Shown {
  const others = also.slice(0, MOST_PLACES)
  const told = related ? [] : others.map(label => `${placeOf(label, document)}: ${label.text || 'see there'}`)
  const text = at.text === '' ? message : `${message} (${at.text})`
  return {
    range: rangeOf(document, widened(at.span, document)),
    severity: severity === 'error' ? DiagnosticSeverity.Error : DiagnosticSeverity.Warning,
    code: rule,
    source: SOURCE,
    message: [text, help, ...told].filter(line => line !== '').join('\n'),
    ...(related && others.length > 0
      ? {
          relatedInformation: others.map(label => ({
            location: { uri: document.uri, range: rangeOf(document, label.span) },
            message: label.text || 'see here',
          })),
        }
      : {}),
  }
}

/** A long ring has hundreds of other places. */
const MOST_PLACES = 11

const placeOf = ({ span }: Label, document: TextDocument): string => `line ${document.positionAt(span.start).line + 1}`

/** A place without extent would not be seen. */
function widened({ start, end }: Span, document: TextDocument): Span {
  if (end > start) return { start, end }
  const length = document.getText().length
  return start < length ? { start, end: start + 1 } : { start: Math.max(0, length - 1), end: length }
}

function ofWhole(document: TextDocument): Shown {
  const fault = sizeFault(Buffer.byteLength(document.getText()))
  return {
    range: rangeOf(document, { start: 0, end: 1 }),
    severity: DiagnosticSeverity.Error,
    source: SOURCE,
    ...(fault
      ? { code: fault.rule, message: `${fault.message}\n${fault.help}` }
      : { message: 'this text is not read' }),
  }
}

/** Told in place of diagnostics when finding them came to a fault of ours: never those of an earlier text. */
export const ownFault = (document: TextDocument, detail: string): Shown => ({
  range: rangeOf(document, { start: 0, end: 1 }),
  severity: DiagnosticSeverity.Error,
  source: SOURCE,
  message: `Platemark has a fault of its own here: ${detail}\nPlease report it with the document.`,
})
