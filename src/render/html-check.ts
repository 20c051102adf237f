/** A check on one line: what, demand against capacity, a bar, the ratio and the verdict in words. */
import type { Check } from '../explain/sheet.ts'
import { pageText } from './escape.ts'
import { idAttribute, sourceHtml } from './html-parts.ts'

/** The bar ends at this ratio; the limit stands at 1. */
const BAR_END = 1.25

export function checkHtml(check: Check): string {
  const { id, what, demand, capacity, ratio, ratioPrinted, ok, reference, sourceLines } = check
  const origin = [reference === '' ? '' : `<span>${pageText(reference)}</span>`, sourceHtml(sourceLines)].filter(
    part => part !== '',
  )
  return `<li class="check ${ok ? 'ok' : 'ng'}"${idAttribute(id)}>
<span class="what">${pageText(what)}${origin.length === 0 ? '' : `<span class="from">${origin.join(' ')}</span>`}</span>
<span class="demand">${pageText(demand)}</span><span class="sign">${ok ? '≤' : '&gt;'}</span><span class="capacity">${pageText(capacity)}</span>
<span class="bar" aria-hidden="true"><i style="width:${barLength(ratio)}%"></i></span>
<span class="ratio"><span class="unseen">ratio </span>${pageText(ratioPrinted)}</span><span class="verdict">${ok ? 'OK' : 'NG'}</span>
</li>`
}

/** Length of the bar in per cent. A ratio without a number has no bar; the words still stand. */
function barLength(ratio: number): string {
  const share = Number.isNaN(ratio) ? 0 : Math.max(0, Math.min(1, ratio / BAR_END))
  return (100 * share).toFixed(1)
}
