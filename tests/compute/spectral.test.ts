/** Response of a document to its spectrum, against hand calculation. */
import { describe, expect, test } from 'vitest'
import { closeTo } from '../support/agrees.ts'
import { reading } from '../support/worked.ts'

const GRAVITY = 9.80665
const W = 20 * 10 * 4000

const documentOf = (names: readonly string[], spectrum: string) =>
  [
    '---\nunits: SI\n---',
    `\`\`\`levels\n| level | elevation |\n|---|---|\n${names.map((name, i) => `| ${name} | ${3 * (i + 1)} m |`).join('\n')}\n\`\`\``,
    ...names.flatMap(name => [
      `\`\`\`areas ${name}\n| area | from | to | load |\n|---|---|---|---|\n| F | 0 m, 0 m | 20 m, 10 m | 4 kPa |\n\`\`\``,
      [
        `\`\`\`walls ${name}\n| wall | from | to | height | k |\n|---|---|---|---|---|`,
        '| S | 6 m, 0 m | 14 m, 0 m | 3 m | 50 kN/mm |',
        '| N | 6 m, 10 m | 14 m, 10 m | 3 m | 50 kN/mm |',
        '| W | 0 m, 2 m | 0 m, 8 m | 3 m | 120 kN/mm |',
        '| E | 20 m, 2 m | 20 m, 8 m | 3 m | 120 kN/mm |',
        '```',
      ].join('\n'),
    ]),
    spectrum === '' ? '' : `\`\`\`spectrum\n${spectrum}\n\`\`\``,
  ].join('\n\n')

const rows = '| period (s) | acceleration |\n|---|---|\n| 0 | 0.2 |\n| 0.1 | 0.5 |\n| 0.5 | 0.5 |\n| 1 | 0.25 |'
/** The same by hand. */
const S = (T: number) => (T < 0.1 ? 0.2 + 3 * T : T < 0.5 ? 0.5 : 0.5 - 0.5 * (T - 0.5))

describe('the modal response', () => {
  test('of one level is its weight times the acceleration at its period', () => {
    const read = reading(documentOf(['roof'], rows))
    const T = 2 * Math.PI * Math.sqrt(W / GRAVITY / 1e8)
    closeTo(read.si('modal.x.V'), W * S(T), W)
    closeTo(read.si('roof.modal.x.Vx'), W * S(T), W)
    closeTo(read.si('roof.modal.x.Vy'), 0, W)
    closeTo(read.si('roof.modal.x.T'), 0, 10 * W)
  })

  test('of two equal levels by SRSS is that of the two modes of the golden ratio', () => {
    const read = reading(documentOf(['floor', 'roof'], `combination: SRSS\n${rows}`))
    const modes = [-1, 1].map(sign => {
      const omega2 = (((3 + sign * Math.sqrt(5)) / 2) * 1e8) / (W / GRAVITY)
      // Shape 1 at the floor, φ at the roof.
      const phi = (1 - sign * Math.sqrt(5)) / 2
      const participation = (1 + phi) / (1 + phi * phi)
      const force = participation * W * S((2 * Math.PI) / Math.sqrt(omega2))
      return { base: force * (1 + phi), roof: force * phi }
    })
    const root = (of: (mode: (typeof modes)[number]) => number) => Math.hypot(...modes.map(of))
    closeTo(
      read.si('modal.x.V'),
      root(({ base }) => base),
      W,
    )
    closeTo(
      read.si('floor.modal.x.Vx'),
      root(({ base }) => base),
      W,
    )
    closeTo(
      read.si('roof.modal.x.Vx'),
      root(({ roof }) => roof),
      W,
    )
    const number = ['1', '2', '3'].find(mode => read.si(`mode.${mode}.share.x`) > 0.9)
    closeTo(read.si(`mode.${number}.V.x`), modes[0]?.base ?? Number.NaN, W)
  })

  test('is raised to the share of the static base shear, and never lowered', () => {
    const raised = reading(documentOf(['floor', 'roof'], `static x: 900 kN\nshare: 85%\nstatic y: 10 kN\n${rows}`))
    const base = raised.si('modal.x.V')
    closeTo(raised.si('modal.x.factor'), (0.85 * 900e3) / base, 1)
    closeTo(raised.si('floor.modal.x.raised.Vx'), 0.85 * 900e3, 1e6)
    expect(raised.si('modal.y.factor')).toBe(1)
    const free = reading(documentOf(['floor', 'roof'], rows))
    expect(free.sheet.scope.lookup('modal.x.factor')).toBeUndefined()
    expect(free.sheet.scope.lookup('modal.z.V')).toBeUndefined()
    expect(free.sheet.scope.lookup('roof.modal')).toBeUndefined()
  })
})

describe('a spectrum that cannot be used', () => {
  const faultsOf = (spectrum: string) => {
    const made = reading(documentOf(['floor', 'roof'], spectrum)).sheet.spectral?.()
    return made && !made.ok ? made.because.map(({ rule }) => rule) : []
  }
  test.each([
    ['period-outside-spectrum', rows.replace('| 0 | 0.2 |\n', '')],
    ['spectrum-order', rows.replace('| 0.1 |', '| 0.7 |')],
    ['size-not-positive', rows.replace('| 0 | 0.2 |', '| -1 | 0.2 |')],
    ['size-not-positive', rows.replace('| 0.25 |', '| 0 |')],
    ['unknown-combination', `combination: sum\n${rows}`],
    ['share-out-of-range', `damping: 5\n${rows}`],
    ['unit-missing', rows.replace('period (s)', 'period')],
    ['unit-missing', `static x: 900\n${rows}`],
    ['unknown-setting', `damp: 5%\n${rows}`],
  ])('is told as %s', (rule, spectrum) => {
    expect(new Set(faultsOf(spectrum))).toEqual(new Set([rule]))
  })
})
