/**
 * A sheet with every kind of piece, for an invented building. Its numbers are
 * worked here, plainly, so that the page shows a calculation that holds.
 */
import { sourceOf } from '../../src/base/span.ts'
import { joinTex, numeral, type Tex, tex } from '../../src/base/tex.ts'
import type { Column, Equation, Row, Sheet, Table } from '../../src/explain/sheet.ts'
import type { BodyPart } from '../../src/render/body.ts'

interface Wall {
  readonly name: string
  readonly L: number
  readonly h: number
  readonly x: number
}

const E = 1800
const t = 7.63
const force = 62
const roof = { weight: 183.6, x: 34.2 }
const walls: readonly Wall[] = [
  { name: 'W1', L: 28, h: 12, x: 0 },
  { name: 'W2', L: 12, h: 12, x: 24 },
  { name: 'W3', L: 14, h: 12, x: 60 },
  { name: 'W4', L: 9.5, h: 12.5, x: 72 },
]

const stiffness = ({ L, h }: Wall) => (E * t) / (4 * (h / L) ** 3 + 3 * (h / L))
const k = walls.map(stiffness)
const total = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0)
const sumK = total(k)
const sumKx = total(walls.map(({ x }, i) => (k[i] ?? 0) * x))
const xr = sumKx / sumK
const e = roof.x - xr
const d = walls.map(({ x }) => x - xr)
const sumKd2 = total(d.map((arm, i) => (k[i] ?? 0) * arm * arm))
const direct = k.map(stiff => (force * stiff) / sumK)
const torsion = k.map((stiff, i) => (force * e * stiff * (d[i] ?? 0)) / sumKd2)
const shear = direct.map((value, i) => value + (torsion[i] ?? 0))

/** Digits grouped by commas, minus as a minus sign. */
function printed(value: number, decimals: number): string {
  const [whole = '', rest] = Math.abs(value).toFixed(decimals).split('.')
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',')
  return `${value < 0 ? '−' : ''}${grouped}${rest === undefined ? '' : `.${rest}`}`
}

function inTex(value: number, decimals: number): Tex {
  const groups = printed(Math.abs(value), decimals).split(',')
  return joinTex(
    value < 0 ? '-' : '',
    ...groups.flatMap((group, i) => (i === 0 ? [numeral(group)] : ['{,}', numeral(group)])),
  )
}

const unit = (name: string) => `\\ \\mathrm{${name}}`
const bold = (value: number, decimals: number, name: string) =>
  joinTex('\\mathbf{', inTex(value, decimals), '}', unit(name))

const wallStiffness: Equation = {
  kind: 'equation',
  id: 'roof.wall.W1.k',
  number: '2.1',
  symbol: tex('k_{\\text{W1}}'),
  lines: [
    tex('\\frac{E\\,t}{4\\,{\\left(\\frac{h}{L}\\right)}^{3}+3\\,\\frac{h}{L}}'),
    joinTex(
      '\\frac{\\left(',
      inTex(E, 0),
      unit('ksi'),
      '\\right)\\left(',
      inTex(t, 2),
      unit('in'),
      '\\right)}{4\\,{\\left(\\frac{',
      inTex(12, 0),
      unit('ft'),
      '}{',
      inTex(28, 0),
      unit('ft'),
      '}\\right)}^{3}+3\\left(\\frac{',
      inTex(12, 0),
      unit('ft'),
      '}{',
      inTex(28, 0),
      unit('ft'),
      '}\\right)}',
    ),
  ],
  result: bold(k[0] ?? 0, 0, 'kip/in'),
  reference: 'beam theory, flexure and shear',
  assumes: ['G = 0.4 E', 'shear shape factor 1.2', 'uncracked section'],
  sourceLines: [31, 44],
}

const centreOfRigidity: Equation = {
  kind: 'equation',
  id: 'roof.CR.x',
  number: '2.2',
  symbol: tex('x_{\\text{r}}'),
  lines: [
    tex('\\frac{\\sum k\\,x}{\\sum k}'),
    joinTex(
      '\\frac{',
      ...walls.flatMap(({ x }, i) => [
        i === 0 ? '' : '+',
        '\\left(',
        inTex(k[i] ?? 0, 0),
        unit('kip/in'),
        '\\right)\\left(',
        inTex(x, 0),
        unit('ft'),
        '\\right)',
      ]),
      '}{',
      ...walls.flatMap((_, i) => [i === 0 ? '' : '+', inTex(k[i] ?? 0, 0), unit('kip/in')]),
      '}',
    ),
  ],
  result: bold(xr, 2, 'ft'),
  reference: 'statics',
  assumes: [],
  sourceLines: [31, 32, 33, 34],
}

const polar: Equation = {
  kind: 'equation',
  id: 'roof.J',
  number: '2.3',
  symbol: tex('J'),
  lines: [
    tex('\\sum k\\,d^{2}'),
    joinTex(
      ...walls.flatMap((_, i) => [
        i === 0 ? '' : '+',
        '\\left(',
        inTex(k[i] ?? 0, 0),
        unit('kip/in'),
        '\\right){\\left(',
        inTex(d[i] ?? 0, 2),
        unit('ft'),
        '\\right)}^{2}',
      ]),
    ),
  ],
  result: bold(sumKd2, 0, 'kip{\\cdot}ft^{2}/in'),
  reference: 'rigid diaphragm; walls along y only',
  assumes: ['walls have no stiffness across their plane'],
  sourceLines: [31, 32, 33, 34],
}

const eccentricity: Equation = {
  kind: 'equation',
  id: 'roof.e.x',
  number: '2.4',
  symbol: tex('e_{x}'),
  lines: [tex('x_{\\text{m}}-x_{\\text{r}}'), joinTex(inTex(roof.x, 2), unit('ft'), '-', inTex(xr, 2), unit('ft'))],
  result: bold(e, 2, 'ft'),
  reference: 'ASCE 7-22 §12.8.4.1',
  assumes: [],
  sourceLines: [],
}

const single: Equation = {
  kind: 'equation',
  id: 'roof.n',
  number: '2.5',
  symbol: tex('n'),
  lines: [],
  result: bold(4, 0, 'walls'),
  reference: '',
  assumes: [],
  sourceLines: [31],
}

const right = (head: Tex | string, columnUnit: string): Column => ({
  head,
  unit: columnUnit,
  align: 'right',
})
const shearRow = (wall: Wall, i: number): Row => ({
  cells: [
    wall.name,
    printed(wall.h, 1),
    printed(wall.L, 1),
    printed(t, 2),
    printed(k[i] ?? 0, 0),
    printed(wall.x, 1),
    printed((k[i] ?? 0) * wall.x, 0),
    printed(d[i] ?? 0, 2),
    printed((k[i] ?? 0) * (d[i] ?? 0) ** 2, 0),
    printed(direct[i] ?? 0, 2),
    printed(torsion[i] ?? 0, 2),
    printed(shear[i] ?? 0, 2),
  ],
  governs: i === 0,
})

const shears: Table = {
  kind: 'table',
  id: 'roof.wall',
  number: '2.1',
  caption: 'Walls along y and their shares of 62 kip, case EY.',
  columns: [
    { head: 'Wall', unit: '', align: 'left' },
    right(tex('h'), 'ft'),
    right(tex('L'), 'ft'),
    right(tex('t'), 'in'),
    right(tex('k'), 'kip/in'),
    right(tex('x'), 'ft'),
    right(tex('k\\,x'), 'kip*ft/in'),
    right(tex('d'), 'ft'),
    right(tex('k\\,d^{2}'), 'kip*ft^2/in'),
    right(tex('V_{\\text{d}}'), 'kip'),
    right(tex('V_{\\text{t}}'), 'kip'),
    right(tex('V'), 'kip'),
  ],
  rows: walls.map(shearRow),
  foot: {
    cells: [
      'Sum',
      '',
      '',
      '',
      printed(sumK, 0),
      '',
      printed(sumKx, 0),
      '',
      printed(sumKd2, 0),
      printed(total(direct), 2),
      printed(Math.abs(total(torsion)), 2),
      printed(total(shear), 2),
    ],
    governs: false,
  },
  formulas: [
    { symbol: tex('d'), formula: tex('x-x_{\\text{r}}'), reference: 'statics' },
    { symbol: tex('V_{\\text{d}}'), formula: tex('F\\,\\frac{k}{\\sum k}'), reference: 'rigid diaphragm' },
    { symbol: tex('V_{\\text{t}}'), formula: tex('F\\,e_{x}\\,\\frac{k\\,d}{J}'), reference: 'rigid diaphragm' },
    { symbol: tex('V'), formula: tex('V_{\\text{d}}+V_{\\text{t}}'), reference: '' },
  ],
  sourceLines: [31, 32, 33, 34],
}

const areas: Table = {
  kind: 'table',
  id: 'roof.areas',
  number: '1.1',
  caption: 'Areas of the roof. Hatch is an opening.',
  columns: [
    { head: 'Area', unit: '', align: 'left' },
    right(tex('A'), 'ft^2'),
    right(tex('w'), 'psf'),
    right(tex('W'), 'kip'),
    { head: 'Note', unit: '', align: 'left' },
  ],
  rows: [
    { cells: ['Ropewalk', '2,160', '68', '146.88', 'deck and topping'], governs: false },
    { cells: ['Loft', '576', '68', '39.17', ''], governs: false },
    { cells: ['Hatch', '−36', '68', '−2.45', 'skylight'], governs: false },
  ],
  foot: { cells: ['Sum', '2,700', '', '183.60', ''], governs: false },
  formulas: [],
  sourceLines: [18, 19, 20],
}

const svg = `<svg viewBox="0 0 740 300" xmlns="http://www.w3.org/2000/svg"><title>Plan of the roof</title><desc>Four walls along y.</desc><style>.w{stroke:var(--ink);stroke-width:6}.g{stroke:var(--soft);stroke-dasharray:12 3 2 3;stroke-width:.8}.n{fill:var(--ink);font-size:13px;font-weight:600}.v{fill:var(--copper);font-size:13px}.d{fill:var(--soft);font-size:12px}</style>
<rect x="60" y="50" width="612" height="196" fill="var(--wash)" stroke="var(--ink)"/>
${walls.map(({ name, x, L }, i) => `<line class="g" x1="${60 + 8.5 * x}" x2="${60 + 8.5 * x}" y1="24" y2="262"/><line class="w" x1="${60 + 8.5 * x}" x2="${60 + 8.5 * x}" y1="${148 - 3.4 * L}" y2="${148 + 3.4 * L}"/><text class="n" x="${70 + 8.5 * x}" y="140">${name}</text><text class="v" x="${70 + 8.5 * x}" y="160">${printed(shear[i] ?? 0, 1)} kip</text>`).join('\n')}
<text class="d" x="60" y="286">design shear of a wall, case EY</text></svg>`

const text = `${Array.from({ length: 30 }, (_, i) => `| row ${i + 1} |`).join('\n')}\n| W7 | 82 ft, 4 ft | 82 ft, 16 ft | 12 ft | CMU8 |\n`

export const source = sourceOf('ropeworks.md', text)

const outside = {
  rule: 'wall-outside-level',
  severity: 'error' as const,
  message: 'wall W7 stands 10.00 ft outside level roof',
  at: { span: { start: text.indexOf('82 ft, 4 ft'), end: text.indexOf('82 ft, 4 ft') + 11 }, text: 'x = 82.00 ft' },
  also: [{ span: { start: 0, end: 9 }, text: 'roof ends at grid D, x = 72.00 ft' }],
  help: 'A diaphragm can only push on walls that it meets.\nMove W7 to x ≤ 72.00 ft, or extend an area of roof.',
}

export const sheet: Sheet = {
  titleBlock: {
    title: 'Lateral calculation',
    project: 'Saltmarsh Rope Works',
    location: '',
    number: '26-031',
    revision: 'B',
    date: '2026-11-02',
    by: 'R. Okafor',
    checked: '',
    standard: 'ASCE 7-22',
  },
  preface: { contents: [], checks: [], criteria: undefined, revisions: [] },
  cover: false,
  paper: 'letter',
  template: {},
  language: 'en-US',
  sourceMark: '8f2c 41d0',
  version: '0.1.0',
  faults: [outside],
  draft: true,
}

const vMax = (1000 * (shear[0] ?? 0)) / (28 * 12 * t)
const wallHead = ['W1', printed(shear[0] ?? 0, 2)]

export const body: readonly BodyPart[] = [
  {
    kind: 'prose',
    html: `<h2>1 Roof: where the force goes</h2>
<p>The roof is a concrete-topped steel deck and is taken as rigid. Its mass and its stiffness do not share a center, so a force along <em>y</em> also turns the roof. The wall that governs is <a class="q" href="#roof.wall">${wallHead[0]}</a>, at <a class="q" href="#roof.wall.W1.V">${wallHead[1]} kip</a>; the center of rigidity lies at <a class="q" href="#roof.CR.x">${printed(xr, 2)} ft</a>.</p>
<ul><li>Walls are solid, fixed at the foot and free at the roof.</li><li>Openings are worked in sheet 2.</li></ul>
<h3>1.1 Mass</h3>`,
  },
  areas,
  {
    kind: 'prose',
    html: '<h3>1.2 Wall stiffness</h3>\n<p>Wall W1 is worked here; the table does the same for the others.</p>',
  },
  { kind: 'heading', id: '', text: 'Stiffness of wall W1' },
  wallStiffness,
  centreOfRigidity,
  polar,
  eccentricity,
  single,
  {
    kind: 'note',
    text: 'The roof turns about its center of rigidity; walls along x are left out of the torsional stiffness here.',
  },
  shears,
  {
    kind: 'figure',
    id: 'roof.plan',
    number: '2.1',
    caption: 'Roof plan, walls along y with their design shears.',
    svg,
    alternative: 'Plan of the roof with four walls along y; W1 at the left takes the most.',
  },
  { kind: 'prose', html: '<h3>1.3 Checks</h3>' },
  {
    kind: 'check',
    id: 'roof.wall.W1.V',
    what: 'Shear in wall W1',
    demand: `${printed(vMax, 1)} psi`,
    capacity: '38.0 psi',
    ratio: vMax / 38,
    numbers: { demand: 1, capacity: 1, unit: '' },
    ratioPrinted: printed(vMax / 38, 2),
    ok: true,
    reference: 'TMS 402-22 §8.3.5',
    sourceLines: [31, 44],
  },
  {
    kind: 'check',
    id: 'roof.drift.EY',
    what: 'Story drift at grid D, along y',
    demand: '0.61 in',
    capacity: '0.58 in',
    ratio: 0.61 / 0.58,
    numbers: { demand: 1, capacity: 1, unit: '' },
    ratioPrinted: printed(0.61 / 0.58, 2),
    ok: false,
    reference: 'ASCE 7-22 §12.12.1',
    sourceLines: [52],
  },
  {
    kind: 'check',
    id: 'roof.residual',
    what: 'Equilibrium: sum of wall shears less the force applied',
    demand: '6.2×10⁻⁵ kip',
    capacity: '0.062 kip',
    ratio: 0.001,
    numbers: { demand: 1, capacity: 1, unit: '' },
    ratioPrinted: '0.001',
    ok: true,
    reference: '',
    sourceLines: [],
  },
  { kind: 'prose', html: '<h3>1.4 Wall W7</h3>' },
  {
    kind: 'fault',
    diagnostics: [
      outside,
      {
        ...outside,
        rule: 'drift-not-worked',
        severity: 'warning',
        message: 'drift of level roof is not worked',
        also: [],
        at: { span: { start: 10, end: 15 }, text: '' },
        help: 'Wall W7 has no place, so the roof has no stiffness along x.',
      },
    ],
  },
  {
    kind: 'prose',
    html: '<h2>2 From the survey</h2><p>Levels were taken on site; <code>z = 0</code> is the top of the footing.</p><table><thead><tr><th>Point</th><th align="right">Level (ft)</th></tr></thead><tbody><tr><td><em>A</em></td><td align="right">0.02</td></tr><tr><td>B</td><td align="right">−0.01</td></tr></tbody></table><blockquote><p>The east wall leans by less than an eighth of an inch.</p></blockquote>',
  },
  {
    kind: 'register',
    id: 'assumptions',
    title: 'Assumptions',
    items: [
      { text: 'Shear modulus G = 0.4 E', detail: 'construction CMU8, line 24' },
      { text: 'Walls are uncracked', detail: '' },
    ],
  },
]
