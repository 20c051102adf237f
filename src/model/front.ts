/** The choices that hold for the whole document, from its front matter. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { suggestion } from '../base/near.ts'
import type { Span } from '../base/span.ts'
import type { FrontMatter } from '../read/front.ts'
import { diagnose, type Text } from '../read/text.ts'
import { type Revision, readRevisions } from './revisions.ts'
import type { Assumption } from './scope.ts'

/** What the title block carries; every field is printed as written, empty when the front matter leaves it out. */
export interface TitleBlock {
  readonly title: string
  readonly project: string
  readonly location: string
  readonly number: string
  readonly revision: string
  readonly date: string
  readonly by: string
  readonly checked: string
  readonly standard: string
}

export type Paper = 'letter' | 'A4'

export interface Choices {
  readonly titleBlock: TitleBlock
  /** The standard as the front matter states it, whose rules hold where a block asks for them. */
  readonly standard: Text | undefined
  /** Every issue of the document, as stated. */
  readonly revisions: readonly Revision[]
  readonly system: System
  readonly language: Language
  readonly paper: Paper
  /** True where a sheet of its own with room for signature and seal stands before the calculation. */
  readonly cover: boolean
  /** True where the document lists its sections; decided by their number when it is not stated. */
  readonly contents: boolean | undefined
  /** Folder of the firm's own page, and its mark. */
  readonly template: Text | undefined
  readonly logo: Text | undefined
  readonly assumptions: readonly Assumption[]
  readonly faults: readonly Diagnostic[]
  /** Place of the front matter. */
  readonly at: Span
}

const printedKeys = ['title', 'project', 'location', 'number', 'revision', 'date', 'by', 'checked', 'standard'] as const
const listKeys: readonly string[] = ['revisions']
const keys: readonly string[] = [
  ...printedKeys,
  ...listKeys,
  'units',
  'language',
  'paper',
  'cover',
  'contents',
  'template',
  'logo',
]

export function readChoices(front: FrontMatter): Choices {
  const faults: Diagnostic[] = [...front.faults, ...strangeKeys(front)]
  const assumptions: Assumption[] = []
  const text = (key: string) => front.entries.get(key)?.text ?? ''
  const chosen = <T extends string>(key: string, values: readonly T[]): T | undefined => {
    const entry = front.entries.get(key)
    if (!entry) return undefined
    const found = values.find(value => value === entry.text)
    if (!found)
      faults.push(
        diagnose(
          'error',
          `${key}-unknown`,
          entry.span,
          `${key} cannot be ${entry.text}`,
          `Write ${key}: ${values.join(` or ${key}: `)}.`,
        ),
      )
    return found
  }
  const yesOrNo = (key: string): boolean | undefined => {
    const word = chosen(key, ['yes', 'no'])
    return word && word === 'yes'
  }
  const american = /^ASCE\b/.test(text('standard'))
  const stated = chosen('units', ['US', 'SI'])
  const system = stated ?? (text('standard') === '' || american ? 'US' : 'SI')
  if (!stated)
    assumptions.push({
      text: `Results are shown in ${system} units.`,
      because: 'units is not stated in the front matter',
    })
  const language =
    chosen('language', ['en-US', 'en-GB']) ??
    (american || (text('standard') === '' && system === 'US') ? 'en-US' : 'en-GB')
  const revisions = readRevisions(front, faults)
  const latest = revisions.at(-1)
  const titleBlock: TitleBlock = {
    title: text('title'),
    project: text('project'),
    location: text('location'),
    number: text('number'),
    revision: text('revision') || (latest?.revision ?? ''),
    date: text('date') || (latest?.date ?? ''),
    by: text('by'),
    checked: text('checked'),
    standard: text('standard'),
  }
  return {
    titleBlock,
    standard: stand(front.entries.get('standard')),
    revisions,
    system,
    language,
    paper: chosen('paper', ['letter', 'A4']) ?? (language === 'en-US' ? 'letter' : 'A4'),
    cover: yesOrNo('cover') ?? false,
    contents: yesOrNo('contents'),
    template: stand(front.entries.get('template')),
    logo: stand(front.entries.get('logo')),
    assumptions,
    faults,
    at: front.span,
  }
}

/** An entry without a value is as good as none. */
const stand = (entry: Text | undefined): Text | undefined => (entry?.text === '' ? undefined : entry)

function strangeKeys({ entries, lists }: FrontMatter): readonly Diagnostic[] {
  const all = [...entries, ...lists].map(([key, { span }]) => [key, span] as const)
  return [
    ...all
      .filter(([key]) => !keys.includes(key))
      .map(([key, span]) =>
        diagnose(
          'warning',
          'front-matter-unknown',
          span,
          `${key} in the front matter is not read`,
          suggestion(key, keys, 'entry'),
        ),
      ),
    ...[...lists]
      .filter(([key]) => keys.includes(key) && !listKeys.includes(key))
      .map(([key, { span }]) =>
        diagnose(
          'warning',
          'front-matter-nested',
          span,
          `${key} holds a list or a table where one value is read`,
          'Give it one value.',
        ),
      ),
  ]
}
