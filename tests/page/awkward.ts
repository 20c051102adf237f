/** Documents that strain a page: long, wide, hostile, in another script, full of faults. */
import { htmlOf, sourceOf } from '../support/pages.ts'

const long = 'Extraordinarily'.repeat(14) + ' long name of a place by the water '.repeat(6)
const hostile = `<img src=x onerror=alert(1)></title></script><script>document.title='ran'</script>`

/** Starts where the sample's own front matter ends. */
const body = sourceOf('samples/starter.md').replace(/^---[\s\S]*?\n---\n/, '')

const front = (fields: Readonly<Record<string, string>>): string =>
  `---\nunits: US\n${Object.entries(fields)
    .map(([key, value]) => `${key}: ${JSON.stringify(value)}\n`)
    .join('')}---\n`

const everywhere = (value: string): Readonly<Record<string, string>> => ({
  title: value,
  project: value,
  location: value,
  number: value,
  revision: value,
  by: value,
  checked: value,
})

const letters = Array.from({ length: 13 }, (_, i) => `column${i + 1}`)
const tableOf = (rows: number): string =>
  `| row | ${letters.join(' | ')} |\n|---|${letters.map(() => '---|').join('')}\n${Array.from(
    { length: rows },
    (_, row) => `| ${row + 1} | ${letters.map((_, i) => `${row * 13 + i}.25 kip`).join(' | ')} |\n`,
  ).join('')}`

const terms = Array.from({ length: 30 }, (_, i) => `term_${i + 1}`)
const longEquation = `\`\`\`calc
${terms.map((name, i) => `${name} = ${i + 1}.5 kip`).join('\n')}
whole = ${terms.join(' + ')}
\`\`\`
`

const walls = (first: string): string => body.replace(/\| Room /, `| ${first} `)

export const awkward: readonly (readonly [string, string])[] = [
  ['names of 400 letters', htmlOf(front(everywhere(long.slice(0, 400))) + walls(long.slice(0, 120)))],
  ['names without a space', htmlOf(front({ ...everywhere('W'.repeat(400)) }) + walls('W'.repeat(90)))],
  ['a script from right to left', htmlOf(front(everywhere('חישוב כוחות רוחב, מחסן הסירות 12')) + walls('חדר הסירות'))],
  ['hostile front matter', htmlOf(front(everywhere(hostile)) + walls(hostile.replace(/\|/g, '')))],
  ['a table of 14 columns', htmlOf(`# Table\n\n${tableOf(6)}`)],
  ['an equation longer than its line', htmlOf(`# Sum\n\n${longEquation}`)],
  ['a draft with faults', htmlOf(sourceOf('tests/golden/faults/wall-misspelt/input.md'), 'calc.md', true)],
  [
    'a draft with faults in its expressions',
    htmlOf(sourceOf('tests/golden/faults/expressions/input.md'), 'calc.md', true),
  ],
]

export const longTable: string = htmlOf(`# Table\n\n${tableOf(2000)}`)
