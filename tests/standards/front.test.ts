/** The standard of the front matter, in documents that state their forces. */
import { expect, test } from 'vitest'
import { compileText } from '../../src/compile.ts'
import { profiles } from '../../src/standards/catalogue.ts'

const stated = (standard: string, accidental = ''): string => `---
${standard === '' ? 'title: Kiosk' : `standard: ${standard}`}
units: SI
---

\`\`\`areas roof
| area | from     | to        | load  |
|------|----------|-----------|-------|
| Main | 0 m, 0 m | 20 m, 8 m | 4 kPa |
\`\`\`

\`\`\`walls roof
| wall | from     | to        | k        |
|------|----------|-----------|----------|
| S    | 0 m, 0 m | 20 m, 0 m | 9 kN/mm  |
| N    | 0 m, 8 m | 20 m, 8 m | 9 kN/mm  |
| W    | 0 m, 0 m | 0 m, 8 m  | 5 kN/mm  |
| E    | 20 m, 0 m | 20 m, 8 m | 4 kN/mm |
\`\`\`

\`\`\`forces roof
x: 90 kN
y: 90 kN
${accidental}
\`\`\`

The arm is {{roof.ea.x}}.
`

const share = (text: string): number => {
  const { context, diagnostics } = compileText('t.md', text)
  expect(diagnostics).toEqual([])
  // The plan is 20 m long.
  return (context.roots.get('roof.ea.x')?.si ?? Number.NaN) / 20
}

test('any text may stand for the standard where nothing asks for its rules', () => {
  for (const standard of ['', 'IBC 2024', 'ASCE 7-10', 'the code of the county', 'UBC 97'])
    expect(share(stated(standard)), standard).toBe(0.05)
})

test('a known standard gives the accidental eccentricity where none is stated', () => {
  // ASCE 7-16 12.8.4.2, EN 1998-1 4.3.2, IS 1893-1 7.8.2: 5%; NZS 1170.5 5.3.2, NBCC 4.1.8.11, AS 1170.4 6.6: 10%.
  const expected = {
    'ASCE 7-22': 0.05,
    'ASCE 7-16': 0.05,
    'EN 1998-1': 0.05,
    'NZS 1170.5': 0.1,
    'NBCC 2020': 0.1,
    'IS 1893-1:2016': 0.05,
    'AS 1170.4': 0.1,
  }
  expect(profiles.map(({ name }) => name).toSorted()).toEqual(Object.keys(expected).toSorted())
  for (const [standard, part] of Object.entries(expected)) expect(share(stated(standard)), standard).toBe(part)
  expect(share(stated('NZS 1170.5', 'accidental: 5%'))).toBe(0.05)
})

test('the list of assumptions names its clause', () => {
  const { parts } = compileText('t.md', stated('NZS 1170.5'))
  expect(JSON.stringify(parts)).toContain('NZS 1170.5 5.3.2')
})
