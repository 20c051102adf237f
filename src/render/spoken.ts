/** A formula in one line of plain text, for readers by ear where MathML does not reach, such as in a PDF. */
import { plainText } from './escape.ts'

/** An element of MathML with what stands in it. */
interface Branch {
  readonly name: string
  readonly children: (Branch | string)[]
}

/** @param mathml as KaTeX writes it: attributes quoted, no comments */
export function spoken(mathml: string): string {
  const root: Branch = { name: '', children: [] }
  const open: Branch[] = [root]
  for (const [, slash, name = '', end, text] of mathml.matchAll(/<(\/?)([a-z]+)(?:"[^"]*"|[^">])*?(\/?)>|([^<]+)/g)) {
    if (text !== undefined) open.at(-1)?.children.push(plainText(text))
    else if (slash === '/') open.pop()
    else {
      const branch: Branch = { name, children: [] }
      open.at(-1)?.children.push(branch)
      if (end !== '/') open.push(branch)
    }
  }
  return said(root).replace(/\s+/g, ' ').trim()
}

const said = (part: Branch | string): string => {
  if (typeof part === 'string') return part
  const [first = '', second = '', third = ''] = part.children.map(said)
  switch (part.name) {
    // The source that KaTeX carries along is for programs.
    case 'annotation':
      return ''
    case 'mfrac':
      return `${bracketed(first)}/${bracketed(second)}`
    case 'msup':
      return `${first}^${bracketed(second)}`
    case 'msub':
      return `${first}_${second}`
    case 'msubsup':
      return `${first}_${second}^${bracketed(third)}`
    case 'msqrt':
      return `√(${part.children.map(said).join('')})`
    case 'mspace':
      return ' '
    case 'mo':
      return spaced(part.children.map(said).join(''))
    default:
      return part.children.map(said).join('')
  }
}

const bracketed = (text: string): string => (/^[\p{L}\p{N}.,]*$/u.test(text.trim()) ? text.trim() : `(${text.trim()})`)

/** Signs between terms stand apart; brackets do not. The mark that applies a function is not heard. */
function spaced(sign: string): string {
  if (sign === '\u2061') return ''
  return /^[=+−×⋅<>≤≥-]$/u.test(sign) ? ` ${sign} ` : sign
}
