/** The pictures of the prose, as each format holds them. */
import type { Image, Paragraph, PhrasingContent, RootContent } from 'mdast'
import { dataAddress } from '../read/picture.ts'
import type { PictureNode, Pictures, PlacedPicture } from '../read/pictures.ts'

declare module 'mdast' {
  interface ParagraphData {
    /** Number of the figure that the paragraph is: one picture, whose title is the caption. */
    figure?: string
  }
}

/** Marks a paragraph as a numbered figure. */
export const withFigure = (node: RootContent, number: string | undefined): RootContent =>
  number !== undefined && node.type === 'paragraph' ? { ...node, data: { ...node.data, figure: number } } : node

/** How a format shows pictures. */
interface Showing {
  readonly image: (placed: PlacedPicture) => Image
  readonly figure: (image: Image, number: string, caption: string) => readonly RootContent[]
}

/** Every picture as the format shows it; one that was not found gives way to its description. */
function shown(node: RootContent, pictures: Pictures, showing: Showing): readonly RootContent[] {
  if (isPicture(node)) {
    const placed = pictures.get(node)
    return [placed === undefined ? descriptionOf(node) : showing.image(placed)]
  }
  const [only] = node.type === 'paragraph' ? node.children : []
  const number = node.type === 'paragraph' ? node.data?.figure : undefined
  const placed = only !== undefined && isPicture(only) ? pictures.get(only) : undefined
  if (number !== undefined && placed !== undefined)
    return showing.figure({ ...showing.image(placed), title: null }, number, placed.title)
  if (!('children' in node)) return [node]
  // A picture is phrasing, and so is what stands in its place.
  const children = (node.children as RootContent[]).flatMap(child => shown(child, pictures, showing))
  return [{ ...node, children } as RootContent]
}

const holding = new WeakMap<RootContent, boolean>()

/** True for a node that is a picture or holds one. */
export function holdsPicture(node: RootContent): boolean {
  if (isPicture(node)) return true
  if (!('children' in node)) return false
  const known = holding.get(node) ?? (node.children as readonly RootContent[]).some(holdsPicture)
  holding.set(node, known)
  return known
}

const isPicture = (node: RootContent): node is PictureNode => node.type === 'image' || node.type === 'imageReference'

const descriptionOf = ({ alt }: PictureNode): PhrasingContent => ({
  type: 'emphasis',
  children: [{ type: 'text', value: alt ? `[Picture left out: ${alt}]` : '[Picture left out]' }],
})

const captionOf = (name: string, caption: string): Paragraph =>
  paragraph([
    { type: 'strong', children: [{ type: 'text', value: name }] },
    { type: 'text', value: ` ${caption}` },
  ])

/** Pictures within the page itself. */
export function picturesInPage(nodes: readonly RootContent[], pictures: Pictures): readonly RootContent[] {
  const showing: Showing = {
    image: ({ picture, path, alt, title }) => ({
      type: 'image',
      url: path,
      alt,
      title: title === '' ? null : title,
      data: { hProperties: { src: dataAddress(picture), ...sizeOf(picture.size) } },
    }),
    figure: (image, number, caption) => [
      {
        type: 'blockquote',
        data: { hName: 'figure', hProperties: { className: ['picture'] } },
        children: [paragraph([image]), { ...captionOf(`Figure ${number}`, caption), data: { hName: 'figcaption' } }],
      },
    ],
  }
  return nodes.flatMap(node => shown(node, pictures, showing))
}

/** Height of the tallest picture in CSS pixels: 180 mm on paper, which every sheet has. */
const TALLEST = 680

/** So that the page does not move when the picture comes, and a tall one stays within a sheet. */
function sizeOf(size: PlacedPicture['picture']['size']): { readonly width?: number; readonly height?: number } {
  if (size === undefined) return {}
  const scale = Math.min(1, TALLEST / size.height)
  const whole = (length: number) => Math.max(1, Math.round(scale * length))
  return { width: whole(size.width), height: whole(size.height) }
}

const paragraph = (children: readonly PhrasingContent[]): Paragraph => ({ type: 'paragraph', children: [...children] })

/** @param addressOf where a picture lies, seen from the Markdown */
export function picturesBeside(
  nodes: readonly RootContent[],
  pictures: Pictures,
  addressOf: (placed: PlacedPicture) => string,
): readonly RootContent[] {
  const showing: Showing = {
    image: placed => ({
      type: 'image',
      url: addressOf(placed),
      alt: placed.alt,
      title: placed.title === '' ? null : placed.title,
    }),
    figure: (image, number, caption) => [paragraph([image]), captionOf(`Figure ${number}.`, caption)],
  }
  return nodes.flatMap(node => shown(node, pictures, showing))
}

/** Names of definitions that tell where a picture is and nothing else: with the picture in place they lead nowhere. */
export function onlyPictured(nodes: readonly RootContent[]): ReadonlySet<string> {
  const of = (type: 'imageReference' | 'linkReference') => new Set(nodes.flatMap(node => referencesIn(node, type)))
  const linked = of('linkReference')
  return new Set([...of('imageReference')].filter(name => !linked.has(name)))
}

function referencesIn(node: RootContent, type: 'imageReference' | 'linkReference'): readonly string[] {
  const inner = 'children' in node ? node.children.flatMap(child => referencesIn(child, type)) : []
  return node.type === type ? [node.identifier, ...inner] : inner
}
