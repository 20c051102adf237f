/** The figures of a compiled document, in order. */
import type { Compiled } from '../../src/compile.ts'
import type { Figure } from '../../src/explain/sheet.ts'

export const figuresOf = ({ parts }: Compiled): readonly Figure[] =>
  parts
    .flatMap(part => (part.kind === 'pieces' ? part.pieces : []))
    .flatMap(piece => (piece.kind === 'figure' ? [piece] : []))
