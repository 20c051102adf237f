/**
 * Markup of a typesetter as plain data, for the page's script to make elements of: formulas are made of the
 * same few tags, so each distinct piece is kept once. Nothing of it is read as markup again.
 */

/** An element's beginning with its attributes, name and value in turn, or its end, where the name is `/`; and the text after it. */
export type Piece = readonly [name: string, text: string, ...attributes: readonly string[]]

export interface Pieces {
  /** The markup by the numbers of its pieces. @throws when it is not what a typesetter writes: a bug of ours */
  readonly pack: (html: string) => readonly number[]
  readonly all: () => readonly Piece[]
}

export function createPieces(): Pieces {
  const known = new Map<string, number>()
  const all: Piece[] = []
  const numberOf = (piece: Piece): number => {
    const key = JSON.stringify(piece)
    const held = known.get(key) ?? all.length
    if (held === all.length) {
      known.set(key, held)
      all.push(piece)
    }
    return held
  }
  return { pack: html => piecesOf(html).map(numberOf), all: () => all }
}

// Attributes are quoted and text holds no bare `<`, as KaTeX writes them.
const tags = /<(\/?)([a-z]+)((?: [\w:-]+="[^"]*")*)(\/?)>([^<]*)/gy
const attributes = / ([\w:-]+)="([^"]*)"/g

function piecesOf(html: string): readonly Piece[] {
  const found: Piece[] = []
  let read = 0
  for (const [whole, slash = '', name = '', list = '', closed = '', text = ''] of html.matchAll(tags)) {
    read += whole.length
    if (slash !== '') found.push(['/', plain(text)])
    else {
      const pairs = Array.from(list.matchAll(attributes), ([, key = '', value = '']) => [key, plain(value)]).flat()
      found.push([name, closed === '' ? plain(text) : '', ...pairs])
      if (closed !== '') found.push(['/', plain(text)])
    }
  }
  if (read !== html.length) throw new Error(`markup that is not read: ${html.slice(read, read + 60)}`)
  return found
}

const signs: Readonly<Record<string, string>> = {
  '&amp;': '&',
  '&lt;': '<',
  '&gt;': '>',
  '&quot;': '"',
  '&#x27;': "'",
}

const plain = (text: string): string => text.replace(/&(?:amp|lt|gt|quot|#x27);/g, sign => signs[sign] ?? sign)
