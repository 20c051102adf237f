/**
 * What a document still lacks before it goes out for review: what reviewers of public work ask a
 * calculation to carry on its cover and sheets, and a source for each formula.
 */
import type { Diagnostic } from '../base/diagnostic.ts'
import { spansOf, type Value } from '../base/value.ts'
import type { Choices, TitleBlock } from '../model/front.ts'
import { diagnose } from '../read/text.ts'
import type { Account } from './context.ts'
import { everyValue } from './trace.ts'

/** What the cover and the margins of every sheet print, with an example of each. */
const carried: Readonly<Record<Exclude<keyof TitleBlock, 'checked' | 'by'>, string>> = {
  title: 'Lateral force calculation',
  project: 'the name of the project',
  location: 'where the building stands',
  number: '26-014',
  revision: 'A',
  date: '2026-11-02',
  standard: 'the standard and its edition',
}

export function missingForSubmittal(choices: Choices, context: Account): readonly Diagnostic[] {
  return [...missingEntries(choices), ...signatures(choices), ...issue(choices), ...sources(context)]
}

function missingEntries({ titleBlock, at }: Choices): readonly Diagnostic[] {
  return Object.entries(carried).flatMap(([key, example]) =>
    titleBlock[key as keyof typeof carried] === ''
      ? [missing(at, `the front matter has no ${key}`, `Add ${key}: ${example}.`)]
      : [],
  )
}

const missing = (at: Choices['at'], message: string, help: string): Diagnostic =>
  diagnose('error', 'submittal-missing', at, message, help)

/** Originated by one engineer and checked by another, both by name. */
function signatures({ titleBlock: { by, checked }, at }: Choices): readonly Diagnostic[] {
  return [
    ...(by === ''
      ? [missing(at, 'nobody is named as the one who made it', 'Add by: with a name and registration.')]
      : []),
    ...(checked === ''
      ? [missing(at, 'nobody is named as the one who checked it', 'Add checked: with a name and registration.')]
      : []),
    ...(by !== '' && by.toLowerCase() === checked.toLowerCase()
      ? [
          diagnose(
            'error',
            'submittal-signed',
            at,
            `${by} both made and checked it`,
            'The check is made by a different registered engineer.',
          ),
        ]
      : []),
  ]
}

function issue({ cover, contents, revisions, at }: Choices): readonly Diagnostic[] {
  return [
    ...(cover ? [] : [missing(at, 'there is no cover sheet to sign and seal', 'Add cover: yes.')]),
    ...(contents === false ? [missing(at, 'the table of contents is left out', 'Take contents: no away.')] : []),
    ...(revisions.length === 0
      ? [missing(at, 'there is no list of revisions', 'Add revisions: with an item for each issue.')]
      : []),
  ]
}

/** Formulas that a checker could not look up: the engineer's own without a source, and ours from memory. */
function sources(context: Account): readonly Diagnostic[] {
  const told = new Set<string>()
  const warn = (value: Value, what: string, message: string, help: string): readonly Diagnostic[] => {
    if (told.has(what)) return []
    told.add(what)
    const [span = { start: 0, end: 0 }] = spansOf(value)
    return [diagnose('warning', 'submittal-source', span, message, help)]
  }
  return everyValue(context.roots.values()).flatMap((value): readonly Diagnostic[] => {
    const { origin } = value
    if (origin.kind !== 'worked') return []
    const { source } = origin.step.formula
    if (source.includes('unchecked'))
      return warn(
        value,
        source,
        `the clause of ${value.id} was not in hand when this program was written: ${source}`,
        'Look it up in the edition that governs before you sign.',
      )
    // Cells of tables sum up what other lines say; a line of equations is a formula.
    const isEquation = origin.span !== undefined && !value.id.includes('.')
    if (!isEquation || context.cited.has(value.id) || !context.roots.has(value.id)) return []
    return warn(
      value,
      value.id,
      `${value.id} names no source`,
      'Where its formula is from a publication, write it as a comment behind the line: # publication, edition, page.',
    )
  })
}
