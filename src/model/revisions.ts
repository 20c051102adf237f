/** The issues of a document, from the list `revisions` of its front matter. */
import type { Diagnostic } from '../base/diagnostic.ts'
import { suggestion } from '../base/near.ts'
import type { FrontItem, FrontMatter } from '../read/front.ts'
import { diagnose } from '../read/text.ts'

/** One issue, oldest first in the list; fields are printed as written and empty when left out. */
export interface Revision {
  readonly revision: string
  readonly date: string
  readonly by: string
  readonly checked: string
  /** What changed. */
  readonly note: string
}

const fields = ['revision', 'date', 'by', 'checked', 'note'] as const

const EXAMPLE = 'Write each as - {revision: B, date: 2026-11-02, by: RH, checked: MO, note: what changed}.'

export function readRevisions(front: FrontMatter, faults: Diagnostic[]): readonly Revision[] {
  const single = front.entries.get('revisions')
  if (single && single.text !== '')
    faults.push(
      diagnose('error', 'revision-unread', single.span, 'revisions is a list, one item for each issue', EXAMPLE),
    )
  const list = front.lists.get('revisions')
  if (!list) return []
  for (const item of list.items) faults.push(...strangeItem(item))
  const revisions = list.items.map(({ entries }): Revision => {
    const of = (field: string) => entries.get(field)?.text ?? ''
    return { revision: of('revision'), date: of('date'), by: of('by'), checked: of('checked'), note: of('note') }
  })
  faults.push(...disagreements(front, list.items.at(-1)))
  return revisions
}

function strangeItem({ span, entries, text }: FrontItem): readonly Diagnostic[] {
  if (text) return [diagnose('error', 'revision-unread', span, `${text.text} is no entry of names and values`, EXAMPLE)]
  return [...entries]
    .filter(([name]) => !fields.some(field => field === name))
    .map(([name, value]) =>
      diagnose(
        'warning',
        'front-matter-unknown',
        value.span,
        `${name} of a revision is not read`,
        suggestion(name, fields, 'entry'),
      ),
    )
}

/** The title block and the last revision tell of the same issue. */
function disagreements({ entries }: FrontMatter, last: FrontItem | undefined): readonly Diagnostic[] {
  return (['revision', 'date'] as const).flatMap(field => {
    const [stated, listed] = [entries.get(field), last?.entries.get(field)]
    if (!stated || !listed || stated.text === listed.text) return []
    return [
      diagnose(
        'error',
        'revision-disagrees',
        stated.span,
        `${field} is ${stated.text} here and ${listed.text} in the last of the revisions`,
        'Leave it out here, or make the two agree.',
        { also: [{ span: listed.span, text: listed.text }] },
      ),
    ]
  })
}
