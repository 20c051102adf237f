/**
 * Writes a long document of prose, tables, givens, equations and workings, the same for the same
 * measures. As a program: node tests/bench/generate.mjs SECTIONS EQUATIONS > long.md
 */
import { pathToFileURL } from 'node:url'

const fence = '```'

/**
 * @param {number} sections
 * @param {number} equations over all sections
 * @returns {string}
 */
export function longDocument(sections, equations) {
  const parts = [head]
  for (let i = 1; i <= sections; i++) {
    const [first, last] = [share(equations, sections, i - 1), share(equations, sections, i)]
    parts.push(section(i, last - first))
  }
  return `${parts.join('\n')}\n`
}

/** How many of `total` have been given out after `i` of `sections`. @param {number} total @param {number} sections @param {number} i */
const share = (total, sections, i) => Math.floor((total * i) / sections)

const head = `---
title: Lateral calculation, extended
project: Saltmarsh Net Loft
number: 26-200
date: 2026-11-20
units: US
---

# Saltmarsh Net Loft

One long room with a drying floor on the south side. The calculation follows the
building bay by bay; the wall that governs is {{roof.governing.wall}}, at {{roof.governing.V}}.

${fence}grid
x: A 0 ft, B 30 ft, C 66 ft, D 96 ft
y: 1 0 ft, 2 24 ft, 3 44 ft
${fence}

${fence}areas roof
| area   | from | to | load   | note             |
|--------|------|----|--------|------------------|
| Loft   | A1   | C3 | 64 psf | deck and topping |
| Drying | C1   | D2 | 48 psf |                  |
| Hatch  | 40 ft, 8 ft | 48 ft, 14 ft | opening | |
${fence}

${fence}construction CMU8
material: concrete masonry
f'm: 2000 psi
t: 7.63 in
ends: cantilever
${fence}

${fence}walls roof
| wall | from | to | height | construction |
|------|------|----|--------|--------------|
| S1   | A1   | B1 | 12 ft  | CMU8         |
| S2   | 70 ft, 0 ft | D1 | 12 ft | CMU8     |
| N1   | A3   | 20 ft, 44 ft | 12 ft | CMU8   |
| N2   | B3   | C3 | 12 ft  | CMU8         |
| W1   | A1   | A2 | 12'-6" | CMU8         |
| C1   | C2   | C3 | 12 ft  | CMU8         |
| E1   | D1   | D2 | 12 ft  | CMU8         |
${fence}

${fence}forces roof
x: 0.18 * roof.W
y: 0.18 * roof.W
accidental: 5%
${fence}
`

/** Each section takes these in turn; a later line uses earlier ones, and the last runs on from section to section. */
const lines = [
  (/** @type {string} */ s, /** @type {number} */ n) => `b_${s} = ${18 + (n % 9)} ft + ${n % 12} in`,
  (/** @type {string} */ s, /** @type {number} */ n) => `h_${s} = ${10 + (n % 4)}'-${n % 12}"`,
  (/** @type {string} */ s) => `A_${s} = b_${s} * h_${s}`,
  (/** @type {string} */ s, /** @type {number} */ n) => `w_${s} = ${12 + (n % 7)} psf + ${40 + (n % 25)} psf`,
  (/** @type {string} */ s) => `P_${s} = w_${s} * A_${s} -> kip`,
  (/** @type {string} */ s) => `M_${s} = P_${s} * b_${s} / 8 -> kip*ft`,
  (/** @type {string} */ s, /** @type {number} */ n) => `S_${s} = ${8 + (n % 5)} in * (${14 + (n % 8)} in)^2 / 6`,
  (/** @type {string} */ s) => `f_${s} = M_${s} / S_${s} -> psi`,
  (/** @type {string} */ s) => `r_${s} = sqrt(b_${s}^2 + h_${s}^2) / 2`,
  (/** @type {string} */ s, /** @type {number} */ _n, /** @type {string | undefined} */ before) =>
    before === undefined ? `Q_${s} = max(P_${s}, 0.06 * roof.W)` : `Q_${s} = max(P_${s}, 0.9 * Q_${before})`,
]

/** @param {number} i @param {number} count */
function section(i, count) {
  const formulas = Array.from({ length: count }, (_, at) => {
    const round = Math.floor(at / lines.length)
    const name = round === 0 ? `${i}` : `${i}_${round}`
    const before = round > 0 ? (round === 1 ? `${i}` : `${i}_${round - 1}`) : i > 1 ? `${i - 1}` : undefined
    return lines[at % lines.length]?.(name, i * 7 + round * 3, before) ?? ''
  })
  const quoted = count >= 5 ? ` The load that it gathers is {{P_${i}}}, from an area of {{A_${i} | 1 ft^2}}.` : ''
  const parts = [
    `## Bay ${i}`,
    `${paragraph(i)}${quoted}`,
    list(i),
    table(i),
    ...(formulas.length > 0 ? [`${fence}equations\n${formulas.join('\n')}\n${fence}`] : []),
    paragraph(i + 3),
    ...(i % 10 === 0 ? [`${fence}working roof\n${wants[(i / 10) % wants.length]}\n${fence}`] : []),
  ]
  return `${parts.join('\n\n')}\n`
}

const wants = [
  'centre of mass',
  'wall stiffness',
  'centre of rigidity',
  'torsion',
  'wall shears',
  'design shears',
  'displacement',
  'equilibrium',
]

const sentences = [
  'The sheathing runs across the purlins and is nailed at every edge, so that the bay acts as one panel.',
  'Where the *drying racks* hang from the deck, their weight is taken as spread over the whole of the bay.',
  'The parapet along this side stops short of the gutter; **its weight is part of the line load** given above.',
  'Snow slides off the upper roof and is not taken to add to the mass that shakes.',
  'A reader who checks this bay by hand should start from the clear width, not from the grid.',
  'The `CMU8` walls below are grouted solid for the bottom courses and at every jamb.',
  'Openings narrower than a nailing strip are left out, as [the notes](https://saltmarsh.example/notes) of the survey say.',
  'Both ends of the bay are tied to the walls by straps at four feet.',
]

/** @param {number} seed */
const paragraph = seed =>
  [0, 3, 5, 1].map(step => sentences[(seed + step * (1 + (seed % 3))) % sentences.length]).join(' ')

/** @param {number} i */
const list = i => `- Joists at ${12 + 4 * (i % 3)} in, bearing on both walls
- Deck of ${1 + (i % 3)} in boards, laid with *broken joints*
- Racks weigh ${3 + (i % 5)} psf when wet`

/** @param {number} i */
function table(i) {
  const rows = Array.from({ length: 5 }, (_, row) => {
    const n = i * 5 + row
    return `| Strip ${n} | ${4 + (n % 6)} ft | ${20 + (n % 13)} psf | ${n % 2 === 0 ? 'sound' : 'to be *renewed*'} | sheet ${1 + (n % 30)} |`
  })
  return ['| strip | width | load | state | drawn on |', '|-------|------:|-----:|-------|----------|', ...rows].join(
    '\n',
  )
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const [sections = '200', equations = '2000'] = process.argv.slice(2)
  process.stdout.write(longDocument(Number(sections), Number(equations)))
}
