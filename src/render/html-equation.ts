/** An equation: its number, its lines aligned at the equals sign, and where it comes from. */
import { joinTex } from '../base/tex.ts'
import type { Equation } from '../explain/sheet.ts'
import { escapeHtml, pageText } from './escape.ts'
import { heardMath, idAttribute, type Setting, sourceHtml } from './html-parts.ts'
import { fitFactor, unbreakableWidth } from './measure.ts'

/** Room for a line beside the origin, and with the whole width to itself, in em of the formula's type. */
const ROOM_BESIDE = 22
const ROOM_ALONE = 31

/** About 5.5 pt on paper: below that a formula should have been a table. */
const LEAST = 0.45

export function equationHtml(equation: Equation, setting: Setting): string {
  const { typesetter } = setting
  const { id, number, symbol, lines, result } = equation
  const whole = joinTex(...[symbol, ...lines, result].flatMap((tex, i) => (i === 0 ? [tex] : ['=', tex])))
  const widths = [...lines, result].map(unbreakableWidth)
  const isLong = Math.max(...widths) > ROOM_BESIDE
  const rows = lines.map((tex, i) => rightHtml(typesetter.html(tex, 'display'), widths[i] ?? 0))
  rows.push(rightHtml(`<span class="result">${typesetter.html(result, 'display')}</span>`, widths.at(-1) ?? 0))
  const { before, attributes } = heardMath(whole, setting)
  const name = number === '' ? 'Equation' : `Equation ${escapeHtml(number)}`
  return `<div class="eq${isLong ? ' long' : ''}"${idAttribute(id)} role="group" aria-label="${name}">
<p class="n">${escapeHtml(number)}</p>
<div class="steps">${before}<div class="lines"${attributes}>
${rows.map((row, i) => leftHtml(i === 0 ? typesetter.html(symbol, 'inline') : '') + row).join('\n')}
</div></div>
${originHtml(equation)}</div>`
}

const leftHtml = (symbol: string): string => `<span class="sy">${symbol}</span><span class="is">=</span>`

/** One right-hand side; what cannot be broken and is wider than the sheet is set smaller. */
function rightHtml(set: string, width: number): string {
  const fit = fitFactor(width, ROOM_ALONE, LEAST)
  return `<span class="rhs"${fit < 1 ? ` style="--fit:${fit.toFixed(2)}"` : ''}>${set}</span>`
}

function originHtml({ reference, assumes, sourceLines }: Equation): string {
  const parts = [
    reference === '' ? '' : `<p>${pageText(reference)}</p>`,
    assumes.length === 0 ? '' : `<p class="assumes">assumes ${assumes.map(pageText).join('; ')}</p>`,
    sourceLines.length === 0 ? '' : `<p>${sourceHtml(sourceLines)}</p>`,
  ].join('')
  return parts === '' ? '' : `<div class="origin">${parts}</div>\n`
}
