/**
 * Formulas in a Markdown tree, and how they are written: `$…$` in a line and
 * `$$` around a block, as Markdown with mathematics has it.
 */
import type { Literal } from 'mdast'
import type { Options } from 'remark-stringify'
import type { Tex } from '../base/tex.ts'
import { markdownTex } from './math-source.ts'

export interface MathBlock extends Literal {
  type: 'math'
}

export interface InlineMath extends Literal {
  type: 'inlineMath'
}

declare module 'mdast' {
  interface RootContentMap {
    math: MathBlock
    inlineMath: InlineMath
  }
  interface BlockContentMap {
    math: MathBlock
  }
  interface PhrasingContentMap {
    inlineMath: InlineMath
  }
}

export const mathBlock = (source: string): MathBlock => ({ type: 'math', value: source })

export const inlineMath = (tex: Tex): InlineMath => ({ type: 'inlineMath', value: markdownTex(tex) })

const writeMath = (node: MathBlock): string => `$$\n${node.value.replace(/\n\s*\n/g, '\n')}\n$$`
const writeInlineMath = (node: InlineMath): string => `$${node.value}$`

/** Settings for remark-stringify that write these nodes, and keep a dollar sign in the text from opening a formula. */
export const markdownSettings: Options = {
  bullet: '-',
  handlers: { math: writeMath, inlineMath: writeInlineMath },
  unsafe: [{ character: '$', inConstruct: 'phrasing' }],
}
