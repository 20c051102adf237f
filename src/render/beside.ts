/** Names for the files that stand beside the Markdown. */

/** Most file systems end a name at 255 bytes; the stem and the ending need their share. */
const LONGEST = 120

/**
 * @returns gives each file `STEM.NAME.ENDING`, in signs that every file system takes; no two names are the
 *   same, not even where capitals do not count
 */
export function besideNames(stem: string): (name: string, ending: string) => string {
  const taken = new Set<string>()
  return (name, ending) => {
    const plain = cut(name.normalize('NFC').replace(/[^\p{L}\p{N}.+-]+/gu, '-'))
    for (let times = 1; ; times++) {
      const made = `${stem}.${times === 1 ? plain : `${plain}-${times}`}.${ending}`
      if (taken.has(made.toLowerCase())) continue
      taken.add(made.toLowerCase())
      return made
    }
  }
}

/** As many whole signs as the bytes allow. */
function cut(name: string): string {
  let bytes = 0
  let out = ''
  for (const sign of name) {
    bytes += new TextEncoder().encode(sign).length
    if (bytes > LONGEST) break
    out += sign
  }
  return out
}
