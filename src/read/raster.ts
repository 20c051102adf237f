/** PNG, JPEG, GIF and WebP: which it is, how large it is, and whether it is all there. */
import { bad, good, type Outcome } from '../base/outcome.ts'

export interface Pixels {
  readonly width: number
  readonly height: number
}

export interface Raster {
  readonly kind: 'png' | 'jpeg' | 'gif' | 'webp'
  readonly size: Pixels
}

/** @returns undefined for a file that starts like none of these */
export function rasterOf(bytes: Uint8Array): Outcome<Raster> | undefined {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  for (const { kind, starts, sizeOf } of formats) {
    if (!starts(bytes)) continue
    const size = sizeOf(view)
    if (size === undefined) return bad(`it starts like a ${names[kind]} and is cut short or damaged`)
    if (size.width === 0 || size.height === 0) return bad(`it is a ${names[kind]} without width or height`)
    if (size.width * size.height > MOST_PIXELS)
      return bad(`it has ${size.width} × ${size.height} pixels, more than a browser can be asked to show`)
    return good({ kind, size })
  }
  return undefined
}

/** A hundred million pixels take 400 MB when they are shown. */
const MOST_PIXELS = 1e8

const names = { png: 'PNG', jpeg: 'JPEG', gif: 'GIF', webp: 'WebP' } as const

const text = (bytes: Uint8Array, at: number, length: number): string =>
  String.fromCharCode(...bytes.subarray(at, at + length))

const formats: readonly {
  readonly kind: Raster['kind']
  readonly starts: (bytes: Uint8Array) => boolean
  /** Undefined where the file ends before it should. */
  readonly sizeOf: (view: DataView) => Pixels | undefined
}[] = [
  { kind: 'png', starts: bytes => text(bytes, 0, 8) === '\x89PNG\r\n\x1a\n', sizeOf: pngSize },
  { kind: 'jpeg', starts: bytes => text(bytes, 0, 3) === '\xff\xd8\xff', sizeOf: jpegSize },
  { kind: 'gif', starts: bytes => /^GIF8[79]a/.test(text(bytes, 0, 6)), sizeOf: gifSize },
  {
    kind: 'webp',
    starts: bytes => text(bytes, 0, 4) === 'RIFF' && text(bytes, 8, 4) === 'WEBP',
    sizeOf: webpSize,
  },
]

const word = (view: DataView, at: number, length = 4): string =>
  String.fromCharCode(...new Uint8Array(view.buffer, view.byteOffset + at, length))

/** Chunks of a length, a name, contents and a check sum, from IHDR to IEND. Source: PNG specification, W3C, section 5. */
function pngSize(view: DataView): Pixels | undefined {
  let size: Pixels | undefined
  let drawn = false
  for (let at = 8; at + 12 <= view.byteLength; ) {
    const length = view.getUint32(at)
    const name = word(view, at + 4)
    if (at + 12 + length > view.byteLength) return undefined
    if (name === 'IHDR' && length >= 8) size = { width: view.getUint32(at + 8), height: view.getUint32(at + 12) }
    if (name === 'IDAT') drawn = true
    if (name === 'IEND') return drawn ? size : undefined
    at += 12 + length
  }
  return undefined
}

/**
 * Segments of a mark, a length and contents up to the scan. Source: ITU-T T.81, annex B; the turn of the
 * camera is tag 0x0112 of Exif 2.3, section 4.6.4 (from memory, unchecked).
 */
function jpegSize(view: DataView): Pixels | undefined {
  let size: Pixels | undefined
  let turned = false
  for (let at = 2; at + 4 <= view.byteLength; ) {
    if (view.getUint8(at) !== 0xff) return undefined
    const mark = view.getUint8(at + 1)
    if (mark === 0xff) {
      at++
      continue
    }
    const length = view.getUint16(at + 2)
    if (length < 2 || at + 2 + length > view.byteLength) return undefined
    if (mark === 0xda) return size && endsWell(view) ? (turned ? across(size) : size) : undefined
    if (mark === 0xe1) turned = turned || isTurned(view, at + 4, length - 2)
    if (isFrame(mark) && length >= 7) size = { height: view.getUint16(at + 5), width: view.getUint16(at + 7) }
    at += 2 + length
  }
  return undefined
}

const across = ({ width, height }: Pixels): Pixels => ({ width: height, height: width })

/** Start of a frame of any coding; C4, C8 and CC are tables and extensions. */
const isFrame = (mark: number): boolean => mark >= 0xc0 && mark <= 0xcf && ![0xc4, 0xc8, 0xcc].includes(mark)

/** The mark of the end stands in the file's last stretch; cameras write a little after it. */
function endsWell(view: DataView): boolean {
  const least = Math.max(2, view.byteLength - 65536)
  for (let at = view.byteLength - 2; at >= least; at--)
    if (view.getUint8(at) === 0xff && view.getUint8(at + 1) === 0xd9) return true
  return false
}

/** True where the camera lay on its side: a browser shows such a picture turned by a quarter. */
function isTurned(view: DataView, start: number, length: number): boolean {
  if (length < 14 || word(view, start, 6) !== 'Exif\0\0') return false
  const tiff = start + 6
  const end = start + length
  const little = word(view, tiff, 2) === 'II'
  const list = tiff + view.getUint32(tiff + 4, little)
  if (list + 2 > end) return false
  const count = view.getUint16(list, little)
  for (let i = 0; i < count; i++) {
    const at = list + 2 + 12 * i
    if (at + 12 > end) return false
    if (view.getUint16(at, little) === 0x0112) return view.getUint16(at + 8, little) >= 5
  }
  return false
}

/** Source: GIF89a specification, section 18; the trailer 3B ends it, section 27. */
function gifSize(view: DataView): Pixels | undefined {
  if (view.byteLength < 14) return undefined
  for (let at = view.byteLength - 1; at >= 13; at--) {
    const byte = view.getUint8(at)
    if (byte === 0x3b) return { width: view.getUint16(6, true), height: view.getUint16(8, true) }
    if (byte !== 0) return undefined
  }
  return undefined
}

/** Source: WebP container specification; RFC 6386, section 9.1, for VP8; the lossless bitstream for VP8L. */
function webpSize(view: DataView): Pixels | undefined {
  if (view.byteLength < 30 || view.getUint32(4, true) + 8 > view.byteLength) return undefined
  switch (word(view, 12)) {
    case 'VP8X':
      return { width: three(view, 24) + 1, height: three(view, 27) + 1 }
    case 'VP8L': {
      const bits = view.getUint32(21, true)
      return view.getUint8(20) === 0x2f
        ? { width: (bits & 0x3fff) + 1, height: ((bits >> 14) & 0x3fff) + 1 }
        : undefined
    }
    case 'VP8 ':
      return three(view, 23) === 0x2a019d
        ? { width: view.getUint16(26, true) & 0x3fff, height: view.getUint16(28, true) & 0x3fff }
        : undefined
    default:
      return undefined
  }
}

const three = (view: DataView, at: number): number => view.getUint16(at, true) + view.getUint8(at + 2) * 65536
