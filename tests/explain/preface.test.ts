/** What a document carries before and after its own text, and what a submittal lacks. */
import { describe, expect, test } from 'vitest'
import { type Compiled, compileText } from '../../src/compile.ts'
import { missingForSubmittal } from '../../src/explain/submittal.ts'

const building = `
\`\`\`areas roof
| area | from | to | load |
|---|---|---|---|
| Hall | 0 ft, 0 ft | 40 ft, 24 ft | 60 psf |
| Yard | 40 ft, 0 ft | 52 ft, 24 ft | 60 psf |
| Well | 4 ft, 4 ft | 8 ft, 8 ft | opening |
\`\`\`

\`\`\`construction CMU8
material: concrete masonry
f'm: 2000 psi
t: 7.63 in
ends: fixed
\`\`\`

\`\`\`walls roof
| wall | from | to | height | construction |
|---|---|---|---|---|
| W | 0 ft, 0 ft | 0 ft, 24 ft | 12 ft | CMU8 |
| E | 52 ft, 6 ft | 52 ft, 18 ft | 12 ft | CMU8 |
| S | 0 ft, 0 ft | 30 ft, 0 ft | 12 ft | CMU8 |
\`\`\`

\`\`\`forces roof
x: 12 kip
y: 12 kip
\`\`\`

\`\`\`working roof
equilibrium
\`\`\`
`

const document = (front: string, body: string): Compiled =>
  compileText('calc.md', `${front === '' ? '' : `---\n${front}\n---\n`}${body}`)

const worked = building.replace('equilibrium', 'centre of mass\nequilibrium')

const checksOf = (lines: string) =>
  document('', `${building}\n\`\`\`equations\na = 3 kip\nb = 4 kip\n${lines}\n\`\`\`\n`)

describe('the summary of checks', () => {
  test('has the worst first, and each leads to its place', () => {
    const { preface } = checksOf('a <= b   # Anchor; house standard 4\nb <= a   # Strap\na <= 10 kip')
    expect(preface.checks.map(({ check }) => [check.what, check.ratioPrinted, check.ok])).toEqual([
      ['Strap', '1.3333', false],
      ['Anchor', '0.75', true],
      ['a <= 10 kip', '0.3', true],
      ['Equilibrium of roof, largest residual', expect.stringContaining('10⁻'), true],
    ])
    expect(preface.checks.map(({ place }) => place)).toEqual([
      'b.check',
      'a.check',
      'a.2.check',
      'roof.equilibrium.check',
    ])
  })

  test('tells where a limit is from', () => {
    const [first] = checksOf('a <= b   # Anchor; house standard 4; page 2').preface.checks
    expect(first?.check.reference).toBe('house standard 4; page 2')
  })

  test('is left to the document where the document places it', () => {
    expect(document('', `${building}\n\`\`\`working\nchecks\n\`\`\`\n`).preface.checks).toEqual([])
  })
})

describe('a line that compares', () => {
  test('compares in base units, whatever the lines are written in', () => {
    const { checks } = document('', '```equations\na = 1 kip\nb = 4.448 kN\na <= b  # Link\n```\n')
    expect(checks[0]).toMatchObject({ ok: false, ratioPrinted: '1.00005' })
  })

  test('holds at equality', () => {
    expect(document('', '```equations\na = 3 ft\nb = 36 in\na <= b\n```\n').checks[0]?.ok).toBe(true)
  })
})

describe('the lists at the end', () => {
  const titles = ({ parts }: Compiled) =>
    parts
      .flatMap(part => (part.kind === 'pieces' ? part.pieces : []))
      .flatMap(piece => (piece.kind === 'register' ? [piece.id] : []))

  test('are there without being asked for', () => {
    expect(titles(document('', worked))).toEqual(['assumptions', 'references'])
  })

  test('are not told twice', () => {
    expect(titles(document('', `${worked}\n\`\`\`working\nreferences\n\`\`\`\n`))).toEqual([
      'references',
      'assumptions',
    ])
  })

  test('are left out where there is nothing to list', () => {
    expect(titles(document('units: SI', 'Text.'))).toEqual([])
  })

  test('are numbered as sections of a document that has sections, and stand in its contents', () => {
    const { preface } = document('contents: yes', `# Title\n\n## One\n${worked}\n## Two\n`)
    expect(preface.contents.map(({ number, text, id }) => [number, text, id])).toEqual([
      ['1', 'One', 'one'],
      ['2', 'Two', 'two'],
      ['3', 'Assumptions', 'assumptions'],
      ['4', 'References', 'references'],
    ])
  })
})

describe('the table of contents', () => {
  test('gives every heading an anchor of its own', () => {
    const { preface } = document('contents: yes\nunits: US', '## Loads\n\n## Loads\n\n### ⟂ ###\n\n## نص\n')
    expect(preface.contents.map(({ id }) => id)).toEqual(['loads', 'loads-2', 'section', 'نص'])
  })

  test('keeps the number that a heading brings', () => {
    const [first] = document('contents: yes', '## 3.2 Walls\n').preface.contents
    expect(first).toMatchObject({ number: '3.2', text: 'Walls' })
  })

  test('is for documents of four sections on, unless they say', () => {
    const sections = (n: number) => Array.from({ length: n }, (_, i) => `## Part ${'abcdef'[i]}\n`).join('\n')
    expect(document('units: US', sections(3)).preface.contents).toEqual([])
    expect(document('units: US', sections(4)).preface.contents).toHaveLength(4)
    expect(document('contents: no\nunits: US', sections(4)).preface.contents).toEqual([])
    expect(document('contents: yes\nunits: US', sections(1)).preface.contents).toHaveLength(1)
  })
})

describe('the criteria of a cover', () => {
  const rows = (front: string) => document(front, building).preface.criteria?.rows.map(({ cells }) => cells) ?? []

  test('tell loads, forces and materials as given, each with its lines; an opening carries nothing', () => {
    expect(rows('cover: yes\nstandard: ASCE 7-22')).toEqual([
      ['Standard', 'ASCE 7-22', ''],
      ['Results shown in', 'US units', ''],
      ['Loads of roof', '60 psf (Hall, Yard)', 'lines 9, 10'],
      [
        'Force at roof',
        '12 kip along x; 12 kip along y; accidental eccentricity 5% of the plan across the force',
        'lines 30, 31',
      ],
      ['Construction CMU8', "concrete masonry; f'm 2,000 psi; t 7.63 in; both ends fixed", 'line 14'],
    ])
  })

  test('are not there without a cover', () => {
    expect(rows('standard: ASCE 7-22')).toEqual([])
  })
})

describe('what a submittal lacks', () => {
  const whole = `title: Lateral calculation
project: Net Loft
location: Pier Road 4
number: 26-101
by: R. Halloran, PE 20117
checked: M. Oyelaran, SE 5521
standard: ASCE 7-22
cover: yes
revisions:
  - {revision: A, date: 2026-09-14, note: Issued for review}`
  const lacks = ({ choices, context }: Compiled) =>
    missingForSubmittal(choices, context).map(({ rule, severity, message }) => `${severity} ${rule}: ${message}`)
  const cited = building.replace('concrete masonry', 'section').replace("f'm: 2000 psi", 'E: 1800 ksi')

  test('is nothing where all is there', () => {
    expect(lacks(document(whole, cited))).toEqual([])
  })

  test.each(['title', 'project', 'location', 'number', 'by', 'checked', 'standard', 'cover'])(
    'names a missing %s',
    key => {
      const without = whole.replace(new RegExp(`^${key}:.*\n`, 'm'), '')
      expect(lacks(document(without, cited))).toHaveLength(1)
    },
  )

  test('names a document without revisions, which also give its revision and date', () => {
    const without = whole.split('\nrevisions')[0] ?? ''
    expect(lacks(document(without, cited)).map(line => line.split(': ')[1])).toEqual([
      'the front matter has no revision',
      'the front matter has no date',
      'there is no list of revisions',
    ])
  })

  test('refuses one engineer for both signatures', () => {
    const one = whole.replace('M. Oyelaran, SE 5521', 'r. halloran, pe 20117')
    expect(lacks(document(one, cited))).toEqual([
      'error submittal-signed: R. Halloran, PE 20117 both made and checked it',
    ])
  })

  test('warns of equations without a source, and of clauses from memory', () => {
    const equations =
      '\n```equations\nm = 2 kip * (3 ft)\nn = m / 2   # Handbook of Rigging, 3rd edition, page 41\n```\n'
    expect(lacks(document(whole, cited + equations))).toEqual(['warning submittal-source: m names no source'])
    expect(lacks(document(whole, building)).join()).toMatch(
      /warning submittal-source: the clause of constructions\.CMU8\.E .*unchecked/,
    )
  })
})
