/** American and British spelling: both understood, one printed, and nothing else touched. */
import { describe, expect, test } from 'vitest'
import { inLanguage, toBritish } from '../../src/base/language.ts'
import { compileText } from '../../src/compile.ts'
import { publish } from '../../src/publish.ts'
import { host } from '../support/worked.ts'

describe('our own words', () => {
  test.each([
    ['centre of mass', 'center of mass'],
    ['Centres of two storeys', 'Centers of two stories'],
    ['storey by storey', 'story by story'],
    ['colour, behaviour, neighbour, modelled', 'color, behavior, neighbor, modeled'],
    ['metres', 'meters'],
    ['the history of parameters', 'the history of parameters'],
  ])('%s is %s in American', (british, american) => {
    expect(inLanguage(british, 'en-US')).toBe(american)
    expect(inLanguage(british, 'en-GB')).toBe(british)
  })

  test.each(['center of rigidity', 'story by story', 'stories', 'Center of mass'])('%s is understood', words => {
    expect(inLanguage(toBritish(words), 'en-US').toLowerCase()).toBe(words.toLowerCase())
    expect(toBritish(toBritish(words))).toBe(toBritish(words))
  })
})

const building = (language: string, wants: string) =>
  [
    `---\nunits: US\nlanguage: ${language}\n---`,
    'The color of the centre court is history.',
    '```areas roof\n| area | from | to | load |\n|---|---|---|---|\n| Centre | 0 ft, 0 ft | 200 ft, 140 ft | 55 psf |\n```',
    `\`\`\`working roof\n${wants}\n\`\`\``,
  ].join('\n\n')

const markdown = (text: string): string => publish(compileText('a.md', text), 'a', 'md', false, host)[0]?.text ?? ''

describe('a document', () => {
  test.each(['center of mass', 'centre of mass', 'Center of Mass'])('may ask for the %s in either language', wants => {
    for (const language of ['en-US', 'en-GB'])
      expect(compileText('a.md', building(language, wants)).diagnostics).toEqual([])
  })

  test('prints its numbers and our words in its own language, and the engineer’s words as they are', () => {
    const [us, gb] = [markdown(building('en-US', 'centre of mass')), markdown(building('en-GB', 'centre of mass'))]
    for (const page of [us, gb]) {
      expect(page).toContain('The color of the centre court is history.')
      expect(page).toContain('| Centre')
    }
    expect(us).toContain('1{,}540')
    expect(gb).toContain('1\\ 540')
    expect(us.replace('centre court', '')).not.toMatch(/\bcentre/)
    expect(gb).not.toMatch(/\bcenter/)
  })
})

test('a name keeps the spelling that the engineer gave it, in every caption and list', () => {
  const text = `\`\`\`areas Centre storey
| area | from | to | load |
|---|---|---|---|
| A | 0 ft, 0 ft | 9 ft, 9 ft | 50 psf |
\`\`\`

\`\`\`working Centre storey
plan
centre of mass
\`\`\`
`
  const [page] = publish(compileText('x.md', text), 'x', 'md', false, host)
  expect(page?.text).toContain('Plan of Centre storey.')
  expect(page?.text).toContain('center of mass')
  expect(page?.text).not.toMatch(/[\ue000\ue001]/)
})
