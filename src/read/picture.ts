/** A picture file recognised by what it holds, never by its ending, and ready to be put into a page. */
import { bad, good, type Outcome } from '../base/outcome.ts'
import { type Pixels, rasterOf } from './raster.ts'
import { svgOf } from './svg.ts'

export type PictureKind = 'png' | 'jpeg' | 'gif' | 'webp' | 'svg'

export interface Picture {
  readonly kind: PictureKind
  /** `image/png` and the like. */
  readonly mime: string
  /** Size in CSS pixels, as a browser shows it; undefined for an SVG that states none. */
  readonly size: Pixels | undefined
  readonly bytes: Uint8Array
  /** The bytes once more, as a `data:` address holds them. */
  readonly base64: string
}

/** A picture beyond this makes a page that mail and browsers balk at. */
export const LARGEST_PICTURE = 2 * 1024 * 1024

/** @returns the picture, or why there is none, in words that follow the file's name: `it is not a picture` */
export function pictureOf(bytes: Uint8Array): Outcome<Picture> {
  if (bytes.length > LARGEST_PICTURE)
    return bad(`it has ${megabytes(bytes.length)} MB; a picture may have ${megabytes(LARGEST_PICTURE)} MB`)
  if (bytes.length === 0) return bad('it is empty')
  const raster = rasterOf(bytes)
  if (raster) return raster.ok ? good(made(raster.value.kind, raster.value.size, bytes)) : raster
  const svg = svgOf(bytes)
  if (svg) return svg.ok ? good(made('svg', svg.value, bytes)) : svg
  return bad('it is not a picture: PNG, JPEG, GIF, WebP and SVG are read')
}

const made = (kind: PictureKind, size: Pixels | undefined, bytes: Uint8Array): Picture => ({
  kind,
  mime: kind === 'svg' ? 'image/svg+xml' : `image/${kind}`,
  size,
  bytes,
  base64: base64Of(bytes),
})

export const megabytes = (size: number): string => (size / 1048576).toFixed(1)

/** Bytes are taken in runs that end at whole groups of three, so that the runs join without padding between. */
function base64Of(bytes: Uint8Array): string {
  const run = 3 * 8192
  let out = ''
  for (let at = 0; at < bytes.length; at += run) out += btoa(String.fromCharCode(...bytes.subarray(at, at + run)))
  return out
}

/** The address that holds the picture itself. */
export const dataAddress = ({ mime, base64 }: Picture): string => `data:${mime};base64,${base64}`
