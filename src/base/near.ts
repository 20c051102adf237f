/** Names within one or two edits of what was written, nearest first, three at most. */
export function nearNames(written: string, known: Iterable<string>): readonly string[] {
  if (written.length < 2) return []
  const most = written.length < 4 ? 1 : 2
  const found: { readonly name: string; readonly distance: number }[] = []
  for (const name of known) {
    if (Math.abs(name.length - written.length) > most) continue
    const distance = edits(written.toLowerCase(), name.toLowerCase())
    if (distance <= most) found.push({ name, distance })
  }
  found.sort((a, b) => a.distance - b.distance || (a.name < b.name ? -1 : 1))
  return found.slice(0, 3).map(({ name }) => name)
}

/** Insertions, deletions, replacements and swaps of neighbours that turn one word into the other. */
function edits(a: string, b: string): number {
  let before: number[] = []
  let row = Array.from({ length: b.length + 1 }, (_, i) => i)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1
      let best = Math.min((row[j] ?? 0) + 1, (next[j - 1] ?? 0) + 1, (row[j - 1] ?? 0) + same)
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]
      if (swapped) best = Math.min(best, (before[j - 2] ?? 0) + 1)
      next.push(best)
    }
    before = row
    row = next
  }
  return row[b.length] ?? 0
}

/** `Did you mean W1 or W2?`, or what there is when nothing is near and the list is short. */
export function suggestion(written: string, known: readonly string[], what: string): string {
  const near = nearNames(written, known)
  if (near.length > 0) return `Did you mean ${inWords(near, 'or')}?`
  if (known.length === 0) return `There is no ${what} yet.`
  const shown = known.slice(0, 12)
  const rest = known.length - shown.length
  return `There ${known.length === 1 ? 'is' : 'are'}: ${shown.join(', ')}${rest > 0 ? `, and ${rest} more` : ''}.`
}

/** `a`, `a or b`, `a, b or c`. */
export function inWords(names: readonly string[], joint: 'and' | 'or'): string {
  const last = names.at(-1) ?? ''
  return names.length < 2 ? last : `${names.slice(0, -1).join(', ')} ${joint} ${last}`
}
