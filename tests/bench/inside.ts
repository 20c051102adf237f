/** What the bench times within one process, out of the stages themselves. */

import type { Sym } from '../../src/base/formula.ts'
import { good } from '../../src/base/outcome.ts'
import { joinTex, type Tex } from '../../src/base/tex.ts'
import type { Value } from '../../src/base/value.ts'
import { shownAs } from '../../src/base/work.ts'
import { compileText } from '../../src/compile.ts'
import { whole } from '../../src/compute/cases.ts'
import { wallShears } from '../../src/compute/distribution.ts'
import { type Rigidity, type Spring, workRigidity } from '../../src/compute/rigidity.ts'
import { k, c as letterC, s as letterS, T, u0, V, v0, x, y } from '../../src/compute/symbols.ts'
import { drawDisplaced } from '../../src/draw/displaced.ts'
import { drawPlan } from '../../src/draw/plan.ts'
import { drawStoreys } from '../../src/draw/storeys.ts'
import { displacedBuildings } from '../draw/displacedviews.ts'
import { storeyBuildings } from '../draw/storeyviews.ts'
import { buildings } from '../draw/views.ts'

export { default as katex } from 'katex'
export { sourceOf } from '../../src/base/span.ts'
export { texSource, unmarked } from '../../src/base/tex.ts'
export { compileText, compileTree } from '../../src/compile.ts'
export { worksheet } from '../../src/compute/worksheet.ts'
export { createRebuilder } from '../../src/live.ts'
export { readChoices } from '../../src/model/front.ts'
export { gather } from '../../src/model/givens.ts'
export { livePageOf, publish } from '../../src/publish.ts'
export { readDocument } from '../../src/read/document.ts'
export { parseMarkdown } from '../../src/read/markdown.ts'
export { nothingNearby } from '../../src/read/nearby.ts'
export { createTypesetter } from '../../src/render/typeset.ts'
export { removeWalls, removeWallsAnew, solveTower, vibrateTower } from './towers.ts'

/** Drawings that the bench makes again and again, by name. */
export const drawings: readonly (readonly [string, () => string])[] = [
  ['plan of eight walls, hatched and dimensioned', () => drawPlan(planOf('ropewalk'))],
  ['plan of forty walls', () => drawPlan(planOf('hostel'))],
  ['displaced shape', () => drawDisplaced(required(displacedBuildings.both))],
  ['storeys of thirty levels', () => drawStoreys(required(storeyBuildings.thirtyLevels))],
]

const planOf = (name: string) => required(buildings[name])

function required<T>(found: T | undefined): T {
  if (found === undefined) throw new Error('the bench draws a building that there is not')
  return found
}

const display = { system: 'US', relative: false } as const

function value(id: string, sym: Sym, si: number): Value {
  return { id, tex: sym.tex, si, ...shownAs(sym, display), origin: { kind: 'default', assumption: 'bench' } }
}

/** Every equation of a document, whole. */
export function equationsOf(text: string): readonly Tex[] {
  return compileText('bench.md', text).parts.flatMap(part =>
    part.kind !== 'pieces'
      ? []
      : part.pieces.flatMap(piece => {
          if (piece.kind !== 'equation') return []
          const { symbol, lines, result } = piece
          return [joinTex(...[symbol, ...lines, result].flatMap((tex, i) => (i === 0 ? [tex] : ['=', tex])))]
        }),
  )
}

/** A floor of `count` walls in all directions. */
export function manyWalls(count: number): Rigidity {
  const springs = Array.from({ length: count }, (_, i): Spring => {
    const angle = (i * Math.PI * 7) / 31
    const name = `W${i + 1}`
    return {
      name,
      k: value(`${name}.k`, k, 1e8 * (1 + (i % 13))),
      L: value(`${name}.L`, x, 5),
      x: value(`${name}.x`, x, (i % 40) * 3),
      y: value(`${name}.y`, y, Math.floor(i / 40) * 3),
      c: value(`${name}.c`, letterC, Math.cos(angle)),
      s: value(`${name}.s`, letterS, Math.sin(angle)),
    }
  })
  const made = workRigidity('bench', springs, display)
  if (!made.ok) throw new Error(made.because)
  return good(made.value).value
}

/** Shears of all walls in `cases` cases, each with its own force and moment. @returns a sum over all, so that none is left out */
export function shearsInCases(rigidity: Rigidity, cases: number): number {
  let sum = 0
  for (let i = 0; i < cases; i++) {
    const axis = i % 2 === 0 ? 'x' : 'y'
    const each = whole('seismic', `E${i}`, axis, 0)
    const acts = {
      shear: { [axis]: value('V', V, 1e6 + i) },
      moment: value('T', T, 1e6 * (i - cases / 2)),
      u: value('u', u0, 1e-4 * i),
      v: value('v', v0, 2e-4),
    }
    const { numbers } = wallShears(each, rigidity, acts, display).column('V')
    sum += numbers[i % numbers.length] ?? 0
  }
  return sum
}
