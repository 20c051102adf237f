/** The choices that hold for the whole document, from its front matter. */
import type { Diagnostic } from '../base/diagnostic.ts'
import type { System } from '../base/kind.ts'
import type { Language } from '../base/language.ts'
import { suggestion } from '../base/near.ts'
import type { FrontMatter } from '../read/front.ts'
import { diagnose } from '../read/text.ts'
import type { Assumption } from './scope.ts'

/** What the title block carries; every field is printed as written, empty when the front matter leaves it out. */
export interface TitleBlock {
  readonly title: string
  readonly project: string
  readonly number: string
  readonly revision: string
  readonly date: string
  readonly by: string
  readonly checked: string
  readonly standard: string
}

export interface Choices {
  readonly titleBlock: TitleBlock
  readonly system: System
  readonly language: Language
  readonly assumptions: readonly Assumption[]
  readonly faults: readonly Diagnostic[]
}

const plainKeys = ['title', 'project', 'number', 'revision', 'date', 'by', 'checked', 'standard'] as const
const keys: readonly string[] = [...plainKeys, 'units', 'language']

export function readChoices(front: FrontMatter): Choices {
  const faults: Diagnostic[] = [...front.faults]
  const assumptions: Assumption[] = []
  for (const [key, { span }] of front.entries)
    if (!keys.includes(key))
      faults.push(
        diagnose(
          'warning',
          'front-matter-unknown',
          span,
          `${key} in the front matter is not read`,
          suggestion(key, keys, 'entry'),
        ),
      )
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
  const titleBlock: TitleBlock = {
    title: text('title'),
    project: text('project'),
    number: text('number'),
    revision: text('revision'),
    date: text('date'),
    by: text('by'),
    checked: text('checked'),
    standard: text('standard'),
  }
  return {
    titleBlock,
    system,
    language,
    assumptions,
    faults,
  }
}
